package handover

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"unicode/utf8"

	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// mostBytes is the greatest size of a file.
const mostBytes = 128 << 20

// slurp reads a whole file of text.
func slurp(r io.Reader) ([]byte, error) {
	data, err := io.ReadAll(io.LimitReader(r, mostBytes+1))
	switch {
	case err != nil:
		return nil, fmt.Errorf("handover: %w", err)
	case len(data) > mostBytes:
		return nil, fmt.Errorf("handover: more than %d bytes; hand over fewer points, or part by part", mostBytes)
	case !utf8.Valid(data):
		return nil, errors.New("handover: not UTF-8; save the file as UTF-8 text")
	}
	return bytes.TrimPrefix(data, []byte("\ufeff")), nil
}

// ReadJSON reads a set that WriteJSON, or anybody by the documentation of the package, has written, and checks it.
func ReadJSON(r io.Reader) (*Set, error) {
	data, err := slurp(r)
	if err != nil {
		return nil, err
	}
	d := &document{cursor: newCursor(data)}
	if err := d.read(); err != nil {
		return nil, err
	}
	if err := d.set.Check(); err != nil {
		return nil, err
	}
	return &d.set, nil
}

// document is a JSON file while it is read.
type document struct {
	*cursor
	set                      Set
	format, kind, convention string
	constant                 string
	version                  float64
	words                    map[string]string // units by what they measure
	constantUnit             string
	facets, cells, points    int // so far
}

func (d *document) read() error {
	s := &d.set
	err := d.object(map[string]func() error{
		"format":     func() error { return d.exactly(&d.format, Format) },
		"version":    d.readVersion,
		"kind":       func() error { return d.text(&d.kind) },
		"convention": func() error { return d.text(&d.convention) },
		"units":      d.readUnits,
		"constant":   d.readConstant,
		"about":      func() error { return d.vector(&s.About) },
		"total":      func() error { return d.number(&s.Total) },
		"magnitudes": func() error { return d.number(&s.Magnitudes) },
		"moment":     func() error { return d.vector(&s.Moment) },
		"within":     d.readWithin,
		"probes":     d.readProbes,
		"groups":     d.readGroups,
	})
	if err != nil {
		return err
	}
	if err := d.end(); err != nil {
		return err
	}
	return d.settle()
}

// exactly reads a text that has to be the given one.
func (d *document) exactly(dst *string, want string) error {
	if err := d.text(dst); err != nil {
		return err
	}
	if *dst != want {
		return d.fail("%q stands here; want %q", *dst, want)
	}
	return nil
}

func (d *document) readVersion() error {
	if err := d.number(&d.version); err != nil {
		return err
	}
	if d.version != version {
		return d.fail("version %v; this package reads version %d", d.version, version)
	}
	return nil
}

func (d *document) readUnits() error {
	d.words = map[string]string{}
	keys := map[string]func() error{}
	for _, k := range []string{"length", "charge", "sigma", "rho", "moment", "potential", "field"} {
		keys[k] = func() error {
			var s string
			err := d.text(&s)
			d.words[k] = s
			return err
		}
	}
	return d.object(keys)
}

func (d *document) readConstant() error {
	return d.object(map[string]func() error{
		"name":  func() error { return d.text(&d.constant) },
		"unit":  func() error { return d.text(&d.constantUnit) },
		"value": func() error { return d.number(&d.set.Constant) },
	})
}

func (d *document) readWithin() error {
	w := &d.set.Within
	return d.object(map[string]func() error{
		"moment":    func() error { return d.number(&w.Moment) },
		"potential": func() error { return d.number(&w.Potential) },
		"field":     func() error { return d.number(&w.Field) },
	})
}

func (d *document) readProbes() error {
	k := 0
	n, err := d.array(len(d.set.Probes), func() error {
		p := &d.set.Probes[k]
		k++
		return d.object(map[string]func() error{
			"at":        func() error { return d.vector(&p.At) },
			"potential": func() error { return d.number(&p.Potential) },
			"field":     func() error { return d.vector(&p.Field) },
		})
	})
	if err == nil && n != len(d.set.Probes) {
		return d.fail("%d probes; want %d", n, len(d.set.Probes))
	}
	return err
}

