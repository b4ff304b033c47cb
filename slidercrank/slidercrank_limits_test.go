package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// randomPress returns the dimensions of a slider-crank of any kind: a crank that
// turns fully or rocks in one or two ranges, in line or offset, either branch.
func randomPress(rng *rand.Rand) slidercrank.Dimensions {
	for {
		d := slidercrank.Dimensions{Crank: 0.05 + rng.Float64(), Rod: 0.05 + rng.Float64(), Branch: slidercrank.Branch(rng.IntN(2))}
		if rng.IntN(4) > 0 {
			d.Offset = (d.Crank + d.Rod) * 0.99 * (2*rng.Float64() - 1) * rng.Float64()
		}
		gap := math.Abs(d.Crank - d.Rod)
		if math.Abs(gap-math.Abs(d.Offset)) > 1e-3 {
			return d
		}
	}
}

// nan is a State that no solve can leave as it is.
func nan() slidercrank.State {
	x := math.NaN()
	c, v := rigid.Coordinate{Pos: x, Vel: x, Acc: x}, rigid.Motion{Pose: rigid.NewPose(x, x, x), Omega: x, Alpha: x}
	v.Vel, v.Acc = v.Pose.Origin, v.Pose.Origin
	return slidercrank.State{Crank: v, Rod: v, Slider: v, Turn: c, Slide: c, Branch: 9, Knee: 9, Margin: x}
}

func TestSuccessWritesEveryField(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: 0.02, Mount: rigid.Placement{X: 1, Y: 2, Angle: 3}})
	for _, vel := range []float64{0, 2} {
		var want slidercrank.State
		got := nan()
		in := rigid.Coordinate{Pos: 1, Vel: vel}
		if err1, err2 := l.Solve(&want, in), l.Solve(&got, in); err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		if diff := cmp.Diff(want, got); diff != "" {
			t.Errorf("Solve left something (-clean +reused):\n%s", diff)
		}
		slide := want.Slide
		want, got = slidercrank.State{}, nan()
		if err1, err2 := l.SolveSlide(&want, slide, rigid.Right), l.SolveSlide(&got, slide, rigid.Right); err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		if diff := cmp.Diff(want, got); diff != "" {
			t.Errorf("SolveSlide left something (-clean +reused):\n%s", diff)
		}
	}
}

func TestRefusals(t *testing.T) {
	inf, bad := math.Inf(1), math.NaN()
	full := slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: 0.02}
	rocks := slidercrank.Dimensions{Crank: 0.3, Rod: 0.2, Offset: 0.15} // sin φ ≥ (0.15 − 0.2)/0.3
	same := slidercrank.Dimensions{Crank: 0.2, Rod: 0.2}
	type in = rigid.Coordinate
	for _, row := range []struct {
		name  string
		d     slidercrank.Dimensions
		turn  *in
		slide in
		knee  rigid.Side
		want  error
	}{
		{name: "turn not a number", d: full, turn: &in{Pos: bad}, want: rigid.ErrNotFinite},
		{name: "turn infinite", d: full, turn: &in{Pos: -inf}, want: rigid.ErrNotFinite},
		{name: "speed not a number", d: full, turn: &in{Vel: bad}, want: rigid.ErrNotFinite},
		{name: "acceleration infinite", d: full, turn: &in{Acc: inf}, want: rigid.ErrNotFinite},
		{name: "speed too great", d: full, turn: &in{Pos: 1, Vel: 1e200}, want: rigid.ErrNotFinite},
		{name: "acceleration too great", d: slidercrank.Dimensions{Crank: 1e10, Rod: 3e10}, turn: &in{Pos: 1, Acc: 1e300}, want: rigid.ErrNotFinite},
		{name: "acceleration of the crank pin too great", d: slidercrank.Dimensions{Crank: 1e10, Rod: 3e10}, turn: &in{Acc: 1e300}, want: rigid.ErrNotFinite},
		{name: "turn below range", d: rocks, turn: &in{Pos: math.Asin(-0.05/0.3) - 1e-9}, want: rigid.ErrUnreachable},
		{name: "turn out of range with rates", d: rocks, turn: &in{Pos: -1, Vel: 1}, want: rigid.ErrUnreachable},
		{name: "rates at a change point", d: same, turn: &in{Pos: math.Pi / 2, Vel: 1}, want: rigid.ErrSingular},

		{name: "slide not a number", d: full, slide: in{Pos: bad}, want: rigid.ErrNotFinite},
		{name: "slide infinite", d: full, slide: in{Pos: inf}, want: rigid.ErrNotFinite},
		{name: "slide speed infinite", d: full, slide: in{Pos: 0.3, Vel: inf}, want: rigid.ErrNotFinite},
		{name: "slide acceleration not a number", d: full, slide: in{Pos: 0.3, Acc: bad}, want: rigid.ErrNotFinite},
		{name: "slide speed too great", d: full, slide: in{Pos: 0.3, Vel: 1e200}, want: rigid.ErrNotFinite},
		{name: "no such knee", d: full, slide: in{Pos: 0.3}, knee: 2, want: rigid.ErrInput},
		{name: "negative knee", d: full, slide: in{Pos: 0.3}, knee: -1, want: rigid.ErrInput},
		{name: "slide too far", d: full, slide: in{Pos: 0.4}, want: rigid.ErrUnreachable},
		{name: "slide too near", d: full, slide: in{Pos: 0.198}, want: rigid.ErrUnreachable},
		{name: "slide at zero", d: full, want: rigid.ErrUnreachable},
		{name: "the other assembly", d: full, slide: in{Pos: -0.3}, want: rigid.ErrUnreachable},
		{name: "rates where the pin is in the crank pivot", d: same, slide: in{Vel: 1}, want: rigid.ErrSingular},
		{name: "slide beyond a rocking crank", d: rocks, slide: in{Pos: -0.48}, want: rigid.ErrUnreachable},
	} {
		l := newPress(t, row.d)
		was := slidercrank.State{Margin: 7, Knee: rigid.Right, Turn: rigid.Coordinate{Pos: 5}}
		got := was
		var err error
		if row.turn != nil {
			err = l.Solve(&got, *row.turn)
		} else {
			err = l.SolveSlide(&got, row.slide, row.knee)
		}
		if err != row.want {
			t.Errorf("%s: error %v, want %v", row.name, err, row.want)
		}
		if got != was {
			t.Errorf("%s: the state was touched: %+v", row.name, got)
		}
	}
}

