package given

import (
	"bytes"
	"io"
	"strings"
)

// Lacking runs a program with its presets and returns those of the wanted words that its report lacks, with the report.
func Lacking(run func(args []string, w io.Writer) error, want ...string) (lacking []string, report string, err error) {
	var b bytes.Buffer
	err = run(nil, &b)
	for _, w := range want {
		if !strings.Contains(b.String(), w) {
			lacking = append(lacking, w)
		}
	}
	return lacking, b.String(), err
}

// Accepted returns those of some wrong command lines that a program accepts, or of which it prints a report all the same.
func Accepted(run func(args []string, w io.Writer) error, wrong ...string) (accepted []string) {
	for _, line := range wrong {
		var b bytes.Buffer
		if err := run(strings.Fields(line), &b); err == nil || b.Len() > 0 {
			accepted = append(accepted, line)
		}
	}
	return accepted
}
