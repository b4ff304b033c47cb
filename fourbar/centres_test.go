package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

func TestCentres(t *testing.T) {
	// GATE ME 2019: frame L, crank L, coupler and follower √2 L, crank at 90°
	// (data quoted at https://me.gateoverflow.in/485/gate2015-3-29): I24 at
	// x = −(2 + √3) L, I13 at y = −(2 + √3) L.
	l := mustNew(t, fourbar.Dimensions{Frame: 1, Crank: 1, Coupler: math.Sqrt2, Follower: math.Sqrt2})
	var st fourbar.State
	if err := l.Solve(&st, rigid.Coordinate{Pos: math.Pi / 2}); err != nil {
		t.Fatal(err)
	}
	c, err := l.Centres(&st)
	if err != nil {
		t.Fatal(err)
	}
	want := -3.7320508075688772935
	if p := c.CrankFollower.Point; math.Abs(p.X-want) > 1e-14 || math.Abs(p.Y) > 1e-14 {
		t.Errorf("I24 %v", p)
	}
	if p := c.FrameCoupler.Point; math.Abs(p.Y-want) > 1e-14 || math.Abs(p.X) > 1e-14 {
		t.Errorf("I13 %v", p)
	}
}

// The centres are the poles of the motions, and any three links have theirs in one
// line.
func TestCentresObeyKennedy(t *testing.T) {
	for _, l := range randomLinkages(t, 300) {
		var st fourbar.State
		if err := l.Solve(&st, rigid.Coordinate{Pos: inRange(l, 0.3), Vel: 1}); err != nil {
			t.Fatal(err)
		}
		if st.Margin < 0.01 {
			continue
		}
		c, err := l.Centres(&st)
		if err != nil {
			t.Fatal(err)
		}
		if pole, err := st.Coupler.Pole(); err != nil || r2.Norm(r2.Sub(pole, c.FrameCoupler.Point)) > 1e-9*(1+r2.Norm(pole)*r2.Norm(pole)) {
			t.Errorf("%+v: I13 %v, pole %v, %v", l.Dimensions(), c.FrameCoupler, pole, err)
		}
		if pole, err := rigid.RelativePole(&st.Crank, &st.Follower); err != nil || r2.Norm(r2.Sub(pole, c.CrankFollower.Point)) > 1e-9*(1+r2.Norm(pole)*r2.Norm(pole)) {
			t.Errorf("%+v: I24 %v, pole %v, %v", l.Dimensions(), c.CrankFollower, pole, err)
		}
		for name, x := range map[string][3]fourbar.Centre{
			"frame, crank, coupler":    {c.FrameCrank, c.CrankCoupler, c.FrameCoupler},
			"frame, crank, follower":   {c.FrameCrank, c.FrameFollower, c.CrankFollower},
			"frame, coupler, follower": {c.FrameFollower, c.CouplerFollower, c.FrameCoupler},
			"crank, coupler, follower": {c.CrankCoupler, c.CouplerFollower, c.CrankFollower},
		} {
			a, b := r2.Sub(x[1].Point, x[0].Point), r2.Sub(x[2].Point, x[0].Point)
			if sin := r2.Cross(a, b) / (r2.Norm(a) * r2.Norm(b)); math.Abs(sin) > 1e-12 {
				t.Errorf("%+v: %s: not in one line, sine %v", l.Dimensions(), name, sin)
			}
		}
	}
}

func TestCentresAtInfinityAndFlat(t *testing.T) {
	d := fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Parallel}
	l := mustNew(t, d)
	var st fourbar.State
	for _, turn := range []float64{0, 1, math.Pi} {
		if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
			t.Fatal(err)
		}
		c, err := l.Centres(&st)
		if err != nil || !c.FrameCoupler.AtInfinity || !c.CrankFollower.AtInfinity {
			t.Errorf("turn %v: %+v, %v", turn, c, err)
		}
	}
	// The antiparallelogram flattened at turn 0: ω4 = −3 ω2 with frame 2 and crank 1,
	// so I24 divides the frame as 3 : 1 from inside: at 1.5.
	d.Branch = fourbar.Contrary
	l = mustNew(t, d)
	if err := l.Solve(&st, rigid.Coordinate{}); err != nil {
		t.Fatal(err)
	}
	c, err := l.Centres(&st)
	if err != nil || r2.Norm(r2.Sub(c.CrankFollower.Point, r2.Vec{X: 1.5})) > 1e-14 {
		t.Errorf("flattened: %+v, %v", c, err)
	}
	// Crank and follower parallel, upright: the centre of the coupler at infinity.
	l = mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Crossed})
	if err := l.Solve(&st, rigid.Coordinate{Pos: -math.Pi / 2}); err != nil {
		t.Fatal(err)
	}
	if c, err := l.Centres(&st); err != nil || !c.FrameCoupler.AtInfinity {
		t.Errorf("parallel links: %+v, %v, axes %v %v", c, err, st.Crank.Pose.Axis, st.Follower.Pose.Axis)
	}
	st.Coupler.Pose.Axis.X = math.NaN()
	if c, err := l.Centres(&st); err != rigid.ErrNotFinite || c != (fourbar.Centres{}) {
		t.Errorf("a State of NaN: %+v, %v", c, err)
	}
	// A kite in line.
	l = mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 1, Follower: 2})
	if err := l.Solve(&st, rigid.Coordinate{}); err != nil {
		t.Fatal(err)
	}
	if _, err := l.Centres(&st); err != rigid.ErrSingular {
		t.Errorf("kite in line: %v", err)
	}
}
