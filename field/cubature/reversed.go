package cubature

import (
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Reversed is a chart with its normal turned round.
type Reversed struct{ Chart geom.Chart }

// At returns the point of the chart at (v, u).
func (c Reversed) At(u, v float64) (x, xu, xv r3.Vec) {
	x, xv, xu = c.Chart.At(v, u)
	return x, xu, xv
}
