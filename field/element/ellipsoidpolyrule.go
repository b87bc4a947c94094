package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/gauss"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// confocalPoly is the confocal ellipsoid through a point, from where the integrals go. With c the shortest semi-axis, L = c^2 + lambda,
// e_i = a_i^2 - c^2 and s + c^2 = L/t^2 the integrals go over t from 0 to 1, and every quantity is a sum of positive terms:
//
//	al_i = a_i^2 t^2/(L + e_i t^2),  b_i = (lambda + c^2 (1-t^2))/(L + e_i t^2),  U = (1-t^2) sum x_i^2/A_i L/(L + e_i t^2),
//	ds/D = 2 sqrt(L) dt/sqrt((L + e_j t^2)(L + e_k t^2)),   j, k the longer axes.
type confocalPoly struct {
	base         *Ellipsoid
	excess       *[3]float64
	lambda, from float64    // from: L
	x            [3]float64 // the point
	share        [3]float64 // x_i^2/A_i, of sum 1
	w            [3]float64 // 1/A_i
	s            [3]float64 // the unit normal, along x_i/A_i
	steep        float64    // |x_i/A_i|
}

func (e *PolynomialEllipsoid) confocalAt(x pair.Vec, lambda float64) confocalPoly {
	b := e.base
	o := confocalPoly{base: b, excess: &e.excess, lambda: lambda, from: b.squares[b.least].AddFloat(lambda).Value()}
	o.x = [3]float64{x.X.Value(), x.Y.Value(), x.Z.Value()}
	var y [3]float64
	for i, c := range o.x {
		o.w[i] = 1 / (o.from + e.excess[i])
		y[i] = c * o.w[i]
		o.share[i] = c * y[i]
	}
	normal, steep := direction(r3.Vec{X: y[0], Y: y[1], Z: y[2]})
	o.s, o.steep = [3]float64{normal.X, normal.Y, normal.Z}, steep
	return o
}

// node fills in the node at t.
func (o *confocalPoly) node(t float64, n *polyNode) {
	least := o.base.squares[o.base.least].Hi
	rest := (1 - t) * (1 + t)
	n.over, n.slope = 0, 1
	for i, a := range o.base.axes {
		f := 1 / (o.from + o.excess[i]*t*t)
		n.alpha[i] = a * a * t * t * f
		n.beta[i] = (o.lambda + least*rest) * f
		n.eta[i] = a * t * t * f * o.x[i]
		n.over += rest * o.share[i] * o.from * f
	}
}

// each visits the nodes t of the integral with the weights of (a b c/4) ds/D.
//
// The roots of L + e t^2 lie at an angle of 90 degrees in v, t = sinh(k v)/sinh(k), sinh(k)^2 = max e/L, 0 <= v <= 1: for all axes
// in a strip of half-width pi/(2 k) the integrand is analytic, and panels of polyPanel in k v are equally good for all shapes.
func (e *PolynomialEllipsoid) each(o *confocalPoly, visit func(t, w float64)) {
	b := e.base
	most := max(e.excess[0], e.excess[1], e.excess[2]) / o.from
	k := math.Asinh(math.Sqrt(most))
	top := math.Sqrt(most)
	panels := 1 + int(k/polyPanel)
	width := 1 / float64(panels)
	j, l := (b.least+1)%3, (b.least+2)%3
	f := 0.5 * b.axes[0] * b.axes[1] * b.axes[2] * math.Sqrt(o.from) * width
	for p := range panels {
		for i, node := range e.nodes {
			v := (float64(p) + node) * width
			t, slope := v, 1.0
			if k > 0 {
				t, slope = math.Sinh(k*v)/top, k*math.Cosh(k*v)/top
			}
			w := f * e.weights[i] * slope / math.Sqrt((o.from+e.excess[j]*t*t)*(o.from+e.excess[l]*t*t))
			visit(t, w)
		}
	}
}

