package solve

import (
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"gonum.org/v1/gonum/spatial/r3"
)

// Check is a hand check with what came out.
type Check struct {
	Quantity   string // as written in the scene
	Name       string // without address and component
	Kind       Kind   // of the part it speaks of, if it speaks of one
	Ladder     string // of the units of an answer's quantity, see Quantity
	At         int
	Hand       []float64 // SI; one number or three
	Value      []float64
	Difference float64 // value - hand, or the norm of the difference of vectors
	Within     float64 // relative
	Formula    string
	OK         bool
}

// CheckRecord holds one hand check against the record it speaks of.
func CheckRecord(h *scenefile.HandCheck, rec *Record) Check {
	e, m := &rec.Electric, &rec.Magnetic
	q := h.Quantity
	switch q.Name {
	case "V":
		return held(h, e.V)
	case "E":
		return held(h, component(e.E, q.Of)...)
	case "D":
		return held(h, component(e.D, q.Of)...)
	case "Vm":
		return held(h, m.Vm)
	case "H":
		return held(h, component(m.H, q.Of)...)
	case "B":
		return held(h, component(m.B, q.Of)...)
	case "A":
		return held(h, component(rec.Guide.A, q.Of)...)
	}
	return held(h, math.NaN())
}

// CheckCharge holds one hand check against what the parts carry.
func (s *Setup) CheckCharge(h *scenefile.HandCheck, all []PartCharge) Check {
	for i := range all {
		if p := &s.Parts[all[i].Part]; p.Name == h.Quantity.Part {
			check := chargeCheck(h, &all[i])
			check.Kind = p.Kind
			return check
		}
	}
	return held(h, math.NaN())
}

func chargeCheck(h *scenefile.HandCheck, c *PartCharge) Check {
	q := h.Quantity
	for _, f := range c.Faces {
		if q.Face != "" && f.Face == q.Face {
			return held(h, faceQuantity(&f, q))
		}
	}
	switch q.Name {
	case "volume":
		return held(h, c.Volume)
	case "volume_charge":
		return held(h, c.Inside)
	case "volume_density":
		return held(h, extreme(q.Of, c.Min, c.Max))
	case "total_charge":
		return held(h, c.Total)
	case "moment":
		return held(h, component(c.Moment, q.Of)...)
	}
	return held(h, math.NaN())
}

func faceQuantity(f *FaceCharge, q scenefile.Quantity) float64 {
	switch q.Name {
	case "area":
		return f.Area
	case "charge":
		return f.Charge
	case "density":
		return extreme(q.Of, f.Min, f.Max)
	}
	return math.NaN()
}

func extreme(of string, lo, hi float64) float64 {
	if of == "min" {
		return lo
	}
	return hi
}

// component returns what a quantity names of a vector.
func component(v r3.Vec, of string) []float64 {
	switch of {
	case "x":
		return []float64{v.X}
	case "y":
		return []float64{v.Y}
	case "z":
		return []float64{v.Z}
	case "norm":
		return []float64{r3.Norm(v)}
	}
	return []float64{v.X, v.Y, v.Z}
}

// held compares; a value that does not exist fails.
func held(h *scenefile.HandCheck, value ...float64) Check {
	c := Check{Quantity: h.Text, Name: h.Quantity.Name, At: h.At, Hand: h.Value, Value: value, Within: h.Within, Formula: h.Formula}
	if len(value) != len(h.Value) {
		c.Difference = math.NaN()
		return c
	}
	size := 0.0
	for k := range value {
		c.Difference = math.Hypot(c.Difference, value[k]-h.Value[k])
		size = math.Hypot(size, h.Value[k])
	}
	c.OK = c.Difference <= h.Within*size
	if len(value) == 1 {
		c.Difference = value[0] - h.Value[0]
	}
	return c
}
