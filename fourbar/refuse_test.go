package fourbar_test

import (
	"errors"
	"math"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// crankRocker is the crank-rocker of the roof-tile press line's feeder.
var crankRocker = fourbar.Dimensions{Frame: 0.30, Crank: 0.08, Coupler: 0.28, Follower: 0.20}

// TestNewRefuses: every cause, and two at once.
func TestNewRefuses(t *testing.T) {
	with := func(change func(d *fourbar.Dimensions)) fourbar.Dimensions {
		d := crankRocker
		change(&d)
		return d
	}
	for _, row := range []struct {
		d     fourbar.Dimensions
		name  string
		cause error
	}{
		{with(func(d *fourbar.Dimensions) { d.Frame = 0 }), "Frame", rigid.ErrNotPositive},
		{with(func(d *fourbar.Dimensions) { d.Crank = -1 }), "Crank", rigid.ErrNotPositive},
		{with(func(d *fourbar.Dimensions) { d.Coupler = math.NaN() }), "Coupler", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Follower = math.Inf(1) }), "Follower", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Follower = math.Inf(-1) }), "Follower", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Crank = 0.9e-60 }), "Crank", rigid.ErrInput},
		{with(func(d *fourbar.Dimensions) { d.Frame = 1.1e60 }), "Frame", rigid.ErrInput},
		{with(func(d *fourbar.Dimensions) { d.Mount.X = math.NaN() }), "Mount.X", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Mount.Y = math.Inf(1) }), "Mount.Y", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Mount.Angle = math.Inf(1) }), "Mount.Angle", rigid.ErrNotFinite},
		{with(func(d *fourbar.Dimensions) { d.Coupler = 0.59 }), "", rigid.ErrUnreachable},
		{fourbar.Dimensions{Frame: 0.1, Crank: 0.2, Coupler: 0.6, Follower: 0.3}, "", rigid.ErrUnreachable}, // one line for good
		{with(func(d *fourbar.Dimensions) { d.Branch = 4 }), "Branch", rigid.ErrInput},
		{with(func(d *fourbar.Dimensions) { d.Branch = fourbar.Parallel }), "Branch", rigid.ErrInput},
		{fourbar.Dimensions{Frame: 1, Crank: 0.5, Coupler: 1, Follower: 0.5 + 2e-12, Branch: fourbar.Parallel}, "Branch", rigid.ErrInput},
		{fourbar.Dimensions{Frame: 1, Crank: 1, Coupler: 1, Follower: 1, Branch: fourbar.Contrary}, "Branch", rigid.ErrChangePoint},
	} {
		l, err := fourbar.New(row.d)
		e, ok := errors.AsType[*rigid.DimensionError](err)
		if l != nil || !ok || e.Name != row.name || !errors.Is(err, row.cause) {
			t.Errorf("%+v: %v, want %q: %v", row.d, err, row.name, row.cause)
		}
	}
	_, err := fourbar.New(fourbar.Dimensions{Frame: -1, Crank: math.NaN(), Coupler: 1, Follower: 1})
	if !errors.Is(err, rigid.ErrNotPositive) || !errors.Is(err, rigid.ErrNotFinite) {
		t.Errorf("two causes: %v", err)
	}
}

