package scenefile

import (
	"fmt"
	"io/fs"
	"math"
	"reflect"
	"strconv"
	"strings"

	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/gonum/spatial/r3"
)

// A decoder turns a document into a Scene by the table.
type decoder struct {
	*document
	table   *Table
	folder  fs.FS // of input files; nil where there are none
	scene   *Scene
	fields  map[reflect.Type]map[string]int // tag -> field
	lookup  map[string]map[string]*Key      // object or object.variant -> keys
	outputs map[string]string               // folded name -> pointer of its key
	bodies  map[string]int                  // name of a part or copy -> index of the part
	points  int                             // asked for so far

	positions int // at which a request is asked, more than one within a travel
}

// object decodes object n into dst, a struct; o says how.
func (d *decoder) object(n uint32, o *Object, dst reflect.Value) error {
	if d.kind(n) != '{' {
		return d.errorOn(n, fmt.Sprintf("%s must be an object (got %s)", d.label(n), d.quoted(n)), "write {"+strings.Join(quoteAll(keyNames(o.Keys)), ", ")+"}")
	}
	v, err := d.choose(n, o)
	if err != nil {
		return err
	}
	if err := d.checkKeys(n, o, v); err != nil {
		return err
	}
	if err := d.decodeKeys(n, o.Name, o.Keys, dst); err != nil {
		return err
	}
	if v != nil {
		if err := d.decodeVariant(n, o, v, dst); err != nil {
			return err
		}
	}
	if err := d.checkRules(n, o.Rules); err != nil {
		return err
	}
	return d.checkObject(n, dst.Addr().Interface())
}

// decodeVariant decodes the keys of a variant: those of a shape into a struct of
// its own, those of a request into dst.
func (d *decoder) decodeVariant(n uint32, o *Object, v *Variant, dst reflect.Value) error {
	switch p := dst.Addr().Interface().(type) {
	case *Part:
		p.Class, p.Shape = v.Class, newShape(v.Name)
		dst = reflect.ValueOf(p.Shape).Elem()
	case *Request:
		p.Kind = v.Name
	}
	if err := d.decodeKeys(n, o.Name+"."+v.Name, v.Keys, dst); err != nil {
		return err
	}
	return d.checkRules(n, v.Rules)
}

// decodeKeys decodes those keys of object n that are listed into the fields of
// dst, and fills in defaults.
func (d *decoder) decodeKeys(n uint32, owner string, keys []Key, dst reflect.Value) error {
	present := d.keysOf(owner, keys)
	fields := d.fieldsOf(dst.Type())
	seen := map[string]bool{}
	err := d.children(n, func(name, value uint32) error {
		k, ok := present[d.text(name)]
		if !ok {
			return nil
		}
		seen[k.Name] = true
		if err := d.value(value, &k.Type, k, dst.Field(fields[k.Name])); err != nil {
			return err
		}
		if k.Status == Skipped {
			d.scene.Skipped = append(d.scene.Skipped, SkippedKey{Pointer: d.pointer(value), Key: k.Name, File: d.text(value)})
		}
		return nil
	})
	if err != nil {
		return err
	}
	for i := range keys {
		k := &keys[i]
		if !seen[k.Name] && k.Default != "" && k.Status == Ready {
			if err := d.fill(k, dst.Field(fields[k.Name])); err != nil {
				return err
			}
		}
	}
	return nil
}

// fill decodes the default of a key.
func (d *decoder) fill(k *Key, dst reflect.Value) error {
	doc, err := parse("default", []byte(k.Default))
	if err != nil {
		return err
	}
	inner := *d
	inner.document = doc
	return inner.value(0, &k.Type, k, dst)
}

// keysOf returns the keys of an object or variant by name.
func (d *decoder) keysOf(owner string, keys []Key) map[string]*Key {
	m, ok := d.lookup[owner]
	if !ok {
		m = make(map[string]*Key, len(keys))
		for i := range keys {
			m[keys[i].Name] = &keys[i]
		}
		d.lookup[owner] = m
	}
	return m
}

