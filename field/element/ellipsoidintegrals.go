package element

import "math"

// confocalIntegrals holds, for A_i > 0 and D = sqrt((A_1+t)(A_2+t)(A_3+t)),
//
//	one[i]    = int_0^inf dt/((A_i+t) D)
//	two[i][j] = int_0^inf dt/((A_i+t)(A_j+t) D).
type confocalIntegrals struct {
	one [3]float64
	two [3][3]float64
}

// integralSpread is the largest relative distance of the A_i from their mean at which the series serves: it leaves out
// integralSpread^9, less than u/64. integralSteps is how often the duplication may be applied; 24 are needed for ratios of
// the A_i of 1e12 (axes of 1e6).
const (
	integralSpread = 0.01
	integralSteps  = 64
)

// confocalIntegralsOf computes the integrals by duplication: with r_i = sqrt(A_i), A_i' = (A_i + r_1 r_2 + r_1 r_3 + r_2 r_3)/4,
// s = r_1 + r_2 + r_3, Q = (r_1+r_2)(r_1+r_3)(r_2+r_3) and B_i = (r_i+r_j)(r_i+r_k),
//
//	one_i(A)  = 2/(r_i B_i) + one_i(A')/4
//	two_ij(A) = 2 s/(r_i r_j (r_i+r_j) Q) + two_ij(A')/16
//	two_ii(A) = (2/3) (3 r_i^2 + r_i (r_j+r_k) + B_i)/(r_i^3 B_i^2) + two_ii(A')/16,
//
// every term of which is positive: relative errors stay near u for all ratios of the A_i.
//
// Source: the first is the duplication theorem of R_D [Carlson1995], one_i = (2/3) R_D; the others are its derivatives by A_j
// [own derivation]. Accuracy: 2e-15 for ratios of the A_i to 1e12 (TestConfocalIntegrals).
func confocalIntegralsOf(a [3]float64) (o confocalIntegrals) {
	f1, f2 := 1.0, 1.0
	for range integralSteps {
		mean := (a[0] + a[1] + a[2]) / 3
		if max(math.Abs(a[0]-mean), math.Abs(a[1]-mean), math.Abs(a[2]-mean)) <= integralSpread*mean {
			break
		}
		r := [3]float64{math.Sqrt(a[0]), math.Sqrt(a[1]), math.Sqrt(a[2])}
		pair := [3]float64{r[1] + r[2], r[2] + r[0], r[0] + r[1]} // without i
		s := r[0] + pair[0]
		q := pair[0] * pair[1] * pair[2]
		for i := range 3 {
			j, k := (i+1)%3, (i+2)%3
			b := pair[j] * pair[k]
			t := 1 / (r[i] * b)
			o.one[i] += f1 * 2 * t
			o.two[i][i] += f2 * (2.0 / 3) * (3*a[i] + r[i]*pair[i] + b) * t * t / r[i]
			o.two[j][k] += f2 * 2 * s / (r[j] * r[k] * pair[i] * q)
		}
		for i := range 3 {
			a[i] = 0.25 * pair[(i+1)%3] * pair[(i+2)%3] // A_i + r_1 r_2 + r_1 r_3 + r_2 r_3
		}
		f1, f2 = 0.25*f1, 0.0625*f2
	}
	o.addSeries(&a, f1, f2)
	o.two[1][0], o.two[2][1], o.two[0][2] = o.two[0][1], o.two[1][2], o.two[2][0]
	return o
}

// addSeries adds f1 and f2 times the integrals of nearly equal A_i: with z_i = 1 - A_i/A and the series
// prod (1 - z_i x)^-b_i = sum T_n x^n, int dt prod (A_i+t)^-b_i = A^(1-c) sum T_n/(c-1+n), c = sum b_i [own derivation].
func (o *confocalIntegrals) addSeries(a *[3]float64, f1, f2 float64) {
	mean := (a[0] + a[1] + a[2]) / 3
	var powers [3][8]float64 // of z_i, from 1
	for i := range 3 {
		z := (mean - a[i]) / mean
		p := z
		for m := range powers[i] {
			powers[i][m] = p
			p *= z
		}
	}
	root := 1 / math.Sqrt(mean)
	w1 := root / mean
	w2 := w1 / mean
	for i := range 3 {
		o.one[i] += f1 * w1 * binomials(&powers, i, -1)
		o.two[i][i] += f2 * w2 * binomials(&powers, i, i)
		j, k := (i+1)%3, (i+2)%3
		o.two[j][k] += f2 * w2 * binomials(&powers, j, k)
	}
}

// binomials returns sum T_n/(c-1+n) for b of 1/2 each and 1 more for i and for j if that is not negative. T_n follows from
// n T_n = sum over m of (sum b_i z_i^m) T_(n-m).
func binomials(powers *[3][8]float64, i, j int) float64 {
	c := 1.5
	if j >= 0 {
		c = 2.5
	}
	var s [8]float64
	for m := range s {
		s[m] = 0.5*(powers[0][m]+powers[1][m]+powers[2][m]) + powers[i][m]
		if j >= 0 {
			s[m] += powers[j][m]
		}
	}
	t := [9]float64{1}
	sum := 0.0
	for n := 1; n < len(t); n++ {
		for m := range n {
			t[n] += s[m] * t[n-1-m]
		}
		t[n] /= float64(n)
		sum += t[n] / (c + float64(n))
	}
	return 1/c + sum
}
