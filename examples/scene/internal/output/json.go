// Package output writes what a scene gave: results.json and CSV, in SI, every number in the shortest form that reads back
// to the same float64. A file appears whole under its name or not at all.
package output

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"strconv"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Results writes the answers of a scene as JSON, one after the other.
type Results struct {
	setup *solve.Setup
	w     *bufio.Writer
	buf   []byte
	count int // answers so far

	nested []nesting
}

// NewResults returns a writer of answers; Head and Tail make a document of them.
func NewResults(setup *solve.Setup, w io.Writer) *Results {
	return &Results{setup: setup, w: bufio.NewWriterSize(w, 1<<16)}
}

// Head writes the beginning of the document, up to the answers.
func Head(w io.Writer, scene *scenefile.Scene, cautions, warnings []string) error {
	fields := []struct {
		key   string
		value any
	}{
		{"version", 1},
		{"title", scene.Title},
		{"constants", json.RawMessage(constants())},
		{"cautions", list(cautions)},
		{"warnings", list(warnings)},
	}
	if _, err := io.WriteString(w, "{\n"); err != nil {
		return err
	}
	for _, f := range fields {
		text, isText := f.value.(json.RawMessage)
		if !isText {
			var err error
			if text, err = marshal(f.value); err != nil {
				return err
			}
		}
		if _, err := fmt.Fprintf(w, " %q: %s,\n", f.key, text); err != nil {
			return err
		}
	}
	_, err := io.WriteString(w, " \"answers\": [")
	return err
}

// constants writes the constants of the models.
func constants() []byte {
	b := appendNumber([]byte(`{"epsilon0": `), charge.Epsilon0, "null")
	return append(appendNumber(append(b, `, "mu0": `...), magnet.Mu0, "null"), '}')
}

// Tail writes the end of the document.
func Tail(w io.Writer) error {
	_, err := io.WriteString(w, "\n ]\n}\n")
	return err
}

func list(a []string) []string {
	if a == nil {
		return []string{}
	}
	return a
}

// Open begins the answer to a request.
func (r *Results) Open(q *scenefile.Request) {
	if r.count > 0 {
		r.buf = append(r.buf, ',')
	}
	r.count++
	r.buf = append(r.buf, "\n  {\"request\": "...)
	r.text(q.Kind)
	if q.Name != "" {
		r.key("name")
		r.text(q.Name)
	}
}

// Close ends the answer, with the outcome of its hand checks.
func (r *Results) Close(checks []solve.Check) error {
	if len(checks) > 0 {
		r.key("checks")
		r.buf = append(r.buf, '[')
		for i := range checks {
			r.comma(i)
			r.check(&checks[i])
		}
		r.buf = append(r.buf, ']')
	}
	r.buf = append(r.buf, '}')
	return r.drain(0)
}

// Flush writes out what is still held.
func (r *Results) Flush() error {
	if err := r.drain(0); err != nil {
		return err
	}
	return r.w.Flush()
}

// drain hands the buffer on once it is longer than limit.
func (r *Results) drain(limit int) error {
	if len(r.buf) <= limit {
		return nil
	}
	_, err := r.w.Write(r.buf)
	r.buf = r.buf[:0]
	return err
}

func (r *Results) check(c *solve.Check) {
	r.buf = append(r.buf, "{\"quantity\": "...)
	r.text(c.Quantity)
	r.key("at")
	r.buf = strconv.AppendInt(r.buf, int64(c.At), 10)
	r.key("hand")
	r.numbers(c.Hand)
	r.key("value")
	r.numbers(c.Value)
	r.key("difference")
	r.number(c.Difference)
	r.key("within")
	r.number(c.Within)
	r.key("formula")
	r.text(c.Formula)
	r.key("ok")
	r.buf = strconv.AppendBool(r.buf, c.OK)
	r.buf = append(r.buf, '}')
}

