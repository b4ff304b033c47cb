package rolling_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// TestSlipRatio: the ratio of the faster of rim and centre, common practice.
func TestSlipRatio(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.5})
	for _, row := range []struct {
		name               string
		omega, speed, want float64
	}{
		{"rolls", -2, 1, 0},
		{"rests", 0, 0, 0},
		{"drives", -2.5, 1, 0.2},
		{"drives backwards", 2.5, -1, 0.2},
		{"brakes", -1.5, 1, -0.25},
		{"brakes backwards", 1.5, -1, -0.25},
		{"spins on the spot", -3, 0, 1},
		{"skids locked", 0, 3, -1},
		{"turns against its way, rim faster", 2, 0.5, 1.5},
		{"turns against its way, centre faster", 1, 1, -1.5},
	} {
		s, err := w.Slip(rigid.Coordinate{Vel: row.omega}, rigid.Coordinate{Vel: row.speed})
		if err != nil || !near(s.Ratio, row.want, 1e-15) || s.Slide.Vel != row.speed+0.5*row.omega {
			t.Errorf("%s: %+v %v, want %v", row.name, s, err, row.want)
		}
	}
}

// TestSlipRoundTrip: a state solved with a slip or a ratio shows that slip when
// measured, and its contact particle moves with it.
func TestSlipRoundTrip(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 3))
	for range runs(1000) {
		d := random(rng)
		w := wheel(t, d)
		turn, slide := coordinate(rng, 9), coordinate(rng, 1)
		var st rolling.WheelState
		if err := w.SolveSlip(&st, turn, slide); err != nil {
			t.Fatal(err)
		}
		s, err := w.Slip(turn, st.Travel)
		tol := 1e-14 * (10 + 10*d.Radius)
		if err != nil || !near(s.Slide.Pos, slide.Pos, tol) || !near(s.Slide.Vel, slide.Vel, tol) || !near(s.Slide.Acc, slide.Acc, tol) {
			t.Fatalf("%+v: %+v %v, want %+v", d, s, err, slide)
		}
		if got := r2.Norm(st.Contact.Vel); !near(got, math.Abs(slide.Vel), tol) {
			t.Fatalf("%+v: contact moves with %v, want %v", d, got, slide.Vel)
		}
		var belt rolling.WheelState
		if err := w.SolveBelt(&belt, st.Travel, slide); err != nil || !near(belt.Turn.Pos, turn.Pos, 1e-12/d.Radius) || !near(belt.Turn.Vel, turn.Vel, 1e-12/d.Radius) {
			t.Fatalf("belt turns the wheel by %+v %v, want %+v", belt.Turn, err, turn)
		}
		ratio := 4*rng.Float64() - 2
		if err := w.SolveRatio(&st, turn, ratio); err != nil {
			t.Fatal(err)
		}
		if s, err := w.Slip(turn, st.Travel); err != nil || !near(s.Ratio, ratio, 1e-13) {
			t.Fatalf("%+v: ratio %v %v, want %v", d, s.Ratio, err, ratio)
		}
	}
}

func TestSolveRatioRefuses(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.5})
	for ratio, want := range map[float64]error{
		-1: rigid.ErrSingular, 2.1: rigid.ErrUnreachable, -2.1: rigid.ErrUnreachable,
		math.Inf(1): rigid.ErrNotFinite, 2: nil, -2: nil, 1: nil, -0.999: nil,
	} {
		var st rolling.WheelState
		if err := w.SolveRatio(&st, rigid.Coordinate{Vel: 1}, ratio); err != want {
			t.Errorf("ratio %v: %v, want %v", ratio, err, want)
		}
	}
	if err := w.SolveRatio(&rolling.WheelState{}, rigid.Coordinate{}, math.NaN()); err != rigid.ErrNotFinite {
		t.Error(err)
	}
}

func TestWithin(t *testing.T) {
	s := rolling.Slip{Slide: rigid.Coordinate{Pos: -0.01, Vel: 0.02}, Ratio: -0.05}
	for _, row := range []struct {
		name   string
		limits rolling.SlipLimits
		want   bool
	}{
		{"nothing checked", rolling.SlipLimits{}, true},
		{"at every limit", rolling.SlipLimits{Length: 0.01, Speed: 0.02, Ratio: 0.05}, true},
		{"too far", rolling.SlipLimits{Length: 0.0099}, false},
		{"too fast", rolling.SlipLimits{Length: 1, Speed: 0.0199}, false},
		{"too much", rolling.SlipLimits{Ratio: 0.0499}, false},
		{"limit is NaN", rolling.SlipLimits{Speed: math.NaN()}, false},
	} {
		if got := s.Within(row.limits); got != row.want {
			t.Errorf("%s: %v", row.name, got)
		}
	}
	if (rolling.Slip{Ratio: math.NaN()}).Within(rolling.SlipLimits{Ratio: 1}) {
		t.Error("NaN is within")
	}
}

func TestSlipRefuses(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.5})
	for _, c := range []rigid.Coordinate{{Pos: math.NaN()}, {Vel: math.Inf(1)}, {Acc: math.Inf(-1)}} {
		_, one := w.Slip(c, rigid.Coordinate{})
		_, two := w.Slip(rigid.Coordinate{}, c)
		if !errors.Is(one, rigid.ErrNotFinite) || !errors.Is(two, rigid.ErrNotFinite) {
			t.Errorf("%+v: %v, %v", c, one, two)
		}
	}
}
