package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// At an extreme of the follower First is 0, at a limit of the crank Margin is 0;
// and no sampled position of the branch lies beyond them.
func TestLimits(t *testing.T) {
	for _, l := range randomLinkages(t, 300) {
		lo, hi := math.Inf(1), math.Inf(-1)
		ends := 0
		for _, x := range l.Limits() {
			var st fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: x.Turn}); err != nil {
				t.Fatalf("%+v: %+v: %v", l.Dimensions(), x, err)
			}
			inside := false
			for _, r := range l.Range() {
				inside = inside || r.Contains(x.Turn)
			}
			if st.Swing.Pos != x.Swing || !inside {
				t.Fatalf("%+v: %+v, solved at %v", l.Dimensions(), x, st.Swing.Pos)
			}
			straight := r2.Dot(st.Coupler.Pose.Axis, st.Crank.Pose.Axis)
			if x.Kind >= fourbar.CrankStretched {
				straight = -r2.Dot(st.Coupler.Pose.Axis, st.Follower.Pose.Axis)
				if st.Margin > 1e-7 {
					t.Fatalf("%+v: %+v: margin %v", l.Dimensions(), x, st.Margin)
				}
			} else {
				lo, hi = min(lo, x.Swing), max(hi, x.Swing)
				ends++
				c, err := l.Coefficients(x.Turn)
				if err != nil || math.Abs(c.First) > 1e-12/st.Margin {
					t.Fatalf("%+v: %+v: %+v, %v", l.Dimensions(), x, c, err)
				}
			}
			if want := 1 - 2*float64(x.Kind%2); math.Abs(straight-want) > 1e-9 {
				t.Fatalf("%+v: %+v: cosine %v", l.Dimensions(), x, straight)
			}
		}
		if l.Class() == fourbar.CrankRocker {
			if ends != 2 {
				t.Fatalf("%+v: %v", l.Dimensions(), l.Limits())
			}
			for turn := -math.Pi; turn < math.Pi; turn += 0.01 {
				c, err := l.Coefficients(turn)
				if err != nil || c.Out < lo-1e-12 || c.Out > hi+1e-12 {
					t.Fatalf("%+v: %+v, %v beyond %v, %v", l.Dimensions(), c, err, lo, hi)
				}
			}
		}
		// Dead centres found by the law itself, and no others.
		n := 0
		for _, r := range l.Range() {
			at, err := rigid.Law(l.Coefficients).Extremes(rigid.Interval{Lo: r.Lo + 1e-7, Hi: r.Hi - 1e-7})
			if err != nil {
				t.Fatalf("%+v: %v", l.Dimensions(), err)
			}
			n += len(at)
		}
		if n != ends {
			t.Fatalf("%+v: %d dead centres by the law, limits %v", l.Dimensions(), n, l.Limits())
		}
	}
}

func TestLimitsOfTheCrank(t *testing.T) {
	// Chebyshev's linkage 4 : 5 : 2 : 5, whose input runs from 36.8699° to 101.537°
	// (https://en.wikipedia.org/wiki/Chebyshev_linkage).
	l := mustNew(t, fourbar.Dimensions{Frame: 4, Crank: 5, Coupler: 2, Follower: 5, Branch: fourbar.Crossed})
	var got []float64
	for _, x := range l.Limits() {
		if x.Kind >= fourbar.CrankStretched && x.Turn > 0 {
			got = append(got, x.Turn/rigid.Degree)
		}
	}
	want := []float64{36.869897645844021297, 101.53695903281548769}
	if len(got) != 2 || math.Abs(got[0]-want[0]) > 1e-13*want[0] || math.Abs(got[1]-want[1]) > 1e-13*want[1] {
		t.Errorf("limits %v, want %v", got, want)
	}
}

func TestLimitsAtChangePoints(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 0.2, Crank: 0.1, Coupler: 0.4, Follower: 0.3})
	found := false
	for _, x := range l.Limits() {
		found = found || x.Kind == fourbar.ChangePoint && x.Turn == 0
	}
	if !found {
		t.Errorf("no change point at turn 0: %+v", l.Limits())
	}
	if _, err := l.TimeRatio(); err != rigid.ErrUnreachable {
		t.Errorf("time ratio through a change point: %v", err)
	}
	l = mustNew(t, fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Parallel})
	if x := l.Limits(); len(x) != 0 {
		t.Errorf("a parallelogram that passes its change points has limits %v", x)
	}
}

