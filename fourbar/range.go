package fourbar

import (
	"math"

	"example.com/twopoint/rigid"
)

// Range returns the crank angles at which the links close, in rad in the
// mechanism's axes: disjoint intervals in order, each starting in [−π, π). A crank
// that turns fully has the one interval [−π, π]. At the ends of the others coupler
// and follower lie in one line; Solve accepts them at rest. Nil for a linkage that
// is not from New.
func (l *Linkage) Range() []rigid.Interval {
	if l.longest == 0 {
		return nil
	}
	folded, stretched := l.limited(l.frame, l.crank, l.coupler, l.follower)
	lo, hi := l.turnAt(math.Abs(l.coupler-l.follower)), l.turnAt(l.coupler+l.follower)
	switch {
	case folded && stretched:
		return []rigid.Interval{{Lo: -hi, Hi: -lo}, {Lo: lo, Hi: hi}}
	case folded:
		return []rigid.Interval{{Lo: lo, Hi: rigid.Revolution - lo}}
	case stretched:
		return []rigid.Interval{{Lo: -hi, Hi: hi}}
	}
	return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
}

// turnAt returns the crank angle φ in [0, π] at which the crank pin is at distance
// x from the follower pivot, NaN where it never is. The law of cosines in halved
// angles has products of differences of lengths only:
//
//	tan²(φ/2) = (x² − (d − a)²)/((d + a)² − x²)
func (l *Linkage) turnAt(x float64) float64 {
	d, a := l.frame, l.crank
	far, near := d+a, math.Abs(d-a)
	return 2 * math.Atan2(math.Sqrt((x-near)*(x+near)), math.Sqrt((far-x)*(far+x)))
}

// Gap returns how far the loop is from closing at a crank angle in rad: the least
// distance in m, the coupler turned about the crank pin, between its follower pin
// and that of the follower. It is 0 where the loop closes, also within the rounding
// that Solve allows at a limit, and NaN for an angle that is not finite or a
// linkage that is not from New.
func (l *Linkage) Gap(turn float64) float64 {
	if l.longest == 0 {
		return math.NaN()
	}
	d := l.byCrank.span(direction(turn))
	gap := l.byCrank.dyad.Gap(math.Hypot(d.X, d.Y))
	if gap <= closed*l.longest {
		return 0
	}
	return gap
}
