package scenefile

import (
	"bytes"
	"strconv"
	"strings"
	"unicode/utf8"
)

// A document is a parsed JSON text. Its nodes stand in the order of the text,
// each container before its children; the keys of an object are nodes too, each
// before its value. The kind of a node is told by its first byte.
type document struct {
	file  string
	src   []byte
	nodes []node
}

// A node is one JSON value or key: where it starts, and the number of the node
// that follows it and everything in it (0 while it is being read).
type node struct{ off, next uint32 }

// kind returns the first byte of node n: { [ " t f n, or one of a number.
func (d *document) kind(n uint32) byte { return d.src[d.nodes[n].off] }

// isNumber reports whether node n is a number.
func (d *document) isNumber(n uint32) bool {
	c := d.kind(n)
	return c == '-' || '0' <= c && c <= '9'
}

// number returns the value of a number node.
func (d *document) number(n uint32) float64 {
	start := int(d.nodes[n].off)
	end := start
	for end < len(d.src) && numberByte(d.src[end]) {
		end++
	}
	v, _ := strconv.ParseFloat(string(d.src[start:end]), 64) // grammar and range were checked on reading
	return v
}

// numberByte reports whether c may stand inside a JSON number.
func numberByte(c byte) bool {
	return '0' <= c && c <= '9' || c == '.' || c == '-' || c == '+' || c == 'e' || c == 'E'
}

// text returns the value of a string node or key.
func (d *document) text(n uint32) string {
	return string(unquote(d.src[d.nodes[n].off:]))
}

// children calls visit for the elements of array n, or for the keys and values
// of object n, until visit returns an error.
func (d *document) children(n uint32, visit func(key, value uint32) error) error {
	object := d.kind(n) == '{'
	for c := n + 1; c < d.nodes[n].next; {
		key := c
		if object {
			c++
		}
		if err := visit(key, c); err != nil {
			return err
		}
		c = d.nodes[c].next
	}
	return nil
}

// count returns the number of elements of array n.
func (d *document) count(n uint32) int {
	k := 0
	for c := n + 1; c < d.nodes[n].next; c = d.nodes[c].next {
		k++
	}
	return k
}

// member returns the value of a key of object n.
func (d *document) member(n uint32, key string) (value uint32, ok bool) {
	for c := n + 1; c < d.nodes[n].next; c = d.nodes[c+1].next {
		if d.text(c) == key {
			return c + 1, true
		}
	}
	return 0, false
}

// quoted returns the text of node n as it stands in the file, shortened.
func (d *document) quoted(n uint32) string {
	switch start := d.nodes[n].off; d.kind(n) {
	case '{':
		return "an object"
	case '[':
		return "a list of " + strconv.Itoa(d.count(n))
	case '"':
		return strconv.Quote(shorten(d.text(n)))
	default:
		end := start
		for int(end) < len(d.src) && (numberByte(d.src[end]) || 'a' <= d.src[end] && d.src[end] <= 'z') {
			end++
		}
		return shorten(string(d.src[start:end]))
	}
}

// position returns line and column (in characters) of a byte offset. A line ends
// with LF, CRLF or CR.
func (d *document) position(off int) (line, column int) {
	before := d.src[:min(off, len(d.src))]
	line = 1 + bytes.Count(before, []byte{'\n'})
	start := bytes.LastIndexByte(before, '\n') + 1
	if bytes.IndexByte(before, '\r') >= 0 {
		for i, c := range before {
			if c == '\r' && (i+1 == len(d.src) || d.src[i+1] != '\n') {
				line++
				start = max(start, i+1)
			}
		}
	}
	return line, 1 + utf8.RuneCount(before[start:])
}

// pointer returns the JSON Pointer of node n. For a key it is that of its value.
// It works while the document is being read: n may be the node that comes next.
func (d *document) pointer(n uint32) string {
	var b strings.Builder
	for cur := uint32(0); cur < n && int(cur) < len(d.nodes); {
		object := d.kind(cur) == '{'
		found := false
		for c, index := cur+1, 0; !found; index++ {
			value := c
			if object {
				value++
				if c >= n && int(c) >= len(d.nodes) {
					return b.String() // where a key should stand
				}
			}
			open := int(value) >= len(d.nodes) || d.nodes[value].next == 0
			if !open && d.nodes[value].next <= n {
				c = d.nodes[value].next
				continue
			}
			if found = true; object {
				b.WriteString("/" + escapePointer(d.text(c)))
			} else {
				b.WriteString("/" + strconv.Itoa(index))
			}
			cur = max(value, c)
		}
	}
	return b.String()
}

// escapePointer returns a key as it is written in a JSON Pointer.
func escapePointer(key string) string {
	return strings.NewReplacer("~", "~0", "/", "~1").Replace(shorten(key))
}

// find returns the node a JSON Pointer leads to, or the last that exists on the
// way.
func (d *document) find(pointer string) uint32 {
	n := uint32(0)
	if pointer == "" {
		return n
	}
	for token := range strings.SplitSeq(strings.TrimPrefix(pointer, "/"), "/") {
		token = strings.NewReplacer("~1", "/", "~0", "~").Replace(token)
		child, ok := uint32(0), false
		switch d.kind(n) {
		case '{':
			child, ok = d.member(n, token)
		case '[':
			child, ok = d.element(n, token)
		}
		if !ok {
			break
		}
		n = child
	}
	return n
}

// element returns an element of array n by its index, written in decimal.
func (d *document) element(n uint32, index string) (value uint32, ok bool) {
	i, err := strconv.Atoi(index)
	for c := n + 1; err == nil && c < d.nodes[n].next; c = d.nodes[c].next {
		if i == 0 {
			return c, true
		}
		i--
	}
	return 0, false
}

// errorAt returns an Error at a byte offset.
func (d *document) errorAt(off int, pointer, problem, remedy string) *Error {
	line, column := d.position(off)
	return &Error{File: d.file, Line: line, Column: column, Pointer: pointer, Problem: problem, Remedy: remedy}
}

// errorOn returns an Error at a node.
func (d *document) errorOn(n uint32, problem, remedy string) *Error {
	return d.errorAt(int(d.nodes[n].off), d.pointer(n), problem, remedy)
}

// errorMissing returns an Error about a key that object n lacks.
func (d *document) errorMissing(n uint32, key, problem, remedy string) *Error {
	return d.errorAt(int(d.nodes[n].off), d.pointer(n)+"/"+escapePointer(key), problem, remedy)
}
