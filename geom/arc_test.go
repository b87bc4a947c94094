package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// azimuth returns the unit vector at the share t of an arc, in pairs.
func azimuth(a Arc, t float64) pair.Vec {
	at := a.From + t*(a.To-a.From)
	return a.span().heading(at)
}

// arcEdges returns points of the rims, the upright edges and the corners of an arc.
func arcEdges(a Arc) (points []pair.Vec) {
	lift := func(e pair.Vec, radius, z float64) {
		x := e.Scale(pair.Of(radius))
		x.Z = pair.Of(z)
		points = append(points, x)
	}
	for k := range 9 {
		for _, radius := range []float64{a.Inner, a.Outer} {
			if radius == 0 && !(k == 0 || k == 8) {
				continue // the tip of the sector
			}
			lift(azimuth(a, float64(k)/8), radius, -a.Height/2)
			lift(azimuth(a, float64(k)/8), radius, a.Height/2)
		}
	}
	if a.Full() {
		return points
	}
	from, to := a.Ends()
	for _, e := range []pair.Vec{from, to} {
		lift(e, a.Inner, 0.1*a.Height)
		lift(e, a.Outer, -0.3*a.Height)
		lift(e, (a.Inner+a.Outer)/2, a.Height/2)
		lift(e, (a.Inner+3*a.Outer)/4, -a.Height/2)
	}
	return points
}

// arcPoint returns the k-th of some points of the faces of an arc and the outward normal there.
func arcPoint(a Arc, k int) (x, normal pair.Vec) {
	e := azimuth(a, float64(k+1)/11)
	up := pair.Vec{Z: pair.Of(1)}
	radius, z, normal := a.Outer, a.Height/4, e
	switch face := k % 6; {
	case face == 0 && a.Inner > 0:
		radius, normal = a.Inner, e.Neg()
	case face == 1:
		radius, z, normal = (a.Inner+a.Outer)/2, a.Height/2, up
	case face == 2:
		radius, z, normal = (a.Inner+a.Outer)/2, -a.Height/2, up.Neg()
	case face == 3 && !a.Full():
		from, _ := a.Ends()
		radius, e, normal = (a.Inner+a.Outer)/2, from, pair.Vec{X: from.Y, Y: from.X.Neg()}
	case face == 4 && !a.Full():
		_, to := a.Ends()
		radius, e, normal = (a.Inner+a.Outer)/2, to, pair.Vec{X: to.Y.Neg(), Y: to.X}
	}
	x = e.Scale(pair.Of(radius))
	x.Z = pair.Of(z)
	return x, normal
}

// Random points are where the plain formula puts them, for spans of all sizes in both units.
func TestLocateArc(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 42))
	for range 400 {
		from := 20 * (rng.Float64() - 0.5)
		to := from + 2*math.Pi*rng.Float64()
		a := Arc{Inner: 0.5 * float64(rng.IntN(2)), Outer: 1, Height: 1, From: from, To: to}
		if rng.IntN(2) == 0 {
			a.From, a.To, a.Degrees = from*180/math.Pi, to*180/math.Pi, true
		}
		if err := a.Check(); err != nil {
			t.Fatal(err)
		}
		for range 30 {
			x := r3.Vec{X: 2.2 * (rng.Float64() - 0.5), Y: 2.2 * (rng.Float64() - 0.5), Z: 1.2 * (rng.Float64() - 0.5)}
			s, turn := math.Hypot(x.X, x.Y), math.Mod(math.Atan2(x.Y, x.X)-from+100*math.Pi, 2*math.Pi)
			in := s > a.Inner && s < 1 && math.Abs(x.Z) < 0.5 && turn < to-from
			if got := a.Locate(pair.VecOf(x), 0); got.Region == Inside != in || got.Region == On {
				t.Errorf("%+v: %v: got %+v, inside by formula %v", a, x, got, in)
			}
		}
	}
}

// A wedge without a bore has its edge on the axis; beyond the edge nothing is near, however sharp it is.
func TestLocateWedge(t *testing.T) {
	sharp := Arc{Outer: 1, Height: 1, From: 0.5, To: 0.5 + 1e-9}
	e := sharp.span().heading(0.5 + 5e-10)
	cases := []struct {
		name string
		body Arc
		x    pair.Vec
		want Place
	}{
		{"on the edge", sharp, pair.Vec{Z: pair.Of(0.25)}, onEdge()},
		{"end of the edge", sharp, pair.Vec{Z: pair.Of(0.5)}, onEdge()},
		{"beyond the edge", sharp, e.Scale(pair.Of(-1e-12)), outside()},
		{"between the ends", sharp, e.Scale(pair.Of(0.5)), inside()},
		{"right before the edge", sharp, e.Scale(pair.Of(1e-5)), inside()},
		{"in the notch", ArcDegrees(0, 1, 1, 0, 359), pair.Vec{X: pair.Of(1e-12), Y: pair.Of(-1e-14)}, outside()},
		{"opposite the notch", ArcDegrees(0, 1, 1, 0, 359), pair.Vec{X: pair.Of(-1e-12), Y: pair.Of(1e-14)}, inside()},
		{"axis of a half", ArcDegrees(0, 1, 1, 0, 180), pair.Vec{}, onEdge()},
	}
	for _, c := range cases {
		if got := c.body.Locate(c.x, 0); got != c.want {
			t.Errorf("%s: got %+v, want %+v", c.name, got, c.want)
		}
	}
}

