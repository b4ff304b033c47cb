package fourbar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// rounds returns n, or fewer where the tests are to be short.
func rounds(n int) int {
	if testing.Short() {
		return n / 10
	}
	return n
}

// anyDimensions returns lengths of any class that close, of a size from 1e-6 to
// 1e3 m, on any branch, and one in eight of them a parallelogram.
func anyDimensions(r *rand.Rand) fourbar.Dimensions {
	size := math.Pow(10, -6+9*r.Float64())
	length := func() float64 { return size * (0.05 + 0.95*r.Float64()) }
	for {
		d := fourbar.Dimensions{Frame: length(), Crank: length(), Coupler: length(), Follower: length(), Branch: fourbar.Branch(r.IntN(2))}
		if r.IntN(8) == 0 {
			d.Branch += fourbar.Parallel
			d.Coupler, d.Follower = d.Frame, d.Crank
		}
		longest := max(d.Frame, d.Crank, d.Coupler, d.Follower)
		if d.Frame+d.Crank+d.Coupler+d.Follower > 2.01*longest {
			return d
		}
	}
}

func mustNew(t testing.TB, d fourbar.Dimensions) *fourbar.Linkage {
	t.Helper()
	l, err := fourbar.New(d)
	if err != nil {
		t.Fatalf("%+v: %v", d, err)
	}
	return l
}

// anyTurn returns a motion of the crank inside its range.
func anyTurn(r *rand.Rand, l *fourbar.Linkage) rigid.Coordinate {
	all := l.Range()
	i := all[r.IntN(len(all))]
	return rigid.Coordinate{Pos: i.Lo + (i.Hi-i.Lo)*r.Float64(), Vel: 20 * r.NormFloat64(), Acc: 200 * r.NormFloat64()}
}

// cases calls f for n random linkages at random positions with a margin.
func cases(t *testing.T, n int, margin float64, f func(t *testing.T, d fourbar.Dimensions, l *fourbar.Linkage, st *fourbar.State)) {
	t.Helper()
	r := rand.New(rand.NewPCG(3, 14))
	for k := 0; k < rounds(n); {
		d := anyDimensions(r)
		l := mustNew(t, d)
		var st fourbar.State
		if err := l.Solve(&st, anyTurn(r, l)); err != nil && err != rigid.ErrSingular {
			t.Fatalf("%+v: %v", d, err)
		}
		if !(st.Margin >= margin) {
			continue
		}
		f(t, d, l, &st)
		if t.Failed() {
			t.Fatalf("with %+v at %+v", d, st.Turn)
		}
		k++
	}
}

// TestClosure checks the closure of the loop and of its first two derivatives: the
// follower pin as a point of the coupler and as one of the follower.
func TestClosure(t *testing.T) {
	cases(t, 20_000, 1e-4, func(t *testing.T, d fourbar.Dimensions, l *fourbar.Linkage, st *fourbar.State) {
		longest := max(d.Frame, d.Crank, d.Coupler, d.Follower)
		p, q := st.Coupler.At(r2.Vec{X: d.Coupler}), st.Follower.At(r2.Vec{X: d.Follower})
		near(t, "gap of the loop", r2.Norm(r2.Sub(p.Pos, q.Pos)), 0, 1e-14*longest)
		c := st.Crank.At(r2.Vec{X: d.Crank})
		near(t, "gap at the crank pin", r2.Norm(r2.Sub(c.Pos, st.Coupler.Pose.Origin)), 0, 1e-15*longest)
		w := max(math.Abs(st.Crank.Omega), math.Abs(st.Coupler.Omega), math.Abs(st.Follower.Omega))
		near(t, "velocity of the loop", r2.Norm(r2.Sub(p.Vel, q.Vel)), 0, 1e-13*longest*w)
		al := max(math.Abs(st.Crank.Alpha), math.Abs(st.Coupler.Alpha), math.Abs(st.Follower.Alpha), w*w)
		near(t, "acceleration of the loop", r2.Norm(r2.Sub(p.Acc, q.Acc)), 0, 1e-12*longest*al)
		near(t, "swing velocity", st.Swing.Vel, st.Follower.Omega, 0)
		near(t, "swing acceleration", st.Swing.Acc, st.Follower.Alpha, 0)
		near(t, "follower's angle", rigid.Wrap(st.Swing.Pos-st.Follower.Pose.Angle()), 0, 1e-14*(1+math.Abs(st.Swing.Pos)))
		mu := rigid.Wrap(st.Follower.Pose.Angle() - st.Coupler.Pose.Angle())
		near(t, "transmission angle", st.Transmission, math.Abs(mu), 1e-12)
		near(t, "margin", st.Margin, math.Abs(math.Sin(mu)), 1e-12)
		if left := math.Sin(mu) >= 0; d.Branch <= fourbar.Crossed && left != (st.Branch == fourbar.Open) {
			t.Errorf("branch %v with the follower at %v from the coupler", st.Branch, mu)
		}
		if lean := math.Sin(st.Swing.Pos - st.Turn.Pos); math.Abs(lean) > 1e-9 && (lean > 0) != (st.Lean == rigid.Left) {
			t.Errorf("lean %v with sine %v", st.Lean, lean)
		}
		diagonal := st.Follower.At(r2.Vec{X: d.Follower}).Pos
		if knee := r2.Cross(diagonal, c.Pos) / longest / longest; math.Abs(knee) > 1e-9 && (knee > 0) != (st.Knee == rigid.Left) {
			t.Errorf("knee %v with the pin at %v", st.Knee, knee)
		}
	})
}

