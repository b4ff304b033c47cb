package main

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A fault is what -fault injects, and when in the sample's program it shows best.
type fault struct {
	name string
	at   float64 // s
	what string
}

var faults = []fault{
	{"lost-tick", 0.3, "one tick is lost, which is allowed"},
	{"lost-ticks", 0.3, "25 ticks are lost in a row"},
	{"glitch", 0.3, "one encoder sample is a quarter of a motor turn off"},
	{"missed-counts", 0.3, "the encoder misses 3 counts in each tick"},
	{"frozen", 0.3, "the encoder's count stands still"},
	{"silent", 0.3, "no fresh encoder samples come"},
	{"bad-read", 0.3, "reading the encoder fails"},
	{"bad-write", 0.3, "the drive refuses a setpoint"},
	{"out-of-range", 0.3, "a command 1 m beyond its path"},
	{"not-a-number", 0.3, "a command that is NaN"},
	{"jump", 0.3, "a command 5 mm off its path"},
	{"shake", 0.3, "commands to and fro by 20 µm"},
	{"overrun", 0.8, "commands go on at their speed, past the end of the move"},
	{"dead-centre", 0, "the program's second move goes to the dead centre"},
	{"jam", 0.3, "the motor is blocked"},
	{"runaway", 0.3, "the drive accelerates by itself"},
	{"wrong-start", 0, "the ram stands 10 mm from the program's start"},
	{"stop-request", 0.3, "a stop is asked for, as by Ctrl-C"},
}

// findFault returns the fault of that name; the empty name is none.
func findFault(name string) (fault, error) {
	for _, f := range faults {
		if f.name == name {
			return f, nil
		}
	}
	if name == "" {
		return fault{at: math.Inf(1)}, nil
	}
	return fault{}, fmt.Errorf("-fault %s: there are\n%s", name, faultNames())
}

// spoil returns where the ram stands and the moves of the program, with those faults
// that are there before the loop begins.
func (f fault) spoil(press *slidercrank.Linkage, c *config) (start float64, moves []move, err error) {
	start, moves = c.Start, slices.Clone(c.Moves)
	switch f.name {
	case "wrong-start":
		start += 10 * rigid.Millimetre
	case "dead-centre":
		outer, _, err := press.DeadCentres()
		if err != nil {
			return 0, nil, err
		}
		moves[min(1, len(moves)-1)].To = outer.Slide
	}
	return start, moves, nil
}

func faultNames() string {
	var b strings.Builder
	for _, f := range faults {
		fmt.Fprintf(&b, "  %-14s %s\n", f.name, f.what)
	}
	return b.String()
}

var errInjected = errors.New("no answer from the drive (injected)")

// An injector stands between a loop and its clock, source and axis, and spoils
// what comes through from a tick on.
type injector struct {
	fault   string
	at      int64 // tick
	tick    int64 // now
	clock   clock
	source  source
	axis    *simulated
	kept    sample
	gone    rigid.Coordinate
	request chan struct{}
}

type (
	badClock  struct{ *injector }
	badSource struct{ *injector }
	badAxis   struct{ *injector }
)

func inject(l *loop, sim *simulated, f fault) {
	if f.name == "" {
		return
	}
	at := int64(math.Round(f.at/sim.dt)) + window // the program starts when the window is full
	j := &injector{fault: f.name, at: at, clock: l.clock, source: l.source, axis: sim, request: make(chan struct{})}
	l.clock, l.source, l.axis = badClock{j}, badSource{j}, badAxis{j}
	if f.name == "stop-request" {
		l.requested = j.request
	}
}

func (j badClock) next() int64 {
	j.tick = j.clock.next()
	if j.tick != j.at {
		return j.tick
	}
	switch j.fault {
	case "lost-tick":
		j.lose(1)
	case "lost-ticks":
		j.lose(25)
	case "jam":
		j.axis.jammed = true
	case "runaway":
		j.axis.runaway = true
	case "stop-request":
		close(j.request)
	}
	return j.tick
}

func (j *injector) lose(n int) {
	for range n {
		j.tick = j.clock.next()
	}
}

func (j badSource) next(t float64) (rigid.Coordinate, float64) {
	ram, rate := j.source.next(t)
	if j.tick < j.at {
		return ram, rate
	}
	switch j.fault {
	case "out-of-range":
		ram.Pos++
	case "not-a-number":
		ram.Pos = math.NaN()
	case "jump":
		ram.Pos += 5 * rigid.Millimetre
	case "shake":
		ram.Pos += 0.02 * rigid.Millimetre * float64(j.tick%2)
	case "overrun":
		if j.gone.Vel == 0 {
			j.gone = rigid.Coordinate{Pos: ram.Pos, Vel: ram.Vel}
		}
		ram = j.gone.After(float64(j.tick-j.at) * j.axis.dt)
	}
	return ram, rate
}

func (j badAxis) read(tick int64) (sample, error) {
	s, err := j.axis.read(tick)
	if tick < j.at || err != nil {
		j.kept = s
		return s, err
	}
	switch j.fault {
	case "glitch":
		if tick == j.at {
			s.count += j.axis.enc.PerTurn / 4
		}
	case "missed-counts":
		s.count += 3 * (tick - j.at)
	case "frozen":
		s.count = j.kept.count
	case "silent":
		s = j.kept
	case "bad-read":
		return sample{}, errInjected
	}
	return s, nil
}

func (j badAxis) write(tick int64, motor rigid.Coordinate) error {
	if j.fault == "bad-write" && j.tick >= j.at {
		return errInjected
	}
	return j.axis.write(tick, motor)
}

func (j badAxis) stop() { j.axis.stop() }
