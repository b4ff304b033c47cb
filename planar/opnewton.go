package planar

import (
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A group solves a group of higher class by Newton's method.
type group struct {
	n      *newton
	at     int   // of its workspace in scene.desks
	bodies []int // that it turns
	linear bool  // whether it turns none, and so has one solution
}

func (o *group) place(was, to *scene) status {
	if was == to {
		return o.choose(to)
	}
	if st := o.n.place(to, &was.desks[o.at], &to.desks[o.at]); st != solved {
		return st
	}
	for _, b := range o.bodies {
		if !to.count(was, b) {
			return tooLong
		}
	}
	return solved
}

func (o *group) rates(sc *scene) bool {
	d := &sc.desks[o.at]
	if !o.n.regular(d) {
		d.still()
		return false
	}
	if o.n.rates(sc, d); d.last[broken] != 0 {
		d.still()
		return false
	}
	clear(d.later)
	d.last[pathSpeed], d.last[pathScale] = 0, 1
	if len(sc.in) == 1 && sc.in[0].Acc == 0 {
		d.last[pathSpeed] = sc.in[0].Vel
	}
	return true
}

func (o *group) read(sc *scene, unread []bool) { o.n.read(sc, &sc.desks[o.at], unread) }

func (o *group) margin(sc *scene) float64 { return o.n.margin(&sc.desks[o.at]) }
func (o *group) gap(sc *scene) float64    { return sc.desks[o.at].open() }
func (o *group) choose(sc *scene) status  { return o.n.assemble(sc, &sc.desks[o.at]) }

// stuck says what it means that an op can't take the least step: a group of higher
// class of which the margin is nearly used up is at a limit, or where two motions
// part. An unknown nears a limit as the root of the distance, x = c√δ, so that
//
//	ẍ/ẋ² = 1/x
//
// which is about 1/margin; where motions part the rates stay as they are. On the way
// from a limit the unknowns slow down.
func (p *program) stuck(op int, at *scene) status {
	const low, parts = 0.05, 0.03
	g, ok := p.ops[op].(*group)
	if !ok {
		return tooLong
	}
	d, margin, v, a, slows := &at.desks[g.at], g.margin(at), 0.0, 0.0, 0.0
	for i := range d.vel {
		v, a = math.Max(v, math.Abs(d.vel[i])), math.Max(a, math.Abs(d.acc[i]))
		slows -= d.vel[i] * d.acc[i]
	}
	switch {
	case !(margin < low):
		return tooLong
	case a*margin < parts*v*v:
		return singular
	case slows > 0:
		return tooLong
	}
	return unreachable
}

// foresee reports whether the path rates of all groups at a place are known for a
// single drive that moves on so far: they grow with its speed.
func (s *scene) foresee(speed float64) bool {
	for i := range s.desks {
		last := s.desks[i].last
		if last[pathSpeed] == 0 {
			return false
		}
		last[pathScale] = speed / last[pathSpeed]
	}
	return true
}

// drive takes all rates from path rates, for which a single drive has the speed in
// path, to those for its motion in:
//
//	v = v_path·k,  a = a_path·k² + v_path·k′,  k = in.Vel/path,  k′ = in.Acc/path
func (s *scene) drive(path float64, in rigid.Coordinate) {
	k, more := in.Vel/path, in.Acc/path
	for i := range s.m {
		m := &s.m[i]
		m.Acc = r2.Vec{X: k*k*m.Acc.X + more*m.Vel.X, Y: k*k*m.Acc.Y + more*m.Vel.Y}
		m.Vel = r2.Vec{X: k * m.Vel.X, Y: k * m.Vel.Y}
		m.Alpha = k*k*m.Alpha + more*m.Omega
		m.Omega *= k
	}
	for i := range s.psi {
		p := &s.psi[i]
		p.Vel, p.Acc = k*p.Vel, k*k*p.Acc+more*p.Vel
	}
}
