package rigid

import "iter"

// A Law is a law of motion: it gives the coefficients of one output at a position
// of the input. It returns ErrUnreachable, ErrSingular or ErrNotFinite where it
// has none. A Law keeps no state, so that goroutines may share it, and evaluates
// without allocation, as do the laws made from it.
//
// Out is to be continuous over the input, whole revolutions counted, as the library's
// own laws are. The methods that search a law believe its derivatives;
// those of a nil Law give ErrInput.
type Law func(in float64) (Coefficients, error)

// LawOf makes a Law of any output of a mechanism: solve returns that output's
// motion for a motion of the input. An input that moves at unit speed and without
// acceleration gives the coefficients themselves. Where the rates are not determined,
// as at the ends of a range, the law has no value: ErrSingular.
func LawOf(solve func(in Coordinate) (Coordinate, error)) Law {
	if solve == nil {
		return noLaw
	}
	return func(in float64) (Coefficients, error) {
		out, err := solve(Coordinate{Pos: in, Vel: 1})
		if err != nil {
			return Coefficients{}, err
		}
		if !finite(out.Pos, out.Vel, out.Acc) {
			return Coefficients{}, ErrNotFinite
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
	if l == nil || next == nil {
		return noLaw
	}
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

// noLaw is what a law made of nil is.
func noLaw(float64) (Coefficients, error) { return Coefficients{}, ErrInput }

// Sweep gives the law at n positions of the input in equal steps, the first at
// over.Lo and the last at over.Hi, both exactly. Where the law has no value it gives
// the law's error and, in In, the position, and goes on.
//
// Where there is nothing to sweep it gives one error: ErrInput for an n below 2 or an
// over whose Lo is above its Hi, ErrNotFinite for one that is not finite.
func (l Law) Sweep(over Interval, n int) iter.Seq2[Coefficients, error] {
	return func(yield func(Coefficients, error) bool) {
		err := over.check()
		if err == nil && n < 2 {
			err = ErrInput
		}
		if err != nil {
			yield(Coefficients{}, err)
			return
		}
		for i := range n {
			c, err := l.at(over.step(i, n-1))
			if !yield(c, err) {
				return
			}
		}
	}
}

// at is the law as its searches read it: In is in whatever the law says, and a
// number that is not finite is an error. With an error only In is given.
func (l Law) at(in float64) (Coefficients, error) {
	if l == nil {
		l = noLaw
	}
	c, err := l(in)
	switch {
	case err != nil:
		return Coefficients{In: in}, err
	case !finite(c.Out, c.First, c.Second):
		return Coefficients{In: in}, ErrNotFinite
	}
	c.In = in
	return c, nil
}

// check tells whether the interval can be searched.
func (i Interval) check() error {
	switch {
	case !finite(i.Lo, i.Hi, i.Hi-i.Lo):
		return ErrNotFinite
	case i.Lo > i.Hi:
		return ErrInput
	}
	return nil
}

// step returns position k of the n steps from Lo to Hi.
func (i Interval) step(k, n int) float64 {
	if k == n {
		return i.Hi
	}
	return i.Lo + (i.Hi-i.Lo)*(float64(k)/float64(n))
}
