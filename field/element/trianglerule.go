package element

import "example.com/boundpole/geom/gauss"

// triangleNode is a point (1-s-t) v0 + s v1 + t v2 of a triangle and its weight per double area.
type triangleNode struct{ s, t, w float64 }

// triangleRule returns the collapsed product rule with n+1 times n Gauss-Legendre points, exact for polynomials of degree
// 2n-1.
func triangleRule(n int) []triangleNode {
	xs, ws := gauss.On(n+1, 0, 1)
	xt, wt := gauss.On(n, 0, 1)
	var nodes []triangleNode
	for i, u := range xs {
		for j, v := range xt {
			nodes = append(nodes, triangleNode{s: u * (1 - v), t: u * v, w: ws[i] * wt[j] * u})
		}
	}
	return nodes
}
