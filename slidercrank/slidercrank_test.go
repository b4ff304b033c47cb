package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// TestClosure: in the mechanism's own axes crank and rod keep their lengths and the
// slider pin its guide within 1e-14 of the largest length, at any size, at the limits
// too, whichever link drives.
func TestClosure(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 1))
	var st, back slidercrank.State
	for range 4000 {
		d, scale := randomPress(rng), math.Exp(60*rng.Float64()-30)
		d.Crank, d.Rod, d.Offset = scale*d.Crank, scale*d.Rod, scale*d.Offset
		l := newPress(t, d)
		over := l.Range()[0]
		pos := over.Lo + (over.Hi-over.Lo)*min(max(1.2*rng.Float64()-0.1, 0), 1)
		if err := l.Solve(&st, rigid.Coordinate{Pos: pos}); err != nil {
			t.Fatalf("%+v at %v: %v", d, pos, err)
		}
		closes(t, d, &st)
		if side := slidercrank.Branch(0); st.Rod.Pose.Axis.X < 0 {
			side = slidercrank.Behind
			if st.Branch != side && st.Margin > 1e-7 {
				t.Fatalf("%+v at %v: branch %v", d, pos, st.Branch)
			}
		}
		if err := l.SolveSlide(&back, st.Slide, st.Knee); err != nil {
			t.Fatalf("%+v at slide %v: %v", d, st.Slide, err)
		}
		closes(t, d, &back)
		if back.Slide != st.Slide || back.Knee != st.Knee {
			t.Fatalf("%+v: slide %v knee %v, given back %v %v", d, st.Slide, st.Knee, back.Slide, back.Knee)
		}
		// The slide's rounding moves the crank by it over σ', at a dead centre by its root.
		off := math.Abs(math.Remainder(back.Turn.Pos-pos, 2*math.Pi))
		sharp := max(back.Margin, 3e-8) * min(d.Crank, d.Rod, 1e-3*(d.Crank+d.Rod)) / (d.Crank + d.Rod)
		if back.Margin > 1e-3 && off > 1e-15/sharp || off > 1e-5 {
			t.Fatalf("%+v: turn %v came back as %v, margin %v", d, pos, back.Turn.Pos, back.Margin)
		}
	}
}

// closes checks the loop of a State without Mount.
func closes(t *testing.T, d slidercrank.Dimensions, st *slidercrank.State) {
	t.Helper()
	tol := 1e-14 * max(d.Crank, d.Rod, math.Abs(d.Offset))
	pin, end := st.Rod.Pose.Origin, st.Rod.At(r2.Vec{X: d.Rod}).Pos
	for _, row := range []struct {
		what string
		off  float64
	}{
		{"crank's length", r2.Norm(pin) - d.Crank},
		{"pin on the crank", r2.Norm(r2.Sub(st.Crank.At(r2.Vec{X: d.Crank}).Pos, pin))},
		{"pin at the turn", r2.Norm(r2.Sub(r2.Vec{X: d.Crank * math.Cos(st.Turn.Pos), Y: d.Crank * math.Sin(st.Turn.Pos)}, pin))},
		{"rod's end on the slider", r2.Norm(r2.Sub(end, st.Slider.Pose.Origin))},
		{"slider on the guide", st.Slider.Pose.Origin.Y - d.Offset},
		{"slider at the slide", st.Slider.Pose.Origin.X - st.Slide.Pos},
	} {
		if !(math.Abs(row.off) <= tol) {
			t.Fatalf("%+v: %s is off by %v at %+v", d, row.what, row.off/tol*1e-14, st)
		}
	}
}

// TestTermsOfTheRod: the terms of the acceleration of a point of the rod, one by one
// from how the rod turns, sum up to what the rod's Motion gives, and at the slider
// pin to the slider's acceleration.
func TestTermsOfTheRod(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 2))
	var st slidercrank.State
	for range 1000 {
		d := randomPress(rng)
		d.Mount = rigid.Placement{X: rng.Float64(), Y: rng.Float64(), Angle: 7 * rng.Float64()}
		l := newPress(t, d)
		if err := l.Solve(&st, rigid.Coordinate{Pos: 7 * rng.Float64(), Vel: 5, Acc: -3}); err != nil || st.Margin < 0.05 {
			continue
		}
		at := r2.Vec{X: d.Rod}
		terms := st.Rod.AccelerationTerms(rigid.Point{Pos: at})
		arm := r2.Sub(st.Slider.Pose.Origin, st.Rod.Pose.Origin)
		crank := r2.Sub(st.Rod.Pose.Origin, st.Crank.Pose.Origin)
		size := 1 + r2.Norm(terms.Normal) + r2.Norm(terms.Tangential) + r2.Norm(terms.Base)
		for what, off := range map[string]r2.Vec{
			"base":        r2.Sub(terms.Base, r2.Add(r2.Scale(-25, crank), r2.Scale(-3, left(crank)))),
			"normal":      r2.Sub(terms.Normal, r2.Scale(-st.Rod.Omega*st.Rod.Omega, arm)),
			"tangential":  r2.Sub(terms.Tangential, r2.Scale(st.Rod.Alpha, left(arm))),
			"sum":         r2.Sub(terms.Sum(), st.Slider.Acc),
			"slider":      r2.Sub(st.Slider.Acc, r2.Scale(st.Slide.Acc, st.Slider.Pose.Axis)),
			"speed":       r2.Sub(st.Slider.Vel, r2.Scale(st.Slide.Vel, st.Slider.Pose.Axis)),
			"velocity":    r2.Sub(st.Rod.At(at).Vel, st.Slider.Vel),
			"slider turn": {X: st.Slider.Omega, Y: st.Slider.Alpha},
		} {
			if !(r2.Norm(off) <= 1e-12*size) {
				t.Fatalf("%+v: %s is off by %v at %+v", d, what, off, st)
			}
		}
	}
}

