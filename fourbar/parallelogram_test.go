package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

var cells = []fourbar.Dimensions{
	{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary},
	{Frame: 1, Crank: 3, Coupler: 1, Follower: 3, Branch: fourbar.Contrary},
	{Frame: 0.4, Crank: 0.1, Coupler: 0.4 * (1 + 4e-13), Follower: 0.1 * (1 - 4e-13), Branch: fourbar.Contrary},
	{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Parallel},
	{Frame: 1, Crank: 1, Coupler: 1, Follower: 1, Branch: fourbar.Parallel},
	{Frame: 1, Crank: 3, Coupler: 1, Follower: 3, Branch: fourbar.Parallel},
}

// law is the antiparallelogram's half-angle law, tan(θ4/2) = −K tan(θ2/2) with
// K = (d + a)/(d − a) (from memory), differentiated twice:
//
//	dθ4/dθ2 = −K/(cos² + K² sin²),  d²θ4/dθ2² = K (K² − 1) sin cos/(cos² + K² sin²)²
//
// of half the crank angle.
func law(d fourbar.Dimensions, turn float64) (pos, first, second float64) {
	if d.Branch == fourbar.Parallel {
		return turn, 1, 0
	}
	long, short := d.Frame+d.Coupler, d.Crank+d.Follower // twice the means
	k := (long + short) / (long - short)
	sin, cos := math.Sincos(turn / 2)
	n := cos*cos + k*k*sin*sin
	return -2 * math.Atan2(k*sin, cos), -k / n, k * (k*k - 1) * sin * cos / (n * n)
}

// TestFlattened passes the position with all links in one line, and every other.
func TestFlattened(t *testing.T) {
	for _, d := range cells {
		l := mustNew(t, d)
		if got := l.Range(); len(got) != 1 || got[0] != (rigid.Interval{Lo: -math.Pi, Hi: math.Pi}) {
			t.Errorf("%+v: range %v", d, got)
		}
		for _, about := range []float64{0, math.Pi, -math.Pi, 2 * math.Pi, 1} {
			for _, by := range []float64{0, 1e-12, -1e-12, 1e-9, -1e-9, 1e-6, -1e-6, 0.5, -0.5} {
				turn := about + by
				pos, first, second := law(d, turn)
				c, err := l.Coefficients(turn)
				if err != nil {
					t.Errorf("%+v at %v: %v", d, turn, err)
					continue
				}
				near(t, "swing", rigid.Wrap(c.Out-pos), 0, 1e-14)
				near(t, "first", c.First, first, 1e-14*(1+first*first))
				near(t, "second", c.Second, second, 1e-13*(1+math.Abs(first*first*first)))

				var st, back fourbar.State
				in := rigid.Coordinate{Pos: turn, Vel: 3, Acc: -2}
				if err := l.Solve(&st, in); err != nil {
					t.Fatal(err)
				}
				near(t, "ω4", st.Swing.Vel, first*3, 1e-13*(1+first*first))
				near(t, "α4", st.Swing.Acc, first*-2+second*9, 1e-12*(1+math.Abs(first*first*first)))
				p, q := st.Coupler.At(r2.Vec{X: d.Coupler}), st.Follower.At(r2.Vec{X: d.Follower})
				for _, v := range []r2.Vec{r2.Sub(p.Pos, q.Pos), r2.Sub(p.Vel, q.Vel), r2.Sub(p.Acc, q.Acc)} {
					near(t, "gap of the loop", r2.Norm(v), 0, 2e-12*(1+r2.Norm(q.Acc)))
				}
				for _, knee := range []rigid.Side{rigid.Left, rigid.Right} {
					if err := l.SolveFollower(&back, st.Swing, knee); err != nil {
						t.Errorf("%+v from the follower at %v: %v", d, st.Swing.Pos, err)
						continue
					}
					if !(back.Turn.Pos > -math.Pi && back.Turn.Pos <= math.Pi) {
						t.Errorf("%+v from the follower at %v: turn at %v", d, st.Swing.Pos, back.Turn.Pos)
					}
					near(t, "turn back", rigid.Wrap(back.Turn.Pos-turn), 0, 1e-14*(1+math.Abs(1/first)))
					near(t, "ω2 back", back.Turn.Vel, 3, 1e-13*(1+math.Abs(1/first)))
					near(t, "α2 back", back.Turn.Acc, -2, 1e-11*(1+math.Abs(1/first)))
					if back.Branch != d.Branch || back.Knee != st.Knee && st.Margin > 1e-9 {
						t.Errorf("%+v: branch %v, knee %v", d, back.Branch, back.Knee)
					}
				}
			}
		}
	}
}

