package bound

import (
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// resolved is the charge of a power law cut up until it is smooth on every part: what sums and integrators of such a law use. A
// polynomial needs none of it.
type resolved struct {
	layers  []*cubature.Layer // one a face, nil where it carries nothing
	volumes []*cubature.Volume
	whole   bool // the volumes are not those of the cells, but one for all of them
}

// resolve cuts up the charge of a power law; nil for other laws and for bodies without charts.
func (c *Charge) resolve() (*resolved, error) {
	k, ok := kinkOf(c.p)
	if !ok {
		return nil, nil
	}
	r := new(resolved)
	for _, f := range c.local.Faces() {
		surface, ok := f.Surface.(geom.Charted)
		if !ok {
			return nil, nil
		}
		if !c.carries(f) {
			r.layers = append(r.layers, nil)
			continue
		}
		l, err := cubature.NewLayer(c.chartsAbout(k, f, surface), c.sigma, nil)
		if err != nil {
			return nil, err
		}
		r.layers = append(r.layers, l)
	}
	if blocks, hollow, ok := c.sweep(k); ok {
		r.whole = true
		v, err := cubature.NewVolume(blocks, c.rho, nil)
		if err != nil {
			return nil, err
		}
		r.volumes = append(r.volumes, v)
		if len(hollow) > 0 {
			if v, err = cubature.NewVolume(hollow, func(x r3.Vec) float64 { return -c.rho(x) }, nil); err != nil {
				return nil, err
			}
			r.volumes = append(r.volumes, v)
		}
		return r, nil
	}
	for _, cell := range c.local.Cells() {
		blocked, ok := cell.(geom.Blocked)
		if !ok {
			return nil, nil
		}
		v, err := cubature.NewVolume(blocked.Blocks(), c.rho, nil)
		if err != nil {
			return nil, err
		}
		r.volumes = append(r.volumes, v)
	}
	return r, nil
}

// sigma is the density of a face with outward normal n in the body's own frame.
func (c *Charge) sigma(x, n r3.Vec) float64 { return r3.Dot(c.p.At(x), n) }

// rho is the density inside in the body's own frame.
func (c *Charge) rho(x r3.Vec) float64 { return -c.p.Divergence(x) + 0 } // no negative zero

// faceNodes visits the points of a rule on face number i with its outward normals: that of n points a direction, or the resolved one.
func (c *Charge) faceNodes(i int, f geom.Face, n int, visit func(x, normal r3.Vec, w float64)) {
	if c.resolved != nil && c.resolved.layers[i] != nil {
		c.resolved.layers[i].Rule(visit)
		return
	}
	s := f.Sign()
	f.Surface.Nodes(n, func(x, normal r3.Vec, w float64) { visit(x, r3.Scale(s, normal), w) })
}

// cellNodes visits the points of a rule in cell number i. Where one resolved rule serves all cells, the first visits it and the others
// nothing.
func (c *Charge) cellNodes(i int, cell geom.Cell, n int, visit func(x r3.Vec, w float64)) {
	switch {
	case c.resolved == nil:
		cell.Nodes(n, visit)
	case !c.resolved.whole:
		c.resolved.volumes[i].Rule(visit)
	case i == 0:
		c.resolved.volumes[0].Rule(visit)
		for _, hollow := range c.resolved.volumes[1:] {
			hollow.Rule(func(x r3.Vec, w float64) { visit(x, -w) })
		}
	}
}

// outward turns the charts of a face so that their normal is the outward one of the body.
func outward(f geom.Face, charts []geom.Chart) []geom.Chart {
	if f.Inward {
		for i := range charts {
			charts[i] = cubature.Reversed{Chart: charts[i]}
		}
	}
	return charts
}
