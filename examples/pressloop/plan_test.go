package main

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func samplePlan(t *testing.T, c *config) *plan {
	t.Helper()
	return newRig(t, c, options{}).plan
}

// The plan is no slower than need be: the clock runs at full rate or a limit is
// reached, at each time. A time-optimal motion along a path is always at a limit.
func TestPlanIsFast(t *testing.T) {
	c := sampleConfig(t)
	p := samplePlan(t, c)
	slack := 0
	for i := range len(p.t) - 1 {
		h := (p.t[i] + p.t[i+1]) / 2
		ram, rate := p.next(h)
		b := backOf(t, c)
		q, _, err := b.motor(ram)
		if err != nil {
			t.Fatal(err)
		}
		_, acc := p.profile.at((float64(i) + 0.5) * p.ds)
		w := (p.u[i+1] - p.u[i]) / (p.t[i+1] - p.t[i])
		used := max(rate, math.Abs(q.Vel)/(headroom*c.Limits.Speed), math.Abs(q.Acc)/(headroom*c.Limits.Acc), math.Abs(ram.Acc)/acc, math.Abs(w)*clockRamp)
		if used < 0.98 {
			slack++
		}
		if used > 1.002 {
			t.Errorf("at %g s %g of a limit is used", h, used)
		}
	}
	if slack > len(p.t)/200 {
		t.Errorf("no limit is reached at %d of %d nodes", slack, len(p.t))
	}
}

func backOf(t *testing.T, c *config) back {
	t.Helper()
	press, err := slidercrank.New(c.Press)
	if err != nil {
		t.Fatal(err)
	}
	return back{press: press, knee: c.Knee, gear: c.Gear}
}

// A motor that is fast enough leaves the profile as it is, and limits a hundred
// times narrower leave it so slow that speed alone counts: T = ∫|dq|/v.
func TestPlanLength(t *testing.T) {
	c := sampleConfig(t)
	c.Limits.Speed, c.Limits.Acc = 1e4, 1e6
	p := samplePlan(t, c)
	if math.Abs(p.length()-p.profile.end) > 1e-9 {
		t.Errorf("%g s, the profile %g s", p.length(), p.profile.end)
	}
	c = sampleConfig(t)
	c.Limits.Speed /= 100
	p = samplePlan(t, c)
	way, b := c.Moves[1].Dwell*headroom*c.Limits.Speed, backOf(t, c)
	from := c.Start
	for _, m := range c.Moves {
		q0, _, _ := b.motor(rigid.Coordinate{Pos: from})
		q1, _, _ := b.motor(rigid.Coordinate{Pos: m.To})
		way, from = way+math.Abs(q1.Pos-q0.Pos), m.To
	}
	if want := way / (headroom * c.Limits.Speed); p.length() < want || p.length() > want+0.5 {
		t.Errorf("%g s, want a little above %g", p.length(), want)
	}
}

// The rates that the plan gives are the derivatives of its places.
func TestPlanRates(t *testing.T) {
	p := samplePlan(t, sampleConfig(t))
	const h = 1e-5
	for x := 0.001; x < p.length()-0.001; x += 0.00537 {
		a, _ := p.next(x - h)
		c, _ := p.next(x + h)
		m, _ := p.next(x)
		if d := (c.Pos - a.Pos) / (2 * h); math.Abs(d-m.Vel) > 1e-3 {
			t.Errorf("at %g s the speed is %g, by differences %g", x, m.Vel, d)
		}
		if d := (c.Vel - a.Vel) / (2 * h); math.Abs(d-m.Acc) > 3 {
			t.Errorf("at %g s the acceleration is %g, by differences %g", x, m.Acc, d)
		}
	}
	if a, _ := p.next(-1); a != (rigid.Coordinate{Pos: 0.385}) {
		t.Errorf("before the start %+v", a)
	}
	if a, rate := p.next(1e9); math.Abs(a.Pos-0.385) > 1e-15 || a.Vel != 0 || rate != 0 {
		t.Errorf("after the end %+v", a)
	}
}

// Held, the plan ends at rest at the margin, and its clock with it.
func TestPlanHolds(t *testing.T) {
	c := sampleConfig(t)
	p := newRig(t, c, options{fault: "dead-centre"}).plan
	if !p.held || p.u[len(p.u)-1] != 0 {
		t.Fatalf("held %v, clock at the end %g", p.held, p.u[len(p.u)-1])
	}
	ram, _ := p.next(p.length())
	b := backOf(t, c)
	_, margin, err := b.motor(rigid.Coordinate{Pos: ram.Pos})
	if err != nil || math.Abs(margin-c.Limits.Hold) > 1e-9 || margin < c.Limits.Hold {
		t.Errorf("margin %g at the end, want %g: %v", margin, c.Limits.Hold, err)
	}
}

// The greatest z by elimination, against a search over w.
func TestGreatest(t *testing.T) {
	all := bounds{{0.2, 1, 0.6}, {-0.2, -1, 0}, {1, 0, 3}, {-1, 0, 3}, {2, 4, 5}, {-2, -4, 5}, {-1, 2, 1.1}, {1, -2, 1.1}}
	want := 0.0
	for w := -3.0; w <= 3; w += 1e-4 {
		z := 2.0
		for _, h := range all {
			if h.b > 0 {
				z = min(z, (h.c-h.a*w)/h.b)
			}
		}
		if feasible(all, w, z) {
			want = max(want, z)
		}
	}
	if got := greatest(all, 2); math.Abs(got-want) > 1e-3 || want == 0 || want == 2 {
		t.Errorf("%g, by search %g", got, want)
	}
}

func feasible(all bounds, w, z float64) bool {
	for _, h := range all {
		if h.a*w+h.b*z > h.c+1e-9 {
			return false
		}
	}
	return true
}
