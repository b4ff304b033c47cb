package fourbar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// TestRange: the ends are accepted at rest and refuse rates; inside the loop closes
// and outside it does not, by the distance that Gap tells.
func TestRange(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 9))
	kinds := map[string]int{}
	for range rounds(5000) {
		d := anyDimensions(r)
		l := mustNew(t, d)
		longest := max(d.Frame, d.Crank, d.Coupler, d.Follower)
		all := l.Range()
		switch {
		case len(all) == 2:
			kinds["two"]++
			if !(all[0].Lo < all[0].Hi && all[0].Hi < all[1].Lo && all[1].Lo < all[1].Hi) {
				t.Fatalf("%+v: %v not in order", d, all)
			}
		case all[0] == rigid.Interval{Lo: -math.Pi, Hi: math.Pi}:
			kinds["full"]++
			for range 20 {
				if g := l.Gap(7 * r.NormFloat64()); g != 0 {
					t.Fatalf("%+v: gap %v", d, g)
				}
			}
			continue
		case all[0].Contains(0):
			kinds["about 0"]++
		default:
			kinds["about π"]++
		}
		for _, i := range all {
			if !(i.Lo >= -math.Pi && i.Lo < math.Pi) {
				t.Errorf("%+v: starts at %v", d, i.Lo)
			}
			for _, end := range []float64{i.Lo, i.Hi} {
				var st fourbar.State
				if err := l.Solve(&st, rigid.Coordinate{Pos: end}); err != nil {
					t.Errorf("%+v at the end %v: %v", d, end, err)
				}
				near(t, "margin at the end", st.Margin, 0, 1e-6)
				p := st.Coupler.At(r2.Vec{X: d.Coupler}).Pos
				near(t, "gap of the loop at the end", r2.Norm(r2.Sub(p, st.Follower.At(r2.Vec{X: d.Follower}).Pos)), 0, 2e-14*longest)
				if g := l.Gap(end); g != 0 {
					t.Errorf("%+v: gap %v at the end", d, g)
				}
				if err := l.Solve(&st, rigid.Coordinate{Pos: end, Vel: 1}); st.Margin < 0.5*rigid.LeastMargin && err != rigid.ErrSingular {
					t.Errorf("%+v: rates at the end: %v", d, err)
				}
				out := 1e-3 * (i.Hi - i.Lo)
				if end == i.Lo {
					out = -out
				}
				if g, err := l.Gap(end+out), l.Solve(&st, rigid.Coordinate{Pos: end + out}); g > 1e-13*longest && err != rigid.ErrUnreachable {
					t.Errorf("%+v: gap %v beyond the end, but %v", d, g, err)
				}
				if g := l.Gap(end - out); g != 0 {
					t.Errorf("%+v: gap %v before the end", d, g)
				}
			}
		}
	}
	for _, kind := range []string{"two", "full", "about 0", "about π"} {
		if kinds[kind] < rounds(200) {
			t.Errorf("few of a kind: %v", kinds)
		}
	}
}

// TestGap: with both links stretched towards each other, or one turned back.
func TestGap(t *testing.T) {
	far := mustNew(t, fourbar.Dimensions{Frame: 5, Crank: 2, Coupler: 3, Follower: 2, Mount: rigid.Placement{X: 9, Angle: 1}})
	near(t, "too far", far.Gap(math.Pi), 2, 1e-15)
	folded := mustNew(t, fourbar.Dimensions{Frame: 5, Crank: 4, Coupler: 5, Follower: 1})
	near(t, "too near", folded.Gap(0), 3, 1e-15)
	if g := far.Gap(math.NaN()); !math.IsNaN(g) {
		t.Errorf("of NaN: %v", g)
	}
}

// TestDecimalChangePoint: 0.5 + 0.3 = 0.1 + 0.7 in decimals, but not in float64;
// the crank passes the stretched position at π.
func TestDecimalChangePoint(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 0.5, Crank: 0.3, Coupler: 0.1, Follower: 0.7})
	if r := l.Range(); len(r) != 1 || !r[0].Contains(math.Pi) {
		t.Errorf("range %v, want one interval about π", r)
	}
}

// TestSwingPastChangePoint: a limited crank, longer than the frame, and a follower
// that turns fully; the side of Open and Crossed is kept through the flattened
// position in the middle of the range.
func TestSwingPastChangePoint(t *testing.T) {
	for branch := fourbar.Open; branch <= fourbar.Crossed; branch++ {
		for _, d := range []fourbar.Dimensions{
			{Frame: 3, Crank: 4, Coupler: 6, Follower: 1, Branch: branch}, // about π
			{Frame: 3, Crank: 6, Coupler: 4, Follower: 1, Branch: branch}, // about 0
		} {
			l := mustNew(t, d)
			over := l.Range()
			if len(over) != 1 {
				t.Fatalf("%+v: range %v", d, over)
			}
			last := math.NaN()
			for k := range 1001 {
				var st fourbar.State
				turn := over[0].Lo + (over[0].Hi-over[0].Lo)*float64(k)/1000
				if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
					t.Fatalf("%+v at %v: %v", d, turn, err)
				}
				if math.Abs(st.Swing.Pos-last) > 0.5 {
					t.Fatalf("%+v: swing jumps from %v to %v at %v", d, last, st.Swing.Pos, turn)
				}
				last = st.Swing.Pos
			}
		}
	}
}
