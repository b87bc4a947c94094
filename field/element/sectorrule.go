package element

import "math"

// The azimuth is integrated in y = tan(delta/4), delta counted from the azimuth of the point, so that no sine is needed
// and delta = +-pi are the ends y = +-1. An integrand that is singular at delta = +-i eta is so at y = +-i tanh(eta/4);
// with b the smallest of these, y = b sinh(v) puts every one of them at the distance pi/2 from the real axis of v
// ([Johnston2005] Int. J. Numer. Methods Eng. 62, 564, from memory). Panels of v no wider than 2 with 16
// nodes then leave (pi/2 + sqrt(1 + pi^2/4))^-32 = 6e-18 of what they integrate, however small b is.

// sectorNode is one azimuth: sine and cosine of half the angle from the point, and the weight.
type sectorNode struct{ sin, cos, w float64 }

// sectorSpan is a range of y on one side of 0 or over all of it.
type sectorSpan struct{ lo, hi float64 }

// sectorRule is a Gauss-Legendre rule and the factor of b in its map.
type sectorRule struct {
	half   []node
	factor float64
}

var (
	sectorMain  = sectorRule{half: gauss16[:], factor: 1}
	sectorCheck = sectorRule{half: gauss20[:], factor: 0.75} // other nodes, panels and map: it tells the error of sectorMain
)

// gauss20 is computed as gauss16.
var gauss20 = [10]node{
	{0.07652652113349733375, 0.1527533871307258507},
	{0.2277858511416450781, 0.1491729864726037468},
	{0.3737060887154195607, 0.1420961093183820513},
	{0.510867001950827098, 0.1316886384491766269},
	{0.6360536807265150255, 0.1181945319615184173},
	{0.7463319064601507926, 0.101930119817240435},
	{0.8391169718222188234, 0.08327674157670474872},
	{0.9122344282513259059, 0.06267204833410906357},
	{0.9639719272779137913, 0.04060142980038694133},
	{0.9931285991850949248, 0.01761400713915211831},
}

// sectorPanel is the nodes of one panel.
type sectorPanel struct {
	node [20]sectorNode
	n    int
}

// sectorPanels is the panels of one span: n of them from v0 on, each of twice the width half, in the map y = b sinh(v).
type sectorPanels struct {
	rule     *sectorRule
	b, v0    float64
	half     float64
	n        int
	up, down [10]float64 // exponentials of half times the abscissae, and of the negative
}

// over divides a span.
func (r *sectorRule) over(s sectorSpan, b float64) (d sectorPanels) {
	d.rule, d.b = r, r.factor*b
	d.v0 = math.Asinh(s.lo / d.b)
	length := math.Asinh(s.hi/d.b) - d.v0
	d.n = max(1, int(math.Ceil(0.5*length)))
	d.half = 0.5 * length / float64(d.n)
	for j, g := range r.half {
		d.up[j] = math.Exp(d.half * g.x)
		d.down[j] = 1 / d.up[j]
	}
	return d
}

// panel sets p to panel k.
func (d *sectorPanels) panel(p *sectorPanel, k int) {
	em := math.Exp(d.v0 + float64(2*k+1)*d.half)
	im := 1 / em
	p.n = 2 * len(d.rule.half)
	for j, g := range d.rule.half {
		w := 2 * d.b * d.half * g.w // half of 4 dv, the other half is that of the hyperbolic cosine
		p.node[2*j] = sectorNodeAt(d.b, em*d.down[j], im*d.up[j], w)
		p.node[2*j+1] = sectorNodeAt(d.b, em*d.up[j], im*d.down[j], w)
	}
}

// sectorNodeAt returns the node at y = b (e - 1/e)/2.
func sectorNodeAt(b, e, i, w float64) sectorNode {
	y := 0.5 * b * (e - i)
	r := 1 / (1 + y*y)
	return sectorNode{sin: 2 * y * r, cos: (1 - y*y) * r, w: w * (e + i) * r}
}

// sectorParts cuts the range of y from the end y0 round to the end y1, in the sense of growing azimuth, into spans that do
// not contain 0 or +-1 inside.
func sectorParts(y0, y1 float64, full bool) (parts [4]sectorSpan, n int) {
	add := func(lo, hi float64) {
		if lo < hi {
			parts[n] = sectorSpan{lo, hi}
			n++
		}
	}
	side := func(lo, hi float64) {
		add(lo, min(hi, 0))
		add(max(lo, 0), hi)
	}
	switch {
	case full:
		side(-1, 1)
	case y0 < y1:
		side(y0, y1)
	default:
		side(y0, 1)
		side(-1, y1)
	}
	return parts, n
}

// quarterTangent returns tan(delta/4) of an angle between -pi and pi given by sine and cosine.
func quarterTangent(sin, cos float64) float64 {
	var s, c float64
	if cos >= 0 {
		c = math.Sqrt(0.5 * (1 + cos))
		s = 0.5 * sin / c
	} else {
		s = math.Copysign(math.Sqrt(0.5*(1-cos)), sin)
		c = 0.5 * sin / s
	}
	return s / (1 + c)
}

// sectorScale returns tanh(eta/4) for a singularity at the distance e from the point, on a circle of radius a; rho is the
// distance of the point from the axis.
func sectorScale(e, a, rho float64) float64 {
	if e == 0 {
		return 0
	}
	k := e / (2 * math.Sqrt(a*rho))
	if k > 1e8 {
		return 1
	}
	return k / (1 + math.Sqrt(1+k*k))
}

// sweep adds all panels of a rule over the azimuth of the body, b.scale being the nearest singularity.
func (s *sectorSum) sweep(b *sector, p *sectorPoint, rule *sectorRule, radial bool) {
	scale := p.scale(b, radial)
	var panel sectorPanel
	for _, span := range p.spans[:p.count] {
		d := rule.over(span, scale)
		for k := range d.n {
			d.panel(&panel, k)
			if radial {
				s.addRadial(b, p, &panel)
			} else {
				s.add(b, p, &panel)
			}
		}
	}
}
