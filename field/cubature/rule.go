package cubature

import (
	"sync"

	rules "example.com/boundpole/geom/gauss"
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
	r := rules.Legendre(n)
	g := gauss{Rule: Rule{X: r.X, W: r.W}, upTo: make([]float64, n*n)}
	g.integrate()
	return g
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
