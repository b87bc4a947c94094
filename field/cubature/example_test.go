package cubature_test

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// saddle is the piece z = x y of a hyperbolic paraboloid over the square |x|, |y| <= 1.
type saddle struct{}

func (saddle) At(u, v float64) (x, xu, xv r3.Vec) {
	a, b := 2*u-1, 2*v-1
	return r3.Vec{X: a, Y: b, Z: a * b}, r3.Vec{X: 2, Z: 2 * b}, r3.Vec{Y: 2, Z: 2 * a}
}

// A surface and a density of the caller's own, asked for just above the surface.
func ExampleNewLayer() {
	l, err := cubature.NewLayer([]geom.Chart{saddle{}}, func(x, n r3.Vec) float64 { return 1 + x.X }, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	v := field.At(l, r3.Vec{X: 0.3, Y: 0.2, Z: 0.06 + 1e-9}, field.Mean, field.WantPhi|field.WantG|field.WantErr)
	fmt.Printf("phi %.9f, |g| %.9f, estimates below 1e-12: %v, %v\n", v.Phi, r3.Norm(v.G), math.Max(v.ErrPhi, v.ErrG) < 1e-12, v.Status)
	// Output: phi 0.713607308, |g| 0.691080678, estimates below 1e-12: true, regular
}

func ExampleTanhSinh() {
	v, estimate, err := cubature.TanhSinh(func(left, right float64) float64 { return 1 / math.Sqrt(left*right) }, 1, 0)
	fmt.Printf("%.12f %v %v\n", v, estimate < 1e-13, err)
	// Output: 3.141592653590 true <nil>
}
