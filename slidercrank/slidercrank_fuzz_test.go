package slidercrank_test

import (
	"errors"
	"math"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// fuzzedPress makes a linkage, or returns nil where New refuses with an error that says
// why.
func fuzzedPress(t *testing.T, d slidercrank.Dimensions) *slidercrank.Linkage {
	l, err := slidercrank.New(d)
	if err != nil {
		if e, ok := errors.AsType[*rigid.DimensionError](err); !ok || e.Err == nil || l != nil {
			t.Fatalf("%+v: %v", d, err)
		}
		return nil
	}
	if l.Dimensions() != d {
		t.Fatalf("%+v came back as %+v", d, l.Dimensions())
	}
	return l
}

// pressSound checks that every number of a State is finite, that axes are unit vectors and
// that the loop closes, as far as a mount at a distance of far lets it.
func pressSound(t *testing.T, d slidercrank.Dimensions, st *slidercrank.State) {
	t.Helper()
	size, far := max(d.Crank, d.Rod, math.Abs(d.Offset)), math.Abs(d.Mount.X)+math.Abs(d.Mount.Y)
	for i, m := range []*rigid.Motion{&st.Crank, &st.Rod, &st.Slider} {
		sum := m.Pose.Origin.X*0 + m.Pose.Origin.Y*0 + m.Vel.X*0 + m.Vel.Y*0 + m.Acc.X*0 + m.Acc.Y*0 + m.Omega*0 + m.Alpha*0
		if n := r2.Norm(m.Pose.Axis); sum != 0 || !(math.Abs(n-1) <= 1e-13*(1+size/d.Rod)) {
			t.Fatalf("%+v: link %d: axis of length %v: %+v", d, i, n, st)
		}
	}
	if s := st.Slide; (s.Pos+s.Vel+s.Acc+st.Turn.Pos+st.Turn.Vel+st.Turn.Acc)*0 != 0 || !(st.Margin >= 0 && st.Margin <= 1) {
		t.Fatalf("%+v: %+v", d, st)
	}
	if far < 1e100*size {
		off := r2.Norm(r2.Sub(st.Rod.At(r2.Vec{X: d.Rod}).Pos, st.Slider.Pose.Origin))
		if !(off <= 1.2e-14*size+1e-15*far) {
			t.Fatalf("%+v: the loop is open by %v: %+v", d, off, st)
		}
	}
}

// pressRefusal checks an error of a hot path, and that it left the State alone.
func pressRefusal(t *testing.T, d slidercrank.Dimensions, err error, was, is *slidercrank.State) {
	t.Helper()
	switch err {
	case rigid.ErrUnreachable, rigid.ErrSingular, rigid.ErrNotFinite, rigid.ErrInput:
	default:
		t.Fatalf("%+v: error %v", d, err)
	}
	if *is != *was {
		t.Fatalf("%+v: the state was touched (-was +is):\n%s", d, cmp.Diff(was, is))
	}
}

func FuzzSliderCrank(f *testing.F) {
	f.Add(0.15, 0.6, 0.0, byte(0), 0.0, 0.0, 0.0, -0.7, -31.4, 0.0)               // in line
	f.Add(0.03, 0.05, 0.01, byte(1), 1.0, 2.0, 3.0, 1.05, 10.0, 5.0)              // offset, behind, mounted
	f.Add(0.3, 0.2, 0.15, byte(0), 0.0, 0.0, 0.0, -0.16744807921968935, 0.0, 0.0) // at a limit
	f.Add(0.2, 0.2, 0.0, byte(0), 0.0, 0.0, 0.0, math.Pi/2, 1.0, 0.0)             // at a change point
	f.Add(1e-60, 1e60, 0.0, byte(0), 0.0, 0.0, 0.0, 1.0, 1e100, 1e300)            // extremes
	f.Add(-1.0, math.NaN(), math.Inf(1), byte(7), 0.0, 0.0, math.NaN(), 0.0, 0.0, 0.0)
	f.Fuzz(func(t *testing.T, crank, rod, offset float64, branch byte, x, y, angle, pos, vel, acc float64) {
		d := slidercrank.Dimensions{Crank: crank, Rod: rod, Offset: offset, Branch: slidercrank.Branch(branch), Mount: rigid.Placement{X: x, Y: y, Angle: angle}}
		l := fuzzedPress(t, d)
		if l == nil {
			return
		}
		was := slidercrank.State{Margin: -7}
		st := was
		turn := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}
		if err := l.Solve(&st, turn); err != nil {
			pressRefusal(t, d, err, &was, &st)
			return
		}
		pressSound(t, d, &st)
		if st.Turn != turn || st.Branch != d.Branch {
			t.Fatalf("%+v: driven by %+v: %+v", d, turn, st)
		}
		back := was
		if err := l.SolveSlide(&back, rigid.Coordinate{Pos: st.Slide.Pos}, st.Knee); err != nil {
			t.Fatalf("%+v at %v: the way back from %v: %v", d, turn.Pos, st.Slide.Pos, err)
		}
		pressSound(t, d, &back)
	})
}

