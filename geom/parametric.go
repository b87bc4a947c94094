package geom

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// Parametric is a body of the caller's faces, curved or flat: Patch, any other Charted surface, or a caller's own.
// NewParametric makes it. Faces: those given, in their order.
//
// Domain: the faces are to be smooth, each chart of moderate size (about a quarter turn), and to meet only in edges.
// Accuracy: volume and moments are good to 1e-9 of the size, or NewParametric refuses. Locate finds the nearest point of the
// faces from 9 x 9 points of each chart.
type Parametric struct {
	faces    []Face
	cells    []Cell
	sampled  []sampledChart
	bounds   r3.Box
	extent   float64 // half the diagonal of the bounds
	volume   float64
	centroid r3.Vec
	second   [3][3]float64
}

// closed is how well the faces must close the body, relative to what their area would carry.
const closed = 1e-9

// NewParametric returns the body that the faces bound. Without cells it is filled by those between its centroid and its
// faces, which count with their sign; that suits every field without a singularity outside the body.
//
// It refuses faces without charts, faces whose integrals do not settle, that do not close, or are turned inward, and cells
// that do not add up to the volume.
func NewParametric(faces []Face, cells ...Cell) (*Parametric, error) {
	if len(faces) == 0 {
		return nil, errors.New("geom: parametric body has no faces; give faces that close it")
	}
	p := &Parametric{faces: append([]Face(nil), faces...), cells: append([]Cell(nil), cells...), bounds: nothing()}
	for f, face := range faces {
		if c, ok := face.Surface.(interface{ Check() error }); ok {
			if err := c.Check(); err != nil {
				return nil, fmt.Errorf("geom: parametric body, face %d (%s): %s", f, face.Name, strings.TrimPrefix(err.Error(), "geom: "))
			}
		}
		s, ok := face.Surface.(Charted)
		if !ok || len(s.Charts()) == 0 {
			return nil, fmt.Errorf("geom: parametric body, face %d (%s) is a %T without charts; give a surface with Charts, for example a Patch", f, face.Name, face.Surface)
		}
		for _, c := range s.Charts() {
			part := sampleChart(c)
			part.face, part.sign = f, face.Sign()
			p.sampled = append(p.sampled, part)
			p.bounds = include(include(p.bounds, part.box.Min), part.box.Max)
		}
	}
	p.extent = r3.Norm(r3.Sub(p.bounds.Max, p.bounds.Min)) / 2
	if err := checkLength("parametric body half diagonal", p.extent); err != nil {
		return nil, err
	}
	if err := p.measure(); err != nil {
		return nil, err
	}
	if len(cells) == 0 {
		for _, face := range p.faces {
			p.cells = append(p.cells, CurvedPyramid{p.centroid, face})
		}
		return p, nil
	}
	sum := 0.0
	for _, c := range cells {
		sum += c.Volume()
	}
	if !(math.Abs(sum-p.volume) <= closed*p.volume) {
		return nil, fmt.Errorf("geom: parametric body has the volume %.10g within its faces, but its cells add up to %.10g; give cells that fill it", p.volume, sum)
	}
	return p, nil
}

// fluxes are integrals over the faces, in coordinates from the middle of the bounds in units of the extent.
type fluxes struct {
	area   float64
	normal r3.Vec        // of n: zero if closed
	by     [3]float64    // of x n_x, y n_y, z n_z: the volume, each
	first  r3.Vec        // of x (x.n)/4: the integral of x over the volume
	second [3][3]float64 // of x x^T (x.n)/5: that of x x^T
}

// flux integrates with n points a direction on each chart.
func (p *Parametric) flux(n int) (s fluxes) {
	rule := legendre(n, 0, 1)
	middle := r3.Scale(0.5, r3.Add(p.bounds.Min, p.bounds.Max))
	for _, part := range p.sampled {
		for _, u := range rule {
			for _, v := range rule {
				x, xu, xv := part.chart.At(u.x, v.x)
				w := part.sign * u.w * v.w / (p.extent * p.extent)
				s.add(r3.Scale(1/p.extent, r3.Sub(x, middle)), r3.Scale(w, r3.Cross(xu, xv)))
			}
		}
	}
	return s
}

