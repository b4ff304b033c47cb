package planar

import (
	"iter"

	"example.com/twopoint/rigid"
)

// Sweep moves the one drive over an interval at unit speed, to n ≥ 2 places in equal
// steps, the first and the last exactly the ends, and yields the input at each. Read
// the State between: its velocities and accelerations are first and second
// derivatives by the input. Where a place can't be reached, or does not determine
// the rates, it yields the error and goes on; the State stays at the last one
// reached. It yields rigid.ErrInput alone for a linkage with another number of
// drives, or n < 2.
func (s *State) Sweep(over rigid.Interval, n int) iter.Seq2[rigid.Coordinate, error] {
	return func(yield func(rigid.Coordinate, error) bool) {
		if s.l == nil || len(s.to) != 1 || n < 2 {
			yield(rigid.Coordinate{}, rigid.ErrInput)
			return
		}
		for i := range n {
			in := rigid.Coordinate{Pos: over.Lo + float64(i)/float64(n-1)*(over.Hi-over.Lo), Vel: 1}
			if i == n-1 {
				in.Pos = over.Hi
			}
			if !yield(in, s.Move(in)) {
				return
			}
		}
	}
}
