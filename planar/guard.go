package planar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A guard is what tells whether a dyad may have been out of reach on the way from
// one place to the next: the vector on which its reach depends, and the room it
// has, in m², 0 at a limit.
type guard struct {
	d    r2.Vec
	room float64
}

// clear reports whether there is no gap between two places: the room at both ends
// is more than d can use up on the way. A d that moves along a chord gets at most
// half of its length e away from the nearer end, and so |d|² changes by at most
// e·|d|; the bow of a step of a quarter radian is well within the rest of 1.2.
func (g *guard) clear(was *guard, most float64) bool {
	ex, ey := g.d.X-was.d.X, g.d.Y-was.d.Y
	e := 1.44 * most * (ex*ex + ey*ey)
	return g.room >= 0 && was.room >= 0 && (g.room*g.room > e && was.room*was.room > e || e == 0)
}

// A room is one of the conditions for a dyad to close, value > 0, as it changes
// along a step: its slope is by the step's whole length. Its size is that of the
// terms of which it is the difference.
type room struct{ value, slope, size float64 }

// A crosser is a solver that may jump a gap.
type crosser interface {
	solver
	// rooms returns the conditions at a place with path rates.
	rooms(sc *scene) (r [2]room, n int)
}

// dip returns where, from 0 to 1, the cubic through two places and their slopes has
// a minimum between them, and its value there.
func dip(a, b room) (at, value float64, ok bool) {
	// with t from 0 to 1: a.value + a.slope t + q t² + c t³
	rise := b.value - a.value
	q := 3*rise - 2*a.slope - b.slope
	c := a.slope + b.slope - 2*rise
	root := q*q - 3*c*a.slope
	if !(root >= 0) {
		return 0, 0, false
	}
	// of the two roots of a.slope + 2q t + 3c t² = 0 that where q + 3c t > 0
	if s := math.Sqrt(root); q >= 0 {
		at = -a.slope / (q + s)
	} else {
		at = (s - q) / (3 * c)
	}
	if !(at > 0 && at < 1) {
		return 0, 0, false
	}
	return at, a.value + at*(a.slope+at*(q+at*c)), true
}
