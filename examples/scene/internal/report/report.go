// Package report writes what a scene gave for people, in the units of the trade and with the digits that inputs deserve.
package report

import (
	"bytes"
	"fmt"
	"io"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// Report gathers the sections while the answers come in, and prints them in the reader's order.
type Report struct {
	setup   *solve.Setup
	files   bool // data files are written
	charges bytes.Buffer
	sums    bytes.Buffer
	fields  bytes.Buffer

	forces, readings, travels bytes.Buffer

	checks []check
	short  []string // values that did not reach the wanted accuracy
	shorts int      // points with such values
}

// check is a hand check with the name of its request.
type check struct {
	solve.Check
	what string
}

// New returns an empty report; files tells whether data files are written beside it.
func New(setup *solve.Setup, files bool) *Report { return &Report{setup: setup, files: files} }

// titleOf returns the name of a request, or its kind in words.
func titleOf(q *scenefile.Request) string {
	if q.Name != "" {
		return scenefile.OneLine(q.Name)
	}
	return strings.ReplaceAll(q.Kind, "_", " ")
}

// Print writes the report.
func (r *Report) Print(w io.Writer, cautions []string) {
	s := r.setup
	if t := s.Scene.Title; t != "" {
		fmt.Fprintf(w, "%s\n\n", scenefile.OneLine(t))
	}
	section := func(name string, body *bytes.Buffer) {
		if body.Len() > 0 {
			fmt.Fprintf(w, "%s\n%s\n", name, body.String())
		}
	}
	section("What each face carries", &r.charges)
	section("Sums that must vanish", &r.sums)
	section("Field where asked", &r.fields)
	section("Force and torque", &r.forces)
	section("Read, linked and reached", &r.readings)
	section("Along the way", &r.travels)
	r.printChecks(w)
	list := func(name string, lines []string) {
		if len(lines) == 0 {
			return
		}
		fmt.Fprintln(w, name)
		for _, l := range lines {
			wrapped(w, "- ", scenefile.OneLine(l))
		}
		fmt.Fprintln(w)
	}
	list("Accuracy not reached", r.unreached())
	list("Not written", r.skipped())
	list("Warnings", s.Warnings)
	list("Not included", s.LeftOut())
	list("Cautions", cautions)
}

// skipped names the outputs that this release does not write.
func (r *Report) skipped() []string {
	var out []string
	for _, s := range r.setup.Scene.Skipped {
		out = append(out, fmt.Sprintf("%s (%s asked for at %s): this release does not write it.", s.File, s.Key, s.Pointer))
	}
	return out
}

// mostShort is how many points that missed the accuracy are named.
const mostShort = 10

// miss notes what did not reach the wanted accuracy.
func (r *Report) miss(what string) {
	r.shorts++
	if r.shorts <= mostShort {
		r.short = append(r.short, what)
	}
}

// unreached names what did not reach the wanted accuracy.
func (r *Report) unreached() []string {
	if r.shorts == 0 {
		return nil
	}
	out := []string{fmt.Sprintf("Wanted: %s of each value. The error estimates are above that for the following; results.json holds them.",
		plain(r.setup.Scene.Accuracy))}
	out = append(out, r.short...)
	if more := r.shorts - mostShort; more > 0 {
		out = append(out, fmt.Sprintf("and %d more.", more))
	}
	return out
}
