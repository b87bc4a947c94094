package response

import (
	"context"
	"fmt"
	"math"
	"testing"
	"time"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestTry(t *testing.T) {
	run := func(name string, b geom.Body, g r3.Vec, set *Settings, want func(chi float64) float64, chis ...float64) {
		t0 := time.Now()
		s, err := Prepare(context.Background(), []geom.Body{b}, set)
		if err != nil {
			t.Fatal(err)
		}
		fmt.Println(name, s.Unknowns(), len(s.parts), time.Since(t0))
		for _, chi := range chis {
			r, err := s.Solve(context.Background(), []Material{{Chi: chi}}, Uniform{g})
			if err != nil {
				fmt.Println(chi, err)
				continue
			}
			var ms [3]float64
			for k := range ms {
				l := &s.levels[k]
				for i, q := range r.layers[k].charge {
					ms[k] += q * r3.Dot(g, l.x[i])
				}
			}
			w := math.NaN()
			if want != nil {
				w = want(chi)
			}
			fmt.Printf("chi %g: %.9g want %.9g rel %.1e %.1e %.1e leak %.1e steps %v res %.0e\n", chi, ms[2]/b.Volume(), w, ms[0]/b.Volume()/w-1, ms[1]/b.Volume()/w-1, ms[2]/b.Volume()/w-1, r.Report.Leak, r.Report.Steps, r.Report.Residual[2])
			t1 := time.Now()
			for i := range 5 {
				x := r3.Vec{X: 0.1 * float64(i), Y: 0.2, Z: 0.3}
				v := field.At(r, x, field.Mean, field.WantG|field.WantErr)
				fmt.Print("  ", v.G, " ", v.ErrG)
			}
			fmt.Println(time.Since(t1))
		}
	}
	z := r3.Vec{Z: 1}
	inf := math.Inf(1)
	run("sphere", geom.Sphere{Radius: 1}, z, nil, func(c float64) float64 {
		if math.IsInf(c, 1) {
			return 3
		}
		return 3 * c / (3 + c)
	}, -1, -0.5, 0.1, 10, 1000, inf)
	cube := map[float64]float64{inf: 3.644305190268, 9: 2.5112, 1: .76015, -0.9: -1.3647, -1: -1.6384, 999: 3.6288}
	for _, o := range []int{8, 10} {
		run("cube", geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, z, &Settings{Order: o}, func(c float64) float64 { return cube[c] }, -1, -.9, 1, 9, 999, inf)
	}
}