func TestTimeRatio(t *testing.T) {
	// Crank and coupler in line at both extremes: the crank angles between them by
	// the law of cosines at the crank pivot, written out for the linkage 100, 40,
	// 120, 80 of R. L. Norton, Design of Machinery (from memory).
	d, a, b, c := 100.0, 40.0, 120.0, 80.0
	out := math.Acos((d*d + (a+b)*(a+b) - c*c) / (2 * d * (a + b)))
	in := math.Acos((d*d + (b-a)*(b-a) - c*c) / (2 * d * (b - a)))
	gap := math.Abs(out - in)
	want := (math.Pi + gap) / (math.Pi - gap)
	for _, branch := range []fourbar.Branch{fourbar.Open, fourbar.Crossed} {
		got, err := mustNew(t, fourbar.Dimensions{Frame: d, Crank: a, Coupler: b, Follower: c, Branch: branch}).TimeRatio()
		if err != nil || math.Abs(max(got, 1/got)-want) > 1e-14 {
			t.Errorf("%v: ratio %v, %v, want %v or its inverse", branch, got, err, want)
		}
	}
	// The centric crank-rocker: both strokes take equal times where
	// a² + d² = b² + c² (textbooks of mechanism design; from memory).
	a, d, b = 0.3, 1, 0.9
	c = math.Sqrt(a*a + d*d - b*b)
	got, err := mustNew(t, fourbar.Dimensions{Frame: d, Crank: a, Coupler: b, Follower: c}).TimeRatio()
	if err != nil || math.Abs(got-1) > 1e-14 {
		t.Errorf("centric crank-rocker: %v, %v", got, err)
	}
	for _, l := range randomLinkages(t, 300) {
		got, err := l.TimeRatio()
		if l.Class() != fourbar.CrankRocker {
			if err != rigid.ErrUnreachable {
				t.Fatalf("%v: %v, %v", l.Class(), got, err)
			}
			continue
		}
		const n = 4096
		rising := 0
		for i := range n {
			x, _ := l.Coefficients(-math.Pi + rigid.Revolution*float64(i)/n)
			if x.First > 0 {
				rising++
			}
		}
		if sampled := float64(rising) / float64(n-rising); math.Abs(got/sampled-1) > 0.01*(1+got+1/got) {
			t.Fatalf("%+v: %v, by sampling %v", l.Dimensions(), got, sampled)
		}
	}
}

func TestTransmission(t *testing.T) {
	for _, l := range randomLinkages(t, 200) {
		least, greatest := l.Transmission()
		lo, hi := math.Inf(1), math.Inf(-1)
		for _, r := range l.Range() {
			for i := range 1025 {
				turn := r.Lo + (r.Hi-r.Lo)*float64(i)/1024
				if i == 1024 {
					turn = r.Hi
				}
				var st fourbar.State
				if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
					t.Fatal(err)
				}
				lo, hi = min(lo, st.Transmission), max(hi, st.Transmission)
			}
		}
		// 1 025 positions come within (2π/1024)²/8 × curvature; turn 0 and π are among them
		// for a crank that turns fully, both ends for one that does not.
		if lo < least-1e-7 || hi > greatest+1e-7 || lo > least+1e-2 || hi < greatest-1e-2 {
			t.Fatalf("%+v: %v to %v, sampled %v to %v", l.Dimensions(), least, greatest, lo, hi)
		}
	}
	// cos μ = (b² + c² − (d ∓ a)²)/(2bc), the textbook's extremes (from memory)
	least, greatest := mustNew(t, fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80}).Transmission()
	if w := math.Acos((120*120 + 80*80 - 60*60) / (2 * 120 * 80.)); math.Abs(least-w) > 1e-14 {
		t.Errorf("least %v, want %v", least, w)
	}
	if w := math.Acos((120*120 + 80*80 - 140*140) / (2 * 120 * 80.)); math.Abs(greatest-w) > 1e-14 {
		t.Errorf("greatest %v, want %v", greatest, w)
	}
}

// Lengths whose sums differ by rounding alone: coupler and follower fall into one line.
func TestTransmissionAtChangePoints(t *testing.T) {
	for _, row := range []struct {
		d               fourbar.Dimensions
		least, greatest bool
	}{
		{fourbar.Dimensions{Frame: 0.6, Crank: 0.1, Coupler: 0.2, Follower: 0.7}, true, false},
		{fourbar.Dimensions{Frame: 6.1, Crank: 1.8, Coupler: 5.7, Follower: 2.2}, false, true},
		{fourbar.Dimensions{Frame: 6.2, Crank: 2.6, Coupler: 1.2, Follower: 4.8}, true, true},
		{fourbar.Dimensions{Frame: 0.3, Crank: 0.08, Coupler: 0.28, Follower: 0.2}, false, false},
	} {
		least, greatest := mustNew(t, row.d).Transmission()
		if (least == 0) != row.least || (greatest == math.Pi) != row.greatest {
			t.Errorf("%+v: from %v to %v", row.d, least, greatest)
		}
	}
}
