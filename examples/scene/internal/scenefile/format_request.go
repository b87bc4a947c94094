package scenefile

func request() Object {
	return Object{
		Name: "request", Title: "A request",
		Doc: "An object with exactly one of the request keys below, its options, and the keys common to all.",
		Keys: []Key{
			key("name", Type{Base: Name}, `"Hall plate"`, "Repeated with the answer."),
			key("hand", list(1, object("hand")), `[{"quantity": "B.z", "value": 0.08, "within": 0.01, "formula": "dipole law"}]`, "Values computed by hand, to be held against the answer."),
		},
		Variants: requests(),
	}
}

func requests() []Variant {
	side := key("side", choice("mean", "inside", "outside"), `"outside"`, "Which limit is taken at a point on a face. On a sheet, outside is where the normal points. For mean, each of E, D, H, B is the mean of its two limits.").otherwise(`"mean"`)
	byPart := key("by_part", Type{Base: Flag}, `true`, "Adds what every part contributes.").otherwise(`false`)
	gradient := key("gradient", Type{Base: Flag}, `true`, "Adds the gradients of E and B: row i is the gradient of component i, per metre; null on edges, at point sources and on charged faces where the field bends differently on both sides.").otherwise(`false`)
	csv := key("csv", Type{Base: Output}, `"values.csv"`, "Also written as a table.")
	plot := key("plot", Type{Base: Output}, `"values.svg"`, "Also drawn.").status(Skipped)
	vtk := key("vtk", Type{Base: Output}, `"values.vtk"`, "Also written for viewers.").status(Skipped)
	ask := func(t Type, name, example, doc string) Key { return key(name, t, example, doc).required() }
	return []Variant{
		{Name: "charges", Doc: "What every face and every volume carries.",
			Keys:  []Key{ask(Type{Base: Always}, "charges", `true`, "Always true.")},
			Gives: chargeMeasures()},
		{Name: "points", Doc: "Values at points.",
			Keys:  []Key{ask(list(1, vector()), "points", `[[0, 0, -1]]`, "Points [x, y, z].").unit("length"), side, byPart, gradient},
			Gives: pointMeasures()},
		{Name: "points_file", Doc: "Values at the points of a file.",
			Keys: []Key{ask(Type{Base: Input}, "points_file", `"probe.csv"`, "File of rows x,y,z in the scene's length unit, with `#` comments and one optional header line.").unit("length"),
				side, byPart, gradient},
			Gives: pointMeasures()},
		{Name: "line", Doc: "Values along a straight line.",
			Keys:  []Key{ask(object("line"), "line", `{"from": [0, 0, 0], "to": [0, 0, 10], "count": 11}`, "The line."), side, plot, csv},
			Gives: pointMeasures()},
		{Name: "plane", Doc: "Values on a parallelogram.",
			Keys:  []Key{ask(object("parallelogram"), "plane", `{"corner": [0, 0, 0], "edge1": [10, 0, 0], "edge2": [0, 10, 0], "counts": [11, 11]}`, "The parallelogram."), side, plot, csv, vtk},
			Gives: pointMeasures()},
		{Name: "grid", Doc: "Values in a box.",
			Keys:  []Key{ask(object("grid"), "grid", `{"min": [0, 0, 0], "max": [1, 1, 1], "counts": [3, 3, 3]}`, "The box."), side, csv, vtk},
			Gives: pointMeasures()},
		{Name: "reading", Doc: "What a sensor reads: the mean over its area of the component of B along its normal, of E in a scene without magnetized parts, of A in one with circulating parts only.",
			Keys:  []Key{ask(object("reading"), "reading", `{"at": [0, 0, -1], "normal": [0, 0, 1], "disc": 0.2}`, "The sensor.")},
			Gives: []Measure{{Name: "mean", Unit: "T or V/m"}}},
		{Name: "linkage", Doc: "Flux linkage of a coil: turns times the flux of B of the magnetized and circulating parts and of the applied field.",
			Keys:  []Key{ask(object("linkage"), "linkage", `{"circle": {"centre": [0, 0, 0], "normal": [0, 0, 1], "radius": 5}, "turns": 100}`, "The coil.")},
			Gives: []Measure{{Name: "linkage", Unit: "Wb"}}},
		{Name: "force", Doc: "Force and torque on a part from all other parts, the planes and the applied field. Electric, magnetic and circulating parts do not act on each other. A part with copies is named with the number of the copy.",
			Keys:  []Key{ask(object("force"), "force", `{"on": "lid magnet"}`, "The part.")},
			Gives: []Measure{{Name: "force", Form: "xyz", Unit: "N"}, {Name: "torque", Form: "xyz", Unit: "N·m"}}},
		{Name: "energy", Doc: "Interaction energy of two rigid parts.",
			Keys:  []Key{ask(array(2, Type{Base: Name}), "energy", `["lid magnet", "trim bar"]`, "Their names.")},
			Gives: []Measure{{Name: "energy", Unit: "J"}}},
		{Name: "reach", Doc: "How far from the magnetized parts their own flux density is still reached.",
			Keys:  []Key{ask(object("reach"), "reach", `{"flux_density": 5e-4}`, "The flux density.")},
			Gives: []Measure{{Name: "distance", Unit: "m"}, {Name: "from_surface", Unit: "m"}}},
		{Name: "travel", Doc: "Requests at several positions of a part; none of them a travel.",
			Keys: []Key{ask(object("travel"), "travel", `{"part": "lid magnet", "shift": [0, 0, 10], "count": 11, "ask": [{"points": [[0, 0, 0]]}]}`, "The movement."), plot, csv}},
		{Name: "hand_over", Doc: "The equivalent charges for another simulator.",
			Keys: []Key{ask(Type{Base: Output}, "hand_over", `"charges.json"`, "Name of the file, .json or .csv; its format is described in package field/handover."),
				key("kind", choice("electric", "magnetic"), `"magnetic"`, "Which charges; needed where the scene has both.")}},
	}
}

