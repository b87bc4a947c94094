package scenefile

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"

	"gonum.org/v1/gonum/spatial/r3"
)

// readPoints reads a file of points from the scene's folder.
func (d *decoder) readPoints(name string) ([]r3.Vec, *fault) {
	data, missing := d.readInput(name, "a file of rows x,y,z")
	if missing != nil {
		return nil, missing
	}
	points, line, bad := parsePoints(data, d.scene.Length)
	if bad != nil {
		at := name
		if line > 0 {
			at = fmt.Sprintf("%s:%d", name, line)
		}
		return nil, &fault{at + ": " + bad.problem, bad.remedy}
	}
	return points, nil
}

// parsePoints reads rows x,y,z with # comments, empty lines and one optional
// header line before the first row. A fault comes with its line number.
func parsePoints(data []byte, unit Unit) (points []r3.Vec, line int, bad *fault) {
	data = bytes.TrimPrefix(data, []byte("\xef\xbb\xbf"))
	header := false
	for len(data) > 0 {
		var row []byte
		row, data, _ = bytes.Cut(data, []byte{'\n'})
		line++
		row = bytes.Trim(bytes.TrimSuffix(row, []byte{'\r'}), " \t")
		if len(row) == 0 || row[0] == '#' {
			continue
		}
		v, ok := parseRow(row)
		switch {
		case ok && len(points) == MaxPoints:
			return nil, line, &fault{fmt.Sprintf("more than %d points", MaxPoints), "ask for fewer, or split the file"}
		case ok:
			points = append(points, v)
		case !header && len(points) == 0 && isHeader(row):
			header = true
			if bad := headerFault(row, unit); bad != nil {
				return nil, line, bad
			}
		default:
			return nil, line, rowFault(row)
		}
	}
	if len(points) == 0 {
		return nil, 0, &fault{"no points", "write rows x,y,z"}
	}
	return points, 0, nil
}

// parseRow parses three decimal numbers separated by commas.
func parseRow(row []byte) (v r3.Vec, ok bool) {
	var xyz [3]float64
	for i := range xyz {
		field, rest, more := bytes.Cut(row, []byte{','})
		if more != (i < 2) {
			return v, false
		}
		if xyz[i], ok = decimal(bytes.Trim(field, " \t")); !ok {
			return v, false
		}
		row = rest
	}
	return r3.Vec{X: xyz[0], Y: xyz[1], Z: xyz[2]}, true
}

// decimal parses a finite decimal number: no hexadecimal, no words.
func decimal(field []byte) (float64, bool) {
	for _, c := range field {
		if !numberByte(c) {
			return 0, false
		}
	}
	v, err := strconv.ParseFloat(string(field), 64)
	return v, err == nil && !math.IsInf(v, 0)
}

// isHeader reports whether a row is a header: fields that start with a letter or
// a quote, and are no words for numbers.
func isHeader(row []byte) bool {
	if !utf8.Valid(row) {
		return false
	}
	for field := range strings.SplitSeq(string(row), ",") {
		field = strings.ToLower(strings.Trim(field, " \t\"'"))
		if field == "" || field[0] < 'a' || field[0] > 'z' || strings.HasPrefix(field, "nan") || strings.HasPrefix(field, "inf") {
			return false
		}
	}
	return true
}

// headerFault refuses a header that names another unit than the scene's, or
// other columns than x, y, z.
func headerFault(row []byte, unit Unit) *fault {
	fields := strings.Split(string(row), ",")
	if len(fields) != 3 {
		return &fault{fmt.Sprintf("a header of %d columns (got %q)", len(fields), shorten(string(row))), "the columns are x,y,z"}
	}
	for i, field := range fields {
		name, rest, _ := strings.Cut(strings.Trim(field, " \t\"'"), "[")
		rest, _, _ = strings.Cut(rest, "]")
		if other := Unit(strings.TrimSpace(rest)); other != "" && other != unit {
			return &fault{fmt.Sprintf("the header gives %s, the scene's length is %s", shorten(string(other)), unit), "convert the rows to the unit of the scene and correct the header"}
		}
		if name = strings.ToLower(strings.TrimSpace(name)); len(name) == 1 && name != "xyz"[i:i+1] {
			return &fault{fmt.Sprintf("column %d is called %q", i+1, name), "the columns are x,y,z"}
		}
	}
	return nil
}

// rowFault says why a row is no point.
func rowFault(row []byte) *fault {
	text := string(bytes.ToValidUTF8(row, []byte("?")))
	fields := strings.Split(text, ",")
	got := fmt.Sprintf(" (got %q)", shorten(text))
	switch {
	case bytes.IndexByte(row, '\r') >= 0:
		return &fault{"a line end of CR alone" + got, "end lines with LF or CRLF"}
	case strings.Contains(text, ";") && strings.Contains(text, ","), len(fields) > 3 && len(fields) <= 6 && allDigits(fields):
		return &fault{"a decimal comma" + got, "write decimal points and separate the numbers by commas: 1.5,0,-2"}
	case strings.Contains(text, ";"):
		return &fault{"numbers separated by semicolons" + got, "separate them by commas: 1.5,0,-2"}
	case len(fields) != 3:
		return &fault{fmt.Sprintf("a row has three numbers, not %d fields", len(fields)) + got, "write x,y,z"}
	}
	for i, f := range fields {
		if _, ok := decimal([]byte(strings.Trim(f, " \t"))); !ok {
			return &fault{fmt.Sprintf("%s is not a finite decimal number (got %q)", "xyz"[i:i+1], shorten(strings.Trim(f, " \t"))), "write x,y,z as in 1.5,0,-2e-3"}
		}
	}
	return nil
}

// allDigits reports whether all fields are whole numbers.
func allDigits(fields []string) bool {
	for _, f := range fields {
		if _, err := strconv.Atoi(strings.Trim(f, " \t")); err != nil {
			return false
		}
	}
	return true
}
