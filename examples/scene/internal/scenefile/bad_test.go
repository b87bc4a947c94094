package scenefile

import (
	"errors"
	"fmt"
	"strings"
	"testing"
	"testing/fstest"
)

// ball is a part that is right; scenes of the tests are made around it.
const ball = `{"name":"a","shape":"sphere","radius":1,"magnetized":{"uniform":[0,0,1]}}`

// withPart returns a scene with one part.
func withPart(part string) string { return `{"parts":[` + part + `]}` }

// withShape returns a scene with one magnetized part of a shape.
func withShape(shape string) string {
	return withPart(`{"name":"a",` + shape + `,"magnetized":{"uniform":[0,0,1]}}`)
}

// withLaw returns a scene with one sphere that carries something.
func withLaw(law string) string {
	return withPart(`{"name":"a","shape":"sphere","radius":1,` + law + `}`)
}

// withBare returns a scene with one part that carries nothing yet.
func withBare(shape string) string { return withPart(`{"name":"a",` + shape + `}`) }

// withTop returns a scene with further keys beside its parts.
func withTop(keys string) string { return `{"parts":[` + ball + `],` + keys + `}` }

// withArc returns a scene with one magnetized arc with further keys.
func withArc(keys string) string {
	return withShape(`"shape":"arc","inner":1,"outer":2,"height":1` + keys)
}

// withHandOn returns a scene with a part b of a shape and a hand check of the
// charge of one of its faces.
func withHandOn(shape, face string) string {
	return `{"parts":[{"name":"b",` + shape + `,"magnetized":{"uniform":[0,0,1]}}],` +
		`"wanted":[{"charges":true,"hand":[{"quantity":"b/` + face + `/charge","value":1,"within":1}]}]}`
}

// withRequest returns a scene with one request.
func withRequest(r string) string { return withTop(`"wanted":[` + r + `]`) }

// withHand returns a scene whose request has one hand check.
func withHand(request, check string) string {
	return withRequest(`{` + request + `,"hand":[` + check + `]}`)
}

