package element

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// The unit radial polarization c s has no curl, since s is the gradient of the distance s from the axis. Its field is
// that of surface currents less itself, its potential that of double layers of the strength c s on all faces:
//
//	4 pi (g + p) = int (p x n) x (x - r)/R^3 dA,   4 pi phi = c oint s n.(x - r)/R^3 dA + 4 pi c rho,
//
// where p and the last term stand inside the body only. The charge -c/s in the volume needs no integral of its own.
// Walls carry no current, flat faces one along the azimuth, ends one along z. With Z the height of the face above the
// point and S1, S2 the integrals of s/R^3, s^2/R^3 over the radius, a face with the normal n z gives
//
//	4 pi (g + p) = c n int Z S1 s + (rho cos S1 - S2) z dphi,   4 pi phi = - c n int Z S2 dphi.

// addRadial adds one panel for c = 1.
func (s *sectorSum) addRadial(b *sector, p *sectorPoint, n *sectorPanel) {
	a0, a1 := b.radius[0], b.radius[1]
	for k := range n.n {
		nd := &n.node[k]
		ss := nd.sin * nd.sin
		c, sn := 1-2*ss, 2*nd.sin*nd.cos
		across := p.rho * sn
		rc := p.rho * c
		t0, t1 := p.gap[0]+2*p.rho*ss, p.gap[1]+2*p.rho*ss
		var r [2][2]float64 // [level][wall]
		for l, z := range p.zeta {
			w2 := across*across + z*z
			r[l] = [2]float64{math.Sqrt(t0*t0 + w2), math.Sqrt(t1*t1 + w2)}
			line := segment{t0, t1, a1 - a0, w2, r[l][0], r[l][1]}
			// with s = t + rho cos: three terms each of the size of the wall, however thin
			cube, inverse, log := line.cube(), line.inverse(), line.log()
			s1 := rc*cube - inverse
			q := w2*cube + rc*inverse - log // rho cos S1 - S2
			w := float64(2*l-1) * nd.w
			s.e += w * z * s1 * c
			s.t += w * z * s1 * sn
			s.z += w * q
			if s.potential {
				s.phi -= w * z * (rc*s1 - q)
			}
			if s.size {
				size1 := math.Abs(rc)*cube + math.Abs(inverse)
				size := w2*cube + math.Abs(rc*inverse) + log
				s.sizeG += nd.w * (math.Abs(z)*size1 + size)
				s.sizePhi += nd.w * math.Abs(z) * (math.Abs(rc)*size1 + size)
			}
		}
		if !s.potential {
			continue
		}
		for i, a := range b.radius {
			if a == 0 {
				continue
			}
			q2 := p.wide[i]*p.wide[i] + 4*a*p.rho*ss
			line := segment{p.zeta[0], p.zeta[1], b.level[1] - b.level[0], q2, r[0][i], r[1][i]}
			t := p.gap[i] + 2*p.rho*ss
			v := nd.w * a * a * t * line.cube()
			s.phi -= float64(2*i-1) * v
			if s.size {
				s.sizePhi += math.Abs(v)
			}
		}
	}
}

// radialEnds returns 4 pi phi and 4 pi g of the ends for c = 1: a current along z on each and a double layer of the
// strength s.
func (b *sector) radialEnds(q field.Point, want field.Want) (v field.Value) {
	if b.full {
		return v
	}
	w := b.current.value(q, field.Mean, want&field.WantErr|field.WantG)
	v.G = r3.Vec{X: -w.G.Y, Y: w.G.X}
	v.ErrG = w.ErrG
	if want&field.WantPhi != 0 {
		for j, f := range b.layer {
			w := f.value(q, field.Mean, want&field.WantErr|field.WantG)
			out := float64(2*j - 1)
			c := b.end[j]
			v.Phi += out * (c.X.Hi*w.G.Y - c.Y.Hi*w.G.X)
			v.ErrPhi += w.ErrG
		}
	}
	return v
}
