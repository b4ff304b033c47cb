package slidercrank

import (
	"math"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// Range returns the crank's angles that have a position: a whole turn, the one
// interval [−π, π], where Rod ≥ Crank + |Offset|, elsewhere the one or two intervals
// at whose ends the rod stands square to the guide, so that Solve refuses rates
// there. It is nil for a zero Linkage.
func (l *Linkage) Range() []rigid.Interval {
	if l.crank == 0 {
		return nil
	}
	low, high := l.end(l.guide-l.rod, -1), l.end(l.guide+l.rod, 1)
	switch {
	case low == -math.Pi/2 && high == math.Pi/2:
		return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	case high == math.Pi/2:
		return []rigid.Interval{l.between(low, math.Pi-low)}
	case low == -math.Pi/2:
		return []rigid.Interval{l.between(math.Pi-high, rigid.Revolution+high)}
	}
	about0, aboutPi := l.between(low, high), l.between(math.Pi-high, math.Pi-low)
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

// between returns the interval from lo to hi, or from the same angle a turn back
// where lo is not below π. Where an end was rounded into the range it is put back
// out, so that it is singular there, as it should be.
func (l *Linkage) between(lo, hi float64) rigid.Interval {
	if lo >= math.Pi {
		lo, hi = lo-rigid.Revolution, hi-rigid.Revolution
	}
	return rigid.Interval{Lo: max(l.outward(lo, -1), -math.Pi), Hi: l.outward(hi, 1)}
}

// outward returns the end moved on by as little as makes the rod square to the guide
// there, its pin no longer within reach: as Solve reckons it, product and difference
// both rounded on every processor.
func (l *Linkage) outward(end, sign float64) float64 {
	step := sign * 0x1p-53 * l.size / l.crank
	for range 8 {
		if sin, _ := trig.Sincos(end); math.Abs(l.guide-float64(l.crank*sin)) >= l.rod {
			break
		}
		end, step = end+step, 2*step
	}
	return end
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
	xi, _ := leg(l.rod, eta, l.size)
	return math.Atan2(eta, xi)
}
