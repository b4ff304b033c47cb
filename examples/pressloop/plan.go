package main

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
)

const (
	headroom  = 0.97  // of the motor's limits, for what happens between nodes of the plan
	clockRamp = 0.05  // least time in which the clock goes from standstill to full rate, s
	planStep  = 0.001 // of the profile's time, s
)

// A plan slows the profile's clock so that the motor keeps its limits. With s the
// time on that clock, u = ds/dt its rate, w = du/dt and q(s) the motor's angle,
//
//	dq/dt = q'u,  d²q/dt² = q'w + q''u²
//
// and the same for the ram with x(s). All are linear in z = u² and w, and
// dz/ds = 2w: between two nodes w is constant. Backwards from the end the greatest z
// from which the rest of the way can be driven is found, then forwards the
// fastest that stays below. Source: time-optimal control along a given path
// (J. E. Bobrow, S. Dubowsky, J. S. Gibson 1985; from memory).
//
// The plan ends at rest before the margin falls below that at which to hold.
type plan struct {
	profile *profile
	ds      float64   // between nodes
	u, t    []float64 // at the nodes: rate of the clock, and the time
	held    bool      // ends before the profile does, at the margin
	i       int       // node before the last time asked for
}

// A half is the half-plane a·w + b·z ≤ c.
type half struct{ a, b, c float64 }

// bounds are all that hold at a node, those of the step to the next one first.
type bounds [12]half

func newPlan(p *profile, b back, l limits) (*plan, error) {
	end, held, err := reach(p, &b, l.Hold)
	if err != nil {
		return nil, err
	}
	n := max(int(math.Ceil(end/planStep)), 2)
	pl := &plan{profile: p, ds: end / float64(n), u: make([]float64, n+1), t: make([]float64, n+1), held: held}
	z := make([]float64, n+1)
	for i := n; i >= 0; i-- {
		next := 1.0
		if i < n {
			next = z[i+1]
		}
		all, most, err := pl.bounds(i, next, &b, l)
		if err != nil {
			return nil, err
		}
		if i == n && held {
			most = 0
		}
		z[i] = greatest(all, most)
	}
	for i := range n {
		all, _, _ := pl.bounds(i, z[i+1], &b, l)
		z[i+1] = max(0, min(z[i+1], z[i]+2*pl.ds*steepest(all, z[i])))
	}
	for i := range z {
		pl.u[i] = math.Sqrt(z[i])
		if i > 0 {
			pl.t[i] = pl.t[i-1] + 2*pl.ds/(pl.u[i-1]+pl.u[i])
		}
	}
	return pl, nil
}

// reach returns where on the profile's clock the margin falls below hold, or the
// profile's end. Where the first place lies below it there is nothing to plan.
func reach(p *profile, b *back, hold float64) (end float64, held bool, err error) {
	clear := func(s float64) bool {
		ram, _ := p.at(s)
		_, margin, err := b.motor(rigid.Coordinate{Pos: ram.Pos})
		return err == nil && margin >= hold
	}
	if !clear(0) {
		return 0, false, fmt.Errorf("start: within margin %g of a dead centre, or out of reach", hold)
	}
	for lo, hi := 0.0, 0.0; lo < p.end; lo = hi {
		if hi = min(lo+planStep, p.end); clear(hi) {
			continue
		}
		for range 50 {
			if mid := (lo + hi) / 2; clear(mid) {
				lo = mid
			} else {
				hi = mid
			}
		}
		return lo, true, nil
	}
	return p.end, false, nil
}

// bounds returns what limits w and z at a node, and the greatest z that the motor's
// speed allows: motor and ram at the node and at the next one, where z is greater by
// 2w·ds, the clock, and the step to z = next at most.
func (p *plan) bounds(i int, next float64, b *back, l limits) (bounds, float64, error) {
	h := bounds{{2 * p.ds, 1, next}, {-2 * p.ds, -1, 0}, {1, 0, 1 / clockRamp}, {-1, 0, 1 / clockRamp}}
	var most float64
	for j, ds := range [2]float64{0, p.ds} {
		ram, acc := p.profile.at(min(float64(i)*p.ds+ds, p.profile.end))
		q, _, err := b.motor(ram)
		if err != nil {
			return h, 0, fmt.Errorf("ram at %g m: %w", ram.Pos, err)
		}
		if j == 0 {
			most = headroom * l.Speed / math.Abs(q.Vel)
		}
		a, c := q.Vel+2*ds*q.Acc, headroom*l.Acc
		ra, rb := ram.Vel+2*ds*ram.Acc, ram.Acc
		copy(h[4+4*j:], []half{{a, q.Acc, c}, {-a, -q.Acc, c}, {ra, rb, acc}, {-ra, -rb, acc}})
	}
	return h, min(1, most*most), nil
}

// greatest returns the greatest z, at most most, for which some w obeys all bounds:
// those that push w up and those that push it down are added so that w drops out
// (Fourier–Motzkin elimination). z = w = 0 obeys them all.
func greatest(all bounds, most float64) float64 {
	z := most
	limit := func(b, c float64) {
		if b > 0 {
			z = min(z, c/b)
		}
	}
	for _, up := range all {
		if up.a == 0 {
			limit(up.b, up.c)
		}
		for _, down := range all {
			if up.a > 0 && down.a < 0 {
				limit(up.b*-down.a+down.b*up.a, up.c*-down.a+down.c*up.a)
			}
		}
	}
	return z
}

// steepest returns the greatest w at z.
func steepest(all bounds, z float64) float64 {
	w := math.Inf(1)
	for _, h := range all[2:] {
		if h.a > 0 {
			w = min(w, (h.c-h.b*z)/h.a)
		}
	}
	return w
}

// length returns how long the plan takes, in s.
func (p *plan) length() float64 { return p.t[len(p.t)-1] }

// slowest returns the least rate of the clock while the ram moves, and the ram's
// place there.
func (p *plan) slowest() (rate, ram float64) {
	rate = math.Inf(1)
	for i, u := range p.u {
		if c, _ := p.profile.at(float64(i) * p.ds); u < rate && u > 0 {
			rate, ram = u, c.Pos
		}
	}
	return rate, ram
}

// next returns the commanded motion of the ram at time t after the start, and the
// rate of the clock. Before and after the plan the ram rests.
func (p *plan) next(t float64) (rigid.Coordinate, float64) {
	last := len(p.t) - 2
	t = max(t, 0)
	for p.i > 0 && t < p.t[p.i] {
		p.i--
	}
	for p.i < last && t >= p.t[p.i+1] {
		p.i++
	}
	i := p.i
	w := (p.u[i+1] - p.u[i]) * (p.u[i+1] + p.u[i]) / (2 * p.ds)
	clock := rigid.Coordinate{Pos: float64(i) * p.ds, Vel: p.u[i], Acc: w}.After(t - p.t[i])
	if t >= p.length() {
		clock = rigid.Coordinate{Pos: float64(last+1) * p.ds}
	}
	ram, _ := p.profile.at(clock.Pos)
	c := rigid.Coefficients{Out: ram.Pos, First: ram.Vel, Second: ram.Acc}
	return c.Output(clock.Vel, clock.Acc), clock.Vel
}
