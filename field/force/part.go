package force

import (
	"math"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// part is a piece of rigid charge on which a field acts: faces with surface charge, and volume charge.
type part struct {
	faces  []face
	blocks []block
	rho    float64       // uniform volume charge within the closed faces, beside blocks
	cells  []geom.Cell   // to sample the dipole density; nil for a sheet
	charge *bound.Charge // nil for a sheet
	centre r3.Vec
	reach  float64 // radius about the centre
}

// face is a piece of surface with its charge.
type face struct {
	surface geom.Surface
	charts  []geom.Chart
	sign    float64                   // of xu x xv for the outward normal
	density func(x, n r3.Vec) float64 // nil: uniform
	sigma   float64                   // if uniform
}

// block is a cell whose charge is not uniform.
type block struct {
	blocks  []geom.Block
	density func(x r3.Vec) float64
}

// partOf takes a charge apart. ok is false where a face has no charts.
func partOf(c *bound.Charge) (p part, ok bool) {
	p.charge = c
	p.centre, p.reach = ballOf(c.Bounds())
	uniform := true
	for i := range c.Volumes {
		v := &c.Volumes[i]
		uniform = uniform && v.Min == v.Max && v.Min == c.Volumes[0].Min
		p.cells = append(p.cells, v.Cell)
	}
	if uniform && len(c.Volumes) > 0 {
		p.rho = c.Volumes[0].Min
	}
	for i := range c.Layers {
		l := &c.Layers[i]
		if l.Min == 0 && l.Max == 0 && p.rho == 0 {
			continue
		}
		s, charted := l.Face.Surface.(geom.Charted)
		if !charted {
			return p, false
		}
		f := face{surface: l.Face.Surface, charts: s.Charts(), sign: l.Face.Sign(), sigma: l.Min}
		if l.Min != l.Max {
			f.density = c.Density
		}
		if len(f.charts) == 0 {
			return p, false
		}
		p.faces = append(p.faces, f)
	}
	if uniform {
		return p, true
	}
	for i := range c.Volumes {
		v := &c.Volumes[i]
		if v.Min == 0 && v.Max == 0 {
			continue
		}
		b, blocked := v.Cell.(geom.Blocked)
		if !blocked || len(b.Blocks()) == 0 {
			return p, false
		}
		p.blocks = append(p.blocks, block{b.Blocks(), c.VolumeDensity})
	}
	return p, true
}

// ballOf returns the centre of a box and half its diagonal.
func ballOf(b r3.Box) (centre r3.Vec, radius float64) {
	return r3.Scale(0.5, r3.Add(b.Min, b.Max)), 0.5 * r3.Norm(r3.Sub(b.Max, b.Min))
}

// gap returns the distance of two boxes along the axes.
func gap(a, b r3.Box) float64 {
	d := func(lo1, hi1, lo2, hi2 float64) float64 { return max(0, lo2-hi1, lo1-hi2) }
	x := d(a.Min.X, a.Max.X, b.Min.X, b.Max.X)
	y := d(a.Min.Y, a.Max.Y, b.Min.Y, b.Max.Y)
	z := d(a.Min.Z, a.Max.Z, b.Min.Z, b.Max.Z)
	return math.Sqrt(x*x + y*y + z*z)
}
