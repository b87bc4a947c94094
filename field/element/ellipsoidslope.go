package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// ellipsoidSlope is the part p = G x of an ellipsoid with affine polarization; lengths in units of the ellipsoid.
//
// Density x_j in the ellipsoid has outside, with D(s) = sqrt(prod (a_i^2+s)) and U = 1 - sum x_i^2/(a_i^2+s), the potential
//
//	V_j = (a_j^2 a b c/4) x_j int_lambda^inf U/((a_j^2+s) D) ds
//
// (inside lambda = 0) ([Ferrers1877], [Dyson1891]; checked by quadrature over the volume), and phi = -sum G_ij dV_j/dx_i. U is
// zero at lambda, so that with the integrals I of confocalIntegrals and H_ij = (a b c/4) (G_ij a_j^2 + G_ji a_i^2)
//
//	phi = sum H_ij x_i x_j I_ij + sum (H_jj/2) (sum x_k^2 I_jk - I_j).
//
// In the derivatives of phi at constant I those by lambda cancel but for one. With A_i = a_i^2+lambda, w_i = 1/A_i, y_i = x_i w_i,
// the unit normal s = y/|y| and tau = 2/D, all at lambda, and (1 + 2 delta_im) I_im - tau w_m s_i^2 = K_im (inside: no tau),
//
//	g_m = -x_m sum_i H_ii K_im - 2 sum_(j not m) H_mj x_j K_mj + 2 tau |y| H_ij s_i s_j s_m,   i, j the two others
//
// [own derivation]. Columns of K have the sum 0 outside, as d(w_m/D)/ds shows.
type ellipsoidSlope struct {
	h, size [3][3]float64     // H and the size of its terms
	inside  confocalIntegrals // those of lambda = 0
	far     [3][3]float64     // H without its trace: phi = 2 n.far n/(5 r^3) far off
}

// confocalNormal is the confocal ellipsoid through a point outside; see ellipsoidSlope.
type confocalNormal struct {
	s, w       [3]float64
	steep, tau float64 // steep: |y|
}

// NewAffineEllipsoid returns the ellipsoid with the polarization p. It returns the error of shape.Check, or one that says that
// p is not finite.
func NewAffineEllipsoid(shape geom.Ellipsoid, p field.Affine) (*Ellipsoid, error) {
	e, err := NewEllipsoid(shape, p.At(r3.Vec{}))
	if err != nil || p.Gradient == [3][3]float64{} {
		return e, err
	}
	o := new(ellipsoidSlope)
	f := e.unit * e.axes[0] * e.axes[1] * e.axes[2] / 4
	sum := 0.0
	for i := range 3 {
		for j := range 3 {
			a, b := f*p.Gradient[i][j]*e.squares[j].Hi, f*p.Gradient[j][i]*e.squares[i].Hi
			o.h[i][j], o.size[i][j] = a+b, math.Abs(a)+math.Abs(b)
			sum += o.size[i][j]
		}
	}
	if sum-sum != 0 {
		return nil, fmt.Errorf("element: polarization gradient %v of the ellipsoid is not finite; give finite components", p.Gradient)
	}
	o.far = o.h
	for i := range 3 {
		o.far[i][i] -= (o.h[0][0] + o.h[1][1] + o.h[2][2]) / 3
	}
	o.inside = confocalIntegralsOf([3]float64{e.squares[0].Hi, e.squares[1].Hi, e.squares[2].Hi})
	e.slope = o
	return e, nil
}

// slopeRounding is the number of units of rounding allowed a term: of the integrals, s, w and H some 15. Free; held by
// TestAffineEllipsoid.
const slopeRounding = 24

// add adds the value at x from the integrals there; n is nil inside.
func (o *ellipsoidSlope) add(v *field.Value, x *[3]float64, in *confocalIntegrals, n *confocalNormal, want field.Want) {
	o.addPotential(v, x, in)
	var k, size [3][3]float64
	for m := range 3 {
		for i := range 3 {
			k[i][m], size[i][m] = normalPart(in, n, i, m)
		}
	}
	var g [3]float64
	bound := 0.0
	for m := range 3 {
		i, j := (m+1)%3, (m+2)%3
		xm := math.Abs(x[m])
		for l := range 3 {
			g[m] -= o.h[l][l] * x[m] * k[l][m]
			bound += o.size[l][l] * xm * size[l][m]
		}
		g[m] -= 2*o.h[m][i]*x[i]*k[m][i] + 2*o.h[m][j]*x[j]*k[m][j]
		bound += 2*o.size[m][i]*math.Abs(x[i])*size[m][i] + 2*o.size[m][j]*math.Abs(x[j])*size[m][j]
		if n != nil {
			f := 2 * n.tau * n.steep * n.s[0] * n.s[1] * n.s[2]
			g[m] += f * o.h[i][j]
			bound += math.Abs(f) * o.size[i][j]
		}
	}
	v.G = r3.Add(v.G, r3.Vec{X: g[0], Y: g[1], Z: g[2]})
	v.ErrG += slopeRounding * u * bound
	if want&field.WantGrad != 0 {
		o.addGradient(v, in, n)
	}
}

