package planar

import (
	"sync"

	"example.com/twopoint/rigid"
)

// Law returns the law of motion of an output of a linkage with one drive, for the
// drive's input:
//
//	st.Law(func(st *planar.State) rigid.Coordinate { return st.Turn(lever, planar.Frame) })
//
// With it come Extremes, Peaks, Strokes, Inverse, Solve and Sweep of rigid.Law. The
// law holds in the assembly mode of s, over the part of the drive's range in which s
// is; beyond, it returns the errors of Move. It stays what it is when s moves on:
// it has a State of its own, which goroutines take in turn, so each is better off
// with a law of its own. A linkage with another number of drives gives
// rigid.ErrInput.
//
// It evaluates by moving that State from the place of the last evaluation, without
// allocation if output makes none.
func (s *State) Law(output func(*State) rigid.Coordinate) rigid.Law {
	if s.l == nil || len(s.to) != 1 || output == nil {
		return func(float64) (rigid.Coefficients, error) { return rigid.Coefficients{}, rigid.ErrInput }
	}
	var mu sync.Mutex
	st := s.Clone()
	return rigid.LawOf(func(in rigid.Coordinate) (rigid.Coordinate, error) {
		mu.Lock()
		defer mu.Unlock()
		if err := st.Move(in); err != nil {
			return rigid.Coordinate{}, err
		}
		return output(st), nil
	})
}
