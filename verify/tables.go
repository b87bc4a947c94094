package verify

import (
	_ "embed"
	"encoding/json"
	"math"
	"strconv"
	"strings"
	"sync"

	"gonum.org/v1/gonum/spatial/r3"
)

//go:embed testdata/tables.json
var tableFile []byte

// tableEntry is a published table value or worked example with its value recomputed in 25 digits.
type tableEntry struct {
	ID         string
	Published  json.RawMessage // string, object or null; "(from memory)" after recalled digits
	Recomputed json.RawMessage // string, list or object
}

// table returns the entries by ID, and the IDs in the order of the file.
var table = sync.OnceValues(func() (map[string]tableEntry, []string) {
	var list []tableEntry
	if json.Unmarshal(tableFile, &list) != nil {
		return nil, nil // the file is part of the package; a test demands its entries
	}
	byID, ids := map[string]tableEntry{}, []string{}
	for _, e := range list {
		byID[e.ID] = e
		ids = append(ids, e.ID)
	}
	return byID, ids
})

// numbered returns the entries whose ID is a prefix and numbers joined by hyphens.
func numbered(prefix string) (found []tableEntry, arguments [][]float64) {
	byID, ids := table()
next:
	for _, id := range ids {
		rest, ok := strings.CutPrefix(id, prefix)
		if !ok {
			continue
		}
		var args []float64
		for s := range strings.SplitSeq(rest, "-") {
			v, err := strconv.ParseFloat(s, 64)
			if err != nil {
				continue next
			}
			args = append(args, v)
		}
		found, arguments = append(found, byID[id]), append(arguments, args)
	}
	return found, arguments
}

// recomputed returns the number of an entry, or of a key of it; NaN if there is none.
func recomputed(id, key string) float64 { return parsed(inside(id, key)) }

// recomputedVec returns a list of three numbers.
func recomputedVec(id, key string) r3.Vec {
	var list []json.RawMessage
	if json.Unmarshal(inside(id, key), &list) != nil || len(list) != 3 {
		nan := math.NaN()
		return r3.Vec{X: nan, Y: nan, Z: nan}
	}
	return r3.Vec{X: parsed(list[0]), Y: parsed(list[1]), Z: parsed(list[2])}
}

func inside(id, key string) json.RawMessage {
	byID, _ := table()
	raw := byID[id].Recomputed
	if key == "" {
		return raw
	}
	var object map[string]json.RawMessage
	if json.Unmarshal(raw, &object) != nil {
		return nil
	}
	return object[key]
}

func parsed(raw json.RawMessage) float64 {
	var text string
	if json.Unmarshal(raw, &text) != nil {
		return math.NaN()
	}
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		return math.NaN()
	}
	return v
}

// recalled returns the printed number of an entry and one unit of its last digit, ok only if it was recalled from memory.
func (e tableEntry) recalled() (value, unit float64, ok bool) {
	var text string
	if json.Unmarshal(e.Published, &text) != nil {
		return 0, 0, false
	}
	digits, ok := strings.CutSuffix(text, " (from memory)")
	if !ok {
		return 0, 0, false
	}
	value, err := strconv.ParseFloat(digits, 64)
	_, decimals, _ := strings.Cut(digits, ".")
	return value, math.Pow(10, -float64(len(decimals))), err == nil
}

// tabled returns the trials of one table entry: the library against the recomputed value, and against the printed digits
// where those were recalled.
func (e tableEntry) tabled(kind Kind, source Source, inputs string, claim limit, got func(l *lab) float64) []trial {
	all := []trial{{e.ID, kind, source, inputs, claim, func(l *lab) result { return number(recomputed(e.ID, ""), got(l)) }}}
	if value, unit, ok := e.recalled(); ok {
		all = append(all, trial{
			e.ID + " as printed", TableFromMemory, source, inputs,
			within(unit*(1+1e-9), "one unit of the last digit printed"),
			func(l *lab) result { return number(value, got(l)) },
		})
	}
	return all
}
