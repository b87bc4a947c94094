package main

import (
	"example.com/boundpole/examples/scene/internal/output"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// travel answers the requests of a travel at every position.
func (r *runner) travel(q *scenefile.Request) error {
	t := q.Travel
	var table *output.Way
	if r.folder != nil && q.CSV != "" {
		file, err := r.folder.Create(q.CSV)
		if err != nil {
			return err
		}
		table = output.NewWay(r.setup, q, file)
	}
	see, end := r.report.Travel(q)
	for k := range t.Count {
		at, err := r.setup.At(t, k)
		if err != nil {
			return err
		}
		if err := at.Setup.Respond(r.ctx); err != nil {
			return err
		}
		if r.results != nil {
			r.results.OpenPosition(k, &at, t.Rotation != nil)
		}
		what, err := r.position(q, &at)
		if err != nil {
			return err
		}
		see(&at, what)
		if table != nil {
			table.Position(k, &at, t.Rotation != nil, what)
		}
		if r.results != nil {
			if err := r.results.ClosePosition(k == t.Count-1); err != nil {
				return err
			}
		}
	}
	end()
	if table != nil {
		return table.Flush()
	}
	return nil
}

// position answers the requests of a travel at one position.
func (r *runner) position(q *scenefile.Request, at *solve.Position) ([]solve.Moved, error) {
	there := *r
	there.setup = at.Setup
	var what []solve.Moved
	for i := range q.Travel.Ask {
		ask := &q.Travel.Ask[i]
		if r.results != nil {
			r.results.Open(ask)
		}
		one := solve.Moved{Request: ask}
		var checks []solve.Check
		var err error
		switch ask.Kind {
		case "charges":
			charges := at.Setup.Charges()
			for h := range ask.Hand {
				checks = append(checks, at.Setup.CheckCharge(&ask.Hand[h], charges))
			}
			if r.results != nil {
				err = r.results.Charges(charges)
			}
		case "reading", "linkage", "force", "energy", "reach":
			if one.Answer, err = there.answer(ask); err == nil {
				for h := range ask.Hand {
					checks = append(checks, solve.CheckAnswer(&ask.Hand[h], one.Answer))
				}
			}
		default:
			checks, err = there.points(ask, func(i int, rec *solve.Record) {
				if i == 0 {
					first := *rec
					one.First = &first
				}
			})
		}
		if err != nil {
			return nil, err
		}
		for _, c := range checks {
			there.missed = there.missed || !c.OK
		}
		r.report.Checks(ask, checks)
		if r.results != nil {
			if err := r.results.Close(checks); err != nil {
				return nil, err
			}
		}
		what = append(what, one)
	}
	r.missed, r.watch = there.missed, there.watch
	return what, nil
}
