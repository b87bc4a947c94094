// Package refcase reads the high-precision reference cases of verify/testdata and says how near a value has to come.
//
// A case is a body or sheet in some pose, its polarization, and phi and g to 25 digits at points of many classes. The
// values were made outside the library: mpmath at 60 digits or more, from closed forms re-derived for the purpose, each
// family confirmed by direct quadrature of the dipole density ("method" and "check" of each case).
//
// Units are natural (package field), lengths arbitrary. The package knows no element and no kernel.
package refcase

import (
	"bytes"
	"compress/gzip"
	"encoding/json"
	"fmt"
	"io"
	"math"
	"math/big"
	"strings"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Case is one body with its reference values.
type Case struct {
	ID           string
	Body         Body
	Polarization Polarization
	Points       [][3]float64
	Phi          []string
	G            [][3]string
	Grad         [][6]string // gradient of g: xx, yy, zz, xy, xz, yz; nil if the case has none
	Region       []string
	Tags         []string
	Method       string
	Check        string
	Source       string
}

// Body is the shape of a case; which fields count depends on Type.
type Body struct {
	Type     string
	Half     *[3]float64 `json:"half_lengths_e1_e2_e3"`
	Vertices [][3]float64
	Faces    [][]int
	Radius   float64
	R1, R2   float64
	HalfLen  float64     `json:"half_length"`
	SemiAxes *[3]float64 `json:"semi_axes_e1_e2_e3"`
	Centre   [3]float64
	Axis     *[3]float64
	Ref      [3]float64
	Phi1     float64
	Phi2     float64
	Bottom   float64 `json:"radius_bottom_at_z=-half_length"`
	Top      float64 `json:"radius_top_at_z=+half_length"`
	Major    float64 `json:"major_radius"`
	Minor    float64 `json:"minor_radius"`
	// Of a prism: polygon in the local plane z = 0, drawn out to the planes -+height/2 + slope.(x, y).
	Base        [][2]float64
	Height      float64
	BottomSlope [2]float64 `json:"bottom_slope"`
	TopSlope    [2]float64 `json:"top_slope"`
}

// Polarization is what the body or sheet carries, in global components.
type Polarization struct {
	Kind string
	P    [3]float64
	P0   [3]float64
	G    json.RawMessage
	A    float64
	B    [3]float64
	C    float64
	N    float64
	A0   float64
	// Terms of a polynomial: component, coefficient, powers.
	Terms []Term
}

// Term is one term of a polynomial polarization.
type Term struct {
	Component   int
	Coefficient float64
	Powers      [3]int
}

// UnmarshalJSON reads the triple [component, coefficient, [i, j, k]].
func (t *Term) UnmarshalJSON(raw []byte) error {
	return json.Unmarshal(raw, &[]any{&t.Component, &t.Coefficient, &t.Powers})
}

// Parse reads the cases of a file from its content, which is unpacked if the name ends with .gz; name is used in errors.
func Parse(name string, content []byte) ([]Case, error) {
	if strings.HasSuffix(name, ".gz") {
		reader, err := gzip.NewReader(bytes.NewReader(content))
		if err == nil {
			content, err = io.ReadAll(reader)
		}
		if err != nil {
			return nil, fmt.Errorf("refcase: %s: %w", name, err)
		}
	}
	var cases []Case
	if err := json.Unmarshal(content, &cases); err != nil {
		return nil, fmt.Errorf("refcase: %s: %w", name, err)
	}
	return cases, nil
}

// Pose returns where the body's own frame stands.
func (c *Case) Pose() (geom.Pose, error) {
	shift := geom.Translate(Vec(c.Body.Centre))
	if c.Body.Axis == nil {
		return shift, nil
	}
	z, x := Vec(*c.Body.Axis), Vec(c.Body.Ref)
	if z == (r3.Vec{Z: 1}) && x == (r3.Vec{X: 1}) {
		return shift, nil
	}
	turn, err := geom.Frame(z, x)
	if err != nil {
		return geom.Pose{}, err
	}
	return turn.Then(shift), nil
}

// Gradient returns the matrix of an affine polarization.
func (p *Polarization) Gradient() ([3][3]float64, error) {
	var g [3][3]float64
	if p.Kind != "affine" {
		return g, nil
	}
	return g, json.Unmarshal(p.G, &g)
}

// Vec turns a triple into a vector.
func Vec(v [3]float64) r3.Vec { return r3.Vec{X: v[0], Y: v[1], Z: v[2]} }

// Difference returns got - want, where want is a decimal number with more digits than float64 holds.
func Difference(got float64, want string) float64 {
	w, _, err := big.ParseFloat(want, 10, 200, big.ToNearestEven)
	if err != nil || math.IsNaN(got) || math.IsInf(got, 0) {
		return math.NaN()
	}
	d, _ := w.Sub(new(big.Float).SetPrec(200).SetFloat64(got), w).Float64()
	return d
}

// Miss is how far a value at a point is from the reference.
type Miss struct {
	Phi, G       float64 // |error|
	TolPhi, TolG float64 // what the accuracy contract allows
}

// Ratio returns the worse of error/tolerance.
func (m Miss) Ratio() float64 {
	r := m.G / m.TolG
	if m.TolPhi > 0 && !(m.Phi/m.TolPhi <= r) {
		r = m.Phi / m.TolPhi
	}
	return r
}

// Compare holds phi and g at point i against the reference with relative accuracy acc:
//
//	|phi - ref| <= acc max(|ref|, 1e-3 phi0),  |g - ref| <= acc max(|ref|, 1e-3 g0)
//
// phi0 = p a min(1, (a/R)^2), g0 = p min(1, (a/R)^3) for bodies (powers 1 and 2 for sheets), p the largest density or
// polarization, a the bounding radius, R the distance from its centre. A turned body may add 8 u |x - c| |grad g|, given
// as slack for g; phi then gains 8 u |x - c| |g|.
func (c *Case) Compare(i int, phi float64, g r3.Vec, acc, gradient float64) (Miss, error) {
	var m Miss
	ref := c.G[i]
	d := r3.Vec{X: Difference(g.X, ref[0]), Y: Difference(g.Y, ref[1]), Z: Difference(g.Z, ref[2])}
	size := r3.Vec{X: -Difference(0, ref[0]), Y: -Difference(0, ref[1]), Z: -Difference(0, ref[2])}
	m.G = c.nearest(i, d)
	m.Phi = math.Abs(Difference(phi, c.Phi[i]))
	centre, a, err := c.Ball()
	if err != nil {
		return m, err
	}
	p, sheet, err := c.largest()
	if err != nil {
		return m, err
	}
	x := Vec(c.Points[i])
	far := min(1, a/r3.Norm(r3.Sub(x, centre)))
	phi0, g0 := p*a*far*far, p*far*far*far
	if sheet {
		phi0, g0 = p*a*far, p*far*far
	}
	m.TolPhi = acc * max(math.Abs(Difference(0, c.Phi[i])), 1e-3*phi0)
	m.TolG = acc * max(r3.Norm(size), 1e-3*g0)
	pose, err := c.Pose()
	if err != nil {
		return m, err
	}
	if pose.Turned() {
		step := 8 * 0x1p-53 * r3.Norm(r3.Sub(x, Vec(c.Body.Centre)))
		m.TolG += step * gradient
		m.TolPhi += step * r3.Norm(size)
	}
	return m, nil
}

// nearest returns the smallest norm of d, which for a point nearer to a charged sheet than 4 u (|x| + size) may be moved
// by half or all of the jump sigma n: there the reference is of one side and the library gives the mean.
func (c *Case) nearest(i int, d r3.Vec) float64 {
	best := r3.Norm(d)
	jump, ok := c.jump(Vec(c.Points[i]))
	if !ok {
		return best
	}
	for _, k := range []float64{-1, -0.5, 0.5, 1} {
		best = min(best, r3.Norm(r3.Add(d, r3.Scale(k, jump))))
	}
	return best
}

// jump returns sigma n at a point on the plane of a sheet.
func (c *Case) jump(x r3.Vec) (r3.Vec, bool) {
	if c.Polarization.Kind != "sheet_linear" {
		return r3.Vec{}, false
	}
	var n, at pair.Vec
	if v := c.Body.Vertices; len(v) > 0 {
		at = pair.VecOf(Vec(v[0]))
		for k := 1; k+1 < len(v); k++ {
			n = n.Add(pair.VecOf(Vec(v[k])).Sub(at).Cross(pair.VecOf(Vec(v[k+1])).Sub(at)))
		}
	} else {
		at, n = pair.VecOf(Vec(c.Body.Centre)), pair.VecOf(Vec(*c.Body.Axis))
	}
	n = n.Unit()
	_, a, err := c.Ball()
	h := math.Abs(pair.VecOf(x).Sub(at).Dot(n).Value())
	if err != nil || h > 4*0x1p-53*(r3.Norm(x)+a) {
		return r3.Vec{}, false
	}
	sigma := c.Polarization.A + r3.Dot(Vec(c.Polarization.B), x)
	return r3.Scale(sigma, n.Value()), true
}

// Ball returns the centre and the radius of the bounding ball that the contract speaks of.
func (c *Case) Ball() (centre r3.Vec, radius float64, err error) {
	b := &c.Body
	centre = Vec(b.Centre)
	switch b.Type {
	case "box":
		return centre, r3.Norm(Vec(*b.Half)), nil
	case "polyhedron", "polygon", "prism":
		corners := c.corners()
		lo, hi := corners[0], corners[0]
		for _, v := range corners {
			lo = r3.Vec{X: min(lo.X, v.X), Y: min(lo.Y, v.Y), Z: min(lo.Z, v.Z)}
			hi = r3.Vec{X: max(hi.X, v.X), Y: max(hi.Y, v.Y), Z: max(hi.Z, v.Z)}
		}
		return r3.Scale(0.5, r3.Add(lo, hi)), 0.5 * r3.Norm(r3.Sub(hi, lo)), nil
	case "point", "dipole":
		return centre, 0, nil
	case "disc", "sphere":
		return centre, b.Radius, nil
	case "annulus", "spherical_shell":
		return centre, b.R2, nil
	case "tube_sector":
		return centre, math.Hypot(b.R2, b.HalfLen), nil
	case "truncated_cone":
		return centre, math.Hypot(max(b.Bottom, b.Top), b.HalfLen), nil
	case "torus":
		return centre, b.Major + b.Minor, nil
	case "cylinder":
		return centre, math.Hypot(b.Radius, b.HalfLen), nil
	case "tube":
		return centre, math.Hypot(b.R2, b.HalfLen), nil
	case "ellipsoid":
		s := *b.SemiAxes
		return centre, max(s[0], s[1], s[2]), nil
	}
	return centre, 0, fmt.Errorf("refcase: body type %q is not known here", b.Type)
}

// largest returns the largest density or polarization on the vertices or in the bounding ball.
func (c *Case) largest() (p float64, sheet bool, err error) {
	q := &c.Polarization
	centre, a, err := c.Ball()
	if err != nil {
		return 0, false, err
	}
	switch q.Kind {
	case "uniform":
		return r3.Norm(Vec(q.P)), false, nil
	case "charge", "moment": // no size: all tolerances are relative
		return 0, false, nil
	case "axial_z":
		return math.Abs(q.C) * c.Body.HalfLen, false, nil
	case "radial_unit":
		return math.Abs(q.C), false, nil
	case "ball_r", "radial_s":
		return math.Abs(q.C) * a, false, nil
	case "ball_r2", "radial_s2", "axial_z2":
		return math.Abs(q.C) * a * a, false, nil
	case "axial_power", "radial_power", "central_power":
		return math.Abs(q.C) * math.Pow(a, q.N), false, nil
	case "polynomial":
		far := r3.Norm(centre) + a
		for _, t := range q.Terms {
			p += math.Abs(t.Coefficient) * math.Pow(far, float64(t.Powers[0]+t.Powers[1]+t.Powers[2]))
		}
		return p, false, nil
	case "sheet_linear":
		if len(c.Body.Vertices) == 0 {
			return math.Abs(q.A + r3.Dot(Vec(q.B), centre)), true, nil
		}
		for _, v := range c.Body.Vertices {
			p = max(p, math.Abs(q.A+r3.Dot(Vec(q.B), Vec(v))))
		}
		return p, true, nil
	case "affine":
		g, err := q.Gradient()
		if err != nil {
			return 0, false, err
		}
		for _, x := range c.corners() {
			w := Vec(q.P0)
			for k, f := range [3]*float64{&w.X, &w.Y, &w.Z} {
				*f += g[k][0]*x.X + g[k][1]*x.Y + g[k][2]*x.Z
			}
			p = max(p, r3.Norm(w))
		}
		if len(c.corners()) == 0 { // a round body: the centre and the gradient over the ball
			w := Vec(q.P0)
			sum := 0.0
			for k, f := range [3]*float64{&w.X, &w.Y, &w.Z} {
				*f += g[k][0]*centre.X + g[k][1]*centre.Y + g[k][2]*centre.Z
				sum += g[k][0]*g[k][0] + g[k][1]*g[k][1] + g[k][2]*g[k][2]
			}
			p = r3.Norm(w) + a*math.Sqrt(sum/3)
		}
		return p, false, nil
	}
	return 0, false, fmt.Errorf("refcase: polarization %q is not known here", q.Kind)
}

// corners returns the vertices of a body with plane faces.
func (c *Case) corners() []r3.Vec {
	var out []r3.Vec
	for _, v := range c.Body.Vertices {
		out = append(out, Vec(v))
	}
	pose, err := c.Pose()
	if err != nil {
		return out
	}
	for _, v := range c.localCorners() {
		out = append(out, pose.ToOuter(pair.VecOf(v)).Value())
	}
	return out
}

// localCorners returns the vertices of a body that is given in a frame of its own.
func (c *Case) localCorners() []r3.Vec {
	var out []r3.Vec
	if c.Body.Half != nil {
		h := Vec(*c.Body.Half)
		for k := range 8 {
			s := func(bit int) float64 { return float64(k>>bit&1)*2 - 1 }
			out = append(out, r3.Vec{X: s(0) * h.X, Y: s(1) * h.Y, Z: s(2) * h.Z})
		}
	}
	for _, v := range c.Body.Base {
		for sign, slope := range map[float64][2]float64{-1: c.Body.BottomSlope, 1: c.Body.TopSlope} {
			out = append(out, r3.Vec{X: v[0], Y: v[1], Z: sign*c.Body.Height/2 + slope[0]*v[0] + slope[1]*v[1]})
		}
	}
	return out
}
