package fourbar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// The linkage 2 : 1 : 2.5 : 2.5 with the point at 5 from the crank pin is the
// cognate of Chebyshev's 4 : 5 : 2 : 5 with the middle of the coupler
// (https://en.wikipedia.org/wiki/Hoecken_linkage, from memory).
func TestCognateOfChebyshev(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 4, Crank: 5, Coupler: 2, Follower: 5, Branch: fourbar.Crossed})
	c := l.Cognates(r2.Vec{X: 1})[0]
	d := c.Dimensions
	for _, x := range [][2]float64{{d.Frame, 2}, {d.Crank, 1}, {d.Coupler, 2.5}, {d.Follower, 2.5}, {c.Coupler.X, 5}, {c.Coupler.Y, 0}} {
		if math.Abs(x[0]-x[1]) > 1e-15 {
			t.Errorf("cognate %+v", c)
		}
	}
}

// The three linkages trace one curve in step: the first cognate's coupler and the
// second's crank turn with the linkage's crank.
func TestCognatesTraceOneCurve(t *testing.T) {
	r := rand.New(rand.NewPCG(1878, 1))
	worst := 0.0
	for _, l := range randomLinkages(t, 300) {
		d := l.Dimensions()
		p := r2.Vec{X: d.Coupler * r.NormFloat64(), Y: d.Coupler * r.NormFloat64()}
		pair := l.Cognates(p)
		first, second := mustNew(t, pair[0].Dimensions), mustNew(t, pair[1].Dimensions)
		lean := rigid.Left
		if d.Branch == fourbar.Crossed {
			lean = rigid.Right
		}
		size := 0.0
		for _, d := range []fourbar.Dimensions{d, pair[0].Dimensions, pair[1].Dimensions} {
			size = max(size, d.Frame, d.Crank, d.Coupler, d.Follower)
		}
		for i := range 16 {
			in := rigid.Coordinate{Pos: inRange(l, float64(i)/15), Vel: 2, Acc: -3}
			var st, one, two fourbar.State
			if err := l.Solve(&st, in); err != nil {
				t.Fatal(err)
			}
			if st.Margin < 0.05 {
				continue
			}
			if err := first.SolveCoupler(&one, in, lean); err != nil {
				t.Fatalf("%+v at %v: first cognate %+v: %v", d, in.Pos, pair[0], err)
			}
			if err := second.Solve(&two, in); err != nil {
				t.Fatalf("%+v at %v: second cognate %+v: %v", d, in.Pos, pair[1], err)
			}
			want := st.Coupler.At(p)
			for _, got := range []rigid.Point{one.Coupler.At(pair[0].Coupler), two.Coupler.At(pair[1].Coupler)} {
				off := math.Hypot(got.Pos.X-want.Pos.X, got.Pos.Y-want.Pos.Y) / size
				worst = max(worst, off)
				if off > 1e-12 {
					t.Fatalf("%+v at %v: off by %v of the size", d, in.Pos, off)
				}
				if v, a := r2.Norm(r2.Sub(got.Vel, want.Vel)), r2.Norm(r2.Sub(got.Acc, want.Acc)); v > 1e-9*size || a > 1e-7*size {
					t.Fatalf("%+v at %v: velocity off by %v, acceleration by %v", d, in.Pos, v, a)
				}
			}
		}
	}
	t.Logf("worst %.2g of the size", worst)
	if c := randomLinkages(t, 1)[0]; c.Cognates(r2.Vec{})[0] != (fourbar.Cognate{}) {
		t.Error("a point in the crank pin has a first cognate")
	}
}

// The kites of a parallelogram go with it on the way between its flattened positions.
func TestCognatesOfParallelograms(t *testing.T) {
	p := r2.Vec{X: 0.7, Y: -0.4}
	for branch, lean := range map[fourbar.Branch]rigid.Side{fourbar.Parallel: rigid.Left, fourbar.Contrary: rigid.Right} {
		for _, d := range []fourbar.Dimensions{
			{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: branch},
			{Frame: 1, Crank: 3, Coupler: 1, Follower: 3, Branch: branch, Mount: rigid.Placement{X: 1, Angle: 2}},
		} {
			l := mustNew(t, d)
			pair := l.Cognates(p)
			first, second := mustNew(t, pair[0].Dimensions), mustNew(t, pair[1].Dimensions)
			for k := range 30 {
				in := rigid.Coordinate{Pos: (float64(k) + 0.5) * math.Pi / 30}
				var st, one, two fourbar.State
				if err := l.Solve(&st, in); err != nil {
					t.Fatal(err)
				}
				if err := first.SolveCoupler(&one, in, lean); err != nil {
					t.Fatalf("%+v at %v: first cognate: %v", d, in.Pos, err)
				}
				if err := second.Solve(&two, in); err != nil {
					t.Fatalf("%+v at %v: second cognate: %v", d, in.Pos, err)
				}
				want := st.Coupler.At(p).Pos
				near(t, "first", r2.Norm(r2.Sub(one.Coupler.At(pair[0].Coupler).Pos, want)), 0, 1e-13)
				near(t, "second", r2.Norm(r2.Sub(two.Coupler.At(pair[1].Coupler).Pos, want)), 0, 1e-13)
			}
		}
	}
}
