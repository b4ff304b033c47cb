package planar_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// linkedBars returns a four-bar driven by its crank, in the position of st.
func linkedBars(t testing.TB, d fourbar.Dimensions, turn float64) *planar.State {
	t.Helper()
	l, err := fourbar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	var at fourbar.State
	if err := l.Solve(&at, rigid.Coordinate{Pos: turn}); err != nil {
		t.Fatal(err)
	}
	p, err := planar.New(planar.Design{
		Links: []string{"frame", "crank", "coupler", "follower"},
		Joints: []planar.Joint{
			planar.Revolute{A: planar.Frame.At(0, 0), B: planar.Link(1).At(0, 0)},
			planar.Revolute{A: planar.Link(1).At(d.Crank, 0), B: planar.Link(2).At(0, 0)},
			planar.Revolute{A: planar.Link(2).At(d.Coupler, 0), B: planar.Link(3).At(d.Follower, 0)},
			planar.Revolute{A: planar.Frame.At(d.Frame, 0), B: planar.Link(3).At(0, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: 1, From: planar.Frame}},
	})
	if err != nil {
		t.Fatal(err)
	}
	place := func(m rigid.Motion) rigid.Placement {
		return rigid.Placement{X: m.Pose.Origin.X, Y: m.Pose.Origin.Y, Angle: m.Pose.Angle()}
	}
	st, err := p.Assemble([]rigid.Placement{{}, place(at.Crank), place(at.Coupler), place(at.Follower)}, rigid.Coordinate{Pos: turn})
	if err != nil {
		t.Fatal(err)
	}
	return st
}

// The ends of the crank's range, against the closed forms of fourbar, and the
// published limits of Chebyshev's linkage 4 : 5 : 2 : 5, 36.8699° and 101.537°
// (https://en.wikipedia.org/wiki/Chebyshev_linkage).
func TestLimitsOfAFourBar(t *testing.T) {
	for _, d := range []fourbar.Dimensions{
		{Frame: 4, Crank: 5, Coupler: 2, Follower: 5, Branch: fourbar.Crossed},
		{Frame: 7, Crank: 5, Coupler: 6, Follower: 5},
		{Frame: 0.3, Crank: 0.16, Coupler: 0.28, Follower: 0.08},
		{Frame: 3, Crank: 4, Coupler: 5, Follower: 3, Branch: fourbar.Crossed},
	} {
		l, err := fourbar.New(d)
		if err != nil {
			t.Fatal(err)
		}
		for _, r := range l.Range() {
			st := linkedBars(t, d, r.Lo+0.3*(r.Hi-r.Lo))
			lo, hi, err := st.Limits(rigid.Interval{Lo: r.Lo - 1, Hi: r.Hi + 1})
			if err != nil {
				t.Fatal(err)
			}
			if math.Abs(lo.In-r.Lo) > 1e-10 || math.Abs(hi.In-r.Hi) > 1e-10 || lo.Kind != planar.DriveEnd || hi.Kind != planar.DriveEnd {
				t.Errorf("%+v: %+v, %+v, want %v", d, lo, hi, r)
			}
			if len(lo.Links) != 2 || lo.Links[0] != 2 || lo.Links[1] != 3 {
				t.Errorf("%+v: links %v", d, lo.Links)
			}
			if got := st.Inputs()[0].Pos; got != r.Lo+0.3*(r.Hi-r.Lo) {
				t.Errorf("%+v: the State has moved to %v", d, got)
			}
		}
	}
	st := linkedBars(t, fourbar.Dimensions{Frame: 4, Crank: 5, Coupler: 2, Follower: 5, Branch: fourbar.Crossed}, 1)
	lo, hi, _ := st.Limits(rigid.Interval{Lo: 0, Hi: math.Pi})
	for _, x := range [][2]float64{{lo.In, 36.869897645844021297}, {hi.In, 101.53695903281548769}} {
		if math.Abs(x[0]/rigid.Degree-x[1]) > 1e-9 {
			t.Errorf("%v°, want %v°", x[0]/rigid.Degree, x[1])
		}
	}
}

// A crank that turns has no limits; neither has a parallelogram.
func TestNoLimits(t *testing.T) {
	for _, d := range []fourbar.Dimensions{
		{Frame: 100, Crank: 40, Coupler: 120, Follower: 80},
		{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Parallel},
		{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary},
	} {
		st := linkedBars(t, d, 1)
		lo, hi, err := st.Limits(rigid.Interval{Lo: -1000, Hi: 1000})
		if err != nil || lo.Kind != planar.NoLimit || hi.Kind != planar.NoLimit || lo.In != -1000 || hi.In != 1000 {
			t.Errorf("%+v: %+v, %+v, %v", d, lo, hi, err)
		}
	}
}

// At a change point the crank could go on in two ways.
func TestLimitAtChangePoint(t *testing.T) {
	// 4 + 1 = 3 + 2: the links lie in one line at turn π alone
	st := linkedBars(t, fourbar.Dimensions{Frame: 4, Crank: 1, Coupler: 3, Follower: 2}, 2)
	lo, hi, err := st.Limits(rigid.Interval{Lo: -4, Hi: 4})
	if err != nil || lo.Kind != planar.ChangePoint || hi.Kind != planar.ChangePoint {
		t.Fatalf("%+v, %+v, %v", lo, hi, err)
	}
	if math.Abs(lo.In+math.Pi) > 1e-10 || math.Abs(hi.In-math.Pi) > 1e-10 {
		t.Errorf("%+v, %+v", lo, hi)
	}
}

// A group of higher class: the far rocker of a six-bar drives it as far as it
// swings when the crank drives, where its first coefficient is 0.
func TestLimitsOfAHigherGroup(t *testing.T) {
	w := swaps()[0]
	byCrank, byRocker := w.linkages(t)
	truth, err := byCrank.Assemble(w.guess, rigid.Coordinate{Pos: 1})
	if err != nil {
		t.Fatal(err)
	}
	swing := truth.Law(func(st *planar.State) rigid.Coordinate { return st.Turn(5, planar.Frame) })
	at, err := swing.Extremes(rigid.Interval{Lo: 1 - 4, Hi: 1 + 4})
	if err != nil {
		t.Fatal(err)
	}
	var below, above *rigid.Coefficients
	for i := range at {
		if at[i].In < 1 {
			below = &at[i]
		} else if above == nil {
			above = &at[i]
		}
	}
	if below == nil || above == nil {
		t.Fatalf("extremes %+v", at)
	}
	want := []float64{min(below.Out, above.Out), max(below.Out, above.Out)}
	st, err := byRocker.Assemble(poses(truth, 6), truth.Turn(5, 0))
	if err != nil {
		t.Fatal(err)
	}
	in := st.Inputs()[0].Pos
	lo, hi, err := st.Limits(rigid.Interval{Lo: in - 3, Hi: in + 3})
	if err != nil || lo.Kind != planar.DriveEnd || hi.Kind != planar.DriveEnd || lo.Group < 0 {
		t.Fatalf("%+v, %+v, %v", lo, hi, err)
	}
	if math.Abs(lo.In-want[0]) > 1e-10 || math.Abs(hi.In-want[1]) > 1e-10 {
		t.Errorf("%.12f, %.12f, want %.12f", lo.In, hi.In, want)
	}
}

func TestLimitsRefuse(t *testing.T) {
	st := linkedBars(t, fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80}, 1)
	for _, c := range []struct {
		over rigid.Interval
		want error
		says string
	}{
		{rigid.Interval{Lo: 2, Hi: 3}, rigid.ErrInput, "the drive stands at 1, outside 2 to 3"},
		{rigid.Interval{Lo: math.Inf(-1), Hi: 3}, rigid.ErrNotFinite, ""},
		{rigid.Interval{Lo: math.NaN(), Hi: 3}, rigid.ErrNotFinite, ""},
	} {
		if _, _, err := st.Limits(c.over); !errors.Is(err, c.want) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%v: %v", c.over, err)
		}
	}
	if _, _, err := new(planar.State).Limits(rigid.Interval{}); !errors.Is(err, rigid.ErrInput) {
		t.Errorf("zero State: %v", err)
	}
}