// TestContraryByCoupler drives the antiparallelogram's coupler through the angle
// at which all its links lie in one line, and up to its limit.
func TestContraryByCoupler(t *testing.T) {
	for _, d := range cells[:3] {
		l := mustNew(t, d)
		for _, turn := range []float64{1e-9, -1e-9, 0.3, -0.3, 1.2, 2.8, -2.8, math.Pi - 1e-9} {
			var st, back fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 3, Acc: -2}); err != nil {
				t.Fatal(err)
			}
			in := rigid.Coordinate{Pos: st.Coupler.Pose.Angle(), Vel: st.Coupler.Omega, Acc: st.Coupler.Alpha}
			if err := l.SolveCoupler(&back, in, st.Lean); err != nil {
				t.Errorf("%+v at %v: %v", d, turn, err)
				continue
			}
			tol := 1e-11 / math.Abs(math.Sin(in.Pos/2-turn+math.Pi/2))
			near(t, "turn back", back.Turn.Pos, turn, tol)
			near(t, "ω2 back", back.Turn.Vel, 3, tol)
			near(t, "α2 back", back.Turn.Acc, -2, 100*tol)
			near(t, "swing back", back.Swing.Pos, st.Swing.Pos, tol)
			near(t, "ω4 back", back.Swing.Vel, st.Swing.Vel, 10*tol)
		}
		var st fourbar.State
		for side, turn := range map[rigid.Side]float64{rigid.Left: 0, rigid.Right: math.Pi} {
			if err := l.SolveCoupler(&st, rigid.Coordinate{Vel: 1}, side); err != nil {
				t.Errorf("%+v: in one line, %v: %v", d, side, err)
			}
			_, first, _ := law(d, turn)
			near(t, "crank in one line", st.Turn.Pos, turn, 0)
			near(t, "its velocity", st.Turn.Vel, 1/(1+first), 1e-12)
		}
		if d.Frame < d.Crank {
			continue
		}
		limit := 2 * math.Asin((d.Crank+d.Follower)/(d.Frame+d.Coupler))
		if err := l.SolveCoupler(&st, rigid.Coordinate{Pos: limit}, rigid.Left); err != nil {
			t.Errorf("%+v at its limit: %v", d, err)
		}
		if err := l.SolveCoupler(&st, rigid.Coordinate{Pos: limit, Vel: 1}, rigid.Left); err != rigid.ErrSingular {
			t.Errorf("%+v rates at its limit: %v", d, err)
		}
		if err := l.SolveCoupler(&st, rigid.Coordinate{Pos: limit + 1e-6}, rigid.Left); err != rigid.ErrUnreachable {
			t.Errorf("%+v beyond its limit: %v", d, err)
		}
	}
}

func TestParallelByCoupler(t *testing.T) {
	l := mustNew(t, cells[3])
	var st fourbar.State
	for pos, want := range map[float64]error{
		0: rigid.ErrSingular, rigid.Revolution: rigid.ErrSingular, 0.1: rigid.ErrUnreachable, math.Inf(1): rigid.ErrNotFinite,
	} {
		if err := l.SolveCoupler(&st, rigid.Coordinate{Pos: pos}, rigid.Left); err != want {
			t.Errorf("at %v: %v, want %v", pos, err, want)
		}
	}
}

// TestChangePointEnds: Open and Crossed end at the flattened position, where only
// the place is answered.
func TestChangePointEnds(t *testing.T) {
	for _, row := range []struct {
		why  string
		d    fourbar.Dimensions
		turn float64
	}{
		{"parallelogram", fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1}, 0},
		{"parallelogram", fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1}, math.Pi},
		{"kite, crank the long side", fourbar.Dimensions{Frame: 1, Crank: 2, Coupler: 2, Follower: 1}, math.Pi},
		{"s + l = p + q, decimals", fourbar.Dimensions{Frame: 0.4, Crank: 0.1, Coupler: 0.2, Follower: 0.3}, math.Pi},
		{"the same crossed", fourbar.Dimensions{Frame: 0.4, Crank: 0.1, Coupler: 0.2, Follower: 0.3, Branch: fourbar.Crossed}, -math.Pi},
	} {
		l := mustNew(t, row.d)
		var st fourbar.State
		if err := l.Solve(&st, rigid.Coordinate{Pos: row.turn, Vel: 1}); err != rigid.ErrSingular {
			t.Errorf("%s: rates: %v", row.why, err)
		}
		if err := l.Solve(&st, rigid.Coordinate{Pos: row.turn}); err != nil {
			t.Errorf("%s: place: %v", row.why, err)
		}
		near(t, row.why+": margin", st.Margin, 0, 1e-7)
		if err := l.Solve(&st, rigid.Coordinate{Pos: row.turn + 1e-6, Vel: 1}); err != nil && st.Margin > 1e-8 {
			t.Errorf("%s: beside it: %v", row.why, err)
		}
	}
}

// TestKite: with Crank = Frame and Coupler = Follower the pin and the pivot fall
// together at 0, which leaves the place of both other links open.
func TestKite(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 1, Crank: 1, Coupler: 2, Follower: 2})
	var st fourbar.State
	for _, turn := range []float64{0, 2 * math.Pi, 1e-16} {
		if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != rigid.ErrSingular {
			t.Errorf("at %v: %v", turn, err)
		}
	}
	if err := l.Solve(&st, rigid.Coordinate{Pos: 1e-3, Vel: 1}); err != nil {
		t.Error(err)
	}
}

// The links of an antiparallelogram at right angles: a sine of no more than 1.
func TestContraryMargin(t *testing.T) {
	for _, frame := range []float64{1, 1.4, 2.1, 3.7, 9.3} {
		l := mustNew(t, fourbar.Dimensions{Frame: frame, Crank: 1.3, Coupler: frame, Follower: 1.3, Branch: fourbar.Contrary})
		for i := range 2000 {
			turn := math.Pi/2 + float64(i-1000)*1e-9
			var st, back fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil || st.Margin > 1 {
				t.Fatalf("frame %v, crank at %v: margin %v, %v", frame, turn, st.Margin, err)
			}
			if err := l.SolveFollower(&back, rigid.Coordinate{Pos: turn}, st.Knee); err != nil || back.Margin > 1 {
				t.Fatalf("frame %v, follower at %v: margin %v, %v", frame, turn, back.Margin, err)
			}
		}
	}
}
