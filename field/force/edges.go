package force

import (
	"math"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// curve is an edge or rim of a body, where its field may be infinite: a straight line from a to b, or the part of a circle.
type curve struct {
	a, b   r3.Vec  // ends of a line
	round  bool    // a circle:
	centre r3.Vec  // its centre,
	e1, e2 r3.Vec  // two perpendicular vectors as long as its radius
	from   float64 // and its range of angle
	angle  float64
}

// at returns the point at the share t of the curve.
func (c *curve) at(t float64) r3.Vec {
	if !c.round {
		return r3.Add(c.a, r3.Scale(t, r3.Sub(c.b, c.a)))
	}
	s, k := math.Sincos(c.from + t*c.angle)
	return r3.Add(c.centre, r3.Add(r3.Scale(k, c.e1), r3.Scale(s, c.e2)))
}

// apart returns the distance of x from the curve; of a circle, the whole of it counts.
func (c *curve) apart(x r3.Vec) float64 {
	if !c.round {
		e, d := r3.Sub(c.b, c.a), r3.Sub(x, c.a)
		t := min(max(r3.Dot(e, d)/r3.Norm2(e), 0), 1)
		return r3.Norm(r3.Sub(d, r3.Scale(t, e)))
	}
	d := r3.Sub(x, c.centre)
	r := r3.Norm(c.e1)
	if r == 0 {
		return r3.Norm(d)
	}
	s, t := r3.Dot(d, c.e1)/r, r3.Dot(d, c.e2)/r
	h2 := max(0, r3.Norm2(d)-s*s-t*t)
	off := math.Hypot(s, t) - r
	return math.Sqrt(h2 + off*off)
}

// edgesOf returns the edges and rims of the faces of a body that have edges of their own.
func edgesOf(b geom.Body) []curve {
	var all []curve
	for _, f := range b.Faces() {
		all = append(all, edgesOfFace(f)...)
	}
	return all
}

func edgesOfFace(f geom.Face) []curve {
	var pose geom.Pose
	s := f.Surface
	switch p := s.(type) {
	case geom.PlacedSurface:
		s, pose = p.Surface, p.Pose
	case geom.PlacedSheet:
		s, pose = p.Sheet, p.Pose
	}
	all := edgesOfSurface(s)
	for i := range all {
		all[i] = all[i].placed(pose)
	}
	return all
}

// known reports whether all edges of a surface are known.
func known(s geom.Surface) bool {
	if p, ok := s.(geom.PlacedSurface); ok {
		s = p.Surface
	}
	switch s.(type) {
	case geom.SphereSurface, geom.EllipsoidSurface, geom.TorusSurface:
		return true
	}
	return len(edgesOfSurface(s)) > 0
}

func edgesOfSurface(s geom.Surface) []curve {
	switch f := s.(type) {
	case geom.Polygon:
		var all []curve
		for k, v := range f.Vertices {
			all = append(all, curve{a: v, b: f.Vertices[(k+1)%len(f.Vertices)]})
		}
		return all
	case geom.Disc:
		return []curve{rim(f.Radius, f.Z)}
	case geom.Annulus:
		return []curve{rim(f.Inner, f.Z), rim(f.Outer, f.Z)}
	case geom.Wall:
		return []curve{rim(f.Radius, f.Z1), rim(f.Radius, f.Z2)}
	case geom.ConeWall:
		return []curve{rim(f.R1, f.Z1), rim(f.R2, f.Z2)}
	case geom.WallSector:
		from, to := f.Ends()
		all := []curve{rim(f.Radius, f.Z1), rim(f.Radius, f.Z2)}
		for i := range all {
			all[i].from, all[i].angle = math.Atan2(from.Y.Value(), from.X.Value()), f.Angle()
		}
		for _, e := range [2]pair.Vec{from, to} {
			at := func(z float64) r3.Vec { return r3.Vec{X: f.Radius * e.X.Value(), Y: f.Radius * e.Y.Value(), Z: z} }
			all = append(all, curve{a: at(f.Z1), b: at(f.Z2)})
		}
		return all
	case geom.Sector:
		from, to := f.Ends()
		all := []curve{rim(f.Inner, f.Z), rim(f.Outer, f.Z)}
		for i := range all {
			all[i].from, all[i].angle = math.Atan2(from.Y.Value(), from.X.Value()), f.Angle()
		}
		for _, e := range [2]pair.Vec{from, to} {
			at := func(r float64) r3.Vec { return r3.Vec{X: r * e.X.Value(), Y: r * e.Y.Value(), Z: f.Z} }
			all = append(all, curve{a: at(f.Inner), b: at(f.Outer)})
		}
		return all
	}
	return nil
}

func rim(radius, z float64) curve {
	return curve{round: true, centre: r3.Vec{Z: z}, e1: r3.Vec{X: radius}, e2: r3.Vec{Y: radius}, angle: 2 * math.Pi}
}

// placed returns the curve in the outer frame.
func (c curve) placed(p geom.Pose) curve {
	at := func(x r3.Vec) r3.Vec { return p.ToOuter(pair.VecOf(x)).Value() }
	c.a, c.b, c.centre = at(c.a), at(c.b), at(c.centre)
	c.e1, c.e2 = p.VectorToOuter(c.e1), p.VectorToOuter(c.e2)
	return c
}
