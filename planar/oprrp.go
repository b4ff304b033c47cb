package planar

import (
	"math"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A track is a line that is known: the guide of a slider, or the line square to a
// driven displacement.
type track struct {
	on   spot      // a point of it
	with int       // the body that it turns with
	u    r2.Vec    // unit vector along it, in that body's axes
	e    float64   // how far left of it the point runs that is guided
	by   *angleSum // or nil: how far the line has moved to its right, in m
}

// line returns the track at its place, without rates.
func (k *track) line(sc *scene) dyad.Line {
	l := dyad.Line{G: sc.place(&k.on), U: turned(sc.m[k.with].Pose.Axis, k.u), E: k.e}
	if k.by != nil {
		l.E -= k.by.value(sc)
	}
	return l
}

// moving returns the track with its rates. A line that moves to its right by s has
// its point G + s·right, right = −U⊥.
func (k *track) moving(sc *scene) dyad.Line {
	p, m := sc.m[k.on.body].At(k.on.at), &sc.m[k.with]
	l := dyad.Line{G: p.Pos, V: p.Vel, A: p.Acc, U: turned(m.Pose.Axis, k.u), Omega: m.Omega, Alpha: m.Alpha, E: k.e}
	if k.by != nil {
		s := k.by.value(sc)
		vel, acc := k.by.rates(sc)
		right := rigid.Motion{Pose: rigid.Pose{Axis: r2.Vec{X: l.U.Y, Y: -l.U.X}}, Omega: m.Omega, Alpha: m.Alpha}
		q := right.Carry(rigid.Point{Pos: r2.Vec{X: s}, Vel: r2.Vec{X: vel}, Acc: r2.Vec{X: acc}})
		l.G, l.V, l.A = r2.Add(l.G, q.Pos), r2.Add(l.V, q.Vel), r2.Add(l.A, q.Acc)
	}
	return l
}

// along returns the place of the guided point at distance s along a line.
func along(l *dyad.Line, s float64) r2.Vec {
	return r2.Vec{X: l.G.X + s*l.U.X - l.E*l.U.Y, Y: l.G.Y + s*l.U.Y + l.E*l.U.X}
}

// An rrp solves a rod between a pin on a known body and one on a slider of known
// angle.
type rrp struct {
	rod   arm
	i, at int  // its number among the dyads, and among the RRP ones
	a     spot // the outer pin
	guide track
	one   spot // the rod, and the outer pin in it
	two   spot // the slider, and its pin
	limit float64
	seen  []int
}

func (o *rrp) place(was, to *scene) status {
	a, l := to.place(&o.a), o.guide.line(to)
	v := o.rod.vector(to)
	k := dyad.RRP{L: r2.Norm(v)}
	d := l.Axes(r2.Sub(a, l.G))
	t, g := &to.rods[o.at], &to.guard[o.i]
	eta := l.E - d.Y
	g.d, g.room = r2.Vec{X: d.X, Y: eta}, (k.L-eta)*(k.L+eta)
	side := float64(to.branch[o.i])
	rod, ok := k.Place(eta, side)
	if !ok {
		if !(math.Abs(eta)-k.L <= o.limit) {
			return unreachable
		}
		rod = dyad.Rod{Eta: math.Copysign(k.L, eta)}
	}
	*t = rod
	to.m[o.one.body].Pose.Axis = turned(k.Axis(*t, l.U), r2.Scale(1/k.L, r2.Vec{X: v.X, Y: -v.Y}))
	to.hang(&o.one, a)
	to.hang(&o.two, along(&l, d.X+t.Xi))
	if !to.count(was, o.one.body) {
		return tooLong
	}
	if !g.clear(&was.guard[o.i], k.L*k.L) {
		return doubtful
	}
	return solved
}

func (o *rrp) rates(sc *scene) bool {
	t := &sc.rods[o.at]
	l := o.guide.moving(sc)
	grow := o.rod.grow(sc)
	k := dyad.RRP{L: grow.length, Grow: grow.vel, Grow2: grow.acc}
	if k.Margin(*t) < rigid.LeastMargin {
		return false
	}
	a, m := sc.m[o.a.body].At(o.a.at), &sc.m[o.one.body]
	s := r2.Dot(r2.Sub(a.Pos, l.G), l.U) + t.Xi
	drift := l.Drift(s)
	w, v := t.Rates(k.Drift(*t, l.Axes(r2.Sub(a.Vel, drift))))
	bias := l.Bias(s, v)
	al, b := t.Rates(k.Bias(*t, l.Axes(r2.Sub(a.Acc, bias)), w))
	m.Omega, m.Alpha = w-grow.turn, al-grow.turnAcc
	sc.carry(&o.one, a.Vel, a.Acc)
	sc.carry(&o.two, r2.Add(drift, r2.Scale(v, l.U)), r2.Add(bias, r2.Scale(b, l.U)))
	return true
}

func (o *rrp) margin(sc *scene) float64 {
	t := &sc.rods[o.at]
	return math.Abs(t.Xi) / math.Hypot(t.Xi, t.Eta)
}

func (o *rrp) gap(sc *scene) float64 {
	return math.Max(math.Abs(sc.guard[o.i].d.Y)-r2.Norm(o.rod.vector(sc)), 0)
}

func (o *rrp) choose(sc *scene) status { return sc.nearest(o, o.i, o.seen, left, right) }

func (o *rrp) rooms(sc *scene) (r [2]room, n int) {
	l, g, k := o.guide.moving(sc), &sc.guard[o.i], o.rod.grow(sc)
	vel, acc := sc.swing(&o.a)
	// A as seen from the guide is at (x, y), and η = E − y
	x := g.d.X
	l.E -= g.d.Y
	v := l.Axes(r2.Sub(vel, l.Drift(x)))
	a := l.Axes(r2.Sub(acc, l.Bias(x, v.X)))
	rod := square(r2.Vec{X: k.length}, r2.Vec{X: k.length * k.vel}, r2.Vec{X: k.length * k.acc})
	eta := square(r2.Vec{Y: g.d.Y}, r2.Vec{Y: -v.Y}, r2.Vec{Y: -a.Y})
	return [2]room{rod.less(eta, rod.value)}, 1
}
