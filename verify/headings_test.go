package verify_test

import (
	_ "embed"
	"testing"
)

//go:embed references.md
var referenceList string

// TestHeadings demands the headings Units to Source where a physical quantity is documented.
func TestHeadings(t *testing.T) { reportViolations(t, moduleSource(t).Headings()) }

// TestPackageComments demands one package comment a package.
func TestPackageComments(t *testing.T) { reportViolations(t, moduleSource(t).PackageComments()) }

// TestClaims demands that the tests quoted in comments exist.
func TestClaims(t *testing.T) { reportViolations(t, moduleSource(t).Claims()) }

// TestReferences holds the keys cited in the code against references.md.
func TestReferences(t *testing.T) {
	reportViolations(t, moduleSource(t).References("verify/references.md", referenceList))
}
