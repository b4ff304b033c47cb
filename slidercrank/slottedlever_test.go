package slidercrank_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// joined reports two points of a joint that are apart by more than 1e-14 of size, in
// place, or by a rounding of theirs in velocity and acceleration.
func joined(t *testing.T, joint string, a, b rigid.Point, size float64) {
	t.Helper()
	for _, x := range []struct {
		what string
		a, b r2.Vec
		tol  float64
	}{
		{"place", a.Pos, b.Pos, 1e-14 * size},
		{"velocity", a.Vel, b.Vel, 1e-12 * (size + r2.Norm(a.Vel))},
		{"acceleration", a.Acc, b.Acc, 1e-11 * (size + r2.Norm(a.Acc))},
	} {
		if !(r2.Norm(r2.Sub(x.a, x.b)) <= x.tol) {
			t.Errorf("%s, %s: %v and %v", joint, x.what, x.a, x.b)
		}
	}
}

func TestSlottedLeverCloses(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 21))
	for range rounds() {
		size := math.Pow(10, 9*rng.Float64()-6)
		d := slidercrank.LeverDimensions{Crank: size * rng.Float64(), Centre: size * rng.Float64()}
		d.Slot = 0.9 * (2*rng.Float64() - 1) * math.Abs(d.Crank-d.Centre)
		l := newLever(t, d)
		var st slidercrank.LeverState
		turn := rigid.Coordinate{Pos: 100*rng.Float64() - 50, Vel: 2*rng.Float64() - 1, Acc: 2*rng.Float64() - 1}
		if err := l.Solve(&st, turn); err != nil {
			t.Fatal(err)
		}
		scale := max(d.Crank, d.Centre) / math.Min(1, st.Margin*st.Margin)
		pin := st.Crank.At(r2.Vec{X: d.Crank})
		joined(t, "pin and block", pin, st.Block.At(r2.Vec{}), scale)
		joined(t, "pin in the slot", pin, st.Lever.Carry(rigid.Point{
			Pos: r2.Vec{X: st.Slide.Pos, Y: d.Slot}, Vel: r2.Vec{X: st.Slide.Vel}, Acc: r2.Vec{X: st.Slide.Acc},
		}), scale)
		joined(t, "crank pivot", st.Crank.At(r2.Vec{}), rigid.Point{}, scale)
		joined(t, "lever pivot", st.Lever.At(r2.Vec{}), rigid.Point{Pos: r2.Vec{X: -d.Centre}}, scale)
		if st.Block.Omega != st.Lever.Omega || st.Block.Alpha != st.Lever.Alpha || st.Block.Pose.Axis != st.Lever.Pose.Axis {
			t.Error("the block turns in the slot")
		}
		if t.Failed() {
			t.Fatalf("%+v at %+v", d, turn)
		}
	}
}

// The swing goes on over any number of turns, and grows by a whole turn with each
// where the lever turns.
func TestSlottedLeverSwingIsContinuous(t *testing.T) {
	for _, row := range []struct {
		name   string
		d      slidercrank.LeverDimensions
		growth float64
	}{
		{"swinging", slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.25}, 0},
		{"swinging, offset", slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.25, Slot: -0.14}, 0},
		{"turning", slidercrank.LeverDimensions{Crank: 0.25, Centre: 0.1}, rigid.Revolution},
		{"turning, offset", slidercrank.LeverDimensions{Crank: 0.25, Centre: 0.1, Slot: 0.14}, rigid.Revolution},
		{"hardly turning", slidercrank.LeverDimensions{Crank: 0.2525, Centre: 0.25}, rigid.Revolution},
	} {
		l := newLever(t, row.d)
		const steps = 20000
		last, err := l.Coefficients(-20)
		if err != nil {
			t.Fatal(err)
		}
		for k := 1; k <= steps; k++ {
			c, err := l.Coefficients(-20 + 40*float64(k)/steps)
			if err != nil {
				t.Fatal(err)
			}
			if math.Abs(c.Out-last.Out) > 0.01*max(1, math.Abs(c.First), math.Abs(last.First)) {
				t.Fatalf("%s: swing %v at %v, %v before", row.name, c.Out, c.In, last.Out)
			}
			last = c
		}
		for _, at := range []float64{-3, 0.5, 3} {
			a, err1 := l.Coefficients(at)
			b, err2 := l.Coefficients(at + 1000*rigid.Revolution)
			if err1 != nil || err2 != nil || math.Abs(b.Out-a.Out-1000*row.growth) > 1e-11 {
				t.Errorf("%s: swing %v, a thousand turns on %v; %v %v", row.name, a.Out, b.Out, err1, err2)
			}
		}
	}
}

