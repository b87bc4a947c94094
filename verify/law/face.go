package law

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Face is a point on a charged face, off its edges.
type Face struct {
	X      r3.Vec
	Normal r3.Vec  // unit; on a body it points outward, on a sheet to the side that is called Outside
	Sigma  float64 // surface charge; NaN: not known
	Reach  float64 // distance to the nearest edge or other face, or less. Default: 1/64 of the bounding radius
}

// FacesOf returns the points of the n-th rule on every face of a body, with sigma = p.n. Reach is the same for all: a
// lower bound for the distance of these points from edges and other faces.
func FacesOf(body geom.Body, p field.Polarization, n int, reach float64) []Face {
	var all []Face
	for _, f := range body.Faces() {
		f.Surface.Nodes(n, func(x, normal r3.Vec, _ float64) {
			normal = r3.Scale(f.Sign(), normal)
			all = append(all, Face{X: x, Normal: normal, Sigma: r3.Dot(p.At(x), normal), Reach: reach})
		})
	}
	return all
}

func (k *kit) reach(f Face) float64 {
	if f.Reach > 0 {
		return f.Reach
	}
	return k.size / 64
}

// limit is the field extrapolated to a face from one side.
type limit struct {
	g        r3.Vec
	phi      float64
	tol      float64 // of g
	tolPhi   float64
	largest  float64
	phiScale float64
}

// faceBound is 16^-12 for the coarse rule: the field is taken on a quarter of the reach, and its nearest singularity
// lies on the Bernstein ellipse with the sum 16 of semi-axes; times 4 for the geometric series and constants.
const faceBound = 4 * 0x1p-48

// limit extrapolates from the side of sign: +1 where the normal points.
func (k *kit) limit(f Face, sign float64) limit {
	length := k.reach(f) / 4
	take := func(n int) (l limit, amplified float64) {
		h, w := toEnd(n, length)
		x := make([]r3.Vec, n)
		for i := range h {
			x[i] = r3.Add(f.X, r3.Scale(sign*h[i], f.Normal))
		}
		v := k.values(x, field.WantPhi|field.WantG, field.Mean)
		for i := range h {
			y := v.At(i)
			k.regular(x[i], y, k.phi)
			l.g = r3.Add(l.g, r3.Scale(w[i], y.G))
			l.phi += w[i] * y.Phi
			l.largest, l.phiScale = max(l.largest, r3.Norm(y.G)), max(l.phiScale, math.Abs(y.Phi))
			amplified += math.Abs(w[i])
		}
		return l, amplified
	}
	few, _ := take(coarse)
	l, amplified := take(fine)
	scale := max(l.largest, k.floor(f.X))
	phiScale := max(l.phiScale, k.phiFloor(f.X))
	relative := amplified * (k.Accuracy + 8*u*r3.Norm(f.X)/k.reach(f))
	l.tol = relative*scale + min(r3.Norm(r3.Sub(l.g, few.g)), amplified*faceBound*scale)
	l.tolPhi = relative*(phiScale+scale*length) + min(math.Abs(l.phi-few.phi), amplified*faceBound*phiScale)
	return l
}

// face checks the laws on a charged face.
func (k *kit) face(f Face) {
	out, in := k.limit(f, 1), k.limit(f, -1)
	x := []r3.Vec{f.X}
	tol := out.tol + in.tol
	why := fmt.Sprintf("accuracy %.3g, amplified by extrapolation to the face from Gauss points on %.3g along %s, two rules",
		k.Accuracy, k.reach(f)/4, digits(f.Normal))
	jump := r3.Sub(out.g, in.g)
	normal := r3.Dot(jump, f.Normal)
	if !math.IsNaN(f.Sigma) {
		k.near(JumpNormal, x, normal, f.Sigma, tol+k.Accuracy*math.Abs(f.Sigma), why)
	}
	k.nearVec(JumpAlong, x, r3.Sub(jump, r3.Scale(normal, f.Normal)), r3.Vec{}, tol, why)
	if k.phi {
		k.near(JumpPhi, x, out.phi, in.phi, out.tolPhi+in.tolPhi, why)
	}
	mean := r3.Scale(0.5, r3.Add(out.g, in.g))
	k.nearVec(MeanSides, x, k.src.Field(f.X), mean, 2*tol, why)
	if k.eval == nil {
		return
	}
	for side, want := range [...]struct {
		g   r3.Vec
		phi float64
	}{field.Mean: {mean, 0.5*out.phi + 0.5*in.phi}, field.Inside: {in.g, in.phi}, field.Outside: {out.g, out.phi}} {
		v := k.values(x, field.WantPhi|field.WantG, field.Side(side)).At(0)
		law := OneSide
		if field.Side(side) == field.Mean {
			law = MeanSides
		}
		k.nearVec(law, x, v.G, want.g, 2*tol, why)
		if k.phi {
			k.near(JumpPhi, x, v.Phi, want.phi, 2*(out.tolPhi+in.tolPhi), "on the face: "+why)
		}
		if v.Status != field.OnFace && v.Status != field.NoPotential && normal != 0 && f.Sigma != 0 {
			k.fail(OneSide, x, v.Status, field.OnFace, "none")
		}
	}
}