// fieldsOf returns the fields of a struct by their tags.
func (d *decoder) fieldsOf(t reflect.Type) map[string]int {
	m, ok := d.fields[t]
	if !ok {
		m = map[string]int{}
		for i := range t.NumField() {
			if tag := t.Field(i).Tag.Get("key"); tag != "" {
				m[tag] = i
			}
		}
		d.fields[t] = m
	}
	return m
}

// value decodes node n, of type t, into dst; k is the key that it stands under.
func (d *decoder) value(n uint32, t *Type, k *Key, dst reflect.Value) error {
	if dst.Kind() == reflect.Pointer {
		dst.Set(reflect.New(dst.Type().Elem()))
		dst = dst.Elem()
	}
	if r, ok := dst.Addr().Interface().(*Relative); ok && d.kind(n) == '"' && d.text(n) == "infinite" {
		*r = Relative(math.Inf(1))
		return nil
	}
	switch t.Base {
	case Number, Integer:
		return d.scalar(n, t, k, dst)
	case Array, List:
		return d.sequence(n, t, k, dst)
	case Numbers:
		return d.numbers(n, k, dst)
	case Struct:
		return d.object(n, d.table.object(t.Object), dst)
	case Flag, Always:
		c := d.kind(n)
		if c != 't' && (c != 'f' || t.Base == Always) {
			return d.mismatch(n, t, k)
		}
		dst.SetBool(c == 't')
		return nil
	default:
		return d.word(n, t, k, dst)
	}
}

// scalar decodes a number.
func (d *decoder) scalar(n uint32, t *Type, k *Key, dst reflect.Value) error {
	v, err := d.inside(n, t, k)
	if err != nil {
		return err
	}
	if t.Base == Integer {
		dst.SetInt(int64(v))
	} else {
		dst.SetFloat(v)
	}
	return nil
}

// inside returns the value of number n, held against its type.
func (d *decoder) inside(n uint32, t *Type, k *Key) (float64, error) {
	if !d.isNumber(n) {
		return 0, d.mismatch(n, t, k)
	}
	v := d.number(n)
	if t.Base == Integer && v != math.Trunc(v) {
		return 0, d.mismatch(n, t, k)
	}
	if t.Min != nil && (v < *t.Min || t.Open && v == *t.Min) || t.Max != nil && v > *t.Max {
		return 0, d.errorOn(n, fmt.Sprintf("%s must be %s (got %s)", d.label(n), t.interval(), d.quoted(n)), t.within(k))
	}
	return v, nil
}

// sequence decodes an Array or a List.
func (d *decoder) sequence(n uint32, t *Type, k *Key, dst reflect.Value) error {
	if d.kind(n) != '[' {
		return d.mismatch(n, t, k)
	}
	if t.Base == Array && d.count(n) != t.Len {
		return d.mismatch(n, t, k)
	}
	if t.Base == List && t.Least > 0 && d.count(n) < t.Least {
		return d.mismatch(n, t, k)
	}
	switch v := dst.Addr().Interface().(type) {
	case *r3.Vec:
		return d.vec3(n, t, k, v)
	case *r2.Vec:
		return d.vec2(n, t, k, v)
	case *[]r3.Vec:
		return each(d, n, v, func(c uint32, x *r3.Vec) error { return d.vec3(c, t.Of, k, x) })
	case *[]r2.Vec:
		return each(d, n, v, func(c uint32, x *r2.Vec) error { return d.vec2(c, t.Of, k, x) })
	case *[]int:
		return each(d, n, v, func(c uint32, x *int) error {
			f, err := d.inside(c, t.Of, k)
			*x = int(f)
			return err
		})
	}
	if dst.Kind() == reflect.Slice {
		dst.Set(reflect.MakeSlice(dst.Type(), d.count(n), d.count(n)))
	}
	i := 0
	return d.children(n, func(_, c uint32) error {
		i++
		return d.value(c, t.Of, k, dst.Index(i-1))
	})
}

