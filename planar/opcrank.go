package planar

import (
	"example.com/twopoint/internal/trig"
	"gonum.org/v1/gonum/spatial/r2"
)

// A crank is a body that is pinned to a known one and turned by an input.
type crank struct {
	drive  int
	u      r2.Vec // unit vector of the angle at input 0
	on, of spot
}

// cranked returns the op for a pin of a body that was turned just before, by one
// input and nothing else.
func cranked(turn op, p *pin) (*crank, bool) {
	s, ok := turn.(*spin)
	if !ok || s.body != p.of.body || len(s.by.bodies)+len(s.by.phase) > 0 || len(s.by.in) != 1 || s.by.in[0].Coef != 1 {
		return nil, false
	}
	return &crank{drive: s.by.in[0].Index, u: s.by.u, on: p.on, of: p.of}, true
}

func (o *crank) place(_, to *scene) status {
	s, c := trig.Sincos(to.in[o.drive].Pos)
	to.m[o.of.body].Pose.Axis = turned(r2.Vec{X: c, Y: s}, o.u)
	to.hang(&o.of, to.place(&o.on))
	return solved
}

func (o *crank) rates(sc *scene) bool {
	m, in := &sc.m[o.of.body], &sc.in[o.drive]
	m.Omega, m.Alpha = in.Vel, in.Acc
	p := sc.m[o.on.body].At(o.on.at)
	sc.carry(&o.of, p.Vel, p.Acc)
	return true
}

func (o *crank) move(was, to *scene) status {
	if o.on.body != 0 {
		o.place(was, to)
		o.rates(to)
		return solved
	}
	in, m := &to.in[o.drive], &to.m[o.of.body]
	s, c := trig.Sincos(in.Pos)
	u := turned(r2.Vec{X: c, Y: s}, o.u)
	r := turned(u, o.of.at)
	w, al, w2 := in.Vel, in.Acc, in.Vel*in.Vel
	m.Pose.Axis = u
	m.Pose.Origin = r2.Vec{X: o.on.at.X - r.X, Y: o.on.at.Y - r.Y}
	m.Vel = r2.Vec{X: w * r.Y, Y: -w * r.X}
	m.Acc = r2.Vec{X: al*r.Y + w2*r.X, Y: w2*r.Y - al*r.X}
	m.Omega, m.Alpha = w, al
	return solved
}
