package output

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// Folder is where files are written. Files are gathered under temporary names that begin with ".boundpole-"; Close ends
// them and Commit gives them their own names, each in one step of the file system. Discard leaves nothing behind.
type Folder struct {
	dir   string
	made  []string // folders that OpenFolder has made, innermost first
	files []*File
}

const writable = "give a folder that can be written"

// OpenFolder makes the folder if it is absent.
func OpenFolder(dir string) (*Folder, error) {
	f := &Folder{dir: dir}
	for d := filepath.Clean(dir); ; d = filepath.Dir(d) {
		if _, err := os.Lstat(d); !errors.Is(err, fs.ErrNotExist) || d == filepath.Dir(d) {
			break
		}
		f.made = append(f.made, d)
	}
	if err := os.MkdirAll(dir, 0o777); err != nil {
		f.Discard()
		return nil, fmt.Errorf("cannot make the folder %s for results: %s; %s", dir, reason(err), writable)
	}
	return f, nil
}

// reason returns what the operating system said, without the names of temporary files.
func reason(err error) string {
	if pe := (*fs.PathError)(nil); errors.As(err, &pe) {
		return pe.Err.Error()
	}
	if le := (*os.LinkError)(nil); errors.As(err, &le) {
		return le.Err.Error()
	}
	return err.Error()
}

// File is a file that does not have its name yet.
type File struct {
	*os.File
	name string
	dir  string
}

// Write writes to the file; its errors name what it is to become.
func (f *File) Write(b []byte) (int, error) {
	n, err := f.File.Write(b)
	if err != nil {
		err = f.failed(err)
	}
	return n, err
}

// ReadFrom copies into the file; its errors name what it is to become.
func (f *File) ReadFrom(r io.Reader) (int64, error) {
	n, err := f.File.ReadFrom(r)
	if err != nil {
		err = f.failed(err)
	}
	return n, err
}

func (f *File) failed(err error) error {
	name := f.name
	if name == "" {
		name = "a temporary file"
	}
	return fmt.Errorf("cannot write %s in %s: %s; see that there is room and %s", name, f.dir, reason(err), writable)
}

// Create opens a file that will get the given name; "" is for one that only lives until Discard or Commit.
func (f *Folder) Create(name string) (*File, error) {
	if info, err := os.Lstat(filepath.Join(f.dir, name)); name != "" && err == nil && info.IsDir() {
		return nil, fmt.Errorf("cannot write %s in %s: a folder of that name is in the way; remove it", name, f.dir)
	}
	t, err := os.CreateTemp(f.dir, ".boundpole-*")
	if err != nil {
		return nil, fmt.Errorf("cannot write to the folder %s for results: %s; %s", f.dir, reason(err), writable)
	}
	file := &File{File: t, name: name, dir: f.dir}
	f.files = append(f.files, file)
	return file, nil
}

// Close brings all that was written to the disk, under the temporary names.
func (f *Folder) Close() error {
	for _, file := range f.files {
		if file.name == "" {
			continue
		}
		if err := errors.Join(file.Chmod(0o644), file.Sync(), file.File.Close()); err != nil {
			return file.failed(err)
		}
	}
	return nil
}

// Commit gives all files their names, after Close, and removes what has none.
func (f *Folder) Commit() error {
	for _, file := range f.files {
		if file.name == "" {
			continue
		}
		if err := os.Rename(file.Name(), filepath.Join(f.dir, file.name)); err != nil {
			return file.failed(err)
		}
		file.name = ""
	}
	f.made = nil
	f.Discard()
	return nil
}

// Discard removes everything that has not got its name, and the folders that were made for it if they are empty.
func (f *Folder) Discard() {
	for _, file := range f.files {
		file.File.Close()
		os.Remove(file.Name()) // gone already where it was renamed
	}
	for _, d := range f.made {
		os.Remove(d) // keeps one that is not empty
	}
	f.files, f.made = nil, nil
}

// Rewind returns a reader of what has been written to a file so far.
func (f *File) Rewind() (io.Reader, error) {
	_, err := f.Seek(0, io.SeekStart)
	return f.File, err
}
