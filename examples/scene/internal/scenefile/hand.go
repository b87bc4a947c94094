package scenefile

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// checkHand parses the quantity of hand check n of a request and holds it
// against the request and the scene.
func (d *decoder) checkHand(n uint32, r *Request, h *HandCheck) error {
	at, _ := d.member(n, "quantity")
	gives := d.table.object("request").variant(r.Kind).Gives
	q, m, err := parseQuantity(h.Text, gives)
	if err == nil {
		err = d.checkAddress(q, m)
	}
	if err != nil {
		return d.errorOn(at, err.problem, err.remedy)
	}
	h.Quantity = q
	value, _ := d.member(n, "value")
	if want := q.size(m); want != len(h.Value) {
		return d.errorOn(value, fmt.Sprintf("value of %s must be %s (got %s)", q.shown(), [...]string{1: "a number", 3: "three numbers"}[want], d.quoted(value)),
			`a vector such as B has three, B.z and |B| have one`)
	}
	number, given := d.member(n, "at")
	switch count := r.Count(); {
	case given && count == 0 && h.At > 0:
		return d.errorOn(number, "at is for requests at points", "leave it out")
	case count > 0 && h.At >= count:
		return d.errorOn(number, fmt.Sprintf("at must be a number of a point, from 0 to %d (got %d)", count-1, h.At), "points are counted from 0")
	}
	return nil
}

// A fault is what is wrong, where the place is not known yet.
type fault struct{ problem, remedy string }

// parseQuantity parses [part/[face/]]name, with .x .y .z .min .max behind the
// name or bars around it.
func parseQuantity(text string, gives []Measure) (Quantity, Measure, *fault) {
	address, item := "", text
	if len(gives) > 0 && gives[0].Of != "" {
		if i := strings.LastIndexByte(text, '/'); i >= 0 {
			address, item = text[:i], text[i+1:]
		}
	}
	q := Quantity{Name: item}
	if name, of, ok := strings.Cut(item, "."); ok {
		q.Name, q.Of = name, of
	} else if len(item) > 1 && item[0] == '|' && item[len(item)-1] == '|' {
		q.Name, q.Of = item[1:len(item)-1], "norm"
	}
	i := slices.IndexFunc(gives, func(m Measure) bool { return m.Name == q.Name })
	if i < 0 {
		return q, Measure{}, &fault{fmt.Sprintf("unknown quantity %q", shorten(text)), suggest(q.Name, spellings(gives))}
	}
	m := gives[i]
	if !slices.Contains(m.components(), q.Of) {
		return q, m, &fault{fmt.Sprintf("unknown quantity %q", shorten(text)), "write " + strings.Join(m.spellings(), ", ")}
	}
	switch m.Of {
	case "part":
		q.Part = address
	case "face":
		if j := strings.LastIndexByte(address, '/'); j >= 0 {
			q.Part, q.Face = address[:j], address[j+1:]
		}
	}
	if m.Of != "" && q.Part == "" {
		return q, m, &fault{fmt.Sprintf("quantity %q does not say of which %s", shorten(text), m.Of), "write " + m.spellings()[0]}
	}
	return q, m, nil
}

// components returns what may be asked of a measure; "" is the whole.
func (m Measure) components() []string {
	switch m.Form {
	case "xyz":
		return []string{"", "x", "y", "z", "norm"}
	case "range":
		return []string{"min", "max"}
	}
	return []string{""}
}

// spellings returns how the quantities of a measure are written.
func (m Measure) spellings() []string {
	prefix := map[string]string{"": "", "part": "PART/", "face": "PART/FACE/"}[m.Of]
	var all []string
	for _, c := range m.components() {
		switch c {
		case "":
			all = append(all, prefix+m.Name)
		case "norm":
			all = append(all, prefix+"|"+m.Name+"|")
		default:
			all = append(all, prefix+m.Name+"."+c)
		}
	}
	return all
}

// spellings returns how all quantities of a request are written.
func spellings(gives []Measure) []string {
	var all []string
	for _, m := range gives {
		all = append(all, m.spellings()...)
	}
	return all
}

