package slidercrank

import (
	"math"

	"example.com/twopoint/rigid"
)

// Range returns the crank's angles that have a position: a whole turn where Rod ≥
// Crank + |Offset|, elsewhere the one or two intervals at whose ends the rod
// stands square to the guide. It is nil for a zero Linkage.
func (l *Linkage) Range() []rigid.Interval {
	if l.crank == 0 {
		return nil
	}
	low, high := l.end(l.guide-l.given.Rod, -1), l.end(l.guide+l.given.Rod, 1)
	switch {
	case low == -math.Pi/2 && high == math.Pi/2:
		return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	case high == math.Pi/2:
		return []rigid.Interval{{Lo: low, Hi: math.Pi - low}}
	case low == -math.Pi/2:
		return []rigid.Interval{turnFrom(math.Pi-high, math.Pi+2*high)}
	}
	about0, aboutPi := rigid.Interval{Lo: low, Hi: high}, turnFrom(math.Pi-high, high-low)
	if aboutPi.Lo < about0.Lo {
		return []rigid.Interval{aboutPi, about0}
	}
	return []rigid.Interval{about0, aboutPi}
}

// end returns the crank's angle in [−π/2, π/2] where its pin is at the height y,
// with the rod square to the guide, or quarter·π/2 where it never gets there.
func (l *Linkage) end(y, quarter float64) float64 {
	if quarter*y >= l.crank-equal*l.size {
		return quarter * math.Pi / 2
	}
	x, _ := leg(l.crank, y, l.size)
	return math.Atan2(y, x)
}

// turnFrom returns the interval of the given length from lo, or from the same
// angle a turn back where lo is not below π.
func turnFrom(lo, length float64) rigid.Interval {
	if lo >= math.Pi {
		lo -= rigid.Revolution
	}
	return rigid.Interval{Lo: lo, Hi: lo + length}
}

// PressureAngles returns the least and the greatest angle in rad that the rod
// makes with the guide over Range, within [0, π/2]: their sines are |Offset| ∓
// Crank over Rod. Both are NaN for a zero Linkage.
func (l *Linkage) PressureAngles() (least, greatest float64) {
	if l.crank == 0 {
		return math.NaN(), math.NaN()
	}
	e := math.Abs(l.guide)
	return l.tilt(max(e-l.crank, 0)), l.tilt(e + l.crank)
}

// tilt returns the angle between the rod and the guide where the slider pin is
// higher or lower than the crank pin by eta, or a right angle where it never is.
func (l *Linkage) tilt(eta float64) float64 {
	xi, _ := leg(l.given.Rod, eta, l.size)
	return math.Atan2(min(eta, l.given.Rod), xi)
}