// normalPart returns K_im and the size of its terms. Outside it is minus the sum of the two others of its column where that
// has the smaller terms.
func normalPart(in *confocalIntegrals, n *confocalNormal, i, m int) (k, size float64) {
	whole := func(i int) float64 {
		if i == m {
			return 3 * in.two[m][m]
		}
		return in.two[i][m]
	}
	own := whole(i)
	if n == nil {
		return own, own
	}
	j, l := (i+1)%3, (i+2)%3
	t := n.tau * n.w[m]
	normal, across := t*n.s[i]*n.s[i], t*(n.s[j]*n.s[j]+n.s[l]*n.s[l])
	if rest := whole(j) + whole(l); rest+across < own+normal {
		return across - rest, across + rest
	}
	return own - normal, own + normal
}

func (o *ellipsoidSlope) addPotential(v *field.Value, x *[3]float64, in *confocalIntegrals) {
	phi, size := 0.0, 0.0
	for j := range 3 {
		f := 0.0
		for k := range 3 {
			xx := x[j] * x[k] * in.two[j][k]
			phi += o.h[j][k] * xx
			size += o.size[j][k] * math.Abs(xx)
			f += x[k] * x[k] * in.two[j][k]
		}
		phi += 0.5 * o.h[j][j] * (f - in.one[j])
		size += 0.5 * o.size[j][j] * (f + in.one[j])
	}
	v.Phi += phi
	v.ErrPhi += slopeRounding * u * size
}

// addGradient adds the gradient of g, in the terms of ellipsoidSlope
//
//	-2 delta_mn sum (H_jj/2) I_jm - 2 H_mn I_mn + tau [ 2 s_m s_n S + 2 s_n w_m (H s)_m + 2 s_m w_n (H s)_n
//	  - s_m s_n ( q (sum w + 2 w_m + 2 w_n - 4 W) + 4 R ) + delta_mn q w_m ],
//
// S = sum (H_jj/2) w_j, W = sum w_j s_j^2, q = s.H s, R = sum s_j w_j (H s)_j [own derivation]; inside without tau.
func (o *ellipsoidSlope) addGradient(v *field.Value, in *confocalIntegrals, n *confocalNormal) {
	var d, size [6]float64
	for k, mn := range tensorOrder {
		i, j := mn[0], mn[1]
		d[k] = -2 * o.h[i][j] * in.two[i][j]
		size[k] = 2 * o.size[i][j] * in.two[i][j]
		if i == j {
			for l := range 3 {
				d[k] -= o.h[l][l] * in.two[l][i]
				size[k] += o.size[l][l] * in.two[l][i]
			}
		}
	}
	if n != nil {
		o.addNormal(&d, &size, n)
		a, b := [3]float64{d[0], d[1], d[2]}, [3]float64{size[0], size[1], size[2]}
		size[0] = traceless(&a, &b)
		size[1], size[2] = 0, 0
		copy(d[:], a[:])
	}
	bound := 0.0
	for k := range d {
		v.Grad[k] += d[k]
		bound += size[k]
		if k >= 3 { // twice in the norm
			bound += size[k]
		}
	}
	v.ErrGrad += slopeRounding * u * bound
}

// addNormal adds the part of the gradient with tau.
func (o *ellipsoidSlope) addNormal(d, size *[6]float64, n *confocalNormal) {
	var hs, hsSize [3]float64
	var trace, traceSize, q, qSize, r, rSize, ww, sum float64
	for i := range 3 {
		for j := range 3 {
			hs[i] += o.h[i][j] * n.s[j]
			hsSize[i] += o.size[i][j] * math.Abs(n.s[j])
		}
		s, w := n.s[i], n.w[i]
		trace += 0.5 * o.h[i][i] * w
		traceSize += 0.5 * o.size[i][i] * w
		q += s * hs[i]
		qSize += math.Abs(s) * hsSize[i]
		r += s * w * hs[i]
		rSize += math.Abs(s) * w * hsSize[i]
		ww += w * s * s
		sum += w
	}
	for k, mn := range tensorOrder {
		i, j := mn[0], mn[1]
		si, sj, wi, wj := n.s[i], n.s[j], n.w[i], n.w[j]
		f := 2*si*sj*trace + 2*sj*wi*hs[i] + 2*si*wj*hs[j] - si*sj*(q*(sum+2*wi+2*wj-4*ww)+4*r)
		si, sj = math.Abs(si), math.Abs(sj)
		g := 2*si*sj*traceSize + 2*sj*wi*hsSize[i] + 2*si*wj*hsSize[j] + si*sj*(qSize*(sum+2*wi+2*wj+4*ww)+4*rSize)
		if i == j {
			f += q * wi
			g += qSize * wi
		}
		d[k] += n.tau * f
		size[k] += n.tau * g
	}
}
