package report

import (
	"fmt"
	"io"
	"math"

	"example.com/boundpole/examples/scene/internal/solve"
)

// gradients prints the gradients, where they were asked for: one table for each kind of field.
func (l *listing) gradients(w io.Writer) {
	s := l.report.setup
	if s.Magnetic {
		l.tensors(w, "B", func(g *solve.Gradient) *solve.Tensor { return g.B })
	}
	if s.Electric {
		l.tensors(w, "E", func(g *solve.Gradient) *solve.Tensor { return g.E })
	}
}

// tensors prints the gradient of one field for every record, dBx/dx first.
func (l *listing) tensors(w io.Writer, name string, of func(g *solve.Gradient) *solve.Tensor) {
	var heads []string
	for _, c := range "xyz" {
		for _, by := range "xyz" {
			heads = append(heads, fmt.Sprintf("d%s%c/d%c", name, c, by))
		}
	}
	t := newTable(l.heads(append(heads, "<")...)...)
	for i := range l.records {
		rec := &l.records[i]
		t.add(append(l.at(rec), entries("g"+name, of(rec.Gradient))...)...)
	}
	t.print(w)
}

// entries prints the nine entries of a tensor in a common unit, and the unit.
func entries(quantity string, t *solve.Tensor) []string {
	cells := make([]string, 0, 10)
	if t == nil {
		for range 9 {
			cells = append(cells, "none")
		}
		return append(cells, "")
	}
	size := 0.0
	for _, row := range t {
		for _, v := range row {
			size = max(size, math.Abs(v))
		}
	}
	u := pick(quantity, size)
	for _, row := range t {
		for _, v := range row {
			cells = append(cells, fixed(v/u.factor, size/u.factor))
		}
	}
	if size == 0 {
		u.unit = ""
	}
	return append(cells, u.unit)
}
