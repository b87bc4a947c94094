package bound

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/optimize"
	"gonum.org/v1/gonum/spatial/r3"
)

// Lumped is a handful of points that stand for a charge from far away: a source, with the error that it makes.
type Lumped struct {
	Charges []element.Point  // point charges, or
	Dipoles []element.Dipole // point dipoles
	// Error is the largest error of g on the sphere of the given distance, relative to the largest |g| there. Farther out it
	// only falls, because every component of g is harmonic.
	Error float64
}

// Source returns the points as a source.
func (l Lumped) Source() field.Sum {
	var s field.Sum
	for _, q := range l.Charges {
		s = append(s, q)
	}
	for _, p := range l.Dipoles {
		s = append(s, p)
	}
	return s
}

// ErrLump is wrapped by the error of Lump where no small number of points is good enough.
var ErrLump = errors.New("not reached with a small number of points")

// mostLumps is how many points Lump tries.
const mostLumps = 6

// Lump returns the fewest point charges or dipoles whose field is that of c within accuracy (relative to the largest field on
// the sphere) at and beyond a distance from the centre of the bounds. Of equal numbers charges are preferred: one dipole is
// tried first, then pairs of charges, pairs of dipoles, and so on.
//
// Domain: accuracy from 1e-10 to 0.5, distance at least 1.2 bounding radii. Where 6 points are not enough the best is returned
// with an error that wraps ErrLump.
func Lump(c *Charge, accuracy, distance float64) (Lumped, error) {
	box := c.Bounds()
	centre := r3.Scale(0.5, r3.Add(box.Min, box.Max))
	a := reach(box, centre)
	if !(accuracy >= 1e-10 && accuracy <= 0.5) {
		return Lumped{}, fmt.Errorf("bound: accuracy %v of lumped charge; give 1e-10 to 0.5", accuracy)
	}
	if !(distance >= 1.2*a && distance < math.Inf(1)) {
		return Lumped{}, fmt.Errorf("bound: distance %v of lumped charge; give at least 1.2 bounding radii, %v", distance, 1.2*a)
	}
	f := newFit(c, centre, a, distance)
	if f.largest == 0 {
		return Lumped{}, nil
	}
	best := Lumped{Error: math.Inf(1)}
	for n := 1; n <= mostLumps; n++ {
		for _, dipoles := range [2]bool{false, true} {
			if n == 1 && !dipoles { // a single charge has no moment
				continue
			}
			l := f.solve(n, dipoles)
			if l.Error < best.Error {
				best = l
			}
			if l.Error <= accuracy {
				return l, nil
			}
		}
	}
	return best, fmt.Errorf("bound: lumped charge to %.2g at distance %.6g: %w; the best of %d has %.2g; ask for less or go farther",
		accuracy, distance, ErrLump, mostLumps, best.Error)
}

// fit matches points to the field on a sphere.
type fit struct {
	centre  r3.Vec
	size    float64 // bounding radius, the unit of positions
	sphere  []r3.Vec
	want    []float64 // g on the sphere, component by component
	largest float64
	axis    [3]r3.Vec // principal directions of the dipole density, the longest first
	extent  [3]float64
}

// onSphere is the number of points on the sphere.
const onSphere = 96

func newFit(c *Charge, centre r3.Vec, a, distance float64) *fit {
	f := &fit{centre: centre, size: a}
	golden := math.Pi * (3 - math.Sqrt(5)) // spiral of Fibonacci
	for i := range onSphere {
		z := 1 - (2*float64(i)+1)/onSphere
		s, t := math.Sqrt(1-z*z), golden*float64(i)
		x := r3.Add(centre, r3.Scale(distance, r3.Vec{X: s * math.Cos(t), Y: s * math.Sin(t), Z: z}))
		f.sphere = append(f.sphere, x)
		g := c.Field(x)
		f.want = append(f.want, g.X, g.Y, g.Z)
		f.largest = max(f.largest, r3.Norm(g))
	}
	f.principal(c)
	return f
}

// principal finds the directions in which the dipole density is spread.
func (f *fit) principal(c *Charge) {
	m := mat.NewSymDense(3, nil)
	total := 0.0
	for _, v := range c.Volumes {
		v.Cell.Nodes(3, func(x r3.Vec, w float64) {
			d := r3.Sub(x, f.centre)
			y := [3]float64{d.X, d.Y, d.Z}
			for i := range 3 {
				for j := i; j < 3; j++ {
					m.SetSym(i, j, m.At(i, j)+w*y[i]*y[j])
				}
			}
			total += w
		})
	}
	var e mat.EigenSym
	if !e.Factorize(m, true) {
		f.axis = [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}
		return
	}
	var q mat.Dense
	e.VectorsTo(&q)
	values := e.Values(nil)
	for k := range 3 {
		f.axis[k] = r3.Vec{X: q.At(0, 2-k), Y: q.At(1, 2-k), Z: q.At(2, 2-k)}
		f.extent[k] = math.Sqrt(max(values[2-k]/total, 0)) / f.size
	}
}

