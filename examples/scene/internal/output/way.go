package output

import (
	"bufio"
	"io"
	"strconv"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// Way writes the positions of a travel as CSV, one row each.
type Way struct {
	w    *bufio.Writer
	head string
}

// units are the SI units of what columns hold, by the ladder on which people read it.
var units = map[string]string{"B": "T", "E": "V/m", "A": "T*m", "F": "N", "T": "N*m", "W": "J", "L": "m", "Wb": "Wb"}

// NewWay returns a table with its metadata written; the header follows with the first position, which knows the columns.
func NewWay(setup *solve.Setup, q *scenefile.Request, w io.Writer) *Way {
	t := &Way{w: bufio.NewWriter(w)}
	t.w.WriteString(metadata(setup, q))
	t.head = "position,shift_x[m],shift_y[m],shift_z[m]"
	if q.Travel.Rotation != nil {
		t.head = "position,rotation[deg]"
	}
	return t
}

// Position writes row k.
func (t *Way) Position(k int, at *solve.Position, turned bool, what []solve.Moved) {
	row := appendNumber([]byte(strconv.Itoa(k)+","), at.Degrees, "")
	if !turned {
		row = append(strconv.AppendInt(nil, int64(k), 10), ',')
		row = appendNumber(append(appendNumber(append(appendNumber(row, at.Shift.X, ""), ','), at.Shift.Y, ""), ','), at.Shift.Z, "")
	}
	head := t.head
	put := func(name, ladder string, v ...float64) {
		names := []string{""}
		if len(v) == 3 {
			names = []string{"_x", "_y", "_z"}
		}
		for i, x := range v {
			head += "," + field1(strings.ReplaceAll(name, " ", "_")+names[i]+"["+units[ladder]+"]")
			row = appendNumber(append(row, ','), x, "")
		}
	}
	for i := range what {
		what[i].Columns(at.Setup, put)
	}
	if k == 0 {
		t.w.WriteString(head + "\n")
	}
	t.w.Write(append(row, '\n')) // the writer keeps the first error for Flush
}

// Flush writes out what is still held; it returns the first error of all writes.
func (t *Way) Flush() error { return t.w.Flush() }
