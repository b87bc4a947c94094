package scenefile

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// checkObject holds a decoded object against the rules that no table states.
func (d *decoder) checkObject(n uint32, v any) error {
	switch v := v.(type) {
	case *Scene:
		return d.checkScene(n, v)
	case *Part:
		return d.checkPart(n, v)
	case *Frame:
		return d.checkFrame(n, v)
	case *Line:
		return d.checkLine(n, v)
	case *Parallelogram:
		return d.checkParallelogram(n, v)
	case *Grid:
		return d.checkGrid(n, v)
	case *Plane:
		return d.checkPlane(n, v)
	case *Reading:
		return d.checkReading(n, v)
	case *Linkage:
		return d.checkLinkage(n, v)
	}
	return nil
}

// checkScene does what needs the whole scene: names, points, hand checks.
func (d *decoder) checkScene(n uint32, s *Scene) error {
	parts, _ := d.member(n, "parts")
	i := 0
	err := d.children(parts, func(_, c uint32) error {
		i++
		return d.claimNames(c, i-1)
	})
	if err != nil {
		return err
	}
	wanted, ok := d.member(n, "wanted")
	if !ok {
		return nil
	}
	i = 0
	return d.children(wanted, func(_, c uint32) error {
		i++
		return d.checkRequest(c, &s.Wanted[i-1])
	})
}

// checkRequest reads a file of points, counts points and parses hand checks.
func (d *decoder) checkRequest(n uint32, r *Request) error {
	at, _ := d.member(n, r.Kind)
	if r.Kind == "points_file" {
		points, err := d.readPoints(r.PointsFile)
		if err != nil {
			return d.errorOn(at, err.problem, err.remedy)
		}
		r.Points = points
	}
	if err := d.checkAsked(at, r); err != nil {
		return err
	}
	if r.Kind != "travel" { // what a travel asks is counted below, once for every position
		if d.points += r.Count() * d.positions; d.points > MaxPoints {
			return d.errorOn(at, fmt.Sprintf("more than %d points in all requests up to here", MaxPoints), "ask for fewer, or split the scene")
		}
	}
	list, ok := d.member(n, "hand")
	if !ok {
		return nil
	}
	i := 0
	return d.children(list, func(_, c uint32) error {
		i++
		return d.checkHand(c, r, &r.Hand[i-1])
	})
}

// checkPart holds what a part carries against its shape.
func (d *decoder) checkPart(n uint32, p *Part) error {
	for _, carrier := range []struct {
		key string
		p   *Polarization
	}{{"polarized", p.Polarized}, {"magnetized", p.Magnetized}} {
		if carrier.p == nil {
			continue
		}
		if err := d.checkCarried(n, p, carrier.key, "moment", carrier.p.Moment != nil); err != nil {
			return err
		}
		if carrier.p.Grade != "" {
			at, _ := d.member(n, carrier.key)
			if err := d.fillGrade(at, carrier.p); err != nil {
				return err
			}
		}
	}
	if p.Charged != nil {
		if err := d.checkCarried(n, p, "charged", "charge", p.Charged.Charge != nil); err != nil {
			return err
		}
	}
	if err := d.checkCirculating(n, p); err != nil {
		return err
	}
	if err := d.checkResponds(n, p); err != nil {
		return err
	}
	if p.Class == Point && p.Polarized == nil && p.Magnetized == nil && p.Charged == nil {
		return d.errorOn(n, "a point that carries nothing", `add "charged": {"charge": …}, or "polarized" or "magnetized": {"moment": […]}`)
	}
	switch shape := p.Shape.(type) {
	case *Arc:
		return d.checkArc(n, shape)
	case *Cone:
		return d.checkCone(n, shape)
	case *Prism:
		return d.checkPrism(n, shape)
	case *Polyhedron:
		return d.checkPolyhedron(n, shape)
	}
	return nil
}

// checkArc refuses more than a turn.
func (d *decoder) checkArc(n uint32, a *Arc) error {
	from, to, degrees := a.Angles()
	turn, _ := a.turn()
	if to-from <= turn || a.Full() {
		return nil
	}
	name, text := "to_rad", "2π"
	if degrees {
		name, text = "to", "360"
	}
	at, _ := d.member(n, name)
	return d.errorOn(at, fmt.Sprintf("the arc is more than one turn (from %g to %g)", from, to), "give an end of at most the start plus "+text)
}

// checkCone refuses a cone without an end.
func (d *decoder) checkCone(n uint32, c *Cone) error {
	if c.Bottom > 0 || c.Top > 0 {
		return nil
	}
	at, _ := d.member(n, "top")
	return d.errorOn(at, "bottom and top must not both be 0", "give one end a radius")
}

