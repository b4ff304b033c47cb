package planar

import (
	"math"

	"example.com/twopoint/rigid"
)

// margin returns the margin of the group: that of its slopes or, if less, how much
// of the length of a Constraint's slopes the unknowns keep, an angle counting on an arm
// of the group's length. Where a pin in a slot goes along it that is 0, even if there
// is but one unknown.
func (n *newton) margin(d *desk) float64 { return math.Min(d.margin(), n.kept(d)) }

func (n *newton) kept(d *desk) float64 {
	least := 1.0
	first := n.n - len(d.natural)
	for k, size := range d.natural {
		sum := 0.0
		for _, v := range d.j[(first+k)*n.n:][:n.n] {
			sum += v * v
		}
		least = math.Min(least, math.Sqrt(sum)/(d.weight[k]*size))
	}
	if !(least >= 0) {
		return 0
	}
	return least
}

// regular reports whether the rates are determined.
func (n *newton) regular(d *desk) bool {
	return d.regular() && n.kept(d) >= rigid.LeastMargin
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
		least = math.Min(least, 1/math.Sqrt(s*d.square[i]))
	}
	if !(least >= 0) {
		return 0
	}
	return least
}

// regular reports whether the rates are determined.
func (d *desk) regular() bool {
	return d.last[detSquare] >= rigid.LeastMargin*rigid.LeastMargin || d.margin() >= rigid.LeastMargin
}
