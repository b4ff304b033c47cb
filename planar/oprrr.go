package planar

import (
	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// An rrr solves two links between pins on bodies that are known.
type rrr struct {
	k        dyad.RRR
	i, tri   int    // its number among the dyads, and among the RRR ones
	a, c     spot   // the outer pins on the known bodies
	one, two spot   // the links, and the outer pins in them
	u1, u2   r2.Vec // what turns the links' vectors AB, CB into their axes
	most     float64
	limit    float64 // m beyond a limit that counts as the limit
	cell     *cell   // of a parallelogram cell
	seen     []int   // links that a guess tells of
}

func newRRR(a, c, one, two spot, ab, cb r2.Vec) *rrr {
	b1, b2 := r2.Norm(ab), r2.Norm(cb)
	o := &rrr{k: dyad.NewRRR(b1, b2), a: a, c: c, one: one, two: two}
	o.u1 = r2.Vec{X: ab.X / b1, Y: -ab.Y / b1}
	o.u2 = r2.Vec{X: cb.X / b2, Y: -cb.Y / b2}
	o.most, _ = o.k.Reach()
	return o
}

func (o *rrr) place(was, to *scene) status {
	a, c := to.place(&o.a), to.place(&o.c)
	d := r2.Vec{X: c.X - a.X, Y: c.Y - a.Y}
	t, g := &to.tri[o.tri], &to.guard[o.i]
	st := solved
	side := to.branch[o.i]
	if side > left {
		g.d = d
		o.cell.place(to, t, side, a, c)
	} else {
		g.d, g.room = d, o.k.Room(d.X*d.X+d.Y*d.Y)
		if !o.k.Place(t, d, float64(side)) {
			if st = o.flat(t, d); st != solved {
				return st
			}
		}
		if !g.clear(&was.guard[o.i], o.most) {
			st = doubtful
		}
	}
	ab, cb := o.k.Axes(t)
	to.m[o.one.body].Pose.Axis = turned(ab, o.u1)
	to.m[o.two.body].Pose.Axis = turned(cb, o.u2)
	to.hang(&o.one, a)
	to.hang(&o.two, c)
	if !to.count(was, o.one.body) || !to.count(was, o.two.body) {
		return tooLong
	}
	return st
}

// move solves place and rates in one; what is not ordinary it leaves to those two.
func (o *rrr) move(was, to *scene) status {
	side := to.branch[o.i]
	if side > left {
		return both(o, was, to)
	}
	a, c := &to.m[o.a.body], &to.m[o.c.body]
	ra, rc := turned(a.Pose.Axis, o.a.at), turned(c.Pose.Axis, o.c.at)
	pa := r2.Vec{X: a.Pose.Origin.X + ra.X, Y: a.Pose.Origin.Y + ra.Y}
	va, ba := swing(a, ra)
	pc := r2.Vec{X: c.Pose.Origin.X + rc.X, Y: c.Pose.Origin.Y + rc.Y}
	var vc, bc r2.Vec
	if o.c.body != 0 {
		vc, bc = swing(c, rc)
	}
	d := r2.Vec{X: pc.X - pa.X, Y: pc.Y - pa.Y}
	w, z := r2.Vec{X: va.X - vc.X, Y: va.Y - vc.Y}, r2.Vec{X: ba.X - bc.X, Y: ba.Y - bc.Y}
	t := &to.tri[o.tri]
	var ab, cb dyad.Link
	if !o.k.Move(t, &ab, &cb, d, w, z, float64(side)) || o.k.Margin(t) < rigid.LeastMargin {
		return both(o, was, to)
	}
	o.set(&to.m[o.one.body], &ab, o.u1, o.one.at, pa, va, ba)
	o.set(&to.m[o.two.body], &cb, o.u2, o.two.at, pc, vc, bc)
	if !to.count(was, o.one.body) || !to.count(was, o.two.body) {
		return tooLong
	}
	g := &to.guard[o.i]
	g.d, g.room = d, o.k.Room(d.X*d.X+d.Y*d.Y)
	if !g.clear(&was.guard[o.i], o.most) {
		return doubtful
	}
	return solved
}

// swing returns velocity and acceleration of a point of a body at r from its origin.
func swing(m *rigid.Motion, r r2.Vec) (vel, acc r2.Vec) {
	w, al, w2 := m.Omega, m.Alpha, m.Omega*m.Omega
	return r2.Vec{X: m.Vel.X - w*r.Y, Y: m.Vel.Y + w*r.X},
		r2.Vec{X: m.Acc.X - al*r.Y - w2*r.X, Y: m.Acc.Y + al*r.X - w2*r.Y}
}

// set writes the motion of a link from its direction and that of its outer pin,
// which is at own in it.
func (o *rrr) set(m *rigid.Motion, l *dyad.Link, u, own, pos, vel, acc r2.Vec) {
	axis := turned(l.Axis, u)
	r := turned(axis, own)
	w, al, w2 := l.Omega, l.Alpha, l.Omega*l.Omega
	m.Pose.Axis = axis
	m.Pose.Origin = r2.Vec{X: pos.X - r.X, Y: pos.Y - r.Y}
	m.Vel = r2.Vec{X: vel.X + w*r.Y, Y: vel.Y - w*r.X}
	m.Acc = r2.Vec{X: acc.X + al*r.Y + w2*r.X, Y: acc.Y - al*r.X + w2*r.Y}
	m.Omega, m.Alpha = w, al
}

// flat places the dyad at a limit that rounding has passed.
func (o *rrr) flat(t *dyad.Triangle, d r2.Vec) status {
	l := r2.Norm(d)
	if !(o.k.Gap(l) <= o.limit) {
		return unreachable
	}
	if !(l > o.limit) {
		return singular
	}
	o.k.Flatten(t, d)
	return solved
}

func (o *rrr) rates(sc *scene) bool {
	t := &sc.tri[o.tri]
	a, c := sc.m[o.a.body].At(o.a.at), sc.m[o.c.body].At(o.c.at)
	m1, m2 := &sc.m[o.one.body], &sc.m[o.two.body]
	if side := sc.branch[o.i]; side > left {
		o.cell.rates(sc, o, side, &a, &c)
	} else {
		if o.k.Margin(t) < rigid.LeastMargin {
			return false
		}
		w1, w2 := t.Rates(r2.Vec{X: a.Vel.X - c.Vel.X, Y: a.Vel.Y - c.Vel.Y})
		m1.Omega, m2.Omega = w1, w2
		m1.Alpha, m2.Alpha = t.Rates(t.Bias(r2.Vec{X: a.Acc.X - c.Acc.X, Y: a.Acc.Y - c.Acc.Y}, w1, w2))
	}
	sc.carry(&o.one, a.Vel, a.Acc)
	sc.carry(&o.two, c.Vel, c.Acc)
	return true
}

func (o *rrr) margin(sc *scene) float64 {
	if sc.branch[o.i] > left {
		return 1
	}
	return o.k.Margin(&sc.tri[o.tri])
}

func (o *rrr) gap(sc *scene) float64 { return o.k.Gap(r2.Norm(sc.guard[o.i].d)) }

func (o *rrr) choose(sc *scene) status {
	if o.cell != nil {
		return sc.nearest(o, o.i, o.seen, o.cell.branches()...)
	}
	return sc.nearest(o, o.i, o.seen, left, right)
}

func (o *rrr) rooms(sc *scene) (r [2]room, n int) {
	if sc.branch[o.i] > left {
		return r, 0
	}
	most, least := o.k.Reach()
	g := &sc.guard[o.i]
	va, aa := sc.swing(&o.a)
	vc, ac := sc.swing(&o.c)
	d2 := square(g.d, r2.Sub(vc, va), r2.Sub(ac, aa))
	return [2]room{room{value: most}.less(d2, most), d2.less(room{value: least}, most)}, 2
}
