package handover

import (
	"example.com/boundpole/field"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// Kind says what the charge is.
type Kind int

// The kinds.
const (
	Electric Kind = iota // C, C/m^2, V, V/m
	Magnetic             // A m, A/m, A, A/m
)

// String returns the word used in files.
func (k Kind) String() string { return k.units().kind }

// Set is the equivalent charge of an assembly, in SI units.
type Set struct {
	Kind       Kind
	Constant   float64 // epsilon0 in F/m, or mu0 in H/m, that belongs to the numbers
	About      r3.Vec  // m, the point about which Moment counts
	Total      float64 // sum of the charges
	Magnitudes float64 // sum of the magnitudes of the charges of all points
	Moment     r3.Vec  // dipole moment of the exact source
	Within     Within
	Probes     [3]Probe
	Groups     []Group
}

// Within is the greatest difference between the points and the exact source, absolute, as measured when the set was made.
type Within struct {
	Moment    float64 // C m or A m^2
	Potential float64 // at the probes, V or A
	Field     float64 // at the probes, V/m or A/m
}

// Probe is a point outside and what the exact source gives there.
type Probe struct {
	At        r3.Vec  // m
	Potential float64 // V or A
	Field     r3.Vec  // E in V/m or H in A/m
}

// Form says what a group stands for.
type Form string

// The forms.
const (
	Face   Form = "face"   // bound charge of a face of a body
	Volume Form = "cell"   // bound charge inside, of one cell
	Sheet  Form = "sheet"  // charge trapped on a sheet
	Points Form = "points" // point charges and dipoles that are such
)

// Group is the charge of one face, cell, sheet or source of points.
type Group struct {
	Part, Place string // names; a pair stands once in a set
	Form        Form
	Charge      float64 // sum
	Facets      []Facet
	Cells       []Cell
	Points      []element.Point
	Dipoles     []element.Dipole
}

// Facet is a flat piece of a face with uniform density.
type Facet struct {
	Vertices []r3.Vec // three or four, counter-clockwise seen from where the normal points
	Normal   r3.Vec   // outward
	Sigma    float64
	Charge   float64 // Sigma times the area of the facet
}

// Cell is a hexahedron with uniform density: its points are linear in each of three parameters.
type Cell struct {
	Corners [8]r3.Vec // bottom counter-clockwise seen from above, then top
	Rho     float64
	Charge  float64 // Rho times the volume of the cell
}

// units is the vocabulary of a kind.
type units struct {
	kind, charge, sigma, rho, moment, potential, field string
	constant, constantUnit                             string
	value                                              float64
	convention                                         string
}

const frameWords = "; SI units; right-handed frame"

// units returns the vocabulary of k, that of Magnetic for every kind but Electric.
func (k Kind) units() units {
	if k == Electric {
		return units{"electric", "C", "C/m^2", "C/m^3", "C m", "V", "V/m", "epsilon0", "F/m", codata.Epsilon0,
			"sigma = p.n with n outward; rho = -div p; V = (1/(4 pi epsilon0)) sum q/r; E = -grad V" + frameWords}
	}
	return units{"magnetic", "A m", "A/m", "A/m^2", "A m^2", "A", "A/m", "mu0", "H/m", codata.Mu0,
		"sigma = M.n with n outward and north positive; rho = -div M; Vm = (1/(4 pi)) sum q/r; H = -grad Vm; B = mu0 H outside" + frameWords}
}

// divisor is what natural units are divided by: potential and field are phi and g over it.
func (s *Set) divisor() float64 {
	if s.Kind == Electric {
		return s.Constant
	}
	return 1
}

// blockSize is how many points are summed before their sum is added to the others, which keeps the rounding of long sums down.
const blockSize = 128

// Source returns the points and dipoles as a source in natural units: g in C/m^2 (E is g/epsilon0) or A/m (H is g), lengths in
// metres. It evaluates by direct summation. Making it takes memory for each point: keep it where it is evaluated often.
func (s *Set) Source() field.Sum {
	var all, block field.Sum
	add := func(src field.Source) {
		if block = append(block, src); len(block) == blockSize {
			all, block = append(all, block), nil
		}
	}
	for i := range s.Groups {
		for _, p := range s.Groups[i].Points {
			add(p)
		}
		for _, d := range s.Groups[i].Dipoles {
			add(d)
		}
	}
	return append(all, block)
}

// Field returns g of the points at x: a Set is a field.Source. Frame, units and cost are those of Source.
func (s *Set) Field(x r3.Vec) r3.Vec { return s.Source().Field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *Set) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	s.Source().Evaluate(dst, at, side)
}

// Bounds returns the box of the points.
func (s *Set) Bounds() r3.Box { return s.Source().Bounds() }

// At returns potential and field of the points at x in metres: V and E, or Vm and H. NaN at a point.
func (s *Set) At(x r3.Vec) (potential float64, f r3.Vec) {
	return s.at(s.Source(), x)
}

func (s *Set) at(src field.Source, x r3.Vec) (potential float64, f r3.Vec) {
	v := field.At(src, x, field.Mean, field.WantPhi|field.WantG)
	return v.Phi / s.divisor(), r3.Scale(1/s.divisor(), v.G)
}
