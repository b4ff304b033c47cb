package planar

import (
	"math"

	"example.com/twopoint/rigid"
)

// A desk is the workspace of a newton, laid out.
type desk struct {
	dir   []float64 // unit vectors of the free angles, x and y
	angle []float64 // free angles over whole turns, where they are needed
	slide []float64 // in m
	rest  []float64 // of every member: unit vector and angle of what the group does not turn
	known []float64 // of every member: angular velocity and acceleration but for the group's own
	arms  []float64 // of every limb and loop: both arms and the line, turned into the frame
	slope []float64 // of every member: derivatives of the origin by the unknowns
	drift []float64 // of every member: velocity and acceleration of the origin but for the unknown rates
	vel   []float64 // of the unknowns; slides in units of the group's length
	acc   []float64
	miss  []float64 // of the equations
	j     []float64 // slopes of the equations, by rows
	lu    []float64
	perm  []float64
	norm  []float64 // of the columns of j
	temp  []float64 // two of every unknown
	last  []float64 // sign of the determinant, its ratio to that of a rectangular matrix, gap
}

// sizes of the parts of a desk, in their order.
func (n *newton) sizes() [17]int {
	m := len(n.members)
	return [...]int{
		2 * n.free, n.free, n.slides, 3 * m, 2 * m, 6 * (len(n.tree) + len(n.loops)), 2 * m * n.n, 4 * m,
		n.n, n.n, n.n, n.n * n.n, n.n * n.n, n.n, n.n, 2 * n.n, 3,
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
		&d.dir, &d.angle, &d.slide, &d.rest, &d.known, &d.arms, &d.slope, &d.drift,
		&d.vel, &d.acc, &d.miss, &d.j, &d.lu, &d.perm, &d.norm, &d.temp, &d.last,
	} {
		*part, w = w[:sizes[i]:sizes[i]], w[sizes[i]:]
	}
	return d
}

const (
	detSign  = iota // indices into desk.last
	detRatio        // |det| over the product of the columns' lengths
	lastGap
)

// factor factors the slopes with partial pivoting, and reports false where they are
// singular. gonum's factors take several times as long for so small a matrix.
//
// The ratio |det|/Π‖column‖ is at most the least sine between a column and the span
// of the rest, by Hadamard's inequality for the rest.
func (d *desk) factor() bool {
	n := len(d.perm)
	copy(d.lu, d.j)
	for k := range n {
		sum := 0.0
		for i := k; i < n*n; i += n {
			sum += d.j[i] * d.j[i]
		}
		d.norm[k] = math.Sqrt(sum)
	}
	sign, ratio := 1.0, 1.0
	for k := range n {
		best := k
		for i := k + 1; i < n; i++ {
			if math.Abs(d.lu[i*n+k]) > math.Abs(d.lu[best*n+k]) {
				best = i
			}
		}
		d.perm[k] = float64(best)
		rowK := d.lu[k*n : k*n+n]
		if best != k {
			sign = -sign
			other := d.lu[best*n : best*n+n]
			for i, v := range rowK {
				rowK[i], other[i] = other[i], v
			}
		}
		pivot := rowK[k]
		if !(math.Abs(pivot) > 0) {
			d.last[detSign], d.last[detRatio] = 0, 0
			return false
		}
		if pivot < 0 {
			sign = -sign
		}
		ratio *= math.Abs(pivot) / d.norm[k]
		inverse := 1 / pivot
		for i := k + 1; i < n; i++ {
			row := d.lu[i*n : i*n+n]
			f := row[k] * inverse
			row[k] = f
			if f == 0 {
				continue
			}
			for c := k + 1; c < n; c++ {
				row[c] -= f * rowK[c]
			}
		}
	}
	d.last[detSign], d.last[detRatio] = sign, ratio
	return true
}

// solve solves j·x = x in place by the factors.
func (d *desk) solve(x []float64) {
	n := len(d.perm)
	for k := range n {
		if p := int(d.perm[k]); p != k {
			x[k], x[p] = x[p], x[k]
		}
	}
	for i := 1; i < n; i++ {
		sum := x[i]
		for c, v := range d.lu[i*n : i*n+i] {
			sum -= v * x[c]
		}
		x[i] = sum
	}
	for i := n - 1; i >= 0; i-- {
		row, sum := d.lu[i*n:i*n+n], x[i]
		for c := i + 1; c < n; c++ {
			sum -= row[c] * x[c]
		}
		x[i] = sum / row[i]
	}
}

// margin returns the least sine between a column of the slopes and the span of the
// rest: 1 over the length of the column and that of its row in the inverse.
func (d *desk) margin() float64 {
	n := len(d.perm)
	if d.last[detSign] == 0 {
		return 0
	}
	x, square := d.temp[:n], d.temp[n:]
	clear(square)
	for k := range n {
		clear(x)
		x[k] = 1
		d.solve(x)
		for i, v := range x {
			square[i] += v * v
		}
	}
	least := 1.0
	for i, s := range square {
		least = math.Min(least, 1/(math.Sqrt(s)*d.norm[i]))
	}
	if !(least >= 0) {
		return 0
	}
	return least
}

// regular reports whether the rates are determined.
func (d *desk) regular() bool {
	return d.last[detRatio] >= rigid.LeastMargin || d.margin() >= rigid.LeastMargin
}

// gap returns how far the loops were from closing, in m, at the last trial of a
// place or assemble that failed.
func (d *desk) gap() float64 { return d.last[lastGap] }
