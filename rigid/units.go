package rigid

import "math"

// Units to multiply in and divide out: 30*rigid.RPM is a speed in rad/s, and
// w/rigid.RPM the number to show.
const (
	Degree     = math.Pi / 180   // rad
	Revolution = 2 * math.Pi     // rad
	RPM        = Revolution / 60 // rad/s
	Millimetre = 1e-3            // m
)

// LeastMargin is the margin below which the library gives no rates. A margin is
// a sine: 1 where the driven joints transmit best, 0 where the closure equations
// do not determine the rates. A rate asked for below LeastMargin is refused with
// ErrSingular; above it the value is exact but may be huge, so a controller
// holds by a margin and a speed limit of its own.
const LeastMargin = 1e-8

// Wrap returns angle less whole revolutions, in (−π, π]. The revolution is the
// float64 nearest to 2π, so after n turns the result is off by n × 2.4e-16 rad.
// Of NaN and the infinities it is NaN.
func Wrap(angle float64) float64 {
	if -math.Pi < angle && angle <= math.Pi {
		return angle
	}
	w := math.Remainder(angle, Revolution)
	if w <= -math.Pi {
		return math.Pi
	}
	return w
}

// Nearest returns angle plus the whole revolutions that bring it within half a
// revolution of to: how a wrapped encoder follows a motion over many turns. An
// angle that is that near already comes back as it is. The sum is rounded once, to
// the unit of the result. Where a number is not finite the result isn't either.
func Nearest(angle, to float64) float64 {
	return math.FMA(Revolution, math.RoundToEven((to-angle)/Revolution), angle)
}

// finite reports whether every number is neither NaN nor infinite: x·0 is 0 for
// a finite x and NaN for any other.
func finite(x ...float64) bool {
	s := 0.0
	for _, v := range x {
		s += v * 0
	}
	return s == 0
}
