package slidercrank_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func TestScotchYokeCloses(t *testing.T) {
	for _, tilt := range []float64{0, 0.7, -1.2, math.Pi, 4} {
		y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 0.1, Tilt: tilt, Mount: rigid.Placement{X: 1, Angle: 0.5}})
		if err != nil {
			t.Fatal(err)
		}
		slot := rigid.NewPose(0, 0, tilt+math.Pi/2).Axis
		for _, pos := range []float64{-3, -0.4, 0.1, 1, 2.5, 900} {
			var st slidercrank.YokeState
			if err := y.Solve(&st, rigid.Coordinate{Pos: pos, Vel: 3, Acc: -5}); err != nil {
				t.Fatal(err)
			}
			pin := st.Crank.At(r2.Vec{X: 0.1})
			joined(t, "pin and block", pin, st.Block.At(r2.Vec{}), 1)
			joined(t, "pin in the slot", pin, st.Yoke.Carry(rigid.Point{
				Pos: r2.Scale(st.Run.Pos, slot), Vel: r2.Scale(st.Run.Vel, slot), Acc: r2.Scale(st.Run.Acc, slot),
			}), 1/math.Abs(math.Cos(tilt)))
			guide := rigid.NewPose(1, 0, 0.5)
			if at := guide.Local(st.Yoke.Pose.Origin); math.Abs(at.Y) > 1e-15 || math.Abs(at.X-st.Slide.Pos) > 1e-15 {
				t.Errorf("tilt %v, turn %v: yoke at %v on its guide, slide %v", tilt, pos, at, st.Slide.Pos)
			}
			foot := st.Slide.Pos * math.Sin(tilt)
			if (st.Knee == rigid.Right) != (st.Run.Pos > foot) {
				t.Errorf("tilt %v, turn %v: knee %v with run %v and its foot at %v", tilt, pos, st.Knee, st.Run.Pos, foot)
			}
		}
		want := 0.2 / math.Abs(math.Cos(tilt))
		c := y.DeadCentres()
		if s := y.Stroke(); math.Abs(s-want) > 1e-14 || len(c) != 2 || math.Abs(math.Abs(c[0].Out-c[1].Out)-want) > 1e-14 || c[0].In >= c[1].In {
			t.Errorf("tilt %v: stroke %v, want %v; %v", tilt, s, want, c)
		}
	}
}

func TestScotchYokeRefuses(t *testing.T) {
	y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 0.1})
	if err != nil {
		t.Fatal(err)
	}
	steep, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 10, Tilt: math.Pi/2 - 1e-8})
	if err != nil {
		t.Fatal(err)
	}
	zero := new(slidercrank.ScotchYoke)
	slide := func(y *slidercrank.ScotchYoke, pos, vel, acc float64, knee rigid.Side) func(*slidercrank.YokeState) error {
		return func(st *slidercrank.YokeState) error {
			return y.SolveSlide(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, knee)
		}
	}
	turn := func(y *slidercrank.ScotchYoke, pos, vel, acc float64) func(*slidercrank.YokeState) error {
		return func(st *slidercrank.YokeState) error {
			return y.Solve(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc})
		}
	}
	for _, row := range []struct {
		name string
		run  func(*slidercrank.YokeState) error
		want error
	}{
		{"turn not a number", turn(y, math.NaN(), 0, 0), rigid.ErrNotFinite},
		{"speed would overflow", turn(y, 1, 1e160, 0), rigid.ErrNotFinite},
		{"acceleration of the slide would overflow", turn(steep, 1, 1e150, 0), rigid.ErrNotFinite},
		{"zero yoke", turn(zero, 1, 0, 0), rigid.ErrInput},
		{"slide not a number", slide(y, 0, math.NaN(), 0, 0), rigid.ErrNotFinite},
		{"slide beyond the stroke", slide(y, 0.1+1e-12, 0, 0, 0), rigid.ErrUnreachable},
		{"slide before the stroke", slide(y, -0.1-1e-12, 0, 0, 0), rigid.ErrUnreachable},
		{"dead centre", slide(y, 0.1, 0, 0, 0), nil},
		{"driven at the dead centre", slide(y, -0.1, 1, 0, 0), rigid.ErrSingular},
		{"accelerated at the dead centre", slide(y, 0.1, 0, 1, 1), rigid.ErrSingular},
		{"unknown knee", slide(y, 0, 0, 0, 2), rigid.ErrInput},
		{"zero yoke by its slide", slide(zero, 0, 0, 0, 0), rigid.ErrInput},
		{"rate would overflow", slide(y, 0.05, 1e160, 0, 0), rigid.ErrNotFinite},
	} {
		outcome(t, row.name, slidercrank.YokeState{Margin: 7}, row.run, row.want)
	}
	if zero.Range() != nil || zero.DeadCentres() != nil || zero.Stroke() != 0 {
		t.Error("a range of no mechanism")
	}
	if _, err := zero.Coefficients(0); err != rigid.ErrInput {
		t.Errorf("Coefficients of a zero yoke: %v", err)
	}
	if _, err := y.Coefficients(math.Inf(1)); err != rigid.ErrNotFinite {
		t.Errorf("Coefficients at infinity: %v", err)
	}
}

func TestParallelGuidesAreRefused(t *testing.T) {
	for _, row := range []struct {
		name, field string
		err         error
		make        func() error
	}{
		{"slot along the travel", "Tilt", rigid.ErrSingular, func() error {
			_, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 1, Tilt: -math.Pi / 2})
			return err
		}},
		{"tilt not a number", "Tilt", rigid.ErrNotFinite, func() error {
			_, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 1, Tilt: math.NaN()})
			return err
		}},
		{"no crank", "Crank", rigid.ErrNotPositive, func() error {
			_, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{})
			return err
		}},
		{"parallel guides", "Angle", rigid.ErrSingular, func() error {
			_, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Length: 1, Angle: 3 * math.Pi})
			return err
		}},
		{"guides not given", "Angle", rigid.ErrSingular, func() error {
			_, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Length: 1})
			return err
		}},
		{"rod without length", "Length", rigid.ErrNotPositive, func() error {
			_, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Angle: 1})
			return err
		}},
	} {
		err := row.make()
		if bad, ok := errors.AsType[*rigid.DimensionError](err); !ok || bad.Name != row.field || !errors.Is(bad.Err, row.err) {
			t.Errorf("%s: %v", row.name, err)
		}
	}
}
