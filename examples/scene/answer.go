package main

import (
	"bytes"
	"context"
	"io"

	"example.com/boundpole/examples/scene/internal/output"
	"example.com/boundpole/examples/scene/internal/report"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// mostRecords is how many records of a request go into results.json where a data file holds them all.
const mostRecords = 20_000

// answer does what the scene wants: the report on w, and files in the folder dir unless that is empty. Files get their
// names last, when all is computed and the report is out.
func answer(ctx context.Context, setup *solve.Setup, dir string, w io.Writer) (status int, err error) {
	r := &runner{ctx: ctx, setup: setup, report: report.New(setup, dir != "")}
	if dir != "" {
		if r.folder, err = output.OpenFolder(dir); err != nil {
			return wrong, err
		}
		defer r.folder.Discard()
		if r.answers, err = r.folder.Create(""); err != nil {
			return wrong, err
		}
		r.results = output.NewResults(setup, r.answers)
	}
	if err := setup.Respond(ctx); err != nil {
		return wrong, err
	}
	charges := setup.Charges()
	r.report.Charges(charges)
	for i := range setup.Scene.Wanted {
		if err := r.request(&setup.Scene.Wanted[i], charges); err != nil {
			return wrong, err
		}
	}
	cautions := setup.Cautions(r.watch)
	if r.folder != nil {
		if err := r.finish(cautions); err != nil {
			return wrong, err
		}
	}
	var text bytes.Buffer
	r.report.Print(&text, cautions)
	if err := printed(w, text.Bytes()); err != nil {
		return wrong, err
	}
	if r.folder != nil {
		if err := r.folder.Commit(); err != nil {
			return wrong, err
		}
	}
	if r.missed {
		return missed, nil
	}
	return done, nil
}

// runner answers requests one after the other.
type runner struct {
	ctx     context.Context
	setup   *solve.Setup
	report  *report.Report
	folder  *output.Folder // nil: no files
	answers *output.File
	results *output.Results
	watch   solve.Watch
	missed  bool
}

func (r *runner) request(q *scenefile.Request, charges []solve.PartCharge) error {
	if r.results != nil {
		r.results.Open(q)
	}
	var checks []solve.Check
	switch q.Kind {
	case "charges":
		for i := range q.Hand {
			checks = append(checks, r.setup.CheckCharge(&q.Hand[i], charges))
		}
		if r.results != nil {
			if err := r.results.Charges(charges); err != nil {
				return err
			}
		}
	case "travel":
		if err := r.travel(q); err != nil {
			return err
		}
	case "hand_over":
		if err := r.handOver(q); err != nil {
			return err
		}
	case "reading", "linkage", "force", "energy", "reach":
		a, err := r.answer(q)
		if err != nil {
			return err
		}
		for i := range q.Hand {
			checks = append(checks, solve.CheckAnswer(&q.Hand[i], a))
		}
		r.report.Answer(q, a)
	default:
		var err error
		see, end := r.report.Points(q)
		if checks, err = r.points(q, see); err != nil {
			return err
		}
		end()
	}
	for _, c := range checks {
		r.missed = r.missed || !c.OK
	}
	r.report.Checks(q, checks)
	if r.results == nil {
		return nil
	}
	return r.results.Close(checks)
}

// answer answers a request that is not for points.
func (r *runner) answer(q *scenefile.Request) (*solve.Answer, error) {
	a, err := r.setup.Answer(r.ctx, q)
	if err != nil {
		return nil, err
	}
	r.missed = r.missed || a.Missed
	r.watch.Reach = r.watch.Reach || q.Kind == "reach"
	if r.results != nil {
		r.results.Answer(a)
	}
	return a, nil
}

// points answers a request at points: see, records and table take every point as it comes.
func (r *runner) points(q *scenefile.Request, see func(i int, rec *solve.Record)) ([]solve.Check, error) {
	var table *output.Table
	if r.folder != nil && q.CSV != "" {
		file, err := r.folder.Create(q.CSV)
		if err != nil {
			return nil, err
		}
		table = output.NewTable(r.setup, q, file)
	}
	records := r.results != nil && (table == nil || q.Count() <= mostRecords)
	if records {
		r.results.OpenRecords()
	}
	checks := make([]solve.Check, len(q.Hand))
	err := r.setup.Records(r.ctx, q, func(i int, rec *solve.Record) error {
		r.watch.See(rec, solve.SideOf(q.Side))
		r.missed = r.missed || len(rec.Missed) > 0
		see(i, rec)
		for k := range q.Hand {
			if q.Hand[k].At == i {
				checks[k] = solve.CheckRecord(&q.Hand[k], rec)
			}
		}
		if table != nil {
			if err := table.Record(rec); err != nil {
				return err
			}
		}
		if records {
			return r.results.Record(i, rec)
		}
		return nil
	})
	if err != nil {
		return nil, err
	}
	if records {
		r.results.CloseRecords()
	}
	if table != nil {
		return checks, table.Flush()
	}
	return checks, nil
}

// finish puts the answers between head and tail, and all files on the disk.
func (r *runner) finish(cautions []string) error {
	if err := r.results.Flush(); err != nil {
		return err
	}
	file, err := r.folder.Create("results.json")
	if err != nil {
		return err
	}
	body, err := r.answers.Rewind()
	if err != nil {
		return err
	}
	if err := output.Head(file, r.setup.Scene, cautions, r.setup.Warnings); err != nil {
		return err
	}
	if _, err := io.Copy(file, body); err != nil {
		return err
	}
	if err := output.Tail(file); err != nil {
		return err
	}
	return r.folder.Close()
}
