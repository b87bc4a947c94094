package output

import (
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
)

// Folder is where files are written. Files are gathered under temporary names and get their own all at once.
type Folder struct {
	dir   string
	files []*File
}

// OpenFolder makes the folder if it is absent.
func OpenFolder(dir string) (*Folder, error) {
	if err := os.MkdirAll(dir, 0o777); err != nil {
		return nil, fmt.Errorf("cannot make the folder for results: %w; give a folder that can be written", err)
	}
	return &Folder{dir: dir}, nil
}

// File is a file that does not have its name yet.
type File struct {
	*os.File
	name string
}

// Create opens a file that will get the given name; "" is for one that only lives until Discard or Commit.
func (f *Folder) Create(name string) (*File, error) {
	t, err := os.CreateTemp(f.dir, ".boundpole-*")
	if err != nil {
		return nil, fmt.Errorf("cannot write to the folder for results: %w; give a folder that can be written", err)
	}
	file := &File{t, name}
	f.files = append(f.files, file)
	return file, nil
}

// Commit closes all files and gives them their names.
func (f *Folder) Commit() error {
	for _, file := range f.files {
		if file.name == "" {
			continue
		}
		err := errors.Join(file.Chmod(0o644), file.Sync(), file.Close())
		if err == nil {
			err = os.Rename(file.Name(), filepath.Join(f.dir, file.name))
		}
		if err != nil {
			f.Discard()
			return fmt.Errorf("cannot write %s: %w", file.name, err)
		}
		file.name = ""
	}
	f.Discard()
	return nil
}

// Discard removes everything that has not got its name.
func (f *Folder) Discard() {
	for _, file := range f.files {
		file.Close()
		os.Remove(file.Name()) // gone already where it was renamed
	}
	f.files = nil
}

// Rewind returns a reader of what has been written to a file so far.
func (f *File) Rewind() (io.Reader, error) {
	_, err := f.Seek(0, io.SeekStart)
	return f.File, err
}
