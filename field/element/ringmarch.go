package element

import "math"

// spot is a place of singularity of an integrand: x along the path of integration, y beside it in the complex plane. Panels
// are shorter by the factor shy, for poles of high order.
type spot struct{ x, y, shy float64 }

// march integrates along a path in panels of Gauss-Legendre that end at zero, the place on the path next to the field
// point, and grow away from it.
//
// A panel holds no more than its rule resolves: with M the semi-axis of a Bernstein ellipse of sum B, a panel of length L
// whose ends are at distances r1 and r2 from a spot is clear of it if r1 + r2 >= M L. Seen from the end that is known this
// is L <= 2 (M r1 - x)/(M^2 - 1), x the place of the spot ahead. 16 nodes leave B^-32: 4e-18 for B = 3.5.
type march struct {
	lo, hi  float64
	spots   [5]spot
	count   int     // of spots
	longest float64 // of panels, 0 for any length
	degree  float64 // degree of a polynomial factor; panels of 8 nodes serve up to 2
	scale   float64 // of all weights; 0 for 1. It makes up for the rounding of hi - lo where that is small
	left    float64 // estimate of what the rules leave out, in the unit of what add returns times length
	panels  int
}

const (
	marchEllipse = 3.5
	marchMajor   = 0.5 * (marchEllipse + 1.0/marchEllipse)
	wideMajor    = 6.2 // ellipse of sum 12.3: 8 nodes leave 12.3^-16 = 4e-18
	marchLimit   = 400 // panels; a point at ringLeast needs some 80
)

// put adds a spot.
func (m *march) put(x, y float64) { m.putPole(x, y, 1) }

// putPole adds a spot that asks for shorter panels.
func (m *march) putPole(x, y, shy float64) {
	m.spots[m.count] = spot{x, math.Abs(y), shy}
	m.count++
}

// clear returns the least (r1 + r2)/L over all spots.
func (m *march) clear(lo, hi float64) float64 {
	least := math.Inf(1)
	for _, s := range m.spots[:m.count] {
		least = min(least, (math.Hypot(s.x-lo, s.y)+math.Hypot(s.x-hi, s.y))/s.shy)
	}
	return least / (hi - lo)
}

// each calls add with places and weights of the rule. What add returns are two values of the integrand that show how well
// it is resolved.
func (m *march) each(split bool, add func(s, w float64) (p, q float64)) {
	if !(m.hi > m.lo) {
		return
	}
	if inner := m.lo < 0 && m.hi > 0; !(split && inner) && (m.longest == 0 || m.hi-m.lo <= m.longest) &&
		m.clear(m.lo, m.hi) >= marchMajor {
		m.panel(m.lo, m.hi, add)
		return
	}
	m.side(max(m.lo, 0), m.hi, 1, add)
	m.side(max(-m.hi, 0), -m.lo, -1, add)
}

// side integrates over sign s, 0 <= from <= |s| <= to.
func (m *march) side(from, to, sign float64, add func(s, w float64) (p, q float64)) {
	for from < to {
		end := from + m.step(sign*from, sign*to, sign)
		if m.panels++; end > to || end <= from || m.panels > marchLimit {
			end = to
		}
		if sign > 0 {
			m.panel(from, end, add)
		} else {
			m.panel(-end, -from, add)
		}
		from = end
	}
}

// step returns the length of the panel from one place towards another, in the direction of sign.
func (m *march) step(from, to, sign float64) float64 {
	step := math.Abs(to - from)
	if m.longest > 0 {
		step = min(step, m.longest)
	}
	for _, s := range m.spots[:m.count] {
		x := sign * (s.x - from)
		step = min(step, 2*(marchMajor*math.Hypot(x, s.y)-x)/((marchMajor*marchMajor-1)*s.shy))
	}
	return step
}

// panel integrates over one panel. The coefficients of the two highest Legendre polynomials that the nodes carry fall like
// B^-n where the error falls like B^-2n, so their square over the size of the integrand bounds it; the factor is measured
// (TestMarchLeft).
func (m *march) panel(lo, hi float64, add func(s, w float64) (p, q float64)) {
	c, h := 0.5*(lo+hi), 0.5*(hi-lo)
	w := h
	if m.scale > 0 {
		w *= m.scale
	}
	rule, tail := gauss16[:], legendre16[:]
	if m.degree <= 2 && m.clear(lo, hi) >= wideMajor {
		rule, tail = gauss8[:], legendre8[:]
	}
	var size, even1, even2, odd1, odd2 float64
	for i, g := range rule {
		p1, q1 := add(c-h*g.x, w*g.w)
		p2, q2 := add(c+h*g.x, w*g.w)
		size += g.w * (math.Abs(p1) + math.Abs(q1) + math.Abs(p2) + math.Abs(q2))
		even1, even2 = even1+tail[i].even*(p1+p2), even2+tail[i].even*(q1+q2)
		odd1, odd2 = odd1+tail[i].odd*(p2-p1), odd2+tail[i].odd*(q2-q1)
	}
	if size > 0 {
		m.left += 0.4 * h * (even1*even1 + even2*even2 + odd1*odd1 + odd2*odd2) / size
	}
}

// legendre holds w (n + 1/2) P_n at a node for the highest even and odd n below the number of nodes.
type legendre struct{ even, odd float64 }

var legendre8, legendre16 = func() (a [4]legendre, b [8]legendre) {
	for i, g := range gauss8 {
		a[i] = legendre{g.w * 6.5 * legendreP(6, g.x), g.w * 7.5 * legendreP(7, g.x)}
	}
	for i, g := range gauss16 {
		b[i] = legendre{g.w * 14.5 * legendreP(14, g.x), g.w * 15.5 * legendreP(15, g.x)}
	}
	return a, b
}()

// legendreP returns P_n(x).
func legendreP(n int, x float64) float64 {
	p0, p1 := 1.0, x
	for k := 1; k < n; k++ {
		f := float64(k)
		p0, p1 = p1, ((2*f+1)*x*p1-f*p0)/(f+1)
	}
	return p1
}
