package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
)

// TestInversionsBranchKept drives cranks to and fro at random, a million small steps in
// all: no number of a State goes another way than its rates before and after the step
// tell, so that none jumps to another pose.
func TestInversionsBranchKept(t *testing.T) {
	const steps, longest = 600, 0.003
	taken := 0
	each(t, 21, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		rng := rand.New(rand.NewPCG(21, math.Float64bits(turn.Pos)))
		var was [3][]float64
		way, at := longest, turn.Pos
		for range steps {
			step := way * rng.Float64()
			s, err := m.solve(rigid.Coordinate{Pos: at + step, Vel: 1})
			if rng.IntN(300) == 0 || err != nil || s.margin < 0.1 { // an end of the range
				way = -way
				continue
			}
			is := [3][]float64{numbers(s, 0), numbers(s, 1), numbers(s, 2)}
			for i := range was[0] {
				off := is[0][i] - was[0][i] - step*(was[1][i]+is[1][i])/2
				if i%3 == 2 && i < 3*len(s.links) {
					off = math.Remainder(off, rigid.Revolution)
				}
				if !(math.Abs(off) <= 1e-4+step*step*(math.Abs(was[2][i])+math.Abs(is[2][i]))) {
					t.Fatalf("number %d goes from %v to %v within %v, its rates are %v and %v", i, was[0][i], is[0][i], step, was[1][i], is[1][i])
				}
			}
			was, at = is, at+step
			taken++
		}
	})
	if taken < 3333*rounds() {
		t.Errorf("only %d steps", taken)
	}
}
