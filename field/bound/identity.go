package bound

import (
	"fmt"
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// Identity is one statement that every bound charge obeys, as it came out.
type Identity struct {
	Law       string  // in words
	Left      float64 // norm of the left side, from the charges
	Right     float64 // norm of the right side, from the polarization
	Miss      float64 // norm of the difference
	Scale     float64 // sum of the magnitudes that cancel
	Tolerance float64 // what rounding explains
}

// Holds reports whether the two sides agree.
func (i Identity) Holds() bool { return i.Miss <= i.Tolerance }

// identitySums gathers the two sides about the origin of the body's own frame.
type identitySums struct {
	charge, chargeSize          float64
	first, firstSize            r3.Vec
	second, secondSize          [6]float64
	moment                      r3.Vec     // int p
	pairs                       [6]float64 // int p r^T + r p^T
	normal                      r3.Vec     // int n dA
	area, volume, cells, faces3 float64    // int dA, int r.n dA / 3, sum of cells, magnitudes
}

func outer6(a, b r3.Vec) [6]float64 {
	return [6]float64{a.X * b.X, a.Y * b.Y, a.Z * b.Z, a.X * b.Y, a.X * b.Z, a.Y * b.Z}
}

func absVec(v r3.Vec) r3.Vec { return r3.Vec{X: math.Abs(v.X), Y: math.Abs(v.Y), Z: math.Abs(v.Z)} }

// addFace adds a node of a face with density sigma.
func (s *identitySums) addFace(x, n r3.Vec, w, sigma float64) {
	s.add(x, w*sigma)
	s.normal = r3.Add(s.normal, r3.Scale(w, n))
	s.area += w
	s.volume += w * r3.Dot(x, n) / 3
	s.faces3 += w * (math.Abs(x.X*n.X) + math.Abs(x.Y*n.Y) + math.Abs(x.Z*n.Z)) / 3
}

func (s *identitySums) add(x r3.Vec, q float64) {
	s.charge += q
	s.chargeSize += math.Abs(q)
	s.first = r3.Add(s.first, r3.Scale(q, x))
	s.firstSize = r3.Add(s.firstSize, r3.Scale(math.Abs(q), absVec(x)))
	a, b := outer6(x, x), outer6(absVec(x), absVec(x))
	for k := range a {
		s.second[k] += q * a[k]
		s.secondSize[k] += math.Abs(q) * b[k]
	}
}

// addCell adds a node of a cell with density rho and polarization p.
func (s *identitySums) addCell(x r3.Vec, w, rho float64, p r3.Vec) {
	s.add(x, w*rho)
	s.moment = r3.Add(s.moment, r3.Scale(w, p))
	a, b := outer6(p, x), outer6(x, p)
	for k := range a {
		s.pairs[k] += w * (a[k] + b[k])
	}
	s.cells += w
}

// check returns the identities, and an error that names the culprit if one does not hold.
// If the rule is not exact for p, coarse has the sums of a coarser rule: ten times the difference is allowed.
func (s *identitySums) check(c *Charge, coarse *identitySums) ([]Identity, error) {
	const slack = 1e-12 // quadrature weights and nodes carry about 1e-15, thin bodies cancel
	ids := s.identities()
	var allow [3]float64
	if coarse != nil {
		for k, id := range coarse.identities() {
			allow[k] = 10 * (math.Abs(id.Miss-ids[k].Miss) + math.Abs(id.Left-ids[k].Left) + math.Abs(id.Right-ids[k].Right))
		}
	}
	var broken []string
	for k := range ids {
		ids[k].Tolerance = slack*ids[k].Scale + allow[k]
		ids[k].Miss = clean(ids[k].Miss, ids[k].Scale)
		if !ids[k].Holds() {
			broken = append(broken, fmt.Sprintf("%s: %.17g against %.17g", ids[k].Law, ids[k].Left, ids[k].Right))
		}
	}
	if err := s.geometry(c, slack); err != nil {
		return ids, err
	}
	if broken != nil {
		return ids, fmt.Errorf("bound: charge and polarization disagree (%s): the divergence given is not that of p; correct it",
			strings.Join(broken, "; "))
	}
	return ids, nil
}

// identities returns the three statements without tolerances.
func (s *identitySums) identities() []Identity {
	one := Identity{Law: "total charge is zero", Left: math.Abs(s.charge), Miss: math.Abs(s.charge), Scale: s.chargeSize}
	two := Identity{Law: "dipole moment of the charges is the integral of p", Left: r3.Norm(s.first), Right: r3.Norm(s.moment),
		Miss: r3.Norm(r3.Sub(s.first, s.moment)), Scale: r3.Norm(s.firstSize)}
	three := Identity{Law: "second moment of the charges is the integral of p r + r p"}
	for k, v := range s.second {
		three.Left = math.Hypot(three.Left, v)
		three.Right = math.Hypot(three.Right, s.pairs[k])
		three.Miss = math.Hypot(three.Miss, v-s.pairs[k])
		three.Scale = math.Hypot(three.Scale, s.secondSize[k])
	}
	return []Identity{one, two, three}
}

// geometry checks that the faces close and look outward, and names the face that does not.
func (s *identitySums) geometry(c *Charge, slack float64) error {
	open := r3.Norm(s.normal) > slack*s.area
	wrong := math.Abs(s.volume-s.cells) > slack*(s.faces3+math.Abs(s.cells))
	if !open && !wrong {
		return nil
	}
	for _, f := range c.local.Faces() {
		var n r3.Vec
		var v float64
		f.Surface.Nodes(c.nodes(), func(x, m r3.Vec, w float64) {
			m = r3.Scale(f.Sign()*w, m)
			n = r3.Add(n, m)
			v += r3.Dot(x, m) / 3
		})
		if r3.Norm(r3.Sub(s.normal, r3.Scale(2, n))) <= slack*s.area &&
			math.Abs(s.volume-2*v-s.cells) <= slack*(s.faces3+math.Abs(s.cells)) {
			return fmt.Errorf("bound: face %q looks inward; reverse its normal", f.Name)
		}
	}
	return fmt.Errorf("bound: the faces do not close round the cells (sum of n dA %.6g of %.6g, volume %.17g against %.17g); "+
		"give every face once, with its normal outward", r3.Norm(s.normal), s.area, s.volume, s.cells)
}
