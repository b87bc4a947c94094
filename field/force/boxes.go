package force

import (
	"math"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// brick is a uniformly polarized box.
type brick struct {
	centre pair.Vec
	axis   [3]r3.Vec
	half   [3]float64
	p      r3.Vec
}

// brickOf returns the box that c is, if its charge is that of uniform polarization.
func brickOf(c *bound.Charge) (b brick, ok bool) {
	body := c.Body()
	var pose geom.Pose
	if at, placed := body.(geom.Placed); placed {
		body, pose = at.Body, at.Pose
	}
	box, ok := body.(geom.Box)
	if !ok {
		return b, false
	}
	for _, v := range c.Volumes {
		if v.Min != 0 || v.Max != 0 {
			return b, false
		}
	}
	b.centre = pose.Origin()
	b.p = c.Polarization(b.centre)
	size := r3.Norm(b.p)
	for i := range c.Layers {
		l := &c.Layers[i]
		if sigma := r3.Dot(b.p, l.Normal); l.Min != l.Max || math.Abs(sigma-l.Min) > 8*0x1p-53*size {
			return b, false
		}
	}
	b.axis = [3]r3.Vec{pose.VectorToOuter(r3.Vec{X: 1}), pose.VectorToOuter(r3.Vec{Y: 1}), pose.VectorToOuter(r3.Vec{Z: 1})}
	b.half = [3]float64{box.Size.X / 2, box.Size.Y / 2, box.Size.Z / 2}
	return b, true
}

func (b brick) mirrored(o *other) brick {
	if o.plane == nil {
		return b
	}
	b.centre = o.plane.Reflect(b.centre)
	for k, e := range b.axis {
		b.axis[k] = o.plane.Mirror(e)
	}
	b.p = r3.Scale(o.plane.Factor(), o.plane.Mirror(b.p))
	return b
}

// along returns the half sizes of b along the axes of a; ok is false if they are not parallel to some of its own.
func (b *brick) along(a *brick) (half [3]float64, ok bool) {
	for i, e := range a.axis {
		ok = false
		for k, f := range b.axis {
			if r3.Norm(r3.Cross(e, f)) < 4*0x1p-53 {
				half[i], ok = b.half[k], true
			}
		}
		if !ok {
			return half, false
		}
	}
	return half, true
}

func (b *brick) components(v r3.Vec) [3]float64 {
	return [3]float64{r3.Dot(v, b.axis[0]), r3.Dot(v, b.axis[1]), r3.Dot(v, b.axis[2])}
}

func (b *brick) vector(v [3]float64) r3.Vec {
	return r3.Add(r3.Scale(v[0], b.axis[0]), r3.Add(r3.Scale(v[1], b.axis[1]), r3.Scale(v[2], b.axis[2])))
}

// boxes returns what one box does to another with parallel edges and any directions of uniform polarization; ok is false if they
// are no such boxes, or so far apart that the form loses too many digits.
func boxes(p *part, o *other, g goal, about r3.Vec) (out outcome, ok bool) {
	if p.charge == nil || o.charge == nil || g.stiff {
		return out, false
	}
	a, ok := brickOf(p.charge)
	if !ok {
		return out, false
	}
	b, ok := brickOf(o.charge)
	if !ok {
		return out, false
	}
	b = b.mirrored(o)
	half, ok := b.along(&a)
	if !ok {
		return out, false
	}
	c := corners{on: a.half, from: half, d: a.components(a.centre.Sub(b.centre).Value())}
	pa, pb := a.components(a.p), a.components(b.p)
	c.sum(&pa, &pb)
	const k = 1 / (4 * math.Pi)
	f := r3.Scale(k, a.vector(c.force))
	own := r3.Add(r3.Scale(k, a.vector(c.torque)), r3.Cross(a.p, r3.Scale(k, a.vector(c.mean))))
	arm := r3.Sub(a.centre.Value(), about)
	s := &out.total
	s.push(f, r3.Add(own, r3.Cross(arm, f)), -k*c.energy)
	moment := r3.Norm(a.p) * r3.Norm(b.p) * k
	reach := math.Hypot(half[0], math.Hypot(half[1], half[2]))
	away := math.Pow(min(1, reach/math.Sqrt(c.d[0]*c.d[0]+c.d[1]*c.d[1]+c.d[2]*c.d[2])), 3)
	c.faces, c.volumes = away*c.faces, away*c.volumes
	s.size = Bounds{Force: moment * c.faces, Torque: moment * (c.faces*r3.Norm(arm) + c.volumes), Energy: moment * c.volumes}
	s.err = Bounds{Force: lost * moment * c.sizes2, Torque: lost * moment * (c.sizes3 + c.sizes2*r3.Norm(arm)), Energy: lost * moment * c.sizes3}
	return out, out.settle(s, s, g)
}

// lost is the rounding of the sum over corners relative to the sizes of their terms: measured at most 0.2 u (TestBoxesRounding).
const lost = 0x1p-53

// corners sums over the 64 pairs of corners of two boxes with parallel edges; d is the place of the one that is acted on as seen from
// the other, by half sizes.
//
// With E the integral of 1/r over both boxes, polarizations p (acted on) and q,
//
//	W = -p_i q_j d_i d_j E/4pi,   F_l = p_i q_j d_i d_j d_l E/4pi,   T = p x int g + int r x (p.d) g.
//
// E is the sum of s_i Phi(U, V, W) over the differences of the corners, where d_x^2 d_y^2 d_z^2 Phi = 1/r. With L_x = asinh(x/hypot(y,z)),
// A_x = atan(yz/(x r)), a, b, c any order of the axes:
//
//	Phi_aa  = b (c^2 - a^2)/2 L_b + c (b^2 - a^2)/2 L_c - abc A_a + r (2a^2 - b^2 - c^2)/6
//	Phi_ab  = abc L_c + b (3c^2 - b^2)/6 L_a + a (3c^2 - a^2)/6 L_b - c^3/6 A_c - c b^2/2 A_b - c a^2/2 A_a - ab r/3
//	Phi_aab = -(a^2 - c^2)/2 L_b + bc L_c - ca A_a - b r/2
//	Phi_abc = ab L_c + bc L_a + ca L_b - (a^2 A_a + b^2 A_b + c^2 A_c)/2
//	Phi_aaa = -Phi_bba - Phi_cca         (E is harmonic as long as the boxes do not overlap)
//
// The torque needs the integrals over a of derivatives by the other axes: of Phi_ccb
//
//	a (a^2 - 3c^2)/6 L_b + b (6a^2 - 3c^2 - b^2)/12 L_a + c (c^2 - 3a^2)/6 A_c - 5ab r/12.
//
// Nothing is infinite in contact: a logarithm or angle that is not defined has the factor zero.
//
// Source: principle and force for parallel polarizations [Akoun1984]; Phi_aa, Phi_ab [Newell1993] (from memory); the rest derived by
// differentiation and integration, all checked against quadrature in TestReference and TestBoxesFaces.
type corners struct {
	on, from, d         [3]float64
	force, torque, mean [3]float64
	energy              float64
	faces, volumes      float64 // sizes of the values
	sizes2, sizes3      float64 // sums of squares and cubes of the distances, with logarithms
}

// sum adds all corners.
func (c *corners) sum(p, q *[3]float64) {
	var m [3][3]float64
	for i := range m {
		for j := range m {
			m[i][j] = p[i] * q[j]
		}
	}
	var s2 [3]float64
	for n := range 64 {
		sign := 1.0
		var x [3]float64
		for k := range 3 {
			s1, t := float64(1-n>>(2*k)&1*2), float64(1-n>>(2*k+1)&1*2)
			x[k] = c.d[k] + t*c.on[k] + s1*c.from[k]
			s2[k] = t * c.on[k]
			sign *= s1 * t
		}
		c.corner(sign, &x, &s2, &m, q)
	}
	least := math.Inf(1)
	for k := range 3 {
		least = min(least, c.on[k], c.from[k])
	}
	c.volumes = 8 * min(c.on[0]*c.on[1]*c.on[2], c.from[0]*c.from[1]*c.from[2])
	c.faces = c.volumes / least
}

// corner adds one pair of corners.
func (c *corners) corner(sign float64, x, arm *[3]float64, m *[3][3]float64, q *[3]float64) {
	k := primitives(x)
	var v [3]float64 // m_ij Phi_ijl
	var d2 [3][3]float64
	for i := range 3 {
		d2[i][i] = k.twice(i)
		for j := i + 1; j < 3; j++ {
			d2[i][j] = k.mixed(i, j)
			d2[j][i] = d2[i][j]
		}
	}
	var d3 [3][3]float64 // [a][b]: Phi_aab, a != b
	for a := range 3 {
		for b := range 3 {
			if a != b {
				d3[a][b] = k.twoOne(a, b)
			}
		}
	}
	abc := k.each()
	for l := range 3 {
		i, j := (l+1)%3, (l+2)%3
		v[l] = m[l][l]*(-d3[i][l]-d3[j][l]) + m[i][i]*d3[i][l] + m[j][j]*d3[j][l] +
			(m[i][l]+m[l][i])*d3[l][i] + (m[j][l]+m[l][j])*d3[l][j] + (m[i][j]+m[j][i])*abc
	}
	for l := range 3 {
		c.force[l] += sign * v[l]
		e := 0.0
		for j := range 3 {
			e += q[j] * d2[j][l]
			c.energy += sign * m[l][j] * d2[l][j]
		}
		c.mean[l] += sign * e
	}
	for l := range 3 {
		for _, a := range [2]int{(l + 1) % 3, (l + 2) % 3} {
			// moment arm along a, force along l: component along the third axis, positive for a = l+2
			o := 3 - a - l
			t := arm[a]*v[l] - k.turning(m, &d2, a, l)
			if (a+1)%3 == l {
				c.torque[o] += sign * t
			} else {
				c.torque[o] -= sign * t
			}
		}
	}
	r2 := k.r * k.r * (1 + math.Abs(k.l[0]) + math.Abs(k.l[1]) + math.Abs(k.l[2]))
	c.sizes2 += r2
	c.sizes3 += r2 * k.r
}

// corner functions of one place.
type primitive struct {
	x, l, a [3]float64
	r       float64
}

func primitives(x *[3]float64) (k primitive) {
	k.x = *x
	xx, yy, zz := x[0]*x[0], x[1]*x[1], x[2]*x[2]
	k.r = math.Sqrt(xx + yy + zz)
	k.l = [3]float64{arsinh(x[0], k.r, yy+zz), arsinh(x[1], k.r, xx+zz), arsinh(x[2], k.r, xx+yy)}
	k.a = [3]float64{angle(x[1]*x[2], x[0]*k.r), angle(x[0]*x[2], x[1]*k.r), angle(x[0]*x[1], x[2]*k.r)}
	return k
}

// arsinh returns asinh(x/sqrt(q)) with r^2 = x^2 + q; zero for q = 0, where its factors vanish.
func arsinh(x, r, q float64) float64 {
	if q == 0 {
		return 0
	}
	a := math.Abs(x)
	h := math.Sqrt(q)
	return math.Copysign(math.Log1p((a+a*a/(r+h))/h), x)
}

func angle(y, x float64) float64 {
	if x == 0 {
		return 0
	}
	return math.Atan(y / x)
}

func (k *primitive) twice(a int) float64 {
	b, c := (a+1)%3, (a+2)%3
	x, y, z := k.x[a], k.x[b], k.x[c]
	return y/2*(z*z-x*x)*k.l[b] + z/2*(y*y-x*x)*k.l[c] - x*y*z*k.a[a] + k.r/6*(2*x*x-y*y-z*z)
}

func (k *primitive) mixed(a, b int) float64 {
	c := 3 - a - b
	x, y, z := k.x[a], k.x[b], k.x[c]
	return x*y*z*k.l[c] + y/6*(3*z*z-y*y)*k.l[a] + x/6*(3*z*z-x*x)*k.l[b] - z*z*z/6*k.a[c] - z*y*y/2*k.a[b] - z*x*x/2*k.a[a] - x*y*k.r/3
}

func (k *primitive) twoOne(a, b int) float64 {
	c := 3 - a - b
	x, y, z := k.x[a], k.x[b], k.x[c]
	return (z*z-x*x)/2*k.l[b] + y*z*k.l[c] - z*x*k.a[a] - k.r*y/2
}

func (k *primitive) each() float64 {
	x, y, z := k.x[0], k.x[1], k.x[2]
	return x*y*k.l[2] + y*z*k.l[0] + z*x*k.l[1] - (x*x*k.a[0]+y*y*k.a[1]+z*z*k.a[2])/2
}

// integral returns the integral over a of Phi_ccb.
func (k *primitive) integral(a, c, b int) float64 {
	x, y, z := k.x[a], k.x[b], k.x[c]
	return x/6*(x*x-3*z*z)*k.l[b] + y/12*(6*x*x-3*z*z-y*y)*k.l[a] + z/6*(z*z-3*x*x)*k.a[c] - 5.0/12*x*y*k.r
}

// turning returns m_ij times the integral over a of Phi_ijl, l != a.
func (k *primitive) turning(m, d2 *[3][3]float64, a, l int) float64 {
	o := 3 - a - l
	sum := m[a][a]*d2[a][l] + (m[a][l]+m[l][a])*d2[l][l] + (m[a][o]+m[o][a])*d2[o][l]
	ool := k.integral(a, o, l)
	return sum + m[l][l]*(-d2[a][l]-ool) + m[o][o]*ool + (m[l][o]+m[o][l])*k.integral(a, l, o)
}
