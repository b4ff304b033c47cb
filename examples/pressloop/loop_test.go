package main

import (
	"context"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
	"time"

	"example.com/twopoint/rigid"
)

// The limits hold at every tick, by differences of the commanded positions, for the
// motor and, through the press driven forwards, for the ram; and the margin by the
// cross product of crank and rod.
func TestLimits(t *testing.T) {
	machines := 60
	if testing.Short() {
		machines = 20
	}
	rnd := rand.New(rand.NewPCG(9, 1))
	slowed, stopped := 0, 0
	for n := range machines {
		c := sampleConfig(t)
		if n > 0 {
			c = random(t, rnd)
		}
		r, err := prepare(context.Background(), c, options{cycles: 1, at: -1})
		if err != nil {
			if strings.Contains(err.Error(), "start: within margin") {
				continue
			}
			t.Fatal(err)
		}
		a := runTape(r)
		if h := r.loop.stopped; h.why != done && h.why != held {
			t.Errorf("machine %d: %v", n, h)
			continue
		}
		if r.loop.stopped.why == held {
			stopped++
		}
		if rate, _ := r.plan.slowest(); rate < 0.95 {
			slowed++
		}
		var at, motor, ram []float64
		for i, s := range a.sent {
			st := forward(t, c, s)
			at, motor, ram = append(at, float64(a.ticks[i])*c.Tick), append(motor, s.Pos), append(ram, st.Slide.Pos)
			x, y := st.Crank.Pose.Axis, st.Rod.Pose.Axis
			if m := math.Abs(x.X*y.Y - x.Y*y.X); m < c.Limits.Hold-1e-9 {
				t.Errorf("machine %d: margin %g at %g s, to be held at %g", n, m, at[i], c.Limits.Hold)
			}
		}
		speed, acc := differences(at, motor)
		if v, a := greatestSize(speed), greatestSize(acc); v > c.Limits.Speed || a > c.Limits.Acc {
			t.Errorf("machine %d: motor speed %g of %g, acceleration %g of %g", n, v, c.Limits.Speed, a, c.Limits.Acc)
		}
		var most move
		for _, m := range c.Moves {
			most.Speed, most.Acc = max(most.Speed, m.Speed), max(most.Acc, m.Acc)
		}
		speed, acc = differences(at, ram)
		if v, a := greatestSize(speed), greatestSize(acc); v > most.Speed*(1+1e-9) || a > most.Acc*1.02 {
			t.Errorf("machine %d: ram speed %g of %g, acceleration %g of %g", n, v, most.Speed, a, most.Acc)
		}
	}
	if slowed < machines/4 || stopped < machines/20 {
		t.Errorf("of %d machines %d slowed the clock and %d held: too few to tell", machines, slowed, stopped)
	}
}

// The ram of the simulated machine, where it truly is, keeps to its path within 0.01 mm.
func TestRamFollows(t *testing.T) {
	c := sampleConfig(t)
	r := newRig(t, c, options{})
	a := runTape(r)
	worst := 0.0
	for i, m := range a.motor {
		tick := int64(i + 1)
		if tick < r.loop.start || tick > r.loop.stopped.tick {
			continue
		}
		ram, _ := r.plan.next(float64(tick-r.loop.start) * c.Tick)
		worst = max(worst, math.Abs(forward(t, c, m).Slide.Pos-ram.Pos))
	}
	if worst > 0.01*rigid.Millimetre || worst == 0 {
		t.Errorf("ram is off by %g mm", worst/rigid.Millimetre)
	}
	last := c.Moves[len(c.Moves)-1].To
	if x := forward(t, c, a.sent[len(a.sent)-1]).Slide.Pos; math.Abs(x-last) > 1e-12 {
		t.Errorf("ram ends at %g, want %g", x, last)
	}
}

// The ticks of a run allocate nothing, whatever ends it. Over three runs, so that
// one allocation in a run shows, and a stray one of the runtime's does not.
func TestNoAllocation(t *testing.T) {
	c := sampleConfig(t)
	for _, f := range append([]fault{{}}, faults...) {
		var loops []*loop
		for range 4 {
			loops = append(loops, newRig(t, c, options{fault: f.name}).loop)
		}
		n := testing.AllocsPerRun(3, func() { // and once before, unmeasured
			l := loops[0]
			for loops = loops[1:]; l.stopped.why == goOn || l.last < l.stopped.tick+l.rundown; {
				l.tick(l.clock.next())
			}
		})
		if n != 0 {
			t.Errorf("%q: %g allocations", f.name, n)
		}
	}
}

