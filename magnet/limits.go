package magnet

// Limit is a flux density, sometimes at a distance, that a rule or a standard names. It is data for planning, never advice:
// editions change, and local rules and competent people decide.
type Limit struct {
	FluxDensity float64 // T
	Distance    float64 // m from the object at which it counts; 0: wherever people or devices are
	What        string  // what it bounds
	Source      string  // where it stands, with the edition
}

// Limits returns the limits that reports on magnets compare with. Sources are quoted from memory unless they say otherwise:
// look up the current edition before relying on a number.
func Limits() []Limit {
	return []Limit{
		{0.5e-3, 0, "controlled access, earlier practice (5 gauss line)", "earlier practice around magnetic resonance equipment; national rules may still say so (from memory)"},
		{0.9e-3, 0, "controlled access around magnetic resonance equipment", "IEC 60601-2-33 edition 4 (2022) (from memory)"},
		{0.525e-6, 4.6, "air freight: above it in any direction, not accepted", "IATA Packing Instruction 953, as quoted in the trade; edition to be checked each year (from memory)"},
		{0.2e-6, 2.1, "air freight: not above it, not regulated as magnetized material", "IATA Packing Instruction 953, as quoted in the trade; edition to be checked each year (from memory)"},
	}
}
