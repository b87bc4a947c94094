package scenefile

// A Table describes the whole format. Its parts refer to each other by name.
type Table struct {
	Objects []Object // in the order of the documentation; the first is the document itself
}

// An Object is a kind of JSON object: which keys it has and what holds between
// them.
type Object struct {
	Name  string
	Title string // heading
	Doc   string
	Keys  []Key
	Rules []Rule

	// Some objects come in variants with keys of their own: by the value of the
	// key Select or, where that is empty, by which variant's name is present as
	// a key.
	Select   string
	Variants []Variant
}

// A Variant is one kind of an object.
type Variant struct {
	Name   string
	Status Status
	Doc    string
	Keys   []Key
	Rules  []Rule
	Faces  []string  // of a shape; "#" stands for a number from 0
	Class  Class     // of a shape
	Gives  []Measure // of a request: what a hand check may name
}

// A Key is one row of the format.
type Key struct {
	Name     string
	Type     Type
	Required bool
	Unit     string
	Default  string // JSON, applied where the key is absent
	Example  string // JSON
	Doc      string
	Status   Status
}

// A Status says whether this release has what a key asks for.
type Status int

const (
	Ready   Status = iota
	Skipped        // accepted, named in Scene.Skipped, and left out
	Later          // refused by name
)

// A Rule holds between keys of one object.
type Rule struct {
	Kind RuleKind
	Keys []string
}

// A RuleKind says what holds between the keys of a Rule.
type RuleKind int

const (
	ExactlyOne RuleKind = iota // one of the keys is present
	AtMostOne                  // no two are present
	AtLeastOne                 // not all are absent
	Together                   // the first is present only with all others
	Ascending                  // the number of the first is below that of the second
)

// A Class says what a shape is and so what it can carry.
type Class int

const (
	Body  Class = iota // polarized or magnetized
	Sheet              // charged
	Point              // either, as a charge or a moment
)

// A Measure is a quantity that a hand check may name.
type Measure struct {
	Name string
	Of   string // what carries it: "face", "part", or "" where nothing needs naming
	Form string // "xyz" a vector, "range" a min and a max, "" a number
	Unit string
	Kind string // "E" or "B": of the electric or the magnetic kind only
}

// A Type is what a key may hold.
type Type struct {
	Base    Base
	Len     int       // entries of an Array
	Min     *float64  // of a number, or of every component
	Max     *float64  // likewise
	Open    bool      // Min itself is excluded
	Least   int       // fewest elements of a List
	Nonzero bool      // not all components may be 0
	Words   []string  // of a Choice
	Of      *Type     // elements of a List or an Array
	Object  string    // name of an Object
	Or      []Variety // further forms
}

// A Variety is an additional form of a value.
type Variety struct {
	Type Type
	Doc  string
}

// A Base is the JSON form of a Type.
type Base int

const (
	Text    Base = iota
	Name         // a text that is not empty and has no control characters
	Input        // name of a file in the scene's folder
	Output       // name of a file among the results
	Choice       // one of some words
	Flag         // true or false
	Always       // true
	Number       // finite
	Integer      // without fraction
	Array        // fixed number of elements
	List         // any number of elements
	Struct       // an Object
	Numbers      // one number or three
)

// key returns a Key; the methods below refine it.
func key(name string, t Type, example, doc string) Key {
	return Key{Name: name, Type: t, Example: example, Doc: doc}
}

func (k Key) required() Key             { k.Required = true; return k }
func (k Key) unit(u string) Key         { k.Unit = u; return k }
func (k Key) otherwise(json string) Key { k.Default = json; return k }
func (k Key) status(s Status) Key       { k.Status = s; return k }

// bounded returns a copy of t with a range; excluded is whether lo itself is out.
func (t Type) bounded(lo, hi float64, excluded bool) Type {
	t.Min, t.Max, t.Open = &lo, &hi, excluded
	return t
}

func number() Type                  { return Type{Base: Number} }
func positive() Type                { return Type{Base: Number, Min: new(float64), Open: true} }
func atLeast(lo float64) Type       { return Type{Base: Number, Min: &lo} }
func between(lo, hi float64) Type   { return number().bounded(lo, hi, false) }
func integer(lo, hi float64) Type   { return Type{Base: Integer}.bounded(lo, hi, false) }
func array(n int, of Type) Type     { return Type{Base: Array, Len: n, Of: &of} }
func list(least int, of Type) Type  { return Type{Base: List, Least: least, Of: &of} }
func object(name string) Type       { return Type{Base: Struct, Object: name} }
func choice(words ...string) Type   { return Type{Base: Choice, Words: words} }
func vector() Type                  { return array(3, number()) }
func direction() Type               { t := vector(); t.Nonzero = true; return t }
func (t Type) or(v ...Variety) Type { t.Or = v; return t }

// rule returns a Rule.
func rule(kind RuleKind, keys ...string) Rule { return Rule{kind, keys} }

// object returns the Object of a name, or nil.
func (t *Table) object(name string) *Object {
	for i := range t.Objects {
		if t.Objects[i].Name == name {
			return &t.Objects[i]
		}
	}
	return nil
}

// variant returns the Variant of a name, or nil.
func (o *Object) variant(name string) *Variant {
	for i := range o.Variants {
		if o.Variants[i].Name == name {
			return &o.Variants[i]
		}
	}
	return nil
}
