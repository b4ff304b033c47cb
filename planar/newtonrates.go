package planar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// rates solves the rates of the unit at a place that is solved, from the rates in
// sc.in and of earlier bodies: Vel, Acc, Omega, Alpha of its bodies, by the factors
// in d. It is called where regular, and may be called again with other inputs'
// rates.
//
// The velocities without the unknown ones leave the loops a velocity that the
// unknown ones make up for; so do the accelerations without the unknown ones, with
// all velocities in them.
func (n *newton) rates(sc *scene, d *desk) {
	n.knownRates(sc, d)
	row := 0
	for i := range n.closed {
		row += n.driftVel(sc, d, i, row)
	}
	n.customVel(sc, d, row)
	d.solve(d.vel)
	for i := range n.members {
		w := d.turn[3*i]
		for _, t := range n.members[i].own {
			w += t.Coef * d.vel[t.Index]
		}
		d.turn[3*i+2] = w
	}
	row = 0
	for i := range n.closed {
		row += n.driftAcc(sc, d, i, row)
	}
	n.customAcc(sc, d, row)
	d.solve(d.acc)
	n.spread(sc, d)
}

// still notes that the rates are not determined.
func (d *desk) still() {
	clear(d.vel)
	clear(d.acc)
	clear(d.later)
	d.last[pathSpeed], d.last[pathScale] = 0, 0
}

func (n *newton) knownRates(sc *scene, d *desk) {
	for i := range n.members {
		m := &n.members[i]
		vel, acc := 0.0, 0.0
		switch {
		case len(m.own) == 0:
			vel, acc = sc.m[m.body].Omega, sc.m[m.body].Alpha
		case !m.fixed:
			for _, t := range m.rest.psi {
				vel += t.Coef * sc.psi[t.Index].Vel
				acc += t.Coef * sc.psi[t.Index].Acc
			}
			for _, t := range m.rest.in {
				vel += t.Coef * sc.in[t.Index].Vel
				acc += t.Coef * sc.in[t.Index].Acc
			}
		}
		d.turn[3*i], d.turn[3*i+1] = vel, acc
	}
}

// chord returns a chord in the frame, times its slide.
func (n *newton) chord(d *desk, k int) r2.Vec {
	r := r2.Vec{X: d.chords[2*k], Y: d.chords[2*k+1]}
	if s := n.chords[k].slide; s >= 0 {
		r = r2.Vec{X: d.slide[s] * r.X, Y: d.slide[s] * r.Y}
	}
	return r
}

// loopVel returns the velocity of C of a loop without the unknown ones.
func (n *newton) loopVel(sc *scene, d *desk, l *loop) r2.Vec {
	to, from := &sc.m[n.members[l.to].body], &sc.m[n.members[l.from].body]
	c := r2.Vec{X: to.Vel.X - from.Vel.X, Y: to.Vel.Y - from.Vel.Y}
	for k := l.still; k < l.end; k++ {
		if w := d.turn[3*n.chords[k].member]; w != 0 {
			r := n.chord(d, k)
			c.X -= w * r.Y
			c.Y += w * r.X
		}
	}
	return c
}

// driftVel writes the negative of the velocity that a loop has without the unknown
// ones, and returns its number of equations.
func (n *newton) driftVel(sc *scene, d *desk, i, row int) int {
	l := &n.loops[i]
	if l.parallel(d) {
		n.driftCell(d, i, 0, d.vel[row:])
		return 2
	}
	c := n.loopVel(sc, d, l)
	if l.kind == rowX {
		d.vel[row], d.vel[row+1] = -c.X, -c.Y
		return 2
	}
	u, along, beside := n.line(d, i)
	wa, wb := d.turn[3*l.a], d.turn[3*l.b]
	switch l.kind {
	case rowGuide:
		d.vel[row] = -(cross(u, c) - wa*along)
	case rowSlide:
		d.vel[row] = -(r2.Dot(u, c) + wa*beside)
		if l.drive >= 0 {
			d.vel[row] += sc.in[l.drive].Vel
		}
	case rowRack:
		d.vel[row] = -(r2.Dot(u, c) + wa*beside + l.rate*(wb-wa))
	}
	return 1
}

// loopAcc returns the velocity of C of a loop, and its acceleration without the
// unknown ones.
func (n *newton) loopAcc(sc *scene, d *desk, l *loop) (v, c r2.Vec) {
	to, from := &sc.m[n.members[l.to].body], &sc.m[n.members[l.from].body]
	v = r2.Vec{X: to.Vel.X - from.Vel.X, Y: to.Vel.Y - from.Vel.Y}
	c = r2.Vec{X: to.Acc.X - from.Acc.X, Y: to.Acc.Y - from.Acc.Y}
	for k := l.still; k < l.end; k++ {
		a, r := &n.chords[k], n.chord(d, k)
		w, al := d.turn[3*a.member+2], d.turn[3*a.member+1]
		c.X -= al*r.Y + w*w*r.X
		c.Y += al*r.X - w*w*r.Y
		v.X -= w * r.Y
		v.Y += w * r.X
		if a.slide >= 0 {
			speed := d.vel[n.free+a.slide] * n.length
			x, y := speed*d.chords[2*k], speed*d.chords[2*k+1]
			v.X, v.Y = v.X+x, v.Y+y
			c.X, c.Y = c.X-2*w*y, c.Y+2*w*x
		}
	}
	return v, c
}