func TestZeroLinkage(t *testing.T) {
	var l slidercrank.Linkage
	var st slidercrank.State
	_, cerr := l.Coefficients(1)
	_, _, derr := l.DeadCentres()
	_, serr := l.Stroke()
	_, terr := l.TimeRatio()
	for i, err := range []error{
		l.Solve(&st, rigid.Coordinate{}), l.Solve(&st, rigid.Coordinate{Vel: 1}),
		l.SolveSlide(&st, rigid.Coordinate{}, rigid.Left), cerr, derr, serr, terr,
	} {
		if err != rigid.ErrInput {
			t.Errorf("call %d: %v", i, err)
		}
	}
	least, greatest := l.PressureAngles()
	if st != (slidercrank.State{}) || l.Range() != nil || !math.IsNaN(least) || !math.IsNaN(greatest) || l.Dimensions() != (slidercrank.Dimensions{}) {
		t.Error("a zero Linkage gives something")
	}
}

// TestLimitSlack: a position counts as the limit up to 1e-14 of the largest length
// beyond it, not further.
func TestLimitSlack(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 1, Rod: 0.5})
	end := math.Asin(0.5)
	var st slidercrank.State
	per := math.Cos(end) // m of the pin's height for each rad
	if err := l.Solve(&st, rigid.Coordinate{Pos: end + 0.9e-14/per}); err != nil || st.Margin != 0 {
		t.Errorf("0.9e-14 beyond: %v, margin %v", err, st.Margin)
	}
	if err := l.Solve(&st, rigid.Coordinate{Pos: end + 1.2e-14/per}); err != rigid.ErrUnreachable {
		t.Errorf("1.2e-14 beyond: %v", err)
	}
	for _, knee := range []rigid.Side{rigid.Left, rigid.Right} {
		for _, sign := range []float64{-1, 1} {
			for _, row := range []struct {
				pos  float64
				want error
			}{
				{1.5 + 0.9e-14, nil}, {1.5 + 1.2e-14, rigid.ErrUnreachable},
				{0.5 - 0.9e-14, nil}, {0.5 - 1.2e-14, rigid.ErrUnreachable},
			} {
				if err := l.SolveSlide(&st, rigid.Coordinate{Pos: sign * row.pos}, knee); err != row.want {
					t.Errorf("slide %v: %v", sign*row.pos, err)
				} else if err == nil && st.Margin != 0 {
					t.Errorf("slide %v: margin %v", sign*row.pos, st.Margin)
				}
			}
		}
	}
}