func TestSlottedLeverDimensions(t *testing.T) {
	ok := slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.25, Slot: 0.02}
	for _, row := range []struct {
		name  string
		set   func(*slidercrank.LeverDimensions)
		field string
		cause error
	}{
		{"no crank", func(d *slidercrank.LeverDimensions) { d.Crank = 0 }, "Crank", rigid.ErrNotPositive},
		{"negative centre", func(d *slidercrank.LeverDimensions) { d.Centre = -1 }, "Centre", rigid.ErrNotPositive},
		{"crank not a number", func(d *slidercrank.LeverDimensions) { d.Crank = math.NaN() }, "Crank", rigid.ErrNotFinite},
		{"infinite slot", func(d *slidercrank.LeverDimensions) { d.Slot = math.Inf(1) }, "Slot", rigid.ErrNotFinite},
		{"crank too small to count", func(d *slidercrank.LeverDimensions) { d.Crank = 1e-61 }, "Crank", rigid.ErrInput},
		{"mount not a number", func(d *slidercrank.LeverDimensions) { d.Mount.Angle = math.NaN() }, "Mount.Angle", rigid.ErrNotFinite},
		{"crank as long as the centre distance", func(d *slidercrank.LeverDimensions) { d.Crank, d.Slot = 0.25, 0 }, "", rigid.ErrChangePoint},
		{"the same within rounding", func(d *slidercrank.LeverDimensions) { d.Crank, d.Centre, d.Slot = 0.1+0.2, 0.3, 0 }, "", rigid.ErrChangePoint},
		{"the same within a few more roundings", func(d *slidercrank.LeverDimensions) { d.Crank, d.Centre, d.Slot = 0.3, 0.3*(1-9e-15), 0 }, "", rigid.ErrChangePoint},
		{"slot as far within rounding as the pin comes near", func(d *slidercrank.LeverDimensions) { d.Slot = 0.15 * (1 + 1e-14) }, "", rigid.ErrChangePoint},
		{"slot as far as the pin comes near", func(d *slidercrank.LeverDimensions) { d.Slot = -0.15 }, "", rigid.ErrChangePoint},
		{"slot beyond the pin's reach", func(d *slidercrank.LeverDimensions) { d.Slot = 0.36 }, "", rigid.ErrUnreachable},
		{"slot at the end of the pin's reach", func(d *slidercrank.LeverDimensions) { d.Slot = -0.35 }, "", rigid.ErrUnreachable},
	} {
		d := ok
		row.set(&d)
		l, err := slidercrank.NewSlottedLever(d)
		bad, found := errors.AsType[*rigid.DimensionError](err)
		if l != nil || !found || bad.Name != row.field || !errors.Is(err, row.cause) {
			t.Errorf("%s: %v, %v", row.name, l, err)
		}
	}
	both := slidercrank.LeverDimensions{Crank: -1, Centre: math.Inf(1)}
	if _, err := slidercrank.NewSlottedLever(both); !errors.Is(err, rigid.ErrNotPositive) || !errors.Is(err, rigid.ErrNotFinite) {
		t.Errorf("two faults: %v", err)
	}
	if l := newLever(t, ok); l.Dimensions() != ok {
		t.Errorf("Dimensions() = %+v", l.Dimensions())
	}
	// A crank as long as the centre distance is fine with a slot that keeps the pin
	// off the lever pivot: it rocks.
	rocking := newLever(t, slidercrank.LeverDimensions{Crank: 0.25, Centre: 0.25, Slot: 0.1})
	over := rocking.Range()
	end := math.Acos(0.5*0.1*0.1/0.25/0.25 - 1)
	if len(over) != 1 || math.Abs(over[0].Hi-end) > 1e-15*10 || over[0].Lo != -over[0].Hi {
		t.Errorf("range %v, want ±%v", over, end)
	}
}

