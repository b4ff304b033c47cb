package slidercrank_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// sound checks what holds whatever was asked: the error is one of the library's own
// values, an error leaves the state alone, and without one every number is finite
// and every axis a unit vector.
func sound(t *testing.T, err error, untouched bool, margin float64, links []rigid.Motion, coords ...rigid.Coordinate) {
	t.Helper()
	switch err {
	case nil:
	case rigid.ErrUnreachable, rigid.ErrSingular, rigid.ErrNotFinite, rigid.ErrInput:
		if !untouched {
			t.Errorf("%v, and the state was written", err)
		}
		return
	default:
		t.Fatalf("not one of the library's errors: %v", err)
	}
	if !(margin >= 0 && margin <= 1+1e-14) {
		t.Errorf("margin %v", margin)
	}
	for i := range links {
		m := &links[i]
		u := m.Pose.Axis
		if l := math.Hypot(u.X, u.Y); !(math.Abs(l-1) < 1e-13) {
			t.Errorf("link %d: axis %v of length %v", i, u, l)
		}
		for _, v := range []r2.Vec{m.Pose.Origin, m.Vel, m.Acc, {X: m.Omega, Y: m.Alpha}} {
			if v.X*0 != 0 || v.Y*0 != 0 {
				t.Errorf("link %d: %+v", i, *m)
			}
		}
	}
	for i, c := range coords {
		if c.Pos*0+c.Vel*0+c.Acc*0 != 0 {
			t.Errorf("coordinate %d: %+v", i, c)
		}
	}
}

// refused checks that a constructor's error tells what is wrong.
func refused(t *testing.T, err error) {
	t.Helper()
	if _, ok := errors.AsType[*rigid.DimensionError](err); !ok {
		t.Errorf("no DimensionError: %v", err)
	}
}

func FuzzSlottedLever(f *testing.F) {
	f.Add(0.12, 0.24, 0.0, 0.5, 3.0, -1.0, false)
	f.Add(0.25, 0.1, 0.05, 700.0, -3.0, 1.0, true)
	f.Add(0.2, 0.2, 0.1, 2.5, 0.0, 0.0, false)
	f.Add(1e-60, 1e60, 0.0, math.Pi, 1e150, 0.0, true)
	f.Add(1.0, 1.0, 0.0, math.NaN(), 0.0, 0.0, false)
	f.Fuzz(func(t *testing.T, r, c, e, pos, vel, acc float64, left bool) {
		l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: r, Centre: c, Slot: e})
		if err != nil {
			refused(t, err)
			return
		}
		in, knee := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Right
		if left {
			knee = rigid.Left
		}
		var st slidercrank.LeverState
		err = l.Solve(&st, in)
		sound(t, err, st == slidercrank.LeverState{}, st.Margin, []rigid.Motion{st.Crank, st.Block, st.Lever}, st.Turn, st.Swing, st.Slide)
		st = slidercrank.LeverState{}
		err = l.SolveSwing(&st, in, knee)
		sound(t, err, st == slidercrank.LeverState{}, st.Margin, []rigid.Motion{st.Crank, st.Block, st.Lever}, st.Turn, st.Swing, st.Slide)
		for _, at := range l.Range() {
			if err := l.Solve(&st, rigid.Coordinate{Pos: at.Hi}); err != nil {
				t.Errorf("end of the range %v: %v", at, err)
			} else if err := l.SolveSwing(&st, rigid.Coordinate{Pos: st.Swing.Pos}, st.Knee); err != nil {
				t.Errorf("end of the range %v: its swing %v: %v", at, st.Swing.Pos, err)
			}
		}
		for _, at := range l.DeadCentres() {
			if err := l.Solve(&st, rigid.Coordinate{Pos: at.In}); err != nil {
				t.Errorf("dead centre %v: %v", at, err)
			}
		}
	})
}

func FuzzOscillatingCylinder(f *testing.F) {
	f.Add(0.25, 0.6, 0.0, 0.5, 0.1, 0.0, false)
	f.Add(0.6, 0.25, 0.4, 0.01, 0.1, 2.0, true)
	f.Add(0.3, 0.3, -0.2, 0.0, 0.0, 0.0, true)
	f.Add(1e60, 1e-60, 0.0, 1e60, 0.0, 0.0, false)
	f.Fuzz(func(t *testing.T, r, c, e, pos, vel, acc float64, left bool) {
		o, err := slidercrank.NewOscillatingCylinder(slidercrank.CylinderDimensions{Crank: r, Centre: c, Offset: e})
		if err != nil {
			refused(t, err)
			return
		}
		in, knee := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Right
		if left {
			knee = rigid.Left
		}
		var st slidercrank.CylinderState
		err = o.Solve(&st, in)
		sound(t, err, st == slidercrank.CylinderState{}, st.Margin, []rigid.Motion{st.Crank, st.Rod, st.Cylinder}, st.Turn, st.Swing, st.Slide)
		st = slidercrank.CylinderState{}
		err = o.SolveSlide(&st, in, knee)
		sound(t, err, st == slidercrank.CylinderState{}, st.Margin, []rigid.Motion{st.Crank, st.Rod, st.Cylinder}, st.Turn, st.Swing, st.Slide)
		for _, at := range o.Range() {
			if err := o.Solve(&st, rigid.Coordinate{Pos: at.Lo}); err != nil {
				t.Errorf("end of the range %v: %v", at, err)
			}
		}
		need := o.Lengths()
		for _, at := range []float64{need.Lo, need.Hi} {
			if err := o.SolveSlide(&st, rigid.Coordinate{Pos: at}, knee); err != nil {
				t.Errorf("end of the stroke %v: %v", at, err)
			}
		}
	})
}

