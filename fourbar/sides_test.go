package fourbar_test

import (
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// TestSides turns the link that turns fully once round and sees which of the three
// sides change on the way: the table of the package's documentation.
func TestSides(t *testing.T) {
	type solver func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate) error
	crank := func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate) error { return l.Solve(dst, in) }
	follower := func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate) error {
		return l.SolveFollower(dst, in, rigid.Right)
	}
	coupler := func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate) error {
		return l.SolveCoupler(dst, in, rigid.Right)
	}
	for _, row := range []struct {
		class              string
		d                  fourbar.Dimensions
		turn               solver
		branch, knee, lean int // values seen
	}{
		{"double crank by the crank", fourbar.Dimensions{Frame: 20, Crank: 60, Coupler: 50, Follower: 55}, crank, 1, 1, 1},
		{"double crank by the coupler", fourbar.Dimensions{Frame: 20, Crank: 60, Coupler: 50, Follower: 55}, coupler, 1, 1, 1},
		{"crank-rocker", fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80}, crank, 1, 2, 2},
		{"rocker-crank", fourbar.Dimensions{Frame: 100, Crank: 80, Coupler: 120, Follower: 40}, follower, 2, 1, 2},
		{"double rocker", fourbar.Dimensions{Frame: 100, Crank: 80, Coupler: 40, Follower: 90}, coupler, 2, 2, 1},
	} {
		l := mustNew(t, row.d)
		branches, knees, leans := map[fourbar.Branch]bool{}, map[rigid.Side]bool{}, map[rigid.Side]bool{}
		for k := range 720 {
			var st fourbar.State
			if err := row.turn(l, &st, rigid.Coordinate{Pos: (float64(k) + 0.3) * rigid.Degree / 2, Vel: 1}); err != nil {
				t.Fatalf("%s at %d: %v", row.class, k, err)
			}
			branches[st.Branch], knees[st.Knee], leans[st.Lean] = true, true, true
		}
		if len(branches) != row.branch || len(knees) != row.knee || len(leans) != row.lean {
			t.Errorf("%s: branches %v, knees %v, leans %v", row.class, branches, knees, leans)
		}
	}
}
