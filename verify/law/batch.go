package law

import (
	"fmt"
	"math"
	"slices"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

const everything = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

// anywhere returns n points of the region, on faces, in the centre and far away, with one that is not finite.
func (k *kit) anywhere(n int) []r3.Vec {
	d := r3.Sub(k.Region.Max, k.Region.Min)
	x := []r3.Vec{k.centre, k.around(1e6), {X: math.NaN()}}
	for i := 0; i < len(k.Faces) && i < n/4; i++ {
		x = append(x, k.Faces[i].X)
	}
	for len(x) < n {
		x = append(x, r3.Add(k.Region.Min, r3.Vec{X: d.X * k.rng.Float64(), Y: d.Y * k.rng.Float64(), Z: d.Z * k.rng.Float64()}))
	}
	return x
}

// memory is what the source answered first.
type memory struct {
	x []r3.Vec
	g []r3.Vec
	v *field.Values
}

func (k *kit) repeat() {
	x := k.anywhere(32)
	k.first = memory{x: x, v: k.values(x, everything, field.Mean)}
	for _, y := range x {
		k.first.g = append(k.first.g, k.src.Field(y))
	}
}

// repeated asks again.
func (k *kit) repeated() {
	v := k.values(k.first.x, everything, field.Mean)
	for i, x := range k.first.x {
		if g := k.src.Field(x); !sameVec(g, k.first.g[i]) {
			k.fail(Repeatable, []r3.Vec{x}, g, k.first.g[i], "none: the bits must agree")
		}
		k.same(Repeatable, x, v.At(i), k.first.v.At(i))
	}
}

// badInput gives the source points that are not finite.
func (k *kit) badInput() {
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		for i := range 3 {
			c := [3]float64{k.centre.X, k.centre.Y, k.centre.Z}
			c[i] = bad
			x := r3.Vec{X: c[0], Y: c[1], Z: c[2]}
			if g := k.src.Field(x); !allNaN(g) {
				k.fail(BadPoint, []r3.Vec{x}, g, "NaN in all components", "none")
			}
			v := k.values([]r3.Vec{x}, field.WantPhi|field.WantG, field.Mean).At(0)
			if !allNaN(v.G) || !math.IsNaN(v.Phi) || v.Status != field.BadInput {
				k.fail(BadPoint, []r3.Vec{x}, fmt.Sprintf("phi %v, g %s, status %v", v.Phi, digits(v.G), v.Status), "NaN and BadInput", "none")
			}
		}
	}
}

// batch holds one batch of many points against its parts, single points, fewer arrays, and Field.
func (k *kit) batch() {
	if k.eval == nil {
		return
	}
	x := k.anywhere(150)
	for _, side := range [...]field.Side{field.Mean, field.Inside, field.Outside} {
		at := withLow(x)
		keep := [...][]float64{slices.Clone(at.X), slices.Clone(at.Y), slices.Clone(at.Z),
			slices.Clone(at.XLo), slices.Clone(at.YLo), slices.Clone(at.ZLo), slices.Clone(at.Slack)}
		whole := field.NewValues(len(x), everything)
		field.Evaluate(k.src, whole, at, side)
		for i, a := range [...][]float64{at.X, at.Y, at.Z, at.XLo, at.YLo, at.ZLo, at.Slack} {
			for j := range a {
				if !sameBits(a[j], keep[i][j]) {
					k.fail(Untouched, x[j:j+1], a[j], keep[i][j], "none: the bits must agree")
				}
			}
		}
		backward := slices.Clone(x)
		slices.Reverse(backward)
		other := k.values(backward, everything, side)
		for i := range x {
			one := k.values(x[i:i+1], everything, side)
			k.same(Batch, x[i], whole.At(i), one.At(0))
			k.same(Batch, x[i], whole.At(i), other.At(len(x)-1-i))
		}
		k.fewer(x, whole, side)
		if side == field.Mean {
			k.agree(x, whole)
		}
	}
}

// fewer evaluates with some arrays only.
func (k *kit) fewer(x []r3.Vec, whole *field.Values, side field.Side) {
	for want := field.Want(1); want < everything; want++ {
		v := k.values(x, want, side)
		for i := range x {
			a, b := v.At(i), whole.At(i)
			if want&field.WantPhi == 0 {
				a.Phi, b.Phi = 0, 0
			}
			if want&field.WantG == 0 {
				a.G, b.G = r3.Vec{}, r3.Vec{}
			}
			if want&field.WantGrad == 0 {
				a.Grad, b.Grad = [6]float64{}, [6]float64{}
			}
			// an estimate may depend on what is computed beside it; the status on the potential being asked for
			a.ErrPhi, a.ErrG, a.ErrGrad = b.ErrPhi, b.ErrG, b.ErrGrad
			if b.Status == field.NoPotential || b.Status == field.NotConverged {
				a.Status = b.Status
			}
			k.same(NilArrays, x[i], a, b)
		}
	}
}

// agree holds the upgrade against Field.
func (k *kit) agree(x []r3.Vec, v *field.Values) {
	for i, y := range x {
		g, h := k.src.Field(y), v.At(i).G
		exists := v.Status[i] == field.Regular || v.Status[i] == field.OnFace || v.Status[i] == field.NoPotential
		switch {
		case exists:
			tol := 2 * k.Accuracy * max(r3.Norm(h), k.floor(y))
			k.nearVec(Agree, []r3.Vec{y}, h, g, tol, fmt.Sprintf("accuracy %.3g of |g|, twice", k.Accuracy))
		case !allNaN(g) && v.Status[i] != field.NotConverged:
			k.fail(Agree, []r3.Vec{y}, fmt.Sprintf("Field %s with status %v", digits(g), v.Status[i]), "NaN", "none")
		}
		if exists && v.ErrG != nil && !(v.ErrG[i] >= 0 && v.ErrPhi[i] >= 0 && v.ErrGrad[i] >= 0) {
			k.estimates([]r3.Vec{y}, &field.Value{ErrPhi: v.ErrPhi[i], ErrG: v.ErrG[i], ErrGrad: v.ErrGrad[i]})
		}
	}
}

// withLow returns a batch that has all its arrays.
func withLow(x []r3.Vec) *field.Points {
	p, n := field.PointsOf(x...), len(x)
	p.XLo, p.YLo, p.ZLo, p.Slack = make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	return p
}

// same records a violation unless two values have the same bits.
func (k *kit) same(law Law, x r3.Vec, got, want field.Value) {
	equal := sameBits(got.Phi, want.Phi) && sameVec(got.G, want.G) && sameBits(got.ErrPhi, want.ErrPhi) &&
		sameBits(got.ErrG, want.ErrG) && sameBits(got.ErrGrad, want.ErrGrad) && got.Status == want.Status
	for c := range got.Grad {
		equal = equal && sameBits(got.Grad[c], want.Grad[c])
	}
	if !equal {
		k.fail(law, []r3.Vec{x}, fmt.Sprintf("%+v", got), fmt.Sprintf("%+v", want), "none: the bits must agree")
	}
}

// sameBits reports whether a and b are the same number, any NaN being the same.
func sameBits(a, b float64) bool {
	return math.Float64bits(a) == math.Float64bits(b) || math.IsNaN(a) && math.IsNaN(b)
}

func sameVec(a, b r3.Vec) bool { return sameBits(a.X, b.X) && sameBits(a.Y, b.Y) && sameBits(a.Z, b.Z) }

func allNaN(v r3.Vec) bool { return math.IsNaN(v.X) && math.IsNaN(v.Y) && math.IsNaN(v.Z) }
