package element

// addUniform adds the moments of dipoles at (rho, z) about the centre with weight w, of axial strength pz and of unit
// transverse strength, see addDipoles, of a source that need not be even in z.
func (m *roundMultipoles) addUniform(rho, z, w, pz float64) {
	x0, x1 := 1.0, z/m.bound
	c, r2 := x1, (rho*rho+z*z)/(m.bound*m.bound)
	w /= m.bound
	for l := 1; l <= farOrder; l++ {
		m.a[l] += w * pz * float64(l) * x0
		m.b[l] += w * x0
		x0, x1 = x1, (float64(2*l+1)*c*x1-float64(l)*r2*x0)/float64(l+1)
	}
}

// addRadial adds the moments of dipoles of strength w away from the axis: the mean over the azimuth of the derivative of
// r^l P_l across the axis is -rho r^(l-2) P_(l-1)' [own derivation, from the ladder relations of solid harmonics].
func (m *roundMultipoles) addRadial(rho, z, w float64) {
	c, r2 := z/m.bound, (rho*rho+z*z)/(m.bound*m.bound)
	w *= rho / (m.bound * m.bound)
	x0, x1 := 1.0, c   // r^(l-1) P_(l-1), r^l P_l at l = 1
	d0, d1 := 0.0, 1.0 // r^(l-2) P_(l-1)', r^(l-1) P_l'
	for l := 1; l <= farOrder; l++ {
		m.a[l] -= w * d0
		f := float64(l)
		x2 := ((2*f+1)*c*x1 - f*r2*x0) / (f + 1)
		d0, d1 = d1, c*d1+(f+1)*x1 // P_(l+1)' = z P_l' + (l+1) P_l
		x0, x1 = x1, x2
	}
}
