package response

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Settings says how finely to solve. The zero value and nil are the defaults.
type Settings struct {
	// Order is the number of nodes a direction on every panel of the finest of the three meshes; the others have 2 and 4 less,
	// or 1 and 2 less below 6. Default 8; range 3 to 14.
	Order int
	// Plain leaves panels ungraded at edges: for meshes of many facets that stand for a smooth surface, with Order 3 or 4.
	Plain bool
	// Halve is how many times every panel is halved in both directions. Default 0.
	Halve int
	// Gap is the largest size of a panel near another body, in units of the root of distance times the size of the smaller of
	// the two bodies. Default 2.
	Gap float64
	// Near are points of sources that vary over a distance less than the size of the bodies: point charges, dipoles, edges of
	// magnets. Panels are halved until none is longer than its distance from such a point. Default none.
	Near []r3.Vec
	// MaxUnknowns is the number of unknowns of the finest mesh beyond which Prepare refuses: the matrices take 12 bytes times
	// its square. Default 8000.
	MaxUnknowns int
	// Progress, if not nil, is called now and then with what is being done and the share of it that is done. Calls do not
	// overlap.
	Progress func(stage string, share float64)
}

func (s *Settings) filled() (Settings, error) {
	var c Settings
	if s != nil {
		c = *s
	}
	if c.Order == 0 {
		c.Order = 8
	}
	if c.Order < 3 || c.Order > maxOrder {
		return c, fmt.Errorf("response: order %d is outside 3 to %d; choose one inside, and Halve for finer meshes", c.Order, maxOrder)
	}
	if c.Halve < 0 {
		return c, fmt.Errorf("response: Halve is %d; it counts halvings, give 0 or more", c.Halve)
	}
	if !(c.Gap > 0) {
		c.Gap = 2
	}
	if c.MaxUnknowns <= 0 {
		c.MaxUnknowns = 8000
	}
	return c, nil
}

// orders returns the orders of the three meshes.
func orders(finest int) [3]int {
	if finest < 6 {
		return [3]int{finest - 2, finest - 1, finest}
	}
	return [3]int{finest - 4, finest - 2, finest}
}

// The errors that Prepare and Solve wrap.
var (
	ErrTooLarge     = errors.New("too many unknowns")
	ErrOverlap      = errors.New("bodies touch or overlap")
	ErrNotConverged = errors.New("iteration did not converge")
	ErrSourceInside = errors.New("source inside a responding body")
	ErrMaterial     = errors.New("not a material")
)

// System is the geometry of responding bodies, made ready for any susceptibilities and any applied field: the three matrices
// of what the charge of every panel does to every other.
//
// A System is immutable and safe for concurrent use.
type System struct {
	bodies   []geom.Body
	locators []geom.Locator
	bounds   []r3.Box
	joined   map[[2]int]bool // pairs of bodies, lower first, that share a part of their boundaries
	tiles    []*tile
	parts    []part
	levels   []level
	inner    *rule
	pieces   int  // how many are kept
	rough    bool // there are edges, or gaps for which panels were halved
	set      Settings
}

// part is a connected part of the boundary of a body.
type part struct {
	body   int
	beyond int // the body whose cavity the part fills, or whose surface it is; -1: none
	tiles  []int
}

// level is one of the three meshes with its matrix.
type level struct {
	*mesh
	root   []float64   // roots of the areas of the nodes
	a      []float64   // K' for unknowns and equations times root: density x root on the node
	areas  []float64   // of the parts
	enters [][]float64 // for parts c and d: the flux of a unit charge on d out of c: 0, 1, 1/2 or -1/2
}

// Prepare cuts the boundaries of the bodies into panels and computes the matrices.
//
// It fails where a body's Check fails or a face has no charts (panel.ErrCharts), with ErrOverlap where bodies touch or overlap,
// with ErrTooLarge where the finest mesh would have more than MaxUnknowns, and with the context's error.
func Prepare(ctx context.Context, bodies []geom.Body, set *Settings) (*System, error) {
	c, err := set.filled()
	if err != nil {
		return nil, err
	}
	if len(bodies) == 0 {
		return nil, errors.New("response: no bodies; give at least one")
	}
	s := &System{bodies: append([]geom.Body(nil), bodies...), set: c, inner: newRule(points), joined: map[[2]int]bool{}}
	for _, b := range bodies {
		if err := b.Check(); err != nil {
			return nil, fmt.Errorf("response: body %d: %w", len(s.bounds), err)
		}
		s.bounds = append(s.bounds, b.Bounds())
		s.locators = append(s.locators, geom.LocatorOf(b))
	}
	if err := s.cut(); err != nil {
		return nil, err
	}
	for k, order := range orders(c.Order) {
		l, err := s.level(ctx, order, k)
		if err != nil {
			return nil, fmt.Errorf("response: level %d of 3 not done: %w", k+1, err)
		}
		s.levels = append(s.levels, l)
	}
	return s, nil
}

