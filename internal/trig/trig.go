// Package trig has the sine, cosine and angle of a direction for the inner loops
// of the solvers, which spend most of their time there: about half that of
// package math's with the same accuracy. It looks the nearest of 512 directions
// of the turn up, and turns from there by a short series.
package trig

import "math"

const (
	steps = 512
	step  = 2 * math.Pi / steps

	// step in two parts: a whole number of up to 28 binary digits times the first
	// is exact, and so is what it leaves of an angle.
	step1 = 0x1.921fb5p-7
	step2 = 0x1.110b4611a6263p-33

	// round added to a number of less than 2⁵¹ leaves it rounded to a whole one in
	// the last digits of the sum.
	round = 3 << 51

	greatest = 1e6 // rad: beyond it package math serves

	// asin(x) is about x/step + asin3·x³ steps for |x| ≤ √½, within 0.4.
	asin3 = 18
)

// Sincos returns the sine and cosine of an angle in rad, each in error by at most
// 2⁻⁵² of itself and 2e-24 of the angle, NaN for an angle that is not finite.
func Sincos(angle float64) (sin, cos float64) {
	if !(angle < greatest && angle > -greatest) {
		return math.Sincos(angle)
	}
	t := angle*(1/step) + round
	k := t - round
	d := (angle - k*step1) - k*step2
	q := d * d
	at := &directions[math.Float64bits(t)%steps]
	s := d + d*q*(q*(1./120)-1./6)
	c := q * (q*(1./24-4e-8) - 1./2) // cos(d) − 1, with 4e-8 for the mean of the next term's q/720
	return at.s + (at.s*c + at.c*s), at.c + (at.c*c - at.s*s)
}

// Angle returns the angle of the vector (x, y), of length 1 within rounding, in
// [−π, π], in error by at most 3 × 2⁻⁵² of itself.
func Angle(x, y float64) float64 { return AngleOf(x, y, 1) }

// AngleOf is Angle for a vector of length 1 within 1e-8, over the inverse of its
// length, so that an inner loop need not wait for the vector to be brought to it.
func AngleOf(x, y, over float64) float64 {
	xx, yy := x*x, y*y
	var t float64 // the angle in steps, within half a one of the nearest
	if yy > xx {
		t = x * (1/step + asin3*xx)
		if y > 0 {
			t = (steps/4 - t) + round
		} else {
			t = (t - steps/4) + round
		}
	} else {
		t = y * (1/step + asin3*yy)
		switch {
		case x > 0:
			t += round
		case y < 0:
			t = round - (t + steps/2)
		default:
			t = round - (t - steps/2)
		}
	}
	at := &directions[math.Float64bits(t)%steps]
	s := over * (y*at.c - x*at.s) // the sine of the rest
	q := s * s
	return (t-round)*step + (s + s*q*(1./6+q*(3./40+q*(15./336))))
}
