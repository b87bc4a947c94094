package law

import (
	"errors"
	"fmt"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// Law is a law of the static field, or of the contract of field.Source, as a sentence.
type Law string

// The laws.
const (
	Finite     Law = "the field is finite and regular away from all charge, and NaN where its status says that it does not exist"
	BadPoint   Law = "a point that is not finite gives NaN in all components and the status BadInput"
	Curl       Law = "g is curl-free: its circulation round any closed loop is zero"
	Divergence Law = "g is free of divergence where there is no charge: its flux through a closed surface that holds none is zero"
	Harmonic   Law = "g and phi in the centre of an empty ball are their means over its surface"
	Charge     Law = "the flux of g through a closed surface is the charge inside"
	Moment     Law = "the dipole part of g outside is that of the moment of the charge"
	Gradient   Law = "the gradient of g is that of the field, symmetric and without trace where there is no charge"
	Potential  Law = "g is minus the gradient of phi: phi(b) - phi(a) = -int g.dl"
	Vanishes   Law = "phi vanishes at infinity"
	Offered    Law = "the potential is offered, as claimed"
	Decay      Law = "far away |g| falls with an integer power of the distance: 2 with net charge, 3 with a moment, 4 and more else"
	JumpNormal Law = "across a charged face the normal component of g jumps by sigma"
	JumpAlong  Law = "across a charged face the components of g along it are continuous"
	JumpPhi    Law = "across a charged face phi is continuous"
	MeanSides  Law = "on a charged face Field is the mean of both sides"
	OneSide    Law = "on a charged face Inside and Outside give the limits from their side, with the status OnFace"
	Batch      Law = "a batch gives the same bits as its points one by one"
	NilArrays  Law = "an array left nil does not change the others"
	Agree      Law = "an upgrade agrees with Field"
	Untouched  Law = "evaluation does not change its inputs"
	Repeatable Law = "the same point gives the same bits whenever it is asked for"
	Estimate   Law = "an estimate of the error is neither negative nor NaN"
)

// Violation is one failure of one law.
type Violation struct {
	Law       Law
	Points    []r3.Vec // the input: a point, the two ends of a path, or the centre of a loop or a surface
	Got, Want any
	Tolerance string // with where it comes from
	Seed      uint64
}

// Error returns the law, the input with all digits, what came out and what should have.
func (v *Violation) Error() string {
	var b strings.Builder
	fmt.Fprintf(&b, "law: broken: %s; at", v.Law)
	for _, x := range v.Points {
		fmt.Fprintf(&b, " (%.17g, %.17g, %.17g)", x.X, x.Y, x.Z)
	}
	fmt.Fprintf(&b, ": got %s, want %s; tolerance %s; seed %d", digits(v.Got), digits(v.Want), v.Tolerance, v.Seed)
	return b.String()
}

func digits(a any) string {
	switch a := a.(type) {
	case float64:
		return fmt.Sprintf("%.17g", a)
	case r3.Vec:
		return fmt.Sprintf("(%.17g, %.17g, %.17g)", a.X, a.Y, a.Z)
	}
	return fmt.Sprint(a)
}

// Violations returns the violations that an error of Source joins.
func Violations(err error) []*Violation {
	var v *Violation
	if joined, ok := err.(interface{ Unwrap() []error }); ok {
		var all []*Violation
		for _, e := range joined.Unwrap() {
			all = append(all, Violations(e)...)
		}
		return all
	}
	if errors.As(err, &v) {
		return []*Violation{v}
	}
	return nil
}

// fail records a violation.
func (k *kit) fail(law Law, x []r3.Vec, got, want any, tolerance string) {
	const shown = 3
	for i := range k.broken {
		b := &k.broken[i]
		if b.law != law {
			continue
		}
		if len(b.first) < shown {
			b.first = append(b.first, &Violation{law, x, got, want, tolerance, k.Seed})
		} else {
			b.more++
		}
		return
	}
	k.broken = append(k.broken, broken{law: law, first: []error{&Violation{law, x, got, want, tolerance, k.Seed}}})
}

// near records a violation unless |got - want| <= tol.
func (k *kit) near(law Law, x []r3.Vec, got, want, tol float64, why string) {
	if d := got - want; !(d <= tol && -d <= tol) {
		k.fail(law, x, got, want, fmt.Sprintf("%.3g (%s)", tol, why))
	}
}

// nearVec records a violation unless |got - want| <= tol.
func (k *kit) nearVec(law Law, x []r3.Vec, got, want r3.Vec, tol float64, why string) {
	if !(r3.Norm(r3.Sub(got, want)) <= tol) {
		k.fail(law, x, got, want, fmt.Sprintf("%.3g (%s)", tol, why))
	}
}

// result joins what failed.
func (k *kit) result() error {
	var all []error
	for _, b := range k.broken {
		all = append(all, b.first...)
		if b.more > 0 {
			all = append(all, fmt.Errorf("law: broken %d more times: %s; seed %d", b.more, b.law, k.Seed))
		}
	}
	return errors.Join(all...)
}
