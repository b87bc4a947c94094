package verify_test

import (
	"bufio"
	"bytes"
	"flag"
	"go/importer"
	"go/token"
	"go/types"
	"io"
	"maps"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/verify/internal/house"
	"github.com/google/go-cmp/cmp"
)

var updateAPI = flag.Bool("update", false, "write the records of TestAPI anew")

const (
	apiDir  = "testdata/api"
	apiHint = "if the change is wanted, refresh the record: go test ./verify -run TestAPI -update"
)

// exports are the compiled packages of the module and all that they import.
type exports struct {
	files    map[string]string // import path to file with export data
	library  []string          // the public library packages of the module, sorted
	module   string
	importer types.Importer
}

// loadExports asks the go command for export data: all from the build cache, no network.
func loadExports(t *testing.T) *exports {
	t.Helper()
	moduleSource(t) // reads every file, so that the go command does not take an old result of this test from its cache
	cmd := exec.Command("go", "list", "-e", "-export", "-deps",
		"-f", "{{.ImportPath}}\t{{.Export}}\t{{.Name}}\t{{len .GoFiles}}\t{{with .Module}}{{if .Main}}{{.Path}}{{end}}{{end}}", "./...")
	cmd.Dir = ".."
	var stderr bytes.Buffer
	cmd.Stderr = &stderr
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("%v: %v\n%s", cmd, err, stderr.Bytes())
	}
	e := &exports{files: map[string]string{}}
	for lines := bufio.NewScanner(bytes.NewReader(out)); lines.Scan(); {
		f := strings.Split(lines.Text(), "\t")
		path, file, name, count, module := f[0], f[1], f[2], f[3], f[4]
		e.files[path] = file
		if module == "" || name == "main" || count == "0" || !recorded(strings.TrimPrefix(path, module+"/")) {
			continue
		}
		e.module = module
		if file == "" {
			t.Errorf("%s does not build", path)
			continue
		}
		e.library = append(e.library, path)
	}
	if t.Failed() {
		t.FailNow() // a record without its package would count as gone
	}
	e.importer = importer.ForCompiler(token.NewFileSet(), "gc", func(path string) (io.ReadCloser, error) {
		return os.Open(e.files[path])
	})
	return e
}

// recorded reports whether the API of a package is recorded.
func recorded(room string) bool {
	return !strings.HasPrefix(room, "examples/") && !strings.Contains("/"+room+"/", "/internal/")
}

// record returns the file of a package: its path with dots for slashes.
func (e *exports) record(path string) string {
	return filepath.Join(apiDir, strings.ReplaceAll(strings.TrimPrefix(path, e.module+"/"), "/", ".")+".txt")
}

// declarations returns the exported API of a package as it stands.
func (e *exports) declarations(t *testing.T, path string) string {
	t.Helper()
	pkg, err := e.importer.Import(path)
	if err != nil {
		t.Fatal(err)
	}
	text, err := house.Declarations(pkg)
	if err != nil {
		t.Fatal(err)
	}
	return text
}

// TestAPI compares the exported API of each library package with its record.
func TestAPI(t *testing.T) {
	e := loadExports(t)
	const least = 8 // packages; fewer means that the go command was asked in a wrong folder
	if len(e.library) < least {
		t.Fatalf("%d library packages, want at least %d", len(e.library), least)
	}
	if *updateAPI {
		e.update(t)
	}
	stale := map[string]bool{}
	old, err := filepath.Glob(filepath.Join(apiDir, "*.txt"))
	if err != nil {
		t.Fatal(err)
	}
	for _, file := range old {
		stale[file] = true
	}
	for _, path := range e.library {
		file := e.record(path)
		delete(stale, file)
		want, err := os.ReadFile(file)
		if err != nil {
			t.Errorf("%s has no record; %s", path, apiHint)
			continue
		}
		if diff := cmp.Diff(strings.Split(string(want), "\n"), strings.Split(e.declarations(t, path), "\n")); diff != "" {
			t.Errorf("%s differs from %s (-record +code)\n%s%s", path, file, diff, apiHint)
		}
	}
	for _, file := range slices.Sorted(maps.Keys(stale)) {
		t.Errorf("%s records a package that is gone, an incompatible change; %s", file, apiHint)
	}
}

// update writes all records anew and removes those of packages that are gone.
func (e *exports) update(t *testing.T) {
	t.Helper()
	text := map[string]string{} // all made before the first old record is lost
	for _, path := range e.library {
		text[path] = e.declarations(t, path)
	}
	if err := os.RemoveAll(apiDir); err != nil {
		t.Fatal(err)
	}
	if err := os.MkdirAll(apiDir, 0o777); err != nil {
		t.Fatal(err)
	}
	for _, path := range e.library {
		if err := os.WriteFile(e.record(path), []byte(text[path]), 0o666); err != nil {
			t.Fatal(err)
		}
	}
}