func TestLawOfALinkage(t *testing.T) {
	d := fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80}
	l, err := fourbar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	st := linkedBars(t, d, 1)
	law := st.Law(func(st *planar.State) rigid.Coordinate { return st.Turn(3, planar.Frame) })
	for _, in := range []float64{-4, -1, 0, 1, 2, 9} {
		got, err := law(in)
		want, err2 := l.Coefficients(in)
		if err != nil || err2 != nil {
			t.Fatal(err, err2)
		}
		if math.Abs(got.Out-want.Out) > 1e-13 || math.Abs(got.First-want.First) > 1e-13 || math.Abs(got.Second-want.Second) > 1e-13 || got.In != in {
			t.Errorf("%+v, want %+v", got, want)
		}
	}
	a, err := law.Extremes(rigid.Interval{Lo: 0, Hi: rigid.Revolution})
	b, err2 := rigid.Law(l.Coefficients).Extremes(rigid.Interval{Lo: 0, Hi: rigid.Revolution})
	if err != nil || err2 != nil || len(a) != len(b) || len(a) != 2 || math.Abs(a[0].In-b[0].In) > 1e-12 {
		t.Errorf("%+v, %+v, %v, %v", a, b, err, err2)
	}
	if st.Inputs()[0].Pos != 1 {
		t.Error("the law has moved the State")
	}
	turn := 0.0
	if n := testing.AllocsPerRun(200, func() { turn += 0.1; _, err = law(turn) }); n != 0 || err != nil {
		t.Errorf("%v allocations, %v", n, err)
	}
	if _, err := new(planar.State).Law(nil)(0); err != rigid.ErrInput {
		t.Errorf("zero State: %v", err)
	}
}