// TestSolversRefuse: each error, with the State left as it was and nothing allocated.
func TestSolversRefuse(t *testing.T) {
	l := mustNew(t, crankRocker)
	rocker := mustNew(t, fourbar.Dimensions{Frame: 4, Crank: 5, Coupler: 2, Follower: 5})
	end := rocker.Range()[1].Hi
	long := mustNew(t, fourbar.Dimensions{Frame: 0.2, Crank: 6, Coupler: 5, Follower: 5.9})
	contrary := mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary})
	parallel := mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Parallel})
	zero := new(fourbar.Linkage)
	nan, inf := math.NaN(), math.Inf(1)
	type in = rigid.Coordinate
	for _, row := range []struct {
		why   string
		solve func(dst *fourbar.State) error
		want  error
	}{
		{"beyond a limit", func(dst *fourbar.State) error { return rocker.Solve(dst, in{Pos: end + 1e-6}) }, rigid.ErrUnreachable},
		{"just beyond a limit", func(dst *fourbar.State) error { return rocker.Solve(dst, in{Pos: end + 3e-13}) }, rigid.ErrUnreachable},
		{"rates at a limit", func(dst *fourbar.State) error { return rocker.Solve(dst, in{Pos: end, Vel: 1}) }, rigid.ErrSingular},
		{"acceleration at a limit", func(dst *fourbar.State) error { return rocker.Solve(dst, in{Pos: end, Acc: 1}) }, rigid.ErrSingular},
		{"NaN", func(dst *fourbar.State) error { return l.Solve(dst, in{Pos: nan}) }, rigid.ErrNotFinite},
		{"infinite angle", func(dst *fourbar.State) error { return l.Solve(dst, in{Pos: -inf}) }, rigid.ErrNotFinite},
		{"NaN speed", func(dst *fourbar.State) error { return l.Solve(dst, in{Vel: nan}) }, rigid.ErrNotFinite},
		{"infinite acceleration", func(dst *fourbar.State) error { return l.Solve(dst, in{Acc: inf}) }, rigid.ErrNotFinite},
		{"overflow", func(dst *fourbar.State) error { return l.Solve(dst, in{Vel: 1e200}) }, rigid.ErrNotFinite},
		{"overflow of the crank pin", func(dst *fourbar.State) error { return long.Solve(dst, in{Pos: 1, Acc: 1e308}) }, rigid.ErrNotFinite},
		{"overflow near a limit", func(dst *fourbar.State) error { return rocker.Solve(dst, in{Pos: end - 1e-9, Vel: 1e150}) }, rigid.ErrNotFinite},
		{"zero linkage", func(dst *fourbar.State) error { return zero.Solve(dst, in{Vel: 1}) }, rigid.ErrInput},
		{"zero linkage, follower", func(dst *fourbar.State) error { return zero.SolveFollower(dst, in{}, rigid.Left) }, rigid.ErrInput},
		{"zero linkage, coupler", func(dst *fourbar.State) error { return zero.SolveCoupler(dst, in{}, rigid.Left) }, rigid.ErrInput},
		{"follower out of reach", func(dst *fourbar.State) error { return l.SolveFollower(dst, in{Pos: 0}, rigid.Left) }, rigid.ErrUnreachable},
		{"follower on the other branch", func(dst *fourbar.State) error { return l.SolveFollower(dst, in{Pos: -1.8}, rigid.Left) }, rigid.ErrUnreachable},
		{"follower NaN", func(dst *fourbar.State) error { return l.SolveFollower(dst, in{Pos: 1.8, Vel: nan}, rigid.Left) }, rigid.ErrNotFinite},
		{"unknown knee", func(dst *fourbar.State) error { return l.SolveFollower(dst, in{Pos: 1.8}, 2) }, rigid.ErrInput},
		{"unknown lean", func(dst *fourbar.State) error { return l.SolveCoupler(dst, in{Pos: 0.5}, -1) }, rigid.ErrInput},
		{"coupler out of reach", func(dst *fourbar.State) error { return l.SolveCoupler(dst, in{Pos: 3}, rigid.Left) }, rigid.ErrUnreachable},
		{"contrary NaN", func(dst *fourbar.State) error { return contrary.Solve(dst, in{Pos: nan}) }, rigid.ErrNotFinite},
		{"contrary NaN speed", func(dst *fourbar.State) error { return contrary.Solve(dst, in{Vel: nan}) }, rigid.ErrNotFinite},
		{"contrary overflow", func(dst *fourbar.State) error { return contrary.SolveFollower(dst, in{Pos: 1, Vel: 1e200}, 0) }, rigid.ErrNotFinite},
		{"contrary coupler NaN", func(dst *fourbar.State) error { return contrary.SolveCoupler(dst, in{Pos: nan}, 0) }, rigid.ErrNotFinite},
		{"contrary coupler speed", func(dst *fourbar.State) error { return contrary.SolveCoupler(dst, in{Pos: 0.1, Vel: inf}, 0) }, rigid.ErrNotFinite},
		{"contrary coupler too far", func(dst *fourbar.State) error { return contrary.SolveCoupler(dst, in{Pos: 2}, 0) }, rigid.ErrUnreachable},
		{"parallel infinite", func(dst *fourbar.State) error { return parallel.Solve(dst, in{Pos: inf}) }, rigid.ErrNotFinite},
		{"parallel follower", func(dst *fourbar.State) error { return parallel.SolveFollower(dst, in{Acc: nan}, 0) }, rigid.ErrNotFinite},
		{"parallel coupler", func(dst *fourbar.State) error { return parallel.SolveCoupler(dst, in{}, 0) }, rigid.ErrSingular},
	} {
		var st fourbar.State
		if err := l.Solve(&st, in{Pos: 1, Vel: 2, Acc: 3}); err != nil {
			t.Fatal(err)
		}
		before := st
		if err := row.solve(&st); err != row.want {
			t.Errorf("%s: %v, want %v", row.why, err, row.want)
		}
		if d := cmp.Diff(before, st); d != "" {
			t.Errorf("%s: the State has changed: %s", row.why, d)
		}
		if n := testing.AllocsPerRun(10, func() { _ = row.solve(&st) }); n != 0 {
			t.Errorf("%s: %v allocations", row.why, n)
		}
	}
}

