// Command report runs the verification suite and prints one line a case.
//
//	go run ./verify/report [-family NAME] [-all] [-json FILE] [-spoil RELATIVE]
//
// -json writes all cases as a list of objects {id, family, kind, source, expected, got, error, tolerance, ok}, null where
// there is no number; the file appears whole or not at all. -all evaluates every triple of the family "estimates", of
// which the slow ones are sampled otherwise. -spoil multiplies every field under test by 1 + RELATIVE
// first, to see which cases notice.
//
// The exit status is 0 if all cases pass, 1 if one fails, 2 if the command could not do its work.
package main

import (
	"context"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"strings"

	"example.com/boundpole/field"
	"example.com/boundpole/verify"
)

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	status := run(ctx, os.Args[1:], os.Stdout, os.Stderr)
	stop()
	os.Exit(status)
}

// run is the program; it returns the exit status.
func run(ctx context.Context, args []string, out, complaints io.Writer) int {
	flags := flag.NewFlagSet("report", flag.ContinueOnError)
	flags.SetOutput(complaints)
	family := flags.String("family", "", "run only the family `NAME`")
	all := flags.Bool("all", false, "evaluate every triple of the estimates, not a fixed sample of the slow ones: minutes")
	file := flags.String("json", "", "write the cases to `FILE`")
	spoil := flags.Float64("spoil", 0, "multiply every field under test by 1 + `RELATIVE`, to see the suite fail")
	flags.Usage = func() {
		fmt.Fprintln(complaints, "usage: report [-family NAME] [-all] [-json FILE] [-spoil RELATIVE]")
		flags.PrintDefaults()
		fmt.Fprintln(complaints, "families:", strings.Join(names(), ", "))
	}
	if err := flags.Parse(args); err != nil {
		return 2
	}
	if flags.NArg() > 0 {
		fmt.Fprintf(complaints, "report: argument %q is not used; give flags only\n", flags.Arg(0))
		return 2
	}
	o := &verify.Options{Family: *family, All: *all}
	if *spoil != 0 {
		o.Alter = func(src field.Source) field.Source { return field.Scaled{Source: src, Factor: 1 + *spoil} }
	}
	cases, err := verify.Run(ctx, o)
	if err != nil {
		fmt.Fprintf(complaints, "report: %v\n", err)
		return 2
	}
	if *file != "" {
		if err := writeJSON(*file, cases); err != nil {
			fmt.Fprintf(complaints, "report: %v\n", err)
			return 2
		}
	}
	if err := writeTable(out, cases); err != nil {
		fmt.Fprintf(complaints, "report: %v\n", err)
		return 2
	}
	for i := range cases {
		if !cases[i].OK {
			return 1
		}
	}
	return 0
}

func names() []string {
	var list []string
	for _, f := range verify.Families() {
		list = append(list, fmt.Sprintf("%q", f.Name))
	}
	return list
}
