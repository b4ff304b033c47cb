package bilinear

import (
	"math/cmplx"
)

// follow takes a start to its end. A path that goes to infinity does so as a power
// of what is left of the way, which is told by comparing two places near the end.
func (t *tracker) follow(x []complex128) (End, bool) {
	const near, nearer = 1e-5, 1e-7
	if !t.track(x, 0, 1-near) {
		return End{}, false
	}
	first := t.far(x)
	reached := t.track(x, 1-near, 1-nearer)
	second := t.far(x)
	copy(t.x0, x)
	end := End{Regular: reached && t.finish(x)}
	if !end.Regular {
		copy(x, t.x0)
		end.Infinite = second < 0.7*first
		if !end.Infinite && !t.creep(x) {
			copy(x, t.x0)
		}
	}
	t.patch(x)
	t.spread(x)
	end.Z, end.W = append([]complex128(nil), t.z...), append([]complex128(nil), t.w...)
	n := 2 * t.l
	end.Infinite = end.Infinite || cmplx.Abs(t.z[n]) < 1e-10 || cmplx.Abs(t.w[n]) < 1e-10
	return end, true
}

// far returns how far x is from infinity.
func (t *tracker) far(x []complex128) float64 {
	t.patch(x)
	t.spread(x)
	n := 2 * t.l
	return cmplx.Abs(t.z[n]) * cmplx.Abs(t.w[n])
}

// finish goes to s = 1, and reports whether a simple solution is there.
func (t *tracker) finish(x []complex128) bool {
	t.patch(x)
	last := 0.1
	for range 10 {
		size, ratio, ok := t.correct(x, 1)
		if !ok || !(size <= last) || ratio < 1e-11 {
			return false
		}
		if size <= exact {
			size, _, ok = t.correct(x, 1)
			return ok && size <= 0.01*exact
		}
		last = 0.3 * size
	}
	return false
}

// creep goes to s = 1 where several solutions are one, to which Newton's method gets
// nearer by a constant factor, as far as rounding lets it: the root of what it is for
// two. It reports whether it got near.
func (t *tracker) creep(x []complex128) bool {
	const near = 1e-6
	t.patch(x)
	last := 0.1
	for last > exact {
		size, _, ok := t.correct(x, 1)
		if !ok {
			break
		}
		if !(size <= 0.95*last) {
			for i, v := range t.h {
				x[i] += v
			}
			break
		}
		last = size
	}
	return last <= near
}
