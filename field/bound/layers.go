package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// nodes returns how many points a direction integrate charges and moments: exactly for polynomials (p, r r^T, one factor n
// more on curved faces), and closely for the rest.
func (c *Charge) nodes() int {
	if n, ok := degree(c.p); ok {
		return n/2 + 5
	}
	return 20
}

// fill computes layers and volumes, then checks the identities.
func (c *Charge) fill() (err error) {
	if c.resolved, err = c.resolve(); err != nil {
		return err
	}
	var sums identitySums
	outer := c.body.Faces()
	for i, f := range c.local.Faces() {
		c.Layers = append(c.Layers, c.layer(i, f, outer[i], &sums))
	}
	cells := c.body.Cells()
	for i, cell := range c.local.Cells() {
		c.Volumes = append(c.Volumes, c.volume(i, cell, cells[i], &sums))
	}
	moment := sums.moment
	if a, ok := c.p.(field.Affine); ok {
		moment = r3.Scale(c.local.Volume(), a.At(c.local.Centroid()))
	}
	c.Moment = c.pose.VectorToOuter(moment)
	if c.Identities, err = sums.check(c, c.coarseSums()); err != nil {
		return err
	}
	return c.checkDivergence()
}

// coarseSums returns the sums of a coarser rule, whose difference from the finer one bounds what quadrature misses; nil where
// the rule is exact.
func (c *Charge) coarseSums() *identitySums {
	if _, ok := degree(c.p); ok {
		return nil
	}
	s := new(identitySums)
	const n = 12
	for _, f := range c.local.Faces() {
		f.Surface.Nodes(n, func(x, normal r3.Vec, w float64) {
			normal = r3.Scale(f.Sign(), normal)
			s.addFace(x, normal, w, c.sigma(x, normal))
		})
	}
	for _, cell := range c.local.Cells() {
		cell.Nodes(n, func(x r3.Vec, w float64) {
			if rho := c.rho(x); rho-rho == 0 { // else on the singular line itself
				s.addCell(x, w, rho, c.p.At(x))
			}
		})
	}
	return s
}

// layer integrates sigma over face number i of the body in its own frame.
func (c *Charge) layer(i int, f, outer geom.Face, sums *identitySums) Layer {
	l := Layer{Face: outer, Area: f.Surface.Area()}
	var q, size float64
	c.faceNodes(i, f, c.nodes(), func(x, n r3.Vec, w float64) {
		p := c.p.At(x)
		sigma := r3.Dot(p, n)
		if sigma-sigma != 0 { // on the singular line of a face that carries nothing
			sigma, p = 0, r3.Vec{}
		}
		q += w * sigma
		size += w * (math.Abs(sigma) + math.Abs(p.X*n.X) + math.Abs(p.Y*n.Y) + math.Abs(p.Z*n.Z))
		sums.addFace(x, n, w, sigma)
	})
	l.Charge = clean(q, size)
	l.Min, l.Max = c.extremes(f)
	if n, ok := planeNormal(f); ok {
		l.Plane = true
		if l.Min == l.Max {
			l.Charge = l.Min * l.Area
		}
		l.Normal = c.pose.VectorToOuter(n)
	}
	return l
}

// volume integrates rho over cell number i of the body in its own frame.
func (c *Charge) volume(i int, cell, outer geom.Cell, sums *identitySums) Volume {
	v := Volume{Cell: outer, Size: cell.Volume()}
	var q, size float64
	c.cellNodes(i, cell, c.nodes(), func(x r3.Vec, w float64) {
		rho := c.rho(x)
		q, size = q+w*rho, size+math.Abs(w*rho)
		sums.addCell(x, w, rho, c.p.At(x))
	})
	if c.resolved != nil && c.resolved.whole && len(c.local.Cells()) > 1 { // then q is that of all cells
		q, size = c.cellCharge(cell, q, size)
	}
	v.Charge = clean(q, size)
	v.Min, v.Max = c.extremesInside(cell)
	if v.Min == v.Max {
		v.Charge = v.Min * v.Size
	}
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
