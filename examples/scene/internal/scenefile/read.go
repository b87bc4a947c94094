package scenefile

import (
	"fmt"
	"io"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"reflect"
	"strings"
)

// Read reads a scene file. Input files that it names are sought in its folder
// and cannot lie elsewhere, not even by a symbolic link.
func Read(name string) (*Scene, error) {
	f, err := os.Open(name)
	if err != nil {
		return nil, unreadable(name, err)
	}
	defer f.Close()
	data, err := readAll(name, f)
	if err != nil {
		return nil, err
	}
	root, err := os.OpenRoot(filepath.Dir(name))
	if err != nil {
		return nil, unreadable(name, err)
	}
	defer root.Close()
	return Parse(name, data, root.FS())
}

// ReadFS reads a scene file from a file system, such as an embedded one.
func ReadFS(fsys fs.FS, name string) (*Scene, error) {
	f, err := fsys.Open(name)
	if err != nil {
		return nil, unreadable(name, err)
	}
	defer f.Close()
	data, err := readAll(name, f)
	if err != nil {
		return nil, err
	}
	folder, err := fs.Sub(fsys, path.Dir(name))
	if err != nil {
		return nil, unreadable(name, err)
	}
	return Parse(name, data, folder)
}

// Parse reads a scene from the bytes of a file. Errors name it by file; input
// files are sought in folder, which may be nil for none. Parse keeps data.
func Parse(file string, data []byte, folder fs.FS) (*Scene, error) {
	if len(data) > MaxBytes {
		return nil, tooLarge(file, int64(len(data)))
	}
	doc, err := parse(file, data)
	if err != nil {
		return nil, err
	}
	s := &Scene{doc: doc}
	d := decoder{
		document: doc, table: Format(), folder: folder, scene: s,
		fields: map[reflect.Type]map[string]int{}, lookup: map[string]map[string]*Key{},
		outputs: map[string]string{}, bodies: map[string]int{}, positions: 1,
	}
	if err := d.object(0, &d.table.Objects[0], reflect.ValueOf(s).Elem()); err != nil {
		return nil, err
	}
	return s, nil
}

// readAll reads an open file of at most MaxBytes, looking at its size first.
func readAll(name string, f fs.File) ([]byte, error) {
	info, err := f.Stat()
	if err != nil {
		return nil, unreadable(name, err)
	}
	if info.IsDir() {
		return nil, &Error{File: name, Problem: "this is a folder", Remedy: "name a file in it"}
	}
	if info.Size() > MaxBytes {
		return nil, tooLarge(name, info.Size())
	}
	data := make([]byte, 0, info.Size()+512)
	for { // a pipe has no size and a file may grow: never more than the limit
		n, err := f.Read(data[len(data):cap(data)])
		data = data[:len(data)+n]
		switch {
		case len(data) > MaxBytes:
			return nil, tooLarge(name, int64(len(data)))
		case err == io.EOF:
			return data, nil
		case err != nil:
			return nil, unreadable(name, err)
		case len(data) == cap(data):
			data = append(data, 0)[:len(data)]
		}
	}
}

// tooLarge returns the error for a file above the limit.
func tooLarge(name string, size int64) error {
	return &Error{File: name, Problem: fmt.Sprintf("the file is too large (at least %d bytes)", size), Remedy: fmt.Sprintf("the limit is %d bytes (64 MiB)", MaxBytes)}
}

// unreadable returns the error for a file that cannot be opened or read.
func unreadable(name string, err error) error {
	return &Error{File: name, Problem: "cannot be read: " + reason(err), Remedy: "check its name and permissions"}
}

// reason returns what the operating system said, without the path.
func reason(err error) string {
	if pe, ok := err.(*fs.PathError); ok {
		err = pe.Err
	}
	return strings.TrimSpace(err.Error())
}
