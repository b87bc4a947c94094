package scenefile

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Limits of a scene file.
const (
	MaxBytes  = 64 << 20 // size of a scene file or an input file
	MaxDepth  = 32       // nesting of objects and lists
	MaxPoints = 10_000_000
	MaxBodies = 100_000 // parts, copies counted: about 1 GB once they are placed
	maxKeys   = 64      // keys of one object; no object of the format has so many
)

// A parser makes a document of a JSON text in one pass.
type parser struct {
	document
	pos   int
	depth int
	keys  [][]byte // of the objects being read, innermost last
}

// parse reads a JSON text (RFC 8259): UTF-8 without byte order mark, one value,
// no repeated keys, every number within the range of float64.
func parse(file string, src []byte) (*document, error) {
	p := parser{document: document{file: file, src: src}}
	if err := p.encoding(); err != nil {
		return nil, err
	}
	// Every node but the first comes after one of these bytes.
	most := 1
	for _, c := range []string{",", ":", "[", "{"} {
		most += bytes.Count(src, []byte(c))
	}
	p.nodes = make([]node, 0, most)
	if err := p.value(); err != nil {
		return nil, err
	}
	if p.space(); p.pos < len(src) {
		return nil, p.errorAt(p.pos, "", fmt.Sprintf("text after the end of the document (%s)", p.here()), "a file holds one JSON value; remove the rest")
	}
	return &p.document, nil
}

// encoding refuses what is not UTF-8 from its first bytes on, with the remedy.
func (p *parser) encoding() error {
	switch {
	case bytes.HasPrefix(p.src, []byte("\xef\xbb\xbf")):
		return p.errorAt(0, "", "the file begins with a byte order mark", "save it as UTF-8 without BOM")
	case bytes.HasPrefix(p.src, []byte("\xff\xfe")), bytes.HasPrefix(p.src, []byte("\xfe\xff")):
		return p.errorAt(0, "", "the file is UTF-16", "save it as UTF-8 without BOM")
	case len(bytes.TrimSpace(p.src)) == 0:
		return p.errorAt(0, "", "the file is empty", `write at least {"parts": [...]}`)
	}
	return nil
}

// fail returns an Error at the place being read.
func (p *parser) fail(problem, remedy string) error {
	return p.errorAt(p.pos, p.pointer(uint32(len(p.nodes))), problem, remedy)
}

// here returns what stands at the place being read, for an error.
func (p *parser) here() string {
	if p.pos >= len(p.src) {
		return "got the end of the file"
	}
	rest := p.src[p.pos:min(p.pos+24, len(p.src))]
	if i := bytes.IndexAny(rest, " \t\r\n,]}"); i > 0 {
		rest = rest[:i]
	}
	return "got " + strconv.Quote(string(bytes.ToValidUTF8(rest, nil)))
}

// space skips white space.
func (p *parser) space() {
	for p.pos < len(p.src) {
		switch p.src[p.pos] {
		case ' ', '\t', '\n', '\r':
			p.pos++
		default:
			return
		}
	}
}

// value reads one value.
func (p *parser) value() error {
	p.space()
	if p.pos >= len(p.src) {
		return p.fail("the file ends where a value should stand", "complete it")
	}
	switch c := p.src[p.pos]; {
	case c == '-' || '0' <= c && c <= '9':
		return p.numeral()
	case c == '{':
		return p.nest('}')
	case c == '[':
		return p.nest(']')
	case c == '"':
		return p.quotedText()
	case c == 't':
		return p.literal("true")
	case c == 'f':
		return p.literal("false")
	case c == 'n':
		return p.literal("null")
	default:
		return p.noValue(c)
	}
}

// noValue explains why no value starts with byte c.
func (p *parser) noValue(c byte) error {
	problem := "no JSON value (" + p.here() + ")"
	switch {
	case c == ']' || c == '}' || c == ',':
		return p.fail("a value is missing before "+strconv.Quote(string(rune(c))), "write it, or remove the comma or colon before")
	case c == '\'':
		return p.fail(problem, `text stands in double quotes "…"`)
	case c == '/' || c == '#':
		return p.fail(problem, "JSON has no comments; remove it")
	case c == '+' || c == '.':
		return p.fail(problem, "a number starts with a digit or -, as in 0.5")
	case c == 'N' || c == 'I' || c == 'i':
		return p.fail(problem, "numbers are finite decimals, texts stand in double quotes")
	}
	return p.fail(problem, "write a number, a text in double quotes, true, false, a list [...] or an object {...}")
}

// nest reads an object or, by its closing bracket, an array; the opening bracket
// stands at the current place.
func (p *parser) nest(closing byte) error {
	if p.depth == MaxDepth {
		return p.fail(fmt.Sprintf("nested deeper than %d", MaxDepth), "a scene needs far less; look for a bracket too many")
	}
	n := p.open()
	p.pos++
	p.depth++
	var err error
	if closing == '}' {
		err = p.object()
	} else {
		err = p.array()
	}
	if err != nil {
		return err
	}
	p.depth--
	p.pos++
	p.nodes[n].next = uint32(len(p.nodes))
	return nil
}

// open appends a node that starts at the current place.
func (p *parser) open() int {
	p.nodes = append(p.nodes, node{off: uint32(p.pos)})
	return len(p.nodes) - 1
}

