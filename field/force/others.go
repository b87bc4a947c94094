package force

import (
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/image"
	"gonum.org/v1/gonum/spatial/r3"
)

// other is one source of the field that acts, taken out of a sum.
type other struct {
	src    field.Source
	factor float64
	charge *bound.Charge // where the source is bound charge or the image of it
	plane  *image.Plane  // where it is an image
}

// apart lists the sources that src is the sum of, without the charge self.
func apart(src field.Source, self *bound.Charge) []other {
	switch s := src.(type) {
	case field.Sum:
		var all []other
		for _, t := range s {
			all = append(all, apart(t, self)...)
		}
		return all
	case bound.Assembly:
		var all []other
		for i := range s {
			switch {
			case s[i].Charge != nil:
				all = append(all, apart(s[i].Charge, self)...)
			case s[i].Source != nil:
				all = append(all, apart(s[i].Source, self)...)
			}
		}
		return all
	case field.Scaled:
		all := apart(s.Source, self)
		for i := range all {
			all[i].factor *= s.Factor
		}
		return all
	case image.Image:
		all := apart(s.Source, nil) // its own image acts on a part
		for i := range all {
			o := &all[i]
			o.src = image.Image{Source: o.src, Plane: s.Plane}
			if o.plane != nil {
				o.charge = nil
			}
			o.plane = &s.Plane
		}
		return all
	case *bound.Charge:
		if s == self {
			return nil
		}
		return []other{{src: s, factor: 1, charge: s}}
	case nil:
		return nil
	}
	return []other{{src: src, factor: 1}}
}

// bounds returns the box of the source; ok is false if it does not say.
func (o *other) bounds() (box r3.Box, ok bool) {
	box, ok = field.BoundsOf(o.src)
	return box, ok && finite(box.Min) && finite(box.Max)
}
