package rigid_test

import (
	"errors"
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

const eps = 0x1p-52

// counting is l, and counts its calls.
func counting(l rigid.Law, calls *int) rigid.Law {
	return func(in float64) (rigid.Coefficients, error) { *calls++; return l(in) }
}

// size is the greatest |Out| at the ends of a stroke.
func size(t *testing.T, l rigid.Law, s rigid.Interval) float64 {
	t.Helper()
	most := 0.0
	for _, x := range []float64{s.Lo, s.Hi} {
		if c, err := l(x); err == nil {
			most = math.Max(most, math.Abs(c.Out))
		}
	}
	return most
}

// The arc sine, from its dead centres to 1e-6 rad beside them, and on.
func TestSolveArcSine(t *testing.T) {
	half := rigid.Interval{Lo: -math.Pi / 2, Hi: math.Pi / 2}
	back, err := rigid.Law(sineLaw).Inverse(half)
	if err != nil {
		t.Fatal(err)
	}
	for d := 1.5; d > 5e-7; d *= 0.77 {
		for _, side := range []float64{1, -1} {
			y := side * math.Cos(d)
			slope := math.Sqrt((1 - y) * (1 + y))
			c, err := back(y)
			if err != nil {
				t.Fatal(err)
			}
			near(t, "arc sine", c.Out, math.Asin(y), 2*eps/slope)
			if c.In != y {
				t.Errorf("In is %v, given %v", c.In, y)
			}
			// as exact as Out is near to a dead centre: its rounding against what is left of it
			tol := 8 * eps / (slope * slope)
			near(t, "First", c.First*slope, 1, tol)
			near(t, "Second", c.Second*slope*slope*slope, y, 3*tol)
			in, err := rigid.Law(sineLaw).Solve(rigid.Coordinate{Pos: y, Vel: 2, Acc: -3}, half)
			if err != nil || in.Pos != c.Out {
				t.Fatal(in, err)
			}
			near(t, "Vel", in.Vel, 2*c.First, eps)
			near(t, "Acc", in.Acc, 4*c.Second-3*c.First, 4*eps)
		}
	}
}

// An in-line crank by the law of cosines: cos θ = (r² + x² − l²)/2rx.
func TestSolveSliderCrank(t *testing.T) {
	const r, l = 0.05, 0.2
	press := sliderCrank(r, l, 0)
	rnd := newRandom(120)
	for range rounds {
		x := l - r + 2*r*rnd.Float64()
		theta := math.Acos((r*r + x*x - l*l) / (2 * r * x))
		for turns := -2.0; turns <= 2; turns++ {
			lo := turns * full
			for _, s := range []struct {
				over rigid.Interval
				want float64
			}{{rigid.Interval{Lo: lo, Hi: lo + math.Pi}, lo + theta}, {rigid.Interval{Lo: lo - math.Pi, Hi: lo}, lo - theta}} {
				in, err := press.Solve(rigid.Coordinate{Pos: x}, s.over)
				if err != nil {
					t.Fatal(err)
				}
				near(t, "crank", in.Pos, s.want, 1e-13/math.Abs(math.Sin(theta)))
			}
		}
	}
}

// machines are laws of every kind that the searches must serve, with an interval.
func machines() map[string]struct {
	law  rigid.Law
	over rigid.Interval
} {
	type machine = struct {
		law  rigid.Law
		over rigid.Interval
	}
	return map[string]machine{
		"sine":                {sineLaw, rigid.Interval{Lo: -7, Hi: 9}},
		"crank press":         {sliderCrank(0.05, 0.2, 0), turn},
		"offset crank":        {sliderCrank(0.03, 0.05, 0.01), turn},
		"crank, nearly a rod": {sliderCrank(0.099, 0.1, 0), turn},
		"small crank":         {sliderCrank(1e-6, 1e-4, 0), turn},
		"big crank":           {sliderCrank(1e3, 3e3, 500), turn},
		"short rod":           {sliderCrank(0.05, 0.03, 0), turn},
		"crank-rocker":        {fourBar(0.15, 0.04, 0.15, 0.08, 1), turn},
		"crank-rocker, other": {fourBar(0.15, 0.04, 0.15, 0.08, -1), turn},
		"double rocker":       {fourBar(5, 4, 2, 5, 1), turn},
		"four-bar, limited":   {fourBar(4, 5, 2, 5, 1), rigid.Interval{Lo: 0, Hi: math.Pi}},
		"cam":                 {camRise(cycloid), rigid.Interval{Lo: 0, Hi: full}},
		"gear and crank":      {rigid.Linear(-3, 1).Then(sliderCrank(0.05, 0.2, 0.01)), turn},
		"ram in mm from 0":    {sliderCrank(0.05, 0.2, 0).Then(rigid.Linear(1000, -150)), turn},
		"cubic with a touch":  {polynomial(1, 0, 0, 2), rigid.Interval{Lo: -1, Hi: 1}},
	}
}

// Solve and Inverse take a law back on each stroke, up to its ends.
func TestSolveInverts(t *testing.T) {
	rnd := newRandom(121)
	most := 0
	for name, m := range machines() {
		strokes, err := m.law.Strokes(m.over)
		if err != nil || len(strokes) == 0 {
			t.Fatal(name, strokes, err)
		}
		for _, s := range strokes {
			calls := 0
			back, err := counting(m.law, &calls).Inverse(s)
			if name == "cam" && strokes[1] == s || name == "cam" && strokes[3] == s { // dwells
				if !errors.Is(err, rigid.ErrInput) {
					t.Errorf("%s, dwell %v: %v", name, s, err)
				}
				continue
			}
			if err != nil {
				t.Errorf("%s, %v: %v", name, s, err)
				continue
			}
			big, slope := size(t, m.law, s), 0.0
			if a, err := m.law(s.Lo + 1e-9*(s.Hi-s.Lo)); err == nil {
				b, _ := m.law(s.Hi - 1e-9*(s.Hi-s.Lo))
				slope = math.Abs(b.Out-a.Out) / (s.Hi - s.Lo)
			}
			for k := range 300 {
				part := rnd.Float64()
				switch k % 3 {
				case 1:
					part = math.Pow(10, -9*part)
				case 2:
					part = 1 - math.Pow(10, -9*part)
				}
				x := min(max(s.Lo+part*(s.Hi-s.Lo), s.Lo), s.Hi)
				c, err := m.law(x)
				if err != nil {
					continue // the end of a range
				}
				calls = 0
				in, err := m.law.Solve(rigid.Coordinate{Pos: c.Out}, s)
				if err != nil {
					t.Errorf("%s: Solve(%v) on %v: %v", name, c.Out, s, err)
					continue
				}
				// what rounding of Out and In can do to it, also where First is next to 0
				noise := 40 * eps * (big + math.Abs(c.First*x))
				tol := min(noise/math.Abs(c.First), 2*math.Sqrt(noise/math.Abs(c.Second)))
				if !(math.Abs(in.Pos-x) <= tol+4*eps*math.Abs(x)) && name != "cam" && name != "cubic with a touch" {
					t.Errorf("%s: %v gives %v, solved back to %v, off by %v, tolerance %v", name, x, c.Out, in.Pos, in.Pos-x, tol)
				}
				at, err := m.law(in.Pos)
				if err == nil && !(math.Abs(at.Out-c.Out) <= 4*eps*(big+math.Abs(at.First*in.Pos))) {
					t.Errorf("%s: solved to %v, where Out is %v, want %v", name, in.Pos, at.Out, c.Out)
				}
				inv, err := back(c.Out)
				most = max(most, calls)
				if err == rigid.ErrSingular && math.Abs(at.First) < 1.01e-8*slope {
					continue
				}
				if err != nil || inv.Out != in.Pos || inv.In != c.Out {
					t.Fatalf("%s: inverse at %v: %+v, %v; Solve: %v", name, c.Out, inv, err, in)
				}
				near(t, name+": First", inv.First*at.First, 1, 1e-15)
			}
		}
	}
	t.Logf("at most %d calls", most)
	if most > 60 {
		t.Errorf("%d calls of a law for one value", most)
	}
}

// Rates go there and back: the input's motion makes the output's, and that the input's.
func TestSolveRates(t *testing.T) {
	rnd := newRandom(122)
	for name, m := range machines() {
		strokes, _ := m.law.Strokes(m.over)
		for _, s := range strokes {
			for range 50 {
				x := s.Lo + (0.05+0.9*rnd.Float64())*(s.Hi-s.Lo)
				c, err := m.law(x)
				if err != nil || c.First == 0 {
					continue
				}
				want := rigid.Coordinate{Pos: x, Vel: rnd.number(), Acc: rnd.number()}
				got, err := m.law.Solve(c.Output(want.Vel, want.Acc), s)
				if err != nil {
					t.Fatal(name, err)
				}
				lost := size(t, m.law, s) * 100 * eps / math.Abs(c.First) * (1 + math.Abs(c.Second/c.First))
				near(t, name+": Vel", got.Vel, want.Vel, lost+1e-14)
				near(t, name+": Acc", got.Acc, want.Acc, 1e4*(lost+1e-14)*(1+c.Second*c.Second/(c.First*c.First)))
			}
		}
	}
}

// A crank followed through its dead centres by the ram alone, turn after turn: on each
// stroke Solve gives the crank angle; at the dead centre itself, and beyond it by
// rounding, the place and no rates.
func TestSolveThroughDeadCentre(t *testing.T) {
	press := sliderCrank(0.05, 0.2, 0.01)
	over := rigid.Interval{Lo: 0, Hi: 3 * full}
	strokes, err := press.Strokes(over)
	if err != nil || len(strokes) != 7 {
		t.Fatal(strokes, err)
	}
	n := 0
	for i := range 60000 {
		crank := 3 * full * float64(i) / 60000
		for n+1 < len(strokes) && crank > strokes[n].Hi {
			n++
		}
		ram, _ := press(crank)
		got, err := press.Solve(rigid.Coordinate{Pos: ram.Out}, strokes[n])
		if err != nil {
			t.Fatal(crank, err)
		}
		near(t, "crank", got.Pos, crank, 1e-15+3*eps*0.25/max(math.Abs(ram.First), 1e-9))
	}
	for i, s := range strokes[:len(strokes)-1] {
		dead, _ := press(s.Hi)
		away := math.Copysign(1, -dead.Second)
		for k := range 8 {
			out := dead.Out + away*float64(k)*eps/4*0.25
			for _, on := range []rigid.Interval{s, strokes[i+1]} {
				if in, err := press.Solve(rigid.Coordinate{Pos: out}, on); in != (rigid.Coordinate{Pos: s.Hi}) || err != nil {
					t.Errorf("at dead centre %v, %d beyond: %+v, %v", s.Hi, k, in, err)
				}
				if in, err := press.Solve(rigid.Coordinate{Pos: out, Vel: 1e-3}, on); in != (rigid.Coordinate{}) || err != rigid.ErrSingular {
					t.Errorf("rates at dead centre %v: %+v, %v", s.Hi, in, err)
				}
				if in, err := press.Solve(rigid.Coordinate{Pos: out, Acc: -1e-3}, on); in != (rigid.Coordinate{}) || err != rigid.ErrSingular {
					t.Errorf("acceleration at dead centre %v: %+v, %v", s.Hi, in, err)
				}
			}
		}
		if in, err := press.Solve(rigid.Coordinate{Pos: dead.Out + away*1e-9}, s); in != (rigid.Coordinate{}) || err != rigid.ErrUnreachable {
			t.Errorf("beyond dead centre %v: %+v, %v", s.Hi, in, err)
		}
	}
}

// An inverse is a law like any other: its strokes and its own inverse are there, and
// with the law it makes no change at all.
func TestInverseOfInverse(t *testing.T) {
	press := sliderCrank(0.05, 0.2, 0.01)
	strokes, _ := press.Strokes(turn)
	s := strokes[1]
	back, err := press.Inverse(s)
	if err != nil {
		t.Fatal(err)
	}
	lo, _ := press(s.Lo)
	hi, _ := press(s.Hi)
	out := rigid.Interval{Lo: min(lo.Out, hi.Out), Hi: max(lo.Out, hi.Out)}
	pieces, err := back.Strokes(out)
	if err != nil || len(pieces) != 1 || pieces[0] != out {
		t.Fatalf("strokes of the inverse: %v, %v; want %v", pieces, err, out)
	}
	again, err := back.Inverse(out)
	if err != nil {
		t.Fatal(err)
	}
	rnd := newRandom(123)
	for range rounds {
		x := s.Lo + (0.01+0.98*rnd.Float64())*(s.Hi-s.Lo)
		want, _ := press(x)
		got, err := again(x)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "Out", got.Out, want.Out, 1e-15)
		near(t, "First", got.First, want.First, 1e-13)
		near(t, "Second", got.Second, want.Second, 1e-12)
		same, err := press.Then(back)(x)
		if err != nil {
			t.Fatal(err)
		}
		// rounding of Out moves the place, and First with it
		off := eps * want.Out / math.Abs(want.First)
		bent := math.Abs(want.Second / want.First)
		near(t, "same", same.Out, x, 2*off+eps)
		near(t, "First of both", same.First, 1, 2*off*bent+4*eps)
		near(t, "Second of both", same.Second, 0, (2*off*bent+4*eps)*10*(1+bent))
	}
}
