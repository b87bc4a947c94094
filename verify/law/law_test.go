package law_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

// formula is a source given by the value at one point.
type formula func(p field.Point, want field.Want, side field.Side) field.Value

func (f formula) Field(x r3.Vec) r3.Vec {
	v := field.NewValues(1, field.WantG)
	f.Evaluate(v, field.PointsOf(x), field.Mean)
	return v.At(0).G
}

func (f formula) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return f(p, want, side) })
}

// bare is a source that has nothing but Field.
type bare func(x r3.Vec) r3.Vec

func (f bare) Field(x r3.Vec) r3.Vec { return f(x) }

var (
	p      = r3.Vec{X: 0.25, Y: -0.5, Z: 1}
	sphere = element.Sphere{Shape: geom.Sphere{Radius: 1}, P: p}
	charge = element.Point{At: r3.Vec{X: 0.25, Y: 0.5, Z: -0.125}, Charge: 2}
	dipole = element.Dipole{At: r3.Vec{X: -0.25, Y: 0.125}, Moment: p}
	box    = r3.Box{Min: r3.Vec{X: -3, Y: -3, Z: -3}, Max: r3.Vec{X: 3, Y: 3, Z: 3}}
)

// valueOf returns what a good source says at one point.
func valueOf(src field.Evaluator, q field.Point, want field.Want, side field.Side) field.Value {
	v := field.NewValues(1, want|field.WantPhi|field.WantG)
	at := field.PointsOf(q.X.Value())
	low := q.X.Low()
	at.XLo, at.YLo, at.ZLo, at.Slack = []float64{low.X}, []float64{low.Y}, []float64{low.Z}, []float64{q.Slack}
	src.Evaluate(v, at, side)
	return v.At(0)
}

func sphereClaims() law.Claims {
	moment := r3.Scale(4*math.Pi/3, p)
	rng := rand.New(rand.NewPCG(1, 2))
	var faces []law.Face
	for range 6 {
		n := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
		faces = append(faces, law.Face{X: n, Normal: n, Sigma: r3.Dot(p, n), Reach: 0.5})
	}
	return law.Claims{
		Bounds: sphere.Bounds(), Clear: func(x r3.Vec) float64 { return math.Abs(r3.Norm(x) - 1) },
		Total: &law.Total{Moment: &moment}, Faces: faces, Order: 3, Accuracy: 1e-13, Potential: true, Seed: 11,
	}
}

func pointClaims(at r3.Vec, q float64, moment r3.Vec, order int) law.Claims {
	return law.Claims{
		Region: box, Bounds: r3.Box{Min: at, Max: at}, Clear: func(x r3.Vec) float64 { return r3.Norm(r3.Sub(x, at)) },
		Total: &law.Total{Charge: q, Moment: &moment, About: at}, Order: order, Accuracy: 1e-13, Potential: true, Seed: 12,
	}
}

func chargeClaims() law.Claims { return pointClaims(charge.At, charge.Charge, r3.Vec{}, 2) }
func dipoleClaims() law.Claims { return pointClaims(dipole.At, 0, dipole.Moment, 3) }

