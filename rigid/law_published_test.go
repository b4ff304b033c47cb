package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

// An offset slider-crank, crank 30 mm, rod 50 mm, guide 10 mm off. A GATE item of
// 2025 (examprev.com) gives the limits of the slider, 79.37 mm and 17.32 mm, and the
// stroke, 62.05 mm; the digits beyond, and the crank angles, are worked out with 60
// digits from the closure equations.
func TestPublishedLimits(t *testing.T) {
	l := sliderCrank(30, 50, 10)
	got := extremes(t, l, 0, full)
	places(t, "limits", got, 4e-16, 0.12532783116806539687, 3.6651914291880921115)
	near(t, "stated 79.37", got[0].Out, 79.372539331937717715, 3e-16)
	near(t, "stated 17.32", got[1].Out, 17.320508075688772935, 1e-15)
	near(t, "stated 62.05", math.Round(100*(got[0].Out-got[1].Out))/100, 62.05, 1e-15)
	if !(got[0].Second < 0 && got[1].Second > 0) {
		t.Errorf("greatest and least are not told apart: %+v", got)
	}
}

// A piston engine, crank 3.307/2 in, rod 6.024 in. A forum article on piston speed
// (quartermile.ws) gives 75.6° for the crank angle without acceleration; the other
// digits are worked out with 60 digits.
func TestPublishedTopSpeed(t *testing.T) {
	speed, acc, err := sliderCrank(3.307/2, 6.024, 0).Peaks(rigid.Interval{Lo: 0, Hi: full})
	if err != nil {
		t.Fatal(err)
	}
	const angle = 75.623522552919977455 * rigid.Degree
	places(t, "speed", speed, 1e-15, angle, full-angle)
	// at the dead centres r(1 ± r/l), but as r/l is above a quarter, the inner one is a
	// hollow between two peaks
	const beside = 2.8302583557768903301
	places(t, "acc", acc, 1e-7, 0, beside, math.Pi, full-beside)
	const r, l = 3.307 / 2, 6.024
	near(t, "outer", acc[0].Second, -r*(1+r/l), 2e-15)
	near(t, "inner", acc[2].Second, r*(1-r/l), 2e-15)
}

// The four-bar 4:5:2:5, whose coupler's middle goes nearly straight: Wikipedia,
// "Chebyshev linkage", has 36.8699° and 101.537° for the limits of its crank. The
// law has no value beyond them, and its rates grow without bound on the way there.
func TestPublishedRange(t *testing.T) {
	const lo, hi = 36.869897645844021297 * rigid.Degree, 101.53695903281548769 * rigid.Degree
	for _, side := range []float64{1, -1} {
		strokes, err := fourBar(4, 5, 2, 5, side).Strokes(rigid.Interval{Lo: 0, Hi: math.Pi})
		if err != nil || len(strokes) != 2 {
			t.Fatal(strokes, err)
		}
		near(t, "lower limit", strokes[0].Lo, lo, 1e-15)
		near(t, "upper limit", strokes[1].Hi, hi, 1e-15)
		if strokes[0].Hi != strokes[1].Lo {
			t.Errorf("the strokes do not meet: %v", strokes)
		}
		speed, acc, err := fourBar(4, 5, 2, 5, side).Peaks(rigid.Interval{Lo: 0, Hi: math.Pi})
		if err != nil || len(speed) != 0 || len(acc) != 1 {
			t.Errorf("peaks where the rates grow without bound: %v, %v, %v", speed, acc, err)
		}
	}
}

// Peaks of the usual laws of a cam's rise by 1 over 1, as textbooks of cams list
// them (from memory): speed and acceleration.
func TestPublishedCamLaws(t *testing.T) {
	for _, c := range []struct {
		name       string
		law        rigid.Law
		speed, acc float64
	}{
		{"harmonic", lawOf(func(x jet) jet {
			_, c := x.mul(constant(math.Pi)).sincos()
			return constant(0.5).add(c.mul(constant(-0.5)))
		}), math.Pi / 2, math.Pi * math.Pi / 2},
		{"cycloidal", lawOf(cycloid), 2, 2 * math.Pi},
		{"polynomial 3-4-5", polynomial(0, 0, 0, 10, -15, 6), 1.875, 10 / math.Sqrt(3)},                  // 5.7735
		{"polynomial 4-5-6-7", polynomial(0, 0, 0, 0, 35, -84, 70, -20), 2.1875, 84 * math.Sqrt(5) / 25}, // 7.5132
	} {
		speed, acc, err := c.law.Peaks(rigid.Interval{Lo: -0.1, Hi: 1.1})
		if err != nil {
			t.Fatal(err)
		}
		fastest, most := 0.0, 0.0
		for _, p := range speed {
			if 0.2 < p.In && p.In < 0.8 {
				fastest = p.First
				near(t, c.name+", place", p.In, 0.5, 1e-15)
			}
		}
		for _, p := range acc {
			if -1e-6 < p.In && p.In < 0.5 {
				most = p.Second
			}
		}
		near(t, c.name+", speed", fastest, c.speed, 2e-15)
		near(t, c.name+", acceleration", most, c.acc, 1e-14)
	}
}

// The wheel of a Geneva stop with n slots turns by atan2(sin α, m − cos α), m =
// 1/sin(π/n), while the pin is in a slot. Handbooks of machinery tabulate its greatest
// speed and acceleration for a driver of unit speed (from memory): 4 slots 2.41 and 5.41, 6 slots 1.00
// and 1.35, 8 slots 0.62 and 0.70. The ends of the engagement are no peaks.
func TestPublishedGeneva(t *testing.T) {
	for _, c := range []struct{ slots, speed, acc float64 }{{4, 2.41, 5.41}, {6, 1.00, 1.35}, {8, 0.62, 0.70}} {
		m := 1 / math.Sin(math.Pi/c.slots)
		wheel := lawOf(func(x jet) jet {
			s, c := x.sincos()
			tangent := s.mul(constant(m).add(c.neg()).inv())
			q := 1 + tangent.v*tangent.v
			return tangent.through(math.Atan(tangent.v), 1/q, -2*tangent.v/(q*q))
		})
		half := math.Pi/2 - math.Pi/c.slots
		speed, acc, err := only(wheel, rigid.Interval{Lo: -half, Hi: half}).Peaks(rigid.Interval{Lo: -2, Hi: 2})
		if err != nil || len(acc) != 2 {
			t.Fatal(acc, err)
		}
		places(t, "speed", speed, 1e-15, 0)
		near(t, "speed", math.Round(100*speed[0].First)/100, c.speed, 1e-15)
		near(t, "speed, exactly", speed[0].First, 1/(m-1), 1e-14)
		near(t, "acc", math.Round(100*acc[0].Second)/100, c.acc, 1e-15)
		near(t, "acc on the other side", acc[1].Second, -acc[0].Second, 1e-13)
		near(t, "place on the other side", acc[1].In, -acc[0].In, 4e-8)
	}
}
