package verify_test

import (
	"os"
	"testing"

	"example.com/boundpole/verify/internal/house"
)

// moduleSource parses the module once a test.
func moduleSource(t *testing.T) *house.Tree {
	t.Helper()
	tree, err := house.Read(os.DirFS(".."))
	if err != nil {
		t.Fatal(err)
	}
	const least = 100 // files; the tree has far more, so that fewer means a wrong folder
	if len(tree.Files) < least {
		t.Fatalf("%d Go files below the root, want at least %d", len(tree.Files), least)
	}
	return tree
}

func reportViolations(t *testing.T, found []house.Violation) {
	t.Helper()
	for _, v := range found {
		t.Error(v)
	}
}

// TestImports holds the imports of the module against the table of house/imports.go, which is the policy.
func TestImports(t *testing.T) {
	tree := moduleSource(t)
	reportViolations(t, tree.Rooms())
	reportViolations(t, tree.Imports())
}

// TestQuiet demands that libraries neither print nor panic with a text made at run time.
func TestQuiet(t *testing.T) { reportViolations(t, moduleSource(t).Quiet()) }
