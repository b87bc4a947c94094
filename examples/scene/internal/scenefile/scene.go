package scenefile

import (
	"math"
	"strconv"

	"example.com/boundpole/magnet/grade"
	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/gonum/spatial/r3"
)

// A Scene is the content of a scene file, checked, with defaults filled in.
// Lengths are in Length.
type Scene struct {
	Title       string    `key:"title"`
	Version     int       `key:"version"`
	Length      Unit      `key:"length"`
	Accuracy    float64   `key:"accuracy"`
	Temperature float64   `key:"temperature"` // °C
	Parts       []Part    `key:"parts"`
	Applied     *Applied  `key:"applied"`
	Planes      []Plane   `key:"planes"`
	Wanted      []Request `key:"wanted"`

	// Skipped lists the accepted keys that this release cannot serve, in the
	// order of the file.
	Skipped []SkippedKey

	doc *document
}

// A SkippedKey is a wish that is left out.
type SkippedKey struct {
	Pointer string // JSON Pointer of the key
	Key     string
	File    string // that will not be written
}

// A Unit is a unit of length: "m", "cm", "mm" or "um".
type Unit string

// Metres returns the length of the unit.
func (u Unit) Metres() float64 {
	switch u {
	case "cm":
		return 1e-2
	case "mm":
		return 1e-3
	case "um":
		return 1e-6
	}
	return 1
}

// Applied is a uniform field from outside; at least one of its fields is set.
type Applied struct {
	E *r3.Vec `key:"E"` // V/m
	B *r3.Vec `key:"B"` // T
}

// A Plane is a wall that mirrors the field; all parts lie where Normal points.
type Plane struct {
	Kind         string   `key:"kind"` // "iron", "conductor" or "dielectric"
	Point        r3.Vec   `key:"point"`
	Normal       r3.Vec   `key:"normal"`       // not 0
	Permittivity *float64 `key:"permittivity"` // of a dielectric plane
}

// A Part is a body, a sheet or a point. At most one of Polarized, Magnetized,
// Charged and Circulating is set, at most one of Rotations and Frame.
type Part struct {
	Name       string        `key:"name"`
	Shape      any           // *Box, *Cylinder, …
	Kind       string        `key:"shape"` // "box", "cylinder", …
	Class      Class         // body, sheet or point
	Centre     r3.Vec        `key:"centre"`
	Rotations  []Rotation    `key:"rotations"`
	Frame      *Frame        `key:"frame"`
	Copies     *Copies       `key:"copies"`
	Scale      float64       `key:"scale"`
	Polarized  *Polarization `key:"polarized"`  // C/m², C·m
	Magnetized *Polarization `key:"magnetized"` // A/m, T, A·m²
	Charged    *Charge       `key:"charged"`    // C/m², C

	Circulating *float64 `key:"circulating"` // T·m

	Permittivity *Relative `key:"permittivity"`
	Permeability *Relative `key:"permeability"`
}

// A Relative is a relative permittivity or permeability, +Inf for "infinite".
type Relative float64

// Names returns the names of the bodies that the part places: its own, or those
// of its copies in order.
func (p *Part) Names() []string {
	if p.Copies == nil {
		return []string{p.Name}
	}
	names := make([]string, p.Copies.Count)
	for i := range names {
		names[i] = p.Name + " " + strconv.Itoa(i+1)
	}
	return names
}

// A Rotation is right-handed about an axis of the scene; Axis is not 0.
type Rotation struct {
	Axis    r3.Vec  `key:"axis"`
	Degrees float64 `key:"degrees"`
}

// A Turn is a Rotation about an axis through a point.
type Turn struct {
	Axis    r3.Vec  `key:"axis"`
	Degrees float64 `key:"degrees"`
	About   r3.Vec  `key:"about"`
}

// A Frame gives a part's axes; Z is not 0, and X, where set, not parallel to it.
type Frame struct {
	Z r3.Vec  `key:"z"`
	X *r3.Vec `key:"x"`
}

// Copies places several bodies instead of one.
type Copies struct {
	Count     int    `key:"count"`
	Step      r3.Vec `key:"step"`
	Rotation  *Turn  `key:"rotation"`
	Alternate bool   `key:"alternate"`
}

// A Polarization is electric or magnetic; exactly one of its fields is set.
type Polarization struct {
	Uniform      *r3.Vec     `key:"uniform"`
	Remanence    *r3.Vec     `key:"remanence"` // T; magnetic only
	Moment       *r3.Vec     `key:"moment"`    // of a point
	Grade        string      `key:"grade"`     // file of grade data, with Along; "" for none
	Along        *r3.Vec     `key:"along"`     // not 0
	Affine       *Affine     `key:"affine"`
	Polynomial   []Term      `key:"polynomial"`
	AxialPower   *AxialPower `key:"axial_power"`
	RadialPower  *Power      `key:"radial_power"`
	CentralPower *Power      `key:"central_power"`

	Data *grade.Grade // content of Grade
}

// An Affine is the law Value + Gradient·(r − About); row i of Gradient is the
// gradient of component i, per unit of length of the file.
type Affine struct {
	Value    r3.Vec    `key:"value"`
	Gradient [3]r3.Vec `key:"gradient"`
	About    r3.Vec    `key:"about"`
}

// A Term is Coefficient·xⁱyʲzᵏ in one component, "x", "y" or "z", lengths in the
// unit of the file.
type Term struct {
	Component   string  `key:"component"`
	Coefficient float64 `key:"coefficient"`
	Powers      [3]int  `key:"powers"`
}

