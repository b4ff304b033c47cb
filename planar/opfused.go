package planar

import (
	"math"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A fused solves two links between pins on known bodies of which one at least
// changes its length, or that meet across a body of known angle, pinned to both.
type fused struct {
	i, tri     int
	a, c       spot // the outer pins on the known bodies
	one, two   spot // the links' first bodies, and the outer pins in them
	arm1, arm2 arm
	across     int    // the body between them, or −1
	shift      r2.Vec // from its pin on the first link to that on the second
	limit      float64
	seen       []int
}

func (o *fused) place(was, to *scene) status {
	a, c := to.place(&o.a), to.place(&o.c)
	d := r2.Sub(c, a)
	if o.across >= 0 {
		d = r2.Sub(d, turned(to.m[o.across].Pose.Axis, o.shift))
	}
	l1, l2 := o.arm1.vector(to), o.arm2.vector(to)
	b1, b2 := r2.Norm(l1), r2.Norm(l2)
	k := dyad.NewRRR(b1, b2)
	most, _ := k.Reach()
	t, g := &to.tri[o.tri], &to.guard[o.i]
	g.d, g.room = d, k.Room(r2.Dot(d, d))
	if !(b1 > o.limit && b2 > o.limit) {
		return singular
	}
	if !k.Place(t, d, float64(to.branch[o.i])) {
		flat := rrr{k: k, limit: o.limit}
		if st := flat.flat(t, d); st != solved {
			return st
		}
	}
	ab, cb := k.Axes(t)
	to.m[o.one.body].Pose.Axis = turned(ab, r2.Scale(1/b1, r2.Vec{X: l1.X, Y: -l1.Y}))
	to.m[o.two.body].Pose.Axis = turned(cb, r2.Scale(1/b2, r2.Vec{X: l2.X, Y: -l2.Y}))
	to.hang(&o.one, a)
	to.hang(&o.two, c)
	if !to.count(was, o.one.body) || !to.count(was, o.two.body) {
		return tooLong
	}
	if !o.clear(was, to, most) {
		return doubtful
	}
	return solved
}

// clear is the guard's, with the change of the links' lengths.
func (o *fused) clear(was, to *scene, most float64) bool {
	g := to.guard[o.i]
	t, s := &to.tri[o.tri], &was.tri[o.tri]
	g.d.X += math.Copysign(math.Abs(r2.Norm(t.R)-r2.Norm(s.R))+math.Abs(r2.Norm(t.Q)-r2.Norm(s.Q)), g.d.X-was.guard[o.i].d.X)
	return g.clear(&was.guard[o.i], most)
}

func (o *fused) rates(sc *scene) bool {
	if o.margin(sc) < rigid.LeastMargin {
		return false
	}
	t := &sc.tri[o.tri]
	a, c := sc.m[o.a.body].At(o.a.at), sc.m[o.c.body].At(o.c.at)
	v, z := r2.Sub(a.Vel, c.Vel), r2.Sub(a.Acc, c.Acc)
	if o.across >= 0 {
		m := sc.m[o.across]
		m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
		p := m.At(o.shift)
		v, z = r2.Add(v, p.Vel), r2.Add(z, p.Acc)
	}
	g1, g2 := o.arm1.grow(sc), o.arm2.grow(sc)
	g := dyad.Growth{BVel: g1.vel, BAcc: g1.acc, CVel: g2.vel, CAcc: g2.acc}
	w1, w2 := t.Rates(r2.Add(v, g.Vel(t)))
	al1, al2 := t.Rates(r2.Add(t.Bias(z, w1, w2), g.Acc(t, w1, w2)))
	m1, m2 := &sc.m[o.one.body], &sc.m[o.two.body]
	m1.Omega, m1.Alpha = w1-g1.turn, al1-g1.turnAcc
	m2.Omega, m2.Alpha = w2-g2.turn, al2-g2.turnAcc
	sc.carry(&o.one, a.Vel, a.Acc)
	sc.carry(&o.two, c.Vel, c.Acc)
	return true
}

func (o *fused) margin(sc *scene) float64 {
	t := &sc.tri[o.tri]
	return math.Abs(t.F) / (2 * r2.Norm(t.R) * r2.Norm(t.Q))
}

func (o *fused) gap(sc *scene) float64 {
	k := dyad.NewRRR(r2.Norm(o.arm1.vector(sc)), r2.Norm(o.arm2.vector(sc)))
	return k.Gap(r2.Norm(sc.guard[o.i].d))
}

func (o *fused) choose(sc *scene) status { return sc.nearest(o, o.i, o.seen, left, right) }

func (o *fused) rooms(sc *scene) (r [2]room, n int) {
	g1, g2 := o.arm1.grow(sc), o.arm2.grow(sc)
	b, c := r2.Vec{X: g1.length}, r2.Vec{X: g2.length}
	bv, cv := r2.Scale(g1.vel, b), r2.Scale(g2.vel, c)
	ba, ca := r2.Scale(g1.acc, b), r2.Scale(g2.acc, c)
	far := square(r2.Add(b, c), r2.Add(bv, cv), r2.Add(ba, ca))
	near := square(r2.Sub(b, c), r2.Sub(bv, cv), r2.Sub(ba, ca))
	va, aa := sc.swing(&o.a)
	vc, ac := sc.swing(&o.c)
	v, a := r2.Sub(vc, va), r2.Sub(ac, aa)
	if o.across >= 0 {
		m := rigid.Motion{Pose: sc.m[o.across].Pose, Omega: sc.m[o.across].Omega, Alpha: sc.m[o.across].Alpha}
		p := m.At(o.shift)
		v, a = r2.Sub(v, p.Vel), r2.Sub(a, p.Acc)
	}
	d2 := square(sc.guard[o.i].d, v, a)
	return [2]room{far.less(d2, far.value), d2.less(near, far.value)}, 2
}
