package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

func TestGaussExact(t *testing.T) {
	for n := 1; n <= 64; n++ {
		rule := legendre(n, 0, 1)
		if len(rule) != n {
			t.Fatalf("legendre(%d) has %d points", n, len(rule))
		}
		for d := 0; d <= 2*n-1; d++ {
			sum := 0.0
			for _, p := range rule {
				sum += p.w * math.Pow(p.x, float64(d))
			}
			if want := 1 / float64(d+1); !near(sum, want, float64(8+d)*u*want) { // d products in the power
				t.Errorf("n = %d, degree %d: %v, want %v", n, d, sum, want)
			}
		}
		for k := 1; k < n; k++ {
			if rule[k-1].x >= rule[k].x {
				t.Errorf("n = %d: points %d and %d are not ascending", n, k-1, k)
			}
		}
		for k, p := range legendre(n, -3, 3) {
			if q := legendre(n, -3, 3)[n-1-k]; q.x != -p.x || q.w != p.w {
				t.Errorf("n = %d: point %d %v has no mirror image, found %v", n, k, p, q)
			}
		}
	}
}

// monomial returns x^i y^j z^k.
func monomial(x r3.Vec, i, j, k int) float64 {
	p := 1.0
	for range i {
		p *= x.X
	}
	for range j {
		p *= x.Y
	}
	for range k {
		p *= x.Z
	}
	return p
}

// monomials visits all powers of total degree at most d.
func monomials(d int, visit func(i, j, k int)) {
	for i := 0; i <= d; i++ {
		for j := 0; i+j <= d; j++ {
			for k := 0; i+j+k <= d; k++ {
				visit(i, j, k)
			}
		}
	}
}

// over integrates f over cells, and returns the integral of |f| with it.
func over(cells []Cell, n int, f func(x r3.Vec) float64) (sum, size float64) {
	for _, c := range cells {
		c.Nodes(n, func(x r3.Vec, w float64) {
			sum += w * f(x)
			size += math.Abs(w * f(x))
		})
	}
	return sum, size
}

// onto integrates f over a surface, and returns the integral of |f| with it.
func onto(s Surface, n int, f func(x, normal r3.Vec) float64) (sum, size float64) {
	s.Nodes(n, func(x, normal r3.Vec, w float64) {
		sum += w * f(x, normal)
		size += math.Abs(w * f(x, normal))
	})
	return sum, size
}

// With n points every monomial to degree 2n-2 gives the same as with n + 4, over cells, and over faces alone and times
// each component of the normal.
func TestNodesDegree(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for _, b := range bodies() {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 0.3))} {
			for n := 1; n <= 3; n++ {
				monomials(2*n-2, func(i, j, k int) {
					f := func(x r3.Vec) float64 { return monomial(x, i, j, k) }
					got, _ := over(body.Cells(), n, f)
					want, size := over(body.Cells(), n+4, f)
					if !near(got, want, 500*u*size) { // sums of some hundred terms
						t.Errorf("%s: n = %d, cells, powers %d %d %d: %v, want %v", b.name, n, i, j, k, got, want)
					}
					for _, face := range body.Faces() {
						checkSurfaceDegree(t, b.name+" "+face.Name, face.Surface, n, i, j, k)
					}
				})
			}
		}
	}
}

func checkSurfaceDegree(t *testing.T, name string, s Surface, n, i, j, k int) {
	t.Helper()
	_, stretched := s.(EllipsoidSurface)
	if p, ok := s.(PlacedSurface); ok && !stretched {
		_, stretched = p.Surface.(EllipsoidSurface)
	}
	for c := range 4 {
		if c == 3 && stretched {
			continue // only exact times the normal
		}
		f := func(x, normal r3.Vec) float64 {
			return monomial(x, i, j, k) * [4]float64{normal.X, normal.Y, normal.Z, 1}[c]
		}
		got, _ := onto(s, n, f)
		want, size := onto(s, n+4, f)
		if !near(got, want, 500*u*size) { // sums of some hundred terms
			t.Errorf("%s: n = %d, powers %d %d %d, component %d: %v, want %v", name, n, i, j, k, c, got, want)
		}
	}
}

