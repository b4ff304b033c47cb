package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

func TestUnits(t *testing.T) {
	near(t, "degrees in a turn", rigid.Revolution/rigid.Degree, 360, 1e-15)
	near(t, "60 rpm are a turn a second", 60*rigid.RPM, 2*math.Pi, 1e-15)
	near(t, "millimetres in a metre", 1/rigid.Millimetre, 1000, 1e-15)
}

func TestWrap(t *testing.T) {
	below, above := math.Nextafter(math.Pi, 0), math.Nextafter(math.Pi, 4)
	for _, c := range []struct{ x, want float64 }{
		{0, 0}, {1, 1}, {-3, -3}, {math.Pi, math.Pi}, {-math.Pi, math.Pi}, {below, below}, {-below, -below},
		{above, above - 2*math.Pi}, {-above, 2*math.Pi - above}, {3 * math.Pi, math.Pi}, {2 * math.Pi, 0},
		{-2 * math.Pi, 0}, {5e-324, 5e-324}, {7, 7 - 2*math.Pi}, {1e300, math.Remainder(1e300, 2*math.Pi)},
	} {
		if got := rigid.Wrap(c.x); math.Abs(got-c.want) > 1e-15 {
			t.Errorf("Wrap(%.17g) = %.17g, want %.17g", c.x, got, c.want)
		}
	}
	for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if got := rigid.Wrap(x); !math.IsNaN(got) {
			t.Errorf("Wrap(%v) = %v, want NaN", x, got)
		}
	}
	rnd := newRandom(50)
	for range rounds {
		x := rnd.number() * math.Exp(40*rnd.Float64())
		w := rigid.Wrap(x)
		if w <= -math.Pi || w > math.Pi {
			t.Fatalf("Wrap(%g) = %.17g", x, w)
		}
		if rigid.Wrap(w) != w {
			t.Fatalf("Wrap(Wrap(%g)) differs", x)
		}
	}
	// a million whole turns, each of Revolution, leave the angle as it was
	turns := 1e6 * rigid.Revolution
	near(t, "after a million turns", rigid.Wrap(turns), 0, 1e-9)
}

func TestNearest(t *testing.T) {
	const turn = rigid.Revolution
	for _, c := range []struct{ angle, to, want float64 }{
		{1, 1, 1}, {1, 3, 1}, {0, math.Pi, 0}, {0, -math.Pi, 0}, {math.Pi, 0, math.Pi},
		{0, math.Nextafter(math.Pi, 4) + 1e-15, turn}, {1, 7, 1 + turn}, {-3, 3, turn - 3}, {3, -3, 3 - turn},
		{0.5, 1000 * turn, 0.5 + 1000*turn}, {0.5 + 1000*turn, 0, 0.5},
	} {
		if got := rigid.Nearest(c.angle, c.to); math.Abs(got-c.want) > 1e-12 {
			t.Errorf("Nearest(%g, %g) = %.17g, want %.17g", c.angle, c.to, got, c.want)
		}
	}
	rnd := newRandom(51)
	for range rounds {
		angle, to := 100*rnd.number(), 1e6*rnd.number()
		got := rigid.Nearest(angle, to)
		if math.Abs(got-to) > math.Pi+1e-9 {
			t.Fatalf("Nearest(%g, %g) = %g", angle, to, got)
		}
		if d := rigid.Wrap(got - angle); math.Abs(d) > 1e-9 {
			t.Fatalf("Nearest(%g, %g) = %g is off by %g", angle, to, got, d)
		}
	}
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if got := rigid.Nearest(bad, 1); got*0 == 0 {
			t.Errorf("Nearest(%v, 1) = %v", bad, got)
		}
		if got := rigid.Nearest(1, bad); got*0 == 0 {
			t.Errorf("Nearest(1, %v) = %v", bad, got)
		}
	}
}

// A wrapped encoder followed over a million steps loses no turn.
func TestNearestFollows(t *testing.T) {
	at, step, n := 0.0, 3.1, 100_000
	for i := range n {
		at = rigid.Nearest(rigid.Wrap(step*float64(i)), at)
		if math.Abs(at-step*float64(i)) > 1e-8 {
			t.Fatalf("step %d: %g, want %g", i, at, step*float64(i))
		}
	}
}

