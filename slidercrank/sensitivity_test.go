package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// TestSensitivityAgainst50Digits holds the slide's derivatives against differences of
// places that keep 50 digits.
func TestSensitivityAgainst50Digits(t *testing.T) {
	var s slidercrank.Sensitivity
	compareRows(t, readTable(t, "slidercrank_length", 3), 4, func(r row) ([]rigid.Coordinate, error) {
		branch := slidercrank.Ahead
		if r.pick < 0 {
			branch = slidercrank.Behind
		}
		err := rowLinkage(t, r, branch).Sensitivity(&s, r.drive, r2.Vec{})
		return []rigid.Coordinate{s.Crank.Slide, s.Rod.Slide, s.Offset.Slide}, err
	})
}

// outputs lists the motion of the slide and of a point of the rod.
func outputs(slide rigid.Coordinate, p rigid.Point) []float64 {
	return []float64{slide.Pos, slide.Vel, slide.Acc, p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y}
}

// TestSensitivityOfTheRodsPoint holds all derivatives against presses made again with a
// length a little longer and shorter.
func TestSensitivityOfTheRodsPoint(t *testing.T) {
	rng, tried := rand.New(rand.NewPCG(8, 1)), 0
	for range rounds() {
		d, local := randomPress(rng), r2.Vec{X: 0.4, Y: -0.3}
		d.Mount = rigid.Placement{X: 1, Y: 2, Angle: 7 * rng.Float64()}
		turn := rigid.Coordinate{Pos: 7 * rng.Float64(), Vel: 2, Acc: -3}
		var st slidercrank.State
		if l := newPress(t, d); l.Solve(&st, turn) != nil || st.Margin < 0.3 {
			continue
		}
		tried++
		var s slidercrank.Sensitivity
		if err := newPress(t, d).Sensitivity(&s, turn, local); err != nil {
			t.Fatal(err)
		}
		for _, by := range []struct {
			name  string
			field *float64
			got   slidercrank.LengthSensitivity
		}{{"crank", &d.Crank, s.Crank}, {"rod", &d.Rod, s.Rod}, {"offset", &d.Offset, s.Offset}} {
			at := *by.field
			for i, got := range outputs(by.got.Slide, by.got.Point) {
				want := fd.Derivative(func(x float64) float64 {
					*by.field = x
					if err := newPress(t, d).Solve(&st, turn); err != nil {
						t.Fatal(err)
					}
					return outputs(st.Slide, st.Rod.At(local))[i]
				}, at, &fd.Settings{Formula: fd.Central, Step: 1e-5 * d.Rod})
				*by.field = at
				if !(math.Abs(got-want) <= 1e-5*(1+math.Abs(want))) {
					t.Errorf("%+v at %v by %s: output %d: %v, want %v", d, turn.Pos, by.name, i, got, want)
				}
			}
		}
	}
	if tried < rounds()/3 {
		t.Errorf("only %d presses tried", tried)
	}
}

// TestSensitivityInLine: at the dead centres of a press in line the slide grows with
// both lengths, or shrinks with the crank, and does not feel the offset.
func TestSensitivityInLine(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 0.1, Rod: 0.4})
	for turn, crank := range map[float64]float64{0: 1, math.Pi: -1} {
		var s slidercrank.Sensitivity
		if err := l.Sensitivity(&s, rigid.Coordinate{Pos: turn}, r2.Vec{X: 0.4}); err != nil {
			t.Fatal(err)
		}
		for _, x := range []struct{ got, want float64 }{
			{s.Crank.Slide.Pos, crank}, {s.Rod.Slide.Pos, 1}, {s.Offset.Slide.Pos, 0},
			{s.Crank.Point.Pos.X, crank}, {s.Rod.Point.Pos.X, 0}, {s.Offset.Point.Pos.Y, 1},
		} {
			if math.Abs(x.got-x.want) > 1e-15 {
				t.Errorf("turn %v: %+v", turn, s)
			}
		}
	}
}

