package rolling

import (
	"math"

	"example.com/twopoint/rigid"
)

// A Slip is how a wheel slips on its track.
type Slip struct {
	// Slide is how far, in m, the rim has slid over the track at the contact, in
	// the direction of the track, with its rates: travel + Radius·turn. Of a wheel
	// that rolls it is 0.
	Slide rigid.Coordinate
	// Ratio is the slip ratio: with p = −Radius·ω the speed of a wheel that rolls
	// and v that of its centre, p − v over the faster of the two. It is 0 where the
	// wheel rolls or rests, 1 where it spins on the spot, −1 where it skids with
	// locked brakes, beyond these where rim and centre go opposite ways; positive,
	// the wheel drives, negative, it brakes.
	Ratio float64
}

// SlipLimits are the magnitudes that a slip may have. A zero field is not checked.
type SlipLimits struct {
	Length float64 // of Slide.Pos, in m
	Speed  float64 // of Slide.Vel, in m/s
	Ratio  float64
}

// Within reports whether no magnitude is over its limit. A slip or a limit that is
// NaN is not within.
func (s Slip) Within(l SlipLimits) bool {
	within := func(x, limit float64) bool { return limit == 0 || math.Abs(x) <= limit }
	return within(s.Slide.Pos, l.Length) && within(s.Slide.Vel, l.Speed) && within(s.Ratio, l.Ratio)
}

// Slip returns the slip of a wheel whose turn, in rad, and travel of the centre, in
// m, are both known, say measured. Both must count from one position in which the
// slide is taken as 0. On a moving belt take the belt's coordinate off the travel.
// Errors as Solve.
func (w *Wheel) Slip(turn, travel rigid.Coordinate) (Slip, error) {
	r := w.dim.Radius
	if r == 0 {
		return Slip{}, rigid.ErrInput
	}
	s := Slip{Slide: rigid.Coordinate{
		Pos: math.FMA(r, turn.Pos, travel.Pos),
		Vel: math.FMA(r, turn.Vel, travel.Vel),
		Acc: math.FMA(r, turn.Acc, travel.Acc),
	}}
	faster := -r * turn.Vel
	if math.Abs(travel.Vel) > math.Abs(faster) {
		faster = travel.Vel
	}
	if faster != 0 {
		s.Ratio = -s.Slide.Vel / faster
	}
	if !finite(s.Slide.Pos, s.Slide.Vel, s.Slide.Acc, s.Ratio) {
		return Slip{}, rigid.ErrNotFinite
	}
	return s, nil
}

// SolveSlip is Solve for a wheel whose contact particle does not rest on the track
// but moves along it as slip says, in m, positive towards +x of the track:
//
//	Travel = slip − Radius·turn
//
// It serves a wheel that slips, and as well one that rolls on a belt: slip is then
// the motion of the belt's surface along the track.
func (w *Wheel) SolveSlip(dst *WheelState, turn, slip rigid.Coordinate) error {
	r := w.dim.Radius
	path := product(-r, turn.Pos).plus(double{hi: slip.Pos})
	travel := rigid.Coordinate{Pos: path.hi, Vel: slip.Vel - r*turn.Vel, Acc: slip.Acc - r*turn.Acc}
	return w.place(dst, turn, travel, path.lo, slip.Vel, slip.Acc)
}

// SolveRatio is Solve for a wheel that slips at one ratio, as Slip defines it, all
// the way from turn 0. At −1 the wheel is locked, so that its turn does not
// determine its travel: ErrSingular; no wheel has a ratio beyond ±2: ErrUnreachable.
func (w *Wheel) SolveRatio(dst *WheelState, turn rigid.Coordinate, ratio float64) error {
	var rolls float64 // slide over what the turn would travel, (v − p)/p
	switch {
	case !finite(ratio):
		return rigid.ErrNotFinite
	case math.Abs(ratio) > 2:
		return rigid.ErrUnreachable
	case ratio == -1:
		return rigid.ErrSingular
	case ratio >= 0:
		rolls = -ratio
	default:
		rolls = -ratio / (1 + ratio)
	}
	k := -w.dim.Radius * rolls
	return w.SolveSlip(dst, turn, rigid.Coordinate{Pos: k * turn.Pos, Vel: k * turn.Vel, Acc: k * turn.Acc})
}

// SolveBelt is Solve for a wheel driven by the belt or table it rolls on: belt is
// the motion of the surface along the track and travel that of the wheel's centre,
// zero for a roller on a fixed axle, both in m:
//
//	Turn = (belt − travel)/Radius
func (w *Wheel) SolveBelt(dst *WheelState, travel, belt rigid.Coordinate) error {
	r := w.dim.Radius
	turn := rigid.Coordinate{Pos: (belt.Pos - travel.Pos) / r, Vel: (belt.Vel - travel.Vel) / r, Acc: (belt.Acc - travel.Acc) / r}
	return w.place(dst, turn, travel, 0, belt.Vel, belt.Acc)
}
