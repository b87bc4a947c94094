package elliptic

import (
	"testing"
)

// circleRow is a row of circle.json; Value holds U, T1, S3, C3, Omega, S, E.
type circleRow struct {
	Group              string
	A, Rho, Z, Gap, Q1 hexFloat
	Value              []digits
}

func (r circleRow) args() (a, rho, z, gap, q1 float64) {
	return float64(r.A), float64(r.Rho), float64(r.Z), float64(r.Gap), float64(r.Q1)
}

func TestCircleReference(t *testing.T) {
	names := [...]string{"U", "T1", "S3", "C3", "Omega", "S", "E"}
	bounds := [...]float64{1.5e-15, 1.5e-15, 1.5e-15, 1.5e-15, 3e-15, 1.5e-15, 3e-15} // documented at OfCircle
	got := map[string]*[7]worst{}
	for _, row := range load[circleRow](t, "circle.json") {
		if got[row.Group] == nil {
			got[row.Group] = new([7]worst)
		}
		a, rho, z, gap, q1 := row.args()
		c := OfCircle(a, rho, z, gap, q1)
		for i, v := range [...]float64{c.U, c.T1, c.S3, c.C3, c.Omega, c.S, c.E} {
			got[row.Group][i].see(row.Value[i].relErr(v), row)
		}
	}
	for group, w := range got {
		for i := range w {
			w[i].check(t, group+" "+names[i], bounds[i])
		}
	}
}
