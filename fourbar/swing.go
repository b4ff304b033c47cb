package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// A winding tells which of the angles of the follower that differ by whole turns
// is the one of a continuous motion: the one within half a turn of
//
//	middle + turns·Turn
//
// where a crank that does not turn fully has its angle reduced to within half a
// turn of about.
type winding struct {
	turns  float64 // of the follower for one of the crank: 0, 1 or −1
	middle float64
	fold   bool
	about  float64 // 0 or π, the middle of the crank's range

	// The angles half a turn from middle, between which the angle is right as it comes;
	// none where the follower turns.
	least, most float64
}

// newWinding finds the winding of a linkage. Let β be the angle of the line d from
// the crank pin to the follower pivot, and γ in [0, π] the angle of the triangle of
// d, coupler and follower at that pivot: the follower is at β + s(π − γ), s = +1
// for Open.
//
// With the crank shorter than the frame β stays in (−π/2, π/2), so the follower is
// within half a turn and a quarter of s·π/2, on the far side of which it never
// gets. With the crank longer β − Turn stays within a quarter turn of π instead,
// and Swing − Turn in the same way by −s·π/2. A follower that does not turn fully
// swings about 0 or π on both branches, or above or below the frame's line, which
// it never crosses.
func (l *Linkage) newWinding() winding {
	switch {
	case l.dim.Branch == Parallel:
		return turning(1, 0)
	case l.dim.Branch == Contrary && l.crank > l.frame:
		return turning(1, 0)
	case l.dim.Branch == Contrary:
		return turning(-1, 0)
	case !l.crankTurns() && !l.followerTurns():
		if folded, _ := l.limited(l.frame, l.follower, l.coupler, l.crank); folded {
			return swinging(0)
		}
		return swinging(math.Pi)
	case l.crank <= l.frame:
		return swinging(l.side * math.Pi / 2)
	}
	w := turning(1, -l.side*math.Pi/2)
	w.fold = !l.crankTurns()
	if _, stretched := l.limited(l.frame, l.crank, l.coupler, l.follower); !stretched {
		w.about = math.Pi
	}
	return w
}

func swinging(middle float64) winding {
	return winding{middle: middle, least: middle - math.Pi, most: middle + math.Pi}
}

func turning(turns, middle float64) winding {
	return winding{turns: turns, middle: middle, least: math.Inf(1)}
}

// swing returns Swing.Pos for a crank angle and the follower's axis.
func (l *Linkage) swing(turn float64, follower r2.Vec) float64 {
	return l.wind(turn, trig.Angle(follower.X, follower.Y))
}

// wind returns Swing.Pos for a crank angle and the follower's angle in [−π, π].
func (l *Linkage) wind(turn, angle float64) float64 {
	w := &l.winding
	switch {
	case w.turns != 0:
		if w.fold {
			turn = rigid.Nearest(turn, w.about)
		}
		return rigid.Nearest(angle, w.middle+w.turns*turn)
	case angle < w.least:
		return angle + rigid.Revolution
	case angle > w.most:
		return angle - rigid.Revolution
	}
	return angle
}
