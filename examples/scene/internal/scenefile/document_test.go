package scenefile

import (
	"encoding/json"
	"os"
	"reflect"
	"strings"
	"testing"
)

// tree returns node n as encoding/json decodes it into an any.
func (d *document) tree(n uint32) any {
	switch d.kind(n) {
	case '{':
		obj := map[string]any{}
		_ = d.children(n, func(key, value uint32) error { obj[d.text(key)] = d.tree(value); return nil })
		return obj
	case '[':
		list := []any{}
		_ = d.children(n, func(_, value uint32) error { list = append(list, d.tree(value)); return nil })
		return list
	case '"':
		return d.text(n)
	case 't', 'f':
		return d.kind(n) == 't'
	case 'n':
		return nil
	}
	return d.number(n)
}

// documents are right JSON texts.
var documents = []string{
	`0`, `-0`, ` [ ] `, `{}`, `"é\u00e9\ud83e\uddf2\"\\\/\b\f\n\r\t𝄞\u0000\ufffd"`, `{"\u0061":[true,false,null],"":{"":""}}`,
	"\t{\r\n\"a\" :\n[ 1 , -2.50 , 3e2, 4E-3 , 5.5e+1 ] }\n", `1.7976931348623157e308`, `4.9406564584124654e-324`, `0e999999`, `0.0e-400`,
	`123456789012345678901234567890`, `0.1`, `[[1],[[2]],{"a":{"b":[3]}}]`, strings.Repeat("[", MaxDepth) + strings.Repeat("]", MaxDepth),
	"0." + strings.Repeat("3", 400),
}

func TestDocuments(t *testing.T) {
	for _, text := range documents {
		d, err := parse("a.json", []byte(text))
		if err != nil {
			t.Errorf("parse(%.80s) = %v", text, err)
			continue
		}
		var want any
		if err := json.Unmarshal([]byte(text), &want); err != nil {
			t.Fatal(err)
		}
		if got := d.tree(0); !reflect.DeepEqual(got, want) {
			t.Errorf("parse(%.80s) = %v, want %v", text, got, want)
		}
	}
}

// FuzzDocument checks the parser against encoding/json: what it accepts is JSON
// with the same value.
func FuzzDocument(f *testing.F) {
	for _, text := range append(documents, `{"":1,"a":2}`) {
		f.Add([]byte(text))
	}
	for _, c := range badScenes {
		f.Add([]byte(c.scene[:min(len(c.scene), 500)]))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		d, err := parse("a.json", data)
		if err != nil {
			return
		}
		var want any
		if err := json.Unmarshal(data, &want); err != nil {
			t.Fatalf("parse accepts what is not JSON: %v", err)
		}
		if got := d.tree(0); !reflect.DeepEqual(got, want) {
			t.Fatalf("got %v, want %v", got, want)
		}
		for n := range d.nodes {
			if at := d.find(d.pointer(uint32(n))); len(data) < 1000 && !strings.ContainsAny(string(data), `~/\`) && !strings.Contains(d.pointer(uint32(n)), "…") && at != uint32(n) && at != uint32(n)+1 {
				t.Fatalf("the pointer %s of node %d leads to node %d", d.pointer(uint32(n)), n, at)
			}
		}
	})
}

func TestPositions(t *testing.T) {
	text := "ab\nc\r\nd\re\r\r\n\nµ🧲x"
	d := document{src: []byte(text)}
	for mark, want := range map[string][2]int{"a": {1, 1}, "b": {1, 2}, "c": {2, 1}, "d": {3, 1}, "e": {4, 1}, "µ": {7, 1}, "🧲": {7, 2}, "x": {7, 3}} {
		if line, column := d.position(strings.Index(text, mark)); line != want[0] || column != want[1] {
			t.Errorf("%q at %d:%d, want %d:%d", mark, line, column, want[0], want[1])
		}
	}
}

func TestPointers(t *testing.T) {
	d, err := parse("a.json", []byte(`{"a/b":[0,{"c~d":1,"e":[2,[3]]}],"":4}`))
	if err != nil {
		t.Fatal(err)
	}
	for pointer, want := range map[string]string{"/a~1b/0": "0", "/a~1b/1/c~0d": "1", "/a~1b/1/e/0": "2", "/a~1b/1/e/1/0": "3", "/": "4", "": "an object"} {
		n := d.find(pointer)
		if got := d.quoted(n); got != want {
			t.Errorf("find(%s) = %s, want %s", pointer, got, want)
		}
		if got := d.pointer(n); got != pointer {
			t.Errorf("pointer = %s, want %s", got, pointer)
		}
	}
}

// TestErrorsAreOneLine feeds texts that would break a line or steer a terminal.
func TestErrorsAreOneLine(t *testing.T) {
	for _, scene := range []string{
		"{\"\\u001b[2J\\n\\u2028\\u202e\":1}", withTop(`"length":"a\u0007\nb"`), withLaw("\"\\u0085\u009b\":1"),
		withPart(`{"name":"a","shape":"sphere","radius":1,"` + strings.Repeat("k", 5000) + `":1}`),
	} {
		_, err := Parse("odd\nname.json", []byte(scene), nil)
		if err == nil {
			t.Fatalf("%.100s was accepted", scene)
		}
		text := err.Error()
		if strings.ContainsAny(text, "\n\r\x07\x1b\u0085\u009b\u2028\u202e") || len(text) > 800 || !strings.HasPrefix(text, `odd\nname.json:1:`) {
			t.Errorf("%.100s: %q", scene, text)
		}
	}
	if got, want := OneLine("a\tb\u202e\U000e0001\xff"), `a\tb\u202e\U000e0001`+"\ufffd"; got != want {
		t.Errorf("OneLine = %q, want %q", got, want)
	}
	if got := OneLine("µ0 = 4π·1e-7 \"H/m\""); got != "µ0 = 4π·1e-7 \"H/m\"" {
		t.Errorf("OneLine changes a harmless text to %q", got)
	}
}

func TestSuggestions(t *testing.T) {
	valid := []string{"length", "centre", "magnetized", "radius"}
	for word, want := range map[string]string{
		"lenght": `did you mean "length"?`, "center": `did you mean "centre"?`, "magnetised": `did you mean "magnetized"?`, "RADIUS": `did you mean "radius"?`,
		"q": "valid here: length, centre, magnetized, radius",
	} {
		if got := suggest(word, valid); got != want {
			t.Errorf("suggest(%s) = %s, want %s", word, got, want)
		}
	}
}

// TestReadmeExample holds the example error of the description against the reader.
func TestReadmeExample(t *testing.T) {
	const want = "/radius: radius must be > 0 (got -2); give a positive length"
	_, err := Parse("scene.json", []byte(withShape(`"shape":"sphere","radius":-2`)), nil)
	text, readErr := os.ReadFile("../../FORMAT.md")
	if readErr != nil || !strings.HasSuffix(err.Error(), want) || !strings.Contains(string(text), want) {
		t.Errorf("FORMAT.md and %v do not both hold %q (%v)", err, want, readErr)
	}
}
