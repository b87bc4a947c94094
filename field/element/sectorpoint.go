package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// sectorPoint is a field point seen from a sector. Its frame has e from the axis to the point, t across it in the sense of
// growing azimuth, and z. What decides near faces and edges is taken in pairs.
type sectorPoint struct {
	roundPoint
	x                     r3.Vec
	t                     r3.Vec        // unit vector across e
	gap                   [2]float64    // radius of the inner and outer wall less rho
	wide                  [2]float64    // the same, kept from zero
	zeta                  [2]float64    // height of bottom and top less z
	up                    [2]float64    // which side of bottom and top: the sign of -zeta
	clamp                 float64       // height of the nearest place of the body less z
	sin                   [2]float64    // of the azimuths of the ends, counted from the point
	cos                   [2]float64    // likewise
	across                [2]float64    // rho sin
	beyond                [2][2]float64 // [end][wall]: radius of the wall less rho cos
	spans                 [4]sectorSpan // what there is of azimuth
	count                 int           // of spans
	onFlat, onWall, onEnd [2]bool
	side                  float64 // 1 outside the flat face or wall that the point is on, by less than tol, -1 inside, 0 exactly on it
	within                float64 // share of a small ball about the point that lies in the body
	status                field.Status

	p r3.Vec        // affine polarization at the height nearest to the point, in its frame
	g [3][3]float64 // its gradient
}

// at returns the point q, in units of b.unit, seen from the sector.
func (b *sector) at(q field.Point) (p sectorPoint) {
	p.roundPoint = newRoundPoint(q, 0, 0)
	p.x = q.X.Value()
	p.tol = q.Slack + 4*u*(r3.Norm(p.x)+b.extent)
	if p.rho == 0 {
		p.e = r3.Vec{X: 1}
	}
	p.t = r3.Vec{X: -p.e.Y, Y: p.e.X}
	p.gap = [2]float64{-p.rho, p.inward(b.radius[1])}
	if b.radius[0] > 0 {
		p.gap[0] = p.inward(b.radius[0])
	}
	for k, z := range b.level {
		p.zeta[k] = -p.height(z)
	}
	if !b.full {
		p.seeEnds(b, q.X)
	}
	p.spans, p.count = sectorParts(quarterTangent(p.sin[0], p.cos[0]), quarterTangent(p.sin[1], p.cos[1]), b.full)
	p.place(b)
	b.polarize(&p)
	return p
}

// seeEnds sets what belongs to the ends of the azimuth.
func (p *sectorPoint) seeEnds(b *sector, x pair.Vec) {
	for j, c := range b.end {
		across := c.Y.Mul(x.X).Sub(c.X.Mul(x.Y))
		along := c.X.Mul(x.X).Add(c.Y.Mul(x.Y))
		p.across[j] = across.Value()
		for i, a := range b.radius {
			p.beyond[j][i] = pair.Of(a).Sub(along).Value()
		}
		if p.rho > 0 {
			p.sin[j], p.cos[j] = p.across[j]/p.rho, along.Value()/p.rho
		} else {
			p.sin[j], p.cos[j] = c.Y.Value(), c.X.Value()
		}
	}
}

// sectorLeast is the distance from the planes and cylinders of the faces, in outer radii, below which it counts as zero. It
// is that small because it must not be seen from 1e-12 off an edge.
const sectorLeast = 0x1p-100

// place finds out where the point lies.
func (p *sectorPoint) place(b *sector) {
	// distances outward of the pairs of faces
	flat := max(p.zeta[0], -p.zeta[1])
	wall := -p.gap[1]
	if b.radius[0] > 0 {
		wall = max(wall, p.gap[0])
	}
	turn := math.Inf(-1)
	if !b.full {
		if b.wide {
			turn = min(p.across[0], -p.across[1])
		} else {
			turn = max(p.across[0], -p.across[1])
		}
		if b.radius[0] == 0 && p.rho <= p.tol { // on the axis, where the ends meet
			turn = 0
		}
	}
	least := sectorLeast * b.radius[1]
	for i := range p.gap {
		if math.Abs(p.gap[i]) < least {
			p.gap[i] = 0
		}
		if math.Abs(p.zeta[i]) < least {
			p.zeta[i] = 0
		}
	}
	p.within = 1
	if out := max(flat, wall, turn); out > p.tol {
		p.within = 0
	} else if out >= -p.tol {
		p.touch(b, turn)
	}
	for k, z := range p.zeta {
		p.up[k] = -sign(z)
	}
	for i, d := range p.gap {
		p.wide[i] = max(math.Abs(d), least)
	}
	p.clamp = max(p.zeta[0], 0) + min(p.zeta[1], 0)
}

