// Command cyclereport sweeps a linkage through a cycle, on all processors, and
// writes what an engineer looks at: a table, and pictures of motion, acceleration
// terms, a coupler curve, the linkage itself, hodograph, pole curves and tolerance
// band.
//
//	go -C examples/cyclereport run .
//	go -C examples/cyclereport run . -config mine.json -out report -format png -n 3600
//
// The sample is the clay strike-off of a roof-tile press line, an invented machine:
// a quick-return drive with a ram. The results are ideal kinematics, no safety
// function; guarding and stopping a machine follow local codes and the judgement of
// a licensed engineer.
package main

import (
	"context"
	_ "embed"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"path/filepath"

	"example.com/twopoint/examples/internal/files"
)

//go:embed config.json
var sample []byte

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	err := run(ctx, os.Args[1:], os.Stdout, os.Stderr)
	if errors.Is(err, flag.ErrHelp) {
		return
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, "cyclereport:", err)
		os.Exit(1)
	}
}

func run(ctx context.Context, args []string, stdout, stderr io.Writer) error {
	f := flag.NewFlagSet("cyclereport", flag.ContinueOnError)
	f.SetOutput(stderr)
	config := f.String("config", "", "JSON `file` with the linkage and what to show (default: the invented strike-off)")
	out := f.String("out", "cyclereport-out", "`folder` to write to; it is made if it is missing")
	format := f.String("format", "svg", "`format` of the pictures: svg or png")
	n := f.Int("n", 721, "`number` of positions, both ends of the cycle among them")
	if err := f.Parse(args); err != nil {
		return err
	}
	switch {
	case f.NArg() > 0:
		return fmt.Errorf("what is %q? All input is given with flags", f.Arg(0))
	case *n < 3 || *n > 10_000_000:
		return fmt.Errorf("-n %d: must be from 3 to 10 000 000", *n)
	case *format != "svg" && *format != "png":
		return fmt.Errorf("-format %q: svg or png", *format)
	}
	m, err := readMachine(*config)
	if err != nil {
		return err
	}
	rows, err := sweep(ctx, m, *n, stderr)
	if err != nil {
		return err
	}
	if err := os.MkdirAll(*out, 0o755); err != nil {
		return err
	}
	for _, p := range append([]page{{"cycle.csv", writeTable}}, pictures(*format)...) {
		if err := ctx.Err(); err != nil {
			return err
		}
		path := filepath.Join(*out, p.name)
		if err := writeWhole(path, func(w io.Writer) error { return p.write(w, m, rows) }); err != nil {
			return err
		}
		fmt.Fprintln(stdout, path)
	}
	return nil
}

// A page is a file of the report.
type page struct {
	name  string
	write func(w io.Writer, m *machine, rows []row) error
}

// writeWhole writes a file whole or not at all.
func writeWhole(path string, write func(io.Writer) error) error {
	f, err := files.CreateWhole(path)
	if err != nil {
		return err
	}
	return f.Finish(write(f))
}
