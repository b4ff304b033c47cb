package fourbar_test

import (
	"errors"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// TestRatesAtLimits asks for rates at the limits as the library gives them, which
// rounding leaves a little inside or outside: they count as the limit itself, where
// the driven link can be at rest only.
func TestRatesAtLimits(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 41))
	for range rounds(20_000) {
		d := anyDimensions(r)
		l, err := fourbar.New(d)
		if err != nil || d.Branch > fourbar.Crossed {
			continue
		}
		rest := func(x float64) rigid.Coordinate { return rigid.Coordinate{Pos: x} }
		moving := func(x float64) rigid.Coordinate { return rigid.Coordinate{Pos: x, Vel: 1} }
		for _, at := range l.Limits() {
			var st, none fourbar.State
			if at.Kind > fourbar.FollowerFolded {
				if err := l.Solve(&st, rest(at.Turn)); err != nil || st.Margin != 0 {
					t.Errorf("%+v: %v: at rest: margin %v, error %v", d, at, st.Margin, err)
				}
				if err := l.Solve(&st, moving(at.Turn)); !errors.Is(err, rigid.ErrSingular) {
					t.Errorf("%+v: %v: rates: margin %v, error %v", d, at, st.Margin, err)
				}
				continue
			}
			if err := l.Solve(&st, rest(at.Turn)); err != nil {
				t.Fatalf("%+v: %v: %v", d, at, err)
			}
			if err := l.SolveFollower(&none, rest(at.Swing), st.Knee); err != nil || none.Margin != 0 {
				t.Errorf("%+v: %v: follower at rest: margin %v, error %v", d, at, none.Margin, err)
			}
			if err := l.SolveFollower(&none, moving(at.Swing), st.Knee); !errors.Is(err, rigid.ErrSingular) {
				t.Errorf("%+v: %v: follower's rates: margin %v, error %v", d, at, none.Margin, err)
			}
		}
	}
}