// An AxialPower is the law Coefficient·zⁿ along z.
type AxialPower struct {
	Coefficient float64 `key:"coefficient"`
	Power       int     `key:"power"`
}

// A Power is the law Coefficient·sⁿ away from the z axis, s the distance from it,
// or the same away from the origin.
type Power struct {
	Coefficient float64 `key:"coefficient"`
	Power       float64 `key:"power"`
}

// A Charge is real charge: Density + Gradient·r on a sheet, or Charge at a
// point; exactly one of Density and Charge is set.
type Charge struct {
	Density  *float64 `key:"density"`
	Gradient r3.Vec   `key:"gradient"` // per unit of length of the file
	Charge   *float64 `key:"charge"`
}

// A Box has its edges along x, y, z.
type Box struct {
	Size [3]float64 `key:"size"`
}

// A Cylinder has its axis along z.
type Cylinder struct {
	Radius float64 `key:"radius"`
	Height float64 `key:"height"`
}

// A Tube has its axis along z; Inner < Outer.
type Tube struct {
	Inner  float64 `key:"inner"`
	Outer  float64 `key:"outer"`
	Height float64 `key:"height"`
}

// An Arc is a part of a Tube between two angles about z, in degrees (From, To) or
// in radians (FromRad, ToRad); the other two are nil. Inner may be 0.
type Arc struct {
	Inner   float64  `key:"inner"`
	Outer   float64  `key:"outer"`
	Height  float64  `key:"height"`
	From    *float64 `key:"from"`
	To      *float64 `key:"to"`
	FromRad *float64 `key:"from_rad"`
	ToRad   *float64 `key:"to_rad"`
}

// Angles returns the angles of both ends, and whether they are in degrees.
func (a *Arc) Angles() (from, to float64, degrees bool) {
	if a.From != nil {
		return *a.From, *a.To, true
	}
	return *a.FromRad, *a.ToRad, false
}

// turn returns one turn in the unit of the angles, and what the angles and their
// difference may be off by rounding.
func (a *Arc) turn() (turn, rounding float64) {
	from, to, degrees := a.Angles()
	turn = 2 * math.Pi
	if degrees {
		turn = 360
	}
	return turn, 8 * 0x1p-53 * (math.Abs(from) + math.Abs(to))
}

// Full reports whether the arc is a whole turn, up to the rounding of its ends.
func (a *Arc) Full() bool {
	from, to, _ := a.Angles()
	turn, rounding := a.turn()
	return math.Abs(to-from-turn) <= rounding
}

// A Sphere is centred at the origin.
type Sphere struct {
	Radius float64 `key:"radius"`
}

// A HollowSphere is centred at the origin; Inner < Outer.
type HollowSphere struct {
	Inner float64 `key:"inner"`
	Outer float64 `key:"outer"`
}

// An Ellipsoid has its axes along x, y, z.
type Ellipsoid struct {
	Semiaxes [3]float64 `key:"semiaxes"`
}

// A Cone has its axis along z; one of its radii may be 0.
type Cone struct {
	Bottom float64 `key:"bottom"`
	Top    float64 `key:"top"`
	Height float64 `key:"height"`
}

// A Torus has its axis along z; Minor < Major.
type Torus struct {
	Major float64 `key:"major"` // radius of the centre line
	Minor float64 `key:"minor"` // radius of the ring itself
}

// A Prism stands between z = ∓Height/2 + slope·(x, y); its ends do not meet.
type Prism struct {
	Base        []r2.Vec `key:"base"`
	Height      float64  `key:"height"`
	BottomSlope r2.Vec   `key:"bottom_slope"`
	TopSlope    r2.Vec   `key:"top_slope"`
}

// A Polyhedron has Faces that name its Vertices, counter-clockwise from outside.
type Polyhedron struct {
	Vertices []r3.Vec `key:"vertices"`
	Faces    [][]int  `key:"faces"`
}

// A Polygon is a flat sheet.
type Polygon struct {
	Vertices []r3.Vec `key:"vertices"`
}

// A Disc is a sheet with normal z.
type Disc struct {
	Radius float64 `key:"radius"`
}

// An Annulus is a sheet with normal z; Inner < Outer.
type Annulus struct {
	Inner float64 `key:"inner"`
	Outer float64 `key:"outer"`
}

// A PointShape has no extent.
type PointShape struct{}

// newShape returns a pointer to the struct of a shape.
func newShape(kind string) any {
	switch kind {
	case "box":
		return new(Box)
	case "cylinder":
		return new(Cylinder)
	case "tube":
		return new(Tube)
	case "arc":
		return new(Arc)
	case "sphere":
		return new(Sphere)
	case "hollow_sphere":
		return new(HollowSphere)
	case "ellipsoid":
		return new(Ellipsoid)
	case "cone":
		return new(Cone)
	case "torus":
		return new(Torus)
	case "prism":
		return new(Prism)
	case "polyhedron":
		return new(Polyhedron)
	case "polygon":
		return new(Polygon)
	case "disc":
		return new(Disc)
	case "annulus":
		return new(Annulus)
	case "point":
		return new(PointShape)
	}
	return nil
}

// ErrorAt returns an Error at the place that a JSON Pointer leads to, for faults
// that only the caller can see. Where the file does not hold the place, the
// position is that of the nearest value around it.
func (s *Scene) ErrorAt(pointer, problem, remedy string) error {
	n := s.doc.find(pointer)
	return s.doc.errorAt(int(s.doc.nodes[n].off), pointer, problem, remedy)
}