// polyPanel is the largest length of a panel; measured together with the number of nodes, see TestPolynomialRule.
const polyPanel = 2

// polyRule returns the rule of a panel for a polarization of some degree, on 0..1. Measured: for axis ratios to 1e4 what it leaves out
// goes under in rounding from 14 nodes (degree 2, nearly a sphere) to 32 (degree 20).
func polyRule(degree int) (x, w []float64) { return gauss.On(22+2*degree/3, 0, 1) }

// addSurface adds what the lower end of the integral has in g = -grad phi and its gradient. With D = D(lambda), y_i = x_i/A_i, s = y/|y|,
// w_i = 1/A_i, tau = a b c/D, the integrand F and E = y.p = F/2 at lambda, and d lambda/dx_n = 2 s_n/|y|, dy_i/dx_n = delta_in w_i - 2 s_i w_i s_n
// along x_n,
//
//	g_m    = tau E s_m/|y|,
//	grad_mn = tau [ s_n d_m F/(2 |y|) + s_m (d_n E - sum w s_n E/|y|)/|y| + E dy_m/dx_n/|y|^2 - 2 E s_m s_n (w_n - 2 sum w s^2)/|y|^2 ]
//
// [own derivation], d_n E = sum dE/de_j a_j dy_j/dx_n.
func (e *PolynomialEllipsoid) addSurface(s *polySum, o *confocalPoly, want field.Want) {
	if want&(field.WantG|field.WantGrad) == 0 {
		return
	}
	var n polyNode
	o.node(1, &n)
	v, size := e.outer.jets(&n, want)
	axes := &o.base.axes
	y := o.steep
	tau := axes[0] * axes[1] * axes[2] * math.Sqrt(o.w[0]*o.w[1]*o.w[2])
	for m := range 3 {
		s.g[m] += tau * (0.5 * v.v / y) * o.s[m]
		s.gSize[m] += tau * (0.5 * size.v / y) * math.Abs(o.s[m])
	}
	if want&field.WantGrad == 0 {
		return
	}
	full, bound := o.surfaceSlope(&v, &n, 1), 0.0
	abs := *o
	abs.absolute(&n)
	sizes := abs.surfaceSlope(&size, &n, -1)
	for k, ij := range tensorOrder {
		i, j := ij[0], ij[1]
		s.grad[k] += tau * 0.5 * (full[i][j] + full[j][i])
		bound += sizes[i][j] + sizes[j][i]
	}
	s.gradSize += tau * bound
}

// absolute makes everything positive that has a sign.
func (o *confocalPoly) absolute(n *polyNode) {
	for i := range 3 {
		o.s[i], n.eta[i] = math.Abs(o.s[i]), math.Abs(n.eta[i])
	}
}

// surfaceSlope returns the bracket of addSurface, or with minus = -1 the sizes of its terms from those of v.
func (o *confocalPoly) surfaceSlope(v *polyJet, n *polyNode, minus float64) (full [3][3]float64) {
	axes, y := &o.base.axes, o.steep
	var turned, sum, square float64
	for i := range 3 {
		turned += 0.5 * v.d[i] * axes[i] * o.s[i] * o.w[i]
		sum += o.w[i]
		square += o.w[i] * o.s[i] * o.s[i]
	}
	value := 0.5 * v.v / y
	for i := range 3 {
		slope := (n.alpha[i]*v.d[i] - minus*2*n.eta[i]*v.d[3]) / axes[i]
		for j := range 3 {
			dE := 0.5*v.d[j]*axes[j]*o.w[j] - minus*2*o.s[j]*turned
			f := o.s[j]*slope/(2*y) + o.s[i]*(dE-minus*sum*o.s[j]*value)/y
			f -= minus * 2 * value / y * o.s[i] * o.s[j] * (o.w[i] + o.w[j] - minus*2*square)
			if i == j {
				f += value / y * o.w[i]
			}
			full[i][j] = f
		}
	}
	return full
}