// The flux of x^i y^j z^k e through the faces is the integral of its divergence over the cells: this holds signs,
// normals and weights of faces and cells together.
func TestDivergenceTheorem(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	for _, b := range bodies() {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 0.3))} {
			monomials(3, func(i, j, k int) {
				if i == 0 {
					return
				}
				inner, size := over(body.Cells(), 3, func(x r3.Vec) float64 { return float64(i) * monomial(x, i-1, j, k) })
				flux := 0.0
				for _, face := range body.Faces() {
					sum, part := onto(face.Surface, 4, func(x, normal r3.Vec) float64 { return monomial(x, i, j, k) * normal.X })
					flux += face.Sign() * sum
					size += part
				}
				if !near(flux, inner, 500*u*size) { // sums of some hundred terms
					t.Errorf("%s: powers %d %d %d: flux %v, divergence %v", b.name, i, j, k, flux, inner)
				}
			})
		}
	}
}

// The integrals of monomials over box, sphere and disc have closed forms in gamma functions.
func TestNodesClosedForms(t *testing.T) {
	gammas := func(i, j, k int) float64 {
		if i%2+j%2+k%2 != 0 {
			return 0
		}
		half := func(m int) float64 { return math.Gamma(float64(m+1) / 2) }
		return 2 * half(i) * half(j) * half(k)
	}
	unit := Box{Size: r3.Vec{X: 2, Y: 2, Z: 2}}
	monomials(6, func(i, j, k int) {
		f := func(x r3.Vec) float64 { return monomial(x, i, j, k) }
		d := float64(i + j + k)
		shell := gammas(i, j, k) / math.Gamma((d+3)/2)
		got, size := over([]Cell{Sphere{Radius: 1}}, 4, f)
		if want := shell / (d + 3); !near(got, want, 200*u*size) { // sums of some hundred terms
			t.Errorf("sphere, powers %d %d %d: %v, want %v", i, j, k, got, want)
		}
		got, size = onto(SphereSurface{Radius: 1}, 4, func(x, _ r3.Vec) float64 { return f(x) })
		if !near(got, shell, 200*u*size) { // as above
			t.Errorf("sphere surface, powers %d %d %d: %v, want %v", i, j, k, got, shell)
		}
		want := 8 / float64((i+1)*(j+1)*(k+1))
		if i%2+j%2+k%2 != 0 {
			want = 0
		}
		if got, size = over([]Cell{unit}, 4, f); !near(got, want, 200*u*size) { // as above
			t.Errorf("box, powers %d %d %d: %v, want %v", i, j, k, got, want)
		}
		if k > 0 {
			return
		}
		want = gammas(i, j, 0) / math.Sqrt(math.Pi) / math.Gamma((d+2)/2) / (d + 2)
		if got, size = onto(Disc{Radius: 1}, 4, func(x, _ r3.Vec) float64 { return f(x) }); !near(got, want, 200*u*size) { // as above
			t.Errorf("disc, powers %d %d: %v, want %v", i, j, got, want)
		}
	})
}

// Weights of surfaces are positive, and sum to the area.
func TestWeights(t *testing.T) {
	for _, b := range bodies() {
		for _, face := range b.body.Faces() {
			sum := 0.0
			face.Surface.Nodes(12, func(_, normal r3.Vec, w float64) {
				if !(w > 0) {
					t.Errorf("%s %s: weight %v", b.name, face.Name, w)
				}
				if l := r3.Norm(normal); !near(l, 1, 4*u) { // a rounding a component
					t.Errorf("%s %s: normal of length %v", b.name, face.Name, l)
				}
				sum += w
			})
			tol := 1000 * u // sums of some hundred terms
			if _, ok := face.Surface.(EllipsoidSurface); ok {
				tol = 1e-3 // not exact for the area: axes 0.3 0.7 1.1 with 12 points
			}
			if area := face.Surface.Area(); !near(sum, area, tol*area) {
				t.Errorf("%s %s: weights sum to %v, area %v", b.name, face.Name, sum, area)
			}
		}
	}
}

// Too few points count as one.
func TestNodesOfNone(t *testing.T) {
	for _, b := range bodies() {
		for _, face := range b.body.Faces() {
			one, none := 0, 0
			face.Surface.Nodes(1, func(_, _ r3.Vec, _ float64) { one++ })
			face.Surface.Nodes(-3, func(_, _ r3.Vec, _ float64) { none++ })
			if one == 0 || one != none {
				t.Errorf("%s %s: %d nodes for n = 1, %d for n = -3", b.name, face.Name, one, none)
			}
		}
	}
}
