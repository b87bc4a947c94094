package scenefile

import (
	"bytes"
	"fmt"
	"io/fs"
	"strconv"
	"strings"

	"example.com/boundpole/magnet/grade"
)

// readInput reads a file of the scene's folder; what says which kind of file that should be.
func (d *decoder) readInput(name, what string) ([]byte, *fault) {
	if d.folder == nil {
		return nil, &fault{"input files need a scene that is itself a file", "write the scene to a file beside " + strconv.Quote(shorten(name))}
	}
	info, err := fs.Stat(d.folder, name) // first: opening a pipe would wait for its writer
	if err == nil && !info.Mode().IsRegular() {
		return nil, &fault{fmt.Sprintf("%s is not a regular file", name), "name " + what}
	}
	var data []byte
	if err == nil {
		var f fs.File
		if f, err = d.folder.Open(name); err == nil {
			defer f.Close()
			data, err = readAll(name, f)
		}
	}
	if e, ok := err.(*Error); ok {
		return nil, &fault{name + ": " + e.Problem, e.Remedy}
	}
	if err != nil {
		return nil, &fault{fmt.Sprintf("%s cannot be read: %s", name, reason(err)), "input files lie in the scene's folder or below, links included"}
	}
	return data, nil
}

// readGrade reads a file of grade data from the scene's folder.
func (d *decoder) readGrade(name string) (*grade.Grade, *fault) {
	data, missing := d.readInput(name, "a file of grade data")
	if missing != nil {
		return nil, missing
	}
	g, err := grade.Read(bytes.NewReader(data))
	if err != nil {
		problem, remedy := halves(err)
		return nil, &fault{name + ": " + problem, remedy}
	}
	return g, nil
}

// fillGrade reads the grade data that a polarization names; n is the polarization.
func (d *decoder) fillGrade(n uint32, p *Polarization) error {
	g, bad := d.readGrade(p.Grade)
	if bad != nil {
		at, _ := d.member(n, "grade")
		return d.errorOn(at, bad.problem, bad.remedy)
	}
	p.Data = g
	return nil
}

// halves returns what an error of the library says is wrong, and its remedy.
func halves(err error) (problem, remedy string) {
	text := strings.TrimPrefix(err.Error(), "grade: ")
	problem, remedy, _ = strings.Cut(text, "; ")
	return problem, remedy
}
