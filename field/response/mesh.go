package response

import (
	"math"

	"example.com/boundpole/geom/panel"
	"gonum.org/v1/gonum/spatial/r3"
)

// tile is a panel with what is known of it before a mesh is chosen.
type tile struct {
	*panel.Panel
	body, part int // part counts through all bodies
	whole      piece
	centre     r3.Vec
	radius     float64
}

func newTile(p *panel.Panel, body, part int, inner *rule, next *int) *tile {
	t := &tile{Panel: p, body: body, part: part}
	all := span{to: 1}
	t.whole.shape(p, all, all)
	t.whole.keep(p, inner, kept, next)
	t.centre = t.whole.samples[4]
	for _, x := range t.whole.x {
		t.radius = max(t.radius, distance(x, t.centre))
	}
	for _, x := range t.whole.samples {
		t.radius = max(t.radius, distance(x, t.centre))
	}
	return t
}

// mesh is one level: a product rule of some order on every tile. Nodes of a tile are together, s running fastest.
type mesh struct {
	order  int
	tables *tables
	x, n   []r3.Vec  // nodes and outward unit normals
	jac    []float64 // area for a unit of s and t
	area   []float64 // jac times the weights of the rule
	weight []float64 // the weights of the rule
}

func newMesh(tiles []*tile, order int, inner *rule) *mesh {
	m := &mesh{order: order, tables: newTables(order, inner)}
	r := m.tables.rule
	for _, tile := range tiles {
		for j, t := range r.x {
			for i, s := range r.x {
				x, xs, xt := tile.At(s, t)
				c := r3.Cross(xs, xt)
				jac, w := r3.Norm(c), r.w[i]*r.w[j]
				m.x, m.n = append(m.x, x), append(m.n, r3.Scale(1/jac, c))
				m.jac, m.weight, m.area = append(m.jac, jac), append(m.weight, w), append(m.area, jac*w)
			}
		}
	}
	return m
}

// tileOf returns the index of the tile of a node.
func (m *mesh) tileOf(node int) int { return node / (m.order * m.order) }

// far returns the distance from the centre of a tile, in units of its radius, from which the nodes alone are a good rule
// for the field of the tile: where an ellipse about it with the sum 10^(5/n) of its semi-axes ends, 1e-10 being left out, or
// 10^(3/n) and 1e-6 for the low orders, whose own error is larger by far.
func far(order int) float64 {
	digits := 5.0
	if order < 4 {
		digits = 3
	}
	rb := math.Pow(10, digits/float64(order))
	return max(2, (rb+1/rb)/2)
}
