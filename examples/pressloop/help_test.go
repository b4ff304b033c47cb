package main

import (
	"bytes"
	"context"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func sampleConfig(t testing.TB) *config {
	t.Helper()
	c, err := readConfig("")
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func newRig(t testing.TB, c *config, o options) *rig {
	t.Helper()
	o.cycles = max(o.cycles, 1)
	o.at = -1
	r, err := prepare(context.Background(), c, o)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// A tape is an axis that keeps what was sent to it, and where the motor was.
type tape struct {
	axis
	sim       *simulated
	ticks     []int64
	sent      []rigid.Coordinate
	motor     []rigid.Coordinate // at each read
	stops     int
	late      int // setpoints after the stop command
	atCommand rigid.Coordinate
}

func (a *tape) write(tick int64, m rigid.Coordinate) error {
	if a.stops > 0 {
		a.late++
	}
	a.ticks, a.sent = append(a.ticks, tick), append(a.sent, m)
	return a.axis.write(tick, m)
}

func (a *tape) stop() {
	if a.stops == 0 {
		a.atCommand = a.sim.motor
	}
	a.stops++
	a.axis.stop()
}

func (a *tape) read(tick int64) (s sample, err error) {
	s, err = a.axis.read(tick)
	a.motor = append(a.motor, a.sim.motor)
	return s, err
}

// runTape runs a rig with its axis on tape.
func runTape(r *rig) *tape {
	a := &tape{axis: r.loop.axis, sim: r.axis}
	r.loop.axis = a
	r.loop.run()
	return a
}

// forward is the press driven from the motor, the other way than the loop goes.
func forward(t testing.TB, c *config, motor rigid.Coordinate) slidercrank.State {
	t.Helper()
	press, err := slidercrank.New(c.Press)
	if err != nil {
		t.Fatal(err)
	}
	var st slidercrank.State
	if err := press.Solve(&st, rigid.Coordinate{Pos: motor.Pos / c.Gear, Vel: motor.Vel / c.Gear, Acc: motor.Acc / c.Gear}); err != nil {
		t.Fatal(err)
	}
	return st
}

// random returns a machine and a program that it can do.
func random(t testing.TB, r *rand.Rand) *config {
	t.Helper()
	between := func(lo, hi float64) float64 { return lo + (hi-lo)*r.Float64() }
	c := sampleConfig(t)
	c.Press.Crank = between(0.05, 0.2)
	c.Press.Rod = c.Press.Crank * between(2, 6)
	c.Press.Offset = c.Press.Crank * between(-0.5, 0.5)
	c.Press.Branch = slidercrank.Branch(r.IntN(2))
	c.Press.Mount = rigid.Placement{X: 3, Angle: between(-3, 3)}
	c.Knee = rigid.Side(r.IntN(2))
	c.Gear = between(5, 30) * float64(1-2*r.IntN(2))
	c.Encoder.Reverse = r.IntN(2) == 1
	c.Encoder.Zero = r.Int64N(1e9) - 5e8
	c.Limits.Speed, c.Limits.Acc = between(40, 200), between(500, 3000)
	press, err := slidercrank.New(c.Press)
	if err != nil {
		t.Fatal(err)
	}
	outer, inner, err := press.DeadCentres()
	if err != nil {
		t.Fatal(err)
	}
	place := func() float64 { return inner.Slide + (outer.Slide-inner.Slide)*between(0.1, 0.9) }
	c.Start = place()
	for i := range c.Moves {
		c.Moves[i] = move{To: place(), Speed: between(0.05, 1), Acc: between(1, 10), Jerk: between(20, 200), Dwell: between(0, 0.1)}
	}
	if r.IntN(3) == 0 {
		c.Moves[1].To = inner.Slide
	}
	if err := c.check(); err != nil {
		t.Fatal(err)
	}
	return c
}

func press(t testing.TB, args ...string) (stdout, stderr string, err error) {
	t.Helper()
	var out, errs bytes.Buffer
	err = run(context.Background(), args, &out, &errs)
	return out.String(), errs.String(), err
}

func file(t *testing.T, name, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// differences returns the first and second divided differences of a function of
// time at uneven times: means of its first and second derivative.
func differences(t, x []float64) (first, second []float64) {
	for i := 1; i < len(x); i++ {
		first = append(first, (x[i]-x[i-1])/(t[i]-t[i-1]))
		if i > 1 {
			second = append(second, (first[i-1]-first[i-2])*2/(t[i]-t[i-2]))
		}
	}
	return first, second
}

func greatestSize(x []float64) (m float64) {
	for _, v := range x {
		m = math.Max(m, math.Abs(v))
	}
	return m
}