// badScenes lists wrong scenes, each with what its error must say.
var badScenes = []struct {
	name, scene string
	want        string // pointer and problem, as a part of the text
	at          string // where the position is that of the first (or, after "^", the last) occurrence of this text
}{
	// Syntax.
	{"empty", " \n", "(root): the file is empty", ""},
	{"byte order mark", "\ufeff" + withPart(ball), "byte order mark; save it as UTF-8 without BOM", ""},
	{"utf-16", "\xff\xfe{\x00}\x00", "the file is UTF-16", ""},
	{"no object", `[1]`, "(root): the document must be an object (got a list of 1)", "[1]"},
	{"trailing text", withPart(ball) + " x", `text after the end of the document (got "x")`, "^x"},
	{"second document", withPart(ball) + "{}", "text after the end", "{}"},
	{"trailing comma in object", `{"parts":[` + ball + `],}`, `a key in double quotes should stand here (got "}")`, "^}"},
	{"trailing comma in list", `{"parts":[` + ball + `,]}`, `/parts/1: a value is missing before "]"`, "^]"},
	{"missing comma", `{"parts":[` + ball + ` "x"]}`, `/parts/1: a comma or "]" should stand here`, `"x"`},
	{"missing colon", `{"parts" 1}`, "/parts: a colon should stand here", "1"},
	{"cut off", `{"parts":[`, "/parts/0: the file ends where a value should stand", ""},
	{"single quotes", `{'parts':1}`, `(root): a key in double quotes should stand here`, "'parts"},
	{"comment", "{// x\n}", "a key in double quotes", "// x"},
	{"comment for a value", `{"title": /* x */ 1}`, "/title: no JSON value (got \"/*\"); JSON has no comments", "/*"},
	{"repeated key", `{"title":"a","title":"b","parts":[]}`, `/title: key "title" is repeated`, `^"title"`},
	{"repeated key by escape", `{"title":"a","t\u0069tle":"b"}`, `/title: key "title" is repeated`, `"t\u0069tle"`},
	{"too deep", strings.Repeat("[", 33), "nested deeper than 32", ""},
	{"too many keys", manyKeys(), "more than 64 keys", ""},
	{"wrong utf-8", "{\"title\":\"a\xffb\"}", "/title: wrong UTF-8 (byte 0xff)", "\xffb"},
	{"overlong utf-8", "{\"title\":\"\xc0\xaf\"}", "wrong UTF-8", "\xc0"},
	{"utf-8 surrogate", "{\"title\":\"\xed\xa0\x80\"}", "wrong UTF-8", "\xed"},
	{"half surrogate", `{"title":"\ud800x"}`, `half a surrogate pair (\ud800)`, `\ud800`},
	{"reversed surrogates", `{"title":"\udc00\ud800"}`, `half a surrogate pair (\udc00)`, `\udc00`},
	{"unknown escape", `{"title":"\x41"}`, "unknown escape", `\x`},
	{"short escape", `{"title":"\u12"}`, `\u without four hexadecimal digits`, `\u12`},
	{"line end in text", "{\"title\":\"a\nb\"}", "a control character or line end inside a text", "\nb"},
	{"open text", `{"title":"a`, "a text that does not end", `"a`},
	{"not a number", withLaw(`"scale":NaN`), "/parts/0/scale: no JSON value (got \"NaN\"); numbers are finite", "NaN"},
	{"infinity", withLaw(`"scale":-Infinity`), `/parts/0/scale: no JSON number (got "-Infinity")`, "-Inf"},
	{"overflow", withLaw(`"scale":1e400`), "/parts/0/scale: number out of range (1e400)", "1e400"},
	{"overflow without exponent", withLaw(`"scale":1` + strings.Repeat("0", 400)), "/parts/0/scale: number out of range", "10"},
	{"underflow", withLaw(`"scale":1e-400`), "number out of range (1e-400); it would be read as 0", "1e-400"},
	{"leading zero", withLaw(`"scale":01`), `no JSON number (got "01")`, "01"},
	{"plus sign", withLaw(`"scale":+1`), `no JSON value (got "+1")`, "+1"},
	{"bare point", withLaw(`"scale":.5`), `a number starts with a digit`, ".5"},
	{"open point", withLaw(`"scale":1.`), `no JSON number (got "1.")`, "1.}"},
	{"hexadecimal", withLaw(`"scale":0x10`), `no JSON number (got "0x10")`, "0x10"},
	{"open exponent", withLaw(`"scale":1e`), `no JSON number (got "1e")`, "1e}"},
	{"wrong literal", withLaw(`"scale":True`), "no JSON value", "True"},
	{"cut literal", withLaw(`"scale":tru`), "no JSON value", "tru"},

	// The document.
	{"no parts", `{}`, `/parts: parts is missing; add for example "parts": `, "{}"},
	{"empty parts", `{"parts":[]}`, "/parts: parts must be a list of at least one object (part) (got a list of 0)", "[]"},
	{"unknown key", withTop(`"lenght":"mm"`), `/lenght: unknown key "lenght"; did you mean "length"?`, `"lenght"`},
	{"unknown key far from all", withTop(`"zzzzzzzz":1`), "valid here: version, title", `"zzzz`},
	{"null", withTop(`"title":null`), "/title: title must be a text (got null); leave the key out", "null"},
	{"version", withTop(`"version":2`), "/version: version must be 1 (got 2)", "2}"},
	{"version text", withTop(`"version":"1"`), `/version: version must be 1 (got "1")`, `^"1"`},
	{"unit", withTop(`"length":"nm"`), `/length: length must be "m", "cm", "mm" or "um" (got "nm"); did you mean`, `"nm"`},
	{"accuracy too fine", withTop(`"accuracy":1e-14`), "/accuracy: accuracy must be from 1e-13 to 0.1 (got 1e-14)", "1e-14"},
	{"accuracy too coarse", withTop(`"accuracy":0.2`), "/accuracy: accuracy must be from 1e-13 to 0.1 (got 0.2)", "0.2"},
	{"temperature", withTop(`"temperature":-300`), "/temperature: temperature must be ≥ -273.15 (got -300)", "-300"},
	{"applied nothing", withTop(`"applied":{}`), "/applied: applied needs one of E, B", "{}"},
	{"applied H", withTop(`"applied":{"H":[0,0,1]}`), `/applied/H: unknown key "H"`, `"H"`},
	{"plane of glass", withTop(`"planes":[{"kind":"glass","point":[0,0,0],"normal":[0,0,1]}]`), `/planes/0/kind: kind must be "iron", "conductor" or "dielectric"`, `"glass"`},
	{"plane without normal", withTop(`"planes":[{"kind":"iron","point":[0,0,0]}]`), `/planes/0/normal: normal is missing`, `{"kind"`},
	{"dielectric plane", withTop(`"planes":[{"kind":"dielectric","point":[0,0,0],"normal":[0,0,1]}]`), `/planes/0: a dielectric plane without permittivity`, `{"kind"`},
	{"iron with permittivity", withTop(`"planes":[{"kind":"iron","point":[0,0,0],"normal":[0,0,1],"permittivity":2}]`), `permittivity on a plane of kind iron`, `"permittivity"`},

	// Parts.
	{"part no object", withPart(`1`), "/parts/0: parts[0] must be an object (got 1)", "1"},
	{"no name", withPart(`{"shape":"sphere","radius":1}`), "/parts/0/name: name is missing", `{"shape`},
	{"empty name", withPart(`{"name":" ","shape":"sphere","radius":1}`), "/parts/0/name: name must not be empty", `" "`},
	{"name of two lines", withPart(`{"name":"a\nb","shape":"sphere","radius":1}`), "must not contain control characters", `"a\nb"`},
	{"same name", withPart(ball + "," + ball), `/parts/1/name: name "a" is already that of a body of /parts/0`, `^"a"`},
	{"same name as a copy", withPart(`{"name":"a 2","shape":"sphere","radius":1},{"name":"a","shape":"sphere","radius":1,"copies":{"count":3,"step":[3,0,0]}}`),
		`/parts/1/name: name "a 2" is already that of a body of /parts/0`, `"a",`},
	{"no shape", withPart(`{"name":"a"}`), "/parts/0/shape: shape is missing; add one of box", `{"name`},
	{"shape no text", withPart(`{"name":"a","shape":3}`), "/parts/0/shape: shape must be a text (got 3)", "3"},
	{"unknown shape", withShape(`"shape":"cilinder"`), `/parts/0/shape: unknown shape "cilinder"; did you mean "cylinder"?`, `"cilinder"`},
	{"arc without angles", withArc(``), "/parts/0: parts[0] needs one of from, from_rad", `{"name`},
	{"arc without an end", withArc(`,"from":0`), "/parts/0/from: from without to", `"from"`},
	{"arc of two units", withArc(`,"from":0,"to_rad":1`), "/parts/0/from: from without to", `"from"`},
	{"arc of both units", withArc(`,"from":0,"to":90,"from_rad":0,"to_rad":1`), "/parts/0/from_rad: from and from_rad exclude each other", `"from_rad"`},
	{"arc reversed", withArc(`,"from":90,"to":-90`), "/parts/0/from: from must be less than to (got 90 and -90)", "90,\"to"},
	{"arc without width", withArc(`,"from_rad":1,"to_rad":1`), "/parts/0/from_rad: from_rad must be less than to_rad", "1,\"to_rad"},
	{"arc beyond a turn", withArc(`,"from":-90,"to":271`), "/parts/0/to: the arc is more than one turn (from -90 to 271); give an end of at most the start plus 360", "271"},
	{"arc beyond a turn in radians", withArc(`,"from_rad":0,"to_rad":6.3`), "/parts/0/to_rad: the arc is more than one turn", "6.3"},
	{"arc inverted", withShape(`"shape":"arc","inner":2,"outer":1,"height":1,"from":0,"to":90`), "/parts/0/inner: inner must be less than outer (got 2 and 1)", "2,"},
	{"arc with a negative bore", withShape(`"shape":"arc","inner":-1,"outer":1,"height":1,"from":0,"to":90`), "/parts/0/inner: inner must be ≥ 0 (got -1)", "-1"},
	{"cone of two tips", withShape(`"shape":"cone","bottom":0,"top":0,"height":1`), "/parts/0/top: bottom and top must not both be 0; give one end a radius", "0,\"height"},
	{"cone negative", withShape(`"shape":"cone","bottom":1,"top":-1,"height":1`), "/parts/0/top: top must be ≥ 0 (got -1)", "-1"},
	{"torus without a hole", withShape(`"shape":"torus","major":1,"minor":1`), "/parts/0/minor: minor must be less than major (got 1 and 1)", "^1,\"magnet"},
	{"mesh", withShape(`"shape":"mesh","file":"a.stl"`), `shape "mesh" is not supported yet`, `"mesh"`},
	{"missing dimension", withShape(`"shape":"cylinder","radius":1`), `/parts/0/height: height is missing; add for example "height": 4`, `{"name`},
	{"foreign dimension", withShape(`"shape":"sphere","radius":1,"height":2`), `/parts/0/height: key "height" does not belong to part sphere; its own keys are radius`, `"height"`},
	{"negative radius", withShape("\n \"shape\":\"sphere\",\n\t\"radius\":-2"), "scene.json:3:11: /parts/0/radius: radius must be > 0 (got -2); give a positive length", "-2"},
	{"zero height", withShape(`"shape":"cylinder","radius":1,"height":0`), "/parts/0/height: height must be > 0 (got 0)", "0,"},
	{"radius text", withShape(`"shape":"sphere","radius":"1"`), `/parts/0/radius: radius must be a number > 0 (got "1"); for example "radius": 3`, `"1"`},
	{"box of two", withShape(`"shape":"box","size":[1,2]`), "/parts/0/size: size must be three numbers > 0 (got a list of 2)", "[1,2]"},
	{"box negative", withShape(`"shape":"box","size":[1,-2,3]`), "/parts/0/size/1: size[1] must be > 0 (got -2)", "-2"},
	{"tube inverted", withShape(`"shape":"tube","inner":2,"outer":1,"height":1`), "/parts/0/inner: inner must be less than outer (got 2 and 1)", "2,"},
	{"shell without wall", withShape(`"shape":"hollow_sphere","inner":2,"outer":2`), "/parts/0/inner: inner must be less than outer (got 2 and 2)", "2,"},
	{"prism base short", withShape(`"shape":"prism","height":1,"base":[[0,0],[1,0]]`), "/parts/0/base: base must be a list of at least three points [x, y] (got a list of 2)", "[[0,0]"},
	{"prism base point", withShape(`"shape":"prism","height":1,"base":[[0,0],[1,0],[0,1,0]]`), "/parts/0/base/2: base[2] must be two numbers (got a list of 3)", "[0,1,0]"},
	{"prism slope", withShape(`"shape":"prism","height":1,"base":[[0,0],[1,0],[0,1]],"top_slope":[1]`), "/parts/0/top_slope: top_slope must be two numbers", "[1]"},
	{"prism ends meet", withShape(`"shape":"prism","height":1,"base":[[0,0],[1,0],[0,1]],"top_slope":[-1,0]`), "/parts/0/top_slope: the ends of the prism meet: its height at base point 1 is 0", "[-1,0]"},
	{"polyhedron index", withShape(`"shape":"polyhedron","vertices":[[0,0,0],[1,0,0],[0,1,0],[0,0,1]],"faces":[[0,2,1],[0,1,3],[1,2,3],[0,3,4]]`),
		"/parts/0/faces/3/2: vertex 4 does not exist; vertices are counted from 0 to 3", "4]"},
	{"polyhedron index fraction", withShape(`"shape":"polyhedron","vertices":[[0,0,0],[1,0,0],[0,1,0],[0,0,1]],"faces":[[0,2,1.5],[0,1,3],[1,2,3],[0,3,2]]`),
		"/parts/0/faces/0/2: faces[0][2] must be a whole number", "1.5"},
	{"polyhedron index twice", withShape(`"shape":"polyhedron","vertices":[[0,0,0],[1,0,0],[0,1,0],[0,0,1]],"faces":[[0,2,2],[0,1,3],[1,2,3],[0,3,2]]`),
		"/parts/0/faces/0/2: vertex 2 is named twice in a face", "2],[0,1"},
	{"polyhedron open", withShape(`"shape":"polyhedron","vertices":[[0,0,0],[1,0,0],[0,1,0],[0,0,1]],"faces":[[0,2,1]]`), "faces must be a list of at least four lists", "[[0,2"},
	{"centre", withLaw(`"centre":[0,0]`), "/parts/0/centre: centre must be three numbers (got a list of 2)", "[0,0]"},
	{"centre text", withLaw(`"centre":[0,"0",0]`), `/parts/0/centre/1: centre[1] must be a number (got "0")`, `"0"`},
	{"zero axis", withLaw(`"rotations":[{"axis":[0,0,0],"degrees":90}]`), "/parts/0/rotations/0/axis: axis must not be the zero vector", "[0,0,0]"},
	{"rotation without angle", withLaw(`"rotations":[{"axis":[0,0,1]}]`), "/parts/0/rotations/0/degrees: degrees is missing", `{"axis`},
	{"rotations and frame", withLaw(`"rotations":[],"frame":{"z":[0,0,1]}`), "/parts/0/frame: rotations and frame exclude each other", `"frame"`},
	{"frame parallel", withLaw(`"frame":{"z":[1,2,3],"x":[0.1,0.2,0.3]}`), "/parts/0/frame/x: x is parallel to z", "[0.1"},
	{"frame zero", withLaw(`"frame":{"z":[0,0,0]}`), "/parts/0/frame/z: z must not be the zero vector", "[0,0,0]"},
	{"no copies", withLaw(`"copies":{"count":0}`), "/parts/0/copies/count: count must be from 1 to 100000 (got 0)", "0}"},
	{"copies fraction", withLaw(`"copies":{"count":1.5}`), "/parts/0/copies/count: count must be a whole number from 1 to 100000 (got 1.5)", "1.5"},
	{"too many copies", withPart(`{"name":"a","shape":"sphere","radius":1,"copies":{"count":100000}},{"name":"b","shape":"sphere","radius":1}`),
		"/parts/1: more than 100000 bodies", `{"name":"b"`},
	{"circulating", withLaw(`"circulating":1`), `/parts/0/circulating: circulating is for cylinders, not for a sphere`, `"circ`},
	{"circulating and magnetized", withShape(`"shape":"cylinder","radius":1,"height":1,"circulating":1`), `circulating and magnetized exclude each other`, `"magnetized"`},
	{"permittivity below 0", withLaw(`"permittivity":-2`), `/parts/0/permittivity: permittivity must be ≥ 0`, `-2`},
	{"permeability in words", withLaw(`"permeability":"much"`), `permeability must be a number ≥ 0 or "infinite"`, `"much"`},
	{"permittivity of a sheet", withBare(`"shape":"disc","radius":1,"charged":{"density":1},"permittivity":2`), `a disc has no permittivity`, `"permittivity"`},
	{"permittivity of a magnet", withLaw(`"magnetized":{"uniform":[0,0,1]},"permittivity":2`), `permittivity beside what is of the other kind`, `"permittivity"`},
	{"both responses", withLaw(`"permeability":3,"permittivity":2`), `beside what is of the other kind`, `"permittivity"`},
	{"curve", withLaw(`"curve":"a.csv"`), `/parts/0/curve: key "curve" is not supported yet`, `"curve"`},

	// What parts carry.
	{"two carriers", withLaw(`"magnetized":{"uniform":[0,0,1]},"polarized":{"uniform":[0,0,1]}`), "/parts/0/polarized: magnetized and polarized exclude each other", `"polarized"`},
	{"no law", withLaw(`"polarized":{}`), "/parts/0/polarized: polarized needs one of uniform, moment", "{}"},
	{"two laws", withLaw(`"magnetized":{"uniform":[0,0,1],"remanence":[0,0,1]}`), "/parts/0/magnetized/remanence: uniform and remanence exclude each other", `"rem`},
	{"electric remanence", withLaw(`"polarized":{"remanence":[0,0,1]}`), `/parts/0/polarized/remanence: unknown key "remanence"`, `"rem`},
	{"polynomial without terms", withLaw(`"polarized":{"polynomial":[]}`), "/parts/0/polarized/polynomial: polynomial must be a list of at least one object (term)", "[]"},
	{"polynomial component", withLaw(`"polarized":{"polynomial":[{"component":"r","coefficient":1,"powers":[0,0,1]}]}`), `/parts/0/polarized/polynomial/0/component: component must be "x", "y" or "z" (got "r")`, `"r"`},
	{"polynomial without powers", withLaw(`"polarized":{"polynomial":[{"component":"x","coefficient":1}]}`), "/parts/0/polarized/polynomial/0/powers: powers is missing", `{"component`},
	{"polynomial negative power", withLaw(`"polarized":{"polynomial":[{"component":"x","coefficient":1,"powers":[0,-1,0]}]}`), "/parts/0/polarized/polynomial/0/powers/1: powers[1] must be from 0 to 64 (got -1)", "-1"},
	{"polynomial fraction", withLaw(`"polarized":{"polynomial":[{"component":"x","coefficient":1,"powers":[0,0.5,0]}]}`), "polynomial/0/powers/1: powers[1] must be a whole number", "0.5"},
	{"polynomial two powers", withLaw(`"polarized":{"polynomial":[{"component":"x","coefficient":1,"powers":[0,1]}]}`), "polynomial/0/powers: powers must be three whole numbers", "[0,1]"},
	{"axial power empty", withLaw(`"polarized":{"axial_power":{}}`), "/parts/0/polarized/axial_power/coefficient: coefficient is missing", "{}"},
	{"axial power negative", withLaw(`"polarized":{"axial_power":{"coefficient":1,"power":-1}}`), "/parts/0/polarized/axial_power/power: power must be from 0 to 64 (got -1)", "-1"},
	{"axial power fraction", withLaw(`"polarized":{"axial_power":{"coefficient":1,"power":1.5}}`), "/parts/0/polarized/axial_power/power: power must be a whole number", "1.5"},
	{"radial power no number", withLaw(`"magnetized":{"radial_power":{"coefficient":1,"power":"2"}}`), "/parts/0/magnetized/radial_power/power: power must be a number from -64 to 64", `"2"`},
	{"central power beyond reason", withLaw(`"magnetized":{"central_power":{"coefficient":1,"power":100}}`), "/parts/0/magnetized/central_power/power: power must be from -64 to 64 (got 100)", "100"},
	{"two powers", withLaw(`"magnetized":{"central_power":{"coefficient":1,"power":1},"radial_power":{"coefficient":1,"power":1}}`), "/parts/0/magnetized/radial_power: central_power and radial_power exclude each other", `"radial`},
	{"grade", withLaw(`"magnetized":{"grade":{}}`), `/parts/0/magnetized/grade: grade must be a file name`, `{}}`},
	{"grade without direction", withLaw(`"magnetized":{"grade":"grade.json"}`), `grade without along; add it`, `"grade":"grade.json"`},
	{"direction without grade", withLaw(`"magnetized":{"uniform":[0,0,1],"along":[0,0,1]}`), `along without grade; add it`, `"along"`},
	{"grade that is not there", withLaw(`"magnetized":{"grade":"none.json","along":[0,0,1]}`), `none.json cannot be read`, `"none.json"`},
	{"grade that is wrong", withLaw(`"magnetized":{"grade":"wrong.json","along":[0,0,1]}`), `wrong.json: name is missing or empty; say what the material is called`, `"wrong.json"`},
	{"polarized by grade", withLaw(`"polarized":{"grade":"grade.json","along":[0,0,1]}`), `unknown key "grade"`, `"grade"`},
	{"affine without gradient", withLaw(`"polarized":{"affine":{"value":[0,0,1]}}`), "/parts/0/polarized/affine/gradient: gradient is missing", `{"value`},
	{"affine gradient shape", withLaw(`"polarized":{"affine":{"value":[0,0,1],"gradient":[[0,0,0],[0,0,0]]}}`), "gradient must be three vectors [x, y, z] (got a list of 2)", "[[0,0,0]"},
	{"affine gradient row", withLaw(`"polarized":{"affine":{"value":[0,0,1],"gradient":[[0,0,0],[0,0,0],[1,2]]}}`), "/parts/0/polarized/affine/gradient/2: gradient[2] must be three numbers", "[1,2]"},
	{"charged body", withLaw(`"charged":{"density":1}`), "/parts/0/charged: a sphere is a body and cannot be charged", `"charged"`},
	{"polarized sheet", withPart(`{"name":"a","shape":"disc","radius":1,"polarized":{"uniform":[0,0,1]}}`), "/parts/0/polarized: a disc is a sheet and cannot be polarized", `"polarized"`},
	{"charge of a sheet", withPart(`{"name":"a","shape":"disc","radius":1,"charged":{"charge":1}}`), "/parts/0/charged: charge is for points, not for a disc", `{"charge"`},
	{"gradient of a point", withPart(`{"name":"a","shape":"point","charged":{"charge":1,"gradient":[1,0,0]}}`), "/parts/0/charged/gradient: gradient without density", `"gradient"`},
	{"moment of a body", withLaw(`"magnetized":{"moment":[0,0,1]}`), "/parts/0/magnetized: moment is for points, not for a sphere", `{"moment"`},
	{"uniform point", withPart(`{"name":"a","shape":"point","polarized":{"uniform":[0,0,1]}}`), "/parts/0/polarized: a point is polarized by moment", `{"uniform"`},
	{"bare point", withPart(`{"name":"a","shape":"point"}`), "/parts/0: a point that carries nothing", `{"name`},
	{"size of a point", withPart(`{"name":"a","shape":"point","radius":1}`), `/parts/0/radius: key "radius" does not belong to part point; it has no keys of its own`, `"radius"`},

	// Requests.
	{"empty request", withRequest(`{}`), "/wanted/0: wanted[0] asks for nothing; add one of charges", "{}"},
	{"two requests in one", withRequest(`{"charges":true,"points":[[0,0,0]]}`), "/wanted/0/points: a request with both charges and points", `"points"`},
	{"misspelt request", withRequest(`{"point":[[0,0,0]]}`), `/wanted/0/point: unknown key "point"; did you mean "points"?`, `"point"`},
	{"charges false", withRequest(`{"charges":false}`), "/wanted/0/charges: charges must be true (got false)", "false"},
	{"no points", withRequest(`{"points":[]}`), "/wanted/0/points: points must be a list of at least one vector [x, y, z]", "^[]"},
	{"short point", withRequest(`{"points":[[0,0,0],[1,2]]}`), "/wanted/0/points/1: points[1] must be three numbers (got a list of 2)", "[1,2]"},
	{"side", withRequest(`{"points":[[0,0,0]],"side":"outer"}`), `/wanted/0/side: side must be "mean", "inside" or "outside" (got "outer")`, `"outer"`},
	{"by_part", withRequest(`{"points":[[0,0,0]],"by_part":1}`), "/wanted/0/by_part: by_part must be true or false (got 1)", "1}]"},
	{"gradient", withRequest(`{"points":[[0,0,0]],"gradient":"B"}`), `/wanted/0/gradient: gradient must be true or false (got "B")`, `"B"`},
	{"gradient on a line", withLine(`"gradient":true`), `/wanted/0/gradient: key "gradient" does not belong to request line`, `"gradient"`},
	{"foreign option", withRequest(`{"charges":true,"csv":"a.csv"}`), `/wanted/0/csv: key "csv" does not belong to request charges`, `"csv"`},
	{"line without points", withRequest(`{"line":{"from":[0,0,0],"to":[0,0,1],"count":0}}`), "/wanted/0/line/count: count must be from 1 to 10000000 (got 0)", "0}"},
	{"line too long", withRequest(`{"line":{"from":[-1.7e308,0,0],"to":[1.7e308,0,0],"count":3}}`), "/wanted/0/line/to: the line is too long", "[1.7e308"},
	{"plane counts", withRequest(`{"plane":{"corner":[0,0,0],"edge1":[1,0,0],"edge2":[0,1,0],"counts":[2]}}`), "/wanted/0/plane/counts: counts must be two whole numbers (got a list of 1)", "[2]"},
	{"plane parallel", withRequest(`{"plane":{"corner":[0,0,0],"edge1":[1,0,0],"edge2":[-2,0,0],"counts":[2,2]}}`), "/wanted/0/plane/edge2: edge2 is parallel to edge1", "[-2,0,0]"},
	{"grid inverted", withRequest(`{"grid":{"min":[0,0,0],"max":[1,-1,1],"counts":[2,2,2]}}`), "/wanted/0/grid/max/1: max must be above min in y (got -1 and 0)", "-1"},
	{"grid flat", withRequest(`{"grid":{"min":[0,0,0],"max":[1,1,0],"counts":[2,2,2]}}`), "/wanted/0/grid/max/2: max must be above min in z", "0],\"counts"},
	{"too many points", withRequest(`{"grid":{"min":[0,0,0],"max":[1,1,1],"counts":[10000000,10000000,10000000]}}`), "/wanted/0/grid: more than 10000000 points in all", `{"min`},
	{"points beyond int64", withRequest(`{"grid":{"min":[0,0,0],"max":[1,1,1],"counts":[4194304,4194304,1048576]}}`), "/wanted/0/grid: more than 10000000 points in all", `{"min`},
	{"too many points in all", withRequest(`{"line":{"from":[0,0,0],"to":[1,1,1],"count":10000000}},{"points":[[0,0,0]]}`), "/wanted/1/points: more than 10000000 points in all", "[[0,0,0]]"},
	{"reading of nothing", withRequest(`{"reading":{}}`), `/wanted/0/reading/at: at is missing`, `{}}`},
	{"reading without area", withRequest(`{"reading":{"at":[0,0,0],"normal":[0,0,1]}}`), `reading needs one of disc, rectangle`, `{"at"`},
	{"reading without width", withRequest(`{"reading":{"at":[0,0,0],"normal":[0,0,1],"rectangle":[1,1]}}`), `rectangle without along`, `"rectangle"`},
	{"reading along its normal", withRequest(`{"reading":{"at":[0,0,0],"normal":[0,0,1],"rectangle":[1,1],"along":[0,0,2]}}`), `along is parallel to normal`, `[0,0,2]`},
	{"linkage", withRequest(`{"linkage":{}}`), `linkage needs one of circle, polygon`, `{}}`},
	{"linkage of a line", withRequest(`{"linkage":{"polygon":[[0,0,0],[1,0,0],[2,0,0]]}}`), `the coil encloses no area`, `[[0`},
	{"linkage of nothing", `{"parts":[{"name":"a","shape":"sphere","radius":1,"polarized":{"uniform":[0,0,1]}}],"wanted":[{"linkage":{"polygon":[[0,0,0],[1,0,0],[2,1,0]]}}]}`, `no part is magnetized or circulating`, `{"polygon"`},
	{"force", withRequest(`{"force":{"on":"b"}}`), `/wanted/0/force/on: no part is called "b"`, `"b"`},
	{"energy", withRequest(`{"energy":["a","b"]}`), `/wanted/0/energy/1: no part is called "b"`, `"b"`},
	{"energy of one", withRequest(`{"energy":["a","a"]}`), `the energy of a part with itself is no interaction`, `["a","a"]`},
	{"reach", withRequest(`{"reach":{"flux_density":0}}`), `flux_density must be > 0`, `0}}`},
	{"travel", withRequest(`{"travel":{}}`), `/wanted/0/travel/part: part is missing`, `{}}`},
	{"travel in travel", withRequest(`{"travel":{"part":"a","shift":[0,0,1],"count":2,"ask":[{"travel":{"part":"a","shift":[0,0,1],"count":2,"ask":[{"charges":true}]}}]}}`), `a travel within a travel`, `{"travel":{"part":"a","shift":[0,0,1],"count":2,"ask":[{"charges"`},
	{"travel far and wide", withRequest(`{"travel":{"part":"a","shift":[0,0,1],"count":100000,"ask":[{"line":{"from":[0,0,0],"to":[1,0,0],"count":1000}}]}}`), `/wanted/0/travel/ask/0/line: more than 10000000 points`, `{"from"`},
	{"travel nowhere", withRequest(`{"travel":{"part":"a","count":2,"ask":[{"charges":true}]}}`), `travel needs one of shift, rotation`, `{"part":"a"`},
	{"travel with a file", withRequest(`{"travel":{"part":"a","shift":[0,0,1],"count":2,"ask":[{"hand_over":"a.json"}]}}`), `a file of one position`, `{"hand_over"`},
	{"hand_over", withRequest(`{"hand_over":"a.txt"}`), `hand_over writes .json or .csv (got "a.txt")`, `"a.txt"`},
	{"hand_over of strangers", withRequest(`{"hand_over":"a.json","kind":"electric"}`), `no part is polarized or charged`, `"a.json"`},
	{"hand_over of both", `{"parts":[{"name":"a","shape":"sphere","radius":1,"polarized":{"uniform":[0,0,1]}},{"name":"b","shape":"sphere","radius":1,"magnetized":{"uniform":[0,0,1]}}],"wanted":[{"hand_over":"a.json"}]}`, `the scene has electric and magnetic charges`, `"a.json"`},

	// Names of files.
	{"output in a folder", withLine(`"csv":"a/b.csv"`), `/wanted/0/csv: csv must not contain / or \ (got "a/b.csv")`, `"a/b.csv"`},
	{"output backslash", withLine(`"csv":"a\\b.csv"`), "must not contain / or", `"a\\b.csv"`},
	{"output parent", withLine(`"csv":".."`), "must not start with a dot", `".."`},
	{"output hidden", withLine(`"csv":".a.csv"`), "must not start with a dot", `".a.csv"`},
	{"output empty", withLine(`"csv":""`), "must not be empty", `""`},
	{"output of the results", withLine(`"csv":"Results.JSON"`), "is taken by the results themselves", `"Results.JSON"`},
	{"output device", withLine(`"csv":"con.csv"`), "is a device name on Windows", `"con.csv"`},
	{"output colon", withLine(`"csv":"a:b"`), "must not contain control characters or any of", `"a:b"`},
	{"output end", withLine(`"csv":"a."`), "end with a space or a dot", `"a."`},
	{"output twice", withLine(`"csv":"a.csv","plot":"A.csv"`), "/wanted/0/plot: plot is already the name of the output at /wanted/0/csv", `"A.csv"`},
	{"output number", withLine(`"csv":1`), "/wanted/0/csv: csv must be a file name (got 1)", "1}"},
	{"input absolute", withRequest(`{"points_file":"/etc/points.csv"}`), "/wanted/0/points_file: points_file must not be an absolute path", `"/etc`},
	{"input drive", withRequest(`{"points_file":"C:points.csv"}`), "must not be an absolute path", `"C:`},
	{"input parent", withRequest(`{"points_file":"a/../../points.csv"}`), "must not leave the scene's folder", `"a/..`},
	{"input backslash", withRequest(`{"points_file":"a\\b.csv"}`), "must not contain backslashes", `"a\\b`},
	{"input dot", withRequest(`{"points_file":"./a.csv"}`), "is not a plain relative path", `"./a`},
	{"input absent", withRequest(`{"points_file":"none.csv"}`), "/wanted/0/points_file: none.csv cannot be read", `"none`},
	{"input folder", withRequest(`{"points_file":"folder"}`), "folder is not a regular file", `"folder`},
	{"input wrong", withRequest(`{"points_file":"wrong.csv"}`), `/wanted/0/points_file: wrong.csv:3: y is not a finite decimal number (got "b")`, `"wrong`},

	// Hand checks.
	{"hand empty", withRequest(`{"charges":true,"hand":[]}`), "/wanted/0/hand: hand must be a list of at least one object (hand)", "^[]"},
	{"hand incomplete", withHand(`"points":[[0,0,0]]`, `{"quantity":"B.z","value":1}`), "/wanted/0/hand/0/within: within is missing", `{"quant`},
	{"hand quantity", withHand(`"points":[[0,0,0]]`, `{"quantity":"Bz","value":1,"within":1}`), `/wanted/0/hand/0/quantity: unknown quantity "Bz"; did you mean`, `"Bz"`},
	{"hand component", withHand(`"points":[[0,0,0]]`, `{"quantity":"B.w","value":1,"within":1}`), `unknown quantity "B.w"; write B, B.x, B.y, B.z, |B|`, `"B.w"`},
	{"hand scalar component", withHand(`"points":[[0,0,0]]`, `{"quantity":"Vm.x","value":1,"within":1}`), `unknown quantity "Vm.x"; write Vm`, `"Vm.x"`},
	{"hand vector value", withHand(`"points":[[0,0,0]]`, `{"quantity":"H","value":1,"within":1}`), "/wanted/0/hand/0/value: value of H must be three numbers (got 1)", "1,\"within"},
	{"hand scalar value", withHand(`"points":[[0,0,0]]`, `{"quantity":"|H|","value":[1,2,3],"within":1}`), "value of |H| must be a number (got a list of 3)", "[1,2,3]"},
	{"hand at", withHand(`"points":[[0,0,0]]`, `{"quantity":"B.z","at":1,"value":1,"within":1}`), "/wanted/0/hand/0/at: at must be a number of a point, from 0 to 0 (got 1)", "1,\"value"},
	{"hand negative at", withHand(`"points":[[0,0,0]]`, `{"quantity":"B.z","at":-1,"value":1,"within":1}`), "/wanted/0/hand/0/at: at must be from 0", "-1"},
	{"hand within", withHand(`"points":[[0,0,0]]`, `{"quantity":"B.z","value":1,"within":-1}`), "/wanted/0/hand/0/within: within must be ≥ 0 (got -1)", "-1"},
	{"hand other kind", withHand(`"points":[[0,0,0]]`, `{"quantity":"E.z","value":1,"within":1}`), "nothing in the scene yields E.z", `"E.z"`},
	{"hand part", withHand(`"charges":true`, `{"quantity":"b/total_charge","value":1,"within":1}`), `no part is called "b"; `, `"b/`},
	{"hand face", withHand(`"charges":true`, `{"quantity":"a/top/charge","value":1,"within":1}`), `a sphere has no face "top"; its faces are: surface`, `"a/`},
	{"hand face of a full turn", withHandOn(`"shape":"arc","inner":1,"outer":2,"height":1,"from":-180,"to":180`, "to"), `an arc has no face "to"; its faces are: bottom, top, inner, outer`, `"b/`},
	{"hand face of a wedge", withHandOn(`"shape":"arc","inner":0,"outer":2,"height":1,"from":0,"to":180`, "inner"), `has no face "inner"; its faces are: bottom, top, outer, from, to`, `"b/`},
	{"hand face of a tip", withHandOn(`"shape":"cone","bottom":1,"top":0,"height":1`, "top"), `a cone has no face "top"; its faces are: bottom, wall`, `"b/`},
	{"hand without part", withHand(`"charges":true`, `{"quantity":"charge","value":1,"within":1}`), `quantity "charge" does not say of which face; write PART/FACE/charge`, `"charge",`},
	{"hand range", withHand(`"charges":true`, `{"quantity":"a/surface/density","value":1,"within":1}`), `write PART/FACE/density.min, PART/FACE/density.max`, `"a/`},
	{"hand at of charges", withHand(`"charges":true`, `{"quantity":"a/volume","at":1,"value":1,"within":1}`), "/wanted/0/hand/0/at: at is for requests at points", "1,\"value"},
}

