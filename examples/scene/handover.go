package main

import (
	"io"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
)

// handOver writes the equivalent charges for another simulator.
func (r *runner) handOver(q *scenefile.Request) error {
	set, err := r.setup.HandOver(q.Charge)
	if err != nil {
		return err
	}
	if r.folder != nil {
		file, err := r.folder.Create(q.HandOver)
		if err != nil {
			return err
		}
		write := set.WriteJSON
		if strings.HasSuffix(q.HandOver, ".csv") {
			write = set.WriteCSV
		}
		if err := write(struct{ io.Writer }{file}); err != nil {
			return err
		}
	}
	if r.results != nil {
		r.results.Text("file", q.HandOver)
		r.results.Text("kind", q.Charge)
	}
	r.report.HandOver(q, set, r.folder != nil)
	return nil
}
