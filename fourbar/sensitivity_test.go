package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// Against linkages solved again with a length a little longer and shorter.
func TestSensitivity(t *testing.T) {
	worst := 0.0
	for _, l := range randomLinkages(t, 200) {
		d, p := l.Dimensions(), r2.Vec{X: 0.4, Y: -0.3}
		in := rigid.Coordinate{Pos: inRange(l, 0.6), Vel: 2, Acc: -3}
		var st fourbar.State
		if err := l.Solve(&st, in); err != nil {
			t.Fatal(err)
		}
		if st.Margin < 0.3 {
			continue
		}
		var s fourbar.Sensitivity
		if err := l.Sensitivity(&s, in, p); err != nil {
			t.Fatal(err)
		}
		for name, x := range map[string]struct {
			field *float64
			got   fourbar.LengthSensitivity
		}{
			"frame": {&d.Frame, s.Frame}, "crank": {&d.Crank, s.Crank},
			"coupler": {&d.Coupler, s.Coupler}, "follower": {&d.Follower, s.Follower},
		} {
			at := *x.field
			output := func(y, length []float64) {
				*x.field = length[0]
				var st fourbar.State
				if err := mustNew(t, d).Solve(&st, in); err != nil {
					t.Fatal(err)
				}
				q := st.Coupler.At(p)
				copy(y, []float64{st.Swing.Pos, st.Swing.Vel, st.Swing.Acc, q.Pos.X, q.Pos.Y, q.Vel.X, q.Vel.Y, q.Acc.X, q.Acc.Y})
			}
			want := jacobian(output, at)
			*x.field = at
			q := x.got.Point
			got := []float64{x.got.Swing.Pos, x.got.Swing.Vel, x.got.Swing.Acc, q.Pos.X, q.Pos.Y, q.Vel.X, q.Vel.Y, q.Acc.X, q.Acc.Y}
			for i := range got {
				off := math.Abs(got[i]-want[i]) / (1 + math.Abs(want[i]))
				worst = max(worst, off)
				if off > 1e-7 {
					t.Errorf("%+v at %v: %s, output %d: %v, want %v", d, in.Pos, name, i, got[i], want[i])
				}
			}
		}
	}
	t.Logf("worst %.2g", worst)
}

// jacobian differentiates by one variable: central differences of two steps,
// extrapolated.
func jacobian(f func(y, x []float64), x float64) []float64 {
	const n, h = 9, 1e-3
	diff := func(h float64) []float64 {
		hi, lo := make([]float64, n), make([]float64, n)
		f(hi, []float64{x + h})
		f(lo, []float64{x - h})
		for i := range hi {
			hi[i] = (hi[i] - lo[i]) / (2 * h)
		}
		return hi
	}
	a, b, c := diff(h), diff(h/2), diff(h/4)
	for i := range a {
		ab, bc := b[i]+(b[i]-a[i])/3, c[i]+(c[i]-b[i])/3
		a[i] = bc + (bc-ab)/15
	}
	return a
}

// TestSensitivityOverflow: a coupler point so far off that its derivatives overflow,
// also with the crank at rest, where only its place has any.
func TestSensitivityOverflow(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 4e-3, Crank: 1e-3, Coupler: 4e-3, Follower: 3e-3})
	was := fourbar.Sensitivity{Frame: fourbar.LengthSensitivity{Swing: rigid.Coordinate{Pos: 7}}}
	for _, turn := range []rigid.Coordinate{{Pos: 1}, {Pos: 1, Vel: 1}} {
		s := was
		if err := l.Sensitivity(&s, turn, r2.Vec{X: 1e307}); err != rigid.ErrNotFinite || s != was {
			t.Errorf("turn %v: %v, %+v", turn, err, s)
		}
	}
}

func TestTradeAllocates(t *testing.T) {
	l := randomLinkages(t, 1)[0]
	in := rigid.Coordinate{Pos: inRange(l, 0.5), Vel: 1}
	var st fourbar.State
	if err := l.Solve(&st, in); err != nil {
		t.Fatal(err)
	}
	var s fourbar.Sensitivity
	for name, f := range map[string]func(){
		"Sensitivity":        func() { sinkErr = l.Sensitivity(&s, in, r2.Vec{X: 1}) },
		"Sensitivity of NaN": func() { sinkErr = l.Sensitivity(&s, rigid.Coordinate{Pos: math.NaN()}, r2.Vec{}) },
		"Centres":            func() { _, sinkErr = l.Centres(&st) },
		"Class":              func() { sinkClass = l.Class() },
		"Transmission":       func() { sinkFloat, _ = l.Transmission() },
	} {
		if n := testing.AllocsPerRun(100, f); n != 0 {
			t.Errorf("%s allocates %v times", name, n)
		}
	}
}

var (
	sinkErr   error
	sinkClass fourbar.Class
	sinkFloat float64
)