// start returns first positions of n points, in bounding radii: along the longest axis, fanned out a little so that no symmetry
// holds the search fast.
func (f *fit) start(n int) []float64 {
	var x []float64
	for i := range n {
		t := 0.0
		if n > 1 {
			t = 2*float64(i)/float64(n-1) - 1
		}
		turn := 2.4 * float64(i)
		p := r3.Scale(1.4*t*f.extent[0], f.axis[0])
		p = r3.Add(p, r3.Scale(f.extent[1]*math.Cos(turn)*float64(min(n-1, 1)), f.axis[1]))
		p = r3.Add(p, r3.Scale(f.extent[2]*math.Sin(turn)*float64(min(n-1, 1)), f.axis[2]))
		x = append(x, p.X, p.Y, p.Z)
	}
	return x
}

// solve finds positions by a quasi-Newton search and, for each, the strengths by least squares.
func (f *fit) solve(n int, dipoles bool) Lumped {
	cost := func(x []float64) float64 {
		for _, v := range x {
			if math.Abs(v) > 1.15 { // far outside the ball of the body: not allowed
				return 1e3 * (1 + math.Abs(v))
			}
		}
		_, miss := f.strengths(x, dipoles)
		return math.Log(miss + 1e-14)
	}
	x := f.start(n)
	problem := optimize.Problem{Func: cost, Grad: func(grad, x []float64) {
		fd.Gradient(grad, cost, x, &fd.Settings{Formula: fd.Central, Step: 1e-5})
	}}
	methods := []optimize.Method{&optimize.BFGS{}}
	if n <= 3 {
		methods = append(methods, &optimize.NelderMead{SimplexSize: 0.02})
	}
	for _, method := range methods {
		r, _ := optimize.Minimize(problem, x, &optimize.Settings{MajorIterations: 60, FuncEvaluations: 400}, method)
		if r != nil && r.F < cost(x) { // a search that stops early still counts if it has gone down
			x = r.X
		}
	}
	s, _ := f.strengths(x, dipoles)
	return f.result(x, s, dipoles)
}

// strengths returns the best charges (their sum zero) or dipoles at given positions, and the root of the mean square miss
// relative to the largest field.
func (f *fit) strengths(x []float64, dipoles bool) (s []float64, miss float64) {
	n := len(x) / 3
	columns := n - 1 // charges: the last is minus the sum of the others
	if dipoles {
		columns = 3 * n
	}
	rows := len(f.want)
	a := mat.NewDense(rows, columns, nil)
	for j := range columns {
		for i, y := range f.sphere {
			var g r3.Vec
			if dipoles {
				var m r3.Vec
				*[3]*float64{&m.X, &m.Y, &m.Z}[j%3] = 1
				g = element.Dipole{At: f.at(x, j/3), Moment: m}.Field(y)
			} else {
				g = r3.Sub(element.Point{At: f.at(x, j), Charge: 1}.Field(y), element.Point{At: f.at(x, n-1), Charge: 1}.Field(y))
			}
			a.Set(3*i, j, g.X)
			a.Set(3*i+1, j, g.Y)
			a.Set(3*i+2, j, g.Z)
		}
	}
	want := mat.NewVecDense(rows, f.want)
	var v, r mat.VecDense
	if err := v.SolveVec(a, want); err != nil {
		if _, near := err.(mat.Condition); !near {
			return make([]float64, columns), 1
		}
	}
	r.MulVec(a, &v)
	r.SubVec(&r, want)
	return v.RawVector().Data, mat.Norm(&r, 2) / math.Sqrt(float64(rows)/3) / f.largest
}

// at returns position i.
func (f *fit) at(x []float64, i int) r3.Vec {
	return r3.Add(f.centre, r3.Scale(f.size, r3.Vec{X: x[3*i], Y: x[3*i+1], Z: x[3*i+2]}))
}

// result makes the points and measures their largest error on the sphere.
func (f *fit) result(x, s []float64, dipoles bool) Lumped {
	var l Lumped
	n := len(x) / 3
	if dipoles {
		for i := range n {
			l.Dipoles = append(l.Dipoles, element.Dipole{At: f.at(x, i), Moment: r3.Vec{X: s[3*i], Y: s[3*i+1], Z: s[3*i+2]}})
		}
	} else {
		last := 0.0
		for i, q := range s {
			l.Charges = append(l.Charges, element.Point{At: f.at(x, i), Charge: q})
			last -= q
		}
		l.Charges = append(l.Charges, element.Point{At: f.at(x, n-1), Charge: last})
	}
	src := l.Source()
	for i, y := range f.sphere {
		d := r3.Sub(src.Field(y), r3.Vec{X: f.want[3*i], Y: f.want[3*i+1], Z: f.want[3*i+2]})
		l.Error = max(l.Error, r3.Norm(d)/f.largest)
	}
	return l
}