// TestNoAllocation: what a control loop calls.
func TestNoAllocation(t *testing.T) {
	l := mustNew(t, crankRocker)
	contrary := mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary})
	law := rigid.Law(l.Coefficients)
	var st fourbar.State
	in := rigid.Coordinate{Pos: 1, Vel: 2}
	for name, f := range map[string]func() error{
		"Solve":         func() error { return l.Solve(&st, in) },
		"SolveFollower": func() error { return l.SolveFollower(&st, rigid.Coordinate{Pos: 1.8, Vel: 1}, rigid.Left) },
		"SolveCoupler":  func() error { return l.SolveCoupler(&st, rigid.Coordinate{Pos: 0.6, Vel: 1}, rigid.Left) },
		"Contrary":      func() error { return contrary.Solve(&st, in) },
		"Coefficients":  func() error { _, err := l.Coefficients(1); return err },
		"Law":           func() error { _, err := law(1); return err },
		"Gap":           func() error { l.Gap(1); return nil },
	} {
		if err := f(); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		if n := testing.AllocsPerRun(100, func() { _ = f() }); n != 0 {
			t.Errorf("%s: %v allocations", name, n)
		}
	}
}

// TestZeroLinkage: no panic, and nothing that looks like a number.
func TestZeroLinkage(t *testing.T) {
	var l fourbar.Linkage
	if r := l.Range(); r != nil {
		t.Errorf("range %v", r)
	}
	if g := l.Gap(1); !math.IsNaN(g) {
		t.Errorf("gap %v", g)
	}
	if _, err := l.Coefficients(1); err != rigid.ErrInput {
		t.Error(err)
	}
	if d := l.Dimensions(); d != (fourbar.Dimensions{}) {
		t.Error(d)
	}
}

// TestEveryField: a success leaves nothing of the State before it.
func TestEveryField(t *testing.T) {
	l := mustNew(t, crankRocker)
	contrary := mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary})
	for name, solve := range map[string]func(dst *fourbar.State) error{
		"Solve":             func(dst *fourbar.State) error { return l.Solve(dst, rigid.Coordinate{Pos: 1}) },
		"SolveFollower":     func(dst *fourbar.State) error { return l.SolveFollower(dst, rigid.Coordinate{Pos: 1.8}, 0) },
		"SolveCoupler":      func(dst *fourbar.State) error { return l.SolveCoupler(dst, rigid.Coordinate{Pos: 0.6}, 0) },
		"Contrary":          func(dst *fourbar.State) error { return contrary.Solve(dst, rigid.Coordinate{Pos: 1}) },
		"Contrary follower": func(dst *fourbar.State) error { return contrary.SolveFollower(dst, rigid.Coordinate{Pos: 1}, 0) },
		"Contrary coupler":  func(dst *fourbar.State) error { return contrary.SolveCoupler(dst, rigid.Coordinate{Pos: 0.5}, 0) },
	} {
		var clean, used fourbar.State
		x := math.Pi * 1e5
		m := rigid.Motion{Pose: rigid.NewPose(x, x, 1), Omega: x, Alpha: x}
		m.Vel, m.Acc = m.Pose.Origin, m.Pose.Origin
		c := rigid.Coordinate{Pos: x, Vel: x, Acc: x}
		used = fourbar.State{Crank: m, Coupler: m, Follower: m, Turn: c, Swing: c, Branch: 9, Knee: 9, Lean: 9, Transmission: x, Margin: x}
		if err := solve(&clean); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		if err := solve(&used); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		if d := cmp.Diff(clean, used); d != "" {
			t.Errorf("%s leaves a field: %s", name, d)
		}
	}
}