// touch marks the faces that the point is on, and sets the status.
func (p *sectorPoint) touch(b *sector, turn float64) {
	var charged [3]bool
	faces := 0
	mark := func(on *bool, out float64, kind int, live bool) { // out: how far outside
		if math.Abs(out) <= p.tol {
			*on = true
			faces++
			if kind == 2 {
				out = 0 // facets answer with the mean
			}
			p.side = sign(out)
			p.within *= 0.5 - 0.5*p.side
			charged[kind] = charged[kind] || live
		}
	}
	for k, z := range p.zeta {
		if !b.sheet || k == 1 {
			mark(&p.onFlat[k], z*float64(1-2*k), 0, b.flatCharged[k])
		}
	}
	for i, d := range p.gap {
		if b.radius[i] > 0 {
			mark(&p.onWall[i], d*float64(1-2*i), 1, b.wallCharged[i])
		}
	}
	if math.Abs(turn) <= p.tol {
		for j := range p.across {
			if p.rho*p.cos[j] >= -p.tol {
				mark(&p.onEnd[j], p.across[j], 2, b.endCharged[j])
			}
		}
	}
	if !charged[0] && !charged[1] && !charged[2] {
		return
	}
	p.status = field.OnFace
	if faces > 1 || b.sheet && (p.onWall[0] || p.onWall[1] || p.onEnd[0] || p.onEnd[1]) {
		p.status = field.OnEdge
	}
}

// scale returns b of the map of the azimuth: the nearest singularity in the complex plane of y. With flat, those of the
// rays in the planes of bottom and top count too.
func (p *sectorPoint) scale(b *sector, flat bool) float64 {
	s := 1.0
	between := p.zeta[0] <= 0 && p.zeta[1] >= 0
	for i, a := range b.radius {
		if a == 0 {
			continue
		}
		e := min(math.Abs(p.zeta[0]), math.Abs(p.zeta[1]))
		if between && !b.sheet {
			e = 0
		}
		s = min(s, sectorScale(max(math.Hypot(p.gap[i], e), p.wide[i]), a, p.rho))
	}
	if flat && p.gap[0] <= 0 && p.gap[1] >= 0 {
		h := max(min(math.Abs(p.zeta[0]), math.Abs(p.zeta[1])), sectorLeast*b.radius[1])
		eta := math.Asinh(h / p.rho)
		s = min(s, math.Tanh(0.25*eta))
	}
	return s
}

// clear returns a lower bound for the distance of the point from the surface.
func (p *sectorPoint) clear(b *sector) float64 {
	out := func(lo, hi float64) float64 { return max(0, lo, -hi) } // how far beyond a range seen as lo..hi
	d := math.Inf(1)
	height := out(p.zeta[0], p.zeta[1])
	if b.full || p.inAzimuth(b) {
		radial := out(p.gap[0], p.gap[1])
		for k, z := range p.zeta {
			if !b.sheet || k == 1 {
				d = min(d, math.Hypot(z, radial))
			}
		}
		for i, g := range p.gap {
			if b.radius[i] > 0 {
				d = min(d, math.Hypot(g, height))
			}
		}
	}
	if !b.full {
		for j, w := range p.across {
			d = min(d, math.Hypot(w, math.Hypot(height, out(p.beyond[j][0], p.beyond[j][1]))))
		}
	}
	return d
}

// inAzimuth reports whether the azimuth of the point is that of the body.
func (p *sectorPoint) inAzimuth(b *sector) bool {
	if b.wide {
		return p.across[0] <= 0 || p.across[1] >= 0
	}
	return p.across[0] <= 0 && p.across[1] >= 0
}
