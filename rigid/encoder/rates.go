package encoder

import (
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// Limits of NewRates.
const (
	greatestDegree = 6
	greatestWindow = 1 << 16
)

// Rates estimates the motion of a measured scalar from its last samples: the
// polynomial that fits them best (least squares), and its derivatives. Samples need
// not be evenly spaced. One goroutine owns a Rates; the zero Rates takes no sample.
//
// With even spacing and an odd window this is the filter of A. Savitzky and M. J.
// E. Golay, Smoothing and differentiation of data by simplified least squares
// procedures, Analytical Chemistry 36, 1964 (from memory). The polynomials are
// orthogonal over the times of the samples at hand, made by the recurrence of G. E.
// Forsythe, Generation and use of orthogonal polynomials for data-fitting with a
// digital computer, J. SIAM 5, 1957 (from memory), on times centred and scaled to
// [−1, 1], so that neither a long uptime nor a short tick costs digits but those that
// the times themselves have lost: after a day a float64 of s steps by 1.5e-11 s, at the
// 1.8e9 s of a calendar by 2.4e-7 s. Count the times from the start of the program.
type Rates struct {
	degree int
	time   []float64 // the last samples; the next goes to place next
	pos    []float64
	next   int
	filled int
	last   float64 // time of the newest sample

	tau, rest, p, before []float64 // scratch: times, residual, two polynomials
}

// Causes for which degree and window are refused.
var (
	errDegree = dims.Because(rigid.ErrInput, "the degree must be from 1 to 6")
	errWindow = dims.Because(rigid.ErrInput, "the window must be greater than the degree, and at most 65536 samples")
)

// NewRates returns a Rates that fits a polynomial of the given degree over the
// given number of samples. Degree 2 follows a steady acceleration, degree 3 and 4 a
// changing one with more noise; of degree 1 Acc is 0. A longer window has less noise,
// and is later and flatter. The degree must be from 1 to 6, the window greater than
// the degree and at most 65536 samples: else a *rigid.DimensionError with ErrInput, or
// two joined.
func NewRates(window, degree int) (*Rates, error) {
	var f dims.Faults
	if degree < 1 || degree > greatestDegree {
		f.Add("degree", float64(degree), errDegree)
	}
	if window <= degree || window < 2 || window > greatestWindow {
		f.Add("window", float64(window), errWindow)
	}
	if !f.OK() {
		return nil, f.Err()
	}
	store := make([]float64, 6*window)
	part := func(i int) []float64 { return store[i*window : (i+1)*window : (i+1)*window] }
	return &Rates{
		degree: degree,
		time:   part(0), pos: part(1),
		tau: part(2), rest: part(3), p: part(4), before: part(5),
	}, nil
}

// Reset forgets all samples, as after a gap, or when a clock was set back.
func (r *Rates) Reset() { r.next, r.filled = 0, 0 }

// Add takes the sample pos at time t, in s, and returns the motion at the instant
// at. Counted angles must go on over whole turns (see rigid.Nearest), since a jump
// is taken for speed.
//
// The instant is the mean of the times in the window, in even spacing its middle,
// because there the polynomial is best known: at the newest sample the velocity of
// degree 2 has about four times the noise (standard deviation), the acceleration
// the same. It is half a window in the past; c.After(t−at) looks ahead to the
// newest sample, for degree 1 and 2 along the very polynomial, where the higher
// noise comes back.
//
// It reports ok false, with c and at zero, until the window is full, and where a
// result is not finite or the samples are bunched so that they don't determine the
// polynomial (all but a few within 1e-12 of the window). A sample whose time is not after the last one's, or with a
// number that is NaN or infinite, is not taken, with ok false: the window stays as
// it was.
func (r *Rates) Add(t, pos float64) (c rigid.Coordinate, at float64, ok bool) {
	if !finite(t) || !finite(pos) || r.filled > 0 && t <= r.last || len(r.time) == 0 {
		return rigid.Coordinate{}, 0, false
	}
	r.time[r.next], r.pos[r.next], r.last = t, pos, t
	r.next = (r.next + 1) % len(r.time)
	r.filled = min(r.filled+1, len(r.time))
	if r.filled < len(r.time) {
		return rigid.Coordinate{}, 0, false
	}
	at, scale, base := r.centre()
	c, ok = r.fit()
	c = rigid.Coordinate{Pos: base + c.Pos, Vel: c.Vel / scale, Acc: c.Acc / scale / scale}
	if !ok || !finite(at) || !finite(c.Pos) || !finite(c.Vel) || !finite(c.Acc) {
		return rigid.Coordinate{}, 0, false
	}
	return c, at, true
}

// centre fills tau with the times from at over scale, in [−1, 1], and rest with
// the positions from base, one of them.
func (r *Rates) centre() (at, scale, base float64) {
	first := r.time[r.next] // the oldest is the next to go
	var sum float64
	for _, t := range r.time {
		sum += t - first
	}
	at, base = first+sum/float64(len(r.time)), r.pos[r.next]
	scale = max(at-first, r.last-at)
	for i, t := range r.time {
		r.tau[i], r.rest[i] = (t-at)/scale, r.pos[i]-base
	}
	return at, scale, base
}

// fit returns value, first and second derivative at τ = 0 of the polynomial that
// fits rest best. The polynomials p₀ = 1, p₁, … are orthogonal over the samples:
//
//	pₖ₊₁ = (τ − a)pₖ − b·pₖ₋₁,  a = Σ τ·pₖ²/Σ pₖ²,  b = Σ pₖ²/Σ pₖ₋₁²
//
// so each takes its part from rest by itself. q and its two derivatives are pₖ at 0.
// A pₖ of rounding errors alone, at samples bunched into fewer than k + 1 places, is
// not fitted: ok is false.
func (r *Rates) fit() (c rigid.Coordinate, ok bool) {
	const least = 0x1p-80 // of the mean of pₖ²

	for i := range r.p {
		r.p[i], r.before[i] = 1, 0
	}
	var qBefore rigid.Coordinate
	q, normBefore := rigid.Coordinate{Pos: 1}, math.Inf(1)
	for k := 0; ; k++ {
		norm, moment, part := r.products()
		if !(norm > least*float64(len(r.p))) {
			return c, false
		}
		f := part / norm
		c.Pos, c.Vel, c.Acc = c.Pos+f*q.Pos, c.Vel+f*q.Vel, c.Acc+f*q.Acc
		if k == r.degree {
			return c, true
		}
		a, b := moment/norm, norm/normBefore
		for i, p := range r.p {
			r.rest[i] -= f * p
			r.p[i], r.before[i] = (r.tau[i]-a)*p-b*r.before[i], p
		}
		q, qBefore = rigid.Coordinate{
			Pos: -a*q.Pos - b*qBefore.Pos,
			Vel: q.Pos - a*q.Vel - b*qBefore.Vel,
			Acc: 2*q.Vel - a*q.Acc - b*qBefore.Acc,
		}, q
		normBefore = norm
	}
}

// products returns Σ p², Σ τ·p² and Σ p·rest.
func (r *Rates) products() (norm, moment, part float64) {
	for i, p := range r.p {
		norm += p * p
		moment += r.tau[i] * p * p
		part += p * r.rest[i]
	}
	return norm, moment, part
}

// finite reports whether x is neither NaN nor infinite.
func finite(x float64) bool { return x*0 == 0 }
