package scenefile

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

// write writes a file into a folder of the test and returns its name.
func write(t testing.TB, dir, name, text string) string {
	t.Helper()
	full := filepath.Join(dir, name)
	if err := os.WriteFile(full, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return full
}

// refused checks that a scene file is refused with a text.
func refused(t *testing.T, name, want string) {
	t.Helper()
	if s, err := Read(name); err == nil || s != nil || !strings.Contains(err.Error(), want) {
		t.Errorf("Read(%s) = %v, %v; want an error with %q", name, s, err, want)
	}
}

func TestReadFaults(t *testing.T) {
	dir := t.TempDir()
	refused(t, filepath.Join(dir, "none.json"), "none.json: cannot be read: no such file")
	refused(t, dir, "this is a folder")
	big := write(t, dir, "big.json", "")
	if err := os.Truncate(big, MaxBytes+1); err != nil {
		t.Fatal(err)
	}
	refused(t, big, "the file is too large (at least 67108865 bytes); the limit is 67108864 bytes (64 MiB)")
	if err := os.Truncate(big, 1<<40); err != nil {
		t.Skip("no sparse files here")
	}
	refused(t, big, "the file is too large (at least 1099511627776 bytes)")
	csv := write(t, dir, "huge.csv", "")
	if err := os.Truncate(csv, 1<<40); err != nil {
		t.Skip("no sparse files here")
	}
	refused(t, write(t, dir, "scene.json", withRequest(`{"points_file":"huge.csv"}`)), "huge.csv: the file is too large")
}

func TestParseTooLarge(t *testing.T) {
	if _, err := Parse("scene.json", make([]byte, MaxBytes+1), nil); err == nil || !strings.Contains(err.Error(), "too large") {
		t.Errorf("Parse of 64 MiB + 1 = %v, want too large", err)
	}
}

func TestEndlessFile(t *testing.T) {
	if _, err := os.Stat("/dev/zero"); err != nil {
		t.Skip("no endless file here")
	}
	refused(t, "/dev/zero", "the file is too large")
}

func TestInputFilesStayInside(t *testing.T) {
	top := t.TempDir()
	dir := filepath.Join(top, "scene")
	if err := os.MkdirAll(filepath.Join(dir, "data"), 0o755); err != nil {
		t.Fatal(err)
	}
	write(t, top, "secret.csv", "1,2,3\n")
	write(t, dir, "data/own.csv", "1,2,3\n")
	for link, target := range map[string]string{"out.csv": "../secret.csv", "abs.csv": filepath.Join(top, "secret.csv"), "up": "..", "in.csv": "data/own.csv"} {
		if err := os.Symlink(target, filepath.Join(dir, link)); err != nil {
			t.Skip("no symbolic links here")
		}
	}
	for _, name := range []string{"out.csv", "abs.csv", "up/secret.csv"} {
		refused(t, write(t, dir, "s.json", withRequest(`{"points_file":"`+name+`"}`)), "/wanted/0/points_file: "+name+" cannot be read")
	}
	for _, name := range []string{"in.csv", "data/own.csv"} {
		if _, err := Read(write(t, dir, "s.json", withRequest(`{"points_file":"`+name+`"}`))); err != nil {
			t.Errorf("Read: %v", err)
		}
	}
}

func TestNoFolder(t *testing.T) {
	_, err := Parse("stdin", []byte(withRequest(`{"points_file":"a.csv"}`)), nil)
	if err == nil || !strings.Contains(err.Error(), "input files need a scene that is itself a file") {
		t.Errorf("Parse without folder = %v", err)
	}
}

// polygonScene returns a scene of about size bytes, nearly all of it one polygon.
func polygonScene(size int) []byte {
	var b bytes.Buffer
	b.WriteString(`{"parts":[{"name":"a","shape":"polygon","charged":{"density":1},"vertices":[[0,0,0]`)
	for i := 0; b.Len() < size; i++ {
		fmt.Fprintf(&b, ",\n[%d.%d, -0.%d, 0]", i, i%9973, i)
	}
	b.WriteString("]}]}")
	return b.Bytes()
}

// hostile are inputs of a size, made to cost more than their length: what is refused must not be kept first.
var hostile = []struct {
	name string
	data func(size int) []byte
	good bool
}{
	{"polygon", polygonScene, true},
	{"open brackets", filled("["), false},
	{"open objects", filled(`{"a":`), false},
	{"blanks", filled(" "), false},
	{"line ends", filled("\r"), false},
	{"commas", filled(","), false},
	{"empty lists", func(n int) []byte { return enclosed("[0", ",[]", "]", n) }, false},
	{"full objects", func(n int) []byte { return enclosed("[0", ","+fullObject(), "]", n) }, false},
	{"long text", func(n int) []byte { return enclosed(`{"title":"`, "é", `"}`, n) }, false},
	{"long key", func(n int) []byte { return enclosed(`{"`, "k", `":1}`, n) }, false},
	{"long number", func(n int) []byte { return enclosed(`{"version":1`, "0", "}", n) }, false},
	{"wrong words", func(n int) []byte { return []byte(withTop(`"length":"` + strings.Repeat("m", n) + `"`)) }, false},
}

func filled(pattern string) func(size int) []byte {
	return func(size int) []byte { return enclosed("", pattern, "", size) }
}

// enclosed returns about size bytes: a pattern repeated between a head and a tail.
func enclosed(head, pattern, tail string, size int) []byte {
	return []byte(head + strings.Repeat(pattern, size/len(pattern)) + tail)
}

// TestCost holds what an input of any kind costs in memory to a multiple of its length, at one length and at eight times
// that: what grew as the square would leave the bound. BenchmarkHostile shows the time.
func TestCost(t *testing.T) {
	for _, c := range hostile {
		for _, size := range []int{100_000, 800_000} {
			data := c.data(size)
			var before, after runtime.MemStats
			runtime.ReadMemStats(&before)
			s, err := Parse("scene.json", data, nil)
			runtime.ReadMemStats(&after)
			if (err == nil) != c.good {
				t.Errorf("%s: %.200v, want success: %t", c.name, err, c.good)
			}
			// 12 bytes of node for 2 bytes of text at worst, doubled as the list of nodes grows, and the values themselves;
			// 1 MB for the tables of the format.
			if cost := after.TotalAlloc - before.TotalAlloc; cost > uint64(40*len(data)+1_000_000) {
				t.Errorf("%s of %d bytes: %d bytes allocated, want at most 40 a byte", c.name, len(data), cost)
			}
			if s != nil && len(s.doc.nodes) > len(data)/2+1 {
				t.Errorf("%s of %d bytes: %d nodes, want at most one for two bytes", c.name, len(data), len(s.doc.nodes))
			}
		}
	}
}

func BenchmarkHostile(b *testing.B) {
	for _, c := range hostile {
		b.Run(strings.ReplaceAll(c.name, " ", "_"), func(b *testing.B) {
			data := c.data(MaxBytes / 4)
			b.SetBytes(int64(len(data)))
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Parse("scene.json", data, nil); (err == nil) != c.good {
					b.Fatal(err)
				}
			}
		})
	}
}

// fullObject returns an object with as many short keys as are allowed.
func fullObject() string {
	var b strings.Builder
	for i := range maxKeys {
		fmt.Fprintf(&b, `,"%c%c":0`, 'a'+i/26, 'a'+i%26)
	}
	return "{" + b.String()[1:] + "}"
}

func BenchmarkPolygon(b *testing.B) {
	data := polygonScene(10_000_000)
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("scene.json", data, nil); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParts(b *testing.B) {
	var text strings.Builder
	for i := range 10_000 {
		fmt.Fprintf(&text, `,{"name":"p%d","shape":"box","size":[1,2,3],"centre":[%d,0,0],"magnetized":{"uniform":[0,0,1]}}`, i, 5*i)
	}
	data := []byte(withPart(text.String()[1:]))
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("scene.json", data, nil); err != nil {
			b.Fatal(err)
		}
	}
}
