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
	n.driftVel(sc, d)
	d.solve(d.vel)
	for i := range n.members {
		m := &n.members[i]
		if len(m.own) > 0 {
			b := &sc.m[m.body]
			b.Omega = d.known[2*i]
			for _, t := range m.own {
				b.Omega += t.Coef * d.vel[t.Index]
			}
		}
		if m.hangs {
			sc.m[m.body].Vel = n.sweep(d, i, d.drift[4*i], d.drift[4*i+1], d.vel)
		}
	}
	n.driftAcc(sc, d)
	d.solve(d.acc)
	for i := range n.members {
		m := &n.members[i]
		if len(m.own) > 0 {
			b := &sc.m[m.body]
			b.Alpha = d.known[2*i+1]
			for _, t := range m.own {
				b.Alpha += t.Coef * d.acc[t.Index]
			}
		}
		if m.hangs {
			sc.m[m.body].Acc = n.sweep(d, i, d.drift[4*i+2], d.drift[4*i+3], d.acc)
		}
	}
}

// still notes that the rates are not determined.
func (d *desk) still() {
	clear(d.vel)
	clear(d.acc)
}

// sweep adds to the velocity or acceleration of an origin what the unknowns do.
func (n *newton) sweep(d *desk, member int, x, y float64, unknowns []float64) r2.Vec {
	slope := d.slope[2*n.n*member:][:2*n.n]
	for k, v := range unknowns {
		x += slope[2*k] * v
		y += slope[2*k+1] * v
	}
	return r2.Vec{X: x, Y: y}
}

func (n *newton) knownRates(sc *scene, d *desk) {
	for i := range n.members {
		m := &n.members[i]
		b := &sc.m[m.body]
		known, drift := d.known[2*i:], d.drift[4*i:]
		if len(m.own) == 0 {
			known[0], known[1] = b.Omega, b.Alpha
		} else {
			known[0], known[1] = 0, 0
			for _, t := range m.rest.psi {
				known[0] += t.Coef * sc.psi[t.Index].Vel
				known[1] += t.Coef * sc.psi[t.Index].Acc
			}
			for _, t := range m.rest.in {
				known[0] += t.Coef * sc.in[t.Index].Vel
				known[1] += t.Coef * sc.in[t.Index].Acc
			}
		}
		if !m.hangs {
			drift[0], drift[1], drift[2], drift[3] = b.Vel.X, b.Vel.Y, b.Acc.X, b.Acc.Y
		}
	}
}

// driftVel writes the velocities of origins without the unknown ones, and the
// negative of what that leaves the loops.
func (n *newton) driftVel(sc *scene, d *desk) {
	for i := range n.tree {
		l, arms, drift := &n.tree[i], d.arms[6*i:], d.drift[4*n.tree[i].member:]
		if l.base < 0 {
			drift[0], drift[1] = 0, 0
			continue
		}
		from := d.drift[4*l.base:]
		wa, wb := d.known[2*l.base], d.known[2*l.member]
		drift[0] = from[0] - wa*arms[1] + wb*arms[3]
		drift[1] = from[1] + wa*arms[0] - wb*arms[2]
	}
	row := 0
	for i := range n.loops {
		l, arms := &n.loops[i], d.arms[6*(len(n.tree)+i):]
		a, b := d.drift[4*l.a:], d.drift[4*l.b:]
		wa, wb := d.known[2*l.a], d.known[2*l.b]
		c := r2.Vec{
			X: b[0] - a[0] - wb*arms[3] + wa*arms[1],
			Y: b[1] - a[1] + wb*arms[2] - wa*arms[0],
		}
		if l.kind == rowX {
			d.vel[row], d.vel[row+1] = -c.X, -c.Y
			row += 2
			continue
		}
		u := r2.Vec{X: arms[4], Y: arms[5]}
		along, beside := n.offset(sc, l, arms)
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
		row++
	}
}

// offset returns u·C and n·C of a loop.
func (n *newton) offset(sc *scene, l *loop, arms []float64) (along, beside float64) {
	a, b := &sc.m[n.members[l.a].body], &sc.m[n.members[l.b].body]
	c := r2.Vec{
		X: b.Pose.Origin.X - a.Pose.Origin.X + arms[2] - arms[0],
		Y: b.Pose.Origin.Y - a.Pose.Origin.Y + arms[3] - arms[1],
	}
	u := r2.Vec{X: arms[4], Y: arms[5]}
	return r2.Dot(u, c), cross(u, c)
}