// cut makes the tiles.
func (s *System) cut() error {
	limit := s.set.MaxUnknowns / (s.set.Order * s.set.Order)
	sheets, err := s.sheets()
	if err != nil {
		return err
	}
	for _, sh := range sheets {
		if err := s.apart(sh); err != nil {
			return err
		}
	}
	for _, sh := range sheets {
		p := part{body: sh.body, beyond: sh.beyond}
		panels := s.refine(sh, limit)
		s.rough = s.rough || len(panels) != len(sh.panels)
		for _, q := range panels {
			s.rough = s.rough || q.Edged() || s.set.Plain
			if len(s.tiles) >= limit {
				return s.tooLarge(sh.body)
			}
			p.tiles = append(p.tiles, len(s.tiles))
			s.tiles = append(s.tiles, newTile(q, sh.body, len(s.parts), s.inner, &s.pieces))
		}
		s.parts = append(s.parts, p)
	}
	return nil
}

func (s *System) tooLarge(body int) error {
	return fmt.Errorf("response: %w: body %d takes the mesh beyond %d panels of %d nodes, MaxUnknowns is %d; raise it, lower Order or Halve, or widen small gaps",
		ErrTooLarge, body, s.set.MaxUnknowns/(s.set.Order*s.set.Order), s.set.Order*s.set.Order, s.set.MaxUnknowns)
}

// level computes one of the three meshes.
func (s *System) level(ctx context.Context, order, which int) (level, error) {
	l := level{mesh: newMesh(s.tiles, order, s.inner)}
	n := len(l.x)
	l.root = make([]float64, n)
	for i, a := range l.area {
		l.root[i] = math.Sqrt(a)
	}
	l.a = make([]float64, n*n)
	report := func(done int) {
		if s.set.Progress != nil {
			s.set.Progress(fmt.Sprintf("matrix %d of 3", which+1), float64(done)/float64(n))
		}
	}
	err := each(ctx, n, func() *rows { return newRows(s.tiles, l.mesh, s.inner) }, func(w *rows, i int) {
		row := l.a[i*n : (i+1)*n]
		w.row(row, i)
		for j := range row {
			row[j] *= l.root[i] * l.jac[j] / l.root[j]
		}
	}, report)
	if err != nil {
		return l, err
	}
	s.conserve(&l)
	return l, nil
}

// nodesOf visits the nodes of a part.
func (s *System) nodesOf(l *level, part int, visit func(i int)) {
	nodes := l.order * l.order
	for _, t := range s.parts[part].tiles {
		for i := t * nodes; i < (t+1)*nodes; i++ {
			visit(i)
		}
	}
}

// conserve makes the flux of every charge out of every part what Gauss's law says: what the mesh misses is taken off evenly
// over the part. No charge can then leak, whatever the contrast.
func (s *System) conserve(l *level) {
	n := len(l.x)
	l.areas = make([]float64, len(s.parts))
	l.enters = make([][]float64, len(s.parts))
	flux := make([]float64, n)
	for c := range s.parts {
		clear(flux)
		s.nodesOf(l, c, func(i int) {
			l.areas[c] += l.area[i]
			for j, v := range l.a[i*n : (i+1)*n] {
				flux[j] += l.root[i] * v
			}
		})
		l.enters[c] = make([]float64, len(s.parts))
		for d := range s.parts {
			sum, all := 0.0, 0.0
			s.nodesOf(l, d, func(j int) {
				sum += flux[j] * l.root[j]
				all += l.area[j]
			})
			l.enters[c][d] = math.Round(2*sum/all) / 2
			s.nodesOf(l, d, func(j int) { flux[j] -= l.enters[c][d] * l.root[j] })
		}
		s.nodesOf(l, c, func(i int) {
			row := l.a[i*n : (i+1)*n]
			f := l.root[i] / l.areas[c]
			for j := range row {
				row[j] -= f * flux[j]
			}
		})
	}
}

// Unknowns returns the numbers of unknowns of the three meshes.
func (s *System) Unknowns() [3]int {
	var n [3]int
	for k := range n {
		n[k] = len(s.levels[k].x)
	}
	return n
}
