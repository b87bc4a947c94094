package scenefile

import (
	"fmt"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// checkAsked holds a request against the parts of the scene; at is what stands
// under its key.
func (d *decoder) checkAsked(at uint32, r *Request) error {
	switch r.Kind {
	case "reading":
		return d.checkYields(at, "electric, magnetized or circulating", func(p *Part) bool { return p.carries() })
	case "linkage":
		return d.checkYields(at, "magnetized or circulating", func(p *Part) bool { return p.magnetic() || p.Circulating != nil })
	case "reach":
		return d.checkYields(at, "magnetized", func(p *Part) bool { return p.Magnetized != nil })
	case "hand_over":
		if !strings.HasSuffix(r.HandOver, ".json") && !strings.HasSuffix(r.HandOver, ".csv") {
			return d.errorOn(at, fmt.Sprintf("hand_over writes .json or .csv (got %s)", d.quoted(at)), `for example "charges.json"`)
		}
		return d.checkHandOver(at, r)
	case "force":
		on, _ := d.member(at, "on")
		return d.checkPartName(on, r.Force.On, true)
	case "energy":
		return d.checkEnergy(at, r.Energy)
	case "travel":
		return d.checkTravel(at, r.Travel)
	}
	return nil
}

// carries reports whether a part carries anything.
func (p *Part) carries() bool {
	return p.Polarized != nil || p.Magnetized != nil || p.Charged != nil || p.Circulating != nil || p.responds()
}

// electric and magnetic report whether a part has to do with fields of the kind.
func (p *Part) electric() bool {
	return p.Polarized != nil || p.Charged != nil || p.Permittivity != nil
}

func (p *Part) magnetic() bool { return p.Magnetized != nil || p.Permeability != nil }

// responds reports whether a part responds to the field.
func (p *Part) responds() bool { return p.Permittivity != nil || p.Permeability != nil }

// checkYields refuses a request for which no part of the scene is of the right kind.
func (d *decoder) checkYields(at uint32, kinds string, right func(*Part) bool) error {
	for i := range d.scene.Parts {
		if right(&d.scene.Parts[i]) {
			return nil
		}
	}
	return d.errorOn(at, "no part is "+kinds, "give a part what it carries, or leave the request out")
}

// checkHandOver holds the kind of charge against the scene, and fills it in where there is one only.
func (d *decoder) checkHandOver(at uint32, r *Request) error {
	electric, magnetic := (*Part).electric, (*Part).magnetic
	e, m := d.checkYields(at, "polarized or charged", electric), d.checkYields(at, "magnetized", magnetic)
	switch r.Charge {
	case "electric":
		return e
	case "magnetic":
		return m
	}
	switch {
	case e != nil && m != nil:
		return d.checkYields(at, "polarized, charged or magnetized", func(*Part) bool { return false })
	case e == nil && m == nil:
		return d.errorOn(at, "the scene has electric and magnetic charges", `add "kind": "electric" or "kind": "magnetic"; a file holds one of them`)
	case m == nil:
		r.Charge = "magnetic"
	default:
		r.Charge = "electric"
	}
	return nil
}

// checkPartName refuses a name that no part has, or that of one that carries
// nothing where it must.
func (d *decoder) checkPartName(n uint32, name string, carrying bool) error {
	i, ok := d.bodies[name]
	switch {
	case ok && carrying && !d.scene.Parts[i].carries():
		return d.errorOn(n, fmt.Sprintf("part %q carries nothing", shorten(name)), "name a part that is polarized, magnetized, charged or circulating")
	case ok:
		return nil
	}
	for i := range d.scene.Parts {
		if p := &d.scene.Parts[i]; p.Name == name {
			return d.errorOn(n, fmt.Sprintf("part %q has copies", shorten(name)), fmt.Sprintf("name one of them, for example %q", p.Names()[0]))
		}
	}
	return d.errorOn(n, fmt.Sprintf("no part is called %q", shorten(name)), d.partNames(name))
}

// checkEnergy holds the two names of a pair against the scene.
func (d *decoder) checkEnergy(at uint32, names []string) error {
	i := 0
	err := d.children(at, func(_, c uint32) error {
		i++
		return d.checkPartName(c, names[i-1], true)
	})
	if err == nil && names[0] == names[1] {
		return d.errorOn(at, "the energy of a part with itself is no interaction", "name two parts")
	}
	return err
}

// checkTravel holds a travel against the scene, and what it asks.
func (d *decoder) checkTravel(at uint32, t *Travel) error {
	name, _ := d.member(at, "part")
	if err := d.checkPartName(name, t.Part, false); err != nil {
		return err
	}
	d.positions = t.Count
	defer func() { d.positions = 1 }()
	ask, _ := d.member(at, "ask")
	i := 0
	return d.children(ask, func(_, c uint32) error {
		i++
		q := &t.Ask[i-1]
		switch {
		case q.Kind == "travel":
			return d.errorOn(c, "a travel within a travel", "write two travels, or place the part with copies")
		case q.CSV != "" || q.HandOver != "":
			return d.errorOn(c, "a file of one position", `give the travel itself a "csv", or ask for the file outside of it`)
		}
		return d.checkRequest(c, q)
	})
}

// checkCirculating refuses circulating flux on other shapes than cylinders.
func (d *decoder) checkCirculating(n uint32, p *Part) error {
	if p.Circulating == nil || p.Kind == "cylinder" {
		return nil
	}
	at, _ := d.member(n, "circulating")
	return d.errorOn(at-1, "circulating is for cylinders, not for "+article(p.Kind), `write "shape": "cylinder"`)
}

// checkPlane refuses a permittivity on a plane that has none, and its absence.
func (d *decoder) checkPlane(n uint32, p *Plane) error {
	at, given := d.member(n, "permittivity")
	switch {
	case p.Kind == "dielectric" && !given:
		return d.errorOn(n, "a dielectric plane without permittivity", `add for example "permittivity": 4.5`)
	case p.Kind != "dielectric" && given:
		return d.errorOn(at-1, fmt.Sprintf("permittivity on a plane of kind %s", p.Kind), `leave it out, or write "kind": "dielectric"`)
	}
	return nil
}

// checkReading refuses a rectangle without direction.
func (d *decoder) checkReading(n uint32, r *Reading) error {
	if r.Along == nil || !parallel(r.Normal, *r.Along) {
		return nil
	}
	at, _ := d.member(n, "along")
	return d.errorOn(at, "along is parallel to normal", "give the direction of the width, across normal")
}

// checkLinkage refuses a coil whose corners are not in one plane or enclose nothing.
func (d *decoder) checkLinkage(n uint32, l *Linkage) error {
	if l.Polygon == nil {
		return nil
	}
	var area r3.Vec
	for i, a := range l.Polygon {
		b := l.Polygon[(i+1)%len(l.Polygon)]
		area = r3.Add(area, r3.Cross(r3.Sub(a, l.Polygon[0]), r3.Sub(b, l.Polygon[0])))
	}
	if area == (r3.Vec{}) {
		at, _ := d.member(n, "polygon")
		return d.errorOn(at, "the coil encloses no area", "give corners in order round the coil")
	}
	return nil
}

// checkResponds refuses a response of what is no body, and one beside what it does not go with.
func (d *decoder) checkResponds(n uint32, p *Part) error {
	for _, c := range []struct {
		key    string
		value  *Relative
		others bool // the part carries what is of another kind
	}{
		{"permittivity", p.Permittivity, p.Magnetized != nil || p.Circulating != nil},
		{"permeability", p.Permeability, p.Polarized != nil || p.Circulating != nil},
	} {
		if c.value == nil {
			continue
		}
		at, _ := d.member(n, c.key)
		switch {
		case p.Class != Body:
			return d.errorOn(at-1, fmt.Sprintf("%s has no %s", article(p.Kind), c.key), "give it to a body")
		case c.others || p.Permittivity != nil && p.Permeability != nil:
			return d.errorOn(at-1, c.key+" beside what is of the other kind", "place two parts, one electric and one magnetic")
		}
	}
	return nil
}
