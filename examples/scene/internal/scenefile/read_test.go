package scenefile

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"
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

// TestSpeed shows that no input of permitted size takes more than a moment. A
// quiet machine reads the polygon in about 0.6 s; the limit leaves room for a
// loaded one, and what grows as the square of the size would take hours.
func TestSpeed(t *testing.T) {
	if testing.Short() {
		t.Skip("reads 50 MB")
	}
	const limit = 10 * time.Second
	within := func(name string, data []byte, good bool) {
		start := time.Now()
		_, err := Parse("scene.json", data, nil)
		took := time.Since(start)
		t.Logf("%s: %d bytes in %v", name, len(data), took)
		if (err == nil) != good {
			t.Errorf("%s: %.200v, want success: %t", name, err, good)
		}
		if took > limit {
			t.Errorf("%s took %v, want at most %v", name, took, limit)
		}
	}
	const some = MaxBytes / 4 // enough to show what grows faster than the file
	fill := func(pattern string) []byte { return bytes.Repeat([]byte(pattern), some/len(pattern)) }
	within("polygon", polygonScene(50_000_000), true)
	within("open brackets", fill("["), false)
	within("open objects", fill(`{"a":`), false)
	within("blanks", fill(" "), false)
	within("line ends", fill("\r"), false)
	within("commas", fill(","), false)
	within("empty lists", append([]byte("[0"), append(bytes.Repeat([]byte(",[]"), some/3), ']')...), false)
	within("full objects", append([]byte("[0"), append(bytes.Repeat([]byte(","+fullObject()), some/(len(fullObject())+1)), ']')...), false)
	within("long text", append([]byte(`{"title":"`), append(bytes.Repeat([]byte("é"), some/2), `"}`...)...), false)
	within("long key", append([]byte(`{"`), append(bytes.Repeat([]byte("k"), some), `":1}`...)...), false)
	within("long number", append([]byte(`{"version":1`), append(bytes.Repeat([]byte("0"), some), '}')...), false)
	within("wrong words", []byte(withTop(`"length":"`+strings.Repeat("m", some)+`"`)), false)
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
