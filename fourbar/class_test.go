package fourbar_test

import (
	"math"
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

func TestClass(t *testing.T) {
	for _, c := range []struct {
		why                             string
		frame, crank, coupler, follower float64
		want                            fourbar.Class
	}{
		// The rule of Grashof by the link that is shortest: R. L. Norton, Design of
		// Machinery, the chapter on the Grashof condition (from memory).
		{"crank shortest", 100, 40, 120, 80, fourbar.CrankRocker},
		{"frame shortest", 20, 60, 50, 55, fourbar.DoubleCrank},
		{"follower shortest", 100, 80, 120, 40, fourbar.RockerCrank},
		{"coupler shortest: Chebyshev's straight line", 4, 5, 2, 5, fourbar.DoubleRocker},
		{"longest too long", 9, 6, 5, 7, fourbar.TripleRocker},
		{"no link turns", 7, 5, 6, 5, fourbar.TripleRocker},
		{"two equal pairs, opposite", 2, 1, 2, 1, fourbar.Parallelogram},
		{"two equal pairs, neighbouring: frame and crank", 2, 2, 1, 1, fourbar.Kite},
		{"two equal pairs, neighbouring: frame and follower", 2, 1, 1, 2, fourbar.Kite},
		{"all equal", 1, 1, 1, 1, fourbar.Rhombus},
		{"in one line, crank shortest", 4, 1, 3, 2, fourbar.ChangePointCrankRocker},
		{"in one line, frame shortest", 1, 4, 3, 2, fourbar.ChangePointDoubleCrank},
		{"in one line, follower shortest", 4, 2, 3, 1, fourbar.ChangePointRockerCrank},
		{"in one line, coupler shortest", 4, 2, 1, 3, fourbar.ChangePointDoubleRocker},
		{"decimals: 0.1 + 0.4 = 0.2 + 0.3", 0.2, 0.1, 0.4, 0.3, fourbar.ChangePointCrankRocker},
	} {
		l := mustNew(t, fourbar.Dimensions{Frame: c.frame, Crank: c.crank, Coupler: c.coupler, Follower: c.follower})
		want := c.want
		if got := l.Class(); got != want {
			t.Errorf("%s: %v, want %v", c.why, got, want)
		}
		if got := l.Grashof(); (got > 1e-15) != (want >= fourbar.CrankRocker && want <= fourbar.DoubleRocker) || (got < -1e-15) != (want == fourbar.TripleRocker) {
			t.Errorf("%s: measure %v of a %v", c.why, got, want)
		}
		var back fourbar.Class
		if text, err := want.MarshalText(); err != nil || back.UnmarshalText(text) != nil || back != want {
			t.Errorf("%v: text %q, %v, back %v", want, text, err, back)
		}
	}
	if c := new(fourbar.Linkage).Class(); c != fourbar.NoClass {
		t.Errorf("zero linkage: %v", c)
	}
	// (p + q − s − l)/(s + l) of 100, 40, 120, 80
	if got, want := mustNew(t, fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80}).Grashof(), 20.0/160; got != want {
		t.Errorf("Grashof's measure %v, want %v", got, want)
	}
}

// The class says which links turn fully: so do the range of the crank and, with
// the same lengths in the opposite order, that of the follower.
func TestClassAgreesWithRange(t *testing.T) {
	full := func(l *fourbar.Linkage) bool {
		r := l.Range()
		return len(r) == 1 && r[0] == rigid.Interval{Lo: -math.Pi, Hi: math.Pi}
	}
	seen := map[fourbar.Class]int{}
	for _, l := range randomLinkages(t, 500) {
		d := l.Dimensions()
		c := l.Class()
		seen[c]++
		turned := mustNew(t, fourbar.Dimensions{Frame: d.Frame, Crank: d.Follower, Coupler: d.Coupler, Follower: d.Crank})
		crank := c == fourbar.CrankRocker || c == fourbar.DoubleCrank
		follower := c == fourbar.RockerCrank || c == fourbar.DoubleCrank
		if full(l) != crank || full(turned) != follower {
			t.Fatalf("%+v: %v, but crank %v, follower %v", d, c, full(l), full(turned))
		}
	}
	if len(seen) != 5 {
		t.Errorf("classes seen: %v", seen)
	}
}
