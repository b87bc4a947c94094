package element

import (
	"encoding/json"
	"math"
	"os"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// roundCase is one body of testdata/round.json.
type roundCase struct {
	ID   string
	Body struct {
		Type              string
		Radius, R1, R2    float64
		HalfLength        float64 `json:"half_length"`
		Z1, Z2            float64
		Centre, Axis, Ref [3]float64
	}
	Polarization struct {
		Kind     string
		A, C     float64
		Cos, Sin float64
		P        [3]float64
	}
	Points [][3]float64
	Phi    []string
	G      [][3]string
	Region []string
	Tags   []string
}

// build returns the source in its own frame, the pose, the bounding radius and the largest density or polarization.
func (c *roundCase) build(t *testing.T) (src field.Evaluator, pose geom.Pose, bound, pmax float64) {
	t.Helper()
	turn, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatal(err)
	}
	pose = turn.Then(geom.Translate(vec(c.Body.Centre)))
	q := c.Polarization
	var p r3.Vec
	slope := 0.0
	switch q.Kind {
	case "uniform":
		p = turn.VectorToLocal(vec(q.P))
		pmax = r3.Norm(p)
	case "axial_z":
		slope = q.C
		pmax = math.Abs(slope) * c.Body.HalfLength
	case "sheet_linear":
		pmax = math.Abs(q.A)
	case "wall":
		pmax = math.Abs(q.A) + math.Hypot(q.Cos, q.Sin)
	}
	b := c.Body
	switch b.Type {
	case "disc":
		src, err = NewDisc(geom.Disc{Radius: b.Radius}, q.A)
		bound = b.Radius
	case "annulus":
		src, err = NewAnnulus(geom.Annulus{Inner: b.R1, Outer: b.R2}, q.A)
		bound = b.R2
	case "wall":
		src, err = NewWall(geom.Wall{Radius: b.Radius, Z1: b.Z1, Z2: b.Z2}, q.A, q.Cos, q.Sin)
		bound = math.Hypot(b.Radius, (b.Z2-b.Z1)/2)
	case "cylinder":
		src, err = NewCylinder(geom.Cylinder{Radius: b.Radius, Height: 2 * b.HalfLength}, p, slope)
		bound = math.Hypot(b.Radius, b.HalfLength)
	case "tube":
		src, err = NewTube(geom.Tube{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLength}, p, slope)
		bound = math.Hypot(b.R2, b.HalfLength)
	}
	if err != nil {
		t.Fatal(err)
	}
	return src, pose, bound, pmax
}

// roundAt returns the source's value at an outer point, with the field turned into the outer frame.
func roundAt(src field.Evaluator, pose geom.Pose, x r3.Vec, size float64, side field.Side, want field.Want) field.Value {
	l := pose.ToLocal(pair.VecOf(x))
	h, o := l.Value(), l.Low()
	p := field.Points{X: []float64{h.X}, Y: []float64{h.Y}, Z: []float64{h.Z}}
	if pose.Turned() {
		p.XLo, p.YLo, p.ZLo = []float64{o.X}, []float64{o.Y}, []float64{o.Z}
		p.Slack = []float64{4 * u * (r3.Norm(x) + r3.Norm(pose.Shift().Value()) + size)}
	}
	v := field.NewValues(1, want)
	src.Evaluate(v, &p, side)
	r := v.At(0)
	r.G = pose.VectorToOuter(r.G)
	return r
}

func loadRound(t *testing.T, path string) []roundCase {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	var cases []roundCase
	if err := json.Unmarshal(data, &cases); err != nil {
		t.Fatal(err)
	}
	return cases
}

func TestRoundReference(t *testing.T) {
	path := "testdata/round.json"
	if s := os.Getenv("ROUND"); s != "" {
		path = s
	}
	for _, c := range loadRound(t, path) {
		src, pose, a, pmax := c.build(t)
		power := 2.0
		if c.Polarization.Kind == "sheet_linear" || c.Polarization.Kind == "wall" {
			power = 1
		}
		worst, worstPhi := 0.0, 0.0
		under, claims := 0, 0
		for i := range c.Points {
			x := vec(c.Points[i])
			v := roundAt(src, pose, x, a, field.Mean, field.WantPhi|field.WantG|field.WantErr)
			dist := r3.Norm(r3.Sub(x, vec(c.Body.Centre)))
			near := min(1, a/dist)
			phi0, g0 := pmax*a*math.Pow(near, power), pmax*math.Pow(near, power+1)
			if v.Status != field.OnEdge {
				dx, gx := minus(t, v.G.X, c.G[i][0])
				dy, gy := minus(t, v.G.Y, c.G[i][1])
				dz, gz := minus(t, v.G.Z, c.G[i][2])
				e := math.Hypot(math.Hypot(dx, dy), dz)
				if v.Status == field.OnFace { // a turned reference point may be one-sided
					for _, s := range []field.Side{field.Inside, field.Outside} {
						o := roundAt(src, pose, x, a, s, field.WantG)
						dx, _ := minus(t, o.G.X, c.G[i][0])
						dy, _ := minus(t, o.G.Y, c.G[i][1])
						dz, _ := minus(t, o.G.Z, c.G[i][2])
						e = min(e, math.Hypot(math.Hypot(dx, dy), dz))
					}
				}
				ratio := e / (1e-12 * max(r3.Norm(r3.Vec{X: gx, Y: gy, Z: gz}), 1e-3*g0))
				if !(ratio <= worst) {
					worst = ratio
				}
				if !(ratio < 0.1) {
					t.Logf("%s %v %s: g %v want %v, %.2g of the tolerance, %v", c.ID, c.Points[i], c.Tags[i], v.G, c.G[i], ratio, v.Status)
				}
				claims++
				if e > v.ErrG {
					under++
					t.Logf("UNDER %s %v %s: g %v error %.2g claim %.2g", c.ID, c.Points[i], c.Tags[i], v.G, e, v.ErrG)
				}
			}
			d, f := minus(t, v.Phi, c.Phi[i])
			ratio := math.Abs(d) / (1e-12 * max(math.Abs(f), 1e-3*phi0))
			if !(ratio <= worstPhi) {
				worstPhi = ratio
			}
			if !(ratio < 0.1) {
				t.Logf("%s %v %s: phi %v want %v, %.2g of the tolerance, %v", c.ID, c.Points[i], c.Tags[i], v.Phi, c.Phi[i], ratio, v.Status)
			}
			claims++
			if math.Abs(d) > v.ErrPhi {
				under++
				t.Logf("UNDER %s %v %s: phi %v error %.2g claim %.2g", c.ID, c.Points[i], c.Tags[i], v.Phi, d, v.ErrPhi)
			}
		}
		t.Logf("RESULT %-32s g %.2g phi %.2g of the tolerance; %d of %d estimates too small", c.ID, worst, worstPhi, under, claims)
		if !(worst < 1 && worstPhi < 1) {
			t.Errorf("%s: g %.2g phi %.2g of the tolerance", c.ID, worst, worstPhi)
		}
	}
}
