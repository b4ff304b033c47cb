package planar

import (
	"math"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// Acceptance of a step: with the first correction at most widest, in rad and in
// units of the group's length, the second at most a quarter of it, and the
// determinant's sign kept, Newton's method converges to the solution that the
// motion leads to. The sign alone is not enough.
const (
	widest    = 0.1
	contracts = 0.25
	settled   = 1e-9  // the square of a correction so small is rounding
	reused    = 1e-5  // after a correction so small the factors are good for one more
	rounding  = 1e-16 // what the next correction would be, to end with
	blurred   = 1e-7  // with a margin so small rounding hides on which side of a limit a place is
	mostTurns = 16
)

// place solves the place of the unit at to.in, from the workspace p of the place
// before. Its rates, times pathScale, are path rates: in one unit of time the inputs
// there go to those of to, at constant speed, so that the predictor is
//
//	q = q₀ + q̇₀ + q̈₀/2 + …
//
// with what desk.later tells of the rest, where a step before tells it.
//
// It returns solved, or tooLong where the first correction is over 0.1, the second
// over a quarter of the first, or the determinant changes its sign.
func (n *newton) place(to *scene, p, d *desk) status {
	n.predict(p, d)
	n.prepare(to, d)
	n.lay(to, d)
	sign := p.last[detSign]
	if !d.keeps(sign) {
		return n.fail(d)
	}
	size := n.correct(d, nil, 0)
	if !(size <= widest) {
		return n.fail(d)
	}
	for turn := 0; ; turn++ {
		n.lay(to, d)
		if size <= settled || n.closes(d) {
			break
		}
		if size > reused && !d.keeps(sign) {
			return n.fail(d)
		}
		next := n.correct(d, nil, 0)
		if turn == 0 && next > math.Max(contracts*size, settled) || turn == mostTurns || next != next {
			return n.fail(d)
		}
		if next <= settled && (next*next <= rounding*size || next > contracts*size) {
			n.lay(to, d)
			break
		}
		size = next
	}
	if !d.keeps(sign) || d.blurs(p) || len(n.cells) > 0 && n.parted(d) {
		return n.fail(d)
	}
	n.pose(to, d)
	return solved
}

// keeps factors the slopes, and reports whether their determinant has the sign given,
// or that is 0.
func (d *desk) keeps(sign float64) bool { return d.factor() && d.last[detSign]*sign >= 0 }

// blurs reports whether the place is too near to a singular one to be told from one
// beyond a limit, and nearer than the place p before.
func (d *desk) blurs(p *desk) bool {
	return !(d.last[detSquare] >= blurred*blurred) && !(d.margin() >= math.Min(blurred, p.margin()))
}

// closes reports whether what the loops miss is rounding.
func (n *newton) closes(d *desk) bool {
	const eps = 1 << 52
	for _, v := range d.miss {
		if !(math.Abs(v)*eps <= n.length) {
			return false
		}
	}
	return true
}

func (n *newton) predict(p, d *desk) {
	n.remember(p, d)
	k, far := p.last[pathScale], 1.0
	if math.Abs(k) > 8 {
		far = 0 // a step so short before tells too little
	}
	for i, v := range p.vel {
		l := p.later[3*i : 3*i+3]
		h := k * (v + k*(p.acc[i]/2+k*far*(l[0]+k*(l[1]+k*l[2]))))
		if i < n.free {
			turnBy(d.dir[2*i:2*i+2], p.dir[2*i:2*i+2], tanHalf(h))
			d.angle[i] = p.angle[i] + h
		} else {
			d.slide[i-n.free] = p.slide[i-n.free] + h*n.length
		}
	}
	n.rewind(d)
}

// tanHalf returns tan(h/2) to h⁹.
func tanHalf(h float64) float64 {
	h2 := h * h
	return h / 2 * (1 + h2*(1./12+h2*(1./120+h2*(17./20160))))
}

func (n *newton) fail(d *desk) status {
	d.last[lastGap] = 0
	for _, v := range d.miss {
		d.last[lastGap] = math.Max(d.last[lastGap], math.Abs(v))
	}
	return tooLong
}

// turnBy writes into to the unit vector from turned by 2·atan(t): with t the
// tangent of half an angle the rotation is rational in it.
func turnBy(to, from []float64, t float64) {
	k := 1 - t*t // 1/(1 + t²) but for t⁴
	if k < 1-1e-8 {
		k = 1 / (1 + t*t)
	}
	c, s := (1-t*t)*k, 2*t*k
	x, y := from[0]*c-from[1]*s, from[0]*s+from[1]*c
	unit := 1.5 - 0.5*(x*x+y*y)
	to[0], to[1] = unit*x, unit*y
}

// rewind sets the angles that are needed over whole turns by their unit vectors, so
// that sums of corrections don't drift away from them.
func (n *newton) rewind(d *desk) {
	for _, k := range n.whole {
		d.angle[k] = rigid.Nearest(math.Atan2(d.dir[2*k+1], d.dir[2*k]), d.angle[k])
	}
}

// correct solves for Newton's correction towards share times the misses in base (0
// for a nil one), makes it, and returns its largest part.
func (n *newton) correct(d *desk, base []float64, share float64) float64 {
	x := d.temp[:n.n]
	copy(x, d.miss)
	for i, b := range base {
		x[i] -= share * b
	}
	d.solve(x)
	size := 0.0
	for _, v := range x {
		if !(math.Abs(v) <= size) {
			size = math.Abs(v) // NaN stays
		}
	}
	if size <= 1 {
		n.take(d, x, 1)
	}
	return size
}

// take makes k times a correction.
func (n *newton) take(d *desk, x []float64, k float64) {
	for i := range n.free {
		turnBy(d.dir[2*i:2*i+2], d.dir[2*i:2*i+2], -k*x[i]/2)
		d.angle[i] -= k * x[i]
	}
	for i := range n.slides {
		d.slide[i] -= k * x[n.free+i] * n.length
	}
	n.rewind(d)
}

// prepare sets what the unknowns do not change: angles of the members without the
// group's own, the chords in known bodies.
func (n *newton) prepare(sc *scene, d *desk) {
	for i := range n.members {
		m, rest := &n.members[i], d.rest[3*i:3*i+3]
		switch {
		case len(m.own) == 0:
			u := sc.m[m.body].Pose.Axis
			d.axis[2*i], d.axis[2*i+1] = u.X, u.Y
		case m.fixed:
			rest[0], rest[1], rest[2] = m.u.X, m.u.Y, m.rest.Const
		default:
			rest[2] = m.rest.value(sc)
			rest[1], rest[0] = trig.Sincos(rest[2])
		}
	}
	for i := range n.loops {
		l := &n.loops[i]
		c := r2.Sub(sc.m[n.members[l.to].body].Pose.Origin, sc.m[n.members[l.from].body].Pose.Origin)
		for k := l.still; k < l.moved; k++ {
			c = r2.Add(c, n.turnChord(d, k))
		}
		d.fixed[2*i], d.fixed[2*i+1] = c.X, c.Y
	}
}

// turnChord turns a chord into the frame.
func (n *newton) turnChord(d *desk, k int) r2.Vec {
	a := &n.chords[k]
	x, y := d.axis[2*a.member], d.axis[2*a.member+1]
	r := r2.Vec{X: x*a.v.X - y*a.v.Y, Y: x*a.v.Y + y*a.v.X}
	d.chords[2*k], d.chords[2*k+1] = r.X, r.Y
	return r
}

// value returns an angle whose free angles are known.
func (a *angle) value(sc *scene) float64 {
	sum := a.Const
	for _, t := range a.psi {
		sum += t.Coef * sc.psi[t.Index].Pos
	}
	for _, t := range a.in {
		sum += t.Coef * sc.in[t.Index].Pos
	}
	for _, t := range a.phase {
		sum += t.Coef * sc.phase[t.Index]
	}
	return sum
}

// total returns a member's angle over whole turns, where that is counted.
func (n *newton) total(sc *scene, d *desk, i int) float64 {
	m := &n.members[i]
	if len(m.own) == 0 {
		return m.rest.value(sc)
	}
	sum := d.rest[3*i+2]
	for _, t := range m.own {
		sum += t.Coef * d.angle[t.Index]
	}
	return sum
}

// turn sets the unit vectors of the members that the group turns.
func (n *newton) turn(sc *scene, d *desk) {
	for i := range n.members {
		m := &n.members[i]
		u := d.axis[2*i : 2*i+2]
		switch {
		case len(m.own) == 0:
		case m.same:
			k := 2 * m.own[0].Index
			u[0], u[1] = d.dir[k], d.dir[k+1]
		case m.plain():
			k, rest := 2*m.own[0].Index, d.rest[3*i:3*i+2]
			x, y := d.dir[k], m.own[0].Coef*d.dir[k+1]
			x, y = x*rest[0]-y*rest[1], x*rest[1]+y*rest[0]
			unit := 1.5 - 0.5*(x*x+y*y)
			u[0], u[1] = unit*x, unit*y
		default:
			u[1], u[0] = trig.Sincos(n.total(sc, d, i))
		}
	}
}
