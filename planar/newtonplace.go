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
	settled   = 1e-9 // the square of a correction so small is rounding
	mostTurns = 16
)

// place solves the place of the unit at to.in, from the workspace p of the
// place before. Its rates are path rates: in one unit of time the inputs there go to
// those of to, at constant speed, so that the predictor is
//
//	q = q₀ + q̇₀ + q̈₀/2
//
// It returns solved, or tooLong where the first correction is over 0.1, the second
// over a quarter of the first, or the determinant changes its sign.
func (n *newton) place(to *scene, p, d *desk) status {
	for k := range n.free {
		h := p.vel[k] + p.acc[k]/2
		turnBy(d.dir[2*k:], p.dir[2*k:], h/2*(1+h*h/12)) // tan(h/2)
		d.angle[k] = p.angle[k] + h
	}
	for i := range n.slides {
		k := n.free + i
		d.slide[i] = p.slide[i] + (p.vel[k]+p.acc[k]/2)*n.length
	}
	n.rewind(d)
	n.prepare(to, d)
	sign, first := p.last[detSign], 0.0
	for turn := range mostTurns {
		n.lay(to, d)
		if !d.factor() || d.last[detSign]*sign < 0 {
			break
		}
		size := n.correct(d, nil, 0)
		switch {
		case !(size <= widest), turn == 1 && size > math.Max(contracts*first, settled):
			return n.fail(d)
		case size <= settled:
			n.lay(to, d)
			if !d.factor() || d.last[detSign]*sign < 0 {
				return n.fail(d)
			}
			return solved
		}
		if turn == 0 {
			first = size
		}
	}
	return n.fail(d)
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
	k := 1 / (1 + t*t)
	c, s := (1-t*t)*k, 2*t*k
	x, y := from[0]*c-from[1]*s, from[0]*s+from[1]*c
	unit := 1.5 - 0.5*(x*x+y*y)
	to[0], to[1] = unit*x, unit*y
}

// rewind sets the angles that are needed over whole turns by their unit vectors, so
// that sums of corrections don't drift away from them.
func (n *newton) rewind(d *desk) {
	for k, whole := range n.whole {
		if whole {
			d.angle[k] = rigid.Nearest(math.Atan2(d.dir[2*k+1], d.dir[2*k]), d.angle[k])
		}
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
		turnBy(d.dir[2*i:], d.dir[2*i:], -k*x[i]/2)
		d.angle[i] -= k * x[i]
	}
	for i := range n.slides {
		d.slide[i] -= k * x[n.free+i] * n.length
	}
	n.rewind(d)
}

