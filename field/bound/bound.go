// Package bound turns a body and its polarization into bound charge: sigma = p.n on every face, rho = -div p in every
// cell. The result is a field.Source, and it says what each face and cell carries.
//
// Units are natural (package field): densities in the unit of p, charges in that times length^2. Frame: that in which the
// body is given; the polarization is in the body's own frame and turns with it if the body is placed (geom.At). Normals
// point outward. Everything is immutable once built and safe for concurrent use.
//
// The package does not solve for induced polarization, and it does not give units to the result: see charge and magnet.
package bound

import (
	"errors"
	"math"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// ErrUnsupported is wrapped by the error for a pair of body and polarization that has no integrator.
var ErrUnsupported = errors.New("no integrator for this body and polarization")

// Charge is the bound charge of one body.
type Charge struct {
	Layers     []Layer    // one a face, in the order of the body's faces
	Volumes    []Volume   // one a cell
	Moment     r3.Vec     // integral of p over the volume: the dipole moment
	Identities []Identity // what must vanish, and how far it does

	body     geom.Body    // as given, perhaps placed
	inner    geom.Locator // tells points of the body's own frame
	place    geom.Locator // tells points of the outer frame
	local    geom.Body    // in its own frame
	pose     geom.Pose
	p        field.Polarization // in the body's own frame
	resolved *resolved          // of a power law
	own      field.Source       // in the body's own frame
	source   field.Source       // in the outer frame
}

// Layer is what one face carries.
type Layer struct {
	Face     geom.Face // in the outer frame
	Area     float64
	Charge   float64 // integral of sigma
	Min, Max float64 // extremes of sigma over the face
	Normal   r3.Vec  // outward unit normal if Plane, in the outer frame
	Plane    bool
}

// Volume is what one cell carries.
type Volume struct {
	Cell     geom.Cell // in the outer frame
	Size     float64
	Charge   float64 // integral of rho
	Min, Max float64 // extremes of rho over the cell
}

// Of returns the bound charge of a body with polarization p.
//
// It fails if the body's Check fails, if p is not finite, if the identities of bound charge do not hold (a face whose
// normal points inward and a divergence that disagrees with p are named, with both numbers and the place), or with
// ErrUnsupported.
func Of(body geom.Body, p field.Polarization) (*Charge, error) {
	if body == nil || p == nil {
		return nil, errors.New("bound: body or polarization is nil; give both")
	}
	if err := body.Check(); err != nil {
		return nil, err
	}
	p, err := simplest(p)
	if err != nil {
		return nil, err
	}
	c := &Charge{body: body, local: body, p: p}
	if at, ok := body.(geom.Placed); ok {
		c.local, c.pose = at.Body, at.Pose
	}
	c.inner = geom.LocatorOf(c.local)
	c.place = c.inner
	if _, ok := body.(geom.Placed); ok {
		c.place = geom.LocatorAt(c.inner, c.local.Bounds(), c.pose)
	}
	if err := c.fill(); err != nil {
		return nil, err
	}
	c.own, err = c.evaluator()
	if err != nil {
		return nil, err
	}
	c.source = c.own
	if _, ok := body.(geom.Placed); ok {
		c.source = field.Posed{Source: c.own, Pose: c.pose}
	}
	return c, nil
}

// At returns the same charge with its body moved by a pose, without building it anew.
func (c *Charge) At(pose geom.Pose) *Charge {
	d := *c
	d.body, d.pose = geom.At(c.body, pose), c.pose.Then(pose)
	d.place = geom.LocatorAt(c.inner, c.local.Bounds(), d.pose)
	d.source = field.Posed{Source: c.own, Pose: d.pose}
	d.Moment = pose.VectorToOuter(c.Moment)
	d.Layers, d.Volumes = slices.Clone(c.Layers), slices.Clone(c.Volumes)
	for i, f := range d.body.Faces() {
		d.Layers[i].Face = f
		d.Layers[i].Normal = pose.VectorToOuter(c.Layers[i].Normal)
	}
	for i, cell := range d.body.Cells() {
		d.Volumes[i].Cell = cell
	}
	return &d
}

// Body returns the body as it was given.
func (c *Charge) Body() geom.Body { return c.body }

// Locate tells where a point lies with respect to the body, faster than the body itself for many points.
func (c *Charge) Locate(x pair.Vec, slack float64) geom.Place { return c.place.Locate(x, slack) }

// Polarization returns p at a point of the outer frame, continued outside the body.
func (c *Charge) Polarization(x pair.Vec) r3.Vec {
	return c.pose.VectorToOuter(c.p.At(c.pose.ToLocal(x).Value()))
}

// Density returns sigma of a layer at a point of its face with outward normal n, in the outer frame.
func (c *Charge) Density(x, n r3.Vec) float64 { return r3.Dot(c.Polarization(pair.VecOf(x)), n) }

// VolumeDensity returns rho at a point of the outer frame, continued outside the body.
func (c *Charge) VolumeDensity(x r3.Vec) float64 {
	return -c.p.Divergence(c.pose.ToLocal(pair.VecOf(x)).Value()) + 0 // no negative zero
}

// Field returns g at x.
func (c *Charge) Field(x r3.Vec) r3.Vec { return c.source.Field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (c *Charge) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Evaluate(c.source, dst, at, side)
}

// Bounds returns the box of the body.
func (c *Charge) Bounds() r3.Box { return c.body.Bounds() }

// Total returns the sum of all charges: zero, for bound charge.
func (c *Charge) Total() float64 {
	var q, size float64
	for _, l := range c.Layers {
		q, size = q+l.Charge, size+math.Abs(l.Charge)
	}
	for _, v := range c.Volumes {
		q, size = q+v.Charge, size+math.Abs(v.Charge)
	}
	return clean(q, size)
}

// clean returns exactly zero for what only rounding has left of a sum whose terms have the magnitude size.
func clean(q, size float64) float64 {
	if math.Abs(q) <= 64*0x1p-53*size {
		return 0
	}
	return q
}