func TestSlottedLeverRefuses(t *testing.T) {
	swinging := newLever(t, slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.25})
	turning := newLever(t, slidercrank.LeverDimensions{Crank: 0.25, Centre: 0.1})
	rocking := newLever(t, slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.25, Slot: 0.2})
	narrow := newLever(t, slidercrank.LeverDimensions{Crank: 0.1, Centre: 0.1 * (1 + 1e-10)})
	near, nearLarge := newLever(t, slidercrank.LeverDimensions{Crank: 1, Centre: 1 + 1e-6}), newLever(t, slidercrank.LeverDimensions{Crank: 1e5, Centre: 1e5 + 10})
	large := newLever(t, slidercrank.LeverDimensions{Crank: 1e10, Centre: 3e10})
	end, top := rocking.Range()[0].Hi, math.Asin(0.4)
	nan, inf := math.NaN(), math.Inf(1)
	turn := func(l *slidercrank.SlottedLever, pos, vel, acc float64) func(*slidercrank.LeverState) error {
		return func(st *slidercrank.LeverState) error {
			return l.Solve(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc})
		}
	}
	swing := func(l *slidercrank.SlottedLever, pos, vel, acc float64, knee rigid.Side) func(*slidercrank.LeverState) error {
		return func(st *slidercrank.LeverState) error {
			return l.SolveSwing(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, knee)
		}
	}
	for _, row := range []struct {
		name string
		run  func(*slidercrank.LeverState) error
		want error
	}{
		{"turn not a number", turn(swinging, nan, 1, 1), rigid.ErrNotFinite},
		{"speed infinite", turn(swinging, 1, inf, 1), rigid.ErrNotFinite},
		{"acceleration not a number", turn(swinging, 1, 1, nan), rigid.ErrNotFinite},
		{"acceleration would overflow", turn(swinging, 1, 1e200, 0), rigid.ErrNotFinite},
		{"that of the lever alone", turn(near, math.Pi-1e-6, 1e150, 0), rigid.ErrNotFinite},
		{"that of the block in its slot alone", turn(nearLarge, math.Pi, 1e151, 0), rigid.ErrNotFinite},
		{"that of the pin alone", turn(large, 0, 0, 1e300), rigid.ErrNotFinite},
		{"beyond the range", turn(rocking, end+1e-9, 0, 0), rigid.ErrUnreachable},
		{"rates at the end of the range", turn(rocking, end, 1, 0), rigid.ErrSingular},
		{"acceleration at the end of the range", turn(rocking, -end, 0, 1), rigid.ErrSingular},
		{"place at the end of the range", turn(rocking, end, 0, 0), nil},
		{"pin next to the lever pivot", turn(narrow, math.Pi, 1, 0), rigid.ErrSingular},
		{"pin next to the lever pivot, at rest", turn(narrow, math.Pi, 0, 0), nil},
		{"zero lever", turn(new(slidercrank.SlottedLever), 1, 1, 1), rigid.ErrInput},
		{"swing not a number", swing(swinging, nan, 0, 0, rigid.Left), rigid.ErrNotFinite},
		{"swing beyond the lever's", swing(swinging, top+1e-9, 0, 0, rigid.Left), rigid.ErrUnreachable},
		{"lever drives at its dead centre", swing(swinging, top, 1, 0, rigid.Right), rigid.ErrSingular},
		{"lever at its dead centre", swing(swinging, top, 0, 0, rigid.Right), nil},
		{"lever points away", swing(swinging, math.Pi, 0, 0, rigid.Left), rigid.ErrUnreachable},
		{"lever points away square to the crank", swing(swinging, math.Pi-top, 0, 0, rigid.Right), rigid.ErrUnreachable},
		{"turning lever on its left", swing(turning, 1, 1, 0, rigid.Left), rigid.ErrUnreachable},
		{"turning lever on its right", swing(turning, 1, 1, 0, rigid.Right), nil},
		{"unknown knee", swing(swinging, 0, 0, 0, 2), rigid.ErrInput},
		{"zero lever by its swing", swing(new(slidercrank.SlottedLever), 0, 0, 0, rigid.Left), rigid.ErrInput},
		{"swing acceleration would overflow", swing(swinging, 0.1, 1e200, 0, rigid.Right), rigid.ErrNotFinite},
	} {
		st := outcome(t, row.name, slidercrank.LeverState{Margin: 7, Slot: 3}, row.run, row.want)
		if row.want == nil && !(st.Crank.Pose.Axis.X*0 == 0 && st.Lever.Pose.Axis.X*0 == 0 && st.Slide.Pos*0 == 0 && st.Slide.Pos >= 0) {
			t.Errorf("%s: %+v", row.name, st)
		}
	}
}

