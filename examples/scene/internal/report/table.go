package report

import (
	"fmt"
	"io"
	"strings"
	"unicode/utf8"
)

// table lines up rows of text; columns are flush right unless their heading begins with "<".
type table struct {
	heads []string
	rows  [][]string
}

func newTable(heads ...string) *table { return &table{heads: heads} }

func (t *table) add(cells ...string) { t.rows = append(t.rows, cells) }

// mostWidth is how wide a table gets before its last column moves to lines of its own.
const mostWidth = 150

// print writes the table with an indent of two. Where a row is too wide, its last cell follows on a line of its own.
func (t *table) print(w io.Writer) {
	n := len(t.heads)
	heads := make([]string, n)
	width := make([]int, n)
	left := make([]bool, n)
	for k, h := range t.heads {
		heads[k], left[k] = strings.CutPrefix(h, "<")
		width[k] = utf8.RuneCountInString(heads[k])
	}
	for _, r := range t.rows {
		for k, c := range r {
			width[k] = max(width[k], utf8.RuneCountInString(c))
		}
	}
	before := 0
	for _, k := range width[:n-1] {
		before += k + 2
	}
	line := func(cells []string) {
		last := cells[n-1]
		spill := left[n-1] && before+2+utf8.RuneCountInString(last) > mostWidth
		if spill {
			cells = cells[:n-1]
		}
		var b strings.Builder
		for k, c := range cells {
			pad := strings.Repeat(" ", width[k]-utf8.RuneCountInString(c))
			b.WriteString("  ")
			if left[k] {
				b.WriteString(c + pad)
			} else {
				b.WriteString(pad + c)
			}
		}
		fmt.Fprintln(w, strings.TrimRight(b.String(), " "))
		if spill {
			fold(w, "    ", last, mostWidth)
		}
	}
	if strings.Join(heads, "") != "" {
		line(heads)
	}
	for _, r := range t.rows {
		line(r)
	}
}

// wrapped prints text with a hanging indent, broken at 100 characters.
func wrapped(w io.Writer, mark, text string) { fold(w, mark, text, 100) }

// fold prints text behind a mark, broken into lines of at most so many characters with a hanging indent.
func fold(w io.Writer, mark, text string, most int) {
	line := "  " + mark
	indent := strings.Repeat(" ", utf8.RuneCountInString(line))
	used := 0
	for _, word := range strings.Fields(text) {
		if used > 0 && utf8.RuneCountInString(line)+1+utf8.RuneCountInString(word) > most {
			fmt.Fprintln(w, line)
			line, used = indent, 0
		}
		if used > 0 {
			line += " "
		}
		line += word
		used++
	}
	fmt.Fprintln(w, line)
}
