package main

import (
	"bufio"
	"cmp"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"unicode/utf8"

	"example.com/boundpole/verify"
)

// The columns, 119 characters in all.
const (
	row        = "%s %-36s %14s %14s %8s %8s  %s\n"
	nameWidth  = 36
	placeWidth = 31

	sampleWidth = 22 // of the source beside a table of cells
)

// writeTable prints the cases by family, the failures once more, the counts and the verdict.
func writeTable(to io.Writer, cases []verify.Case) error {
	out := bufio.NewWriter(to)
	about := map[string]string{}
	for _, f := range verify.Families() {
		about[f.Name] = f.About
	}
	fmt.Fprintf(out, "boundpole held against what is known of its answers. Units are natural where a family or case names no others.\n"+
		"error and allowed are in the unit of the value; of a vector the norm is shown. x marks a case that fails.\n")
	family := ""
	for i := range cases {
		c := &cases[i]
		if c.Family != family {
			family = c.Family
			fmt.Fprintf(out, "\n%s\n%s\n", family, about[family])
			if _, _, ok := c.Cell(); ok {
				writeSideBySide(out, cases[i:])
			} else {
				fmt.Fprintf(out, row, " ", "case", "expected", "got", "error", "allowed", "source")
			}
		}
		if _, _, ok := c.Cell(); ok {
			continue
		}
		mark := " "
		if !c.OK {
			mark = "x"
		}
		fmt.Fprintf(out, row, mark, short(c.Name, nameWidth), value(c.Expected), value(c.Got), size(c.Error), size(c.Tolerance),
			short(c.Source.String(), placeWidth))
	}
	writeFailures(out, cases)
	writeCounts(out, cases)
	return out.Flush()
}

// writeSideBySide prints the family of the first case with a line for each row of its table: the values, and an x after one
// that fails.
func writeSideBySide(out io.Writer, cases []verify.Case) {
	var rows, columns []string
	cells, source := map[[2]string]string{}, map[string]string{}
	for i := range cases {
		c := &cases[i]
		r, k, _ := c.Cell()
		if c.Family != cases[0].Family {
			break
		}
		if !slices.Contains(rows, r) {
			rows = append(rows, r)
		}
		if !slices.Contains(columns, k) {
			columns = append(columns, k)
		}
		cells[[2]string{r, k}] = strconv.FormatFloat(c.Got, 'g', 4, 64)
		if !c.OK {
			cells[[2]string{r, k}] += " x"
		}
		source[r] = c.Source.String()
	}
	line := func(name string, cell func(column string) string, last string) {
		fmt.Fprintf(out, "  %-17s", name)
		for _, k := range columns {
			fmt.Fprintf(out, " %10s", cell(k))
		}
		fmt.Fprintf(out, "  %s\n", last)
	}
	line("case", func(column string) string { return column }, "source")
	for _, r := range rows {
		line(r, func(column string) string { return cmp.Or(cells[[2]string{r, column}], "-") }, short(source[r], sampleWidth))
	}
}

// writeFailures tells of each failed case what a reader needs to repeat it.
func writeFailures(out io.Writer, cases []verify.Case) {
	first := true
	for i := range cases {
		c := &cases[i]
		if c.OK {
			continue
		}
		if first {
			fmt.Fprintf(out, "\nfailed\n")
			first = false
		}
		fmt.Fprintf(out, "%s (%s)\n  inputs: %s\n", c.ID, c.Kind, c.Inputs)
		if c.Failure != "" {
			fmt.Fprintf(out, "  no value: %s\n", c.Failure)
			continue
		}
		fmt.Fprintf(out, "  expected %v, got %v\n  error %.3g, allowed %.3g: %s\n", c.Expected, c.Got, c.Error, c.Tolerance, c.Reason)
	}
}

// writeCounts prints the counts by kind and the verdict.
func writeCounts(out io.Writer, cases []verify.Case) {
	fmt.Fprintf(out, "\n%-32s %6s %6s\n", "kind", "cases", "failed")
	failed, published, claims, covered := 0, 0, 0, 0
	for _, k := range verify.Kinds() {
		all, bad := 0, 0
		for i := range cases {
			if c := &cases[i]; c.Kind == k {
				all++
				if !c.OK {
					bad++
				}
			}
		}
		failed += bad
		if all > 0 {
			fmt.Fprintf(out, "%-32s %6d %6d\n", k, all, bad)
		}
	}
	for i := range cases {
		c := &cases[i]
		if c.Published() {
			published++
		}
		if !math.IsNaN(c.Estimate) {
			claims++
			if c.Error <= c.Estimate+c.Tolerance/100 {
				covered++
			}
		}
	}
	fmt.Fprintf(out, "%-32s %6d %6d\n\n", "all", len(cases), failed)
	fmt.Fprintf(out, "%d cases compare with a named publication outside the project; digits recalled from memory are not among them.\n", published)
	if claims > 0 {
		fmt.Fprintf(out, "%d values carry the library's own bound on their error; it holds for %d, one percent of the tolerance granted to\nthe expected side.\n", claims, covered)
	}
	if failed > 0 {
		fmt.Fprintf(out, "FAIL: %d of %d cases\n", failed, len(cases))
		return
	}
	fmt.Fprintf(out, "PASS: %d cases\n", len(cases))
}

// value returns a number for the columns of values.
func value(v float64) string {
	if math.IsNaN(v) {
		return "-"
	}
	return strconv.FormatFloat(v, 'g', 8, 64)
}

// size returns a number for the columns of errors.
func size(v float64) string {
	switch {
	case math.IsNaN(v):
		return "-"
	case v == 0:
		return "0"
	}
	return fmt.Sprintf("%.1e", v)
}

// short returns at most n characters of a text.
func short(s string, n int) string {
	if utf8.RuneCountInString(s) <= n {
		return s
	}
	r := []rune(s)
	return string(r[:n-1]) + "~"
}
