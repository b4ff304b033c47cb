// Command pressloop runs a crank press from a control loop with a fixed tick: a
// jerk-limited program of the ram is mapped back to the motor at each tick, its
// clock slowed where the motor would exceed its limits, and held before a dead
// centre. Whatever goes wrong ends in a stop command with its reason, as -fault shows.
//
//	go run ./examples/pressloop
//	go run ./examples/pressloop -fault glitch
//	go run ./examples/pressloop -realtime -cycles 3 -log run.csv
//	go run ./examples/pressloop -h
//
// The machine is described by a JSON file; press.json beside this file is the
// default, and its fields are those of type config.
//
// The roof-tile press is an invented machine and its axis is simulated. The results
// are ideal kinematics: rigid links without clearance or wear. They are no safety
// function; stopping and guarding a press follow local codes and the judgement of
// a licensed engineer, and must hold when this software fails.
package main

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
	"os/signal"
	"runtime"
	"syscall"
	"time"

	"example.com/twopoint/examples/internal/files"
	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// options are what the flags say.
type options struct {
	config, log, fault string
	at                 float64
	cycles             int64
	every              int
	real               bool
}

// errStopped is the end of a run that did not come to the end of its program; the
// reason is printed already.
var errStopped = errors.New("stopped")

func main() {
	ctx, cancel := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer cancel()
	err := run(ctx, os.Args[1:], os.Stdout, os.Stderr)
	switch {
	case err == nil, errors.Is(err, flag.ErrHelp):
	case err == errStopped:
		os.Exit(3)
	default:
		fmt.Fprintln(os.Stderr, "pressloop:", err)
		os.Exit(1)
	}
}

func run(ctx context.Context, args []string, stdout, stderr io.Writer) error {
	o, err := parse(args, stderr)
	if err != nil {
		return err
	}
	c, err := readConfig(o.config)
	if err != nil {
		return err
	}
	if o.cycles > 1 && !c.closed() {
		return fmt.Errorf("-cycles %d: the last move must end at the start", o.cycles)
	}
	r, err := prepare(ctx, c, o)
	if err != nil {
		return err
	}
	var log *files.Whole
	if o.log != "" {
		if log, err = files.CreateWhole(o.log); err != nil {
			return err
		}
	}
	late := r.drive(o)
	if log != nil {
		if err := log.Finish(writeCSV(log, r.loop.rec, c.Tick, r.loop.stopped)); err != nil {
			return err
		}
	}
	if err := report(stdout, o, c, r, late); err != nil {
		return err
	}
	if r.loop.stopped.why != done {
		return errStopped
	}
	return nil
}

// A rig is all that a run needs.
type rig struct {
	loop *loop
	plan *plan
	axis *simulated
}

// prepare does all that allocates and all that may fail, before the loop.
func prepare(ctx context.Context, c *config, o options) (*rig, error) {
	f, err := findFault(o.fault)
	if err != nil {
		return nil, err
	}
	if o.at >= 0 {
		f.at = o.at
	}
	press, err := slidercrank.New(c.Press)
	if err != nil {
		return nil, err
	}
	b := back{press: press, knee: c.Knee, gear: c.Gear}
	start, moves, err := f.spoil(press, c)
	if err != nil {
		return nil, err
	}
	motor, _, err := b.motor(rigid.Coordinate{Pos: start})
	if err != nil {
		return nil, err
	}
	pl, err := newPlan(newProfile(c.Start, moves), b, c.Limits)
	if err != nil {
		return nil, err
	}
	if end := pl.length() * float64(o.cycles); o.at > end {
		return nil, fmt.Errorf("-at %v: the program is over after %.3f s", o.at, end)
	}
	r := &rig{plan: pl, axis: newSimulated(c, motor.Pos)}
	if r.loop, err = newLoop(ctx, c, b, pl, o.cycles); err != nil {
		return nil, err
	}
	r.loop.axis, r.loop.clock = r.axis, &simulatedTime{}
	inject(r.loop, r.axis, f)
	return r, nil
}

// settle is how long the runtime has, after the collection before the loop, to end work
// of its own, whose allocations would count as the loop's.
const settle = 10 * time.Millisecond

// drive runs the loop, and returns by how much the ticker was late at worst.
func (r *rig) drive(o options) time.Duration {
	runtime.GC()
	time.Sleep(settle)
	if !o.real {
		r.loop.run()
		return 0
	}
	rt := newRealTime(time.Duration(math.Round(r.axis.dt * 1e9)))
	defer rt.ticker.Stop()
	if j, ok := r.loop.clock.(badClock); ok {
		j.clock = rt
	} else {
		r.loop.clock = rt
	}
	r.loop.run()
	return rt.late
}

func parse(args []string, stderr io.Writer) (options, error) {
	var o options
	f := flag.NewFlagSet("pressloop", flag.ContinueOnError)
	f.SetOutput(stderr)
	f.StringVar(&o.config, "config", "", "JSON `file` with the machine and its program (default: the invented press)")
	f.StringVar(&o.log, "log", "", "write the run, at most its last 524288 ticks, to this CSV `file`, whole or not at all")
	f.StringVar(&o.fault, "fault", "", "`name` of a fault to inject, see below")
	f.Float64Var(&o.at, "at", -1, "inject it at this time, in `s` from the program's start; negative: when it shows best")
	f.Int64Var(&o.cycles, "cycles", 1, "repeat the program `n` times")
	f.IntVar(&o.every, "every", 100, "print every `n`th tick")
	f.BoolVar(&o.real, "realtime", false, "tick in real time instead of simulated time")
	f.Usage = func() {
		fmt.Fprintln(stderr, "Pressloop runs an invented roof-tile press on a simulated axis from a control loop with a fixed")
		fmt.Fprintln(stderr, "tick. Every run ends in a stop command with its reason. Exit status: 0 program done, 3 stopped")
		fmt.Fprintln(stderr, "for another reason, 1 wrong flag, file or config. It is an example, not a safety function.")
		fmt.Fprintln(stderr, "\nFlags:")
		f.PrintDefaults()
		fmt.Fprintf(stderr, "\nFaults:\n%s", faultNames())
	}
	if err := f.Parse(args); err != nil {
		return o, err
	}
	if f.NArg() > 0 {
		return o, fmt.Errorf("what is %q? All input is given with flags", f.Arg(0))
	}
	if o.every < 1 {
		return o, fmt.Errorf("-every %d: must be at least 1", o.every)
	}
	if math.IsNaN(o.at) || math.IsInf(o.at, 0) {
		return o, fmt.Errorf("-at %v: must be a finite number", o.at)
	}
	if o.at >= 0 && o.fault == "" {
		return o, fmt.Errorf("-at %v: needs -fault, which says what to inject", o.at)
	}
	if o.cycles < 1 || o.cycles > 1e6 {
		return o, fmt.Errorf("-cycles %d: must be from 1 to 1000000", o.cycles)
	}
	return o, nil
}
