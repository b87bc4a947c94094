package scenefile

func part() Object {
	return Object{
		Name: "part", Title: "A part",
		Doc: "A body, a sheet or a point, in its own frame. It is rotated about the origin of that frame first, then `centre` moves that origin. Polarization, magnetization and charge are given in the part's own frame and turn with it.",
		Keys: []Key{
			key("name", Type{Base: Name}, `"lid magnet"`, "Unique among all parts and copies.").required(),
			key("shape", Type{Base: Name}, `"cylinder"`, "One of the shapes below; each has dimensions of its own.").required(),
			key("centre", vector(), `[0, 0, 5]`, "Where the origin of the part's frame lies in the scene.").unit("length").otherwise(`[0, 0, 0]`),
			key("rotations", list(0, object("rotation")), `[{"axis": [0, 0, 1], "degrees": 90}]`, "Rotations, applied in order."),
			key("frame", object("frame"), `{"z": [1, 0, 1]}`, "The part's axes, instead of rotations."),
			key("copies", object("copies"), `{"count": 8, "step": [5, 0, 0]}`, "Several equal bodies."),
			key("scale", number(), `1`, "Multiplies the polarization, magnetization or charge.").otherwise(`1`),
			key("polarized", object("polarized"), `{"uniform": [0, 0, 1e-6]}`, "Electric polarization; bodies and points."),
			key("magnetized", object("magnetized"), `{"remanence": [0, 0, 1.2]}`, "Magnetization; bodies and points."),
			key("charged", object("charged"), `{"density": 1e-6}`, "Real charge; sheets and points."),
			key("circulating", number(), `1e-6`, "A0: flux per metre that circulates in the thin curved wall of a cylinder, right-handed about z: far from the ends the vector potential inside is A0 along z, and 0 outside.").unit("T·m"),
			key("permittivity", permeable(), `4.5`, "Relative permittivity of a body that responds to the field; beside a polarization, its dielectric constant."),
			key("permeability", permeable(), `1000`, "Relative permeability of a body that responds to the field; beside a magnetization, its recoil permeability."),
			key("curve", Type{Base: Input}, `"steel.csv"`, "File with a B–H or P–E table.").status(Later),
		},
		Rules: []Rule{
			rule(AtMostOne, "rotations", "frame"),
			rule(AtMostOne, "polarized", "magnetized", "charged", "circulating"),
		},
		Select:   "shape",
		Variants: shapes(),
	}
}

// permeable is a number of at least 0, or "infinite".
func permeable() Type {
	return atLeast(0).or(Variety{choice("infinite"), "a perfect conductor, or iron without limit"})
}

func length(name, example, doc string) Key {
	return key(name, positive(), example, doc).unit("length").required()
}

