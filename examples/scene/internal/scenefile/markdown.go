package scenefile

import (
	"bytes"
	"fmt"
	"strings"
)

// preface is the part of the description that is not about single keys.
const preface = `# Scene files

<!-- Made from the table in internal/scenefile; do not edit. -->

A scene file says which bodies exist, how they are polarized or magnetized, and
what is wanted of them. It is one JSON document (RFC 8259) in UTF-8 without byte
order mark. Lengths are in the unit that ` + "`length`" + ` names, everything else is in SI
units, angles are in degrees unless the key says radians.

An error is one line that names the place, what is wrong and what would be right:

    scene.json:12:7: /parts/3/radius: radius must be > 0 (got -2); give a positive length

Unknown and repeated keys, null, numbers that float64 cannot hold, wrong UTF-8 and
text after the document are errors. A key marked "not yet" belongs to the format
but is refused by this release; one marked "skipped" is accepted and named in the
report, and nothing is written for it.

## Limits and files

- A file has at most 64 MiB, 32 levels of nesting, 1e7 points and 1e5 bodies in all.
- Input files are named relative to the scene's folder, with ` + "`/`" + ` between folders, and
  may not leave it: no absolute name, no ` + "`..`" + `, no link that leads out.
- Output names are plain names, unique in the scene without regard to upper and
  lower case: no folder, no leading dot, none of ` + "`< > : \" | ? * / \\`" + `, no device name
  of Windows, not ` + "`results.json`" + `.
- A file of points has rows x,y,z with decimal points, ` + "`#`" + ` comments, LF or CRLF, and
  may begin with a header line; a unit in it, as in ` + "`x[mm]`" + `, must be the scene's.
`

// Markdown returns the description of the format for people.
func (t *Table) Markdown() []byte {
	var b bytes.Buffer
	b.WriteString(preface)
	for i := range t.Objects {
		o := &t.Objects[i]
		fmt.Fprintf(&b, "\n## %s\n\n", o.Title)
		if o.Doc != "" {
			b.WriteString(o.Doc + "\n\n")
		}
		t.writeKeys(&b, o.Keys)
		writeRules(&b, o.Rules)
		for j := range o.Variants {
			t.writeVariant(&b, &o.Variants[j])
		}
		if o.Name == "hand" {
			t.writeQuantities(&b)
		}
	}
	return b.Bytes()
}

// writeKeys writes a table of keys.
func (t *Table) writeKeys(b *bytes.Buffer, keys []Key) {
	if len(keys) == 0 {
		return
	}
	b.WriteString("| key | value | unit | default | meaning |\n| --- | --- | --- | --- | --- |\n")
	for _, k := range keys {
		standard := "–"
		switch {
		case k.Required:
			standard = "required"
		case k.Default != "":
			standard = "`" + k.Default + "`"
		}
		unit := k.Unit
		if unit == "" {
			unit = "–"
		}
		note := map[Status]string{Later: " **Not yet.**", Skipped: " **Skipped.**"}[k.Status]
		fmt.Fprintf(b, "| `%s` | %s, as `%s` | %s | %s | %s%s |\n", k.Name, t.linked(k.Type.form()), k.Example, unit, standard, k.Doc, note)
	}
}

// linked returns the words for a type with links to the objects that it names.
func (t *Table) linked(form string) string {
	for _, o := range t.Objects {
		anchor := strings.ReplaceAll(strings.ToLower(o.Title), " ", "-")
		form = strings.Replace(form, "("+o.Name+")", "(["+o.Name+"](#"+anchor+"))", 1)
	}
	return form
}

// writeRules writes what holds between keys.
func writeRules(b *bytes.Buffer, rules []Rule) {
	if len(rules) == 0 {
		return
	}
	b.WriteString("\n")
	for _, r := range rules {
		q := make([]string, len(r.Keys))
		for i, k := range r.Keys {
			q[i] = "`" + k + "`"
		}
		all := strings.Join(q, ", ")
		switch r.Kind {
		case ExactlyOne:
			fmt.Fprintf(b, "- Exactly one of %s.\n", all)
		case AtMostOne:
			fmt.Fprintf(b, "- At most one of %s.\n", all)
		case AtLeastOne:
			fmt.Fprintf(b, "- At least one of %s.\n", all)
		case Together:
			fmt.Fprintf(b, "- %s only with %s.\n", q[0], strings.Join(q[1:], ", "))
		case Ascending:
			fmt.Fprintf(b, "- %s < %s.\n", q[0], q[1])
		}
	}
}

// writeVariant writes a section on a shape or a request.
func (t *Table) writeVariant(b *bytes.Buffer, v *Variant) {
	fmt.Fprintf(b, "\n### `%s`\n\n%s", v.Name, v.Doc)
	if v.Status == Later {
		b.WriteString(" **Not yet.**")
	}
	switch v.Class {
	case Sheet:
		b.WriteString(" Carries `charged`.")
	case Point:
		b.WriteString(" No extent.")
	}
	for i, f := range v.Faces {
		b.WriteString(map[bool]string{true: " Faces: ", false: ", "}[i == 0])
		if stem, ok := strings.CutSuffix(f, "#"); ok {
			fmt.Fprintf(b, "`%s0`, `%s1`, …", stem, stem)
		} else {
			b.WriteString("`" + f + "`")
		}
	}
	if len(v.Faces) > 0 {
		b.WriteString(".")
	}
	b.WriteString("\n\n")
	t.writeKeys(b, v.Keys)
	writeRules(b, v.Rules)
}

// writeQuantities writes what hand checks may name.
func (t *Table) writeQuantities(b *bytes.Buffer) {
	b.WriteString(`
A component is written with a dot, a magnitude with bars: ` + "`B.z`, `|B|`" + `; a whole vector
without either, ` + "`B`" + `, and its value has three numbers. What faces and parts carry is
addressed from the left: ` + "`lid magnet/top/charge`, `film/moment.z`" + `. Names of parts may
contain a slash; names of faces do not. Copies are addressed by their own names.

| request | quantity | unit |
| --- | --- | --- |
`)
	for _, v := range t.object("request").Variants {
		for _, m := range v.Gives {
			fmt.Fprintf(b, "| `%s` | `%s` | %s |\n", v.Name, strings.ReplaceAll(strings.Join(m.spellings(), "`, `"), "|", `\|`), dash(m.Unit))
		}
	}
}

// dash returns a text, or a dash for none.
func dash(s string) string {
	if s == "" {
		return "–"
	}
	return s
}