func TestBranchText(t *testing.T) {
	for b, want := range map[fourbar.Branch]string{fourbar.Open: "open", fourbar.Crossed: "crossed", fourbar.Parallel: "parallel", fourbar.Contrary: "contrary"} {
		text, err := b.MarshalText()
		if err != nil || string(text) != want || b.String() != want {
			t.Errorf("%v as text: %q, %v", b, text, err)
		}
		var back fourbar.Branch = 9
		if err := back.UnmarshalText(text); err != nil || back != b {
			t.Errorf("%q as a branch: %v, %v", text, back, err)
		}
	}
	b := fourbar.Branch(7)
	if _, err := b.MarshalText(); !errors.Is(err, rigid.ErrInput) || b.String() != "Branch(7)" {
		t.Errorf("%v: %v", b, err)
	}
	if err := b.UnmarshalText([]byte("Open")); !errors.Is(err, rigid.ErrInput) || b != 7 {
		t.Errorf("unknown text: %v, %v", b, err)
	}
}

// TestLimitedCrankMeetsBothBranches: where the crank does not turn fully, the
// follower takes the linkage from one branch to the other, and State tells.
func TestLimitedCrankMeetsBothBranches(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 3, Crank: 2, Coupler: 2.5, Follower: 1}) // the follower turns fully
	seen := map[fourbar.Branch]int{}
	for k := range 360 {
		var st fourbar.State
		if err := l.SolveFollower(&st, rigid.Coordinate{Pos: float64(k) * rigid.Degree}, rigid.Left); err != nil {
			t.Fatalf("at %d°: %v", k, err)
		}
		if st.Knee != rigid.Left {
			t.Errorf("at %d°: knee %v", k, st.Knee)
		}
		seen[st.Branch]++
	}
	if seen[fourbar.Open] < 90 || seen[fourbar.Crossed] < 90 {
		t.Errorf("poses of each branch: %v", seen)
	}
}

// TestBackOnItsBranch: with links of very unequal length, too, a pose on the other
// branch of a crank that turns fully is refused.
func TestBackOnItsBranch(t *testing.T) {
	d := fourbar.Dimensions{Frame: 1e-6, Crank: 3e-6, Coupler: 1, Follower: 1 + 1e-6} // a double crank
	l := mustNew(t, d)
	for k := range 36 {
		in := rigid.Coordinate{Pos: (float64(k) + 0.5) * 10 * rigid.Degree}
		solved := 0
		for _, side := range []rigid.Side{rigid.Left, rigid.Right} {
			for _, solve := range []func(*fourbar.State, rigid.Coordinate, rigid.Side) error{l.SolveFollower, l.SolveCoupler} {
				var st fourbar.State
				err := solve(&st, in, side)
				if err == nil {
					solved++
					if r2.Cross(st.Coupler.Pose.Axis, st.Follower.Pose.Axis) < 0 {
						t.Errorf("at %v, %v: open has the follower pin right", in.Pos, side)
					}
				} else if err != rigid.ErrUnreachable {
					t.Errorf("at %v, %v: %v", in.Pos, side, err)
				}
			}
		}
		if solved != 2 {
			t.Errorf("at %v: %d poses, want one by each drive", in.Pos, solved)
		}
	}
}
