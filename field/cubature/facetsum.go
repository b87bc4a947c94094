package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// powerSums gathers 4 pi times potential, its gradient and its second derivatives, in units of the body, and the magnitudes behind them.
type powerSums struct {
	phi, phiSize float64
	slope        r3.Vec
	slopeSize    float64
	second       [3][3]float64
	secondSize   float64
	local        [3]float64 // of one face, in its frame
	localSecond  [3][3]float64
}

// rest gathers what is left of p beside its affine part at x, over all faces. With s the density of a face at height h under x,
// q the density of the volume weighted along rays from x (square.cut) and r that density itself, over the faces f of the body
//
//	phi = sum int s/R dA - h int q(r)/R dA
//	grad phi = sum grad int s/R dA - n int r/R dA - h int q(grad r)/R dA
//
// and the second derivatives alike: volume integrals of the derivatives of 1/R go to the faces and to the derivatives of r.
func (f *Facets) rest(w *facetRoom, x r3.Vec, want field.Want) {
	w.total = powerSums{}
	grad := want&field.WantGrad != 0
	d := r3.Scale(1/f.unit, r3.Sub(x, f.centre))
	for k := range f.faces {
		q := &f.faces[k]
		at := [3]float64{r3.Dot(q.axes[0], d), r3.Dot(q.axes[1], d), r3.Dot(q.axes[2], d)}
		w.powers.fill(q.corners, at[0], at[1], at[2]-q.level, grad)
		w.total.local, w.total.localSecond = [3]float64{}, [3][3]float64{}
		if w.taken(&q.sigma, at, 2) {
			w.surface(grad)
		}
		if w.taken(&q.rho, at, 1) {
			w.volume(grad)
		}
		w.total.turn(&q.axes, grad)
	}
}

// taken sets w.p to the polynomial about the place at, without the terms below a degree, and reports whether anything is left.
func (w *facetRoom) taken(p *cube, at [3]float64, degree int) bool {
	if p.zero() {
		return false
	}
	copy(w.p.c, p.c)
	w.p.shift(at)
	for i := range degree {
		for j := range degree - i {
			for k := range degree - i - j {
				w.p.c[w.p.place(i, j, k)] = 0
			}
		}
	}
	return true
}

// surface adds the charge w.p of the face.
func (w *facetRoom) surface(grad bool) {
	f, t := &w.powers, &w.total
	w.s.cut(&w.p, -f.h, false)
	phi, size := f.potential(w.s)
	t.phi += phi
	t.phiSize += size
	slope, size := w.slope(w.s)
	for k := range slope {
		t.local[k] += slope[k]
	}
	t.slopeSize += size
	if !grad {
		return
	}
	degree := w.p.degree
	var h [3][3]float64
	for a := range 2 {
		w.s1.derive(w.s, degree, a)
		s, size := w.slope(w.s1)
		for b := range 3 {
			h[a][b] = s[b] - f.rimMoment(w.s, a, b)
		}
		t.secondSize += size
	}
	t.secondSize += w.s.size(f.cubeSize[1:], degree) + math.Abs(f.h)*w.s.size(f.cubeSize, degree)
	h[0][1] = 0.5 * (h[0][1] + h[1][0])
	h[1][0], h[2][0], h[2][1], h[2][2] = h[0][1], h[0][2], h[1][2], -h[0][0]-h[1][1]
	for a := range h {
		for b := range h {
			t.localSecond[a][b] += h[a][b]
		}
	}
}

