package planar

import "gonum.org/v1/gonum/spatial/r2"

// lay writes what the loops miss at the unknowns, with its slopes.
func (n *newton) lay(sc *scene, d *desk) {
	n.turn(sc, d)
	row := 0
	for i := range n.closed {
		l := &n.loops[i]
		if l.parallel(d) {
			n.layCell(d, i, row)
			row += 2
			continue
		}
		if l.kind == rowX {
			x, y := d.j[row*n.n:(row+1)*n.n], d.j[(row+1)*n.n:(row+2)*n.n]
			n.sum(d, i, x, y)
			d.miss[row], d.miss[row+1] = d.gap[2*i], d.gap[2*i+1]
			row += 2
			continue
		}
		n.sum(d, i, d.temp[:n.n], d.temp[n.n:])
		n.layLine(sc, d, i, row)
		row++
	}
	n.layCustoms(sc, d, row)
}

// sum writes C of a loop and its slopes. Into a pin's rows of d.j, which have no other
// slopes, the first chord that a column has writes and the others add.
func (n *newton) sum(d *desk, i int, x, y []float64) {
	l := &n.loops[i]
	if l.kind != rowX || l.mixed {
		clear(x)
		clear(y)
	}
	axis, chords := d.axis, d.chords[2*l.moved:2*l.end]
	cx, cy := d.fixed[2*i], d.fixed[2*i+1]
	for k, all := 0, n.chords[l.moved:l.end]; k < len(all); k++ {
		a := &all[k]
		ux, uy := axis[2*a.member], axis[2*a.member+1]
		rx, ry := ux*a.v.X-uy*a.v.Y, ux*a.v.Y+uy*a.v.X
		chords[2*k], chords[2*k+1] = rx, ry
		if a.slide >= 0 {
			col, s := n.free+a.slide, d.slide[a.slide]
			x[col], y[col] = n.length*rx, n.length*ry
			rx, ry = s*rx, s*ry
		}
		cx, cy = cx+rx, cy+ry
		switch {
		case a.mixed:
			for _, t := range n.members[a.member].own {
				x[t.Index] -= t.Coef * ry
				y[t.Index] += t.Coef * rx
			}
		case a.col < 0:
		case a.first:
			x[a.col], y[a.col] = -a.coef*ry, a.coef*rx
		default:
			x[a.col] -= a.coef * ry
			y[a.col] += a.coef * rx
		}
	}
	d.gap[2*i], d.gap[2*i+1] = cx, cy
}

// line returns u of a loop, in the frame, with u·C and n·C.
func (n *newton) line(d *desk, i int) (u r2.Vec, along, beside float64) {
	l := &n.loops[i]
	u = turned(r2.Vec{X: d.axis[2*l.a], Y: d.axis[2*l.a+1]}, l.u)
	x, y := d.gap[2*i], d.gap[2*i+1]
	return u, u.X*x + u.Y*y, u.X*y - u.Y*x
}

// layLine writes what a loop with a line misses with its slopes, from those of C in
// d.temp.
func (n *newton) layLine(sc *scene, d *desk, i, row int) {
	l := &n.loops[i]
	u, along, beside := n.line(d, i)
	v, miss, turns := u, along-l.value, beside
	if l.kind == rowGuide {
		v, miss, turns = r2.Vec{X: -u.Y, Y: u.X}, beside-l.value, -along
	}
	j, x, y := d.j[row*n.n:][:n.n], d.temp[:n.n], d.temp[n.n:]
	for k := range j {
		j[k] = v.X*x[k] + v.Y*y[k]
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
		for _, t := range n.members[l.b].own {
			j[t.Index] += l.rate * t.Coef
		}
		for _, t := range n.members[l.a].own {
			j[t.Index] -= l.rate * t.Coef
		}
	}
	d.miss[row] = miss
}

// pose places the members.
func (n *newton) pose(sc *scene, d *desk) {
	for i := range n.members {
		if m := &n.members[i]; len(m.own) > 0 {
			sc.m[m.body].Pose.Axis = r2.Vec{X: d.axis[2*i], Y: d.axis[2*i+1]}
		}
	}
	for i := range n.tree {
		l := &n.tree[i]
		to := &sc.m[n.members[l.member].body].Pose
		if l.base < 0 {
			to.Origin = r2.Vec{X: d.slide[l.slide], Y: d.slide[l.slide+1]}
			continue
		}
		from := &sc.m[n.members[l.base].body].Pose
		base, member := n.ends(d, l, from.Axis, to.Axis)
		to.Origin = r2.Vec{X: from.Origin.X + base.X - member.X, Y: from.Origin.Y + base.Y - member.Y}
	}
}

// ends returns the two points of a limb from their bodies' origins, in the frame.
func (n *newton) ends(d *desk, l *limb, from, to r2.Vec) (base, member r2.Vec) {
	base, member = l.pBase, l.pMember
	switch {
	case l.slide < 0:
	case l.back:
		member = r2.Add(member, r2.Scale(d.slide[l.slide], l.u))
	default:
		base = r2.Add(base, r2.Scale(d.slide[l.slide], l.u))
	}
	return turned(from, base), turned(to, member)
}
