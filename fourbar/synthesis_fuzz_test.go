package fourbar_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// FuzzFreudenstein: a generator that comes without an error closes its loop at the
// precision angles themselves, and goes from one to the next.
func FuzzFreudenstein(f *testing.F) {
	f.Add(1.0, 0.7, 1.9, 1.1, 2.0, 1.8, 2.3)
	f.Add(0.4, 0.0, 0.0, 0.5, 0.4, 1.0, 1.1)
	f.Add(1.0, 0.3, 0.5, 0.3, 0.5, 1.0, 2.0)
	f.Add(1e60, 0.0, 0.0, 1e300, 1.0, -1e300, 2.0)
	f.Add(0.0, 1.0, math.NaN(), 2.0, 2.0, 3.0, 3.0)
	f.Fuzz(func(t *testing.T, frame, t1, s1, t2, s2, t3, s3 float64) {
		at := [3]fourbar.Precision{{Turn: t1, Swing: s1}, {Turn: t2, Swing: s2}, {Turn: t3, Swing: s3}}
		g, err := fourbar.Freudenstein(frame, at)
		if err != nil {
			refused(t, err)
			return
		}
		l, err := fourbar.New(g.Dimensions)
		if err != nil {
			t.Fatalf("%v: %+v: %v", at, g, err)
		}
		d := g.Dimensions
		for i, p := range at {
			a := r2.Scale(d.Crank, unit(p.Turn+g.TurnZero))
			b := r2.Add(r2.Vec{X: d.Frame}, r2.Scale(d.Follower, unit(p.Swing+g.SwingZero)))
			if off := math.Abs(r2.Norm(r2.Sub(b, a)) - d.Coupler); !(off <= 2e-6*longest(l)) {
				t.Fatalf("%v: %+v is %g m open at position %d", at, g, off, i)
			}
		}
		if !(t1 < t2 && t2 < t3 || t1 > t2 && t2 > t3) {
			t.Fatalf("%v are passed in another order", at)
		}
		var start fourbar.State
		if err := l.Solve(&start, rigid.Coordinate{Pos: t1 + g.TurnZero}); err != nil {
			t.Fatalf("%v: %+v at %v: %v", at, g, t1, err)
		}
		for i := range 33 {
			turn := t1 + (t3-t1)*(float64(i)/32) + g.TurnZero
			var st fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
				t.Fatalf("%v: %+v at %v: %v", at, g, turn, err)
			}
			if off := math.Abs((st.Swing.Pos - start.Swing.Pos) - (s3 - s1)); i == 32 && !(off < 1e-5) {
				t.Fatalf("%v: %+v: the follower misses the last position by %v", at, g, off)
			}
		}
	})
}

// refused reports an error that Freudenstein does not tell of.
func refused(t *testing.T, err error) {
	t.Helper()
	for _, known := range []error{fourbar.ErrBranch, fourbar.ErrOrder, rigid.ErrSingular, rigid.ErrUnreachable, rigid.ErrNotFinite} {
		if errors.Is(err, known) {
			return
		}
	}
	if bad, ok := errors.AsType[*rigid.DimensionError](err); !ok || bad.Name != "Frame" {
		t.Fatalf("unknown error %v", err)
	}
}

// unit returns the unit vector at an angle.
func unit(angle float64) r2.Vec { return r2.Vec{X: math.Cos(angle), Y: math.Sin(angle)} }

func longest(l *fourbar.Linkage) float64 {
	d := l.Dimensions()
	return max(d.Frame, d.Crank, d.Coupler, d.Follower)
}
