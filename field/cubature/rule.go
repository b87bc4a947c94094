package cubature

import (
	"math"
	"sync"

	"example.com/boundpole/geom/pair"
)

// MostPoints is the greatest number of points of a Gauss-Legendre rule that is kept.
const MostPoints = 64

// Rule is a quadrature rule: the integral of f is the sum of W[i] f(X[i]). Tables are shared: do not write to them.
type Rule struct {
	X, W []float64
}

// Legendre returns the Gauss-Legendre rule with 1 <= n <= MostPoints points on [-1, 1], ascending and exactly symmetric. It is
// exact for polynomials of degree 2n-1. The table is made once. It panics if n is out of range.
//
// Accuracy: nodes and weights are rounded once; powers up to degree 2n-1 are integrated to 16 u (TestLegendreExact).
func Legendre(n int) Rule {
	if n < 1 || n > MostPoints {
		panic("cubature: number of Gauss points out of range")
	}
	return legendre(n).Rule
}

// gauss is a Gauss-Legendre rule with its integration matrix: row i of upTo holds the weights of the integral from -1 to X[i].
type gauss struct {
	Rule
	upTo []float64
}

var gaussTables [MostPoints + 1]struct {
	once sync.Once
	g    gauss
}

func legendre(n int) *gauss {
	t := &gaussTables[n]
	t.once.Do(func() { t.g = makeGauss(n) })
	return &t.g
}

func makeGauss(n int) gauss {
	g := gauss{Rule: Rule{X: make([]float64, n), W: make([]float64, n)}, upTo: make([]float64, n*n)}
	for k := 0; 2*k < n; k++ {
		x, w := legendreRoot(n, k)
		g.X[k], g.X[n-1-k] = -x, x
		g.W[k], g.W[n-1-k] = w, w
	}
	g.integrate()
	return g
}

// legendreRoot returns the root number k of P_n from above and its weight, rounded once: Newton's method in pairs, from the guess
// cos(pi (k + 3/4)/(n + 1/2)).
func legendreRoot(n, k int) (x, w float64) {
	r := pair.Of(math.Cos(math.Pi * (float64(k) + 0.75) / (float64(n) + 0.5)))
	if 2*k+1 == n {
		r = pair.Float{}
	}
	var slope pair.Float
	one := pair.Of(1)
	for range 8 {
		p0, p1 := one, r
		for j := 1; j < n; j++ {
			next := r.Mul(p1).Scale(float64(2*j + 1)).Sub(p0.Scale(float64(j))).Div(pair.Of(float64(j + 1)))
			p0, p1 = p1, next
		}
		slope = p0.Sub(r.Mul(p1)).Scale(float64(n)).Div(one.Sub(r.Mul(r)))
		r = r.Sub(p1.Div(slope))
	}
	return r.Value(), pair.Of(2).Div(one.Sub(r.Mul(r)).Mul(slope.Mul(slope))).Value()
}

// integrate fills upTo. The Lagrange polynomial of node j is w_j sum_k (2k+1)/2 P_k(x_j) P_k(x), and (2k+1) P_k is the derivative
// of P_{k+1} - P_{k-1}.
func (g *gauss) integrate() {
	n := len(g.X)
	p := make([][]float64, n)
	for i, x := range g.X {
		p[i] = make([]float64, n+1)
		p[i][0], p[i][1] = 1, x
		for k := 1; k < n; k++ {
			p[i][k+1] = (float64(2*k+1)*x*p[i][k] - float64(k)*p[i][k-1]) / float64(k+1)
		}
	}
	for i, x := range g.X {
		for j, w := range g.W {
			s := (x + 1) / 2
			for k := 1; k < n; k++ {
				s += p[j][k] * (p[i][k+1] - p[i][k-1]) / 2
			}
			g.upTo[i*n+j] = w * s
		}
	}
}
