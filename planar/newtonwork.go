package planar

import (
	"math"
)

// A desk is the workspace of a newton, laid out.
type desk struct {
	dir    []float64 // unit vectors of the free angles, x and y
	angle  []float64 // free angles over whole turns, where they are needed
	slide  []float64 // in m
	rest   []float64 // of every member: unit vector and angle of what the group does not turn
	axis   []float64 // of every member: its unit vector
	turn   []float64 // of every member: angular velocity and acceleration but for the group's own, and the whole velocity
	chords []float64 // of every chord: its vector in the frame, not yet times its slide
	fixed  []float64 // of every loop: what the unknowns do not move of C
	gap    []float64 // of every loop: C
	vel    []float64 // of the unknowns; slides in units of the group's length
	acc    []float64
	later  []float64 // of every unknown: third, fourth and fifth coefficient of its path, for a single drive
	miss   []float64 // of the equations
	j      []float64 // slopes of the equations, by rows
	lu     []float64 // factors; of the pivots the inverses
	perm   []float64
	square []float64 // of the lengths of the columns of j
	temp   []float64 // two of every unknown
	cells  []float64 // of every cell: 1 in its parallel motion
	last   []float64

	// of customs
	memory  []float64    // what they keep
	weight  []float64    // of every equation: what it is multiplied by
	natural []float64    // of every equation: the length of its slopes, over what moves
	slopes  []float64    // of every equation and link, weighted: by x, y and the angle
	arms    []float64    // of every link: slopes of x and y by the unknowns
	asked   []evaluation // of every custom
}

// sizes of the parts of a desk, in their order.
func (n *newton) sizes() [25]int {
	m, c := len(n.members), n.parts
	return [...]int{
		2 * n.free, n.free, n.slides, 3 * m, 2 * m, 3 * m, 2 * len(n.chords), 2 * len(n.loops), 2 * len(n.loops),
		n.n, n.n, 3 * n.n, n.n, n.n * n.n, n.n * n.n, n.n, n.n, 2 * n.n, len(n.cells), lasts,
		c.memory, c.rows, c.rows, c.slopes, c.arms,
	}
}

// size returns how many float64s of workspace a scene needs.
func (n *newton) size() int {
	sum := 0
	for _, k := range n.sizes() {
		sum += k
	}
	return sum
}

// desks returns the workspaces of groups, and all of them in one.
func desks(groups []*newton) (all []desk, work []float64) {
	size := 0
	for _, n := range groups {
		size += n.size()
	}
	work = make([]float64, size)
	rest := work
	for _, n := range groups {
		all = append(all, n.desk(rest))
		rest = rest[n.size():]
	}
	return all, work
}

// desk lays out a workspace of size().
func (n *newton) desk(w []float64) (d desk) {
	sizes := n.sizes()
	for i, part := range [...]*[]float64{
		&d.dir, &d.angle, &d.slide, &d.rest, &d.axis, &d.turn, &d.chords, &d.fixed, &d.gap,
		&d.vel, &d.acc, &d.later, &d.miss, &d.j, &d.lu, &d.perm, &d.square, &d.temp, &d.cells, &d.last,
		&d.memory, &d.weight, &d.natural, &d.slopes, &d.arms,
	} {
		*part, w = w[:sizes[i]:sizes[i]], w[sizes[i]:]
	}
	n.ask(&d)
	return d
}

const (
	detSign   = iota // indices into desk.last
	detSquare        // of |det| over the product of the columns' lengths
	lastGap
	pathSpeed // of a single drive, to which vel and acc belong with no acceleration of it; 0 if they do not
	pathScale // by which the next step takes vel
	broken    // of the custom that gave no equations: (its number + 1)·faultKinds + kind; else 0
	lasts
)

// factor factors the slopes with partial pivoting, and reports false where they are
// singular. gonum's factors take several times as long for so small a matrix.
//
// The ratio |det|/Π‖column‖ is at most the least sine between a column and the span
// of the rest, by Hadamard's inequality for the rest.
func (d *desk) factor() bool {
	n := len(d.perm)
	if n == 4 {
		return d.factorFour()
	}
	j, lu, square := d.j, d.lu[:len(d.j)], d.square[:n]
	clear(square)
	for i := 0; i+n <= len(j); i += n {
		for k, v := range j[i : i+n] {
			lu[i+k] = v
			square[k] += v * v
		}
	}
	sign, ratio := 1.0, 1.0
	for k := range n {
		rowK := lu[k*n : k*n+n]
		best, most := k, math.Abs(rowK[k])
		for i := k + 1; i < n; i++ {
			if v := math.Abs(lu[i*n+k]); v > most {
				best, most = i, v
			}
		}
		d.perm[k] = float64(best)
		if best != k {
			sign = -sign
			other := lu[best*n : best*n+n]
			for i, v := range rowK {
				rowK[i], other[i] = other[i], v
			}
		}
		pivot := rowK[k]
		if !(most > 0) {
			d.last[detSign], d.last[detSquare] = 0, 0
			return false
		}
		if pivot < 0 {
			sign = -sign
		}
		ratio *= pivot * pivot / square[k]
		inverse := 1 / pivot
		rowK[k] = inverse
		rowK = rowK[k+1:]
		for i := k + 1; i < n; i++ {
			row := lu[i*n+k : i*n+n]
			f := row[0] * inverse
			row[0] = f
			row = row[1:]
			for c, v := range rowK {
				row[c] -= f * v
			}
		}
	}
	d.last[detSign], d.last[detSquare] = sign, ratio
	return true
}

// solve solves j·x = x in place by the factors.
func (d *desk) solve(x []float64) {
	n := len(d.perm)
	x = x[:n]
	if n == 4 {
		d.solveFour((*[4]float64)(x))
		return
	}
	for k, p := range d.perm {
		if p := int(p); p != k {
			x[k], x[p] = x[p], x[k]
		}
	}
	lu := d.lu
	for i := 1; i < n; i++ {
		row, sum := lu[i*n:i*n+i], x[i]
		known := x[:len(row)]
		for c, v := range row {
			sum -= v * known[c]
		}
		x[i] = sum
	}
	for i := n - 1; i >= 0; i-- {
		row := lu[i*n+i : i*n+n]
		known := x[i:][:len(row)]
		sum := known[0]
		for c := 1; c < len(row); c++ {
			sum -= row[c] * known[c]
		}
		known[0] = sum * row[0]
	}
}

// open returns how far the loops were from closing, in m, at the last trial of a
// place or assemble that failed.
func (d *desk) open() float64 { return d.last[lastGap] }
