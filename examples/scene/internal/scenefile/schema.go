package scenefile

import (
	"bytes"
	"encoding/json"
)

// notYet marks in the schema and the description what is refused by name.
const notYet = "Not supported yet."

// A dict is a JSON object; encoding/json writes its keys in alphabetical order.
type dict map[string]any

// Schema returns the JSON Schema (draft 2020-12) of the format. It states forms,
// ranges and most rules between keys; what it cannot state (unique names,
// inner < outer, which shape carries what) only the reader checks. Keys that are
// not supported yet are in it, marked by a comment.
func (t *Table) Schema() ([]byte, error) {
	defs := dict{}
	for i := range t.Objects {
		o := &t.Objects[i]
		if len(o.Variants) == 0 {
			defs[o.Name] = closed(o.Doc, o.Keys, o.Rules)
			continue
		}
		defs[o.Name] = variants(o)
		for j := range o.Variants {
			v := &o.Variants[j]
			s := closed(v.Doc, append(append([]Key(nil), o.Keys...), v.Keys...), append(append([]Rule(nil), o.Rules...), v.Rules...))
			if o.Select != "" {
				s["properties"].(dict)[o.Select] = dict{"const": v.Name}
			}
			mark(s, v.Status)
			defs[o.Name+"."+v.Name] = s
		}
	}
	root := dict{
		"$schema": "https://json-schema.org/draft/2020-12/schema", "title": "Scene file",
		"$ref": "#/$defs/" + t.Objects[0].Name, "$defs": defs,
	}
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", " ")
	err := e.Encode(root)
	return b.Bytes(), err
}

// mark adds the comment on what is not there yet.
func mark(s dict, status Status) {
	switch status {
	case Later:
		s["$comment"] = notYet
	case Skipped:
		s["$comment"] = "Accepted, named in the report, and not written yet."
	}
}

// closed returns the schema of an object that has these keys and no others.
func closed(doc string, keys []Key, rules []Rule) dict {
	properties := dict{}
	required := []string{}
	for _, k := range keys {
		s := k.Type.schema()
		text := k.Doc
		if k.Unit != "" {
			text += " Unit: " + k.Unit + "."
		}
		s["description"] = text
		if k.Default != "" {
			s["default"] = json.RawMessage(k.Default)
		}
		mark(s, k.Status)
		properties[k.Name] = s
		if k.Required {
			required = append(required, k.Name)
		}
	}
	s := dict{"type": "object", "properties": properties, "additionalProperties": false}
	if doc != "" {
		s["description"] = doc
	}
	if len(required) > 0 {
		s["required"] = required
	}
	ruled(s, rules)
	return s
}

// ruled adds rules between keys to the schema of an object.
func ruled(s dict, rules []Rule) {
	all, needs := []any{}, dict{}
	for _, r := range rules {
		var one []any
		for _, k := range r.Keys {
			one = append(one, dict{"required": []string{k}})
		}
		switch r.Kind {
		case ExactlyOne:
			all = append(all, dict{"oneOf": one})
		case AtMostOne:
			all = append(all, dict{"oneOf": append(one, dict{"not": dict{"anyOf": one}})})
		case AtLeastOne:
			all = append(all, dict{"anyOf": one})
		case Together:
			needs[r.Keys[0]] = r.Keys[1:]
		}
	}
	if len(all) > 0 {
		s["allOf"] = all
	}
	if len(needs) > 0 {
		s["dependentRequired"] = needs
	}
}

// variants returns the schema that leads to those of an object's variants.
func variants(o *Object) dict {
	s := dict{"type": "object", "description": o.Doc}
	var cases, names []any
	for _, v := range o.Variants {
		when := dict{"required": []string{v.Name}}
		if o.Select != "" {
			when = dict{"required": []string{o.Select}, "properties": dict{o.Select: dict{"const": v.Name}}}
			names = append(names, v.Name)
		} else {
			names = append(names, when)
		}
		cases = append(cases, dict{"if": when, "then": dict{"$ref": "#/$defs/" + o.Name + "." + v.Name}})
	}
	s["allOf"] = cases
	if o.Select != "" {
		s["properties"], s["required"] = dict{o.Select: dict{"enum": names}}, []string{o.Select}
	} else {
		s["oneOf"] = names
	}
	return s
}

// schema returns the schema of a value.
func (t Type) schema() dict {
	if len(t.Or) == 0 {
		return t.mainSchema()
	}
	any := []dict{t.mainSchema()}
	for _, v := range t.Or {
		s := v.Type.schema()
		s["description"] = v.Doc
		any = append(any, s)
	}
	return dict{"anyOf": any}
}

func (t Type) mainSchema() dict {
	switch t.Base {
	case Text:
		return dict{"type": "string"}
	case Name, Input, Output:
		return dict{"type": "string", "minLength": 1}
	case Choice:
		return dict{"enum": t.Words}
	case Flag:
		return dict{"type": "boolean"}
	case Always:
		return dict{"const": true}
	case Number, Integer:
		return t.numberSchema()
	case Array:
		s := dict{"type": "array", "minItems": t.Len, "maxItems": t.Len, "items": t.Of.schema()}
		if t.Nonzero {
			s["contains"] = dict{"not": dict{"const": 0}}
		}
		return s
	case List:
		s := dict{"type": "array", "items": t.Of.schema()}
		if t.Least > 0 {
			s["minItems"] = t.Least
		}
		return s
	case Numbers:
		return dict{"anyOf": []dict{number().schema(), vector().schema()}}
	}
	return dict{"$ref": "#/$defs/" + t.Object}
}

// numberSchema returns the schema of a number.
func (t Type) numberSchema() dict {
	s := dict{"type": "number"}
	if t.Base == Integer {
		s["type"] = "integer"
	}
	if t.Min != nil && t.Open {
		s["exclusiveMinimum"] = *t.Min
	} else if t.Min != nil {
		s["minimum"] = *t.Min
	}
	if t.Max != nil {
		s["maximum"] = *t.Max
	}
	return s
}
