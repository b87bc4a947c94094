package geom

import "gonum.org/v1/gonum/spatial/r3"

// Chart maps the unit square onto a piece of surface.
type Chart interface {
	// At returns the point of the parameters 0 <= u, v <= 1 and its derivatives by them. Their cross product xu x xv has the
	// direction of the surface's own normal and does not vanish inside the square; it may on an edge of it (a tip).
	At(u, v float64) (x, xu, xv r3.Vec)
}

// Charted is a surface that is covered by charts, meeting at most in edges: what an integrator for curved faces needs.
type Charted interface {
	Surface
	Charts() []Chart
}

// Block maps the unit cube onto a piece of volume.
type Block interface {
	// At returns the point of the parameters 0 <= u, v, w <= 1 and its derivatives by them, right-handed inside the cube.
	At(u, v, w float64) (x, xu, xv, xw r3.Vec)
}

// Blocked is a cell that is filled by blocks, meeting at most in faces.
type Blocked interface {
	Cell
	Blocks() []Block
}
