// Package verify holds the library against what is known about its answers: identities, textbook closed forms, published
// tables, high-precision reference values, independent methods and the laws of the field.
//
// Run evaluates the suite and returns one Case a comparison, in a fixed order; the program verify/report prints them. The
// expected side never comes from the kernels under test: it is field/closedform, testdata, or a formula of a line.
//
// Units are natural (package field) unless Inputs names others; lengths are arbitrary. All publications are cited from
// memory (references.md); the kind TableFromMemory says that the printed digits too were recalled, not read. The package
// measures no speed and proves nothing about inputs that it does not name.
package verify

// Kind tells what the expected value of a case rests on.
type Kind string

// The kinds.
const (
	Identity        Kind = "identity"
	ClosedForm      Kind = "closed form"
	PublishedTable  Kind = "published table"
	TableFromMemory Kind = "published table, from memory" // digits recalled: compared within one unit of the last one
	Reference       Kind = "reference"                    // values in high precision, made outside the library
	Independent     Kind = "independent method"
	Law             Kind = "law"
)

// Kinds returns all kinds in the order of reports.
func Kinds() []Kind {
	return []Kind{Identity, ClosedForm, PublishedTable, TableFromMemory, Reference, Independent, Law}
}

// Case is one comparison, evaluated.
type Case struct {
	ID     string // family and name without blanks, unique: "thin-rod/centre-L=20-a"
	Family string
	Name   string
	Kind   Kind
	Source Source // of the expected value
	Inputs string // in words and numbers

	Expected float64 // NaN where there is only a bound for Got; of a vector the norm
	Got      float64 // of a vector the norm
	Error    float64 // |Got - Expected|; of a vector the norm of the difference; Got where Expected is NaN
	Estimate float64 // the library's own bound for Error; NaN where it gives none or Got is no single value

	Tolerance float64 // for Error, in the same unit
	Reason    string  // why the tolerance is what it is
	OK        bool    // Error <= Tolerance
	Failure   string  // why there is no value, empty if there is one
}

// Published reports whether the case counts as a comparison with a source outside the project: its source is a
// publication, and the expected digits were not merely remembered.
func (c *Case) Published() bool { return c.Source.Key != "" && c.Kind != TableFromMemory }

// limit is a tolerance: size times the larger of |expected| and floor.
type limit struct {
	size, floor float64
	reason      string
}

// contract is the accuracy that the library claims for closed forms, for a body whose g0 (or phi0) is floor/1e-3.
func contract(scale float64) limit {
	return limit{1e-12, 1e-3 * scale, "accuracy contract: 1e-12 of the larger of |value| and 1e-3 of the body's scale"}
}

// within is an absolute tolerance.
func within(size float64, reason string) limit { return limit{size, -1, reason} }

// relative is a tolerance relative to the expected value.
func relative(size float64, reason string) limit { return limit{size, 0, reason} }

// of returns the tolerance for an expected value.
func (l limit) of(expected float64) float64 {
	if l.floor < 0 {
		return l.size
	}
	if expected < 0 {
		expected = -expected
	}
	if expected != expected { // a bound only
		expected = 1
	}
	return l.size * max(expected, l.floor)
}
