package fourbar_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

func finite(x ...float64) bool {
	for _, v := range x {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}

// sound checks a State that a solver filled for lengths of any ratio.
func sound(t *testing.T, l *fourbar.Linkage, st *fourbar.State) {
	t.Helper()
	d := l.Dimensions()
	for _, m := range []*rigid.Motion{&st.Crank, &st.Coupler, &st.Follower} {
		if !finite(m.Pose.Origin.X, m.Pose.Origin.Y, m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha) {
			t.Fatalf("%+v: not finite: %+v", d, st)
		}
		if n := r2.Norm(m.Pose.Axis); !(math.Abs(n-1) < 1e-14) {
			t.Fatalf("%+v: axis of length %v", d, n)
		}
	}
	if !finite(st.Turn.Pos, st.Turn.Vel, st.Turn.Acc, st.Swing.Pos, st.Swing.Vel, st.Swing.Acc) {
		t.Fatalf("%+v: not finite: %+v", d, st)
	}
	if !(st.Transmission >= 0 && st.Transmission <= math.Pi && st.Margin >= 0 && st.Margin <= 1+1e-12) {
		t.Fatalf("%+v: transmission %v, margin %v", d, st.Transmission, st.Margin)
	}
	longest := max(d.Frame, d.Crank, d.Coupler, d.Follower)
	p, q := st.Coupler.At(r2.Vec{X: d.Coupler}).Pos, st.Follower.At(r2.Vec{X: d.Follower}).Pos
	if off := r2.Norm(r2.Sub(p, q)); !(off <= 3e-14*longest+1e-12*longest*b2f(d.Branch > fourbar.Crossed)) {
		t.Fatalf("%+v: gap %v of %v in %+v", d, off, longest, st)
	}
}

// b2f is 1 for the branches whose lengths New may change a little.
func b2f(b bool) float64 {
	if b {
		return 1
	}
	return 0
}

// one reports an error that is not one of the sentinels.
func one(t *testing.T, err error) {
	t.Helper()
	switch err {
	case rigid.ErrUnreachable, rigid.ErrSingular, rigid.ErrNotFinite, rigid.ErrInput:
	default:
		t.Fatalf("not a sentinel: %v", err)
	}
}

func seed(f *testing.F) {
	for _, s := range [][9]float64{
		{0.3, 0.08, 0.28, 0.2, 0, 0, 1, 2, 3},
		{4, 5, 2, 5, 1, 0, 0.9, 1, 0},
		{2, 1, 2, 1, 2, 1, 0, 1, 1},
		{2, 1, 2, 1, 3, 0, math.Pi, 1, 1},
		{1, 1, 2, 2, 0, 0, 0, 0, 0},
		{1, 1, 1, 1, 0, 0, 1e-9, 1, 0},
		{1e-60, 1e60, 1e60, 1e-60, 0, 0, 1, 1, 1},
		{1, 1e-20, 1, 1e-20, 1, 1, 1, 1e150, 1},
		{20, 60, 50, 55, 0, 1, 1e9, -10, 0},
	} {
		f.Add(s[0], s[1], s[2], s[3], uint8(s[4]), int8(s[5]), s[6], s[7], s[8])
	}
}

// FuzzNew: New takes what it can solve, and tells why not of the rest.
func FuzzNew(f *testing.F) {
	seed(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, _ int8, x, y, angle float64) {
		d := fourbar.Dimensions{Frame: frame, Crank: crank, Coupler: coupler, Follower: follower, Branch: fourbar.Branch(branch),
			Mount: rigid.Placement{X: x, Y: y, Angle: angle}}
		l, err := fourbar.New(d)
		if err != nil {
			if _, ok := errors.AsType[*rigid.DimensionError](err); !ok || l != nil {
				t.Fatalf("%+v: %v", d, err)
			}
			return
		}
		if l.Dimensions() != d {
			t.Fatalf("%+v given back as %+v", d, l.Dimensions())
		}
		all := l.Range()
		if len(all) < 1 || len(all) > 2 {
			t.Fatalf("%+v: range %v", d, all)
		}
		for _, i := range all {
			var st fourbar.State
			for _, end := range []float64{i.Lo, i.Hi} {
				if err := l.Solve(&st, rigid.Coordinate{Pos: end}); err != nil && err != rigid.ErrSingular {
					t.Fatalf("%+v at the end %v of %v: %v", d, end, all, err)
				}
			}
		}
	})
}

func fuzzSolver(f *testing.F, solve func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate, side rigid.Side) error) {
	seed(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, side int8, pos, vel, acc float64) {
		l, err := fourbar.New(fourbar.Dimensions{Frame: frame, Crank: crank, Coupler: coupler, Follower: follower, Branch: fourbar.Branch(branch)})
		if err != nil {
			return
		}
		var st fourbar.State
		if err := solve(l, &st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Side(side)); err != nil {
			one(t, err)
			if st != (fourbar.State{}) {
				t.Fatalf("%+v: changed with %v", st, err)
			}
			return
		}
		sound(t, l, &st)
	})
}

func FuzzSolve(f *testing.F) {
	fuzzSolver(f, func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate, _ rigid.Side) error {
		return l.Solve(dst, in)
	})
}

func FuzzSolveFollower(f *testing.F) {
	fuzzSolver(f, func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate, side rigid.Side) error {
		return l.SolveFollower(dst, in, side)
	})
}

func FuzzSolveCoupler(f *testing.F) {
	fuzzSolver(f, func(l *fourbar.Linkage, dst *fourbar.State, in rigid.Coordinate, side rigid.Side) error {
		return l.SolveCoupler(dst, in, side)
	})
}