// volume adds what the face gives for the volume charge w.p.
func (w *facetRoom) volume(grad bool) {
	f, t := &w.powers, &w.total
	w.s.cut(&w.p, -f.h, true)
	phi, size := f.potential(w.s)
	t.phi -= f.h * phi
	t.phiSize += math.Abs(f.h) * size
	w.s.cut(&w.p, -f.h, false)
	phi, size = f.potential(w.s)
	t.local[2] -= phi
	t.slopeSize += size
	if grad {
		slope, size := w.slope(w.s)
		for b := range 3 {
			t.localSecond[2][b] -= slope[b]
		}
		t.secondSize += size
	}
	for a := range 3 {
		w.d.derive(&w.p, a)
		w.s.cut(&w.d, -f.h, true)
		phi, size := f.potential(w.s)
		t.local[a] -= f.h * phi
		t.slopeSize += math.Abs(f.h) * size
		if !grad {
			continue
		}
		w.s.cut(&w.d, -f.h, false)
		phi, size = f.potential(w.s)
		t.localSecond[a][2] -= phi
		t.secondSize += size
		for b := range 3 {
			w.dd.derive(&w.d, b)
			w.s.cut(&w.dd, -f.h, true)
			phi, size := f.potential(w.s)
			t.localSecond[a][b] -= f.h * phi
			t.secondSize += math.Abs(f.h) * size
		}
	}
}

// potential returns int s/R dA and the magnitude behind it.
func (f *facetPowers) potential(s square) (v, size float64) {
	for i, c := range s {
		v += c * f.over[i]
	}
	return v, s.size(f.overSize, f.degree)
}

// slope returns the gradient of int s/R dA by the target, and the magnitude behind it.
func (w *facetRoom) slope(s square) (g [3]float64, size float64) {
	f := &w.powers
	for a := range 2 {
		w.s2.derive(s, f.degree, a)
		v, m := f.potential(w.s2)
		for i, c := range s {
			v -= c * f.rim[a][i]
		}
		g[a] = v
		size += m
	}
	for i, c := range s {
		g[2] -= c * f.angle[i]
	}
	return g, size + s.size(f.rimSize, f.degree) + s.size(f.angleSize, f.degree)
}

// rimMoment returns oint m_a s (y - x)_b/R^3 dl.
func (f *facetPowers) rimMoment(s square, a, b int) (v float64) {
	for n := 0; n <= f.degree; n++ {
		for j := range n + 1 {
			i := n - j
			switch b {
			case 0:
				v += s[flat(i, j)] * f.cube[a][flat(i+1, j)]
			case 1:
				v += s[flat(i, j)] * f.cube[a][flat(i, j+1)]
			case 2:
				v -= s[flat(i, j)] * f.cube[a][flat(i, j)] * f.h
			}
		}
	}
	return v
}

// turn adds what the frame of a face has gathered.
func (t *powerSums) turn(axes *[3]r3.Vec, grad bool) {
	for k, v := range t.local {
		t.slope = r3.Add(t.slope, r3.Scale(v, axes[k]))
	}
	if !grad {
		return
	}
	var e [3][3]float64
	for k, a := range axes {
		e[k] = [3]float64{a.X, a.Y, a.Z}
	}
	for a := range 3 {
		for b := range 3 {
			v := t.localSecond[a][b]
			for i := range 3 {
				for j := range 3 {
					t.second[i][j] += v * e[a][i] * e[b][j]
				}
			}
		}
	}
}

// restError is the rounding of the recursions in units of u times the magnitudes, measured.
const restError = 1

// addTo adds the sums to a value, in the unit of the caller.
func (t *powerSums) addTo(v *field.Value, unit float64, want field.Want) {
	v.Phi += over4Pi * unit * t.phi
	v.ErrPhi += over4Pi * unit * 0.6 * restError * u * t.phiSize // measured: the magnitudes behind phi cancel more than those behind g
	v.G = r3.Sub(v.G, r3.Scale(over4Pi, t.slope))
	v.ErrG += over4Pi * restError * u * t.slopeSize
	if want&field.WantGrad != 0 {
		k := over4Pi / unit
		s := &t.second
		for i, h := range [6]float64{s[0][0], s[1][1], s[2][2], 0.5 * (s[0][1] + s[1][0]), 0.5 * (s[0][2] + s[2][0]), 0.5 * (s[1][2] + s[2][1])} {
			v.Grad[i] -= k * h
		}
		v.ErrGrad += k * restError * u * t.secondSize
	}
}
