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
// along a step: slope and bend are its derivatives by the part of the step. Its size
// is that of the terms of which it is the difference.
type room struct{ value, slope, bend, size float64 }

// square returns |d|² with its derivatives.
func square(d, vel, acc r2.Vec) room {
	return room{r2.Dot(d, d), 2 * r2.Dot(d, vel), 2 * (r2.Dot(vel, vel) + r2.Dot(d, acc)), 0}
}

// less returns a − b, of the size given.
func (a room) less(b room, size float64) room {
	return room{a.value - b.value, a.slope - b.slope, a.bend - b.bend, size}
}

// A crosser is a solver that may jump a gap.
type crosser interface {
	solver
	// rooms returns the conditions at a place with path rates.
	rooms(sc *scene) (r [2]room, n int)
}

// A cubic is the one through two places of a room and their slopes, by the part of
// the step:
//
//	value + slope t + q t² + c t³
type cubic struct{ value, slope, q, c float64 }

func through(a, b room) cubic {
	rise := b.value - a.value
	return cubic{a.value, a.slope, 3*rise - 2*a.slope - b.slope, a.slope + b.slope - 2*rise}
}

// dip returns where the cubic has a minimum between its ends, and its value there.
func (k cubic) dip() (at, value float64, ok bool) {
	root := k.q*k.q - 3*k.c*k.slope
	if !(root >= 0) {
		return 0, 0, false
	}
	// of the two roots of slope + 2q t + 3c t² = 0 that where q + 3c t > 0
	if s := math.Sqrt(root); k.q >= 0 {
		at = -k.slope / (k.q + s)
	} else {
		at = (s - k.q) / (3 * k.c)
	}
	if !(at > 0 && at < 1) {
		return 0, 0, false
	}
	return at, k.value + at*(k.slope+at*(k.q+at*k.c)), true
}

// off returns twice what the cubic may be off in the middle, as the bends at both
// ends tell: with a fourth derivative D its error is D t²(1−t)²/24, at most D/384,
// and the bends are off by D/12.
func (k cubic) off(a, b room) float64 {
	return math.Max(math.Abs(a.bend-2*k.q), math.Abs(b.bend-2*k.q-6*k.c)) / 16
}
