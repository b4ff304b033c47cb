package planar

import (
	"fmt"
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/interp"
)

// TableLaw returns the law through a table of an output over an input, which rises:
// the cubic spline, whose second derivative is continuous. For a cam that turns on
// and on, period is a revolution in the input's unit: the table holds each place of
// it once, the first not repeated at the end, and the law goes on over any number of
// them. With period 0 the table ends where it does, where third derivatives are as
// one step further in; beyond it the law has no value, ErrUnreachable.
//
// Between points h apart a smooth output is met to about h⁴/384 of its fourth
// derivative, its second derivative to about h²/12 of it: so that accelerations are to
// be trusted, a table needs more digits than one that is for places alone.
//
// The error is a *rigid.DimensionError for a number that is not finite or an input
// that doesn't rise, and wraps rigid.ErrInput for lists of two lengths, or of fewer
// than 4 points, or a period shorter than the table.
func TableLaw(in, out []float64, period float64) (rigid.Law, error) {
	if len(in) != len(out) || len(in) < 4 {
		return nil, fmt.Errorf("%w: a table of %d inputs and %d outputs", rigid.ErrInput, len(in), len(out))
	}
	for i := range in {
		if err := finiteAll(fmt.Sprintf("in[%d]", i), in[i], fmt.Sprintf("out[%d]", i), out[i]); err != nil {
			return nil, err
		}
		if i > 0 && !(in[i] > in[i-1]) {
			return nil, &rigid.DimensionError{Name: fmt.Sprintf("in[%d]", i), Value: in[i], Err: rigid.ErrInput}
		}
	}
	if last := in[len(in)-1]; period != 0 && !(period > last-in[0] && period*0 == 0) {
		return nil, fmt.Errorf("%w: a period of %g for a table over %g", rigid.ErrInput, period, last-in[0])
	}
	t := table{x: slices.Clone(in), y: slices.Clone(out), period: period}
	if err := t.fit(); err != nil {
		return nil, fmt.Errorf("%w: %w", rigid.ErrInput, err)
	}
	return t.law, nil
}

// A table is a cubic spline by its points and its slopes there.
type table struct {
	x, y, slope []float64
	period      float64
}

// fit finds the slopes. What the ends of a cubic spline are asked for loses weight by
// 2 − √3 from point to point, so that a table that repeats itself for some dozens of
// points on both sides has the slopes of one that does so for ever.
func (t *table) fit() error {
	if t.period == 0 {
		var s interp.NotAKnotCubic
		if err := s.Fit(t.x, t.y); err != nil {
			return err
		}
		t.read(s.PredictDerivative)
		return nil
	}
	const beyond = 40
	n := len(t.x)
	var x, y []float64
	for i := -beyond; i < n+beyond; i++ {
		k := ((i % n) + n) % n
		x = append(x, t.x[k]+t.period*float64((i-k)/n))
		y = append(y, t.y[k])
	}
	var s interp.NaturalCubic
	if err := s.Fit(x, y); err != nil {
		return err
	}
	t.x, t.y = append(t.x, t.x[0]+t.period), append(t.y, t.y[0])
	t.read(s.PredictDerivative)
	t.slope[n] = t.slope[0]
	return nil
}

func (t *table) read(slope func(float64) float64) {
	for _, x := range t.x {
		t.slope = append(t.slope, slope(x))
	}
}

// law evaluates the cubic through two points with their slopes: with s from 0 to 1
// over a step h,
//
//	y = y₀ + s·(h·m₀ + s·(q + s·c)),  c = h·(m₀ + m₁) − 2Δ,  q = Δ − h·m₀ − c
func (t *table) law(in float64) (rigid.Coefficients, error) {
	x, last := in, len(t.x)-1
	if in*0 != 0 {
		return rigid.Coefficients{}, rigid.ErrNotFinite
	}
	if t.period != 0 {
		x -= t.period * math.Floor((x-t.x[0])/t.period)
	} else if x < t.x[0] || x > t.x[last] {
		return rigid.Coefficients{}, rigid.ErrUnreachable
	}
	i, _ := slices.BinarySearch(t.x, x)
	i = min(max(i-1, 0), last-1)
	h := t.x[i+1] - t.x[i]
	s := (x - t.x[i]) / h
	a, rise := h*t.slope[i], t.y[i+1]-t.y[i]
	c := a + h*t.slope[i+1] - 2*rise
	q := rise - a - c
	return rigid.Coefficients{
		In:     in,
		Out:    t.y[i] + s*(a+s*(q+s*c)),
		First:  (a + s*(2*q+3*s*c)) / h,
		Second: (2*q + 6*s*c) / (h * h),
	}, nil
}