func left(v r2.Vec) r2.Vec { return r2.Vec{X: -v.Y, Y: v.X} }

// TestRockingCrankPassesToTheOtherBranch drives a slide through the position where
// the rod stands square to the guide, and the crank at the end of its range: the
// crank turns back there, knee keeps its side and Branch changes.
func TestRockingCrankPassesToTheOtherBranch(t *testing.T) {
	d := slidercrank.Dimensions{Crank: 0.3, Rod: 0.2, Offset: 0.15}
	l := newPress(t, d)
	lo := l.Range()[0].Lo
	square := 0.3 * math.Cos(lo)
	var last, st slidercrank.State
	const steps = 2000
	for k := range steps {
		slide := rigid.Coordinate{Pos: square + 0.05 - 0.1*float64(k)/steps, Vel: -1}
		if err := l.SolveSlide(&st, slide, rigid.Right); err != nil {
			t.Fatal(err)
		}
		want := slidercrank.Ahead
		if slide.Pos < square {
			want = slidercrank.Behind
		}
		if st.Branch != want && math.Abs(slide.Pos-square) > 1e-12 {
			t.Fatalf("slide %v: branch %v", slide.Pos, st.Branch)
		}
		if st.Turn.Pos < lo-1e-15 || st.Knee != rigid.Right {
			t.Fatalf("slide %v: turn %v, limit %v, knee %v", slide.Pos, st.Turn.Pos, lo, st.Knee)
		}
		if k > 0 && math.Abs(st.Turn.Pos-last.Turn.Pos) > 1e-3 {
			t.Fatalf("slide %v: the crank jumps from %v to %v", slide.Pos, last.Turn.Pos, st.Turn.Pos)
		}
		if k > 0 && math.Abs(slide.Pos-square) > 1e-4 && (st.Turn.Vel < 0) != (want == slidercrank.Ahead) {
			t.Fatalf("slide %v: the crank turns at %v", slide.Pos, st.Turn.Vel)
		}
		d.Branch = st.Branch
		again := solved(t, newPress(t, d), rigid.Coordinate{Pos: st.Turn.Pos})
		if math.Abs(again.Slide.Pos-slide.Pos) > 1e-13/max(again.Margin, 1e-6) {
			t.Fatalf("slide %v: the crank gives back %v on branch %v", slide.Pos, again.Slide.Pos, st.Branch)
		}
		last = st
	}
}

// TestChangePoints: the crank passes where rod = crank ± offset with the rod square
// to the guide; the place is given there, rates are refused, and a hair to each side
// both are right again.
func TestChangePoints(t *testing.T) {
	for _, row := range []struct {
		name string
		d    slidercrank.Dimensions
		turn float64
		dead slidercrank.DeadCentre // inner
	}{
		{"in line", slidercrank.Dimensions{Crank: 0.2, Rod: 0.2}, math.Pi / 2, slidercrank.DeadCentre{Turn: math.Pi}},
		{"in line, behind", slidercrank.Dimensions{Crank: 0.2, Rod: 0.2, Branch: slidercrank.Behind}, -math.Pi / 2, slidercrank.DeadCentre{}},
		{"rod = crank + offset", slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: 0.2}, -math.Pi / 2, slidercrank.DeadCentre{Turn: -math.Pi / 2}},
		{"rod = crank + offset, whose sum rounds down", slidercrank.Dimensions{Crank: 0.3, Rod: 0.9, Offset: 0.6}, -math.Pi / 2, slidercrank.DeadCentre{Turn: -math.Pi / 2}},
		{"rod = crank − offset", slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: -0.2}, math.Pi / 2, slidercrank.DeadCentre{Turn: math.Pi / 2}},
		{"crank = rod + offset", slidercrank.Dimensions{Crank: 0.3, Rod: 0.1, Offset: 0.2}, math.Pi / 2, slidercrank.DeadCentre{Turn: math.Pi / 2}},
		{"crank = rod − offset", slidercrank.Dimensions{Crank: 0.3, Rod: 0.1, Offset: -0.2}, -math.Pi / 2, slidercrank.DeadCentre{Turn: -math.Pi / 2}},
	} {
		l := newPress(t, row.d)
		var st slidercrank.State
		for k := range 2 {
			turn := row.turn + 2*math.Pi*float64(k)
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
				t.Errorf("%s: place at %v: %v", row.name, turn, err)
			}
			closes(t, row.d, &st)
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); err != rigid.ErrSingular {
				t.Errorf("%s: rates at %v: %v, margin %v", row.name, turn, err, st.Margin)
			}
		}
		if err := l.SolveSlide(&st, rigid.Coordinate{}, rigid.Left); err != nil || st.Margin != 0 {
			t.Errorf("%s: place by the slide: %v, margin %v", row.name, err, st.Margin)
		}
		closes(t, row.d, &st)
		for _, off := range []float64{-1e-4, 1e-4} {
			st := solved(t, l, rigid.Coordinate{Pos: row.turn + off, Vel: 1})
			const h = 1e-6
			before, after := solved(t, l, rigid.Coordinate{Pos: row.turn + off - h}), solved(t, l, rigid.Coordinate{Pos: row.turn + off + h})
			if v := (after.Slide.Pos - before.Slide.Pos) / (2 * h); math.Abs(v-st.Slide.Vel) > 1e-6 {
				t.Errorf("%s: speed %v, difference %v", row.name, st.Slide.Vel, v)
			}
		}
		_, inner, err := l.DeadCentres()
		if err != nil || inner != row.dead {
			t.Errorf("%s: inner dead centre %+v, %v", row.name, inner, err)
		}
	}
}