// Charges writes what every part carries.
func (r *Results) Charges(all []solve.PartCharge) error {
	r.key("parts")
	r.buf = append(r.buf, '[')
	for i := range all {
		r.comma(i)
		r.part(&all[i])
		if err := r.drain(1 << 15); err != nil {
			return err
		}
	}
	r.buf = append(r.buf, ']')
	return nil
}

func (r *Results) part(c *solve.PartCharge) {
	p := &r.setup.Parts[c.Part]
	r.buf = append(r.buf, "\n   {\"part\": "...)
	r.text(p.Name)
	r.key("kind")
	if p.Kind == solve.Inert {
		r.buf = append(r.buf, "null"...)
	} else {
		r.text(string(p.Kind))
	}
	r.key("volume")
	r.number(c.Volume)
	r.key("faces")
	r.buf = append(r.buf, '[')
	for i := range c.Faces {
		r.comma(i)
		f := &c.Faces[i]
		r.buf = append(r.buf, "{\"face\": "...)
		r.text(f.Face)
		r.key("area")
		r.number(f.Area)
		if f.Normal != nil {
			r.key("normal")
			r.vec(*f.Normal)
		}
		r.key("charge")
		r.number(f.Charge)
		r.key("density")
		r.extremes(f.Min, f.Max)
		r.buf = append(r.buf, '}')
	}
	r.buf = append(r.buf, ']')
	r.key("volume_charge")
	r.number(c.Inside)
	r.key("volume_density")
	r.extremes(c.Min, c.Max)
	r.key("total_charge")
	r.number(c.Total)
	r.key("moment")
	r.vec(c.Moment)
	r.buf = append(r.buf, '}')
}

func (r *Results) extremes(lo, hi float64) {
	r.buf = append(r.buf, "{\"min\": "...)
	r.number(lo)
	r.key("max")
	r.number(hi)
	r.buf = append(r.buf, '}')
}

// OpenRecords begins the list of records.
func (r *Results) OpenRecords() {
	r.key("records")
	r.buf = append(r.buf, '[')
}

// CloseRecords ends it.
func (r *Results) CloseRecords() { r.buf = append(r.buf, ']') }

// Record writes record i of a request.
func (r *Results) Record(i int, rec *solve.Record) error {
	r.comma(i)
	r.buf = append(r.buf, "\n   {\"x\": "...)
	r.vec(rec.X)
	r.key("inside")
	r.inside(rec.Inside)
	s := r.setup
	if s.Electric {
		r.key("V")
		r.number(rec.Electric.V)
		r.key("E")
		r.vec(rec.Electric.E)
		r.key("D")
		r.vec(rec.Electric.D)
	}
	if s.Magnetic {
		r.key("Vm")
		r.number(rec.Magnetic.Vm)
		r.key("H")
		r.vec(rec.Magnetic.H)
		r.key("B")
		r.vec(rec.Magnetic.B)
	}
	if s.Guiding {
		r.key("A")
		r.vec(rec.Guide.A)
	}
	if rec.Gradient != nil {
		r.gradient(rec.Gradient)
	}
	r.estimates(rec)
	if state := rec.State(); state != "" {
		r.key("status")
		r.text(state)
	}
	if len(rec.Missed) > 0 {
		r.key("accuracy_missed")
		r.buf = append(r.buf, '[')
		for k, name := range rec.Missed {
			r.comma(k)
			r.text(name)
		}
		r.buf = append(r.buf, ']')
	}
	if rec.ByPart != nil {
		r.byPart(rec.ByPart)
	}
	r.buf = append(r.buf, '}')
	return r.drain(1 << 15)
}

// gradient writes the gradients, row i that of component i.
func (r *Results) gradient(g *solve.Gradient) {
	r.key("gradient")
	r.buf = append(r.buf, '{')
	if r.setup.Electric {
		r.buf = append(r.buf, "\"E\": "...)
		r.tensor(g.E)
	}
	if r.setup.Magnetic {
		if r.setup.Electric {
			r.buf = append(r.buf, ", "...)
		}
		r.buf = append(r.buf, "\"B\": "...)
		r.tensor(g.B)
	}
	r.buf = append(r.buf, '}')
}

