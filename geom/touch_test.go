package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// tilted returns the star in a random plane, some sizes off the origin, with vertices in pairs.
func tilted(t *testing.T, rng *rand.Rand) Polygon {
	t.Helper()
	pose := randomPose(t, rng, math.Exp(3*rng.NormFloat64()))
	var p Polygon
	for _, b := range star {
		v := pose.ToOuter(pair.VecOf(flatVec(b)))
		p.Vertices, p.Low = append(p.Vertices, v.Value()), append(p.Low, v.Low())
	}
	return p
}

// unsure returns about how many tolerances off a rim or an edge a point is put: close to 1, and from 0 to 10.
func unsure(rng *rand.Rand) float64 {
	if rng.IntN(2) == 0 {
		return 1 + 0.02*rng.NormFloat64()
	}
	return 10 * rng.Float64()
}

// Where plain arithmetic is sure, it says what pairs say; and it is sure of most.
func TestTouchPlain(t *testing.T) {
	rng := rand.New(rand.NewPCG(61, 1))
	edges, edgesSure, rims, rimsSure := 0, 0, 0, 0
	for range 200 {
		p := tilted(t, rng)
		l, plane, bounds := p.loop(), p.loop().plane(), p.Bounds()
		axis := steepest(plane.normal.Value())
		for k := range l.len() {
			for range 40 {
				on := l.at(k).Add(l.at(k + 1).Sub(l.at(k)).Scale(pair.Of(float64(rng.IntN(5)) / 4)))
				tol := OnTolerance(bounds, on.Value(), 0)
				x := on.Add(pair.VecOf(r3.Scale(unsure(rng)*tol, r3.Unit(randomVec(rng)))))
				if near, sure := l.nearEdge(k, x.Value(), tol); sure {
					edgesSure++
					if d := apartFrom(l.at(k), l.at(k+1), x); near != (d <= tol) {
						t.Errorf("edge %d: near is %v at %v tolerances", k, near, d/tol)
					}
				}
				edges++
				if rng.IntN(2) == 0 { // far from the edge
					x = on.Add(pair.VecOf(r3.Scale(0.1, randomVec(rng))))
				}
				height := plane.normal.Dot(x.Sub(plane.mean))
				foot := x.Sub(plane.normal.Scale(height))
				in, sure := l.coversPlain(r3.Sub(x.Value(), r3.Scale(height.Hi, plane.normal.Value())), axis, 3*tol)
				if want := l.covers(drop(foot, axis), axis); sure && in != want {
					t.Errorf("edge %d: covered is %v, want %v", k, in, want)
				}
				if sure {
					rimsSure++
				}
				rims++
			}
		}
	}
	if edgesSure < edges/4 || rimsSure < rims/2 {
		t.Errorf("sure of %d edges of %d and of %d points of %d", edgesSure, edges, rimsSure, rims)
	}
	if edgesSure == edges || rimsSure == rims {
		t.Errorf("sure of all %d edges or all %d points: the points are too easy", edges, rims)
	}
}

// The tolerance is sharp on rims too: 0.99 tolerances off an edge or a vertex, in the plane or out of it, is on the rim,
// and 1.01 is not.
func TestTouchSharp(t *testing.T) {
	rng := rand.New(rand.NewPCG(61, 2))
	for range 100 {
		p := tilted(t, rng)
		l, n := p.loop(), p.Normal()
		for k := range l.len() {
			a, b := l.at(k), l.at(k+1)
			along := b.Sub(a).Unit()
			out := along.Cross(n) // away from the polygon, which runs counter-clockwise about n
			corner := l.at((k + l.len() - 1) % l.len()).Sub(a).Unit().Add(along).Neg().Unit()
			if l.at((k+l.len()-1)%l.len()).Sub(a).Cross(along).Dot(n).Sign() > 0 { // a corner that points inward
				corner = n
			}
			for _, c := range []struct{ on, way pair.Vec }{
				{a.Add(b.Sub(a).Scale(pair.Of(0.37))), out}, {a.Add(b.Sub(a).Scale(pair.Of(0.63))), n}, {a, corner}, {a, n},
			} {
				tol := OnTolerance(p.Bounds(), c.on.Value(), 0)
				for d, want := range map[float64]contact{0: atRim, 0.99: atRim, 1.01: apart} {
					x := c.on.Add(c.way.Scale(pair.Of(d * tol)))
					if got, _ := l.touch(x, tol); got != want {
						t.Errorf("edge %d: %v tolerances off: contact %v, want %v", k, d, got, want)
					}
				}
			}
		}
	}
}