func TestSensitivityRefuses(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 4, Rod: 3, Offset: 0.5})
	small := newPress(t, slidercrank.Dimensions{Crank: 1e-3, Rod: 4e-3})
	near := newPress(t, slidercrank.Dimensions{Crank: 0.85, Rod: 1})
	end, inf := l.Range()[0].Hi, math.Inf(1)
	for _, row := range []struct {
		name string
		l    *slidercrank.Linkage
		turn rigid.Coordinate
		rod  r2.Vec
		want error
	}{
		{"answered", l, rigid.Coordinate{Vel: 1}, r2.Vec{X: 1}, nil},
		{"at rest", l, rigid.Coordinate{}, r2.Vec{X: 1}, nil},
		{"zero linkage", new(slidercrank.Linkage), rigid.Coordinate{}, r2.Vec{}, rigid.ErrInput},
		{"turn not a number", l, rigid.Coordinate{Pos: math.NaN()}, r2.Vec{}, rigid.ErrNotFinite},
		{"beyond the range", l, rigid.Coordinate{Pos: end + 1e-6}, r2.Vec{}, rigid.ErrUnreachable},
		{"at the end of the range", l, rigid.Coordinate{Pos: end, Vel: 1}, r2.Vec{}, rigid.ErrSingular},
		{"at rest at the end of the range", l, rigid.Coordinate{Pos: end}, r2.Vec{}, rigid.ErrSingular},
		{"infinite point", l, rigid.Coordinate{}, r2.Vec{Y: inf}, rigid.ErrNotFinite},
		{"point whose derivatives overflow", small, rigid.Coordinate{Pos: 1}, r2.Vec{X: 1e307}, rigid.ErrNotFinite},
		{"slide whose derivatives overflow", near, rigid.Coordinate{Vel: 1e154}, r2.Vec{}, rigid.ErrNotFinite},
	} {
		before := slidercrank.Sensitivity{Crank: slidercrank.LengthSensitivity{Slide: rigid.Coordinate{Pos: 7}}}
		outcome(t, row.name, before, func(s *slidercrank.Sensitivity) error { return row.l.Sensitivity(s, row.turn, row.rod) }, row.want)
	}
}

// FuzzSensitivity: an answer is finite, an error leaves dst as it was.
func FuzzSensitivity(f *testing.F) {
	f.Add(0.15, 0.6, 0.0, byte(0), -0.7, -31.4, 0.0, 0.3, 0.1)
	f.Add(0.03, 0.05, 0.01, byte(1), 1.05, 10.0, 5.0, 0.0, 0.0)
	f.Add(0.3, 0.2, 0.15, byte(0), -0.16744807921968935, 0.0, 0.0, 1.0, 0.0) // at a limit
	f.Add(1e-60, 1e60, 0.0, byte(0), 1.0, 1e100, 1e300, 1e300, 0.0)          // extremes
	f.Fuzz(func(t *testing.T, crank, rod, offset float64, branch byte, pos, vel, acc, x, y float64) {
		l := fuzzedPress(t, slidercrank.Dimensions{Crank: crank, Rod: rod, Offset: offset, Branch: slidercrank.Branch(branch)})
		if l == nil {
			return
		}
		var was slidercrank.Sensitivity
		was.Rod.Slide.Pos = -7
		s, turn := was, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}
		if err := l.Sensitivity(&s, turn, r2.Vec{X: x, Y: y}); err != nil {
			known := []error{rigid.ErrUnreachable, rigid.ErrSingular, rigid.ErrNotFinite}
			if s != was || !slices.Contains(known, err) {
				t.Fatalf("%v, and dst is %+v", err, s)
			}
			return
		}
		var st slidercrank.State
		if err := l.Solve(&st, turn); err != nil || st.Margin < rigid.LeastMargin {
			t.Fatalf("an answer where Solve has margin %v and %v", st.Margin, err)
		}
		for _, by := range []slidercrank.LengthSensitivity{s.Crank, s.Rod, s.Offset} {
			for _, v := range outputs(by.Slide, by.Point) {
				if v*0 != 0 {
					t.Fatalf("%+v", s)
				}
			}
		}
	})
}