// Two hundred cycles end where one does, tick numbers counted as whole numbers.
func TestCycles(t *testing.T) {
	c := sampleConfig(t)
	n := int64(200)
	if testing.Short() {
		n = 20
	}
	r := newRig(t, c, options{cycles: n})
	r.loop.run()
	if h := r.loop.stopped; h.why != done {
		t.Fatal(h)
	}
	want := float64(n)*r.plan.length() + window*c.Tick
	if got := float64(r.loop.stopped.tick-r.loop.start) * c.Tick; math.Abs(got-want) > c.Tick {
		t.Errorf("%d cycles take %g s, want %g", n, got, want)
	}
	if ram := forward(t, c, r.axis.motor).Slide.Pos; math.Abs(ram-c.Start) > 0.01*rigid.Millimetre {
		t.Errorf("ram ends at %g, want %g", ram, c.Start)
	}
}

// Each cycle presses once.
func TestCyclesPress(t *testing.T) {
	c := sampleConfig(t)
	a := runTape(newRig(t, c, options{cycles: 3}))
	presses, down := 0, false
	for _, m := range a.sent {
		x := forward(t, c, m).Slide.Pos
		if x > 0.5899 && !down {
			presses++
		}
		down = x > 0.5899 || down && x > 0.5
	}
	if presses != 3 {
		t.Errorf("%d presses in 3 cycles", presses)
	}
}

// The crank may be any number of turns away from the encoder's zero: the loop takes
// it as it stands, and no setpoint is a turn off.
func TestManyTurns(t *testing.T) {
	c := sampleConfig(t)
	for _, turns := range []float64{-12345, 1, 700} {
		r := newRig(t, c, options{})
		r.axis = newSimulated(c, r.axis.motor.Pos+turns*c.Gear*rigid.Revolution)
		r.loop.axis = r.axis
		from := r.axis.motor.Pos
		a := runTape(r)
		if h := r.loop.stopped; h.why != done || math.Abs(r.axis.motor.Pos-from) > 0.01 || len(a.sent) < 1000 {
			t.Errorf("%g turns away: %v, motor from %g to %g", turns, h, from, r.axis.motor.Pos)
		}
	}
}

// The simulated drive stops by itself when no setpoints come.
func TestDriveStopsItself(t *testing.T) {
	c := sampleConfig(t)
	a := newSimulated(c, 1)
	for tick := range int64(100) {
		if err := a.write(tick+1, rigid.Coordinate{Pos: 1 + 0.02*float64(tick), Vel: 20}); err != nil {
			t.Fatal(err)
		}
		if _, err := a.read(tick); err != nil {
			t.Fatal(err)
		}
	}
	if a.motor.Vel < 15 {
		t.Fatalf("motor at %g rad/s", a.motor.Vel)
	}
	if _, err := a.read(150); err != nil || a.motor.Vel != 0 {
		t.Errorf("motor at %g rad/s, 50 ms after the last setpoint: %v", a.motor.Vel, err)
	}
}

// In real time the loop stops as it does in simulated time, and ticks are numbered
// by the time that passes, never twice.
func TestRealTime(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	var out strings.Builder
	if err := run(ctx, []string{"-realtime"}, &out, &out); err != errStopped || !strings.Contains(out.String(), "stop requested") {
		t.Errorf("%v\n%s", err, out.String())
	}
	rt := newRealTime(time.Millisecond)
	defer rt.ticker.Stop()
	first := rt.next()
	time.Sleep(5 * time.Millisecond)
	rt.next()
	if third := rt.next(); third < first+5 {
		t.Errorf("tick %d, then %d after 5 ms and more", first, third)
	}
}

func BenchmarkTick(b *testing.B) {
	l := newRig(b, sampleConfig(b), options{cycles: 1e6}).loop
	b.ReportAllocs()
	for b.Loop() {
		l.tick(l.clock.next())
	}
	if h := l.stopped; h.why != goOn {
		b.Error(h)
	}
}
