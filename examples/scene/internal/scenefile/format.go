package scenefile

// Format returns the table of all keys of a scene file.
func Format() *Table {
	return &Table{Objects: []Object{
		topLevel(), part(), rotation(), frame(), copies(), turn(),
		polarized(), magnetized(), affine(), term(), axialPower(), power(), charged(),
		applied(), plane(),
		request(), line(), parallelogram(), grid(), reading(), linkage(), circle(), force(), reach(), travel(), hand(),
	}}
}

func topLevel() Object {
	return Object{
		Name: "scene", Title: "The document",
		Doc: "One JSON object. The keys may stand in any order.",
		Keys: []Key{
			key("version", integer(1, 1), `1`, "Version of the format.").otherwise(`1`),
			key("title", Type{Base: Text}, `"Lid sensor"`, "Heading of the report."),
			key("length", choice("m", "cm", "mm", "um"), `"mm"`, "Unit of every length in the file. Geometry is computed in this unit; only results are converted.").otherwise(`"m"`),
			key("accuracy", between(1e-13, 0.1), `1e-9`, "Wanted relative accuracy of every value. It is met where the error is within accuracy × max(size of the value, 1e-3 of the field scale of its source), or within one rounding of the point's coordinates.").otherwise(`1e-9`),
			key("temperature", atLeast(-273.15), `20`, "Acts on parts with a grade.").unit("°C").otherwise(`20`),
			key("parts", list(1, object("part")), `[{"name": "bead", "shape": "sphere", "radius": 2, "polarized": {"uniform": [0, 0, 1e-6]}}]`, "The bodies.").required(),
			key("applied", object("applied"), `{"B": [0, 0, 0.01]}`, "Uniform field from outside."),
			key("planes", list(0, object("plane")), `[{"kind": "iron", "point": [0, 0, 0], "normal": [0, 0, 1]}]`, "Image planes; everything lies on the side of their normals. Two or three stand at right angles to each other."),
			key("wanted", list(0, object("request")), `[{"charges": true}]`, "What is asked, answered in this order.").otherwise(`[{"charges": true}]`),
		},
	}
}

func applied() Object {
	return Object{
		Name: "applied", Title: "Applied field",
		Doc: "A uniform field from outside, added to that of the parts.",
		Keys: []Key{
			key("E", vector(), `[0, 0, 1000]`, "Electric field.").unit("V/m"),
			key("B", vector(), `[0, 0, 0.01]`, "Flux density.").unit("T"),
		},
		Rules: []Rule{rule(AtLeastOne, "E", "B")},
	}
}

func plane() Object {
	return Object{
		Name: "plane", Title: "An image plane",
		Doc: "A wall that mirrors the field.",
		Keys: []Key{
			key("kind", choice("iron", "conductor", "dielectric"), `"iron"`, "What fills the space behind the plane.").required(),
			key("point", vector(), `[0, 0, 0]`, "A point of the plane.").unit("length").required(),
			key("normal", direction(), `[0, 0, 1]`, "Direction to the side where the parts lie, of any length.").required(),
			key("permittivity", atLeast(0), `4.5`, "Relative permittivity behind a dielectric plane."),
		},
	}
}

func rotation() Object {
	return Object{
		Name: "rotation", Title: "A rotation",
		Doc: "Right-handed, about an axis fixed in the scene. Multiples of 90° are exact. Several are applied in the order of the list: z 90° then x 90° takes the part's x axis to scene z.",
		Keys: []Key{
			key("axis", direction(), `[0, 0, 1]`, "Axis, of any length.").required(),
			key("degrees", number(), `90`, "Angle.").unit("°").required(),
		},
	}
}

func frame() Object {
	return Object{
		Name: "frame", Title: "A frame",
		Doc: "The part's axes given by vectors instead of rotations; y = z × x.",
		Keys: []Key{
			key("z", direction(), `[1, 0, 1]`, "The part's z axis, of any length.").required(),
			key("x", direction(), `[0, 1, 0]`, "The part's x axis lies along the part of this vector that is perpendicular to z. Without it, the scene axis least aligned with z serves. Not parallel to z."),
		},
	}
}

func turn() Object {
	o := rotation()
	o.Name, o.Title = "turn", "A rotation about an axis through a point"
	o.Doc = "Right-handed, about an axis of the scene."
	o.Keys = append(o.Keys, key("about", vector(), `[0, 0, 0]`, "A point of the axis.").unit("length").otherwise(`[0, 0, 0]`))
	return o
}

func copies() Object {
	return Object{
		Name: "copies", Title: "Copies",
		Doc: "Places n bodies instead of one. Number i, counted from 0, is rotated i times and then shifted i steps. Their names are that of the part with \" 1\" … \" n\".",
		Keys: []Key{
			key("count", integer(1, MaxBodies), `8`, "Number of bodies n.").required(),
			key("step", vector(), `[5, 0, 0]`, "Shift from one body to the next.").unit("length").otherwise(`[0, 0, 0]`),
			key("rotation", object("turn"), `{"axis": [0, 0, 1], "degrees": 45, "about": [0, 0, 0]}`, "Rotation from one body to the next."),
			key("alternate", Type{Base: Flag}, `true`, "Reverses every second body (number 1, 3, …).").otherwise(`false`),
		},
	}
}
