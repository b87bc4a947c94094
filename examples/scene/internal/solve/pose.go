package solve

import (
	"fmt"
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// farthest bounds where a frame may stand, in the unit of the file: the range of lengths of package geom.
const farthest = 1e60

// poseOf returns where the frame of part i stands in the scene.
func (s *Setup) poseOf(i int) (geom.Pose, error) {
	part := &s.Scene.Parts[i]
	var pose geom.Pose
	for k, r := range part.Rotations {
		turn, err := geom.Turn(direction(r.Axis), r.Degrees)
		if err != nil {
			return pose, s.Scene.ErrorAt(fmt.Sprintf("/parts/%d/rotations/%d", i, k), plainWords(err), "")
		}
		pose = pose.Then(turn)
	}
	if f := part.Frame; f != nil {
		var x r3.Vec
		if f.X != nil {
			x = direction(*f.X)
		}
		turn, err := geom.Frame(direction(f.Z), x)
		if err != nil {
			return pose, s.Scene.ErrorAt(fmt.Sprintf("/parts/%d/frame", i), plainWords(err), "")
		}
		pose = turn
	}
	pose = pose.Then(geom.Translate(part.Centre))
	if !near(pose) {
		return pose, s.Scene.ErrorAt(fmt.Sprintf("/parts/%d/centre", i), tooFar("centre", pose), unitRemedy)
	}
	return pose, nil
}

// copyOf returns where copy k of part i stands whose own pose is the given one: turned k times, then shifted k steps.
func (s *Setup) copyOf(i, k int, pose geom.Pose) (geom.Pose, error) {
	c := s.Scene.Parts[i].Copies
	n := float64(k)
	if c.Rotation != nil && k > 0 {
		turn, err := turnBy(c.Rotation, n)
		if err != nil {
			return pose, s.Scene.ErrorAt(fmt.Sprintf("/parts/%d/copies/rotation", i), plainWords(err), "")
		}
		pose = pose.Then(turn)
	}
	pose = pose.Then(geom.Shift(pair.Vec{X: pair.Product(n, c.Step.X), Y: pair.Product(n, c.Step.Y), Z: pair.Product(n, c.Step.Z)}))
	if !near(pose) {
		return pose, s.Scene.ErrorAt(fmt.Sprintf("/parts/%d/copies", i), tooFar(fmt.Sprintf("copy %d", k+1), pose), unitRemedy)
	}
	return pose, nil
}

const unitRemedy = "bring it closer, or choose another unit of length"

func tooFar(what string, pose geom.Pose) string {
	o := pose.Origin().Value()
	return fmt.Sprintf("%s stands at [%g, %g, %g], beyond %g", what, o.X, o.Y, o.Z, float64(farthest))
}

// turnBy returns a turn carried out n times.
func turnBy(t *scenefile.Turn, n float64) (geom.Pose, error) {
	pose, err := geom.Turn(direction(t.Axis), t.Degrees*n)
	return pose.About(t.About), err
}

// near reports whether a frame stands within reach; one that overflowed does not.
func near(pose geom.Pose) bool {
	o := pose.Origin().Value()
	return math.Abs(o.X) <= farthest && math.Abs(o.Y) <= farthest && math.Abs(o.Z) <= farthest
}

// direction scales a vector by a power of two to a size near 1, so that neither its square nor its reciprocal overflows.
func direction(v r3.Vec) r3.Vec {
	_, e := math.Frexp(max(math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z)))
	return r3.Vec{X: math.Ldexp(v.X, -e), Y: math.Ldexp(v.Y, -e), Z: math.Ldexp(v.Z, -e)}
}
