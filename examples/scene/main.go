// Command scene runs scene files: bodies with polarization, magnetization or charge go in, what every face carries and the
// field where it is wanted come out.
//
//	go run ./examples/scene                      the embedded default scene
//	go run ./examples/scene -out DIR scene.json  a scene of your own, with results.json and data files in DIR
//	go run ./examples/scene -check scene.json    read and validate only
//	go run ./examples/scene -schema              the JSON Schema of scene files
//	go run ./examples/scene -format              the description of scene files
//
// Exit status: 0 done; 1 the scene or a flag is wrong, nothing is written; 2 a value missed its hand check or the wanted
// accuracy, everything is written and says so.
package main

import (
	"embed"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

//go:embed default.json
var defaults embed.FS

func main() { os.Exit(run(os.Args[1:], os.Stdout, os.Stderr)) }

// Exit statuses.
const (
	done   = 0
	wrong  = 1
	missed = 2
)

// run is the program; it returns the exit status.
func run(args []string, stdout, stderr io.Writer) int {
	fail := func(err error) int {
		fmt.Fprintln(stderr, scenefile.OneLine(err.Error()))
		return wrong
	}
	flags := flag.NewFlagSet("scene", flag.ContinueOnError)
	flags.SetOutput(io.Discard)
	out := flags.String("out", "", "folder for results.json and data files; made if absent")
	check := flags.Bool("check", false, "read and validate the scene only")
	schema := flags.Bool("schema", false, "print the JSON Schema of scene files")
	format := flags.Bool("format", false, "print the description of scene files")
	usage := func(w io.Writer) {
		fmt.Fprintln(w, "usage: scene [-out DIR] [-check] [scene.json]   or   scene -schema   or   scene -format")
		flags.SetOutput(w)
		flags.PrintDefaults()
	}
	switch err := flags.Parse(args); {
	case errors.Is(err, flag.ErrHelp):
		usage(stdout)
		return done
	case err != nil:
		return fail(fmt.Errorf("scene: %w; see scene -help", err))
	case flags.NArg() > 1:
		return fail(fmt.Errorf("scene: one scene file at a time (got %d); flags stand before the file", flags.NArg()))
	case *schema:
		text, err := scenefile.Format().Schema()
		if err != nil {
			return fail(err)
		}
		stdout.Write(text)
		return done
	case *format:
		stdout.Write(scenefile.Format().Markdown())
		return done
	}
	scene, err := read(flags.Arg(0))
	if err != nil {
		return fail(err)
	}
	setup, err := solve.Build(scene)
	if err != nil {
		return fail(err)
	}
	if *check {
		fmt.Fprintf(stdout, "The scene is right: %d parts, %d requests.\n", len(setup.Parts), len(scene.Wanted))
		for _, w := range setup.Warnings {
			fmt.Fprintln(stdout, "Warning:", w)
		}
		return done
	}
	status, err := answer(setup, *out, stdout)
	if err != nil {
		return fail(err)
	}
	return status
}

// read reads a scene file, or the default scene if there is none.
func read(name string) (*scenefile.Scene, error) {
	if name == "" {
		return scenefile.ReadFS(defaults, "default.json")
	}
	return scenefile.Read(name)
}
