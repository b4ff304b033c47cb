package rigid

import (
	"fmt"
	"math"

	"example.com/twopoint/internal/root"
)

// Inverse returns the law of the way back on one stroke, over which the output
// rises all the way or falls, as Strokes gives it: its In is this law's output, its
// Out this law's input. Together with l it gives back the output to rounding.
//
// Each call of it calls l a bounded number of times, 129 at most and mostly three
// to five, and allocates nothing. Its errors are ErrUnreachable for a position that the
// stroke does not reach, by more than rounding; ErrSingular at a dead centre, where
// |First| of l is below LeastMargin times its mean over the stroke (Solve answers
// there, for the place alone); ErrNotFinite; and l's own. At an end of l's range,
// where First of l grows without bound, the inverse is regular, its First near 0.
//
// Errors: ErrNotFinite for a stroke that is not finite; one that wraps ErrInput for a
// stroke whose Lo is not below its Hi, whichever way the output goes, over which the
// output does not move, or over which it turns, as far as 1 024 steps show; l's own
// error where it has no value in the stroke. An end of the stroke may be an end of l's
// range, even if l has no value exactly there.
func (l Law) Inverse(stroke Interval) (Law, error) {
	s, err := newStroke(l, stroke)
	if err == nil {
		err = s.oneWay()
	}
	if err == nil {
		err = s.monotonic()
	}
	if err != nil {
		return nil, err
	}
	return func(in float64) (Coefficients, error) {
		c, err := s.find(in)
		if err != nil {
			return Coefficients{}, err
		}
		return s.inverse(c, in)
	}, nil
}

// Solve returns the motion of the input on one stroke that gives the output the
// motion out: what Inverse does, for one value and without allocation. For an out at
// rest, Vel and Acc zero, it gives the place alone, at rest, and does so at a dead
// centre too; an output that is beyond an end of the stroke by rounding counts as the
// end. The place is as exact as l and out determine it: δ beside a dead centre, where
// Out is off by ½Second·δ², rounding of Out by r moves it by r/(Second·δ).
//
// Errors are those of Inverse, ErrInput itself where that wraps it, and of the law it
// returns. But Solve looks at the ends of the stroke alone: where the output turns
// inside, the result is one of several places.
func (l Law) Solve(out Coordinate, stroke Interval) (Coordinate, error) {
	if !finite(out.Pos, out.Vel, out.Acc) {
		return Coordinate{}, ErrNotFinite
	}
	s, err := newStroke(l, stroke)
	if err != nil {
		return Coordinate{}, err
	}
	if s.oneWay() != nil {
		return Coordinate{}, ErrInput
	}
	c, err := s.find(out.Pos)
	if err != nil {
		return Coordinate{}, err
	}
	if out.Vel == 0 && out.Acc == 0 {
		return Coordinate{Pos: c.In}, nil
	}
	if c, err = s.inverse(c, out.Pos); err != nil {
		return Coordinate{}, err
	}
	in := c.Output(out.Vel, out.Acc)
	if !finite(in.Vel, in.Acc) {
		return Coordinate{}, ErrNotFinite
	}
	return in, nil
}

// Causes for which an interval is no stroke.
var (
	errShort = fmt.Errorf("%w: the stroke has no length", ErrInput)
	errStill = fmt.Errorf("%w: the output is the same at both ends of the stroke: invert one of Strokes", ErrInput)
	errTurns = fmt.Errorf("%w: the output turns back in the stroke: invert one of Strokes", ErrInput)
)

// A stroke is an interval over which a law rises all the way, or falls.
type stroke struct {
	law    Law
	lo, hi Coefficients
	size   float64 // the greatest |Out|
}

func newStroke(law Law, over Interval) (s stroke, err error) {
	if err := over.check(); err != nil {
		return stroke{}, err
	}
	if s.lo, err = law.end(over.Lo, over.Hi); err != nil {
		return stroke{}, err
	}
	if s.hi, err = law.end(over.Hi, over.Lo); err != nil {
		return stroke{}, err
	}
	s.law = law
	s.size = math.Max(math.Abs(s.lo.Out), math.Abs(s.hi.Out))
	return s, nil
}

