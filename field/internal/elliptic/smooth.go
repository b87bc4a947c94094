package elliptic

import "math"

// Derivation, continued from disc.go. High over the plane, |z| >= max(a,rho),
// the constant parts of Omega and E are taken out under the integral: from
// z/(q² R) = 1/q² - 1/(R (R+z)) and the residues of 1/q²,
//
//	Omega = a² M0 - a rho M1,   E = a² M1 - a rho M0   (E for rho < a)
//	M0 = ∮ dφ/(R (R+z)),        M1 = ∮ cos φ dφ/(R (R+z)).
//
// The integrands are analytic and periodic; the midpoint rule with N nodes in
// 0..π errs by about β^2N, where (β + 1/β) a rho = a² + rho² + z². Nodes φ and π-φ
// are joined: with s = a² + rho² + z², w = 2 a rho, P² = s² - w² cos²φ (P = R R') and
// Σ² = 2 (s + P) (Σ = R + R'),
//
//	M0 += (2s + zΣ) / T,  M1 += 2 w cos²φ (Σ+z)/(Σ T),  T = P (P + zΣ + z²),
//
// positive terms with the factor w explicit. The two differences that remain
// lose at most a factor 3 for |z| >= max(a,rho).

// smoothRule lists cos²φ at the nodes below π/2 of the midpoint rule with
// 4, 6, 8, 12, 16 and 20 nodes in 0..π. Each holds for w/s up to limit, where
// β^(2N-2) is 2^-54: M1 is itself of order β. The last is needed up to
// w/s = 2/3, where it leaves 1.3e-16.
var smoothRule = [...]struct {
	limit float64
	cos2  []float64
}{
	{0.0039, cosSquares[0:2]},
	{0.0473, cosSquares[2:5]},
	{0.1373, cosSquares[5:9]},
	{0.3531, cosSquares[9:15]},
	{0.5305, cosSquares[15:23]},
	{1, cosSquares[23:33]},
}

// cosSquares[...] = cos²((j+1/2)π/N), j < N/2, for N = 4, 6, 8, 12, 16, 20
// (TestSmoothRule).
var cosSquares = [33]float64{
	0.8535533905932737, 0.1464466094067263,
	0.9330127018922194, 0.5000000000000001, 0.06698729810778066,
	0.9619397662556434, 0.6913417161825449, 0.3086582838174552, 0.038060233744356645,
	0.9829629131445341, 0.8535533905932737, 0.6294095225512604, 0.37059047744873963, 0.1464466094067263, 0.01703708685546589,
	0.9903926402016153, 0.9157348061512726, 0.7777851165098012, 0.5975451610080642, 0.40245483899193585, 0.22221488349019905, 0.08426519384872735, 0.009607359798384809,
	0.9938441702975689, 0.9455032620941839, 0.8535533905932737, 0.7269952498697734, 0.5782172325201155, 0.4217827674798847, 0.2730047501302266, 0.1464466094067263, 0.0544967379058161, 0.006155829702431145,
}

// smooth returns |Omega| and, for rho <= a, the E of Circle, for
// z >= max(a, rho).
func smooth(a, rho, z float64) (omega, e float64) {
	w := 2 * a * rho
	s := math.FMA(a, a, math.FMA(rho, rho, float64(z*z)))
	i := 0
	for w > smoothRule[i].limit*s {
		i++
	}
	return midpoint(a, rho, z, smoothRule[i].cos2)
}

// midpoint is smooth by the rule with the given nodes.
func midpoint(a, rho, z float64, nodes []float64) (omega, e float64) {
	w, zz := 2*a*rho, float64(z*z)
	s := math.FMA(a, a, math.FMA(rho, rho, zz))
	ss, ww := float64(s*s), float64(w*w)
	var m0, m1 float64
	for _, c := range nodes {
		p := math.Sqrt(ss - float64(ww*c))
		sum := math.Sqrt(2 * (s + p))
		zs := float64(z * sum)
		inv := 1 / (sum * p * (p + (zs + zz)))
		m0 += float64(float64(sum*(2*s+zs)) * inv)
		m1 += float64(float64(c*(sum+z)) * inv)
	}
	h := math.Pi / float64(len(nodes)) // two sides of φ, N = 2 len
	m0 *= h
	m1 *= h * 2 * w
	return a * (float64(a*m0) - float64(rho*m1)), a * (float64(a*m1) - float64(rho*m0))
}