func TestIntervalAngle(t *testing.T) {
	const turn = rigid.Revolution
	inf := math.Inf(1)
	full, narrow, many := rigid.Interval{Lo: -math.Pi, Hi: math.Pi}, rigid.Interval{Lo: 0.1, Hi: 1.1}, rigid.Interval{Lo: 10, Hi: 40}
	for _, c := range []struct {
		why  string
		i    rigid.Interval
		x    float64
		want float64
		ok   bool
	}{
		{"inside", narrow, 0.5, 0.5, true},
		{"both ends", narrow, 0.1, 0.1, true},
		{"both ends", narrow, 1.1, 1.1, true},
		{"a turn on", narrow, 0.5 + turn, 0.5, true},
		{"five turns back", narrow, 0.5 - 5*turn, 0.5, true},
		{"outside", narrow, 2, 2, false},
		{"an end and some turns", narrow, 1.1 + 7*turn, 1.1, true},
		{"an end and some turns", narrow, 0.1 - 7*turn, 0.1, true},
		{"next to an end and some turns", narrow, 1.1 + 7*turn + 1e-12, 1.1 + 7*turn + 1e-12, false},
		{"inside a long one, as it is", many, 20, 20, true},
		{"the least of several", many, 0, 2 * turn, true},
		{"the least of several, from above", many, 50, 50 - 6*turn, true},
		{"a whole turn, from its end", full, 3 * math.Pi, -math.Pi, true},
		{"no Hi", rigid.Interval{Lo: 0, Hi: inf}, -1, turn - 1, true},
		{"no Lo: the greatest", rigid.Interval{Lo: -inf, Hi: 0}, 7, 7 - 2*turn, true},
		{"no end", rigid.Interval{Lo: -inf, Hi: inf}, 7, 7, true},
		{"empty", rigid.Interval{Lo: 1, Hi: -1}, 0, 0, false},
		{"the zero interval", rigid.Interval{}, turn, 0, true},
		{"the zero interval", rigid.Interval{}, 1, 1, false},
		{"NaN end", rigid.Interval{Lo: math.NaN(), Hi: 1}, 0, 0, false},
	} {
		got, ok := c.i.Angle(c.x)
		if ok != c.ok || math.Abs(got-c.want) > 1e-14 {
			t.Errorf("%s: %v of %g: %.17g, %v; want %.17g, %v", c.why, c.i, c.x, got, ok, c.want, c.ok)
		}
	}
	for _, x := range []float64{math.NaN(), inf, -inf} {
		for _, i := range []rigid.Interval{narrow, full, {Lo: -inf, Hi: inf}, {Lo: -inf}} {
			if _, ok := i.Angle(x); ok {
				t.Errorf("%v of %v is said to be inside", i, x)
			}
		}
	}
}

// Over a whole turn no angle is lost to rounding, and what comes out is inside.
func TestIntervalAngleFindsEvery(t *testing.T) {
	rnd := newRandom(52)
	for range 20 * rounds {
		lo := 100 * rnd.number()
		i := rigid.Interval{Lo: lo, Hi: lo + rigid.Revolution*(1+rnd.Float64()*1e-15)}
		if i.Hi-i.Lo < rigid.Revolution {
			i.Hi = math.Nextafter(i.Hi, math.Inf(1))
		}
		x := rnd.number() * math.Exp(20*rnd.Float64())
		got, ok := i.Angle(x)
		if !ok || !i.Contains(got) {
			t.Fatalf("%v of %g: %g, %v", i, x, got, ok)
		}
		if d := rigid.Wrap(got - x); math.Abs(d) > 1e-15*(math.Abs(x)+200) {
			t.Fatalf("%v of %g: %g is off by %g", i, x, got, d)
		}
	}
}

func FuzzIntervalAngle(f *testing.F) {
	f.Add(0.1, 1.1, 7.0)
	f.Add(math.Inf(-1), 0.0, 1.0)
	f.Add(-math.Pi, math.Pi, 1e300)
	f.Fuzz(func(t *testing.T, lo, hi, x float64) {
		i := rigid.Interval{Lo: lo, Hi: hi}
		got, ok := i.Angle(x)
		if ok && !i.Contains(got) {
			t.Errorf("%v of %g: %g is not inside", i, x, got)
		}
		if !ok && got != x && !math.IsNaN(x) {
			t.Errorf("%v of %g: %g without success", i, x, got)
		}
	})
}

func TestCoordinateAfter(t *testing.T) {
	c := rigid.Coordinate{Pos: 1, Vel: 2, Acc: 3}
	if got := c.After(2); got != (rigid.Coordinate{Pos: 11, Vel: 8, Acc: 3}) {
		t.Errorf("After(2) = %v", got)
	}
	if got := c.After(0); got != c {
		t.Errorf("After(0) = %v", got)
	}
	rnd := newRandom(53)
	for range rounds {
		c, dt := rigid.Coordinate{Pos: rnd.number(), Vel: rnd.number(), Acc: rnd.number()}, rnd.number()
		back := c.After(dt).After(-dt)
		near(t, "Pos", back.Pos, c.Pos, 1e-14)
		near(t, "Vel", back.Vel, c.Vel, 1e-14)
	}
}
