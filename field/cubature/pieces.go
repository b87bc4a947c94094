package cubature

import (
	"math"
	"sync"
)

// Pieces is a rule on [0, 1] for functions that vary over a small distance at 0: the map s = sinh(mu)/sinh(k length) with
// Gauss-Legendre rules on k pieces of mu. A function with a singularity at a complex distance b from 0 is smooth in mu over
// pieces of length about 2, however small b is; where sinh is large this is geometric grading by the factor exp(length).
//
// Source: the map is that of [Johnston2005]; its pieces replace the geometric panels that one piece needs below b = 1e-2.
type Pieces struct {
	Rule
	slope []float64 // ds/dx for x in [-1, 1] of the piece
	base  *gauss
	count int
}

// mostPieces allows for distances down to 1e-18.
const mostPieces = 40

// PiecesFor returns the rule with n points on each of as many pieces of the length in mu as the distance b > 0 needs. Usual
// lengths are 1.4 to 2; they are rounded to a multiple of 0.1. Distances below 1e-18 count as 1e-18. The table is made once.
// It panics if n is out of the range of Legendre.
//
// Accuracy: the relative error of the integral of s/(s^2 + b^2)^{3/2} is below 1e-13 at n = 16, length 1.8 (TestPieces).
func PiecesFor(n int, length, b float64) *Pieces {
	if n < 1 || n > MostPoints {
		panic("cubature: number of Gauss points out of range")
	}
	tenths := min(max(int(math.Round(10*length)), 5), 30)
	b = max(b, 1e-18)
	if !(b < 2) { // smooth: a plain rule
		return piecesOf(pieceKey{n: n, tenths: tenths})
	}
	k := int(math.Ceil(math.Asinh(1/b) / (float64(tenths) / 10)))
	return piecesOf(pieceKey{n: n, tenths: tenths, count: min(k, mostPieces)})
}

// pieceKey names a table; a thin one has fewer points on the pieces near 0, for integrands that fade as s there.
type pieceKey struct {
	n, tenths, count int
	thin             bool
}

var pieceTables sync.Map // of pieceKey to *Pieces

// pieceCache keeps in one place the tables that a caller uses over and over.
type pieceCache struct {
	n, tenths int
	thin      bool
	t         [mostPieces + 1]*Pieces
}

// get returns the table for distance b.
func (c *pieceCache) get(b float64) *Pieces {
	k := 0
	if b < 2 {
		k = min(int(math.Ceil(math.Asinh(1/max(b, 1e-18))*10/float64(c.tenths))), mostPieces)
	}
	if c.t[k] == nil {
		c.t[k] = piecesOf(pieceKey{c.n, c.tenths, k, c.thin})
	}
	return c.t[k]
}

func piecesOf(key pieceKey) *Pieces {
	if t, ok := pieceTables.Load(key); ok {
		return t.(*Pieces)
	}
	t, _ := pieceTables.LoadOrStore(key, makePieces(key))
	return t.(*Pieces)
}

func makePieces(key pieceKey) *Pieces {
	g := legendre(key.n)
	p := &Pieces{base: g, count: max(key.count, 1)}
	if key.count == 0 {
		for i, x := range g.X {
			p.add(0.5*(1+x), 0.5, g.W[i])
		}
		return p
	}
	length := float64(key.tenths) / 10
	scale := 1 / math.Sinh(length*float64(key.count))
	for k := range key.count {
		if key.thin {
			g = legendre(fewer(key.n, scale*math.Sinh(length*float64(k+1))))
		}
		for i, x := range g.X {
			mu := length * (float64(k) + 0.5*(1+x))
			p.add(scale*math.Sinh(mu), scale*math.Cosh(mu)*length/2, g.W[i])
		}
	}
	return p
}

func (p *Pieces) add(s, slope, w float64) {
	p.X = append(p.X, s)
	p.W = append(p.W, w*slope)
	p.slope = append(p.slope, slope)
}

// fewer returns how many of n points do for a part whose share of the whole is at most the given one.
func fewer(n int, share float64) int {
	if share >= 1 {
		return n
	}
	return max(4, int(math.Ceil(float64(n)*(1+math.Log10(max(share, 1e-15))/15))))
}