// checkCarried refuses charge on a body, polarization of a sheet, and a law that
// is for points only (or not for points); n is the part, ofPoint tells which.
func (d *decoder) checkCarried(n uint32, p *Part, key, pointKey string, ofPoint bool) error {
	at, _ := d.member(n, key)
	switch {
	case p.Class == Sheet && key != "charged":
		return d.errorOn(at-1, fmt.Sprintf("%s is a sheet and cannot be %s", article(p.Kind), key), "a sheet is charged; give a body a thickness to have it "+key)
	case p.Class == Body && key == "charged":
		return d.errorOn(at-1, article(p.Kind)+" is a body and cannot be charged", "charge a polygon, disc, annulus or point; a body is polarized or magnetized")
	case p.Class == Point && !ofPoint:
		return d.errorOn(at, fmt.Sprintf("a point is %s by %s", key, pointKey), fmt.Sprintf("write %q: {%q: …}", key, pointKey))
	case p.Class != Point && ofPoint:
		return d.errorOn(at, fmt.Sprintf("%s is for points, not for %s", pointKey, article(p.Kind)), "see the keys of "+key+" for bodies and sheets")
	}
	return nil
}

// checkPrism refuses slopes that let the ends meet. The height is least at a
// corner, for it is linear.
func (d *decoder) checkPrism(n uint32, p *Prism) error {
	for i, c := range p.Base {
		h := p.Height + (p.TopSlope.X-p.BottomSlope.X)*c.X + (p.TopSlope.Y-p.BottomSlope.Y)*c.Y
		if !(h > 0) || math.IsInf(h, 0) {
			at, ok := d.member(n, "top_slope")
			if !ok {
				at, _ = d.member(n, "bottom_slope")
			}
			return d.errorOn(at, fmt.Sprintf("the ends of the prism meet: its height at base point %d is %g", i, h), "reduce the slope or raise the height")
		}
	}
	return nil
}

// checkPolyhedron holds the faces against the number of vertices.
func (d *decoder) checkPolyhedron(n uint32, p *Polyhedron) error {
	faces, _ := d.member(n, "faces")
	i := 0
	return d.children(faces, func(_, face uint32) error {
		corners := p.Faces[i]
		i++
		seen := make(map[int]bool, len(corners))
		k := 0
		return d.children(face, func(_, c uint32) error {
			v := corners[k]
			k++
			if v >= len(p.Vertices) {
				return d.errorOn(c, fmt.Sprintf("vertex %d does not exist", v), fmt.Sprintf("vertices are counted from 0 to %d", len(p.Vertices)-1))
			}
			if seen[v] {
				return d.errorOn(c, fmt.Sprintf("vertex %d is named twice in a face", v), "name every corner once")
			}
			seen[v] = true
			return nil
		})
	})
}

// parallel reports whether two vectors that are not 0 span no plane to within
// 1e-12 rad, which is far above rounding and far below any intention.
func parallel(a, b r3.Vec) bool {
	unit := func(v r3.Vec) r3.Vec {
		m := max(math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z))
		return r3.Unit(r3.Vec{X: v.X / m, Y: v.Y / m, Z: v.Z / m})
	}
	return r3.Norm(r3.Cross(unit(a), unit(b))) < 1e-12
}

// checkFrame refuses axes that are parallel.
func (d *decoder) checkFrame(n uint32, f *Frame) error {
	if f.X == nil || !parallel(f.Z, *f.X) {
		return nil
	}
	at, _ := d.member(n, "x")
	return d.errorOn(at, "x is parallel to z", "give a vector across z, or leave x out")
}

// checkLine refuses a line whose length overflows.
func (d *decoder) checkLine(n uint32, l *Line) error {
	if finite(r3.Sub(l.To, l.From)) {
		return nil
	}
	at, _ := d.member(n, "to")
	return d.errorOn(at, "the line is too long for float64", "bring its ends closer")
}

// checkParallelogram refuses parallel edges and corners that overflow.
func (d *decoder) checkParallelogram(n uint32, p *Parallelogram) error {
	at, _ := d.member(n, "edge2")
	if parallel(p.Edge1, p.Edge2) {
		return d.errorOn(at, "edge2 is parallel to edge1", "give edges that span a plane, or ask for a line")
	}
	far1, far2 := r3.Add(p.Corner, p.Edge1), r3.Add(p.Corner, p.Edge2)
	if !finite(far1) || !finite(far2) || !finite(r3.Add(far1, p.Edge2)) {
		return d.errorOn(at, "the plane is too large for float64", "shorten its edges")
	}
	return nil
}

// checkGrid refuses a box that is inverted, or flat where points must differ.
func (d *decoder) checkGrid(n uint32, g *Grid) error {
	lo := []float64{g.Min.X, g.Min.Y, g.Min.Z}
	hi := []float64{g.Max.X, g.Max.Y, g.Max.Z}
	at, _ := d.member(n, "max")
	if !finite(r3.Sub(g.Max, g.Min)) {
		return d.errorOn(at, "the grid is too large for float64", "bring its corners closer")
	}
	for i, axis := range strings.Split("xyz", "") {
		flat := lo[i] == hi[i] && g.Counts[i] == 1
		if lo[i] >= hi[i] && !flat {
			c, _ := d.element(at, strconv.Itoa(i))
			return d.errorOn(c, fmt.Sprintf("max must be above min in %s (got %g and %g)", axis, hi[i], lo[i]), "swap or correct them; they may be equal where the count is 1")
		}
	}
	return nil
}

// finite reports whether no component is infinite or NaN.
func finite(v r3.Vec) bool { return !math.IsInf(math.Abs(v.X)+math.Abs(v.Y)+math.Abs(v.Z), 0) }
