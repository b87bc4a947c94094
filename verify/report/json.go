package main

import (
	"encoding/json"
	"errors"
	"math"
	"os"
	"path/filepath"

	"example.com/boundpole/verify"
)

// record is a case as it stands in the file.
type record struct {
	ID        string   `json:"id"`
	Family    string   `json:"family"`
	Kind      string   `json:"kind"`
	Source    string   `json:"source"`
	Expected  *float64 `json:"expected"`
	Got       *float64 `json:"got"`
	Error     *float64 `json:"error"`
	Tolerance *float64 `json:"tolerance"`
	OK        bool     `json:"ok"`
}

// optional returns null for what is no number.
func optional(v float64) *float64 {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return nil
	}
	return &v
}

// writeJSON writes the cases under a temporary name beside the file and renames it when all is written.
func writeJSON(name string, cases []verify.Case) (err error) {
	list := make([]record, len(cases))
	for i, c := range cases {
		list[i] = record{
			c.ID, c.Family, string(c.Kind), c.Source.Reference(),
			optional(c.Expected), optional(c.Got), optional(c.Error), optional(c.Tolerance), c.OK,
		}
	}
	text, err := json.MarshalIndent(list, "", " ")
	if err != nil {
		return err
	}
	f, err := os.CreateTemp(filepath.Dir(name), filepath.Base(name)+".*")
	if err != nil {
		return err
	}
	_, err = f.Write(append(text, '\n'))
	err = errors.Join(err, f.Chmod(0o644), f.Sync(), f.Close())
	if err == nil {
		err = os.Rename(f.Name(), name)
	}
	if err != nil {
		err = errors.Join(err, os.Remove(f.Name()))
	}
	return err
}
