package grade

import (
	"math"

	"example.com/boundpole/field/codata"
)

// Point is where a piece of magnet works, along its magnetization.
type Point struct {
	H      float64 // A/m, negative where it demagnetizes
	B      float64 // T
	M      float64 // A/m, on the recoil line
	Pc     float64 // permeance coefficient -B/(mu0 H)
	Use    float64 // |H|/Limit where H demagnetizes, else 0: 1 and above is past the limit
	Margin float64 // A/m, Limit - |H|; negative past the limit
}

// Limit returns the demagnetizing field, as a magnitude in A/m, beyond which loss is expected, and its name: Hk where it is
// stated, else the least HcJ, else NaN.
func (m Material) Limit() (float64, string) {
	switch {
	case m.Hk != 0:
		return m.Hk, "Hk"
	case m.HcJ.Least() != 0:
		return m.HcJ.Least(), "HcJ"
	}
	return math.NaN(), ""
}

// Operating returns where material with the remanence br works, in a place whose field along the magnetization is
// -n M + applied, M being its own magnetization: the crossing of this load line with the recoil line.
//
//	M = br/mu0 + (mu_rec - 1) H,   H = (applied - n br/mu0) / (1 + n (mu_rec - 1))
//
// Units: br in T, applied in A/m; n is a demagnetizing factor without unit.
// Frame: components along the magnetization.
// Domain: br > 0, 0 <= n <= 1 for a mean; a local n may leave this range near edges. NaN in, NaN out.
// Singular: nowhere for n >= 0.
// Accuracy: relative error of H and B a few roundings of the larger term.
// Source: the crossing of two straight lines, [Own]; with applied = 0 it is closedform.OperatingPoint.
func (m Material) Operating(br, n, applied float64) Point {
	chi := m.Recoil - 1
	h := (applied - n*br/codata.Mu0) / (1 + n*chi)
	p := Point{H: h, M: br/codata.Mu0 + chi*h}
	p.B = codata.Mu0*m.Recoil*h + br
	p.Pc = -p.B / (codata.Mu0 * h)
	limit, _ := m.Limit()
	p.Margin = limit - max(-h, 0)
	p.Use = max(-h, 0) / limit
	return p
}
