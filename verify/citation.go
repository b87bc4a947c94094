package verify

import (
	_ "embed"
	"regexp"
	"strings"
	"sync"
)

// Source is where an expected value comes from.
type Source struct {
	Key   string // of a publication in references.md, empty if it is none
	Place string // section, equation or example in it; without a Key what the value rests on
}

// published returns a place in a publication.
func published(key, place string) Source { return Source{Key: key, Place: place} }

// plain returns a source that is no publication.
func plain(what string) Source { return Source{Place: what} }

var keyYear = regexp.MustCompile(`(\D)(\d{4})`)

// String returns author, year and place: "Griffiths 2013, example 4.2".
func (s Source) String() string {
	if s.Key == "" {
		return s.Place
	}
	name := keyYear.ReplaceAllString(s.Key, "$1 $2")
	if s.Place == "" {
		return name
	}
	return name + ", " + s.Place
}

// Reference returns the full reference and the place: what a reader needs to look it up.
func (s Source) Reference() string {
	if s.Key == "" {
		return s.Place
	}
	text := entries()[s.Key]
	if s.Place == "" {
		return text
	}
	return text + ": " + s.Place
}

//go:embed references.md
var bibliography string

// entries returns the text of each entry of references.md by its key.
var entries = sync.OnceValue(func() map[string]string {
	found := map[string]string{}
	for line := range strings.Lines(bibliography) {
		rest, ok := strings.CutPrefix(strings.TrimSpace(line), "- [")
		if key, text, cut := strings.Cut(rest, "] "); ok && cut {
			found[key] = text
		}
	}
	return found
})
