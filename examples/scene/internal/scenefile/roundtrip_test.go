package scenefile

import (
	"encoding/json"
	"os"
	"reflect"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/gonum/spatial/r3"
)

var ignoreDocument = cmp.Options{cmpopts.IgnoreUnexported(Scene{}), cmpopts.EquateEmpty()}

// encode returns a scene, or a part of one, as what encoding/json writes as the
// JSON text it could have been read from.
func encode(v reflect.Value) any {
	switch x := v.Interface().(type) {
	case r3.Vec:
		return []float64{x.X, x.Y, x.Z}
	case r2.Vec:
		return []float64{x.X, x.Y}
	}
	switch v.Kind() {
	case reflect.Pointer, reflect.Interface:
		return encode(v.Elem())
	case reflect.Slice, reflect.Array:
		list := []any{}
		for i := range v.Len() {
			list = append(list, encode(v.Index(i)))
		}
		return list
	case reflect.Struct:
		return encodeStruct(v)
	}
	return v.Interface()
}

// encodeStruct encodes the fields that have keys and are not 0.
func encodeStruct(v reflect.Value) any {
	obj := map[string]any{}
	for i := range v.NumField() {
		field, value := v.Type().Field(i), v.Field(i)
		key := field.Tag.Get("key")
		single := value.Kind() == reflect.Slice && field.Name == "Value"
		switch {
		case field.Name == "Shape":
			for k, x := range encode(value).(map[string]any) {
				obj[k] = x
			}
		case key == "" || value.IsZero() && (!always[key] || value.Kind() == reflect.Pointer || value.Kind() == reflect.Bool):
		case key == "points" && v.FieldByName("PointsFile").String() != "":
		case single && value.Len() == 1:
			obj[key] = value.Index(0).Float()
		case value.Kind() == reflect.String:
			obj[key] = value.String()
		default:
			obj[key] = encode(value)
		}
	}
	if _, sheet := obj["density"]; !sheet {
		if _, charge := obj["charge"]; charge {
			delete(obj, "gradient")
		}
	}
	return obj
}

// always are the keys that are written even where they are 0.
var always = map[string]bool{
	"scale": true, "temperature": true, "degrees": true, "value": true, "gradient": true, "from": true, "to": true, "inner": true, "bottom": true, "top": true, "power": true, "powers": true, "coefficient": true, "corner": true, "min": true,
	"max": true, "within": true, "wanted": true,
}

// reread checks that a scene, written as JSON, reads as the same scene.
func reread(t *testing.T, s *Scene) {
	t.Helper()
	data, err := json.Marshal(encode(reflect.ValueOf(s)))
	if err != nil {
		t.Fatal(err)
	}
	again, err := Parse("scene.json", data, os.DirFS("../../testdata"))
	if err != nil {
		t.Fatalf("a scene that was read is refused when written: %v\n%.2000s", err, data)
	}
	ignore := cmp.Options{ignoreDocument, cmpopts.IgnoreFields(SkippedKey{}, "Pointer"), cmpopts.SortSlices(func(a, b SkippedKey) bool { return a.File < b.File })}
	if diff := cmp.Diff(s, again, ignore); diff != "" {
		t.Fatalf("a scene changes when written and read (-first +again):\n%s", diff)
	}
}

func TestRoundTrip(t *testing.T) {
	for _, name := range sampleScenes(t) {
		s, err := Read(name)
		if err != nil {
			t.Fatal(err)
		}
		reread(t, s)
	}
}

// FuzzScene checks that no input makes the reader panic, that every error is one
// line with a place inside the input, and that every scene reads back as itself.
func FuzzScene(f *testing.F) {
	for _, name := range sampleScenes(f) {
		data, err := os.ReadFile(name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	for _, c := range badScenes {
		if len(c.scene) < 1000 && !strings.Contains(c.scene, "100000") {
			f.Add([]byte(c.scene))
		}
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		s, err := Parse("scene.json", data, os.DirFS("../../testdata"))
		if err == nil {
			if len(s.Parts) < 100 && len(data) < 10000 {
				reread(t, s)
			}
			return
		}
		e, ok := err.(*Error)
		if !ok || s != nil {
			t.Fatalf("Parse = %v, %T; want no scene and an *Error", s, err)
		}
		if text := e.Error(); strings.ContainsAny(text, "\n\r\x1b") || e.Problem == "" || e.Line < 1 || e.Column < 1 || e.Line > len(data)+1 {
			t.Fatalf("error is no line with a place: %q", text)
		}
		if json.Valid(data) && e.Pointer != "" && !strings.HasPrefix(e.Pointer, "/") {
			t.Fatalf("pointer %q", e.Pointer)
		}
	})
}
