package response

import (
	"context"
	"math"
	"runtime"
	"sync"
)

// gmres solves apply(v) = b by the method of [Saad1986] from the start 0, and returns the residual relative to |b| that it
// ends with and the number of steps.
func gmres(ctx context.Context, apply func(dst, v []float64), b []float64, tolerance float64, most int) (x []float64, residual float64, steps int, err error) {
	n := len(b)
	x = make([]float64, n)
	size := norm(b)
	if size == 0 {
		return x, 0, 0, nil
	}
	most = min(most, n)
	basis := [][]float64{scaled(b, 1/size)}
	h := make([][]float64, 0, most) // columns, made triangular by the rotations
	var cs, sn []float64
	g := []float64{size}
	for k := 0; k < most; k++ {
		if err := ctx.Err(); err != nil {
			return nil, 0, k, err
		}
		w := make([]float64, n)
		apply(w, basis[k])
		col := make([]float64, k+2)
		for range 2 { // twice is enough
			for i, v := range basis {
				d := dot(v, w)
				col[i] += d
				subtract(w, d, v)
			}
		}
		col[k+1] = norm(w)
		last := col[k+1]
		for i := range k {
			col[i], col[i+1] = cs[i]*col[i]+sn[i]*col[i+1], cs[i]*col[i+1]-sn[i]*col[i]
		}
		r := math.Hypot(col[k], col[k+1])
		cs, sn = append(cs, col[k]/r), append(sn, col[k+1]/r)
		col[k] = r
		g = append(g, -sn[k]*g[k])
		g[k] *= cs[k]
		h = append(h, col)
		steps = k + 1
		residual = math.Abs(g[k+1]) / size
		if residual <= tolerance || last <= 1e-15*r {
			break
		}
		basis = append(basis, scaled(w, 1/last))
	}
	y := make([]float64, steps)
	for i := steps - 1; i >= 0; i-- {
		y[i] = g[i]
		for k := i + 1; k < steps; k++ {
			y[i] -= h[k][i] * y[k]
		}
		y[i] /= h[i][i]
		subtract(x, -y[i], basis[i])
	}
	return x, residual, steps, nil
}

func dot(a, b []float64) float64 {
	var s [4]float64
	n := len(a) &^ 3
	for i := 0; i < n; i += 4 {
		s[0] += a[i] * b[i]
		s[1] += a[i+1] * b[i+1]
		s[2] += a[i+2] * b[i+2]
		s[3] += a[i+3] * b[i+3]
	}
	for i := n; i < len(a); i++ {
		s[0] += a[i] * b[i]
	}
	return s[0] + s[1] + (s[2] + s[3])
}

func norm(a []float64) float64 { return math.Sqrt(dot(a, a)) }

func scaled(a []float64, f float64) []float64 {
	b := make([]float64, len(a))
	for i, v := range a {
		b[i] = f * v
	}
	return b
}

// subtract takes f b off a.
func subtract(a []float64, f float64, b []float64) {
	add(a, -f, b)
}

// multiply sets dst to the square matrix a times v. Every row has one owner and a fixed order.
func multiply(dst, a, v []float64) {
	n := len(v)
	var group sync.WaitGroup
	workers := min(runtime.GOMAXPROCS(0), 1+n/256)
	for k := range workers {
		group.Add(1)
		go func() {
			defer group.Done()
			for i := k * n / workers; i < (k+1)*n/workers; i++ {
				dst[i] = dot(a[i*n:(i+1)*n], v)
			}
		}()
	}
	group.Wait()
}