// driftAcc writes the negative of the acceleration that a loop has without the
// unknown ones. With ω turning u and n = u⊥,
//
//	(n·C)″ = n·C″ − 2ω u·C′ − α u·C − ω² n·C
//	(u·C)″ = u·C″ + 2ω n·C′ + α n·C − ω² u·C
func (n *newton) driftAcc(sc *scene, d *desk, i, row int) int {
	l := &n.loops[i]
	if l.parallel(d) {
		n.driftCell(d, i, 1, d.acc[row:])
		return 2
	}
	v, c := n.loopAcc(sc, d, l)
	if l.kind == rowX {
		d.acc[row], d.acc[row+1] = -c.X, -c.Y
		return 2
	}
	u, along, beside := n.line(d, i)
	w, al := d.turn[3*l.a+2], d.turn[3*l.a+1]
	switch l.kind {
	case rowGuide:
		d.acc[row] = -(cross(u, c) - 2*w*r2.Dot(u, v) - al*along - w*w*beside)
	case rowSlide:
		d.acc[row] = -(r2.Dot(u, c) + 2*w*cross(u, v) + al*beside - w*w*along)
		if l.drive >= 0 {
			d.acc[row] += sc.in[l.drive].Acc
		}
	case rowRack:
		d.acc[row] = -(r2.Dot(u, c) + 2*w*cross(u, v) + al*beside - w*w*along + l.rate*(d.turn[3*l.b+1]-al))
	}
	return 1
}

// spread gives the members the rates that follow from those of the unknowns.
func (n *newton) spread(sc *scene, d *desk) {
	for i := range n.members {
		m := &n.members[i]
		if len(m.own) == 0 {
			continue
		}
		al := d.turn[3*i+1]
		for _, t := range m.own {
			al += t.Coef * d.acc[t.Index]
		}
		sc.m[m.body].Omega, sc.m[m.body].Alpha = d.turn[3*i+2], al
	}
	for i := range n.tree {
		l := &n.tree[i]
		to := &sc.m[n.members[l.member].body]
		if l.base < 0 {
			k := n.free + l.slide
			to.Vel = r2.Vec{X: n.length * d.vel[k], Y: n.length * d.vel[k+1]}
			to.Acc = r2.Vec{X: n.length * d.acc[k], Y: n.length * d.acc[k+1]}
			continue
		}
		from := &sc.m[n.members[l.base].body]
		p, q := n.ends(d, l, from.Pose.Axis, to.Pose.Axis)
		v, w, al, be := from.Omega, to.Omega, from.Alpha, to.Alpha
		vel := r2.Vec{X: from.Vel.X - v*p.Y + w*q.Y, Y: from.Vel.Y + v*p.X - w*q.X}
		acc := r2.Vec{
			X: from.Acc.X - al*p.Y - v*v*p.X + be*q.Y + w*w*q.X,
			Y: from.Acc.Y + al*p.X - v*v*p.Y - be*q.X + w*w*q.Y,
		}
		if l.slide >= 0 { // along the line of one of them
			k, u, turn := n.free+l.slide, turned(from.Pose.Axis, l.u), v
			sign := n.length
			if l.back {
				u, turn, sign = turned(to.Pose.Axis, l.u), w, -sign
			}
			s, ss := sign*d.vel[k], sign*d.acc[k]
			vel = r2.Vec{X: vel.X + s*u.X, Y: vel.Y + s*u.Y}
			acc = r2.Vec{X: acc.X + ss*u.X - 2*turn*s*u.Y, Y: acc.Y + ss*u.Y + 2*turn*s*u.X}
		}
		to.Vel, to.Acc = vel, acc
	}
}

// agrees reports whether path rates at both ends of a step fit each other, with the
// rates by the same unit of time as in place, those of the start in p: |v₁ − v₀ − a₀|
// of every unknown is at most 0.1 and hardly more than the largest v₁ or v₀, or with
// cams, whose accelerations may jump, a₀. Next to a limit, where unknowns go but little,
// the latter tells a place beyond it from one on the way.
//
// It notes how the path goes on, by the quintic through both ends with their rates, for
// t from −1 at the start to 0:
//
//	q = q₁ + v₁t + a₁t²/2 + c₃t³ + c₄t⁴ + c₅t⁵
//
// of which q, v and a at the start leave
//
//	x = −c₃ + c₄ − c₅,  y = 3c₃ − 4c₄ + 5c₅,  z = −6c₃ + 12c₄ − 20c₅
func (n *newton) agrees(d, p *desk) bool {
	k := p.last[pathScale]
	known := d.last[pathSpeed] != 0
	off, most := 0.0, 0.0
	for i, v := range d.vel {
		v0, a0, a := k*p.vel[i], k*k*p.acc[i], d.acc[i]
		off, most = max(off, math.Abs(v-v0-a0)), max(most, math.Abs(v), math.Abs(v0))
		if len(n.customs) > 0 {
			most = max(most, math.Abs(a0))
		}
		if known {
			x, y, z := v-a/2-n.gone(d, p, i), v0-v+a, a0-a
			l := d.later[3*i : 3*i+3]
			l[0], l[1], l[2] = -10*x-4*y-z/2, -15*x-7*y-z, -6*x-3*y-z/2
		}
	}
	return off <= min(widest, 1.05*most+settled)
}

// gone returns how far an unknown went from p to d.
func (n *newton) gone(d, p *desk, i int) float64 {
	if i < n.free {
		return d.angle[i] - p.angle[i]
	}
	return (d.slide[i-n.free] - p.slide[i-n.free]) / n.length
}