func FuzzSliderCrankBySlide(f *testing.F) {
	f.Add(0.15, 0.6, 0.0, byte(0), 0.0, 0.0, 0.0, 0.7, -3.0, 1.0, int8(0))
	f.Add(0.03, 0.05, 0.01, byte(1), 1.0, 2.0, 3.0, -0.05, 0.1, 0.0, int8(1))
	f.Add(0.1, 0.3, 0.0, byte(0), 0.0, 0.0, 0.0, 0.4, 0.0, 0.0, int8(1)) // dead centre
	f.Add(0.2, 0.2, 0.0, byte(0), 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, int8(0)) // pin in the crank pivot
	f.Add(1e60, 1e-60, 0.0, byte(0), 0.0, 0.0, 0.0, 1e60, 0.0, 0.0, int8(0))
	f.Add(0.3, 0.2, 0.15, byte(1), 0.0, 0.0, 0.0, 0.1, math.Inf(1), 1e308, int8(3))
	f.Fuzz(func(t *testing.T, crank, rod, offset float64, branch byte, x, y, angle, pos, vel, acc float64, knee int8) {
		d := slidercrank.Dimensions{Crank: crank, Rod: rod, Offset: offset, Branch: slidercrank.Branch(branch), Mount: rigid.Placement{X: x, Y: y, Angle: angle}}
		l := fuzzedPress(t, d)
		if l == nil {
			return
		}
		was := slidercrank.State{Margin: -7}
		st := was
		slide := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}
		if err := l.SolveSlide(&st, slide, rigid.Side(knee)); err != nil {
			pressRefusal(t, d, err, &was, &st)
			return
		}
		pressSound(t, d, &st)
		if st.Slide != slide || st.Knee != rigid.Side(knee) || !(st.Turn.Pos > -math.Pi && st.Turn.Pos <= math.Pi) {
			t.Fatalf("%+v: driven by %+v on %v: %+v", d, slide, rigid.Side(knee), st)
		}
	})
}

// FuzzSliderCrankLimits: Solve takes what Range and DeadCentres return.
func FuzzSliderCrankLimits(f *testing.F) {
	f.Add(0.03, 0.05, 0.01, byte(1))
	f.Add(0.1, 0.3, 0.2, byte(0))
	f.Add(4.0, 1.0, -2.0, byte(0))
	f.Add(1.0, 3.0, 3.5, byte(1))
	f.Fuzz(func(t *testing.T, crank, rod, offset float64, branch byte) {
		d := slidercrank.Dimensions{Crank: crank, Rod: rod, Offset: offset, Branch: slidercrank.Branch(branch)}
		l := fuzzedPress(t, d)
		if l == nil {
			return
		}
		var st slidercrank.State
		for _, over := range l.Range() {
			if !(over.Lo >= -math.Pi && over.Lo < math.Pi && over.Lo <= over.Hi) {
				t.Fatalf("%+v: range %+v", d, over)
			}
			for _, turn := range []float64{over.Lo, (over.Lo + over.Hi) / 2, over.Hi} {
				if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
					t.Fatalf("%+v at %v of %+v: %v", d, turn, over, err)
				}
				pressSound(t, d, &st)
			}
		}
		outer, inner, err := l.DeadCentres()
		for i, c := range []slidercrank.DeadCentre{outer, inner} {
			if i == 1 && err != nil {
				break
			}
			if err := l.Solve(&st, rigid.Coordinate{Pos: c.Turn}); err != nil {
				t.Fatalf("%+v at the dead centre %+v: %v", d, c, err)
			}
			for _, knee := range []rigid.Side{rigid.Left, rigid.Right} {
				if err := l.SolveSlide(&st, rigid.Coordinate{Pos: c.Slide}, knee); err != nil || st.Margin != 0 {
					t.Fatalf("%+v by the slide at the dead centre %+v: %v, margin %v", d, c, err, st.Margin)
				}
				pressSound(t, d, &st)
			}
		}
	})
}
