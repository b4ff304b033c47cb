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

// Each fault ends in the stop command with its reason: no setpoint goes out after
// it, and the motor comes to rest within the way that the drive's deceleration takes.
func TestFaults(t *testing.T) {
	tests := []struct {
		fault string
		why   reason
		says  string
	}{
		{"", done, "program done"},
		{"lost-tick", done, "program done"},
		{"lost-ticks", lostTicks, "25 in a row"},
		{"glitch", wildCount, "encoder: step of"},
		{"missed-counts", following, "following error"},
		{"frozen", following, "following error"},
		{"silent", staleSample, "5 ticks old"},
		{"bad-read", axisFailed, "no answer"},
		{"bad-write", axisFailed, "no answer"},
		{"out-of-range", refused, rigid.ErrUnreachable.Error()},
		{"not-a-number", refused, rigid.ErrNotFinite.Error()},
		{"jump", tooFast, "motor speed"},
		{"shake", tooSharp, "motor acceleration"},
		{"overrun", nearDeadCentre, "to a dead centre, least 0.18"},
		{"dead-centre", held, "held before a dead centre"},
		{"jam", following, "following error"},
		{"runaway", following, "following error"},
		{"wrong-start", wrongStart, "wrong start"},
		{"stop-request", interrupted, "stop requested"},
	}
	if len(tests) != len(faults)+1 {
		t.Errorf("%d tests for %d faults", len(tests), len(faults))
	}
	c := sampleConfig(t)
	for _, tt := range tests {
		r := newRig(t, c, options{fault: tt.fault})
		a := runTape(r)
		h := r.loop.stopped
		if h.why != tt.why || !strings.Contains(h.String(), tt.says) {
			t.Errorf("%q: %v, want %q", tt.fault, h, tt.says)
		}
		if a.stops == 0 || a.late > 0 || !a.sim.stopping {
			t.Errorf("%q: %d stop commands, %d setpoints after, stopping %v", tt.fault, a.stops, a.late, a.sim.stopping)
		}
		if v := a.sim.motor.Vel; v != 0 {
			t.Errorf("%q: motor turns at %g rad/s when the loop ends", tt.fault, v)
		}
		v := a.atCommand.Vel
		if way := math.Abs(a.sim.motor.Pos - a.atCommand.Pos); way > v*v/(2*c.Limits.Stop)+math.Abs(v)*c.Tick {
			t.Errorf("%q: motor went on by %g rad from %g rad/s", tt.fault, way, v)
		}
		if out, _, err := press(t, "-fault", tt.fault); !strings.Contains(out, "stop command: "+h.String()) || (err == nil) != (tt.why == done) {
			t.Errorf("%q: %v, printed\n%s", tt.fault, err, out)
		}
	}
}

// A fault at any time is noticed within 40 ms, a mechanism's or the drive's fault too.
func TestFaultsAtAnyTime(t *testing.T) {
	c := sampleConfig(t)
	for _, f := range faults {
		switch f.name {
		case "lost-tick", "overrun", "dead-centre", "wrong-start", "jam", "frozen", "missed-counts":
			continue // tolerated, or noticed as soon as the ram moves
		}
		for at := 0.02; at < 1.7; at += 0.13 {
			r, err := prepare(context.Background(), c, options{fault: f.name, at: at, cycles: 1})
			if err != nil {
				t.Fatal(err)
			}
			a := runTape(r)
			late := float64(r.loop.stopped.tick-r.loop.start)*c.Tick - at
			if h := r.loop.stopped; h.why == done || late > 0.04 || a.sim.motor.Vel != 0 {
				t.Errorf("%s at %.2f s: %v after %.3f s", f.name, at, h, late)
			}
		}
	}
}

// The limits hold at every tick, by differences of the commanded positions, for the
// motor and, through the press driven forwards, for the ram; and the margin by the
// cross product of crank and rod.
func TestLimits(t *testing.T) {
	machines := 60
	if testing.Short() {
		machines = 8
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
	if slowed < machines/4 || stopped < 2 {
		t.Errorf("of %d machines %d slowed the clock and %d held: too few to tell", machines, slowed, stopped)
	}
}

// The ram of the simulated machine, where it truly is, keeps to its path within
// 0.05 mm, and the path is the profile's: at each clock rate the place is one of it.
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
	if worst > 0.05*rigid.Millimetre || worst == 0 {
		t.Errorf("ram is off by %g mm", worst/rigid.Millimetre)
	}
	last := c.Moves[len(c.Moves)-1].To
	if x := forward(t, c, a.sent[len(a.sent)-1]).Slide.Pos; math.Abs(x-last) > 1e-12 {
		t.Errorf("ram ends at %g, want %g", x, last)
	}
}

// A run allocates nothing, whatever ends it.
func TestNoAllocation(t *testing.T) {
	c := sampleConfig(t)
	for _, f := range append([]fault{{}}, faults...) {
		loops := []*loop{newRig(t, c, options{fault: f.name}).loop, newRig(t, c, options{fault: f.name}).loop}
		n := testing.AllocsPerRun(1, func() { // runs twice, the first time unmeasured
			loops[0].run()
			loops = loops[1:]
		})
		if n != 0 {
			t.Errorf("%q: %g allocations", f.name, n)
		}
	}
}

// A thousand cycles end where one does, tick numbers counted as whole numbers.
func TestCycles(t *testing.T) {
	c := sampleConfig(t)
	n := int64(1000)
	if testing.Short() {
		n = 50
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
	c := sampleConfig(b)
	b.ReportAllocs()
	var l *loop
	for tick := int64(0); b.Loop(); tick++ {
		if l == nil || l.stopped.why != goOn {
			l, tick = newRig(b, c, options{cycles: 1000}).loop, 1
		}
		l.tick(tick)
	}
}