// add adds the oriented area a at x.
func (s *fluxes) add(x, a r3.Vec) {
	s.area += r3.Norm(a)
	s.normal = r3.Add(s.normal, a)
	c, d := [3]float64{x.X, x.Y, x.Z}, [3]float64{a.X, a.Y, a.Z}
	out := r3.Dot(x, a)
	s.first = r3.Add(s.first, r3.Scale(out/4, x))
	for i := range c {
		s.by[i] += c[i] * d[i]
		for j := range c {
			s.second[i][j] += c[i] * c[j] * out / 5
		}
	}
}

// volume returns the mean of the three volumes.
func (s *fluxes) volume() float64 { return (s.by[0] + s.by[1] + s.by[2]) / 3 }

// measure integrates over the faces until the sums settle, checks that they close, and keeps volume and moments.
func (p *Parametric) measure() error {
	s, settled := p.flux(12), false
	for _, n := range []int{20, 32, 48} {
		t := p.flux(n)
		settled = r3.Norm(r3.Sub(s.normal, t.normal))+math.Abs(s.area-t.area)+math.Abs(s.volume()-t.volume()) <= 0.1*closed*t.area
		s = t
		if settled {
			break
		}
	}
	e := p.extent
	if !settled {
		return fmt.Errorf("geom: parametric body has faces of area %v that do not settle with 48 points; cut them into more charts, at kinks first", s.area*e*e)
	}
	if gap := r3.Norm(s.normal); !(gap <= closed*s.area) {
		return fmt.Errorf("geom: parametric body is open: the outward normal over its faces of area %v sums to %v, not to zero; add the missing face or turn the one that is reversed", s.area*e*e, r3.Scale(e*e, s.normal))
	}
	volume := s.volume()
	for _, v := range s.by {
		if !(math.Abs(v-volume) <= closed*s.area) {
			return fmt.Errorf("geom: parametric body is open: its volume counted along x, y and z is %v, %v and %v; add the missing face or turn the one that is reversed", s.by[0]*e*e*e, s.by[1]*e*e*e, s.by[2]*e*e*e)
		}
	}
	switch {
	case volume < -closed*s.area:
		return fmt.Errorf("geom: parametric body has the volume %v; its faces are turned inward, set or clear Inward on each", volume*e*e*e)
	case volume <= closed*s.area:
		return fmt.Errorf("geom: parametric body encloses no volume (%v within faces of area %v); correct the faces", volume*e*e*e, s.area*e*e)
	}
	c := r3.Scale(1/volume, s.first)
	p.volume = volume * e * e * e
	p.centroid = r3.Add(r3.Scale(0.5, r3.Add(p.bounds.Min, p.bounds.Max)), r3.Scale(e, c))
	d := [3]float64{c.X, c.Y, c.Z}
	for i := range d {
		for j := range d {
			p.second[i][j] = (s.second[i][j] - volume*d[i]*d[j]) * e * e * e * e * e
		}
	}
	return nil
}

// Check refuses a body that NewParametric did not make.
func (p *Parametric) Check() error {
	if p == nil || p.volume == 0 {
		return errors.New("geom: parametric body was not made by NewParametric; make it there")
	}
	return nil
}

// Bounds returns a box along the axes that contains the body, see Patch.Bounds.
func (p *Parametric) Bounds() r3.Box { return p.bounds }

// Volume returns the volume.
func (p *Parametric) Volume() float64 { return p.volume }

// Centroid returns the centre of volume.
func (p *Parametric) Centroid() r3.Vec { return p.centroid }

// SecondMoment returns the second moment about the centroid.
func (p *Parametric) SecondMoment() [3][3]float64 { return p.second }

// Faces returns the faces.
func (p *Parametric) Faces() []Face { return append([]Face(nil), p.faces...) }

// Cells returns the cells given, else those between the centroid and the faces.
func (p *Parametric) Cells() []Cell { return append([]Cell(nil), p.cells...) }
