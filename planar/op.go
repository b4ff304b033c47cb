package planar

import (
	"math"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// An op is one step of a program.
type op interface {
	// place solves poses of bodies at the inputs of to; was is the place that the
	// motion comes from.
	place(was, to *scene) status
	// rates solves their rates at a place that is solved, and reports whether they
	// are determined.
	rates(sc *scene) bool
	// move is place and rates, singular where those are not determined.
	move(was, to *scene) status
}

// both is move for an op that has no shorter way.
func both(o op, was, to *scene) status {
	if st := o.place(was, to); st != solved {
		return st
	}
	if !o.rates(to) {
		return singular
	}
	return solved
}

func (o *spin) move(was, to *scene) status   { return both(o, was, to) }
func (o *follow) move(was, to *scene) status { return both(o, was, to) }
func (o *pin) move(was, to *scene) status    { return both(o, was, to) }
func (o *ride) move(was, to *scene) status   { return both(o, was, to) }
func (o *read) move(was, to *scene) status   { return both(o, was, to) }
func (o *seated) move(was, to *scene) status { return both(o, was, to) }
func (o *fused) move(was, to *scene) status  { return both(o, was, to) }
func (o *rrp) move(was, to *scene) status    { return both(o, was, to) }
func (o *rpr) move(was, to *scene) status    { return both(o, was, to) }
func (o *meet) move(was, to *scene) status   { return both(o, was, to) }
func (o *roll) move(was, to *scene) status   { return both(o, was, to) }
func (o *group) move(was, to *scene) status  { return both(o, was, to) }

// A solver is an op that has equations to solve, and so can fail.
type solver interface {
	op
	// margin returns the least sine between the motions that close the loops.
	margin(sc *scene) float64
	// choose solves poses at Assemble, from the rough ones in sc: on the branch
	// that is nearest.
	choose(sc *scene) status
	// gap returns how far the loop is from closing, in m, where place or choose
	// has just failed.
	gap(sc *scene) float64
}

// An angleSum is an angle that follows from others: of bodies, inputs and phases.
//
//	Σ Coef·θ + Σ Coef·in + Σ Coef·phase + c
type angleSum struct {
	bodies []term // counted ones
	in     []term
	phase  []term
	c      float64
	u      r2.Vec // unit vector at angle c
}

// follows reports whether the angle is that of a body and a constant.
func (a *angleSum) follows() bool {
	return len(a.bodies) == 1 && a.bodies[0].Coef == 1 && len(a.in) == 0 && len(a.phase) == 0
}

// most is the largest number of times that a unit vector is multiplied with
// itself rather than its angle taken.
const most = 4

// axis returns the unit vector at the angle. Whole multiples of a body's angle are
// powers of its axis, which have no need of whole turns.
func (a *angleSum) axis(sc *scene) r2.Vec {
	u, angle := a.u, 0.0
	for _, t := range a.bodies {
		n := math.Abs(t.Coef)
		if n != math.Trunc(n) || n > most {
			angle += t.Coef * sc.total(t.Index)
			continue
		}
		v := sc.m[t.Index].Pose.Axis
		v.Y = math.Copysign(1, t.Coef) * v.Y
		for range int(n) {
			u = turned(v, u)
		}
	}
	for _, t := range a.in {
		angle += t.Coef * sc.in[t.Index].Pos
	}
	for _, t := range a.phase {
		angle += t.Coef * sc.phase[t.Index]
	}
	if angle != 0 {
		s, c := trig.Sincos(angle)
		u = turned(r2.Vec{X: c, Y: s}, u)
	}
	n := 1.5 - 0.5*(u.X*u.X+u.Y*u.Y)
	return r2.Vec{X: n * u.X, Y: n * u.Y}
}

// rates returns the derivatives of the angle.
func (a *angleSum) rates(sc *scene) (vel, acc float64) {
	for _, t := range a.bodies {
		vel += t.Coef * sc.m[t.Index].Omega
		acc += t.Coef * sc.m[t.Index].Alpha
	}
	for _, t := range a.in {
		vel += t.Coef * sc.in[t.Index].Vel
		acc += t.Coef * sc.in[t.Index].Acc
	}
	return vel, acc
}

// value returns the angle, whole turns included.
func (a *angleSum) value(sc *scene) float64 {
	angle := a.c
	for _, t := range a.bodies {
		angle += t.Coef * sc.total(t.Index)
	}
	for _, t := range a.in {
		angle += t.Coef * sc.in[t.Index].Pos
	}
	for _, t := range a.phase {
		angle += t.Coef * sc.phase[t.Index]
	}
	return angle
}

// A spin sets a body's angle from others.
type spin struct {
	body int
	by   angleSum
}

func (o *spin) place(_, to *scene) status {
	to.m[o.body].Pose.Axis = o.by.axis(to)
	return solved
}

func (o *spin) rates(sc *scene) bool {
	m := &sc.m[o.body]
	m.Omega, m.Alpha = o.by.rates(sc)
	return true
}

// A follow sets the angle of a body that keeps a fixed one to another.
type follow struct {
	body, to int
	u        r2.Vec
}

func (o *follow) place(_, to *scene) status {
	u := turned(to.m[o.to].Pose.Axis, o.u)
	n := 1.5 - 0.5*(u.X*u.X+u.Y*u.Y)
	to.m[o.body].Pose.Axis = r2.Vec{X: n * u.X, Y: n * u.Y}
	return solved
}

func (o *follow) rates(sc *scene) bool {
	m, to := &sc.m[o.body], &sc.m[o.to]
	m.Omega, m.Alpha = to.Omega, to.Alpha
	return true
}

// A pin places a body of known angle by a point that is known.
type pin struct{ on, of spot }

func (o *pin) place(_, to *scene) status {
	to.hang(&o.of, to.place(&o.on))
	return solved
}

func (o *pin) rates(sc *scene) bool {
	p := sc.m[o.on.body].At(o.on.at)
	sc.carry(&o.of, p.Vel, p.Acc)
	return true
}

// A ride places a body by its motion relative to another.
type ride struct{ body, on, relative int }

func (o *ride) place(was, to *scene) status {
	to.m[o.body].Pose = to.m[o.on].Pose.Compose(to.m[o.relative].Pose)
	if o.body < len(to.turns) && !to.count(was, o.body) {
		return tooLong
	}
	return solved
}

func (o *ride) rates(sc *scene) bool {
	pose := sc.m[o.body].Pose
	sc.m[o.body] = sc.m[o.on].Compose(&sc.m[o.relative])
	sc.m[o.body].Pose = pose
	return true
}

// A read notes a free angle for Newton groups that need it.
type read struct {
	psi int
	of  angleSum
}

func (o *read) place(_, to *scene) status {
	to.psi[o.psi].Pos = o.of.value(to)
	return solved
}

func (o *read) rates(sc *scene) bool {
	p := &sc.psi[o.psi]
	p.Vel, p.Acc = o.of.rates(sc)
	return true
}

// A seated op sets the motion of a link fixed to another.
type seated struct {
	link, body int
	local      rigid.Pose
}

func (o *seated) place(_, to *scene) status {
	to.m[o.link].Pose = to.m[o.body].Pose.Compose(o.local)
	return solved
}

func (o *seated) rates(sc *scene) bool {
	m, b := &sc.m[o.link], &sc.m[o.body]
	p := b.At(o.local.Origin)
	m.Vel, m.Acc, m.Omega, m.Alpha = p.Vel, p.Acc, b.Omega, b.Alpha
	return true
}