// TestTurnsAtTheEdge: a turn of half a revolution is π, not −π, however little the pin
// lies below the guide's direction; and a slide beyond an inner dead centre next to
// the crank pivot, by rounding, is there and not at the other branch's.
func TestTurnsAtTheEdge(t *testing.T) {
	for _, row := range []struct {
		name  string
		d     slidercrank.Dimensions
		slide float64
		want  float64
		knee  rigid.Side
	}{
		{"stretched back", slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Branch: slidercrank.Behind}, -(0.1 + 0.3), math.Pi, rigid.Left},
		{"stretched back, a hair down", slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: -1e-20, Branch: slidercrank.Behind}, -(0.1 + 0.3), math.Pi, rigid.Left},
		{"folded", slidercrank.Dimensions{Crank: 1, Rod: 1 + 6e-15}, 6e-15, math.Pi, rigid.Left},
		{"folded, before the pivot", slidercrank.Dimensions{Crank: 1, Rod: 1 + 6e-15}, 0, math.Pi, rigid.Left},
		{"folded, past the pivot", slidercrank.Dimensions{Crank: 1, Rod: 1 + 6e-15}, -1e-15, math.Pi, rigid.Left},
		{"folded, past the pivot, behind", slidercrank.Dimensions{Crank: 1, Rod: 1 + 6e-15, Branch: slidercrank.Behind}, 1e-15, 0, rigid.Left},
		{"pin in the pivot, left", slidercrank.Dimensions{Crank: 0.2, Rod: 0.2}, 0, math.Pi / 2, rigid.Left},
		{"pin in the pivot, right", slidercrank.Dimensions{Crank: 0.2, Rod: 0.2}, 0, -math.Pi / 2, rigid.Right},
	} {
		var st slidercrank.State
		l := newPress(t, row.d)
		if outer, inner, err := l.DeadCentres(); err != nil || outer.Turn <= -math.Pi || inner.Turn <= -math.Pi {
			t.Errorf("%s: dead centres %+v and %+v, %v", row.name, outer, inner, err)
		}
		if err := l.SolveSlide(&st, rigid.Coordinate{Pos: row.slide}, row.knee); err != nil || st.Turn.Pos != row.want || st.Branch != row.d.Branch {
			t.Errorf("%s: turn %v, branch %v, %v", row.name, st.Turn.Pos, st.Branch, err)
		}
	}
}

// TestReturnedPositionsAreSingular: where the library says that a drive ends, rates
// are refused and the place is given.
func TestReturnedPositionsAreSingular(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	var st slidercrank.State
	for range 2000 {
		d := randomPress(rng)
		d.Mount = rigid.Placement{X: rng.Float64(), Angle: 7 * rng.Float64()}
		l := newPress(t, d)
		for _, over := range l.Range() {
			if over.Hi-over.Lo >= rigid.Revolution {
				continue
			}
			for _, end := range []float64{over.Lo, over.Hi} {
				err0, err1, err2 := l.Solve(&st, rigid.Coordinate{Pos: end}), l.Solve(&st, rigid.Coordinate{Pos: end, Vel: 1}), l.Solve(&st, rigid.Coordinate{Pos: end, Acc: 1})
				if err0 != nil || err1 != rigid.ErrSingular || err2 != rigid.ErrSingular {
					t.Fatalf("%+v at the end %v: place %v, speed %v, acceleration %v", d, end, err0, err1, err2)
				}
			}
		}
		outer, inner, err := l.DeadCentres()
		centres := []slidercrank.DeadCentre{outer, inner}
		if err != nil {
			centres = centres[:1]
		}
		for _, c := range centres {
			err0, err1, err2 := l.SolveSlide(&st, rigid.Coordinate{Pos: c.Slide}, rigid.Left), l.SolveSlide(&st, rigid.Coordinate{Pos: c.Slide, Vel: 1}, rigid.Left), l.SolveSlide(&st, rigid.Coordinate{Pos: c.Slide, Acc: 1}, rigid.Right)
			if err0 != nil || err1 != rigid.ErrSingular || err2 != rigid.ErrSingular {
				t.Fatalf("%+v at the dead centre %+v: place %v, speed %v, acceleration %v", d, c, err0, err1, err2)
			}
			if math.Abs(math.Remainder(st.Turn.Pos-c.Turn, 2*math.Pi)) > 1e-14 {
				t.Fatalf("%+v at the dead centre %+v: turn %v", d, c, st.Turn.Pos)
			}
		}
	}
}

// TestPressOverflows: of what is answered, the rod's and the slider's accelerations and
// the crank pin's are each seen to overflow, where the others do not.
func TestPressOverflows(t *testing.T) {
	near := func(size float64) slidercrank.Dimensions { // next to where the rod is square to the guide
		return slidercrank.Dimensions{Crank: size * (1 - 1e-10), Rod: size}
	}
	for _, row := range []struct {
		name string
		d    slidercrank.Dimensions
		turn rigid.Coordinate
	}{
		{"rod", near(1e-3), rigid.Coordinate{Pos: math.Pi / 2, Vel: 1e152}},
		{"slider", near(1e3), rigid.Coordinate{Pos: math.Pi / 2, Vel: 1e151}},
		{"pin", slidercrank.Dimensions{Crank: 1e10, Rod: 3e10}, rigid.Coordinate{Acc: 1e300}},
	} {
		l := newPress(t, row.d)
		outcome(t, row.name, slidercrank.State{Margin: 7}, func(st *slidercrank.State) error { return l.Solve(st, row.turn) }, rigid.ErrNotFinite)
	}
}
