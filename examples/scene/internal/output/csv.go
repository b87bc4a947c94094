package output

import (
	"bufio"
	"encoding/csv"
	"io"
	"strconv"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"gonum.org/v1/gonum/spatial/r3"
)

// Table writes the records of one request as CSV.
type Table struct {
	setup *solve.Setup
	w     *bufio.Writer
	row   []byte
}

// NewTable returns a table, its metadata and header written.
func NewTable(setup *solve.Setup, q *scenefile.Request, w io.Writer) *Table {
	t := &Table{setup: setup, w: bufio.NewWriterSize(w, 1<<16)}
	t.w.WriteString(metadata(setup, q))
	header := "x[m],y[m],z[m]"
	if setup.Electric {
		header += ",V[V],Ex[V/m],Ey[V/m],Ez[V/m],Dx[C/m^2],Dy[C/m^2],Dz[C/m^2]"
	}
	if setup.Magnetic {
		header += ",Vm[A],Hx[A/m],Hy[A/m],Hz[A/m],Bx[T],By[T],Bz[T]"
	}
	if setup.Guiding {
		header += ",Ax[T*m],Ay[T*m],Az[T*m]"
	}
	t.w.WriteString(header + ",inside,status\n")
	return t
}

// metadata returns the comment lines before the header.
func metadata(setup *solve.Setup, q *scenefile.Request) string {
	text := ""
	meta := func(key, value string) {
		if value != "" {
			text += "# " + key + ": " + scenefile.OneLine(value) + "\n"
		}
	}
	meta("scene", setup.Scene.Title)
	meta("request", q.Kind)
	meta("name", q.Name)
	meta("side", string(q.Side))
	meta("units", "SI, lengths in m, frame of the scene; an empty field does not exist, see status")
	meta("constants", string(constants()))
	return text
}

// Record writes one row.
func (t *Table) Record(rec *solve.Record) error {
	t.row = t.row[:0]
	t.vector(rec.X)
	if t.setup.Electric {
		t.number(rec.Electric.V)
		t.vector(rec.Electric.E)
		t.vector(rec.Electric.D)
	}
	if t.setup.Magnetic {
		t.number(rec.Magnetic.Vm)
		t.vector(rec.Magnetic.H)
		t.vector(rec.Magnetic.B)
	}
	if t.setup.Guiding {
		t.vector(rec.Guide.A)
	}
	if rec.Inside >= 0 {
		t.row = append(t.row, field1(t.setup.Parts[rec.Inside].Name)...)
	}
	t.row = append(t.row, ',')
	state := rec.State()
	t.row = append(t.row, state...)
	for i, name := range rec.Missed {
		switch {
		case i > 0:
			t.row = append(t.row, ' ')
		case state != "":
			t.row = append(t.row, "; accuracy missed: "...)
		default:
			t.row = append(t.row, "accuracy missed: "...)
		}
		t.row = append(t.row, name...)
	}
	t.row = append(t.row, '\n')
	_, err := t.w.Write(t.row)
	return err
}

// Flush writes out what is still held; it returns the first error of all writes.
func (t *Table) Flush() error { return t.w.Flush() }

func (t *Table) number(v float64) { t.row = append(appendNumber(t.row, v, ""), ',') }

// vector writes three components, none where the vector does not exist.
func (t *Table) vector(v r3.Vec) {
	if solve.MissingVec(v) {
		t.row = append(t.row, ",,,"...)
		return
	}
	t.number(v.X)
	t.number(v.Y)
	t.number(v.Z)
}

// field1 quotes a name for CSV where it needs it (RFC 4180).
func field1(name string) string {
	if !strings.ContainsAny(name, ",\"\r\n#") && strconv.CanBackquote(name) {
		return name
	}
	var b strings.Builder
	w := csv.NewWriter(&b)
	if err := w.Write([]string{name}); err != nil { // a Builder does not fail
		return ""
	}
	w.Flush()
	return strings.TrimSuffix(b.String(), "\n")
}
