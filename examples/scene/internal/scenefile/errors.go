package scenefile

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// An Error says where a scene file is wrong, what is wrong, and what would be
// right.
type Error struct {
	File    string
	Line    int    // from 1; 0 where the error concerns the file as a whole
	Column  int    // from 1, in characters
	Pointer string // JSON Pointer (RFC 6901); "" is the whole document
	Problem string
	Remedy  string // may be empty
}

// Error returns one line: "file:line:column: pointer: problem; remedy".
func (e *Error) Error() string {
	var b strings.Builder
	b.WriteString(e.File)
	if e.Line > 0 {
		pointer := e.Pointer
		if pointer == "" {
			pointer = "(root)"
		}
		fmt.Fprintf(&b, ":%d:%d: %s", e.Line, e.Column, pointer)
	}
	b.WriteString(": " + e.Problem)
	if e.Remedy != "" {
		b.WriteString("; " + e.Remedy)
	}
	return OneLine(b.String())
}

// OneLine returns text with every character that could break a line or steer a
// terminal written as an escape (\n, \u001b, …).
func OneLine(text string) string {
	clean := func(r rune) bool { return !unicode.IsPrint(r) }
	if utf8.ValidString(text) && strings.IndexFunc(text, clean) < 0 {
		return text
	}
	var b strings.Builder
	for _, r := range text {
		switch {
		case r == '\n':
			b.WriteString(`\n`)
		case r == '\t':
			b.WriteString(`\t`)
		case unicode.IsPrint(r):
			b.WriteRune(r)
		case r > 0xffff:
			fmt.Fprintf(&b, `\U%08x`, r)
		default:
			fmt.Fprintf(&b, `\u%04x`, r)
		}
	}
	return b.String()
}

// shorten cuts text to about 40 characters, for quoting in an error.
func shorten(text string) string {
	const most = 40
	if len(text) <= most {
		return text
	}
	cut := most
	for cut > 0 && !utf8.RuneStart(text[cut]) {
		cut--
	}
	return text[:cut] + "…"
}

// suggest returns the remedy for a word that is none of valid: the nearest of
// them if one is near, else all of them.
func suggest(word string, valid []string) string {
	best, distance := "", len(word)/2+1
	if len(word) > 64 {
		distance = 0
	}
	for _, v := range valid {
		if distance == 0 {
			break
		}
		if d := edits(strings.ToLower(word), strings.ToLower(v)); d < distance {
			best, distance = v, d
		}
	}
	switch {
	case best != "":
		return fmt.Sprintf("did you mean %q?", best)
	case len(valid) == 0:
		return "leave it out"
	}
	return "valid here: " + strings.Join(valid, ", ")
}

// edits returns the number of insertions, deletions, replacements and swaps of
// neighbours that turn a into b (optimal string alignment).
func edits(a, b string) int {
	before, above := make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range above {
		above[j] = j
	}
	for i := 1; i <= len(a); i++ {
		row := make([]int, len(b)+1)
		row[0] = i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			row[j] = min(above[j]+1, row[j-1]+1, above[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		before, above = above, row
	}
	return above[len(b)]
}
