package scenefile

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestParsePoints(t *testing.T) {
	want := []r3.Vec{{X: 1.5, Y: -2, Z: 3e-3}, {}}
	for name, text := range map[string]string{
		"plain":             "1.5,-2,3e-3\n0,0,0\n",
		"no last line end":  "1.5,-2,3e-3\n0,0,0",
		"crlf":              "1.5,-2,3e-3\r\n0,0,0\r\n",
		"spaces":            " 1.5,\t-2 , 3e-3 \n\n \t\n0 ,0,0\n",
		"header":            "x,y,z\n1.5,-2,3e-3\n0,0,0\n",
		"header with unit":  "x[mm],y[mm],z[mm]\n1.5,-2,3e-3\n0,0,0\n",
		"quoted header":     "\"x [mm]\", \"y [mm]\", \"z [mm]\"\n1.5,-2,3e-3\n0,0,0\n",
		"comments":          "# a\n  # b\nx,y,z\n#c\n1.5,-2,3e-3\n# 9,9,9\n0,0,0\n#",
		"signs and zeros":   "+1.50,-02,.003\n-0,0.,0e5\n",
		"byte order mark":   "\ufeffx,y,z\n1.5,-2,3e-3\n0,0,0\n",
		"digits of a float": "1.5000000000000000000001,-2,0.003\n0,0,0\n",
	} {
		got, line, bad := parsePoints([]byte(text), "mm")
		if bad != nil {
			t.Errorf("%s: line %d: %v", name, line, bad.problem)
		} else if diff := cmp.Diff(want, got); diff != "" {
			t.Errorf("%s (-want +got):\n%s", name, diff)
		}
	}
}

func TestParsePointsFaults(t *testing.T) {
	for _, c := range []struct {
		name, text string
		line       int
		want       string
	}{
		{"empty", "", 0, "no points"},
		{"comments only", "# a\nx,y,z\n", 0, "no points"},
		{"two fields", "1,2,3\n1,2\n", 2, "a row has three numbers, not 2 fields"},
		{"four fields", "1,2,3,4.5\n", 1, "a row has three numbers, not 4 fields"},
		{"empty field", "1,,3\n", 1, `y is not a finite decimal number (got "")`},
		{"decimal commas", "1,5,2,0,3,5\n", 1, "a decimal comma"},
		{"decimal commas with semicolons", "# Excel\r\n1,5;2,0;3,5\r\n", 2, "a decimal comma"},
		{"one decimal comma", "0,5,0,0\n", 1, "a decimal comma"},
		{"semicolons", "1;2;3\n", 1, "numbers separated by semicolons"},
		{"blanks", "1 2 3\n", 1, "a row has three numbers, not 1 fields"},
		{"second header", "x,y,z\nx,y,z\n1,2,3\n", 2, "x is not a finite decimal number"},
		{"late header", "1,2,3\nx,y,z\n", 2, "x is not a finite decimal number"},
		{"other unit", "x[m],y[m],z[m]\n1,2,3\n", 1, "the header gives m, the scene's length is mm"},
		{"other order", "y,x,z\n1,2,3\n", 1, `column 1 is called "y"`},
		{"header of four", "x,y,z,w\n1,2,3\n", 1, "a header of 4 columns"},
		{"nan", "nan,0,0\n", 1, "x is not a finite decimal number"},
		{"infinity", "0,inf,0\n", 1, "y is not a finite decimal number"},
		{"overflow", "0,0,1e999\n", 1, "z is not a finite decimal number"},
		{"hexadecimal", "0,0,0x1p3\n", 1, "z is not a finite decimal number"},
		{"underscore", "1_000,0,0\n", 1, "x is not a finite decimal number"},
		{"text behind", "1,2,3 # here\n", 1, "z is not a finite decimal number"},
		{"lone cr", "1,2,3\r4,5,6\n", 1, "a line end of CR alone"},
		{"zero byte", "1,2,3\x00\n", 1, "z is not a finite decimal number"},
		{"binary", "\xff\xfe1\x00,\x00", 1, "a row has three numbers"},
	} {
		points, line, bad := parsePoints([]byte(c.text), "mm")
		if bad == nil || line != c.line || !strings.Contains(bad.problem, c.want) || bad.remedy == "" {
			t.Errorf("%s: got %v, line %d, %+v; want line %d, %s", c.name, points, line, bad, c.line, c.want)
		}
	}
}