// tensor writes three rows, null as a whole if it does not exist.
func (r *Results) tensor(t *solve.Tensor) {
	if t == nil {
		r.buf = append(r.buf, "null"...)
		return
	}
	r.buf = append(r.buf, '[')
	for i, row := range t {
		r.comma(i)
		r.vec(r3.Vec{X: row[0], Y: row[1], Z: row[2]})
	}
	r.buf = append(r.buf, ']')
}

// estimates writes the bounds on the numerical error.
func (r *Results) estimates(rec *solve.Record) {
	r.key("error_estimate")
	r.buf = append(r.buf, '{')
	sep := ""
	put := func(key string, v float64) {
		r.buf = append(append(append(append(r.buf, sep...), '"'), key...), "\": "...)
		r.number(v)
		sep = ", "
	}
	if r.setup.Electric {
		put("V", rec.Electric.ErrV)
		put("E", rec.Electric.ErrE)
	}
	if r.setup.Magnetic {
		put("Vm", rec.Magnetic.ErrVm)
		put("H", rec.Magnetic.ErrH)
	}
	if r.setup.Guiding {
		put("A", rec.Guide.ErrA)
	}
	r.buf = append(r.buf, '}')
}

func (r *Results) byPart(all []solve.Contribution) {
	r.key("by_part")
	r.buf = append(r.buf, '[')
	for i := range all {
		r.comma(i)
		c := &all[i]
		r.buf = append(r.buf, "{\"part\": "...)
		r.text(r.setup.Parts[c.Part].Name)
		switch r.setup.Parts[c.Part].Kind {
		case solve.Polarized, solve.Charged:
			r.key("V")
			r.number(c.V)
			r.key("E")
			r.vec(c.E)
			r.key("D")
			r.vec(c.D)
		case solve.Magnetized:
			r.key("Vm")
			r.number(c.Vm)
			r.key("H")
			r.vec(c.H)
			r.key("B")
			r.vec(c.B)
		case solve.Circulating:
			r.key("A")
			r.vec(c.A)
		}
		r.buf = append(r.buf, '}')
	}
	r.buf = append(r.buf, ']')
}

func (r *Results) inside(part int) {
	if part < 0 {
		r.buf = append(r.buf, "null"...)
		return
	}
	r.text(r.setup.Parts[part].Name)
}

func (r *Results) key(name string) {
	r.buf = append(append(append(r.buf, ", \""...), name...), "\": "...)
}

func (r *Results) comma(i int) {
	if i > 0 {
		r.buf = append(r.buf, ", "...)
	}
}

func (r *Results) text(s string) {
	quoted, err := marshal(s)
	if err != nil { // strings always marshal
		quoted = []byte(`""`)
	}
	r.buf = append(r.buf, quoted...)
}

// marshal is json.Marshal that leaves <, > and & as they are.
func marshal(v any) ([]byte, error) {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	err := e.Encode(v)
	return bytes.TrimSuffix(b.Bytes(), []byte("\n")), err
}

// number writes v, null if it does not exist.
func (r *Results) number(v float64) { r.buf = appendNumber(r.buf, v, "null") }

func (r *Results) numbers(v []float64) {
	if len(v) == 1 {
		r.number(v[0])
		return
	}
	r.vec(r3.Vec{X: v[0], Y: v[1], Z: v[2]})
}

// vec writes a vector, null as a whole if it does not exist.
func (r *Results) vec(v r3.Vec) {
	if solve.MissingVec(v) {
		r.buf = append(r.buf, "null"...)
		return
	}
	r.buf = append(r.buf, '[')
	r.number(v.X)
	r.buf = append(r.buf, ", "...)
	r.number(v.Y)
	r.buf = append(r.buf, ", "...)
	r.number(v.Z)
	r.buf = append(r.buf, ']')
}
