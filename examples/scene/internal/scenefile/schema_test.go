package scenefile

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"reflect"
	"strings"
	"testing"
)

// A schemaDoc checks values against that part of JSON Schema which the schema of
// scene files uses.
type schemaDoc struct{ defs map[string]any }

// committedSchema reads schema.json.
func committedSchema(t *testing.T) schemaDoc {
	t.Helper()
	b, err := os.ReadFile("../../schema.json")
	if err != nil {
		t.Fatal(err)
	}
	var root struct {
		Defs map[string]any `json:"$defs"`
	}
	if err := json.Unmarshal(b, &root); err != nil {
		t.Fatal(err)
	}
	return schemaDoc{root.Defs}
}

// check returns the first fault of v, or "".
func (d schemaDoc) check(s map[string]any, v any, at string) string {
	valid := func(list any) (n int) {
		for _, sub := range list.([]any) {
			if d.check(sub.(map[string]any), v, at) == "" {
				n++
			}
		}
		return n
	}
	obj, isObj := v.(map[string]any)
	list, isList := v.([]any)
	num, isNum := v.(float64)
	for word, arg := range s {
		bad := false
		switch word {
		case "$ref":
			if f := d.check(d.defs[strings.TrimPrefix(arg.(string), "#/$defs/")].(map[string]any), v, at); f != "" {
				return f
			}
		case "type":
			bad = !hasType(v, arg.(string))
		case "const":
			bad = !reflect.DeepEqual(v, arg)
		case "enum":
			bad = true
			for _, w := range arg.([]any) {
				bad = bad && !reflect.DeepEqual(v, w)
			}
		case "minimum":
			bad = isNum && num < arg.(float64)
		case "maximum":
			bad = isNum && num > arg.(float64)
		case "exclusiveMinimum":
			bad = isNum && num <= arg.(float64)
		case "minLength":
			text, isText := v.(string)
			bad = isText && float64(len([]rune(text))) < arg.(float64)
		case "minItems":
			bad = isList && float64(len(list)) < arg.(float64)
		case "maxItems":
			bad = isList && float64(len(list)) > arg.(float64)
		case "items":
			for i, x := range list {
				if f := d.check(arg.(map[string]any), x, fmt.Sprintf("%s/%d", at, i)); f != "" {
					return f
				}
			}
		case "contains":
			bad = isList
			for _, x := range list {
				bad = bad && d.check(arg.(map[string]any), x, at) != ""
			}
		case "required":
			for _, k := range arg.([]any) {
				_, ok := obj[k.(string)]
				bad = bad || isObj && !ok
			}
		case "dependentRequired":
			for k, needs := range arg.(map[string]any) {
				for _, need := range needs.([]any) {
					_, has := obj[k]
					_, ok := obj[need.(string)]
					bad = bad || has && !ok
				}
			}
		case "properties":
			for k, sub := range arg.(map[string]any) {
				if x, ok := obj[k]; ok {
					if f := d.check(sub.(map[string]any), x, at+"/"+k); f != "" {
						return f
					}
				}
			}
		case "additionalProperties":
			known := s["properties"].(map[string]any)
			for k := range obj {
				_, ok := known[k]
				bad = bad || !ok
			}
		case "allOf":
			for _, sub := range arg.([]any) {
				if f := d.check(sub.(map[string]any), v, at); f != "" {
					return f
				}
			}
		case "anyOf":
			bad = valid(arg) == 0
		case "oneOf":
			bad = valid(arg) != 1
		case "not":
			bad = d.check(arg.(map[string]any), v, at) == ""
		case "if":
			if d.check(arg.(map[string]any), v, at) == "" {
				if f := d.check(s["then"].(map[string]any), v, at); f != "" {
					return f
				}
			}
		case "then", "description", "default", "$comment":
		default:
			return "unknown schema word " + word
		}
		if bad {
			return fmt.Sprintf("%s: %s %v", at, word, arg)
		}
	}
	return ""
}

// hasType reports whether v is of a JSON Schema type.
func hasType(v any, name string) bool {
	switch v := v.(type) {
	case map[string]any:
		return name == "object"
	case []any:
		return name == "array"
	case string:
		return name == "string"
	case bool:
		return name == "boolean"
	case float64:
		return name == "number" || name == "integer" && v == math.Trunc(v)
	}
	return false
}

// validate returns the first fault of a document, or "".
func (d schemaDoc) validate(t *testing.T, data []byte) string {
	t.Helper()
	var v any
	if err := json.Unmarshal(data, &v); err != nil {
		return "syntax: " + err.Error()
	}
	return d.check(d.defs["scene"].(map[string]any), v, "")
}

// TestSchemaAccepts checks that what the reader accepts the schema accepts too.
func TestSchemaAccepts(t *testing.T) {
	schema := committedSchema(t)
	for _, name := range sampleScenes(t) {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		if fault := schema.validate(t, data); fault != "" {
			t.Errorf("%s: %s", name, fault)
		}
	}
}

// TestSchemaRefuses checks that the schema refuses the bad scenes, except for
// rules that it cannot state.
func TestSchemaRefuses(t *testing.T) {
	beyond := []string{
		"byte order mark", "utf-16", "repeated", "wrong UTF-8", "surrogate", "too deep", "more than", "not supported yet", "would be read as 0",
		"control characters", "is already", "must be less", "ends of the prism", "does not exist", "named twice", "is parallel", "cannot be",
		"is for points", "is polarized by", "carries nothing", "too long", "max must be above", "must not", "device name", "is taken", "plain relative",
		"not a regular", "wrong.csv", "wrong.json", "unknown quantity", "value of", "must be a number of a point", "yields", "no part is called", "has no face", "does not say",
		"is for requests", "more than one turn", "must not both be", "dielectric plane without", "on a plane of kind", "is for cylinders", "encloses no area",
		"no part is", "no interaction", "within a travel", "file of one position", "hand_over writes", "has no permittivity", "of the other kind", "the scene has electric and magnetic",
	}
	schema := committedSchema(t)
	for _, c := range badScenes {
		_, err := Parse("scene.json", []byte(c.scene), folder)
		excused := false
		for _, b := range beyond {
			excused = excused || strings.Contains(err.Error(), b)
		}
		if fault := schema.validate(t, []byte(c.scene)); fault == "" && !excused {
			t.Errorf("%s: the schema accepts %.300s\nthe reader says %v", c.name, c.scene, err)
		}
	}
}