// pointMeasures are the quantities of a record at a point.
func pointMeasures() []Measure {
	return []Measure{
		{Name: "V", Unit: "V", Kind: "E"}, {Name: "E", Form: "xyz", Unit: "V/m", Kind: "E"}, {Name: "D", Form: "xyz", Unit: "C/m²", Kind: "E"},
		{Name: "Vm", Unit: "A", Kind: "B"}, {Name: "H", Form: "xyz", Unit: "A/m", Kind: "B"}, {Name: "B", Form: "xyz", Unit: "T", Kind: "B"},
		{Name: "A", Form: "xyz", Unit: "T·m", Kind: "A"},
	}
}

// chargeMeasures are the quantities of faces and parts.
func chargeMeasures() []Measure {
	return []Measure{
		{Name: "charge", Of: "face", Unit: "C or A·m"}, {Name: "area", Of: "face", Unit: "m²"},
		{Name: "density", Of: "face", Form: "range", Unit: "C/m² or A/m"},
		{Name: "volume", Of: "part", Unit: "m³"}, {Name: "volume_charge", Of: "part", Unit: "C or A·m"},
		{Name: "volume_density", Of: "part", Form: "range", Unit: "C/m³ or A/m²"},
		{Name: "total_charge", Of: "part", Unit: "C or A·m"}, {Name: "moment", Of: "part", Form: "xyz", Unit: "C·m or A·m²"},
	}
}

func line() Object {
	return Object{
		Name: "line", Title: "A line",
		Doc: "Point k = from + (to − from)·k/(count − 1), k from 0, the ends exact; count 1 is the start.",
		Keys: []Key{
			key("from", vector(), `[0, 0, 0]`, "First point.").unit("length").required(),
			key("to", vector(), `[0, 0, 10]`, "Last point.").unit("length").required(),
			key("count", integer(1, MaxPoints), `11`, "Number of points.").required(),
		},
	}
}

func parallelogram() Object {
	return Object{
		Name: "parallelogram", Title: "A plane",
		Doc: "A parallelogram. The point along the first edge runs fastest.",
		Keys: []Key{
			key("corner", vector(), `[0, 0, 0]`, "First point.").unit("length").required(),
			key("edge1", direction(), `[10, 0, 0]`, "First edge, from the corner.").unit("length").required(),
			key("edge2", direction(), `[0, 10, 0]`, "Second edge, not parallel to the first.").unit("length").required(),
			key("counts", array(2, integer(1, MaxPoints)), `[11, 11]`, "Numbers of points along both edges.").required(),
		},
	}
}

