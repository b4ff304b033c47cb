package planar

import (
	"math"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// An rpr solves a block on a slotted link, each pinned to a known body.
type rpr struct {
	k        dyad.RPR
	i, at    int    // its number among the dyads, and among the RPR ones
	a, c     spot   // the outer pins
	one, two spot   // block and slotted link, and the outer pins in them
	u1, u2   r2.Vec // what turns the slot's direction into the axes of block and link
	size     float64
	limit    float64
	seen     []int
}

func (o *rpr) place(was, to *scene) status {
	a, c := to.place(&o.a), to.place(&o.c)
	d := r2.Sub(a, c)
	t, g := &to.slots[o.at], &to.guard[o.i]
	d2 := r2.Dot(d, d)
	g.d, g.room = d, d2-o.k.E*o.k.E
	if !o.k.Place(t, d, float64(to.branch[o.i])) {
		if st := o.flat(t, d); st != solved {
			return st
		}
	}
	to.m[o.one.body].Pose.Axis = turned(t.U, o.u1)
	to.m[o.two.body].Pose.Axis = turned(t.U, o.u2)
	to.hang(&o.one, a)
	to.hang(&o.two, c)
	if !to.count(was, o.one.body) || !to.count(was, o.two.body) {
		return tooLong
	}
	if w := &was.guard[o.i]; !g.clear(w, math.Max(d2, r2.Dot(w.d, w.d))) {
		return doubtful
	}
	return solved
}

// flat places the dyad at its limit, d square to the slot, that rounding has passed.
func (o *rpr) flat(t *dyad.Slot, d r2.Vec) status {
	l, e := r2.Norm(d), math.Abs(o.k.E)
	if !(e-l <= o.limit) {
		return unreachable
	}
	if !(l > o.limit) {
		return singular
	}
	k := math.Copysign(1/l, o.k.E)
	*t = dyad.Slot{U: r2.Vec{X: k * d.Y, Y: -k * d.X}}
	return solved
}

func (o *rpr) rates(sc *scene) bool {
	t := &sc.slots[o.at]
	if o.margin(sc) < rigid.LeastMargin {
		return false
	}
	a, c := sc.m[o.a.body].At(o.a.at), sc.m[o.c.body].At(o.c.at)
	w, v := o.k.Rates(t, r2.Sub(a.Vel, c.Vel))
	al, _ := o.k.Rates(t, o.k.Bias(t, r2.Sub(a.Acc, c.Acc), w, v))
	m1, m2 := &sc.m[o.one.body], &sc.m[o.two.body]
	m1.Omega, m1.Alpha, m2.Omega, m2.Alpha = w, al, w, al
	sc.carry(&o.one, a.Vel, a.Acc)
	sc.carry(&o.two, c.Vel, c.Acc)
	return true
}

func (o *rpr) margin(sc *scene) float64 { return o.k.Margin(&sc.slots[o.at], o.size) }

func (o *rpr) gap(sc *scene) float64 {
	return math.Max(math.Abs(o.k.E)-r2.Norm(sc.guard[o.i].d), 0)
}

func (o *rpr) choose(sc *scene) status { return sc.nearest(o, o.i, o.seen, left, right) }

func (o *rpr) rooms(sc *scene) (r [2]room, n int) {
	g := &sc.guard[o.i]
	va, aa := sc.swing(&o.a)
	vc, ac := sc.swing(&o.c)
	d2 := square(g.d, r2.Sub(va, vc), r2.Sub(aa, ac))
	return [2]room{d2.less(room{value: o.k.E * o.k.E}, math.Max(d2.value, o.size*o.size))}, 1
}

// A meet places bodies of known angle by a point that they share and that runs on
// two lines.
type meet struct {
	at       int // its number among those
	one, two track
	of       []spot // the bodies, and the point in them
}

func (o *meet) place(was, to *scene) status {
	l1, l2 := o.one.line(to), o.two.line(to)
	t := &to.meets[o.at]
	before := was.meets[o.at].Kappa
	if !t.Place(&l1, &l2) {
		return singular
	}
	if before*t.Kappa < 0 {
		return unreachable // the lines have been parallel on the way
	}
	p := along(&l1, t.S1)
	for i := range o.of {
		to.hang(&o.of[i], p)
	}
	return solved
}

func (o *meet) rates(sc *scene) bool {
	t := &sc.meets[o.at]
	if t.Margin() < rigid.LeastMargin {
		return false
	}
	l1, l2 := o.one.moving(sc), o.two.moving(sc)
	d := l1.Drift(t.S1)
	v1, v2 := t.Rates(r2.Sub(l2.Drift(t.S2), d))
	b := l1.Bias(t.S1, v1)
	a1, _ := t.Rates(r2.Sub(l2.Bias(t.S2, v2), b))
	vel, acc := r2.Add(d, r2.Scale(v1, l1.U)), r2.Add(b, r2.Scale(a1, l1.U))
	for i := range o.of {
		sc.carry(&o.of[i], vel, acc)
	}
	return true
}

func (o *meet) margin(sc *scene) float64 { return sc.meets[o.at].Margin() }

func (o *meet) gap(sc *scene) float64 {
	l1, l2 := o.one.line(sc), o.two.line(sc)
	return math.Abs(cross(l1.U, r2.Sub(along(&l2, 0), along(&l1, 0))))
}

func (o *meet) choose(sc *scene) status {
	sc.meets[o.at] = dyad.Meeting{}
	return o.place(sc, sc)
}

// A roll turns a pinion, pinned at its centre, on a rack that is known.
type roll struct {
	pinion spot // its centre in it
	centre spot // the same on a known body
	rack   spot
	u      r2.Vec // along the rack
	rate   float64
	value  float64
	phase  int      // index of a joint, or −1
	by     angleSum // the rack's angle
}

// place solves  u·(c − p) + R·(θ − θrack) = value  for θ.
func (o *roll) place(_, to *scene) status {
	c, m := to.place(&o.centre), &to.m[o.rack.body]
	s := o.value - r2.Dot(turned(m.Pose.Axis, o.u), r2.Sub(c, to.place(&o.rack)))
	if o.phase >= 0 {
		s += to.phase[o.phase]
	}
	angle := o.by.value(to) + s/o.rate
	sin, cos := trig.Sincos(angle)
	to.m[o.pinion.body].Pose.Axis = r2.Vec{X: cos, Y: sin}
	to.turns[o.pinion.body] = 0
	to.turns[o.pinion.body] = int32(math.Round((angle - to.total(o.pinion.body)) / rigid.Revolution))
	to.hang(&o.pinion, c)
	return solved
}

func (o *roll) rates(sc *scene) bool {
	p := sc.m[o.centre.body].At(o.centre.at)
	rack, m := &sc.m[o.rack.body], &sc.m[o.pinion.body]
	seen := rack.Observe(p)
	m.Omega = rack.Omega - r2.Dot(o.u, seen.Vel)/o.rate
	m.Alpha = rack.Alpha - r2.Dot(o.u, seen.Acc)/o.rate
	sc.carry(&o.pinion, p.Vel, p.Acc)
	return true
}
