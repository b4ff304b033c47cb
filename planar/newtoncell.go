package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// Parallelogram cells inside a group of higher class. In its parallel motion the
// sides of a loop p, s, q, t are p = −q and s = −t, so that two equations between
// angles stand in the place of C = 0:
//
//	p×q/|p| = 0,  s×t/|s| = 0
//
// which are regular where the cell lies flat and C = 0 is not.

// nearly is by how much the sides of a cell that is in its parallel motion may differ
// from it, over their length.
const nearly = 1e-9

// ringed puts the pins of parallelograms before other rows, for the tree to leave each
// as a loop of its own, and returns the bodies of them in their order around.
func ringed(rows []row, of []int) (order []int, rings [][4]int) {
	first := map[int]bool{}
	for _, i := range of {
		if rows[i].kind == rowX {
			ringsFrom(rows, of, []int{i}, []int{rows[i].a, rows[i].b}, func(pins, bodies []int) {
				rings = append(rings, [4]int(bodies))
				for _, k := range pins {
					first[k] = true
				}
			})
		}
	}
	order = slices.Clone(of)
	slices.SortStableFunc(order, func(i, k int) int {
		switch {
		case first[i] == first[k]:
			return 0
		case first[i]:
			return -1
		}
		return 1
	})
	return order, rings
}

// ringsFrom follows pins from body to body and yields those that close a parallelogram
// of four. The pins come with the first being the least.
func ringsFrom(rows []row, of, pins, bodies []int, yield func(pins, bodies []int)) {
	last := bodies[len(bodies)-1]
	for _, i := range of {
		r := &rows[i]
		if r.kind != rowX || i <= pins[0] || slices.Contains(pins, i) || r.a != last && r.b != last {
			continue
		}
		next := r.a + r.b - last
		all := append(slices.Clone(pins), i)
		switch {
		case len(pins) == 3 && next == bodies[0]:
			if even4(rows, all, bodies) {
				yield(all, bodies)
			}
		case len(pins) < 3 && !slices.Contains(bodies, next):
			ringsFrom(rows, of, all, append(slices.Clone(bodies), next), yield)
		}
	}
}

// even4 reports whether opposite sides of a ring are of one length. Body k+1 lies
// between the pins k and k+1, body 0 between the last and the first.
func even4(rows []row, pins, bodies []int) bool {
	var side [4]float64
	for k, body := range bodies {
		side[k] = r2.Norm(r2.Sub(rows[pins[k]].on(body), rows[pins[(k+3)%4]].on(body)))
	}
	enough := even * max(side[0], side[1])
	return min(side[0], side[1]) > enough && math.Abs(side[0]-side[2]) <= enough && math.Abs(side[1]-side[3]) <= enough
}

// on returns a pin's point in one of its bodies.
func (r *row) on(body int) r2.Vec {
	if r.a == body {
		return r.pa
	}
	return r.pb
}

// cellOf makes a loop a cell if its chords are the sides of one of the rings.
func (n *newton) cellOf(l *loop, rings [][4]int) {
	l.cell = -1
	if l.kind != rowX || l.end-l.still != 4 || l.from != l.to {
		return
	}
	for _, ring := range rings {
		var sides [4]int
		for k, body := range ring {
			sides[k] = l.still + slices.IndexFunc(n.chords[l.still:l.end], func(c chord) bool {
				return c.slide < 0 && n.members[c.member].body == body
			})
		}
		if !slices.Contains(sides[:], l.still-1) {
			l.cell = len(n.cells)
			n.cells = append(n.cells, sides)
			return
		}
	}
}

// parallel reports whether a loop is a cell in its parallel motion.
func (l *loop) parallel(d *desk) bool { return l.cell >= 0 && d.cells[l.cell] != 0 }

// side returns a side of a cell, in the frame.
func (n *newton) side(d *desk, l *loop, k int) r2.Vec {
	k = n.cells[l.cell][k]
	if k < l.moved {
		return r2.Vec{X: d.chords[2*k], Y: d.chords[2*k+1]}
	}
	return n.turnChord(d, k)
}

