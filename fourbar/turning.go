package fourbar

import "math"

// equal is the difference, of the longest link, below which two sums of two
// lengths count as equal: lengths come as decimals, whose sums are rounded.
const equal = 4 * 0x1p-52

// full reports whether a link of length turning makes whole turns on one of
// length base to which it is pinned, when the other two are p and q: whether
// their far ends stay within reach of p and q,
//
//	base + turning ≤ p + q  and  |base − turning| ≥ |p − q|
//
// Equality, a change point, counts as full.
func (l *Linkage) full(base, turning, p, q float64) bool {
	lo, hi := l.limited(base, turning, p, q)
	return !lo && !hi
}

// limited reports whether the distance between the far ends of base and turning,
// |base − turning| when folded and base + turning when stretched, goes below |p − q|
// and above p + q, where the other two links lie in one line.
func (l *Linkage) limited(base, turning, p, q float64) (folded, stretched bool) {
	tol := equal * max(base, turning, p, q)
	folded = math.Abs(p-q)-math.Abs(base-turning) > tol
	stretched = (base+turning)-(p+q) > tol
	return folded, stretched
}

func (l *Linkage) crankTurns() bool { return l.full(l.frame, l.crank, l.coupler, l.follower) }
func (l *Linkage) followerTurns() bool {
	return l.full(l.frame, l.follower, l.coupler, l.crank)
}
