package fourbar

import (
	"math/rand/v2"
	"testing"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
)

// TestPartsAgree holds the inner loop of Solve against the parts that serve where it
// does not.
func TestPartsAgree(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 23))
	for n := 0; n < 2000; {
		length := func() float64 { return 0.1 + r.Float64() }
		d := Dimensions{
			Frame: length(), Crank: length(), Coupler: length(), Follower: length(), Branch: Branch(r.IntN(2)),
			Mount: rigid.Placement{X: r.NormFloat64(), Y: r.NormFloat64(), Angle: r.NormFloat64()},
		}
		l, err := New(d)
		if err != nil {
			continue
		}
		turn := rigid.Coordinate{Pos: 20 * r.NormFloat64(), Vel: r.NormFloat64(), Acc: r.NormFloat64()}
		var whole, parts State
		if l.Solve(&whole, turn) != nil || whole.Margin < 0.1 {
			continue
		}
		if err := l.solveRare(&parts, turn); err != nil {
			t.Fatalf("%+v at %+v: %v", d, turn, err)
		}
		tol := rigidtest.Tolerance{Pos: 1e-12, Vel: 1e-11, Acc: 1e-9, Relative: 1e-12}
		if diff := cmp.Diff(parts, whole, rigidtest.Lengths(tol, "Turn", "Swing"), rigidtest.Angles(tol, "Turn", "Swing")); diff != "" {
			t.Fatalf("%+v at %+v: parts and whole (−, +):\n%s", d, turn, diff)
		}
		n++
	}
}