// withLine returns a scene that asks for a line with further options.
func withLine(options string) string {
	return withRequest(`{"line":{"from":[0,0,0],"to":[0,0,1],"count":2},` + options + `}`)
}

// manyKeys returns an object with more keys than any object may have.
func manyKeys() string {
	var b strings.Builder
	for i := range 80 {
		fmt.Fprintf(&b, `,"k%d":0`, i)
	}
	return "{" + b.String()[1:] + "}"
}

// folder holds the input files of the tests.
var folder = fstest.MapFS{
	"good.csv":     {Data: []byte("x,y,z\n1,2,3\n")},
	"wrong.csv":    {Data: []byte("# three\n1,2,3\n1,b,3\n")},
	"wrong.json":   {Data: []byte(`{"format":"boundpole magnet grade","version":1}`)},
	"folder/a.csv": {Data: []byte("1,2,3\n")},
}

func TestBadScenes(t *testing.T) {
	if len(badScenes) < 45 {
		t.Fatalf("only %d bad scenes", len(badScenes))
	}
	for _, c := range badScenes {
		t.Run(c.name, func(t *testing.T) {
			s, err := Parse("scene.json", []byte(c.scene), folder)
			if err == nil || s != nil {
				t.Fatalf("Parse(%.200s) = %v, %v; want an error with %q", c.scene, s, err, c.want)
			}
			if text := err.Error(); !strings.Contains(text, c.want) || strings.ContainsAny(text, "\n\r\t") || len(text) > 800 {
				t.Errorf("Parse(%.200s)\n got %s\nwant one line with %s", c.scene, text, c.want)
			}
			var e *Error
			if !errors.As(err, &e) {
				t.Fatalf("error is a %T, want *Error", err)
			}
			if e.Remedy == "" {
				t.Errorf("no remedy in %v", err)
			}
			if c.at == "" {
				return
			}
			off := strings.Index(c.scene, c.at)
			if last, ok := strings.CutPrefix(c.at, "^"); ok {
				off = strings.LastIndex(c.scene, last)
			}
			doc := document{src: []byte(c.scene)}
			if line, column := doc.position(off); e.Line != line || e.Column != column {
				t.Errorf("Parse(%.200s)\n got %d:%d in %v\nwant %d:%d, that of %s", c.scene, e.Line, e.Column, err, line, column, c.at)
			}
		})
	}
}
