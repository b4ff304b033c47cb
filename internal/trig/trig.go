// Package trig has the sine, cosine and angle of a direction for the inner loops
// of the solvers, which spend most of their time there: about half that of
// package math's with the same accuracy. It looks the nearest of 128 directions
// of the turn up, and turns from there by a short series.
package trig

import "math"

const (
	steps = 128
	step  = 2 * math.Pi / steps

	// step in two parts: a whole number of up to 27 binary digits times the first
	// is exact, and so is what it leaves of an angle.
	step1 = 0x1.921fb5p-5
	step2 = 0x1.110b4611a6263p-31

	// round added to a number of less than 2⁵¹ leaves it rounded to a whole one in
	// the last digits of the sum.
	round = 3 << 51

	greatest = 1e6 // rad: beyond it package math serves
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
	s := d + d*q*(q*(1./120-q*(1./5040))-1./6)
	c := q * (q*(1./24-q*(1./720)) - 1./2) // cos(d) − 1
	return at.s + (at.s*c + at.c*s), at.c + (at.c*c - at.s*s)
}

// Angle returns the angle of the vector (x, y), of length 1 within rounding, in
// [−π, π], in error by at most 3 × 2⁻⁵² of itself.
func Angle(x, y float64) float64 {
	var t float64 // steps, within one
	if math.Abs(y) > math.Abs(x) {
		e := x * (1/step + 4.5*(x*x))
		if y < 0 {
			t = (e - steps/4) + round
		} else {
			t = (steps/4 - e) + round
		}
	} else {
		e := y * (1/step + 4.5*(y*y))
		if x > 0 {
			t = e + round
		} else if y < 0 {
			t = round - (e + steps/2)
		} else {
			t = round - (e - steps/2)
		}
	}
	at := &directions[math.Float64bits(t)%steps]
	s := y*at.c - x*at.s // the sine of the rest
	q := s * s
	return (t-round)*step + (s + s*q*((1./6+q*(3./40))+q*q*(15./336+q*(105./3456))))
}
