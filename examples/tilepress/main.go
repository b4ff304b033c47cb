// Command tilepress follows a crank press through a recorded encoder log: where
// the ram is, how fast, with what acceleration and from which terms, how far the
// measured ram is from the ideal one, and which crank speed gives a ram speed.
//
//	go run ./examples/tilepress
//	go run ./examples/tilepress -log mine.csv -machine mine.json -ram-speed -0.1
//	go run ./examples/tilepress -log - -json < mine.csv
//
// The roof-tile press is an invented machine, and its log is made up. The results
// are ideal kinematics: rigid links without clearance or wear. They are no safety
// function; guarding and stopping a press follow local codes and the judgement of
// a licensed engineer.
package main

import (
	"bytes"
	_ "embed"
	"errors"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
)

//go:embed log.csv
var sampleLog []byte

//go:embed machine.json
var sampleMachine []byte

// options are what the flags say.
type options struct {
	log, machine string
	every        int
	window       int
	margin       float64
	ramSpeed     float64
	strict, json bool
}

func main() {
	err := run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)
	if errors.Is(err, flag.ErrHelp) {
		return
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, "tilepress:", err)
		os.Exit(1)
	}
}

func run(args []string, stdin io.Reader, stdout, stderr io.Writer) error {
	o, err := parse(args, stderr)
	if err != nil {
		return err
	}
	m, err := readMachine(o.machine)
	if err != nil {
		return err
	}
	var log io.Reader = bytes.NewReader(sampleLog)
	switch o.log {
	case "":
	case "-":
		log = stdin
	default:
		f, err := os.Open(o.log)
		if err != nil {
			return err
		}
		defer f.Close()
		log = f
	}
	return follow(o, m, log, stdout, stderr)
}

func parse(args []string, stderr io.Writer) (options, error) {
	var o options
	f := flag.NewFlagSet("tilepress", flag.ContinueOnError)
	f.SetOutput(stderr)
	f.StringVar(&o.log, "log", "", "CSV `file` with time_s, crank_counts, ram_m; - reads standard input (default: an invented recording)")
	f.StringVar(&o.machine, "machine", "", "JSON `file` with the dimensions of press and encoder (default: the invented press)")
	f.IntVar(&o.every, "every", 100, "print every `n`th tick")
	f.IntVar(&o.window, "window", 25, "samples from which speed and acceleration of the crank are taken")
	f.Float64Var(&o.margin, "margin", 0.1, "report where the ram is within this `margin` of a dead centre: the sine of the angle of crank and rod")
	f.Float64Var(&o.ramSpeed, "ram-speed", -0.2, "commanded ram speed in `m/s`, positive away from the crank")
	f.BoolVar(&o.strict, "strict", false, "stop at a malformed line instead of skipping it")
	f.BoolVar(&o.json, "json", false, "print JSON lines instead of tables")
	if err := f.Parse(args); err != nil {
		return o, err
	}
	if f.NArg() > 0 {
		return o, fmt.Errorf("what is %q? All input is given with flags", f.Arg(0))
	}
	if o.every < 1 {
		return o, fmt.Errorf("-every %d: must be at least 1", o.every)
	}
	if !(o.margin >= 0 && o.margin <= 1) {
		return o, fmt.Errorf("-margin %v: must be from 0 to 1", o.margin)
	}
	if math.IsNaN(o.ramSpeed) || math.IsInf(o.ramSpeed, 0) {
		return o, fmt.Errorf("-ram-speed %v: must be a finite number", o.ramSpeed)
	}
	return o, nil
}
