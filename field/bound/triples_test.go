package bound_test

import (
	"path/filepath"
	"strings"
	"testing"

	"example.com/boundpole/verify/refcase"
)

// TestTriples holds error estimates against random triples of body, polarization and point with weight on the hard places
// (verify/testdata/triples, 400 a family of which the slower ones are sampled, made by verify/testdata/more/gen2.py): true in 99.9 % of cases, median overestimate
// at most 100, and the contract of 1e-10 wherever the status is not NotConverged.
func TestTriples(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds; run without -short")
	}
	files, err := filepath.Glob("../../verify/testdata/triples/*.json")
	if err != nil || len(files) < 11 {
		t.Fatalf("%d files of triples, %v; want 11", len(files), err)
	}
	for _, file := range files {
		family := strings.TrimSuffix(filepath.Base(file), ".json")
		t.Run(family, func(t *testing.T) {
			seen := 0
			compareAll(t, 1e-10, 1, func(c *refcase.Case) bool {
				seen++
				switch family {
				case "ellipsoid-affine": // over faces and cells: up to a second each
					return seen%80 == 0
				case "cone", "torus", "disc-linear", "cylinder-axial": // quick, or close to a limit
					return true
				}
				return seen%4 == 0
			}, "triples/"+filepath.Base(file))
		})
	}
}
