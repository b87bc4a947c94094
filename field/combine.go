package field

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Sum is the superposition of sources in one frame, added in order. The empty sum is the absence of field.
//
// The estimate of a sum is the sum of the estimates, the status the gravest of the parts. On a face that two parts
// share, Mean is the mean over both sides of both; Inside and Outside ask every part for its own side.
type Sum []Source

// Field returns the sum of the fields at x.
func (s Sum) Field(x r3.Vec) r3.Vec {
	var g r3.Vec
	for _, src := range s {
		g = r3.Add(g, src.Field(x))
	}
	return g
}

// Evaluate computes the arrays of dst; see Evaluator.
func (s Sum) Evaluate(dst *Values, at *Points, side Side) {
	work := scratches.Get().(*scratch)
	defer scratches.Put(work)
	for lo := 0; lo < at.Len(); lo += chunk {
		hi := min(lo+chunk, at.Len())
		out := dst.slice(lo, hi)
		work.points = at.slice(lo, hi)
		Fill(&out, &work.points, func(Point, Want) Value { return Value{} })
		for _, src := range s {
			part := work.like(&out, hi-lo)
			Evaluate(src, part, &work.points, side)
			out.Add(part)
		}
	}
}

// Bounds returns a box that holds the charge of all parts.
func (s Sum) Bounds() r3.Box {
	var box r3.Box
	for i, src := range s {
		b, ok := BoundsOf(src)
		if !ok {
			return everywhere()
		}
		if i == 0 {
			box = b
			continue
		}
		box.Min = r3.Vec{X: min(box.Min.X, b.Min.X), Y: min(box.Min.Y, b.Min.Y), Z: min(box.Min.Z, b.Min.Z)}
		box.Max = r3.Vec{X: max(box.Max.X, b.Max.X), Y: max(box.Max.Y, b.Max.Y), Z: max(box.Max.Z, b.Max.Z)}
	}
	return box
}

// Add adds w, which has the same arrays, to v; the status becomes the graver of the two.
func (v *Values) Add(w *Values) {
	plus(v.Phi, w.Phi)
	plus(v.GX, w.GX)
	plus(v.GY, w.GY)
	plus(v.GZ, w.GZ)
	for k := range v.Grad {
		plus(v.Grad[k], w.Grad[k])
	}
	plus(v.ErrPhi, w.ErrPhi)
	plus(v.ErrG, w.ErrG)
	plus(v.ErrGrad, w.ErrGrad)
	for i, s := range w.Status {
		v.Status[i] = max(v.Status[i], s)
	}
}

func plus(dst, a []float64) {
	for i, x := range a {
		dst[i] += x
	}
}

// Scaled is a source multiplied by a factor.
type Scaled struct {
	Source Source
	Factor float64
}

// Field returns Factor times the field of the source.
func (s Scaled) Field(x r3.Vec) r3.Vec { return r3.Scale(s.Factor, s.Source.Field(x)) }

// Evaluate computes the arrays of dst; see Evaluator.
func (s Scaled) Evaluate(dst *Values, at *Points, side Side) {
	Evaluate(s.Source, dst, at, side)
	scale := func(a []float64, f float64) {
		for i := range a {
			a[i] *= f
		}
	}
	for _, a := range [...][]float64{dst.Phi, dst.GX, dst.GY, dst.GZ, dst.Grad[0], dst.Grad[1], dst.Grad[2], dst.Grad[3],
		dst.Grad[4], dst.Grad[5]} {
		scale(a, s.Factor)
	}
	for _, a := range [...][]float64{dst.ErrPhi, dst.ErrG, dst.ErrGrad} {
		scale(a, math.Abs(s.Factor))
	}
}

// Bounds returns the box of the source, if it has one; else all of space.
func (s Scaled) Bounds() r3.Box {
	b, ok := BoundsOf(s.Source)
	if !ok {
		return everywhere()
	}
	return b
}

// Constant is a uniform field from outside. Its potential is -G.x, zero at the origin.
type Constant struct{ G r3.Vec }

// Field returns the constant.
func (c Constant) Field(r3.Vec) r3.Vec { return c.G }

// Evaluate computes the arrays of dst; see Evaluator.
func (c Constant) Evaluate(dst *Values, at *Points, _ Side) {
	Fill(dst, at, func(p Point, _ Want) Value {
		x := p.X.Value()
		size := math.Abs(c.G.X*x.X) + math.Abs(c.G.Y*x.Y) + math.Abs(c.G.Z*x.Z)
		return Value{Phi: -r3.Dot(c.G, x), G: c.G, ErrPhi: 3 * 0x1p-53 * size}
	})
}