// size returns how many numbers the value of a quantity has.
func (q Quantity) size(m Measure) int {
	if m.Form == "xyz" && q.Of == "" {
		return 3
	}
	return 1
}

// shown returns a quantity without its address.
func (q Quantity) shown() string {
	switch q.Of {
	case "":
		return q.Name
	case "norm":
		return "|" + q.Name + "|"
	}
	return q.Name + "." + q.Of
}

// checkAddress holds a quantity against the parts of the scene: the part and
// face exist, and something yields a field of that kind.
func (d *decoder) checkAddress(q Quantity, m Measure) *fault {
	if m.Of == "" {
		return d.checkKind(q, m)
	}
	i, ok := d.bodies[q.Part]
	if !ok {
		return &fault{fmt.Sprintf("no part is called %q", shorten(q.Part)), d.partNames(q.Part)}
	}
	p := &d.scene.Parts[i]
	if m.Of == "part" {
		if strings.HasPrefix(m.Name, "volume") && p.Class != Body {
			return &fault{article(p.Kind) + " has no volume", "ask for total_charge"}
		}
		return nil
	}
	if faces := p.faces(d.table.object("part").variant(p.Kind).Faces); !p.hasFace(faces, q.Face) {
		return &fault{fmt.Sprintf("%s has no face %q", article(p.Kind), shorten(q.Face)), "its faces are: " + strings.Join(faces, ", ")}
	}
	return nil
}

// partNames suggests names of bodies for one that does not exist.
func (d *decoder) partNames(name string) string {
	var names []string
	for i := range d.scene.Parts {
		if names = append(names, d.scene.Parts[i].Names()[:1]...); len(names) == 20 {
			break
		}
	}
	return suggest(name, names)
}

// checkKind refuses an electric quantity in a scene without electric parts, and
// likewise for magnetic ones.
func (d *decoder) checkKind(q Quantity, m Measure) *fault {
	var electric, magnetic, circulating bool
	for i := range d.scene.Parts {
		p := &d.scene.Parts[i]
		electric = electric || p.electric()
		magnetic = magnetic || p.magnetic()
		circulating = circulating || p.Circulating != nil
	}
	switch {
	case m.Kind == "E" && !electric:
		return &fault{fmt.Sprintf("nothing in the scene yields %s", q.shown()), "V, E and D need a polarized or charged part"}
	case m.Kind == "B" && !magnetic:
		return &fault{fmt.Sprintf("nothing in the scene yields %s", q.shown()), "Vm, H and B need a magnetized part"}
	case m.Kind == "A" && !circulating:
		return &fault{fmt.Sprintf("nothing in the scene yields %s", q.shown()), "A needs a circulating part"}
	}
	return nil
}

// faces returns which of the faces of its shape a part has.
func (p *Part) faces(all []string) []string {
	var gone []string
	switch s := p.Shape.(type) {
	case *Arc:
		if s.Full() {
			gone = append(gone, "from", "to")
		}
		if s.Inner == 0 {
			gone = append(gone, "inner")
		}
	case *Cone:
		if s.Bottom == 0 {
			gone = append(gone, "bottom")
		}
		if s.Top == 0 {
			gone = append(gone, "top")
		}
	}
	return slices.DeleteFunc(slices.Clone(all), func(f string) bool { return slices.Contains(gone, f) })
}

// hasFace reports whether a part has a face; in faces, "#" stands for a number.
func (p *Part) hasFace(faces []string, name string) bool {
	numbered := 0
	switch s := p.Shape.(type) {
	case *Prism:
		numbered = len(s.Base)
	case *Polyhedron:
		numbered = len(s.Faces)
	}
	for _, f := range faces {
		if prefix, ok := strings.CutSuffix(f, "#"); ok {
			index, isIndexed := strings.CutPrefix(name, prefix)
			i, err := strconv.Atoi(index)
			if isIndexed && err == nil && 0 <= i && i < numbered && strconv.Itoa(i) == index {
				return true
			}
		} else if f == name {
			return true
		}
	}
	return false
}
