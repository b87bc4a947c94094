// Package scenefile reads scene files: JSON documents that say which bodies
// exist, how they are polarized or magnetized, and what is wanted of them.
//
// One table ([Format]) lists every key of the format. It drives the reader, the
// JSON Schema ([Table.Schema]) and the description for people
// ([Table.Markdown]), so that the three cannot disagree.
//
// Units: lengths stay in the unit of the file ([Scene.Length]); everything else
// is SI, angles are in degrees unless their key says radians. Frames: shapes, polarizations and densities are
// in the frame of their part, everything else is in the frame of the scene.
//
// What is checked: syntax (RFC 8259), types, ranges, counts, names, and every
// rule between keys that needs no geometry. What is not: whether polygons are
// simple, faces planar, surfaces closed, bodies apart. The structs of a [Scene]
// that came without an error may be used without further checks of that kind.
//
// Every error is an [*Error], whose text is one line that names the place, what
// is wrong and what would be right. The package keeps no state; its functions
// may be called concurrently.
package scenefile
