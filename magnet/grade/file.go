package grade

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"math"
	"reflect"
	"strings"
	"unicode/utf8"
)

// Format names the file format in its "format" key.
const Format = "boundpole magnet grade"

// Limit of the size of a file, far above what a data sheet needs.
const maxSize = 1 << 20

// file is a grade as it stands in a file: units in the names, coefficients in percent per kelvin as data sheets print them.
type file struct {
	Format    string   `json:"format"`
	Version   int      `json:"version"`
	Name      string   `json:"name"`
	Source    string   `json:"source"`
	Reference *float64 `json:"reference_temperature_C"`
	Br        *span    `json:"remanence_T"`
	HcJ       *span    `json:"intrinsic_coercivity_A_per_m,omitempty"`
	Hk        float64  `json:"knee_field_A_per_m,omitempty"`
	Recoil    *float64 `json:"recoil_permeability"`
	Alpha     float64  `json:"remanence_percent_per_K,omitempty"`
	Beta      float64  `json:"coercivity_percent_per_K,omitempty"`
	Holds     *holds   `json:"coefficients_hold_C,omitempty"`
}

type span struct {
	Min     float64 `json:"min,omitempty"`
	Typical float64 `json:"typical,omitempty"`
	Max     float64 `json:"max,omitempty"`
}

type holds struct {
	From float64 `json:"from"`
	To   float64 `json:"to"`
}

// Read reads a grade from a JSON document of at most 1 MiB and checks it. Unknown and repeated keys are errors.
//
//	{
//	  "format": "boundpole magnet grade",
//	  "version": 1,
//	  "name": "Quillon K130",
//	  "source": "invented for this example",
//	  "reference_temperature_C": 20,
//	  "remanence_T": {"min": 1.27, "typical": 1.30, "max": 1.33},
//	  "intrinsic_coercivity_A_per_m": {"min": 955e3},
//	  "knee_field_A_per_m": 900e3,
//	  "recoil_permeability": 1.05,
//	  "remanence_percent_per_K": -0.12,
//	  "coercivity_percent_per_K": -0.75,
//	  "coefficients_hold_C": {"from": -40, "to": 125}
//	}
//
// Required are format, version, name, source, reference_temperature_C, recoil_permeability and one value of remanence_T.
func Read(r io.Reader) (*Grade, error) {
	data, err := io.ReadAll(io.LimitReader(r, maxSize+1))
	switch {
	case err != nil:
		return nil, fmt.Errorf("grade: %w", err)
	case len(data) > maxSize:
		return nil, fmt.Errorf("grade: more than %d bytes; a grade is one small JSON document", maxSize)
	case !utf8.Valid(data):
		return nil, errors.New("grade: not UTF-8; save the file as UTF-8 text")
	}
	if err := checkKeys(data); err != nil {
		return nil, err
	}
	d := json.NewDecoder(bytes.NewReader(data))
	d.DisallowUnknownFields()
	var f file
	if err := d.Decode(&f); err != nil {
		return nil, fmt.Errorf("grade: %w; see the documentation of grade.Read for the keys", err)
	}
	if _, err := d.Token(); err != io.EOF {
		return nil, errors.New("grade: text after the document; want one JSON object")
	}
	return f.grade()
}

// keys are all keys that a file may have, at any depth, in their exact spelling.
var keys = keysOf(reflect.TypeFor[file](), map[string]bool{})

// keysOf adds the keys of a struct and of the structs in it to known.
func keysOf(t reflect.Type, known map[string]bool) map[string]bool {
	for i := range t.NumField() {
		f := t.Field(i)
		name, _, _ := strings.Cut(f.Tag.Get("json"), ",")
		known[name] = true
		if f.Type.Kind() == reflect.Pointer && f.Type.Elem().Kind() == reflect.Struct {
			keysOf(f.Type.Elem(), known)
		}
	}
	return known
}

// checkKeys returns an error if an object of the document has a key that is not known, or one twice.
func checkKeys(data []byte) error {
	d := json.NewDecoder(bytes.NewReader(data))
	var seen []map[string]bool // nil for an array
	key := false               // the next token of an object is a key
	for {
		t, err := d.Token()
		if err != nil {
			return nil // what is wrong is said where the document is decoded
		}
		switch v := t.(type) {
		case json.Delim:
			switch v {
			case '{':
				seen, key = append(seen, map[string]bool{}), true
				continue
			case '[':
				seen, key = append(seen, nil), false
				continue
			}
			seen = seen[:len(seen)-1]
		case string:
			if key {
				at := seen[len(seen)-1]
				if !keys[v] {
					return fmt.Errorf("grade: key %q is not known; see the documentation of grade.Read", v)
				}
				if at[v] {
					return fmt.Errorf("grade: key %q stands twice; keep one", v)
				}
				at[v], key = true, false
				continue
			}
		}
		key = len(seen) > 0 && seen[len(seen)-1] != nil
	}
}

// grade returns what the file says, checked.
func (f *file) grade() (*Grade, error) {
	switch {
	case f.Format != Format:
		return nil, fmt.Errorf("grade: format is %q; want %q", f.Format, Format)
	case f.Version != 1:
		return nil, fmt.Errorf("grade: version is %d; want 1", f.Version)
	case f.Name == "":
		return nil, errors.New("grade: name is missing or empty; say what the material is called")
	case f.Reference == nil:
		return nil, errors.New("grade: reference_temperature_C is missing; say at which temperature the numbers hold")
	case f.Br == nil:
		return nil, errors.New("grade: remanence_T is missing; give at least one of min, typical, max")
	case f.Recoil == nil:
		return nil, errors.New("grade: recoil_permeability is missing; give the relative one, 1 for a rigid magnet")
	case f.Holds == nil && (f.Alpha != 0 || f.Beta != 0):
		return nil, errors.New("grade: coefficients_hold_C is missing; say from which to which temperature the coefficients hold")
	}
	g := &Grade{
		Name: f.Name, Source: f.Source, Reference: *f.Reference, Br: Range(*f.Br), Hk: f.Hk, Recoil: *f.Recoil,
		Alpha: f.Alpha / 100, Beta: f.Beta / 100,
	}
	if f.HcJ != nil {
		g.HcJ = Range(*f.HcJ)
	}
	if f.Holds != nil {
		g.From, g.To = f.Holds.From, f.Holds.To
	}
	if err := g.Check(); err != nil {
		return nil, err
	}
	return g, nil
}

// Write writes the grade as Read reads it.
func (g *Grade) Write(w io.Writer) error {
	if err := g.Check(); err != nil {
		return err
	}
	br, hcj := span(g.Br), span(g.HcJ)
	f := file{
		Format: Format, Version: 1, Name: g.Name, Source: g.Source, Reference: &g.Reference, Br: &br, Hk: g.Hk, Recoil: &g.Recoil,
		Alpha: percent(g.Alpha), Beta: percent(g.Beta),
	}
	if g.HcJ != (Range{}) {
		f.HcJ = &hcj
	}
	if g.From != 0 || g.To != 0 {
		f.Holds = &holds{g.From, g.To}
	}
	data, err := json.MarshalIndent(f, "", "  ")
	if err != nil {
		return fmt.Errorf("grade: %w", err)
	}
	_, err = w.Write(append(data, '\n'))
	return err
}

// percent returns 100 x without the noise of the multiplication.
func percent(x float64) float64 { return math.Round(100*x*1e12) / 1e12 }