// layCell writes both equations of a cell in its parallel motion, with their slopes,
// and keeps in d.gap by what they are multiplied.
func (n *newton) layCell(d *desk, i, row int) {
	l := &n.loops[i]
	sides := &n.cells[l.cell]
	for k := range 2 {
		p, q := n.side(d, l, k), n.side(d, l, k+2)
		length := r2.Norm(p)
		turns := -r2.Dot(p, q) / length
		d.miss[row+k], d.gap[2*i+k] = cross(p, q)/length, turns
		j := d.j[(row+k)*n.n:][:n.n]
		clear(j)
		for _, t := range n.members[n.chords[sides[k]].member].own {
			j[t.Index] += t.Coef * turns
		}
		for _, t := range n.members[n.chords[sides[k+2]].member].own {
			j[t.Index] -= t.Coef * turns
		}
	}
}

// driftCell writes the negative of what the equations of a cell in its parallel motion
// change by without the unknown rates: what is 0 for velocities in d.turn, 1 for
// accelerations.
func (n *newton) driftCell(d *desk, i, what int, to []float64) {
	sides := &n.cells[n.loops[i].cell]
	for k := range 2 {
		p, q := n.chords[sides[k]].member, n.chords[sides[k+2]].member
		to[k] = -d.gap[2*i+k] * (d.turn[3*p+what] - d.turn[3*q+what])
	}
}

// align notes which cells are in their parallel motion: those whose sides are no
// further from it than most, in units of their length; or with most = 0 those nearer
// to it than to the contrary motion, in which s and −q are the mirror images of −t and
// p in the line of p + t.
func (n *newton) align(sc *scene, d *desk, most float64) {
	clear(d.cells)
	n.lay(sc, d)
	if len(n.cells) == 0 {
		return
	}
	for i := range n.loops[:n.closed] {
		if l := &n.loops[i]; l.cell >= 0 && n.even(d, l, most) {
			d.cells[l.cell] = 1
		}
	}
	n.lay(sc, d)
}

// even reports whether a cell is in its parallel motion, as for align.
func (n *newton) even(d *desk, l *loop, most float64) bool {
	p, s, q, t := n.side(d, l, 0), n.side(d, l, 1), n.side(d, l, 2), n.side(d, l, 3)
	off, enough := r2.Norm(r2.Add(p, q))+r2.Norm(r2.Add(s, t)), most*(r2.Norm(p)+r2.Norm(s))
	if most == 0 {
		line := r2.Add(p, t)
		enough = r2.Norm(r2.Add(s, mirror(t, line))) + r2.Norm(r2.Add(q, mirror(p, line)))
	}
	return !(enough < off) // also without a line
}

// parted reports whether a cell has come to its parallel motion from another, which a
// step over the flattened position may lead to.
func (n *newton) parted(d *desk) bool {
	for i := range n.loops[:n.closed] {
		if l := &n.loops[i]; l.cell >= 0 && d.cells[l.cell] == 0 && n.even(d, l, nearly) {
			return true
		}
	}
	return false
}

// unfold takes over the unknowns at a solution. Of a cell that is flat they are known
// only to the root of rounding, by C = 0, and in its parallel motion better.
func (n *newton) unfold(sc *scene, d *desk, at []float64) {
	n.restore(d, at)
	n.prepare(sc, d)
	n.align(sc, d, 1e-6)
	if slices.Contains(d.cells, 1) && !(n.polish(sc, d, 1e-5) && n.aligned(d)) {
		n.restore(d, at)
		n.align(sc, d, nearly)
	}
}

// aligned reports whether cells said to be in their parallel motion are: not with p and
// q or s and t in one sense.
func (n *newton) aligned(d *desk) bool {
	for i := range n.loops[:n.closed] {
		if l := &n.loops[i]; l.parallel(d) && !(d.gap[2*i] > 0 && d.gap[2*i+1] > 0) {
			return false
		}
	}
	return true
}
