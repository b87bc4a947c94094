package scenefile

import (
	"bytes"
	"encoding/json"
	"flag"
	"os"
	"reflect"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "rewrite schema.json and FORMAT.md")

// TestGenerated fails where the committed schema or description is not that of
// the table; go test -update writes them.
func TestGenerated(t *testing.T) {
	schema, err := Format().Schema()
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string][]byte{"../../schema.json": schema, "../../FORMAT.md": Format().Markdown()} {
		if *update {
			if err := os.WriteFile(name, want, 0o644); err != nil {
				t.Fatal(err)
			}
		}
		if got, err := os.ReadFile(name); err != nil || !bytes.Equal(got, want) {
			t.Errorf("%s is stale (%v): run go test -update", name, err)
		}
	}
}

// contract lists the keys of the scene format by object, as the format promises
// them; none may vanish from the table.
var contract = map[string]string{
	"scene":      "version title length accuracy temperature parts applied planes wanted",
	"applied":    "E B",
	"plane":      "kind point normal permittivity",
	"part":       "name shape centre rotations frame copies scale polarized magnetized charged circulating permittivity permeability curve",
	"rotation":   "axis degrees",
	"frame":      "z x",
	"copies":     "count step rotation alternate",
	"turn":       "axis degrees about",
	"polarized":  "uniform moment affine polynomial axial_power radial_power central_power",
	"magnetized": "uniform remanence moment grade along affine polynomial axial_power radial_power central_power",
	"affine":     "value gradient about",
	"term":       "component coefficient powers", "axial_power": "coefficient power",
	"power":   "coefficient power",
	"charged": "density gradient charge",
	"request": "name hand",
	"hand":    "quantity at value within formula",
	"line":    "from to count", "parallelogram": "corner edge1 edge2 counts", "grid": "min max counts",
	"reading": "at normal disc rectangle along", "linkage": "circle polygon turns", "circle": "centre normal radius",
	"force": "on about", "reach": "flux_density", "travel": "part shift rotation count ask",

	"part.box": "size", "part.cylinder": "radius height", "part.tube": "inner outer height", "part.arc": "inner outer height from to from_rad to_rad",
	"part.sphere": "radius", "part.hollow_sphere": "inner outer", "part.ellipsoid": "semiaxes", "part.cone": "bottom top height",
	"part.prism": "base height bottom_slope top_slope", "part.polyhedron": "vertices faces", "part.torus": "major minor", "part.mesh": "file",
	"part.polygon": "vertices", "part.disc": "radius", "part.annulus": "inner outer", "part.point": "",
	"request.charges": "charges", "request.points": "points side by_part gradient", "request.points_file": "points_file side by_part gradient",
	"request.line": "line plot csv", "request.plane": "plane plot csv vtk", "request.grid": "grid csv vtk", "request.reading": "reading",
	"request.linkage": "linkage", "request.force": "force", "request.energy": "energy", "request.reach": "reach", "request.travel": "travel plot csv",
	"request.hand_over": "hand_over kind",
}

// owners calls visit for every object and variant of the table.
func owners(visit func(owner string, o *Object, v *Variant, keys []Key)) {
	table := Format()
	for i := range table.Objects {
		o := &table.Objects[i]
		visit(o.Name, o, nil, o.Keys)
		for j := range o.Variants {
			visit(o.Name+"."+o.Variants[j].Name, o, &o.Variants[j], o.Variants[j].Keys)
		}
	}
}

func TestContract(t *testing.T) {
	missing := map[string]map[string]bool{}
	for owner, keys := range contract {
		missing[owner] = map[string]bool{"": true}
		for _, k := range strings.Fields(keys) {
			missing[owner][k] = true
		}
	}
	owners(func(owner string, _ *Object, _ *Variant, keys []Key) {
		for _, k := range keys {
			delete(missing[owner], k.Name)
		}
		delete(missing[owner], "")
	})
	for owner, keys := range missing {
		for k := range keys {
			t.Errorf("the table lacks %s %s", owner, k)
		}
	}
}

