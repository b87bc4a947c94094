package elliptic

import (
	"math"
	"testing"
)

// TestBits pins results, so that a change of architecture, GOAMD64 level or
// compiler that fuses or reorders an operation is seen. The digest was printed
// by this code; the reference tests judge the values.
func TestBits(t *testing.T) {
	var circle, general uint64
	add := func(h *uint64, v ...float64) {
		for _, x := range v {
			*h = *h*0x100000001b3 ^ math.Float64bits(x)
		}
	}
	for _, row := range load[circleRow](t, "circle.json") {
		v := values(OfCircle(row.args()))
		add(&circle, v[:]...)
		a, rho, z, gap, q1 := row.args()
		k, e, b, d := Complete(q1 / (1 + q1))
		add(&general, k, e, b, d, Cel(q1, math.Abs(gap)+0.1, a, rho),
			RF(rho, q1, a), RC(rho, a), RD(rho, q1, a), RJ(a, rho, q1, 0.1+math.Abs(z)))
	}
	const wantCircle, wantGeneral = 0x340155df47bd70a4, 0xa567fff872a56f84
	if circle != wantCircle || general != wantGeneral {
		t.Errorf("digests %#x, %#x, want %#x, %#x", circle, general, uint64(wantCircle), uint64(wantGeneral))
	}
}