func shapes() []Variant {
	height := length("height", `4`, "Height.")
	radius := length("radius", `3`, "Radius.")
	inner := length("inner", `2`, "Inner radius, below `outer`.")
	outer := length("outer", `3`, "Outer radius.")
	rings := []Rule{rule(Ascending, "inner", "outer")}
	slope := array(2, number())
	return []Variant{
		{Name: "box", Doc: "Origin at the centre, edges along x, y, z.",
			Keys:  []Key{key("size", array(3, positive()), `[2, 3, 4]`, "Edges along x, y, z.").unit("length").required()},
			Faces: []string{"-x", "+x", "-y", "+y", "-z", "+z"}},
		{Name: "cylinder", Doc: "Origin at the centre, axis z.",
			Keys: []Key{radius, height}, Faces: []string{"bottom", "top", "wall"}},
		{Name: "tube", Doc: "Origin at the centre, axis z.",
			Keys: []Key{inner, outer, height}, Rules: rings, Faces: []string{"bottom", "top", "inner", "outer"}},
		{Name: "arc", Doc: "A part of a tube about z, from one angle to another, counted from +x towards +y; origin at the centre of the full tube. Angles in degrees or in radians; whole degrees are exact. No faces `from` and `to` for a full turn, no face `inner` for a wedge without a bore.",
			Keys: []Key{
				key("inner", atLeast(0), `2`, "Inner radius, below `outer`; 0 for a wedge whose edge is the axis.").unit("length").required(),
				outer, height,
				key("from", number(), `0`, "Start, counted from +x.").unit("°"),
				key("to", number(), `90`, "End; from < to ≤ from + one turn.").unit("°"),
				key("from_rad", number(), `0`, "Start, counted from +x.").unit("rad"),
				key("to_rad", number(), `1.5`, "End; from < to ≤ from + one turn.").unit("rad")},
			Rules: append([]Rule{rule(ExactlyOne, "from", "from_rad"), rule(Together, "from", "to"), rule(Together, "to", "from"),
				rule(Together, "from_rad", "to_rad"), rule(Together, "to_rad", "from_rad"),
				rule(Ascending, "from", "to"), rule(Ascending, "from_rad", "to_rad")}, rings...),
			Faces: []string{"bottom", "top", "inner", "outer", "from", "to"}},
		{Name: "sphere", Doc: "Origin at the centre.", Keys: []Key{radius}, Faces: []string{"surface"}},
		{Name: "hollow_sphere", Doc: "Origin at the centre.", Keys: []Key{inner, outer}, Rules: rings, Faces: []string{"inner", "outer"}},
		{Name: "ellipsoid", Doc: "Origin at the centre, axes along x, y, z.",
			Keys:  []Key{key("semiaxes", array(3, positive()), `[1, 2, 3]`, "Half the axes along x, y, z.").unit("length").required()},
			Faces: []string{"surface"}},
		{Name: "cone", Doc: "Origin at mid-height on the axis z. An end of radius 0 is no face.",
			Keys: []Key{
				key("bottom", atLeast(0), `3`, "Radius of the lower end; one of both may be 0.").unit("length").required(),
				key("top", atLeast(0), `1`, "Radius of the upper end.").unit("length").required(), height},
			Faces: []string{"bottom", "top", "wall"}},
		{Name: "prism", Doc: "From z = −height/2 to +height/2. A slope [a, b] tilts that end to z = ±height/2 + a x + b y; the ends may not meet. Face `side k` starts at base point k.",
			Keys: []Key{
				key("base", list(3, array(2, number())), `[[0, 0], [2, 0], [0, 2]]`, "Corners [x, y] of a simple polygon, in either sense.").unit("length").required(),
				height,
				key("bottom_slope", slope, `[0, 0.1]`, "Tilt of the lower end.").otherwise(`[0, 0]`),
				key("top_slope", slope, `[0.1, 0]`, "Tilt of the upper end.").otherwise(`[0, 0]`)},
			Faces: []string{"bottom", "top", "side #"}},
		{Name: "polyhedron", Doc: "Vertices as given. Faces are planar, counter-clockwise seen from outside; vertices are counted from 0.",
			Keys: []Key{
				key("vertices", list(4, vector()), `[[0, 0, 0], [1, 0, 0], [0, 1, 0], [0, 0, 1]]`, "Corners [x, y, z].").unit("length").required(),
				key("faces", list(4, list(3, integer(0, MaxBytes))), `[[0, 2, 1], [0, 1, 3], [1, 2, 3], [0, 3, 2]]`, "Corners of every face, by number.").required()},
			Faces: []string{"#"}},
		{Name: "torus", Doc: "Origin at the centre, axis z.",
			Keys:  []Key{length("major", `5`, "Radius of the centre line."), length("minor", `1`, "Radius of the ring itself, below `major`.")},
			Rules: []Rule{rule(Ascending, "minor", "major")}, Faces: []string{"surface"}},
		{Name: "mesh", Status: Later, Doc: "A closed triangle surface from an STL, PLY, OBJ or OFF file; frame as in the file.",
			Keys:  []Key{key("file", Type{Base: Input}, `"part.stl"`, "Name of the file, in the scene's folder.").required()},
			Faces: []string{"surface"}},
		{Name: "polygon", Class: Sheet, Doc: "A flat sheet; normal by the right-hand rule.",
			Keys:  []Key{key("vertices", list(3, vector()), `[[0, 0, 0], [1, 0, 0], [0, 1, 0]]`, "Corners [x, y, z] of a planar simple polygon.").unit("length").required()},
			Faces: []string{"sheet"}},
		{Name: "disc", Class: Sheet, Doc: "A round sheet; origin at the centre, normal z.", Keys: []Key{radius}, Faces: []string{"sheet"}},
		{Name: "annulus", Class: Sheet, Doc: "A ring-shaped sheet; origin at the centre, normal z.", Keys: []Key{inner, outer}, Rules: rings, Faces: []string{"sheet"}},
		{Name: "point", Class: Point, Doc: "A point charge (`charged` with `charge`) or a dipole (`polarized` or `magnetized` with `moment`) at the origin; one of the three is needed."},
	}
}

func polarized() Object {
	return Object{
		Name: "polarized", Title: "Polarization",
		Doc: "Exactly one of the keys. A point takes `moment`, a body one of the others.",
		Keys: append([]Key{
			key("uniform", vector(), `[0, 0, 1e-6]`, "Uniform polarization.").unit("C/m²"),
			key("moment", vector(), `[0, 0, 1e-12]`, "Dipole moment of a point.").unit("C·m"),
		}, laws("C/m²")...),
		Rules: []Rule{rule(ExactlyOne, "uniform", "moment", "affine", "polynomial", "axial_power", "radial_power", "central_power")},
	}
}