// Ends in degrees are exact: a quarter turn ends on an axis, its rectangle is in the coordinate plane, and the bounds end
// there.
func TestArcDegreesExact(t *testing.T) {
	a := ArcDegrees(1, 2, 1, 90, 180)
	if want := (r3.Box{Min: r3.Vec{X: -2, Z: -0.5}, Max: r3.Vec{Y: 2, Z: 0.5}}); a.Bounds() != want {
		t.Errorf("bounds %v, want %v", a.Bounds(), want)
	}
	faces := a.Faces()
	for f, want := range map[int]r3.Vec{4: {X: 1}, 5: {Y: -1}} {
		p := faces[f].Surface.(Polygon)
		if n := p.Normal().Value(); n != want {
			t.Errorf("%s: normal %v, want %v", faces[f].Name, n, want)
		}
		for _, v := range p.Vertices {
			if r3.Dot(v, want) != 0 {
				t.Errorf("%s: vertex %v is off the coordinate plane", faces[f].Name, v)
			}
		}
	}
}

// An arc in radians equals the one in degrees where both are exact, and a turn more changes nothing but rounding.
func TestArcUnits(t *testing.T) {
	a, b := Arc{Inner: 1, Outer: 2, Height: 1, To: 2}, ArcDegrees(1, 2, 1, 0, 2*180/math.Pi)
	c := ArcDegrees(1, 2, 1, 360, 360+2*180/math.Pi)
	for _, o := range []Arc{b, c} {
		if d := r3.Norm(r3.Sub(a.Centroid(), o.Centroid())); d > 200*u { // a degree at 474 is rounded to 32 u
			t.Errorf("%+v: centroid %v, want %v", o, o.Centroid(), a.Centroid())
		}
		_, to := a.Ends()
		_, other := o.Ends()
		if d := to.Sub(other).Norm().Value(); d > 200*u { // as above
			t.Errorf("%+v: ends %v off", o, d)
		}
	}
}

// A full turn is the tube.
func TestArcFull(t *testing.T) {
	tube := Tube{Inner: 1, Outer: 2, Height: 3}
	for _, a := range []Arc{
		ArcDegrees(1, 2, 3, -180, 180), ArcDegrees(1, 2, 3, 0.1, 360.1), ArcDegrees(1, 2, 3, 36000-360, 36000),
		{Inner: 1, Outer: 2, Height: 3, From: -math.Pi, To: math.Pi},
		{Inner: 1, Outer: 2, Height: 3, From: 7.3, To: 7.3 + 2*math.Pi},
	} {
		if err := a.Check(); err != nil || !a.Full() {
			t.Errorf("%+v: %v, full %v", a, err, a.Full())
		}
		if a.Volume() != tube.Volume() || a.SecondMoment() != tube.SecondMoment() || a.Bounds() != tube.Bounds() || a.Centroid() != tube.Centroid() {
			t.Errorf("%+v differs from the tube", a)
		}
		for f, face := range a.Faces() {
			if face != tube.Faces()[f] {
				t.Errorf("%+v: face %d is %v", a, f, face)
			}
		}
	}
	if (ArcDegrees(1, 2, 3, 0, 359.9999999999)).Full() {
		t.Error("an arc with a slit is a full turn")
	}
}

// Second moments of thin short arcs keep their digits: along the radius they are V d^2/12 (1 + O(angle^2)).
func TestArcMomentThin(t *testing.T) {
	a := Arc{Inner: 1, Outer: 1 + 0x1p-20, Height: 1, From: -0x1p-21, To: 0x1p-21}
	v, d := a.Volume(), a.Outer-a.Inner
	m := a.SecondMoment()
	if want := v * d * d / 12; !near(m[0][0], want, 1e-11*want) { // angle^2 = 2^-40, d^2 = 2^-40, and V d^2 is the scale
		t.Errorf("radial %v, want %v", m[0][0], want)
	}
	if want := v * (1 + d/2) * (1 + d/2) * 0x1p-40 / 12; !near(m[1][1], want, 1e-11*want) { // as above
		t.Errorf("azimuthal %v, want %v", m[1][1], want)
	}
	// 25 digits by mpmath: (b^4 - a^4)/4 (t + sin t cos t) - A c^2 and (b^4 - a^4)/4 (t - sin t cos t), t = 0.1
	a = Arc{Inner: 1, Outer: 1.25, Height: 1, From: -0.1, To: 0.1}
	for i, want := range [2]float64{0.0002909517969666412135616413, 0.0002397543635851619028996332} {
		if m := a.SecondMoment(); !near(m[i][i], want, 8*u*want) { // a few roundings of products
			t.Errorf("second moment %d: %.17g, want %.17g", i, m[i][i], want)
		}
	}
}

// Bounds of random arcs contain points all along the rims, and each side is met.
func TestArcBounds(t *testing.T) {
	rng := rand.New(rand.NewPCG(43, 44))
	for range 200 {
		from := 20 * (rng.Float64() - 0.5)
		a := Arc{Inner: 0.5, Outer: 1, Height: 1, From: from, To: from + 2*math.Pi*rng.Float64()}
		box, seen := a.Bounds(), nothing()
		for k := range 1001 {
			e := a.span().plainHeading(a.From + float64(k)/1000*(a.To-a.From))
			for _, r := range []float64{a.Inner, a.Outer} {
				x := r3.Vec{X: r * e.cos, Y: r * e.sin}
				if beyond(box, x, 4*u) { // rounding of x
					t.Errorf("%+v: %v is outside %v", a, x, box)
				}
				seen = include(seen, x)
			}
		}
		gap := max(seen.Min.X-box.Min.X, seen.Min.Y-box.Min.Y, box.Max.X-seen.Max.X, box.Max.Y-seen.Max.Y)
		if gap > 1e-5 { // steps of 2 pi/1000: at most step^2/8 beside the widest point
			t.Errorf("%+v: bounds %v, the rims reach %v", a, box, seen)
		}
	}
}