// driftAcc writes the accelerations of origins without the unknown ones, and the
// negative of what that leaves the loops. With ω turning u and n = u⊥,
//
//	(n·C)″ = n·C″ − 2ω u·C′ − α u·C − ω² n·C
//	(u·C)″ = u·C″ + 2ω n·C′ + α n·C − ω² u·C
func (n *newton) driftAcc(sc *scene, d *desk) {
	for i := range n.tree {
		l, arms, drift := &n.tree[i], d.arms[6*i:6*i+6], d.drift[4*n.tree[i].member:]
		if l.base < 0 {
			drift[2], drift[3] = 0, 0
			continue
		}
		from := d.drift[4*l.base:]
		a, b := &sc.m[n.members[l.base].body], &sc.m[n.members[l.member].body]
		pull := centripetal(d.known[2*l.base+1], a.Omega, arms[0], arms[1])
		less := centripetal(d.known[2*l.member+1], b.Omega, arms[2], arms[3])
		drift[2] = from[2] + pull.X - less.X
		drift[3] = from[3] + pull.Y - less.Y
		if l.slide >= 0 { // 2ω×(sliding velocity)
			k := 2 * d.vel[n.free+l.slide] * n.length * a.Omega
			if l.back {
				k = -2 * d.vel[n.free+l.slide] * n.length * b.Omega
			}
			drift[2] -= k * arms[5]
			drift[3] += k * arms[4]
		}
	}
	row := 0
	for i := range n.loops {
		row += n.driftLoop(sc, d, &n.loops[i], d.arms[6*(len(n.tree)+i):][:6], row)
	}
}

func (n *newton) driftLoop(sc *scene, d *desk, l *loop, arms []float64, row int) int {
	a, b := &sc.m[n.members[l.a].body], &sc.m[n.members[l.b].body]
	da, db := d.drift[4*l.a:], d.drift[4*l.b:]
	pull := centripetal(d.known[2*l.b+1], b.Omega, arms[2], arms[3])
	less := centripetal(d.known[2*l.a+1], a.Omega, arms[0], arms[1])
	c := r2.Vec{X: db[2] - da[2] + pull.X - less.X, Y: db[3] - da[3] + pull.Y - less.Y}
	if l.kind == rowX {
		d.acc[row], d.acc[row+1] = -c.X, -c.Y
		return 2
	}
	u := r2.Vec{X: arms[4], Y: arms[5]}
	along, beside := n.offset(sc, l, arms)
	v := r2.Vec{
		X: b.Vel.X - a.Vel.X - b.Omega*arms[3] + a.Omega*arms[1],
		Y: b.Vel.Y - a.Vel.Y + b.Omega*arms[2] - a.Omega*arms[0],
	}
	w, al := a.Omega, d.known[2*l.a+1]
	switch l.kind {
	case rowGuide:
		d.acc[row] = -(cross(u, c) - 2*w*r2.Dot(u, v) - al*along - w*w*beside)
	case rowSlide:
		d.acc[row] = -(r2.Dot(u, c) + 2*w*cross(u, v) + al*beside - w*w*along)
		if l.drive >= 0 {
			d.acc[row] += sc.in[l.drive].Acc
		}
	case rowRack:
		d.acc[row] = -(r2.Dot(u, c) + 2*w*cross(u, v) + al*beside - w*w*along + l.rate*(d.known[2*l.b+1]-al))
	}
	return 1
}

// centripetal returns α×r − ω²r.
func centripetal(al, w, x, y float64) r2.Vec {
	return r2.Vec{X: -al*y - w*w*x, Y: al*x - w*w*y}
}

// agrees reports whether path rates at both ends of a step fit each other:
// |v₁ − v₀ − a₀| ≤ 0.1 of every unknown, with the rates by the same unit of time as
// in place, those of the start in p.
func (d *desk) agrees(p *desk) bool {
	for k, v := range d.vel {
		if !(math.Abs(v-p.vel[k]-p.acc[k]) <= widest) {
			return false
		}
	}
	return true
}
