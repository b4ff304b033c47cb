// Command presscheck tests a crank press for acceptance, from a log of its motor's
// encoder and its ram's scale: it sets the encoder's zero and the scale's offset, and
// finds slip between motor and crank, counts that the encoder missed, and a link of
// the wrong length.
//
//	go run ./examples/presscheck
//	go run ./examples/presscheck -log mine.csv -config mine.json -report report.txt
//	go run ./examples/presscheck -log - -json < mine.csv
//	go run ./examples/presscheck -h
//
// The press and what is asked of it are described by a JSON file; presscheck.json
// beside this file is the default, and its fields are those of type config.
//
// The roof-tile press is an invented machine, and its logs are made up. The results
// are ideal kinematics: rigid links without clearance or wear. They are no safety
// function, and a pass does not release a machine: that follows local codes and the
// judgement of a licensed engineer.
package main

import (
	"bytes"
	"context"
	"embed"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"syscall"

	"example.com/twopoint/examples/internal/files"
)

//go:embed logs
var logs embed.FS

// options are what the flags say.
type options struct {
	log, config, report string
	strict, json        bool
}

var errInterrupted = errors.New("interrupted")

func main() {
	ctx, cancel := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer cancel()
	status, err := run(ctx, os.Args[1:], os.Stdin, os.Stdout, os.Stderr)
	if err != nil && !errors.Is(err, flag.ErrHelp) {
		fmt.Fprintln(os.Stderr, "presscheck:", err)
	}
	os.Exit(status)
}

// run returns the exit status: 0 the press passes, 1 it fails, 2 it could not be
// checked, with the reason.
func run(ctx context.Context, args []string, stdin io.Reader, stdout, stderr io.Writer) (status int, err error) {
	o, err := parse(args, stderr)
	if errors.Is(err, flag.ErrHelp) {
		return 0, err
	}
	if err != nil {
		return 2, err
	}
	c, err := readConfig(o.config)
	if err != nil {
		return 2, err
	}
	log, err := o.open(stdin)
	if err != nil {
		return 2, err
	}
	defer log.Close()
	var file *files.Whole
	if o.report != "" {
		if file, err = files.CreateWhole(o.report); err != nil {
			return 2, err
		}
	}
	r, err := check(c, until(ctx, log), func(bad error) error {
		if o.strict {
			return bad
		}
		fmt.Fprintln(stderr, "skipped:", bad)
		return nil
	})
	if err != nil {
		if file != nil {
			file.Discard()
		}
		return 2, err
	}
	if err := o.write(r, c, file, stdout); err != nil {
		return 2, err
	}
	return r.Verdict.status(), nil
}

// write writes the report at once, so that it is there as a whole or not at all. With
// a file the verdict alone goes to stdout.
func (o *options) write(r *report, c *config, file *files.Whole, stdout io.Writer) error {
	var text bytes.Buffer
	if !o.json {
		r.text(&text, &c.Tolerance)
	} else if err := r.lines(&text); err != nil {
		return err
	}
	if file != nil {
		_, err := file.Write(text.Bytes())
		if err := file.Finish(err); err != nil {
			return err
		}
		text.Reset()
		fmt.Fprintln(&text, r.Verdict.String())
	}
	_, err := stdout.Write(text.Bytes())
	return err
}

// until returns a reader that ends with errInterrupted when ctx does, even while log
// makes it wait.
func until(ctx context.Context, log io.Reader) io.Reader {
	r, w := io.Pipe()
	context.AfterFunc(ctx, func() { w.CloseWithError(errInterrupted) })
	go func() {
		_, err := io.Copy(w, log)
		w.CloseWithError(err)
	}()
	return r
}

func (o *options) open(stdin io.Reader) (io.ReadCloser, error) {
	switch o.log {
	case "":
		return logs.Open("logs/good.csv")
	case "-":
		return io.NopCloser(stdin), nil
	}
	return os.Open(o.log)
}

func parse(args []string, stderr io.Writer) (options, error) {
	var o options
	f := flag.NewFlagSet("presscheck", flag.ContinueOnError)
	f.SetOutput(stderr)
	f.StringVar(&o.log, "log", "", "CSV `file` with time_s, motor_counts, ram_m; - reads standard input (default: an invented recording)")
	f.StringVar(&o.config, "config", "", "JSON `file` with the press and its tolerances (default: the invented press)")
	f.StringVar(&o.report, "report", "", "write the report to this `file`, whole or not at all, and print the verdict alone")
	f.BoolVar(&o.strict, "strict", false, "stop at a malformed line instead of skipping it")
	f.BoolVar(&o.json, "json", false, "write JSON lines instead of text")
	f.Usage = func() {
		fmt.Fprint(stderr, usage)
		f.PrintDefaults()
	}
	if err := f.Parse(args); err != nil {
		return o, err
	}
	if f.NArg() > 0 {
		return o, fmt.Errorf("what is %q? All input is given with flags", f.Arg(0))
	}
	return o, nil
}

const usage = `Presscheck tests an invented roof-tile press for acceptance, from a log of its
motor's encoder and its ram's scale, of any length. It finds

  slip            the crank falls behind the motor little by little
  missed counts   the encoder's counts jump, or the crank runs ahead of them
  link            a length is off: the difference repeats over the turn
  pattern         the difference repeats over the turn, and no length explains it
  scatter         the ram scale scatters
  glitches        too many samples are off alone
  motion          place, speed or acceleration of the ram is off for no reason above

Exit status: 0 pass, 1 fail, 2 could not check. It is an example, not a safety
function.

Flags:
`
