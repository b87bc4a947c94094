// Command scene runs scene files: bodies with polarization, magnetization or charge go in, what every face carries and the
// field where it is wanted come out.
//
//	go run ./examples/scene                      the embedded default scene
//	go run ./examples/scene -out DIR scene.json  a scene of your own, with results.json and data files in DIR
//	go run ./examples/scene -check scene.json    read and validate only
//	go run ./examples/scene -schema              the JSON Schema of scene files
//	go run ./examples/scene -format              the description of scene files
//
// Exit status: 0 done; 1 the scene or a flag is wrong or something could not be written, no file is written; 2 a value
// missed its hand check or the wanted accuracy, everything is written and says so.
package main

import (
	"bytes"
	"context"
	"embed"
	"errors"
	"flag"
	"fmt"
	"io"
	"io/fs"
	"os"
	"os/signal"
	"syscall"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

//go:embed default.json
var defaults embed.FS

func main() {
	signal.Ignore(sigPipe) // a broken pipe is an error of the write, so that temporary files are removed
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	status := run(ctx, os.Args[1:], os.Stdout, os.Stderr)
	stop()
	os.Exit(status)
}

// sigPipe is SIGPIPE, by its number because not every platform has the name.
const sigPipe = syscall.Signal(13)

// Exit statuses.
const (
	done   = 0
	wrong  = 1
	missed = 2
)

// options are the flags and the scene file of a command line.
type options struct {
	out                   string
	file                  string // "": the default scene
	check, schema, format bool
	help                  []byte // what -help prints, if it was asked for
}

// run is the program; it returns the exit status.
func run(ctx context.Context, args []string, stdout, stderr io.Writer) int {
	status, err := do(ctx, args, stdout)
	if errors.Is(err, context.Canceled) {
		err = errors.New("scene: stopped by a signal; no file is written")
	}
	if err != nil {
		fmt.Fprintln(stderr, scenefile.OneLine(err.Error()))
		return wrong
	}
	return status
}

// do is run with the error still to be printed.
func do(ctx context.Context, args []string, stdout io.Writer) (status int, err error) {
	o, err := parse(args)
	switch {
	case err != nil:
		return wrong, err
	case o.help != nil:
		return done, printed(stdout, o.help)
	case o.schema:
		text, err := scenefile.Format().Schema()
		if err != nil {
			return wrong, err
		}
		return done, printed(stdout, text)
	case o.format:
		return done, printed(stdout, scenefile.Format().Markdown())
	}
	scene, err := read(o.file)
	if err != nil {
		return wrong, err
	}
	setup, err := solve.Build(scene)
	if err != nil {
		return wrong, err
	}
	if o.check {
		return done, printed(stdout, verdict(setup))
	}
	return answer(ctx, setup, o.out, stdout)
}

// parse reads the command line.
func parse(args []string) (*options, error) {
	o := &options{}
	flags := flag.NewFlagSet("scene", flag.ContinueOnError)
	flags.SetOutput(io.Discard)
	flags.Usage = func() {}
	flags.StringVar(&o.out, "out", "", "folder `DIR` for results.json and data files; made if absent")
	flags.BoolVar(&o.check, "check", false, "read and validate the scene only")
	flags.BoolVar(&o.schema, "schema", false, "print the JSON Schema of scene files")
	flags.BoolVar(&o.format, "format", false, "print the description of scene files")
	err := flags.Parse(args)
	if errors.Is(err, flag.ErrHelp) {
		var b bytes.Buffer
		fmt.Fprint(&b, "usage: scene [-out DIR] [-check] [scene.json]   or   scene -schema   or   scene -format\n"+
			"Without a scene file the default scene is run.\n")
		flags.SetOutput(&b)
		flags.PrintDefaults()
		o.help = b.Bytes()
		return o, nil
	}
	if err != nil {
		return nil, fmt.Errorf("scene: %w; see scene -help", err)
	}
	outGiven := false
	flags.Visit(func(f *flag.Flag) { outGiven = outGiven || f.Name == "out" })
	switch {
	case outGiven && o.out == "":
		return nil, errors.New("scene: -out names no folder; write -out DIR")
	case flags.NArg() > 1:
		return nil, fmt.Errorf("scene: one scene file at a time (got %d: %q); flags stand before the file", flags.NArg(), flags.Args())
	case flags.NArg() == 1 && flags.Arg(0) == "":
		return nil, errors.New("scene: the name of the scene file is empty; name a file, or none for the default scene")
	case (o.schema || o.format) && (flags.NArg() > 0 || o.check || outGiven || o.schema && o.format):
		return nil, errors.New("scene: -schema and -format stand alone; leave the rest out")
	}
	o.file = flags.Arg(0)
	return o, nil
}

// printed writes a whole text to stdout.
func printed(stdout io.Writer, text []byte) error {
	if _, err := stdout.Write(text); err != nil {
		if pe := (*fs.PathError)(nil); errors.As(err, &pe) {
			err = pe.Err
		}
		return fmt.Errorf("scene: cannot write to standard output: %w; no file is written", err)
	}
	return nil
}

// read reads a scene file, or the default scene if there is none.
func read(name string) (*scenefile.Scene, error) {
	if name == "" {
		return scenefile.ReadFS(defaults, "default.json")
	}
	return scenefile.Read(name)
}

// verdict says what -check has found.
func verdict(setup *solve.Setup) []byte {
	var b bytes.Buffer
	count := func(n int, what string) string {
		if n != 1 {
			what += "s"
		}
		return fmt.Sprintf("%d %s", n, what)
	}
	points := 0
	for i := range setup.Scene.Wanted {
		points += setup.Scene.Wanted[i].Count()
	}
	fmt.Fprintf(&b, "The scene is right: %s, %s, %s.\n", count(len(setup.Parts), "part"), count(len(setup.Scene.Wanted), "request"),
		count(points, "point"))
	for _, w := range setup.Warnings {
		fmt.Fprintln(&b, "Warning:", scenefile.OneLine(w))
	}
	for _, s := range setup.Scene.Skipped {
		fmt.Fprintf(&b, "Not written: %s (%s at %s); this release does not write it.\n", scenefile.OneLine(s.File), s.Key, s.Pointer)
	}
	return b.Bytes()
}
