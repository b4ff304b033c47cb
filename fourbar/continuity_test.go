package fourbar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// solveOrRest solves for a crank in motion, or at rest where a limit leaves it no rates.
func solveOrRest(dst *fourbar.State, l *fourbar.Linkage, turn rigid.Coordinate) error {
	err := l.Solve(dst, turn)
	if err == rigid.ErrSingular {
		err = l.Solve(dst, rigid.Coordinate{Pos: turn.Pos})
	}
	return err
}

// TestBranchKept drives cranks to and fro at random, a million steps in all.
func TestBranchKept(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 7))
	var st fourbar.State
	for range rounds(1000) {
		d := anyDimensions(r)
		l := mustNew(t, d)
		for range 1000 {
			in := anyTurn(r, l)
			if err := solveOrRest(&st, l, in); err != nil {
				t.Fatalf("%+v at %v: %v", d, in.Pos, err)
			}
			sin := r2.Cross(st.Coupler.Pose.Axis, st.Follower.Pose.Axis)
			if st.Branch != d.Branch || d.Branch == fourbar.Open && sin < -1e-7 || d.Branch == fourbar.Crossed && sin > 1e-7 {
				t.Fatalf("%+v at %v: %v, sine %v", d, in.Pos, st.Branch, sin)
			}
		}
	}
}

// TestSwingContinuous follows Swing along every interval of the range, and over
// four turns of a crank that turns fully.
func TestSwingContinuous(t *testing.T) {
	r := rand.New(rand.NewPCG(2, 7))
	wound := map[float64]int{}
	for range rounds(1000) {
		d := anyDimensions(r)
		l := mustNew(t, d)
		for _, over := range l.Range() {
			full := over.Hi-over.Lo == rigid.Revolution
			if full {
				over = rigid.Interval{Lo: over.Lo - rigid.Revolution, Hi: over.Hi + 2*rigid.Revolution}
			}
			first, last := math.NaN(), math.NaN()
			for k := range 2001 {
				var st fourbar.State
				if err := solveOrRest(&st, l, rigid.Coordinate{Pos: over.Lo + (over.Hi-over.Lo)*float64(k)/2000, Vel: 1}); err != nil {
					t.Fatalf("%+v: %v", d, err)
				}
				if k == 0 {
					first = st.Swing.Pos
				} else if math.Abs(st.Swing.Pos-last) > 2 {
					t.Fatalf("%+v: swing jumps from %v to %v at %v", d, last, st.Swing.Pos, st.Turn.Pos)
				}
				last = st.Swing.Pos
			}
			if full {
				turns := (last - first) / rigid.Revolution / 4
				near(t, "whole turns", turns, math.Round(turns), 1e-14)
				wound[math.Round(turns)]++
				continue
			}
			var st, on fourbar.State
			middle := rigid.Coordinate{Pos: (over.Lo + over.Hi) / 2, Vel: 1}
			if solveOrRest(&st, l, middle) == nil {
				middle.Pos += 3 * rigid.Revolution
				if err := solveOrRest(&on, l, middle); err != nil {
					t.Fatalf("%+v: %v", d, err)
				}
				near(t, "swing three turns on", on.Swing.Pos, st.Swing.Pos, 1e-9)
			}
			if last-first > 2*math.Pi || first < -2*math.Pi || first > 2*math.Pi {
				t.Errorf("%+v: swings from %v to %v", d, first, last)
			}
		}
	}
	if wound[0] == 0 || wound[1] == 0 || wound[-1] == 0 {
		t.Errorf("turns of the follower for one of the crank: %v", wound)
	}
}
