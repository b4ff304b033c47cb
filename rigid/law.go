package rigid

// A Law is a law of motion: it gives the coefficients of one output at a position
// of the input. It returns ErrUnreachable, ErrSingular or ErrNotFinite where it
// has none. A Law keeps no state, so that goroutines may share it, and evaluates
// without allocation, as do the laws made from it.
type Law func(in float64) (Coefficients, error)

// LawOf makes a Law of any output of a mechanism: solve returns that output's
// motion for a motion of the input. An input that moves at unit speed and without
// acceleration gives the coefficients themselves.
func LawOf(solve func(in Coordinate) (Coordinate, error)) Law {
	return func(in float64) (Coefficients, error) {
		out, err := solve(Coordinate{Pos: in, Vel: 1})
		if err != nil {
			return Coefficients{}, err
		}
		return Coefficients{In: in, Out: out.Pos, First: out.Vel, Second: out.Acc}, nil
	}
}

// Linear returns the law out = factor·in + zero: a gear or a screw, the angle at
// which a part is mounted, a unit. Its Second is 0.
func Linear(factor, zero float64) Law {
	return func(in float64) (Coefficients, error) {
		c := Coefficients{In: in, Out: factor*in + zero, First: factor}
		if !finite(c.In, c.Out, c.First) {
			return Coefficients{}, ErrNotFinite
		}
		return c, nil
	}
}

// Then returns the law that feeds l's output to next: the chain rule.
func (l Law) Then(next Law) Law {
	return func(in float64) (Coefficients, error) {
		c, err := l(in)
		if err != nil {
			return Coefficients{}, err
		}
		n, err := next(c.Out)
		if err != nil {
			return Coefficients{}, err
		}
		c = c.Then(n)
		if !finite(c.Out, c.First, c.Second) {
			return Coefficients{}, ErrNotFinite
		}
		return c, nil
	}
}
