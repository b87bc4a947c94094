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

// print writes the table with an indent of two.
func (t *table) print(w io.Writer) {
	width := make([]int, len(t.heads))
	left := make([]bool, len(t.heads))
	for k, h := range t.heads {
		h, left[k] = strings.CutPrefix(h, "<")
		t.heads[k] = h
		width[k] = utf8.RuneCountInString(h)
	}
	for _, r := range t.rows {
		for k, c := range r {
			width[k] = max(width[k], utf8.RuneCountInString(c))
		}
	}
	line := func(cells []string) {
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
	}
	line(t.heads)
	for _, r := range t.rows {
		line(r)
	}
}

// wrapped prints text with a hanging indent, broken at 100 characters.
func wrapped(w io.Writer, mark, text string) {
	const most = 100
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
