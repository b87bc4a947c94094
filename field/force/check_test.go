package force

import (
	"context"
	"flag"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

var checks = flag.Int("checks", 5, "how many random pairs of bodies are compared by virtual work and stress")

// TestCheck compares three ways that share no integral in random pairs that do not touch.
//
//	go test ./field/force -run TestCheck -checks 1000 -timeout 2h
func TestCheck(t *testing.T) {
	open, work := 0, 0
	for seed := uint64(2000); open < *checks; seed++ {
		d := draw{rand.New(rand.NewPCG(seed, 7))}
		c, err := d.pair()
		if err != nil {
			t.Fatal(err)
		}
		space := gap(c.a.Bounds(), c.b.Bounds())
		if c.contact || space > 5 || cost(c.a) > 10 || cost(c.b) > 10 {
			continue
		}
		open++
		got, err := Check(context.Background(), c.a, c.b, &Settings{Accuracy: 1e-9, About: d.vec(), MaxNodes: 200_000})
		if err != nil {
			t.Fatal(c.name, err)
		}
		if !got.Agrees() {
			t.Errorf("seed %d %s: direct %v +- %.3g %v +- %.3g, work %+v, stress %+v", seed, c.name, got.Direct.Force, got.Direct.Error.Force,
				got.Direct.Torque, got.Direct.Error.Torque, got.Work, got.Stress)
		}
		f := r3.Norm(got.Direct.Force)
		if got.Stress.ForceError > 1e-6*f || got.Direct.Error.Force > 1e-8*f { // asked for 1e-9, with at most 200 000 nodes
			t.Errorf("seed %d %s: estimates %.3g and %.3g of |F|, want below 1e-8 and 1e-6", seed, c.name, got.Direct.Error.Force/f, got.Stress.ForceError/f)
		}
		if got.Work.ForceError < 1e-5*f { // differences of energies over a fifth of the gap, four of them extrapolated
			work++
		}
		if testing.Verbose() {
			t.Logf("%s: |F| %.3g direct %.2g, work %.2g, stress %.2g; spread %.2g", c.name, f, got.Direct.Error.Force/f, got.Work.ForceError/f, got.Stress.ForceError/f, got.Spread.Force/f)
		}
	}
	if work < *checks*4/5 {
		t.Errorf("virtual work was good to 1e-5 in %d of %d pairs, want four of five", work, open)
	}
}
