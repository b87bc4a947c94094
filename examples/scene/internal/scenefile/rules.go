package scenefile

import (
	"fmt"
	"strconv"
	"strings"
)

// choose returns the variant of object n, nil where o has none.
func (d *decoder) choose(n uint32, o *Object) (*Variant, error) {
	switch {
	case len(o.Variants) == 0:
		return nil, nil
	case o.Select == "":
		return d.chooseByPresence(n, o)
	}
	value, ok := d.member(n, o.Select)
	if !ok {
		return nil, d.errorMissing(n, o.Select, o.Select+" is missing", "add one of "+strings.Join(variantNames(o), ", "))
	}
	if d.kind(value) != '"' {
		return nil, d.errorOn(value, fmt.Sprintf("%s must be a text (got %s)", o.Select, d.quoted(value)), "write one of "+strings.Join(variantNames(o), ", "))
	}
	v := o.variant(d.text(value))
	if v == nil {
		return nil, d.errorOn(value, fmt.Sprintf("unknown %s %s", o.Select, d.quoted(value)), suggest(d.text(value), variantNames(o)))
	}
	if v.Status == Later {
		return nil, d.errorOn(value, fmt.Sprintf("%s %q is not supported yet", o.Select, v.Name), "this release has "+strings.Join(readyNames(o), ", "))
	}
	return v, nil
}

// chooseByPresence returns the one variant whose name is a key of object n.
func (d *decoder) chooseByPresence(n uint32, o *Object) (found *Variant, err error) {
	err = d.children(n, func(name, value uint32) error {
		v := o.variant(d.text(name))
		switch {
		case v == nil:
			return nil
		case v.Status == Later:
			return d.errorOn(name, fmt.Sprintf("%s %q is not supported yet", o.Name, v.Name), "this release has "+strings.Join(readyNames(o), ", "))
		case found != nil:
			return d.errorOn(name, fmt.Sprintf("a %s with both %s and %s", o.Name, found.Name, v.Name), "write two "+o.Name+"s")
		}
		found = v
		return nil
	})
	if err != nil || found != nil {
		return found, err
	}
	remedy := "add one of " + strings.Join(variantNames(o), ", ")
	err = d.children(n, func(name, value uint32) error {
		if key := d.text(name); !known(o, nil, key) && !elsewhere(o, key) {
			return d.errorOn(name, fmt.Sprintf("unknown key %q", shorten(key)), suggest(key, variantNames(o)))
		}
		return nil
	})
	if err != nil {
		return nil, err
	}
	return nil, d.errorOn(n, d.label(n)+" asks for nothing", remedy)
}

// variantNames returns the names of all variants.
func variantNames(o *Object) []string {
	var names []string
	for _, v := range o.Variants {
		names = append(names, v.Name)
	}
	return names
}

// readyNames returns the names of the variants that this release has.
func readyNames(o *Object) []string {
	var names []string
	for _, v := range o.Variants {
		if v.Status != Later {
			names = append(names, v.Name)
		}
	}
	return names
}

// known reports whether an object, of variant v if it has variants, has a key.
func known(o *Object, v *Variant, name string) bool {
	return lookUp(o, v, name) != nil
}

// lookUp returns a key of an object, of variant v if it has variants, or nil.
func lookUp(o *Object, v *Variant, name string) *Key {
	for i := range o.Keys {
		if o.Keys[i].Name == name {
			return &o.Keys[i]
		}
	}
	for i := 0; v != nil && i < len(v.Keys); i++ {
		if v.Keys[i].Name == name {
			return &v.Keys[i]
		}
	}
	return nil
}

// elsewhere reports whether any variant of an object has a key.
func elsewhere(o *Object, name string) bool {
	for i := range o.Variants {
		if known(o, &o.Variants[i], name) {
			return true
		}
	}
	return false
}

// checkKeys refuses unknown and unsupported keys of object n, and missing ones.
func (d *decoder) checkKeys(n uint32, o *Object, v *Variant) error {
	err := d.children(n, func(name, value uint32) error {
		key := d.text(name)
		k := lookUp(o, v, key)
		switch {
		case k != nil && k.Status == Later:
			return d.errorOn(name, fmt.Sprintf("key %q is not supported yet", key), "leave it out")
		case k != nil:
			return nil
		case v != nil && elsewhere(o, key):
			return d.errorOn(name, fmt.Sprintf("key %q does not belong to %s %s", key, o.Name, v.Name), ownKeys(v))
		}
		valid := keyNames(o.Keys)
		if v != nil {
			valid = append(keyNames(v.Keys), valid...)
		}
		return d.errorOn(name, fmt.Sprintf("unknown key %q", shorten(key)), suggest(key, valid))
	})
	if err != nil {
		return err
	}
	if err := d.checkRequired(n, o.Keys); err != nil || v == nil {
		return err
	}
	return d.checkRequired(n, v.Keys)
}

// ownKeys says which keys belong to a variant.
func ownKeys(v *Variant) string {
	if len(v.Keys) == 0 {
		return "it has no keys of its own"
	}
	return "its own keys are " + strings.Join(keyNames(v.Keys), ", ")
}

// checkRequired refuses object n if a required key is missing.
func (d *decoder) checkRequired(n uint32, keys []Key) error {
	for i := range keys {
		k := &keys[i]
		if !k.Required {
			continue
		}
		if _, ok := d.member(n, k.Name); !ok {
			return d.errorMissing(n, k.Name, k.Name+" is missing", "add for example "+strconv.Quote(k.Name)+": "+k.Example)
		}
	}
	return nil
}

// checkRules holds object n against rules.
func (d *decoder) checkRules(n uint32, rules []Rule) error {
	for _, r := range rules {
		var nodes []uint32
		var present []string
		for _, name := range r.Keys {
			if c, ok := d.member(n, name); ok {
				nodes, present = append(nodes, c), append(present, name)
			}
		}
		if err := d.checkRule(n, r, nodes, present); err != nil {
			return err
		}
	}
	return nil
}

// checkRule holds object n against a rule; present are its keys that are there.
func (d *decoder) checkRule(n uint32, r Rule, nodes []uint32, present []string) error {
	all := strings.Join(r.Keys, ", ")
	few := r.Kind == ExactlyOne || r.Kind == AtLeastOne
	switch {
	case few && len(present) == 0:
		return d.errorOn(n, fmt.Sprintf("%s needs one of %s", d.label(n), all), "add it")
	case (r.Kind == ExactlyOne || r.Kind == AtMostOne) && len(present) > 1:
		later, other := present[len(present)-1], present[0]
		if nodes[0] > nodes[len(nodes)-1] {
			later, other = other, later
		}
		at := max(nodes[0], nodes[len(nodes)-1]) - 1
		return d.errorOn(at, fmt.Sprintf("%s and %s exclude each other", other, later), "keep one of them")
	case r.Kind == Together && len(present) > 0 && present[0] == r.Keys[0] && len(present) < len(r.Keys):
		return d.errorOn(nodes[0]-1, fmt.Sprintf("%s without %s", r.Keys[0], strings.Join(r.Keys[1:], ", ")), "add it, or remove "+r.Keys[0])
	case r.Kind == Ascending && len(present) == 2 && d.number(nodes[0]) >= d.number(nodes[1]):
		return d.errorOn(nodes[0], fmt.Sprintf("%s must be less than %s (got %s and %s)", r.Keys[0], r.Keys[1], d.quoted(nodes[0]), d.quoted(nodes[1])), "swap or correct them")
	}
	return nil
}
