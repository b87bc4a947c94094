package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// sector is the bound charge of a piece of a tube between two azimuths, or of a whole turn, polarized with an affine p
// and a unit radial one; or the charge of a flat piece of it.
//
// One direction of every face is integrated in closed form, the azimuth by Gauss-Legendre (sectorrule.go). The only
// singularities of what is left lie at the arcs of the outline and, between their heights, at the walls, so flat faces
// and ends may be as close as they like. The ends are plane and have closed forms (facets).
type sector struct {
	unit   float64    // power of two near the size; everything below is in this unit
	radius [2]float64 // inner, 0 for none, and outer
	level  [2]float64 // heights of bottom and top
	sheet  bool       // only the top, a charged sheet
	full   bool       // a whole turn
	wide   bool       // more than half a turn
	from   float64    // azimuth of the beginning, radians
	angle  float64
	end    [2]pair.Vec // unit vectors at the azimuths from and to

	affine field.Affine  // affine p
	value0 r3.Vec        // its value at the origin
	grad   [3][3]float64 // its gradient
	rho    float64       // -trace
	plain  bool          // affine p is zero
	linear bool          // the gradient is not
	bent   bool          // the density of the walls varies along z, or there is volume charge
	bare   [2]bool       // bottom and top carry no charge and no share of the volume charge
	walls  bool          // a wall is charged by the affine p, or has a share of the volume charge
	radial float64       // c of p = c s

	flatCharged, wallCharged, endCharged [2]bool

	ends    *facets    // the ends with the affine p
	current *facets    // the ends with the densities -1 and 1
	layer   [2]*facets // each end with the density s

	box    r3.Box // in the caller's unit
	extent float64
	centre r3.Vec  // of the bounding sphere
	size   float64 // its radius
	far    sectorFar
}

// sectorSpec is what a sector is made of, in the caller's unit; from and to are unit vectors at the ends.
type sectorSpec struct {
	inner, outer, bottom, top float64
	full, sheet               bool
	from, angle               float64
	end                       [2]pair.Vec
	box                       r3.Box
}

func newSector(s sectorSpec, p field.Affine, radial float64) (*sector, error) {
	for i, v := range [...]float64{p.Value.X, p.Value.Y, p.Value.Z, p.About.X, p.About.Y, p.About.Z, p.Gradient[0][0],
		p.Gradient[0][1], p.Gradient[0][2], p.Gradient[1][0], p.Gradient[1][1], p.Gradient[1][2], p.Gradient[2][0],
		p.Gradient[2][1], p.Gradient[2][2], radial} {
		if v-v != 0 {
			return nil, fmt.Errorf("element: number %d of the polarization %+v, %v is %v; give finite numbers", i, p, radial, v)
		}
	}
	b := &sector{full: s.full, sheet: s.sheet, from: s.from, angle: s.angle, wide: s.angle > math.Pi, end: s.end, box: s.box}
	b.unit = math.Ldexp(1, math.Ilogb(math.Hypot(s.outer, 0.5*(s.top-s.bottom))))
	k := 1 / b.unit
	b.radius, b.level = [2]float64{k * s.inner, k * s.outer}, [2]float64{k * s.bottom, k * s.top}
	b.extent = k * geom.OnTolerance(s.box, r3.Vec{}, 0) / (4 * u)
	b.affine = field.Affine{Value: p.Value, About: r3.Scale(k, p.About)}
	b.radial = radial
	for i := range b.grad {
		for j := range b.grad {
			b.grad[i][j] = p.Gradient[i][j] * b.unit
		}
	}
	b.affine.Gradient = b.grad
	b.value0 = b.affine.At(r3.Vec{})
	b.setKinds()
	if !b.full {
		b.setEnds()
	}
	b.enclose()
	return b, nil
}

// setKinds notes what is charged.
func (b *sector) setKinds() {
	g := &b.grad
	b.rho = -(g[0][0] + g[1][1] + g[2][2])
	if b.sheet {
		b.rho = 0
	}
	b.linear = *g != [3][3]float64{}
	b.plain = !b.linear && b.value0 == r3.Vec{}
	b.bent = b.rho != 0 || g[0][2] != 0 || g[1][2] != 0
	across := b.value0.X != 0 || b.value0.Y != 0 || g[0][0] != 0 || g[1][1] != 0 || g[0][1] != -g[1][0] || g[0][2] != 0 || g[1][2] != 0
	b.walls = !b.sheet && (across || b.rho != 0)
	for k, z := range b.level {
		b.flatCharged[k] = (!b.sheet || k == 1) && (b.affine.At(r3.Vec{Z: z}).Z != 0 || g[2][0] != 0 || g[2][1] != 0)
		b.bare[k] = !b.flatCharged[k] && b.rho == 0
		b.wallCharged[k] = !b.sheet && b.radius[k] > 0 && (b.radial != 0 || across)
	}
}