func grid() Object {
	return Object{
		Name: "grid", Title: "A grid",
		Doc: "The points of a box along the scene's axes; x runs fastest.",
		Keys: []Key{
			key("min", vector(), `[0, 0, 0]`, "Lowest corner.").unit("length").required(),
			key("max", vector(), `[1, 1, 1]`, "Highest corner; each coordinate above that of `min`, or equal to it where the count is 1.").unit("length").required(),
			key("counts", array(3, integer(1, MaxPoints)), `[3, 3, 3]`, "Numbers of points along x, y, z.").required(),
		},
	}
}

func reading() Object {
	return Object{
		Name: "reading", Title: "A sensor",
		Keys: []Key{
			key("at", vector(), `[0, 0, -1]`, "Centre of its area.").unit("length").required(),
			key("normal", direction(), `[0, 0, 1]`, "The component that it reads, of any length.").required(),
			key("disc", positive(), `0.2`, "Radius of a round area.").unit("length"),
			key("rectangle", array(2, positive()), `[0.2, 0.1]`, "Width and height of a rectangular area.").unit("length"),
			key("along", direction(), `[1, 0, 0]`, "Direction of the width."),
		},
		Rules: []Rule{rule(ExactlyOne, "disc", "rectangle"), rule(Together, "rectangle", "along"), rule(Together, "along", "rectangle")},
	}
}

func linkage() Object {
	return Object{
		Name: "linkage", Title: "A coil",
		Keys: []Key{
			key("circle", object("circle"), `{"centre": [0, 0, 0], "normal": [0, 0, 1], "radius": 5}`, "A round coil."),
			key("polygon", list(3, vector()), `[[0, 0, 0], [1, 0, 0], [0, 1, 0]]`, "Corners of a polygonal coil.").unit("length"),
			key("turns", positive(), `100`, "Number of turns.").otherwise(`1`),
		},
		Rules: []Rule{rule(ExactlyOne, "circle", "polygon")},
	}
}

func circle() Object {
	return Object{
		Name: "circle", Title: "A round coil",
		Keys: []Key{
			key("centre", vector(), `[0, 0, 0]`, "Centre.").unit("length").required(),
			key("normal", direction(), `[0, 0, 1]`, "Sense of the flux, of any length.").required(),
			length("radius", `5`, "Radius."),
		},
	}
}

func force() Object {
	return Object{
		Name: "force", Title: "Force on a part",
		Keys: []Key{
			key("on", Type{Base: Name}, `"lid magnet"`, "Name of the part.").required(),
			key("about", vector(), `[0, 0, 0]`, "Point of the scene that the torque is about; default is the part's `centre`.").unit("length"),
		},
	}
}

func reach() Object {
	return Object{
		Name: "reach", Title: "Reach",
		Keys: []Key{key("flux_density", positive(), `5e-4`, "The flux density.").unit("T").required()},
	}
}

func travel() Object {
	return Object{
		Name: "travel", Title: "Travel",
		Doc: "From the placed position to the fully shifted or rotated one.",
		Keys: []Key{
			key("part", Type{Base: Name}, `"lid magnet"`, "Name of the part.").required(),
			key("shift", vector(), `[0, 0, 10]`, "The whole way.").unit("length"),
			key("rotation", object("turn"), `{"axis": [0, 0, 1], "degrees": 90}`, "The whole rotation, about an axis of the scene."),
			key("count", integer(1, MaxPoints), `11`, "Number of positions.").required(),
			key("ask", list(1, object("request")), `[{"points": [[0, 0, 0]]}]`, "Requests at every position.").required(),
		},
		Rules: []Rule{rule(ExactlyOne, "shift", "rotation")},
	}
}

func hand() Object {
	return Object{
		Name: "hand", Title: "A hand check",
		Doc: "The report prints the hand value, the formula and the difference. The check fails where |computed − value| > within·|value| (a whole vector: both norms), so with value 0 it holds only for an exact 0.",
		Keys: []Key{
			key("quantity", Type{Base: Name}, `"B.z"`, "What is checked, see below.").required(),
			key("at", integer(0, MaxPoints-1), `0`, "Number of the point, from 0; of requests for points only.").otherwise(`0`),
			key("value", Type{Base: Numbers}, `0.08`, "The hand value, in SI units; three numbers for a whole vector.").unit("SI").required(),
			key("within", atLeast(0), `0.01`, "Allowed difference, relative.").required(),
			key("formula", Type{Base: Text}, `"dipole law"`, "How the value was found."),
		},
	}
}