// leaf appends a node without children that reaches from the current place to
// end, and moves there.
func (p *parser) leaf(end int) {
	n := p.open()
	p.nodes[n].next = uint32(n + 1)
	p.pos = end
}

// array reads elements up to, not including, the closing bracket.
func (p *parser) array() error {
	if p.space(); p.pos < len(p.src) && p.src[p.pos] == ']' {
		return nil
	}
	for {
		if err := p.value(); err != nil {
			return err
		}
		if done, err := p.separator(']'); done || err != nil {
			return err
		}
	}
}

// object reads members up to, not including, the closing brace.
func (p *parser) object() error {
	first := len(p.keys)
	defer func() { p.keys = p.keys[:first] }()
	if p.space(); p.pos < len(p.src) && p.src[p.pos] == '}' {
		return nil
	}
	for {
		if err := p.key(first); err != nil {
			return err
		}
		if err := p.value(); err != nil {
			return err
		}
		if done, err := p.separator('}'); done || err != nil {
			return err
		}
	}
}

// separator reads the comma between two elements or finds the closing bracket.
func (p *parser) separator(closing byte) (done bool, err error) {
	p.space()
	switch {
	case p.pos < len(p.src) && p.src[p.pos] == closing:
		return true, nil
	case p.pos < len(p.src) && p.src[p.pos] == ',':
		p.pos++
		return false, nil
	}
	return false, p.fail(fmt.Sprintf("a comma or %q should stand here (%s)", string(rune(closing)), p.here()), "add it")
}

// key reads a key and its colon; the other keys of the object start at first.
func (p *parser) key(first int) error {
	p.space()
	if p.pos >= len(p.src) || p.src[p.pos] != '"' {
		return p.fail("a key in double quotes should stand here ("+p.here()+")", `write "key": value, and no comma after the last`)
	}
	at := p.pos
	if err := p.quotedText(); err != nil {
		return err
	}
	key := unquote(p.src[at:])
	for _, other := range p.keys[first:] {
		if bytes.Equal(other, key) {
			return p.errorAt(at, p.pointer(uint32(len(p.nodes))), fmt.Sprintf("key %q is repeated", shorten(string(key))), "keep one of them")
		}
	}
	if p.keys = append(p.keys, key); len(p.keys)-first > maxKeys {
		return p.errorAt(at, p.pointer(uint32(len(p.nodes))), fmt.Sprintf("an object with more than %d keys", maxKeys), "no object of a scene has so many")
	}
	if p.space(); p.pos >= len(p.src) || p.src[p.pos] != ':' {
		return p.fail("a colon should stand here ("+p.here()+")", `write "key": value`)
	}
	p.pos++
	return nil
}

// literal reads true, false or null.
func (p *parser) literal(word string) error {
	end := p.pos + len(word)
	if end > len(p.src) || string(p.src[p.pos:end]) != word || end < len(p.src) && wordByte(p.src[end]) {
		return p.fail("no JSON value ("+p.here()+")", "write true, false or null, or a text in double quotes")
	}
	p.leaf(end)
	return nil
}

// wordByte reports whether c would continue a word or number.
func wordByte(c byte) bool {
	return numberByte(c) || c == '_' || 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || c >= utf8.RuneSelf
}

// numeral reads a number: -? (0 | [1-9][0-9]*) (. [0-9]+)? ([eE] [+-]? [0-9]+)?
func (p *parser) numeral() error {
	src, i := p.src, p.pos
	if src[i] == '-' {
		i++
	}
	whole := i
	i = digits(src, i)
	good := i > whole && (src[whole] != '0' || i == whole+1)
	if i < len(src) && src[i] == '.' {
		from := i + 1
		i = digits(src, from)
		good = good && i > from
	}
	exponent := false
	if i < len(src) && (src[i] == 'e' || src[i] == 'E') {
		exponent = true
		if i++; i < len(src) && (src[i] == '+' || src[i] == '-') {
			i++
		}
		from := i
		i = digits(src, from)
		good = good && i > from
	}
	if !good || i < len(src) && wordByte(src[i]) {
		return p.fail("no JSON number ("+p.here()+")", "write digits as in -0.5 or 1e-3: no leading zero, no hexadecimal, a digit before and after the point")
	}
	if exponent || i-p.pos > 300 { // shorter ones lie between 1e-300 and 1e300
		if err := p.inRange(src[p.pos:i]); err != nil {
			return err
		}
	}
	p.leaf(i)
	return nil
}

// inRange refuses a number that a float64 cannot hold.
func (p *parser) inRange(numeral []byte) error {
	v, _ := strconv.ParseFloat(string(numeral), 64)
	if math.IsInf(v, 0) {
		return p.fail(fmt.Sprintf("number out of range (%s)", shorten(string(numeral))), "the largest is 1.7976931348623157e308")
	}
	mantissa, _, _ := strings.Cut(strings.ToLower(string(numeral)), "e")
	if v == 0 && strings.ContainsAny(mantissa, "123456789") {
		return p.fail(fmt.Sprintf("number out of range (%s)", shorten(string(numeral))), "it would be read as 0; the smallest is 4.9406564584124654e-324")
	}
	return nil
}

// digits returns the index of the first byte of src from i on that is no digit.
func digits(src []byte, i int) int {
	for i < len(src) && '0' <= src[i] && src[i] <= '9' {
		i++
	}
	return i
}