func (d *document) readGroups() error {
	_, err := d.array(mostRows, func() error {
		d.set.Groups = append(d.set.Groups, Group{})
		g := &d.set.Groups[len(d.set.Groups)-1]
		return d.object(map[string]func() error{
			"part":    func() error { return d.text(&g.Part) },
			"place":   func() error { return d.text(&g.Place) },
			"form":    func() error { return d.text((*string)(&g.Form)) },
			"charge":  func() error { return d.number(&g.Charge) },
			"facets":  func() error { return d.rows(&d.facets, func() error { return d.facet(g) }) },
			"cells":   func() error { return d.rows(&d.cells, func() error { return d.cell(g) }) },
			"points":  func() error { return d.rows(&d.points, func() error { return d.point(g) }) },
			"dipoles": func() error { return d.rows(&d.points, func() error { return d.dipole(g) }) },
		}, "facets", "cells", "points", "dipoles")
	})
	return err
}

// rows reads an array and counts its elements among all of the document.
func (d *document) rows(count *int, one func() error) error {
	n, err := d.array(mostRows-*count, one)
	*count += n
	return err
}

func (d *document) facet(g *Group) error {
	var f Facet
	err := d.object(map[string]func() error{
		"vertices": func() error {
			_, err := d.array(4, func() error {
				f.Vertices = append(f.Vertices, r3.Vec{})
				return d.vector(&f.Vertices[len(f.Vertices)-1])
			})
			return err
		},
		"normal": func() error { return d.vector(&f.Normal) },
		"sigma":  func() error { return d.number(&f.Sigma) },
		"charge": func() error { return d.number(&f.Charge) },
	})
	g.Facets = append(g.Facets, f)
	return err
}

func (d *document) cell(g *Group) error {
	var c Cell
	err := d.object(map[string]func() error{
		"corners": func() error {
			k := 0
			n, err := d.array(len(c.Corners), func() error {
				k++
				return d.vector(&c.Corners[k-1])
			})
			if err == nil && n < len(c.Corners) {
				return d.fail("%d corners; want %d", n, len(c.Corners))
			}
			return err
		},
		"rho":    func() error { return d.number(&c.Rho) },
		"charge": func() error { return d.number(&c.Charge) },
	})
	g.Cells = append(g.Cells, c)
	return err
}

func (d *document) point(g *Group) error {
	var x [4]float64
	err := d.numbers(x[:])
	g.Points = append(g.Points, element.Point{At: r3.Vec{X: x[0], Y: x[1], Z: x[2]}, Charge: x[3]})
	return err
}

func (d *document) dipole(g *Group) error {
	var x [6]float64
	err := d.numbers(x[:])
	g.Dipoles = append(g.Dipoles, element.Dipole{At: r3.Vec{X: x[0], Y: x[1], Z: x[2]}, Moment: r3.Vec{X: x[3], Y: x[4], Z: x[5]}})
	return err
}

// vector reads an array of three numbers.
func (d *document) vector(dst *r3.Vec) error {
	var x [3]float64
	err := d.numbers(x[:])
	*dst = r3.Vec{X: x[0], Y: x[1], Z: x[2]}
	return err
}

// settle holds kind, convention and units against each other.
func (d *document) settle() error {
	var err error
	if d.set.Kind, err = kindOf(d.kind); err != nil {
		return err
	}
	u := d.set.Kind.units()
	if d.convention != u.convention {
		return conventionError(d.convention, u)
	}
	want := map[string]string{"length": "m", "charge": u.charge, "sigma": u.sigma, "rho": u.rho, "moment": u.moment,
		"potential": u.potential, "field": u.field}
	for _, k := range []string{"length", "charge", "sigma", "rho", "moment", "potential", "field"} {
		if d.words[k] != want[k] {
			return fmt.Errorf("handover: units: %s is in %q; want %q: convert the numbers and the word", k, d.words[k], want[k])
		}
	}
	if d.constant != u.constant || d.constantUnit != u.constantUnit {
		return fmt.Errorf("handover: constant %q in %q; an %s set names %s in %s", d.constant, d.constantUnit, u.kind, u.constant, u.constantUnit)
	}
	return nil
}

// kindOf returns the kind of a word.
func kindOf(word string) (Kind, error) {
	for _, k := range []Kind{Electric, Magnetic} {
		if word == k.String() {
			return k, nil
		}
	}
	return 0, fmt.Errorf("handover: kind %q; want electric or magnetic", word)
}

func conventionError(got string, u units) error {
	return fmt.Errorf("handover: convention %q; this package reads only %q: bring the numbers into it", got, u.convention)
}