func TestSoundSources(t *testing.T) {
	less := func(c law.Claims) law.Claims { c.Potential = false; return c }
	unknown := sphereClaims()
	unknown.Clear, unknown.Total, unknown.Faces, unknown.Order, unknown.Accuracy = nil, nil, nil, 0, 0
	unknown.Bounds = r3.Box{}
	ball := element.ChargedBall{Shape: geom.Sphere{Radius: 1}, Density: 3}
	hollow := element.HollowSphere{Shape: geom.HollowSphere{Inner: 0.5, Outer: 1}, P: p}
	hollowClaims := sphereClaims()
	hollowClaims.Clear = func(x r3.Vec) float64 { return min(math.Abs(r3.Norm(x)-1), math.Abs(r3.Norm(x)-0.5)) }
	moment := r3.Scale(4*math.Pi/3*(1-0.125), p)
	hollowClaims.Total = &law.Total{Moment: &moment}
	for i := range hollowClaims.Faces {
		hollowClaims.Faces[i].Reach = 0.25
		inner := hollowClaims.Faces[i]
		inner.X, inner.Normal, inner.Sigma = r3.Scale(0.5, inner.Normal), r3.Scale(-1, inner.Normal), -inner.Sigma
		hollowClaims.Faces = append(hollowClaims.Faces, inner)
	}
	faces, hollowFaces := sphereClaims(), hollowClaims
	faces.Faces = law.FacesOf(geom.Sphere{Radius: 1}, field.Uniform{P: p}, 2, 0.5)
	hollowFaces.Faces = law.FacesOf(hollow.Shape, field.Uniform{P: p}, 2, 0.25)
	if len(faces.Faces) == 0 || len(hollowFaces.Faces) != 2*len(faces.Faces) {
		t.Fatalf("FacesOf gives %d and %d points, want twice as many on two faces", len(faces.Faces), len(hollowFaces.Faces))
	}
	ellipsoid, err := element.NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.75, Y: 1, Z: 0.5}}, p)
	if err != nil {
		t.Fatal(err)
	}
	ellipsoidMoment := r3.Scale(4*math.Pi/3*0.75*0.5, p)
	ellipsoidClaims := law.Claims{
		// the surface 1 + e as large is at least e times the shortest semi-axis away
		Clear: func(x r3.Vec) float64 { return 0.5 * math.Abs(r3.Norm(r3.Vec{X: x.X / 0.75, Y: x.Y, Z: x.Z / 0.5})-1) },
		Total: &law.Total{Moment: &ellipsoidMoment}, Order: 3, Accuracy: 1e-13, Potential: true,
	}
	for _, f := range sphereClaims().Faces {
		n := r3.Unit(r3.Vec{X: f.X.X / 0.75, Y: f.X.Y, Z: f.X.Z / 0.5})
		x := r3.Vec{X: 0.75 * f.X.X, Y: f.X.Y, Z: 0.5 * f.X.Z}
		ellipsoidClaims.Faces = append(ellipsoidClaims.Faces, law.Face{X: x, Normal: n, Sigma: r3.Dot(p, n), Reach: 0.125})
	}
	for _, c := range []struct {
		name   string
		src    field.Source
		claims law.Claims
	}{
		{"Sphere with FacesOf", sphere, faces},
		{"HollowSphere with FacesOf", hollow, hollowFaces},
		{"Ellipsoid", ellipsoid, ellipsoidClaims},
		{"Point", charge, chargeClaims()},
		{"Dipole", dipole, dipoleClaims()},
		{"Sphere", sphere, sphereClaims()},
		{"Sphere of which only the bounds are known", sphere, unknown},
		{"HollowSphere", hollow, hollowClaims},
		{"ChargedBall", ball, law.Claims{Total: &law.Total{Charge: 4 * math.Pi, Moment: &r3.Vec{}}, Order: 2, Accuracy: 1e-13}},
		{"Sum", field.Sum{charge, dipole}, law.Claims{Region: box, Bounds: r3.Box{Min: r3.Vec{X: -0.25, Z: -0.125}, Max: r3.Vec{X: 0.25, Y: 0.5}}, Accuracy: 1e-12}},
		{"bare Point", bare(charge.Field), less(chargeClaims())},
		{"bare Dipole", bare(dipole.Field), less(dipoleClaims())},
		{"bare Sphere", bare(sphere.Field), less(sphereClaims())},
		{"formula of Sphere", formula(func(q field.Point, w field.Want, s field.Side) field.Value { return valueOf(sphere, q, w, s) }), sphereClaims()},
	} {
		t.Run(c.name, func(t *testing.T) {
			for seed := range uint64(2) {
				c.claims.Seed = seed
				if err := law.Source(c.src, c.claims); err != nil {
					t.Fatal(err)
				}
			}
		})
	}
}