// setEnds makes the faces at the two azimuths.
func (b *sector) setEnds() {
	if b.sheet {
		return
	}
	var verts []pair.Vec
	at := func(e pair.Vec, radius, z float64) int {
		v := e.Scale(pair.Of(radius))
		v.Z = pair.Of(z)
		if radius == 0 { // the ends share their corners on the axis
			for i, w := range verts {
				if w == v {
					return i
				}
			}
		}
		verts = append(verts, v)
		return len(verts) - 1
	}
	var loops [2][]int
	for j, e := range b.end {
		z0, z1 := b.level[j], b.level[1-j]
		loops[j] = []int{at(e, b.radius[0], z0), at(e, b.radius[1], z0), at(e, b.radius[1], z1), at(e, b.radius[0], z1)}
	}
	p := b.affine
	specs := make([]facetSpec, 2)
	for j, loop := range loops {
		n := newell(verts, loop).Value()
		gamma := r3.Vec{X: r3.Dot(column(&b.grad, 0), n), Y: r3.Dot(column(&b.grad, 1), n), Z: r3.Dot(column(&b.grad, 2), n)}
		specs[j] = facetSpec{loop: loop, gamma: gamma, density: func(x r3.Vec) float64 { return r3.Dot(p.At(x), n) }}
		for _, i := range loop {
			b.endCharged[j] = b.endCharged[j] || math.Abs(specs[j].density(verts[i].Value())) > 8*u*b.largest()
		}
	}
	b.ends = b.newEnds(verts, specs, b.rho)
	if b.radial == 0 {
		return
	}
	for j := range specs {
		sigma, e := float64(2*j-1), b.end[j].Value()
		layer := facetSpec{loop: loops[j], gamma: e, density: func(x r3.Vec) float64 { return r3.Dot(x, e) }}
		b.layer[j] = b.newEnds(verts, []facetSpec{layer}, 0)
		specs[j] = facetSpec{loop: loops[j], density: func(r3.Vec) float64 { return sigma }}
	}
	b.current = b.newEnds(verts, specs, 0)
}

// newEnds returns plane faces that count a point as on them where the sector does. Edges are told by the sector.
func (b *sector) newEnds(verts []pair.Vec, specs []facetSpec, rho float64) *facets {
	f := newFacets(verts, specs, rho)
	f.extent = b.extent
	for i := range f.edges {
		f.edges[i].live = false
	}
	return f
}

// column returns column j of m.
func column(m *[3][3]float64, j int) r3.Vec { return r3.Vec{X: m[0][j], Y: m[1][j], Z: m[2][j]} }

// largest returns a bound for |p|.
func (b *sector) largest() float64 {
	g := math.Sqrt(r3.Norm2(column(&b.grad, 0)) + r3.Norm2(column(&b.grad, 1)) + r3.Norm2(column(&b.grad, 2)))
	return r3.Norm(b.value0) + g*(b.radius[1]+math.Abs(b.level[0])+math.Abs(b.level[1])) + math.Abs(b.radial)
}

// polarize sets the affine p and its gradient in the frame of the point, at the height of the body nearest to it: farther
// off p may be large, and the parts of a thin body would cancel.
func (b *sector) polarize(p *sectorPoint) {
	v := b.affine.At(r3.Vec{X: p.x.X, Y: p.x.Y, Z: min(max(p.x.Z, b.level[0]), b.level[1])})
	ax := [3]r3.Vec{p.e, p.t, {Z: 1}}
	p.p = r3.Vec{X: r3.Dot(v, ax[0]), Y: r3.Dot(v, ax[1]), Z: v.Z}
	if !b.linear {
		return
	}
	for i := range ax {
		r := r3.Vec{X: r3.Dot(ax[i], column(&b.grad, 0)), Y: r3.Dot(ax[i], column(&b.grad, 1)), Z: r3.Dot(ax[i], column(&b.grad, 2))}
		for j := range ax {
			p.g[i][j] = r3.Dot(r, ax[j])
		}
	}
}

func (b *sector) field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

func (b *sector) evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

