package output

import (
	"strconv"

	"example.com/boundpole/examples/scene/internal/solve"
	"gonum.org/v1/gonum/spatial/r3"
)

// Answer writes what a request gives that is not for points: its quantities, their estimates together, and the status. One
// estimate stands alone, several by their names.
func (r *Results) Answer(a *solve.Answer) {
	var estimated []*solve.Quantity
	for i := range a.Quantities {
		q := &a.Quantities[i]
		r.key(q.Name)
		switch {
		case q.Value == nil:
			r.text(q.Text)
		default:
			r.numbers(q.Value)
		}
		if q.Estimate != nil {
			estimated = append(estimated, q)
		}
	}
	r.errorEstimate(estimated)
	if a.Status != "" {
		r.key("status")
		r.text(a.Status)
	}
	if a.Missed {
		r.key("accuracy_missed")
		r.buf = append(r.buf, "true"...)
	}
}

func (r *Results) errorEstimate(of []*solve.Quantity) {
	if len(of) == 0 {
		return
	}
	r.key("error_estimate")
	same := true
	for _, q := range of {
		same = same && *q.Estimate == *of[0].Estimate
	}
	if len(of) == 1 || same && len(of[0].Value) == 1 {
		r.number(*of[0].Estimate)
		return
	}
	r.buf = append(r.buf, '{')
	for i, q := range of {
		r.comma(i)
		r.text(q.Name)
		r.buf = append(r.buf, ": "...)
		r.number(*q.Estimate)
	}
	r.buf = append(r.buf, '}')
}

// OpenPosition begins position k of a travel; its answers follow.
func (r *Results) OpenPosition(k int, at *solve.Position, turned bool) {
	if k == 0 {
		r.key("positions")
		r.buf = append(r.buf, '[')
	} else {
		r.buf = append(r.buf, ',')
	}
	r.buf = append(r.buf, "\n   {"...)
	if turned {
		r.buf = append(r.buf, "\"degrees\": "...)
		r.number(at.Degrees)
	} else {
		r.buf = append(r.buf, "\"shift\": "...)
		r.vec(r3.Add(at.Shift, r3.Vec{})) // no negative zeros
	}
	r.key("answers")
	r.buf = append(r.buf, '[')
	r.nested, r.count, r.setup = append(r.nested, nesting{r.count, r.setup}), 0, at.Setup
}

// ClosePosition ends it; the travel ends with the last.
func (r *Results) ClosePosition(last bool) error {
	n := len(r.nested) - 1
	r.count, r.setup = r.nested[n].count, r.nested[n].setup
	r.nested = r.nested[:n]
	r.buf = append(r.buf, "]}"...)
	if last {
		r.buf = append(r.buf, ']')
	}
	return r.drain(1 << 15)
}

// nesting is what answers within an answer hide.
type nesting struct {
	count int
	setup *solve.Setup
}

// Whole writes a whole number under a key.
func (r *Results) Whole(key string, n int) {
	r.key(key)
	r.buf = strconv.AppendInt(r.buf, int64(n), 10)
}

// Text writes a text under a key.
func (r *Results) Text(key, text string) {
	r.key(key)
	r.text(text)
}