// structs are where the objects of the table are decoded into.
var structs = map[string]any{
	"scene": Scene{}, "part": Part{}, "rotation": Rotation{}, "frame": Frame{}, "copies": Copies{}, "turn": Turn{}, "polarized": Polarization{},
	"magnetized": Polarization{}, "affine": Affine{}, "term": Term{}, "axial_power": AxialPower{}, "power": Power{}, "charged": Charge{}, "applied": Applied{}, "request": Request{}, "line": Line{},
	"parallelogram": Parallelogram{}, "grid": Grid{}, "hand": HandCheck{}, "plane": Plane{}, "reading": Reading{}, "linkage": Linkage{},
	"circle": Circle{}, "force": Force{}, "reach": Reach{}, "travel": Travel{},
}

// TestFields checks that every supported key has a field, and every field a key.
func TestFields(t *testing.T) {
	unused := map[reflect.Type]map[string]bool{}
	d := decoder{fields: map[reflect.Type]map[string]int{}}
	owners(func(owner string, o *Object, v *Variant, keys []Key) {
		if v != nil && v.Status == Later {
			return
		}
		s := structs[o.Name]
		if v != nil && o.Name == "part" {
			s = reflect.ValueOf(newShape(v.Name)).Elem().Interface()
		}
		if s == nil {
			return // only reached through keys that are not supported yet
		}
		typ := reflect.TypeOf(s)
		fields := d.fieldsOf(typ)
		if unused[typ] == nil {
			unused[typ] = map[string]bool{}
			for name := range fields {
				unused[typ][name] = true
			}
		}
		for _, k := range keys {
			if _, ok := fields[k.Name]; !ok && k.Status != Later {
				t.Errorf("%s: no field of %s for key %s", owner, typ.Name(), k.Name)
			}
			delete(unused[typ], k.Name)
		}
	})
	for typ, names := range unused {
		for name := range names {
			t.Errorf("field %s of %s has no key", name, typ.Name())
		}
	}
}

// TestExamples checks that the examples and defaults of the table are values of
// the types that they illustrate, by the schema.
func TestExamples(t *testing.T) {
	schema := committedSchema(t)
	owners(func(owner string, _ *Object, _ *Variant, keys []Key) {
		for _, k := range keys {
			for _, text := range []string{k.Example, k.Default} {
				if text == "" {
					continue
				}
				var v any
				if err := json.Unmarshal([]byte(text), &v); err != nil {
					t.Errorf("%s %s: %s: %v", owner, k.Name, text, err)
					continue
				}
				b, err := json.Marshal(k.Type.schema())
				if err != nil {
					t.Fatal(err)
				}
				var s map[string]any
				if err := json.Unmarshal(b, &s); err != nil {
					t.Fatal(err)
				}
				if fault := schema.check(s, v, ""); fault != "" {
					t.Errorf("%s %s: %s: %s", owner, k.Name, text, fault)
				}
			}
			if k.Example == "" || k.Doc == "" {
				t.Errorf("%s %s: no example or no description", owner, k.Name)
			}
		}
	})
}

// TestLaterKeys checks that every key and variant marked as not supported yet is
// refused by name, whatever it holds.
func TestLaterKeys(t *testing.T) {
	wrap := map[string]func(string) string{
		"scene":      withTop,
		"part":       withLaw,
		"polarized":  func(k string) string { return withLaw(`"polarized":{` + k + `}`) },
		"magnetized": func(k string) string { return withLaw(`"magnetized":{` + k + `}`) },
	}
	refuse := func(owner, name, scene string) {
		_, err := Parse("scene.json", []byte(scene), nil)
		if err == nil || !strings.Contains(err.Error(), `"`+name+`" is not supported yet`) {
			t.Errorf("%s %s: got %v, want %q is not supported yet", owner, name, err, name)
		}
	}
	count := 0
	owners(func(owner string, o *Object, v *Variant, keys []Key) {
		if v != nil && v.Status == Later {
			count++
			if o.Select != "" {
				refuse(owner, v.Name, withShape(`"shape":"`+v.Name+`"`))
			} else {
				refuse(owner, v.Name, withRequest(`{"`+v.Name+`":`+v.Keys[0].Example+`}`))
			}
			return
		}
		for _, k := range keys {
			if k.Status != Later {
				continue
			}
			count++
			pair := `"` + k.Name + `":` + k.Example
			if v != nil {
				refuse(owner, k.Name, withRequest(`{"`+v.Name+`":`+v.Keys[0].Example+`,`+pair+`}`))
			} else {
				refuse(owner, k.Name, wrap[owner](pair))
			}
		}
	})
	if count < 2 {
		t.Errorf("only %d keys and variants are marked", count)
	}
}