// TestUnequalLengths: the axes have length 1, and the loop closes, for links of any
// lengths.
func TestUnequalLengths(t *testing.T) {
	r := rand.New(rand.NewPCG(12, 12))
	for n := 0; n < rounds(20_000); {
		x := [4]float64{1, 1, 1, 1}
		i, j := r.IntN(4), r.IntN(4)
		x[i], x[j] = math.Pow(10, -12*r.Float64()), math.Pow(10, -12*r.Float64())
		d := fourbar.Dimensions{Frame: x[0], Crank: x[1], Coupler: x[2], Follower: x[3], Branch: fourbar.Branch(r.IntN(2))}
		l, err := fourbar.New(d)
		if err != nil {
			continue
		}
		in := anyTurn(r, l)
		var st fourbar.State
		if l.Solve(&st, in) != nil {
			continue
		}
		n++
		if gap, off := gap(&st, d), axes(&st); gap > 1e-14 || off > 3*eps {
			t.Fatalf("%+v at %+v: open by %v, axes off by %v", d, in, gap, off)
		}
	}
}

// TestDerivatives compares velocity and acceleration with differences of position
// and velocity along the motion of the crank.
func TestDerivatives(t *testing.T) {
	central := &fd.Settings{Formula: fd.Central, Step: 1e-5}
	cases(t, 500, 0.2, func(t *testing.T, d fourbar.Dimensions, l *fourbar.Linkage, st *fourbar.State) {
		in := rigid.Coordinate{Pos: st.Turn.Pos, Vel: 1, Acc: 0.7}
		at := func(dt float64) fourbar.State {
			var s fourbar.State
			if err := l.Solve(&s, in.After(dt)); err != nil {
				t.Fatal(err)
			}
			return s
		}
		st0 := at(0)
		outputs := map[string]func(s fourbar.State) (pos, vel, acc float64){
			"swing": func(s fourbar.State) (_, _, _ float64) { return s.Swing.Pos, s.Swing.Vel, s.Swing.Acc },
			"coupler": func(s fourbar.State) (_, _, _ float64) {
				return s.Coupler.Pose.Angle(), s.Coupler.Omega, s.Coupler.Alpha
			},
			"x": func(s fourbar.State) (_, _, _ float64) {
				p := s.Coupler.At(r2.Vec{X: d.Coupler / 2, Y: d.Crank})
				return p.Pos.X / d.Frame, p.Vel.X / d.Frame, p.Acc.X / d.Frame
			},
		}
		for name, f := range outputs {
			pos, vel, acc := f(st0)
			gotVel := fd.Derivative(func(dt float64) float64 {
				p, _, _ := f(at(dt))
				if name != "x" {
					return rigid.Wrap(p - pos)
				}
				return p
			}, 0, central)
			gotAcc := fd.Derivative(func(dt float64) float64 { _, v, _ := f(at(dt)); return v }, 0, central)
			scale := 1 + math.Abs(pos) + math.Abs(vel) + math.Abs(acc)
			near(t, name+" velocity", gotVel, vel, 1e-5*scale*scale)
			near(t, name+" acceleration", gotAcc, acc, 1e-5*scale*scale)
		}
	})
}