func magnetized() Object {
	return Object{
		Name: "magnetized", Title: "Magnetization",
		Doc: "Exactly one of the keys. A point takes `moment`, a body one of the others.",
		Keys: append([]Key{
			key("uniform", vector(), `[0, 0, 1e6]`, "Uniform magnetization.").unit("A/m"),
			key("remanence", vector(), `[0, 0, 1.2]`, "Magnetic polarization J = µ0 M, equal to Br for a rigid magnet.").unit("T"),
			key("moment", vector(), `[0, 0, 0.1]`, "Dipole moment of a point.").unit("A·m²"),
			key("grade", Type{Base: Input}, `"grade.json"`, "File of grade data, in the scene's folder: typical remanence at the scene's temperature."),
			key("along", direction(), `[0, 0, 1]`, "Direction of the remanence of a grade, of any length."),
		}, laws("A/m")...),
		Rules: []Rule{rule(ExactlyOne, "uniform", "remanence", "moment", "grade", "affine", "polynomial", "axial_power", "radial_power", "central_power"),
			rule(Together, "grade", "along"), rule(Together, "along", "grade")},
	}
}

// laws are the keys for what varies in space, common to both kinds.
func laws(unit string) []Key {
	example := `{"coefficient": 2, "power": 1}`
	return []Key{
		key("affine", object("affine"), `{"value": [0, 0, 1], "gradient": [[0, 0, 0], [0, 0, 0], [0, 0, 0.5]]}`, "Linear in space.").unit(unit),
		key("polynomial", list(1, object("term")), `[{"component": "z", "coefficient": 2, "powers": [0, 0, 1]}]`, "Sum of c·xⁱyʲzᵏ, lengths in the file's unit.").unit(unit),
		key("axial_power", object("axial_power"), example, "c·zⁿ along z, integer n ≥ 0.").unit(unit),
		key("radial_power", object("power"), example, "c·sⁿ along ŝ, away from the z axis; s is the distance from it, real n ≥ 0 (negative only where the body keeps off the axis).").unit(unit),
		key("central_power", object("power"), example, "c·rⁿ along r̂ from the origin; r is the distance from it, real n ≥ 0 (negative only where the body keeps off the origin).").unit(unit),
	}
}

func affine() Object {
	return Object{
		Name: "affine", Title: "A linear law",
		Doc: "p = value + gradient·(r − about), r in the part's frame.",
		Keys: []Key{
			key("value", vector(), `[0, 0, 1]`, "Value at `about`.").unit("C/m² or A/m").required(),
			key("gradient", array(3, vector()), `[[0, 0, 0], [0, 0, 0], [0, 0, 0.5]]`, "Row i is the gradient of component i, per length unit of the file.").unit("C/m² or A/m per length").required(),
			key("about", vector(), `[0, 0, 0]`, "Where `value` holds.").unit("length").otherwise(`[0, 0, 0]`),
		},
	}
}

func term() Object {
	return Object{
		Name: "term", Title: "A term of a polynomial",
		Keys: []Key{
			key("component", choice("x", "y", "z"), `"z"`, "Component that the term adds to.").required(),
			key("coefficient", number(), `2`, "c, for lengths in the file's unit.").required(),
			key("powers", array(3, integer(0, 64)), `[0, 0, 1]`, "Powers of x, y, z.").required(),
		},
	}
}

func axialPower() Object {
	return Object{
		Name: "axial_power", Title: "A power of z",
		Keys: []Key{
			key("coefficient", number(), `2`, "c, for z in the file's unit.").required(),
			key("power", integer(0, 64), `1`, "n.").required(),
		},
	}
}

func power() Object {
	return Object{
		Name: "power", Title: "A power of a distance",
		Doc: "Where the body reaches the axis or the origin, the volume density of a power below 1 is infinite there (and null in results.json), and a negative power is refused.",
		Keys: []Key{
			key("coefficient", number(), `2`, "c, for distances in the file's unit.").required(),
			key("power", between(-64, 64), `1`, "n.").required(),
		},
	}
}

func charged() Object {
	return Object{
		Name: "charged", Title: "Charge",
		Doc: "Real (trapped) charge; it counts as free charge in D. A sheet takes `density`, with or without `gradient`: a + b·r, r in the part's frame. A point takes `charge`.",
		Keys: []Key{
			key("density", number(), `1e-6`, "a, for a sheet.").unit("C/m²"),
			key("gradient", vector(), `[1e-7, 0, 0]`, "b, for a sheet, per length unit of the file.").unit("C/m² per length").otherwise(`[0, 0, 0]`),
			key("charge", number(), `1e-9`, "Charge of a point.").unit("C"),
		},
		Rules: []Rule{rule(ExactlyOne, "density", "charge"), rule(Together, "gradient", "density")},
	}
}