// oneWay returns why the ends do not belong to one stroke, if they don't.
func (s *stroke) oneWay() error {
	slope := s.slope()
	least := -LeastMargin * math.Abs(slope)
	way := math.Copysign(1, slope)
	switch {
	case !(s.lo.In < s.hi.In):
		return errShort
	case !(math.Abs(s.hi.Out-s.lo.Out) > rounding*s.size):
		return errStill
	case way*s.lo.First < least, way*s.hi.First < least:
		return errTurns
	}
	return nil
}

// slope returns the mean of First over the stroke.
func (s *stroke) slope() float64 { return (s.hi.Out - s.lo.Out) / (s.hi.In - s.lo.In) }

// end returns the law at the end of a stroke, on the way to the other. Where it has
// no value exactly there, as at the end of a range, it is the first position that
// has one.
func (l Law) end(at, other float64) (Coefficients, error) {
	c, err := l.at(at)
	if err == nil {
		return c, nil
	}
	near := at + math.Copysign(rounding*math.Max(math.Abs(at), math.Abs(other)), other-at)
	c, e := l.at(near)
	if e != nil {
		return Coefficients{}, err
	}
	return l.edge(c, at), nil
}

// beyond returns how far beyond Out at an end still counts as the end: rounding. Near
// the end of a range Out = y + k√u, u the distance from that end; what is left to y is
//
//	k√u = 2u·|First|,  u = |First/(2·Second)|
//
// and counts where u is rounding, twice of it, since rounding makes u uncertain.
func (s *stroke) beyond(end Coefficients) float64 {
	slack := rounding * s.size
	if u := math.Abs(end.First / (2 * end.Second)); u <= rounding*math.Abs(end.In) {
		slack += 4 * math.Abs(end.First) * u
	}
	return slack
}

// monotonic looks for places where the law has no value, or the output turns back.
func (s *stroke) monotonic() error {
	pieces, err := s.law.Strokes(Interval{Lo: s.lo.In, Hi: s.hi.In})
	if err != nil {
		return err
	}
	last, way := s.lo, math.Copysign(1, s.slope())
	for _, p := range append(pieces, Interval{Lo: s.hi.In, Hi: s.hi.In}) {
		if p.Lo > last.In {
			return s.gap(last.In, p.Lo)
		}
		c, err := s.law.at(p.Hi)
		if err != nil {
			return err
		}
		if way*(c.Out-last.Out) < -rounding*s.size {
			return errTurns
		}
		last = c
	}
	return nil
}

// gap returns why the law has no value between lo and hi.
func (s *stroke) gap(lo, hi float64) error {
	for _, x := range []float64{math.Nextafter(lo, hi), lo + (hi-lo)/2} {
		if _, err := s.law.at(x); err != nil {
			return err
		}
	}
	return ErrSingular
}

// find returns the law at the place where its output is out.
func (s *stroke) find(out float64) (Coefficients, error) {
	if !finite(out) {
		return Coefficients{}, ErrNotFinite
	}
	way := math.Copysign(1, s.hi.Out-s.lo.Out)
	for i, end := range [2]Coefficients{s.lo, s.hi} {
		if off := way * (end.Out - out) * float64(1-2*i); off > s.beyond(end) {
			return Coefficients{}, ErrUnreachable
		} else if off >= 0 {
			return end, nil
		}
	}
	p, err := root.Find(func(x float64) (root.Point, error) {
		c, err := s.law.at(x)
		return root.Point(c), err
	}, root.Point(s.lo), root.Point(s.hi), out)
	if err != nil {
		return Coefficients{}, err
	}
	if math.Abs(p.Out-out) > rounding*(s.size+math.Abs(p.In*p.First)) {
		return Coefficients{}, ErrUnreachable // the law jumps over it
	}
	return Coefficients(p), nil
}

// inverse returns the coefficients of the way back at c, found for out.
func (s *stroke) inverse(c Coefficients, out float64) (Coefficients, error) {
	if math.Abs(c.First) <= LeastMargin*math.Abs(s.slope()) {
		return Coefficients{}, ErrSingular
	}
	inv, err := c.Inverse()
	inv.In = out
	if err != nil {
		return Coefficients{}, err
	}
	return inv, nil
}
