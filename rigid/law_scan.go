package rigid

import (
	"cmp"
	"math"

	"example.com/twopoint/internal/root"
)

const (
	steps    = 1024
	rounding = 0x1p-46 // 64 units of float64's precision: what a law's own rounding may be
)

// A scan is a law looked at over an interval: in steps, at one more beyond each end,
// at the edges of the stretches where it has no value, and inside of steps where
// that shows more.
type scan struct {
	law   Law
	over  Interval
	parts [][]Coefficients // the stretches in which it has values, in order
	slope float64          // mean of |First|: how much Out moves per length of input
}

func newScan(law Law, over Interval) (*scan, error) {
	if err := over.check(); err != nil {
		return nil, err
	}
	s := &scan{law: law, over: over}
	var cause error
	var part []Coefficients
	none, last := true, 0.0
	for i := -1; i <= steps+1; i++ {
		c, err := law.at(over.step(i, steps))
		inside := 0 <= i && i <= steps
		none = none && (err != nil || !inside)
		switch {
		case err == nil && part == nil && i >= 0:
			part = s.join([]Coefficients{s.law.edge(c, last)}, c, 4)
		case err == nil:
			part = s.join(part, c, 4)
		case part != nil:
			s.parts = append(s.parts, s.join(part, s.law.edge(part[len(part)-1], c.In), 4))
			part = nil
		}
		if err != nil && inside && cause == nil {
			cause = err
		}
		last = c.In
	}
	if none {
		return nil, cause
	}
	if part != nil {
		s.parts = append(s.parts, part)
	}
	s.slope = slope(s.parts)
	return s, nil
}

// slope returns the way that Out goes for the way of In. A mean of First itself
// would not do: it may grow without bound at an end.
func slope(parts [][]Coefficients) float64 {
	var out, in float64
	for _, part := range parts {
		for i := 1; i < len(part); i++ {
			out += math.Abs(part[i].Out - part[i-1].Out)
			in += part[i].In - part[i-1].In
		}
	}
	if in == 0 {
		return 0
	}
	return out / in
}

// edge returns the law where it is about to lose its value, on the way from c, where
// it has one, to bad, where it has none.
func (l Law) edge(c Coefficients, bad float64) Coefficients {
	root.Bisect(func(x float64) bool {
		e, err := l.at(x)
		if err == nil {
			c = e
		}
		return err == nil
	}, c.In, bad)
	return c
}

// join appends c to the part, and before it the positions inside the step that the
// fit to its ends makes suspect.
func (s *scan) join(part []Coefficients, c Coefficients, depth int) []Coefficients {
	if len(part) == 0 {
		return append(part, c)
	}
	a := part[len(part)-1]
	if a.In == c.In {
		return part
	}
	if x := dip(a, c); depth > 0 && a.In < x && x < c.In {
		if m, err := s.law.at(x); err == nil {
			return s.join(s.join(part, m, depth-1), c, depth-1)
		}
	}
	return append(part, c)
}

// dip returns the position between a and b where Second may change sign and change
// back: First passes through an extreme and turns again there, and may have passed
// through 0. The cubic through First with the slopes Second at both ends has the slope
//
//	q(t) = Second(a) + lt + mt²,  q(1) = Second(b),  ∫q dt = ΔFirst/ΔIn
//
// which is least where t = −l/2m. NaN where it is not nearer to a change of sign, by
// half, than at the ends.
func dip(a, b Coefficients) float64 {
	h := b.In - a.In
	m := 3 * (a.Second + b.Second - 2*(b.First-a.First)/h)
	l := b.Second - a.Second - m
	t := -l / (2 * m)
	side := math.Copysign(1, a.Second+b.Second)
	least, end := side*(a.Second+l*t/2), min(side*a.Second, side*b.Second)
	if 0 < t && t < 1 && least < end/2 {
		return a.In + t*h
	}
	return math.NaN()
}

// sign returns the sign of x, 0 within tol.
func sign(x, tol float64) int {
	if math.Abs(x) <= tol {
		return 0
	}
	return cmp.Compare(x, 0)
}
