package bound

import (
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// nodes is how many points a direction integrate what the report needs exactly: p is linear, r r^T quadratic, one factor
// n more on curved faces.
const nodes = 6

// fill computes layers and volumes, then checks the identities.
func (c *Charge) fill() error {
	var sums identitySums
	outer := c.body.Faces()
	for i, f := range c.local.Faces() {
		c.Layers = append(c.Layers, c.layer(f, outer[i], &sums))
	}
	cells := c.body.Cells()
	for i, cell := range c.local.Cells() {
		c.Volumes = append(c.Volumes, c.volume(cell, cells[i], &sums))
	}
	c.Moment = c.pose.VectorToOuter(r3.Scale(c.local.Volume(), c.p.At(c.local.Centroid())))
	var err error
	c.Identities, err = sums.check(c)
	return err
}

// layer integrates sigma over one face of the body in its own frame.
func (c *Charge) layer(f, outer geom.Face, sums *identitySums) Layer {
	l := Layer{Face: outer, Area: f.Surface.Area()}
	var q, size float64
	s := f.Sign()
	f.Surface.Nodes(nodes, func(x, n r3.Vec, w float64) {
		n = r3.Scale(s, n)
		sigma := r3.Dot(c.p.At(x), n)
		q += w * sigma
		size += w * (math.Abs(sigma) + math.Abs(c.p.At(x).X*n.X) + math.Abs(c.p.At(x).Y*n.Y) + math.Abs(c.p.At(x).Z*n.Z))
		sums.addFace(x, n, w, sigma)
	})
	l.Charge = clean(q, size)
	l.Min, l.Max = c.extremes(f)
	if n, ok := planeNormal(f); ok {
		l.Plane = true
		l.Normal = c.pose.VectorToOuter(n)
	}
	return l
}

// volume integrates rho over one cell of the body in its own frame.
func (c *Charge) volume(cell, outer geom.Cell, sums *identitySums) Volume {
	rho := -c.p.Divergence(r3.Vec{}) + 0 // no negative zero
	v := Volume{Cell: outer, Size: cell.Volume(), Min: rho, Max: rho}
	v.Charge = rho * v.Size
	cell.Nodes(nodes, func(x r3.Vec, w float64) { sums.addCell(x, w, rho, c.p.At(x)) })
	return v
}

// planeNormal returns the outward normal of a plane face.
func planeNormal(f geom.Face) (r3.Vec, bool) {
	switch f.Surface.(type) {
	case geom.Polygon, geom.Disc, geom.Annulus:
	default:
		return r3.Vec{}, false
	}
	var n r3.Vec
	f.Surface.Nodes(1, func(_, normal r3.Vec, _ float64) { n = normal })
	return r3.Add(r3.Scale(f.Sign(), n), r3.Vec{}), true
}

// extremes returns the smallest and largest sigma over a face of the body in its own frame: exact for plane faces and for
// uniform polarization, where sigma = p.n reaches its bounds in known places.
func (c *Charge) extremes(f geom.Face) (lo, hi float64) {
	lo, hi = math.Inf(1), math.Inf(-1)
	see := func(v float64) { lo, hi = min(lo, v), max(hi, v) }
	n, plane := planeNormal(f)
	at := func(x r3.Vec) { see(r3.Dot(c.p.At(x), n) + 0) }
	g := &c.p.Gradient
	gamma := r3.Vec{ // gradient of sigma on a plane face
		X: g[0][0]*n.X + g[1][0]*n.Y + g[2][0]*n.Z,
		Y: g[0][1]*n.X + g[1][1]*n.Y + g[2][1]*n.Z,
	}
	round := func(radius, z float64) { // the circle of that radius, in the plane at z
		at(r3.Vec{Z: z})
		if k := math.Hypot(gamma.X, gamma.Y); k > 0 {
			at(r3.Vec{X: radius * gamma.X / k, Y: radius * gamma.Y / k, Z: z})
			at(r3.Vec{X: -radius * gamma.X / k, Y: -radius * gamma.Y / k, Z: z})
		}
	}
	switch s := f.Surface.(type) {
	case geom.Polygon:
		for _, v := range s.Vertices {
			at(v)
		}
	case geom.Disc:
		round(s.Radius, s.Z)
	case geom.Annulus:
		round(s.Outer, s.Z)
	case geom.Wall:
		for _, z := range [2]float64{s.Z1, s.Z2} {
			p := c.p.At(r3.Vec{Z: z})
			k := math.Hypot(p.X, p.Y)
			see(-k + 0)
			see(k)
		}
	case geom.SphereSurface, geom.EllipsoidSurface:
		k := r3.Norm(c.p.At(r3.Vec{}))
		see(-k + 0)
		see(k)
	default:
		if !plane {
			f.Surface.Nodes(16, func(x, n r3.Vec, _ float64) { see(f.Sign() * r3.Dot(c.p.At(x), n)) })
		}
	}
	return lo, hi
}
