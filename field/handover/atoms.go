package handover

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// addPoints adds a source that is made of point charges and dipoles.
func (b *builder) addPoints(name string, src field.Source) error {
	g := Group{Part: name, Place: "points", Form: Points}
	if !g.collect(src) {
		return fmt.Errorf("handover: %s, a %T, is no polarized body, sheet, point charge or dipole; leave it out", name, src)
	}
	var total pair.Float
	for i, p := range g.Points {
		b.moment = r3.Add(b.moment, r3.Scale(p.Charge, r3.Sub(p.At, b.centre)))
		g.Points[i] = element.Point{At: b.length(p.At), Charge: b.charge(p.Charge)}
		total = total.AddFloat(g.Points[i].Charge)
	}
	for i, d := range g.Dipoles {
		b.moment = r3.Add(b.moment, d.Moment)
		g.Dipoles[i] = element.Dipole{At: b.length(d.At), Moment: r3.Scale(b.unit*b.unit*b.unit, d.Moment)}
	}
	g.Charge = total.Value()
	b.total += g.Charge
	b.set.Groups = append(b.set.Groups, g)
	return nil
}

// collect adds the points and dipoles of a source to the group; it reports whether the source has nothing else.
func (g *Group) collect(src field.Source) bool {
	switch s := src.(type) {
	case element.Point:
		g.Points = append(g.Points, s)
	case element.Dipole:
		if s.Moment != (r3.Vec{}) {
			g.Dipoles = append(g.Dipoles, s)
		}
	case field.Sum:
		for _, one := range s {
			if !g.collect(one) {
				return false
			}
		}
	case field.Scaled:
		var inner Group
		if !inner.collect(s.Source) {
			return false
		}
		for _, p := range inner.Points {
			g.Points = append(g.Points, element.Point{At: p.At, Charge: s.Factor * p.Charge})
		}
		for _, d := range inner.Dipoles {
			g.Dipoles = append(g.Dipoles, element.Dipole{At: d.At, Moment: r3.Scale(s.Factor, d.Moment)})
		}
	case field.Posed:
		var inner Group
		if !inner.collect(s.Source) {
			return false
		}
		outer := func(x r3.Vec) r3.Vec { return s.Pose.ToOuter(pair.VecOf(x)).Value() }
		for _, p := range inner.Points {
			g.Points = append(g.Points, element.Point{At: outer(p.At), Charge: p.Charge})
		}
		for _, d := range inner.Dipoles {
			g.Dipoles = append(g.Dipoles, element.Dipole{At: outer(d.At), Moment: s.Pose.VectorToOuter(d.Moment)})
		}
	default:
		return false
	}
	return true
}