func TestZeroSlottedLever(t *testing.T) {
	var l slidercrank.SlottedLever
	if _, err := l.Coefficients(0); err != rigid.ErrInput {
		t.Errorf("Coefficients: %v", err)
	}
	if l.Range() != nil || l.DeadCentres() != nil {
		t.Error("a range or dead centres of no mechanism")
	}
	if _, err := l.TimeRatio(); err != rigid.ErrInput {
		t.Errorf("TimeRatio: %v", err)
	}
}

func TestSlottedLeverMargin(t *testing.T) {
	l := newLever(t, slidercrank.LeverDimensions{Crank: 0.2, Centre: 0.25})
	var st slidercrank.LeverState
	for _, row := range []struct{ turn, want float64 }{{0, 1}, {math.Pi, 0.25}, {math.Acos(-0.85), math.Sqrt(0.2*0.2+0.25*0.25-2*0.2*0.25*0.85) / 0.2}} {
		if err := l.Solve(&st, rigid.Coordinate{Pos: row.turn, Vel: 1}); err != nil || math.Abs(st.Margin-row.want) > 1e-14 {
			t.Errorf("turn %v: margin %v, want %v; %v", row.turn, st.Margin, row.want, err)
		}
	}
	if err := l.SolveSwing(&st, rigid.Coordinate{Pos: math.Asin(0.5)}, rigid.Left); err != nil || math.Abs(st.Margin-math.Sqrt(1-0.625*0.625)) > 1e-14 {
		t.Errorf("margin by the swing %v; %v", st.Margin, err)
	}
}

// TestSlottedLeverNearlyChanging: with the pin passing the lever pivot at a distance
// d of few 1e-8 cranks the lever turns at −r/d times the crank's speed, and no longer
// where that is below LeastMargin.
func TestSlottedLeverNearlyChanging(t *testing.T) {
	for _, d := range []float64{-3e-8, -1.5e-8, -1.01e-8, -0.99e-8, 0.99e-8, 1.01e-8, 1.5e-8, 3e-8} {
		l := newLever(t, slidercrank.LeverDimensions{Crank: 1, Centre: 1 + d})
		gap := l.Dimensions().Centre - 1 // exact
		var st slidercrank.LeverState
		err := l.Solve(&st, rigid.Coordinate{Pos: math.Pi, Vel: 2})
		if math.Abs(gap) < rigid.LeastMargin {
			if err != rigid.ErrSingular || st != (slidercrank.LeverState{}) {
				t.Errorf("gap %v: %v", gap, err)
			}
			continue
		}
		if want := -2 / gap; err != nil || math.Abs(st.Swing.Vel/want-1) > 1e-7 || st.Lever.Omega != st.Swing.Vel {
			t.Errorf("gap %v: the lever turns at %v, want %v; %v", gap, st.Swing.Vel, want, err)
		}
		if math.Abs(st.Margin/math.Abs(gap)-1) > 1e-7 {
			t.Errorf("gap %v: margin %v", gap, st.Margin)
		}
	}
}

// A drive at rest leaves links at rest, whose rates print as 0 and not as −0, on the way
// back as well.
func TestInversionsAtRest(t *testing.T) {
	each(t, 22, func(t *testing.T, make maker, _ machine, turn rigid.Coordinate) {
		for _, mount := range []rigid.Placement{{}, {Angle: 2.5}} {
			m := make(t, 1, false, mount)
			rest, err1 := m.solve(rigid.Coordinate{Pos: turn.Pos})
			back, err2 := m.back(rigid.Coordinate{Pos: turn.Pos})
			if err1 != nil || err2 != nil {
				t.Fatal(err1, err2)
			}
			for _, s := range append(back, rest) {
				for k, rate := range append(numbers(s, 1), numbers(s, 2)...) {
					if rate != 0 || math.Signbit(rate) {
						t.Errorf("mounted %+v: rate %d is %v", mount, k, rate)
					}
				}
			}
		}
	})
}