// prepare sets what the group does not turn of its members' angles.
func (n *newton) prepare(sc *scene, d *desk) {
	for i := range n.members {
		m, rest := &n.members[i], d.rest[3*i:]
		if len(m.own) == 0 {
			continue
		}
		if m.fixed {
			rest[0], rest[1], rest[2] = m.u.X, m.u.Y, m.rest.Const
			continue
		}
		rest[2] = m.rest.value(sc)
		rest[1], rest[0] = trig.Sincos(rest[2])
	}
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

// axis returns the unit vector of a member that the group turns.
func (n *newton) axis(sc *scene, d *desk, i int) r2.Vec {
	m := &n.members[i]
	if !m.plain() {
		s, c := trig.Sincos(n.total(sc, d, i))
		return r2.Vec{X: c, Y: s}
	}
	t := m.own[0]
	dir := r2.Vec{X: d.dir[2*t.Index], Y: t.Coef * d.dir[2*t.Index+1]}
	u := turned(dir, r2.Vec{X: d.rest[3*i], Y: d.rest[3*i+1]})
	unit := 1.5 - 0.5*(u.X*u.X+u.Y*u.Y)
	return r2.Vec{X: unit * u.X, Y: unit * u.Y}
}

// lay places the members by the unknowns, and writes the slopes of their origins
// and what the loops miss, with its slopes.
func (n *newton) lay(sc *scene, d *desk) {
	for i := range n.members {
		if m := &n.members[i]; len(m.own) > 0 {
			sc.m[m.body].Pose.Axis = n.axis(sc, d, i)
		}
	}
	for i := range n.tree {
		n.layLimb(sc, d, &n.tree[i], d.arms[6*i:6*i+6])
	}
	row := 0
	for i := range n.loops {
		k := len(n.tree) + i
		row += n.layLoop(sc, d, &n.loops[i], d.arms[6*k:6*k+6], row)
	}
}

func (n *newton) layLimb(sc *scene, d *desk, l *limb, arms []float64) {
	to := &sc.m[n.members[l.member].body]
	slope := d.slope[2*n.n*l.member:][:2*n.n]
	if l.base < 0 {
		to.Pose.Origin = r2.Vec{X: d.slide[l.slide], Y: d.slide[l.slide+1]}
		k := 2 * (n.free + l.slide)
		slope[k], slope[k+3] = n.length, n.length
		return
	}
	from := &sc.m[n.members[l.base].body]
	base, member := l.pBase, l.pMember
	var u r2.Vec
	if l.slide >= 0 {
		along := r2.Scale(d.slide[l.slide], l.u)
		if l.back {
			member, u = r2.Add(member, along), turned(to.Pose.Axis, l.u)
		} else {
			base, u = r2.Add(base, along), turned(from.Pose.Axis, l.u)
		}
	}
	base, member = turned(from.Pose.Axis, base), turned(to.Pose.Axis, member)
	arms[0], arms[1], arms[2], arms[3], arms[4], arms[5] = base.X, base.Y, member.X, member.Y, u.X, u.Y
	to.Pose.Origin = r2.Vec{X: from.Pose.Origin.X + base.X - member.X, Y: from.Pose.Origin.Y + base.Y - member.Y}
	copy(slope, d.slope[2*n.n*l.base:][:2*n.n])
	n.addTurn(slope, l.base, base, 1)
	n.addTurn(slope, l.member, member, -1)
	if l.slide >= 0 {
		k, sign := 2*(n.free+l.slide), n.length
		if l.back {
			sign = -sign
		}
		slope[k] += sign * u.X
		slope[k+1] += sign * u.Y
	}
}

// addTurn adds sign times the derivatives of an arm that turns with a member.
func (n *newton) addTurn(slope []float64, member int, arm r2.Vec, sign float64) {
	for _, t := range n.members[member].own {
		k := sign * t.Coef
		slope[2*t.Index] -= k * arm.Y
		slope[2*t.Index+1] += k * arm.X
	}
}

// layLoop writes what a loop misses with its slopes, and returns its number of
// equations. With C from a's point to b's, u and n = u⊥ turning with a:
//
//	C = 0;  n·C = value;  u·C = value + in;  u·C + rate·(θb − θa) = value
func (n *newton) layLoop(sc *scene, d *desk, l *loop, arms []float64, row int) int {
	a, b := &sc.m[n.members[l.a].body], &sc.m[n.members[l.b].body]
	ra, rb := turned(a.Pose.Axis, l.pa), turned(b.Pose.Axis, l.pb)
	u := turned(a.Pose.Axis, l.u)
	arms[0], arms[1], arms[2], arms[3], arms[4], arms[5] = ra.X, ra.Y, rb.X, rb.Y, u.X, u.Y
	c := r2.Vec{
		X: b.Pose.Origin.X - a.Pose.Origin.X + rb.X - ra.X,
		Y: b.Pose.Origin.Y - a.Pose.Origin.Y + rb.Y - ra.Y,
	}
	slope := d.temp
	sb, sa := d.slope[2*n.n*l.b:][:2*n.n], d.slope[2*n.n*l.a:][:2*n.n]
	for k := range slope {
		slope[k] = sb[k] - sa[k]
	}
	n.addTurn(slope, l.b, rb, 1)
	n.addTurn(slope, l.a, ra, -1)
	j := d.j[row*n.n:][:n.n]
	if l.kind == rowX {
		next := d.j[(row+1)*n.n:][:n.n]
		for k := range j {
			j[k], next[k] = slope[2*k], slope[2*k+1]
		}
		d.miss[row], d.miss[row+1] = c.X, c.Y
		return 2
	}
	along, beside := u.X*c.X+u.Y*c.Y, u.X*c.Y-u.Y*c.X
	v, miss, turns := u, along-l.value, beside
	if l.kind == rowGuide {
		v, miss, turns = r2.Vec{X: -u.Y, Y: u.X}, beside-l.value, -along
	}
	for k := range j {
		j[k] = v.X*slope[2*k] + v.Y*slope[2*k+1]
	}
	for _, t := range n.members[l.a].own {
		j[t.Index] += t.Coef * turns
	}
	switch l.kind {
	case rowSlide:
		if l.drive >= 0 {
			miss -= sc.in[l.drive].Pos
		}
	case rowRack:
		miss += l.rate * (n.total(sc, d, l.b) - n.total(sc, d, l.a))
		if l.phase >= 0 {
			miss -= sc.phase[l.phase]
		}
		n.addRate(j, l)
	}
	d.miss[row] = miss
	return 1
}

// addRate adds the derivatives of rate·(θb − θa).
func (n *newton) addRate(j []float64, l *loop) {
	for _, t := range n.members[l.b].own {
		j[t.Index] += l.rate * t.Coef
	}
	for _, t := range n.members[l.a].own {
		j[t.Index] -= l.rate * t.Coef
	}
}
