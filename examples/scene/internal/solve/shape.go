package solve

import (
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// shapeOf returns the body or the sheet of a shape; neither for a point.
func shapeOf(shape any) (geom.Body, geom.Sheet) {
	switch v := shape.(type) {
	case *scenefile.Box:
		return geom.Box{Size: vec(v.Size)}, nil
	case *scenefile.Cylinder:
		return geom.Cylinder{Radius: v.Radius, Height: v.Height}, nil
	case *scenefile.Tube:
		return geom.Tube{Inner: v.Inner, Outer: v.Outer, Height: v.Height}, nil
	case *scenefile.Arc:
		from, to, degrees := v.Angles()
		return geom.Arc{Inner: v.Inner, Outer: v.Outer, Height: v.Height, From: from, To: to, Degrees: degrees}, nil
	case *scenefile.Sphere:
		return geom.Sphere{Radius: v.Radius}, nil
	case *scenefile.HollowSphere:
		return geom.HollowSphere{Inner: v.Inner, Outer: v.Outer}, nil
	case *scenefile.Ellipsoid:
		return geom.Ellipsoid{SemiAxes: vec(v.Semiaxes)}, nil
	case *scenefile.Cone:
		return geom.Cone{Bottom: v.Bottom, Top: v.Top, Height: v.Height}, nil
	case *scenefile.Torus:
		return geom.Torus{Major: v.Major, Minor: v.Minor}, nil
	case *scenefile.Prism:
		base := make([][2]float64, len(v.Base))
		for i, b := range v.Base {
			base[i] = [2]float64{b.X, b.Y}
		}
		return geom.Prism{Base: base, Height: v.Height, BottomSlope: [2]float64{v.BottomSlope.X, v.BottomSlope.Y},
			TopSlope: [2]float64{v.TopSlope.X, v.TopSlope.Y}}, nil
	case *scenefile.Polyhedron:
		return geom.Polyhedron{Vertices: v.Vertices, Loops: v.Faces}, nil
	case *scenefile.Polygon:
		return nil, geom.Polygon{Vertices: v.Vertices}
	case *scenefile.Disc:
		return nil, geom.Disc{Radius: v.Radius}
	case *scenefile.Annulus:
		return nil, geom.Annulus{Inner: v.Inner, Outer: v.Outer}
	}
	return nil, nil
}

func vec(a [3]float64) r3.Vec { return r3.Vec{X: a[0], Y: a[1], Z: a[2]} }
