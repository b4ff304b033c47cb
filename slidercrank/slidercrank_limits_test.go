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

func TestRangeByHand(t *testing.T) {
	pi, whole := math.Pi, []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	type d = slidercrank.Dimensions
	a := math.Asin
	for _, row := range []struct {
		name string
		d    d
		want []rigid.Interval
	}{
		{"in line", d{Crank: 1, Rod: 3}, whole},
		{"offset", d{Crank: 1, Rod: 3, Offset: -1.9}, whole},
		{"change point, in line", d{Crank: 1, Rod: 1}, whole},
		{"change point, offset", d{Crank: 0.1, Rod: 0.3, Offset: 0.2}, whole},
		{"change point, offset down", d{Crank: 0.1, Rod: 0.3, Offset: -0.2, Branch: slidercrank.Behind}, whole},
		{"offset up", d{Crank: 1, Rod: 3, Offset: 2.5}, []rigid.Interval{{Lo: a(-0.5), Hi: pi - a(-0.5)}}},
		{"offset down", d{Crank: 1, Rod: 3, Offset: -2.5}, []rigid.Interval{{Lo: pi - a(0.5), Hi: 2*pi + a(0.5)}}},
		{"offset beyond the crank", d{Crank: 1, Rod: 3, Offset: 3.5}, []rigid.Interval{{Lo: a(0.5), Hi: pi - a(0.5)}}},
		{"offset beyond the crank, down", d{Crank: 1, Rod: 3, Offset: -3.5}, []rigid.Interval{{Lo: -pi + a(0.5), Hi: -a(0.5)}}},
		{"short rod, in line", d{Crank: 2, Rod: 1}, []rigid.Interval{{Lo: -a(0.5), Hi: a(0.5)}, {Lo: pi - a(0.5), Hi: pi + a(0.5)}}},
		{"short rod above", d{Crank: 4, Rod: 1, Offset: 2}, []rigid.Interval{{Lo: a(0.25), Hi: a(0.75)}, {Lo: pi - a(0.75), Hi: pi - a(0.25)}}},
		{"short rod below", d{Crank: 4, Rod: 1, Offset: -2}, []rigid.Interval{{Lo: -pi + a(0.25), Hi: -pi + a(0.75)}, {Lo: -a(0.75), Hi: -a(0.25)}}},
		{"short rod, change point above", d{Crank: 2, Rod: 1, Offset: 1}, []rigid.Interval{{Lo: 0, Hi: pi}}},
		{"short rod, change point below", d{Crank: 2, Rod: 1, Offset: -1}, []rigid.Interval{{Lo: -pi, Hi: 0}}},
	} {
		got := newPress(t, row.d).Range()
		if len(got) != len(row.want) {
			t.Errorf("%s: %v, want %v", row.name, got, row.want)
			continue
		}
		for i, w := range row.want {
			if !(math.Abs(got[i].Lo-w.Lo) <= 1e-15*8 && math.Abs(got[i].Hi-w.Hi) <= 1e-15*8 && got[i].Lo >= -pi && got[i].Lo < pi) {
				t.Errorf("%s: %v, want %v", row.name, got, row.want)
			}
		}
	}
}

// TestRangeByReach holds Range against the reach of the rod at random angles.
func TestRangeByReach(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 1))
	for range 2000 {
		d := randomPress(rng)
		l := newPress(t, d)
		over := l.Range()
		if len(over) == 2 && over[0].Hi >= over[1].Lo {
			t.Fatalf("%+v: overlapping ranges %v", d, over)
		}
		for range 20 {
			turn := 20*rng.Float64() - 10
			eta := math.Abs(d.Offset - d.Crank*math.Sin(turn))
			if math.Abs(eta-d.Rod) < 1e-9 {
				continue
			}
			in := false
			for _, o := range over {
				_, ok := o.Angle(turn)
				in = in || ok
			}
			var st slidercrank.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); in != (eta < d.Rod) || in != (err == nil) {
				t.Fatalf("%+v at %v: in range %v, reached %v, error %v", d, turn, in, eta < d.Rod, err)
			}
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

// TestPressureAngles holds the closed forms against a sweep.
func TestPressureAngles(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 2))
	for range 300 {
		l := newPress(t, randomPress(rng))
		least, greatest := l.PressureAngles()
		lo, hi := math.Inf(1), 0.0
		const steps = 2000
		for _, over := range l.Range() {
			for k := range steps + 1 {
				st := solved(t, l, rigid.Coordinate{Pos: over.Lo + (over.Hi-over.Lo)*float64(k)/steps})
				p := st.PressureAngle()
				if math.Abs(math.Cos(p)-st.Margin) > 1e-15 {
					t.Fatalf("pressure angle %v, margin %v", p, st.Margin)
				}
				lo, hi = min(lo, p), max(hi, p)
			}
		}
		if lo < least-1e-12 || lo > least+0.05 || hi > greatest+1e-12 || hi < greatest-0.05 {
			t.Errorf("%+v: swept %v to %v, closed form %v to %v", l.Dimensions(), lo, hi, least, greatest)
		}
	}
}