// TestStrokeAndTimeRatio holds the closed forms against the dead centres.
func TestStrokeAndTimeRatio(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 3))
	for range 2000 {
		d := randomPress(rng)
		l := newPress(t, d)
		stroke, err1 := l.Stroke()
		ratio, err2 := l.TimeRatio()
		if l.Range()[0].Hi-l.Range()[0].Lo < rigid.Revolution {
			if err1 != rigid.ErrUnreachable || err2 != rigid.ErrUnreachable {
				t.Fatalf("%+v: a rocking crank has the stroke %v, %v and the time ratio %v, %v", d, stroke, err1, ratio, err2)
			}
			continue
		}
		outer, inner, err := l.DeadCentres()
		if err != nil || err1 != nil || err2 != nil {
			t.Fatal(d, err, err1, err2)
		}
		if math.Abs(math.Abs(outer.Slide-inner.Slide)-stroke) > 1e-14*stroke+1e-15 {
			t.Fatalf("%+v: stroke %v between %+v and %+v", d, stroke, outer, inner)
		}
		out := math.Mod(outer.Turn-inner.Turn+4*math.Pi, 2*math.Pi)
		if math.Abs(out/(2*math.Pi-out)-ratio) > 1e-13*ratio {
			t.Fatalf("%+v: time ratio %v between %+v and %+v", d, ratio, outer, inner)
		}
	}
}

// TestFarMount: a machine of micrometres far from the origin keeps its accuracy in
// its own axes, digit for digit.
func TestFarMount(t *testing.T) {
	d := slidercrank.Dimensions{Crank: 1e-6, Rod: 3e-6, Offset: 2e-7}
	near := newPress(t, d)
	d.Mount = rigid.Placement{X: 1e6, Y: -3e7, Angle: 2}
	far := newPress(t, d)
	for k := range 100 {
		turn := rigid.Coordinate{Pos: 0.0628 * float64(k), Vel: 3, Acc: 2}
		a, b := solved(t, near, turn), solved(t, far, turn)
		if a.Slide != b.Slide || a.Margin != b.Margin || a.Knee != b.Knee || a.Rod.Omega != b.Rod.Omega || a.Rod.Alpha != b.Rod.Alpha {
			t.Fatalf("turn %v: far %+v, near %+v", turn.Pos, b, a)
		}
		if v := r2.Norm(b.Slider.Vel); math.Abs(v-math.Abs(a.Slide.Vel)) > 1e-15*v {
			t.Fatalf("turn %v: far speed %v, near %v", turn.Pos, v, a.Slide.Vel)
		}
	}
}

// TestManyTurns: turns wound up over hours cost no accuracy but that of the angle.
func TestManyTurns(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 0.1, Rod: 0.35, Offset: -0.02})
	for _, turns := range []float64{1, 1e3, 1e6, -1e7} {
		angle := 1 + 2*math.Pi*turns
		exact := math.Remainder(angle, 2*math.Pi) + turns*2.4492935982947064e-16 // 2π less its float64
		a, b := solved(t, l, rigid.Coordinate{Pos: angle, Vel: 2}), solved(t, l, rigid.Coordinate{Pos: exact, Vel: 2})
		if math.Abs(a.Slide.Pos-b.Slide.Pos) > 1e-16*(1+math.Abs(angle)) || a.Turn.Pos != angle {
			t.Errorf("%v turns: slide %v, want %v", turns, a.Slide.Pos, b.Slide.Pos)
		}
	}
}
