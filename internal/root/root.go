// Package root finds where a function of one variable takes a value, where it
// turns, and where what can be said of it ceases to hold, each inside a bracket.
//
// All functions are pure: the same input gives the same calls of f in the same
// order, their number is bounded, and nothing is allocated.
package root

import "math"

// halvings is how often a bracket is halved at most: from any width to what is
// left of it after the 53 bits of a float64, with some to spare near 0.
const halvings = 64

// Bisect draws in, where holds is true, and out, where it is false, together until
// there is no float64 between them, or 64 times by half, and returns the two. Of
// several places where holds changes it finds one. It does not call holds for in
// and out themselves.
func Bisect(holds func(x float64) bool, in, out float64) (float64, float64) {
	for range halvings {
		x := in + (out-in)/2
		if x == in || x == out {
			break
		}
		if holds(x) {
			in = x
		} else {
			out = x
		}
	}
	return in, out
}

// Minimum returns where f is least between a and b, if it falls and then rises,
// by golden section: 48 calls, which leave 1e-10 of the bracket. As f is flat at
// its minimum, rounding of f leaves the place uncertain by about 1e-8 of the length
// over which f changes by its own size. Of several minima it finds one.
func Minimum(f func(x float64) float64, a, b float64) float64 {
	const golden = math.Phi - 1 // (√5 − 1)/2
	x, y := b-golden*(b-a), a+golden*(b-a)
	fx, fy := f(x), f(y)
	for range 46 {
		if fx < fy {
			b, y, fy = y, x, fx
			x = b - golden*(b-a)
			fx = f(x)
		} else {
			a, x, fx = x, y, fy
			y = a + golden*(b-a)
			fy = f(y)
		}
	}
	if fx < fy {
		return x
	}
	return y
}
