package logatan

// LogRatioTo sets dst[i] = LogRatio(p[i], q[i]). It panics unless
// len(dst) == len(p) == len(q).
func LogRatioTo(dst, p, q []float64) {
	if len(p) != len(dst) || len(q) != len(dst) {
		panic("logatan: length of slices differs")
	}
	for i := range dst {
		dst[i] = LogRatio(p[i], q[i])
	}
}

// Log1pRatioTo sets dst[i] = Log1pRatio(n[i], d[i]). It panics unless
// len(dst) == len(n) == len(d).
func Log1pRatioTo(dst, n, d []float64) {
	if len(n) != len(dst) || len(d) != len(dst) {
		panic("logatan: length of slices differs")
	}
	for i := range dst {
		dst[i] = Log1pRatio(n[i], d[i])
	}
}

// Atan2To sets dst[i] = Atan2(y[i], x[i]). It panics unless
// len(dst) == len(y) == len(x).
func Atan2To(dst, y, x []float64) {
	if len(y) != len(dst) || len(x) != len(dst) {
		panic("logatan: length of slices differs")
	}
	for i := range dst {
		dst[i] = Atan2(y[i], x[i])
	}
}