func (b *sector) value(x field.Point, side field.Side, want field.Want) field.Value {
	if b.covers(x) {
		return b.afar(x, want)
	}
	k := 1 / b.unit
	q := field.Point{X: pair.Vec{X: x.X.X.Scale(k), Y: x.X.Y.Scale(k), Z: x.X.Z.Scale(k)}, Slack: k * x.Slack}
	p := b.at(q)
	if p.status == field.OnEdge {
		want = want&^(field.WantG|field.WantGrad) | field.WantPhi
	}
	v := b.here(&p, q, want)
	v.Status = p.status
	switch p.status {
	case field.OnEdge:
		v = onEdge(v)
	case field.OnFace:
		v.G = r3.Add(v.G, r3.Scale(sideSign(side)-p.side, b.halfStep(&p)))
	}
	if want&field.WantGrad != 0 {
		b.gradient(&v, &p, q)
	}
	v.Phi *= b.unit
	v.ErrPhi *= b.unit
	if want&field.WantErr != 0 && v.Status == field.Regular && v.ErrG > 1e-10*b.largest() && v.ErrG > 1e-10*r3.Norm(v.G) {
		v.Status = field.NotConverged
	}
	return v
}

// halfStep returns half the step of g from inside to outside through the face that the point is on.
func (b *sector) halfStep(p *sectorPoint) r3.Vec {
	var n r3.Vec
	for k := range p.onFlat {
		out := float64(2*k - 1)
		switch {
		case p.onFlat[k]:
			n = r3.Vec{Z: out}
		case p.onWall[k]:
			n = r3.Scale(out, p.e)
		case p.onEnd[k]:
			e := b.end[k].Value()
			n = r3.Vec{X: -out * e.Y, Y: out * e.X}
		}
	}
	v := b.affine.At(p.x)
	if b.radial != 0 {
		v = r3.Add(v, r3.Scale(b.radial, p.e))
	}
	return r3.Scale(0.5*r3.Dot(v, n), n)
}

// here returns potential and field in b.unit, on the side of a flat face or wall that the point is on, if by less than tol,
// and the mean on an end.
func (b *sector) here(p *sectorPoint, q field.Point, want field.Want) field.Value {
	s := b.integrate(p, &sectorMain, want&^field.WantErr)
	v := field.Value{Phi: over4P * s.phi, G: r3.Scale(over4P, s.vec(p))}
	if want&field.WantErr != 0 {
		c := b.integrate(p, &sectorCheck, want)
		v.ErrPhi = over4P * (10*math.Abs(c.phi-s.phi) + 8*u*c.sizePhi)
		off := math.Sqrt((c.e-s.e)*(c.e-s.e) + (c.t-s.t)*(c.t-s.t) + (c.z-s.z)*(c.z-s.z))
		v.ErrG = over4P * (10*off + 12*u*c.sizeG)
	}
	if b.full {
		return v
	}
	if b.ends != nil && !b.plain {
		addTimes(&v, b.ends.value(q, field.Mean, want&^field.WantGrad), 1)
	}
	if b.radial != 0 {
		addTimes(&v, b.radialEnds(q, want), b.radial)
	}
	return v
}

// integrate returns what the faces of revolution give, by one rule.
func (b *sector) integrate(p *sectorPoint, rule *sectorRule, want field.Want) (s sectorSum) {
	if b.radial != 0 {
		s = b.radially(p, rule, want)
	}
	s.potential, s.size = want&field.WantPhi != 0, want&field.WantErr != 0
	if b.plain {
		return s
	}
	s.affinely(b, p, rule)
	return s
}

// affinely adds the affine part.
func (s *sectorSum) affinely(b *sector, p *sectorPoint, rule *sectorRule) {
	s.sweep(b, p, rule, false)
	for k := range s.flat {
		if b.bare[k] || b.sheet && k == 0 {
			continue
		}
		if !b.full {
			s.flat[k].addRays(b, p, k)
		}
		s.addFlat(b, p, k)
	}
}

// radially returns what the faces of revolution give of the radial part.
func (b *sector) radially(p *sectorPoint, rule *sectorRule, want field.Want) (s sectorSum) {
	s.potential, s.size = want&field.WantPhi != 0, want&field.WantErr != 0
	s.sweep(b, p, rule, true)
	c, within := b.radial, 4*math.Pi*p.within
	inside := within
	if b.radius[0] == 0 && p.rho <= p.tol { // on the axis p has no direction: the mean over all of them
		inside = 0
	}
	s.e, s.t, s.z = c*(s.e-inside), c*s.t, c*s.z
	s.phi = c * (s.phi + within*p.rho)
	s.sizeG, s.sizePhi = math.Abs(c)*(s.sizeG+within), math.Abs(c)*(s.sizePhi+within*p.rho)
	return s
}

// addTimes adds k w to potential, field and their estimates.
func addTimes(v *field.Value, w field.Value, k float64) {
	v.Phi += k * w.Phi
	v.G = r3.Add(v.G, r3.Scale(k, w.G))
	v.ErrPhi += math.Abs(k) * w.ErrPhi
	v.ErrG += math.Abs(k) * w.ErrG
}
