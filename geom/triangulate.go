package geom

// triangles cuts a simple polygon into triangles without new vertices, by clipping ears, and returns the labels of
// their vertices in the sense of the loop. A convex polygon gives a fan. A loop that is not simple gives triangles too,
// which then overlap.
//
// Source: [Meisters1975] (two ears).
func triangles(l loop) [][3]int {
	n := l.len()
	if n < 3 {
		return nil
	}
	axis := steepest(l.area().Value())
	points := make([]flat, n)
	rest := make([]int, n)
	for k := range points {
		points[k] = drop(l.at(k), axis)
		rest[k] = k
	}
	sense := signedArea(points).Sign()
	cut := make([][3]int, 0, n-2)
	clip := func(k int) {
		m := len(rest)
		cut = append(cut, [3]int{l.label(rest[(k+m-1)%m]), l.label(rest[k]), l.label(rest[(k+1)%m])})
		rest = append(rest[:k], rest[k+1:]...)
	}
	for len(rest) > 3 {
		clip(findEar(points, rest, sense))
	}
	clip(1)
	return cut
}

// findEar returns the place in rest of a vertex whose triangle holds no other vertex; the second vertex if there is
// none, which happens only where the polygon is not simple.
func findEar(points []flat, rest []int, sense int) int {
	m := len(rest)
	for i := range rest {
		k := (i + 1) % m // the second vertex first: a convex polygon becomes a fan about its first
		a, b, c := points[rest[(k+m-1)%m]], points[rest[k]], points[rest[(k+1)%m]]
		if turn(a, b, c) != sense {
			continue
		}
		free := true
		for j := 2; j < m-1 && free; j++ {
			p := points[rest[(k+j)%m]]
			free = turn(a, b, p)*sense < 0 || turn(b, c, p)*sense < 0 || turn(c, a, p)*sense < 0
		}
		if free {
			return k
		}
	}
	return 1
}
