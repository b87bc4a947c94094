package solve

import (
	"fmt"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/handover"
)

// HandOver returns the equivalent charges of the electric or the magnetic parts, without images and the applied field.
func (s *Setup) HandOver(kind string) (*handover.Set, error) {
	const points = 8 // a direction: fields one size off to about 1e-6
	set := handover.Settings{Kind: handover.Electric, Unit: s.Unit, Points: points}
	if kind == "magnetic" {
		set.Kind = handover.Magnetic
	}
	var parts bound.Assembly
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.chi != nil {
			return nil, fmt.Errorf("scene: hand_over: %s responds to the field; only rigid parts are handed over", p.Name)
		}
		if of := family(p.Kind); of == Magnetized && kind == "magnetic" || of == Charged && kind == "electric" {
			parts, set.Names = append(parts, p.Member), append(set.Names, p.Name)
		}
	}
	got, err := handover.Of(parts, set)
	if err != nil {
		return nil, fmt.Errorf("scene: hand_over: %s", plainWords(err))
	}
	return got, nil
}