// each decodes the elements of array n one by one into a slice.
func each[T any](d *decoder, n uint32, dst *[]T, one func(uint32, *T) error) error {
	*dst = make([]T, d.count(n))
	i := 0
	return d.children(n, func(_, c uint32) error {
		i++
		return one(c, &(*dst)[i-1])
	})
}

// vec3 decodes a vector of three.
func (d *decoder) vec3(n uint32, t *Type, k *Key, dst *r3.Vec) error {
	var v [3]float64
	if err := d.components(n, t, k, v[:]); err != nil {
		return err
	}
	*dst = r3.Vec{X: v[0], Y: v[1], Z: v[2]}
	if t.Nonzero && *dst == (r3.Vec{}) {
		return d.zero(n, k)
	}
	return nil
}

// vec2 decodes a vector of two.
func (d *decoder) vec2(n uint32, t *Type, k *Key, dst *r2.Vec) error {
	var v [2]float64
	if err := d.components(n, t, k, v[:]); err != nil {
		return err
	}
	*dst = r2.Vec{X: v[0], Y: v[1]}
	return nil
}

// components decodes an array of numbers of fixed length.
func (d *decoder) components(n uint32, t *Type, k *Key, dst []float64) error {
	if d.kind(n) != '[' {
		return d.mismatch(n, t, k)
	}
	c := n + 1
	for i := range dst {
		if c >= d.nodes[n].next {
			return d.mismatch(n, t, k)
		}
		v, err := d.inside(c, t.Of, k)
		if err != nil {
			return err
		}
		dst[i] = v
		c = d.nodes[c].next
	}
	if c < d.nodes[n].next {
		return d.mismatch(n, t, k)
	}
	return nil
}

// numbers decodes one number or a vector of three.
func (d *decoder) numbers(n uint32, k *Key, dst reflect.Value) error {
	if d.isNumber(n) {
		dst.Set(reflect.ValueOf([]float64{d.number(n)}))
		return nil
	}
	if d.kind(n) != '[' || d.count(n) != 3 {
		return d.mismatch(n, &k.Type, k)
	}
	v, of := make([]float64, 3), vector()
	dst.Set(reflect.ValueOf(v))
	return d.components(n, &of, k, v)
}

// word decodes a text.
func (d *decoder) word(n uint32, t *Type, k *Key, dst reflect.Value) error {
	if d.kind(n) != '"' {
		return d.mismatch(n, t, k)
	}
	text := d.text(n)
	if err := d.checkWord(n, t, text); err != nil {
		return err
	}
	dst.SetString(text)
	return nil
}

// zero refuses a vector of zeros.
func (d *decoder) zero(n uint32, k *Key) error {
	return d.errorOn(n, d.label(n)+" must not be the zero vector", "for example "+strconv.Quote(k.Name)+": "+k.Example)
}

// mismatch refuses a value of the wrong form.
func (d *decoder) mismatch(n uint32, t *Type, k *Key) error {
	remedy := "for example " + strconv.Quote(k.Name) + ": " + k.Example
	if d.kind(n) == 'n' {
		remedy = "leave the key out, or write for example " + k.Example
	}
	return d.errorOn(n, fmt.Sprintf("%s must be %s (got %s)", d.label(n), t.form(), d.quoted(n)), remedy)
}

// label names node n for people: its key, and its place in the lists below it.
func (d *decoder) label(n uint32) string {
	tokens := strings.Split(d.pointer(n), "/")
	for i := len(tokens) - 1; i > 0; i-- {
		if _, err := strconv.Atoi(tokens[i]); err == nil {
			continue
		}
		label := tokens[i]
		for _, index := range tokens[i+1:] {
			label += "[" + index + "]"
		}
		return label
	}
	return "the document"
}