func FuzzScotchYoke(f *testing.F) {
	f.Add(0.1, 0.3, 0.5, 3.0, -1.0, false)
	f.Add(1e-60, -1.570796325, 1e9, 1e100, 0.0, true)
	f.Add(1.0, math.Pi/2, 0.0, 0.0, 0.0, true)
	f.Fuzz(func(t *testing.T, r, tilt, pos, vel, acc float64, left bool) {
		y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: r, Tilt: tilt})
		if err != nil {
			refused(t, err)
			return
		}
		in, knee := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Right
		if left {
			knee = rigid.Left
		}
		var st slidercrank.YokeState
		err = y.Solve(&st, in)
		sound(t, err, st == slidercrank.YokeState{}, st.Margin, []rigid.Motion{st.Crank, st.Block, st.Yoke}, st.Turn, st.Slide, st.Run)
		st = slidercrank.YokeState{}
		err = y.SolveSlide(&st, in, knee)
		sound(t, err, st == slidercrank.YokeState{}, st.Margin, []rigid.Motion{st.Crank, st.Block, st.Yoke}, st.Turn, st.Slide, st.Run)
		for _, at := range y.DeadCentres() {
			if err := y.SolveSlide(&st, rigid.Coordinate{Pos: at.Out}, knee); err != nil {
				t.Errorf("dead centre %v: %v", at, err)
			}
		}
	})
}

func FuzzSliderRod(f *testing.F) {
	f.Add(0.7, math.Pi/2, 0.5, 3.0, -1.0, false)
	f.Add(1e60, 3.141592651, 0.1, 1e100, 0.0, true)
	f.Add(1.0, 0.0, 0.0, 0.0, 0.0, true)
	f.Fuzz(func(t *testing.T, length, angle, pos, vel, acc float64, left bool) {
		s, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Length: length, Angle: angle})
		if err != nil {
			refused(t, err)
			return
		}
		in, knee := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Right
		if left {
			knee = rigid.Left
		}
		for _, solve := range []func(st *slidercrank.RodState) error{
			func(st *slidercrank.RodState) error { return s.Solve(st, in) },
			func(st *slidercrank.RodState) error { return s.SolveA(st, in, knee) },
			func(st *slidercrank.RodState) error { return s.SolveB(st, in, knee) },
		} {
			var st slidercrank.RodState
			err := solve(&st)
			sound(t, err, st == slidercrank.RodState{}, st.Margin, []rigid.Motion{st.Rod, st.A, st.B}, st.Turn, st.SlideA, st.SlideB)
		}
	})
}

func FuzzQuickReturn(f *testing.F) {
	f.Add(0.12, 0.3, 0.0, 0.5, 0.0, 0.2, 0.15, 0.0, math.Pi/2, 0.5, 3.0, -1.0, uint8(0))
	f.Add(0.15, 0.1, 0.0, 0.15, 3.0, 0.6, -0.1, 0.0, math.Pi/2, 700.0, 3.0, -1.0, uint8(7))
	f.Add(0.12, 0.24, 0.05, 0.45, 0.1, 0.0, 0.0, 0.2, 1.0, 0.3, 0.0, 0.0, uint8(2))
	f.Add(0.12, 0.24, 0.3, 0.3, 0.1, 0.301, 0.0, -0.2, 1.0, 0.3, 0.0, 0.0, uint8(4))
	f.Fuzz(func(t *testing.T, r, c, e, arm, bend, rod, gx, gy, ga, pos, vel, acc float64, picks uint8) {
		q, err := slidercrank.NewQuickReturn(slidercrank.QuickReturnDimensions{
			Crank: r, Centre: c, Slot: e, Arm: arm, ArmAngle: bend, Rod: rod, Branch: slidercrank.Branch(picks & 1),
			Guide: rigid.Placement{X: gx, Y: gy, Angle: ga},
		})
		if err != nil {
			refused(t, err)
			return
		}
		in := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}
		elbow, knee := rigid.Side(picks>>1&1), rigid.Side(picks>>2&1)
		links := func(st *slidercrank.QuickReturnState) []rigid.Motion {
			return []rigid.Motion{st.Crank, st.Block, st.Lever, st.Rod, st.Ram}
		}
		var st slidercrank.QuickReturnState
		err = q.Solve(&st, in)
		sound(t, err, st == slidercrank.QuickReturnState{}, st.Margin, links(&st), st.Turn, st.Swing, st.Slide, st.Travel)
		st = slidercrank.QuickReturnState{}
		err = q.SolveTravel(&st, in, elbow, knee)
		sound(t, err, st == slidercrank.QuickReturnState{}, st.Margin, links(&st), st.Turn, st.Swing, st.Slide, st.Travel)
		for _, at := range q.Range() {
			if err := q.Solve(&st, rigid.Coordinate{Pos: at.Lo/2 + at.Hi/2}); err != nil {
				t.Errorf("middle of the range %v: %v", at, err)
			}
		}
	})
}