// TestSymmetries: the mirrored linkage on the other branch, one of another size,
// time reversed, and a mounted one move alike.
func TestSymmetries(t *testing.T) {
	cases(t, 2000, 1e-3, func(t *testing.T, d fourbar.Dimensions, l *fourbar.Linkage, st *fourbar.State) {
		near := func(what string, got, want float64) {
			t.Helper()
			near(t, what, got, want, 1e-11*(1+math.Abs(want))/st.Margin)
		}
		mirrored := d
		if d.Branch <= fourbar.Crossed {
			mirrored.Branch = fourbar.Crossed - d.Branch
		}
		_, m := solved(t, mirrored, rigid.Coordinate{Pos: -st.Turn.Pos, Vel: -st.Turn.Vel, Acc: -st.Turn.Acc})
		near("mirrored swing", rigid.Wrap(m.Swing.Pos+st.Swing.Pos), 0)
		near("mirrored ω4", m.Swing.Vel, -st.Swing.Vel)
		near("mirrored α3", m.Coupler.Alpha, -st.Coupler.Alpha)
		if m.Knee == st.Knee || m.Lean == st.Lean && d.Branch != fourbar.Parallel {
			t.Errorf("mirrored knee %v, lean %v", m.Knee, m.Lean)
		}

		large := d
		large.Frame, large.Crank, large.Coupler, large.Follower = 8*d.Frame, 8*d.Crank, 8*d.Coupler, 8*d.Follower
		_, m = solved(t, large, st.Turn)
		if m.Swing != st.Swing || m.Coupler.Alpha != st.Coupler.Alpha || m.Coupler.Acc != r2.Scale(8, st.Coupler.Acc) {
			t.Errorf("eight times the size moves otherwise: %+v, %+v", m, st)
		}

		_, m = solved(t, d, rigid.Coordinate{Pos: st.Turn.Pos, Vel: -st.Turn.Vel, Acc: st.Turn.Acc})
		if m.Swing.Pos != st.Swing.Pos || m.Swing.Vel != -st.Swing.Vel || m.Swing.Acc != st.Swing.Acc {
			t.Errorf("back in time: %+v, %+v", m.Swing, st.Swing)
		}

		mounted := d
		mounted.Mount = rigid.Placement{X: 3 * d.Frame, Y: -2 * d.Crank, Angle: 1 + st.Margin}
		_, m = solved(t, mounted, st.Turn)
		frame := rigid.Motion{Pose: mounted.Mount.Pose()}
		for i, pair := range [][2]*rigid.Motion{{&m.Crank, &st.Crank}, {&m.Coupler, &st.Coupler}, {&m.Follower, &st.Follower}} {
			got, want := pair[0].At(r2.Vec{Y: d.Frame}), frame.Compose(pair[1])
			p := want.At(r2.Vec{Y: d.Frame})
			for _, v := range [][2]r2.Vec{{got.Pos, p.Pos}, {got.Vel, p.Vel}, {got.Acc, p.Acc}} {
				if off := r2.Norm(r2.Sub(v[0], v[1])); off > 1e-13*(d.Frame+d.Crank+r2.Norm(v[1])) {
					t.Errorf("link %d mounted: %v, want %v", i, v[0], v[1])
				}
			}
		}
		if m.Swing != st.Swing || m.Turn != st.Turn {
			t.Errorf("mounted: swing %v, want %v", m.Swing, st.Swing)
		}
	})
}

// TestRoundTrips solves back from follower and coupler to the crank.
func TestRoundTrips(t *testing.T) {
	back := 0
	cases(t, 10_000, 1e-2, func(t *testing.T, d fourbar.Dimensions, l *fourbar.Linkage, st *fourbar.State) {
		compare := func(how string, got *fourbar.State, margin float64) {
			t.Helper()
			tol := 1e-11 / margin / margin / margin
			near(t, how+": turn", rigid.Wrap(got.Turn.Pos-st.Turn.Pos), 0, tol)
			if !(got.Turn.Pos > -math.Pi && got.Turn.Pos <= math.Pi) {
				t.Errorf("%s: turn at %v", how, got.Turn.Pos)
			}
			w := max(math.Abs(st.Crank.Omega), math.Abs(st.Coupler.Omega), math.Abs(st.Follower.Omega))
			near(t, how+": turn velocity", got.Turn.Vel, st.Turn.Vel, tol*w)
			near(t, how+": turn acceleration", got.Turn.Acc, st.Turn.Acc, tol*(w*w+math.Abs(st.Swing.Acc)+math.Abs(st.Turn.Acc)))
			near(t, how+": swing", rigid.Wrap(got.Swing.Pos-st.Swing.Pos), 0, tol)
			near(t, how+": coupler", rigid.Wrap(got.Coupler.Pose.Angle()-st.Coupler.Pose.Angle()), 0, tol)
			near(t, how+": transmission", got.Transmission, st.Transmission, tol)
			if got.Branch != st.Branch || got.Knee != st.Knee || got.Lean != st.Lean {
				t.Errorf("%s: %v, knee %v, lean %v, want %v, %v, %v", how, got.Branch, got.Knee, got.Lean, st.Branch, st.Knee, st.Lean)
			}
		}
		var got fourbar.State
		if knee := math.Abs(math.Sin(st.Coupler.Pose.Angle() - st.Turn.Pos)); knee > 1e-2 {
			back++
			if err := l.SolveFollower(&got, st.Swing, st.Knee); err != nil {
				t.Fatalf("from the follower: %v", err)
			}
			compare("from the follower", &got, knee)
			near(t, "margin of the follower", got.Margin, knee, 1e-9)
			if got.Swing != st.Swing {
				t.Errorf("swing %v, given %v", got.Swing, st.Swing)
			}
		}
		if lean := math.Abs(math.Sin(st.Swing.Pos - st.Turn.Pos)); lean > 1e-2 && d.Branch != fourbar.Parallel {
			back++
			in := rigid.Coordinate{Pos: st.Coupler.Pose.Angle(), Vel: st.Coupler.Omega, Acc: st.Coupler.Alpha}
			if err := l.SolveCoupler(&got, in, st.Lean); err != nil {
				t.Fatalf("from the coupler: %v", err)
			}
			compare("from the coupler", &got, lean)
			near(t, "margin of the coupler", got.Margin, lean, 1e-9)
		}
	})
	if back < rounds(15_000) {
		t.Errorf("only %d ways back", back)
	}
}
