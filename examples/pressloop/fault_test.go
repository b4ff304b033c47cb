package main

import (
	"context"
	"math"
	"strings"
	"testing"

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

// A fault at any time is noticed within 40 ms; a single lost tick is not one.
func TestFaultsAtAnyTime(t *testing.T) {
	c := sampleConfig(t)
	step := 0.13
	if testing.Short() {
		step = 0.6
	}
	for _, f := range faults {
		switch f.name {
		case "overrun", "dead-centre", "wrong-start", "jam", "frozen", "missed-counts":
			continue // noticed when the ram moves, or at a place
		}
		for at := 0.02; at < 1.7; at += step {
			r, err := prepare(context.Background(), c, options{fault: f.name, at: at, cycles: 1})
			if err != nil {
				t.Fatal(err)
			}
			a := runTape(r)
			if h := r.loop.stopped; f.name == "lost-tick" {
				if h.why != done {
					t.Errorf("%s at %.2f s: %v", f.name, at, h)
				}
				continue
			}
			late := float64(r.loop.stopped.tick-r.loop.start)*c.Tick - at
			if h := r.loop.stopped; h.why == done || late > 0.04 || a.sim.motor.Vel != 0 {
				t.Errorf("%s at %.2f s: %v after %.3f s", f.name, at, h, late)
			}
		}
	}
}
