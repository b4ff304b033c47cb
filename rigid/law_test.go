package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

func sineLaw(in float64) (rigid.Coefficients, error) {
	if math.IsNaN(in) || math.IsInf(in, 0) {
		return rigid.Coefficients{}, rigid.ErrNotFinite
	}
	return sine(in), nil
}

var turn = rigid.Interval{Lo: -math.Pi, Hi: math.Pi}

func TestLawOf(t *testing.T) {
	asked := rigid.Coordinate{}
	l := rigid.LawOf(func(in rigid.Coordinate) (rigid.Coordinate, error) {
		asked = in
		return rigid.Coordinate{Pos: 2, Vel: 3, Acc: 4}, nil
	})
	if c, err := l(0.5); c != (rigid.Coefficients{In: 0.5, Out: 2, First: 3, Second: 4}) || err != nil {
		t.Errorf("%+v, %v", c, err)
	}
	if asked != (rigid.Coordinate{Pos: 0.5, Vel: 1}) {
		t.Errorf("asked for %+v", asked)
	}
}

func TestLawErrors(t *testing.T) {
	nan := math.NaN()
	fails := rigid.LawOf(func(rigid.Coordinate) (rigid.Coordinate, error) {
		return rigid.Coordinate{Pos: 1}, rigid.ErrSingular
	})
	sick := rigid.LawOf(func(rigid.Coordinate) (rigid.Coordinate, error) { return rigid.Coordinate{Acc: nan}, nil })
	for _, c := range []struct {
		why  string
		law  rigid.Law
		in   float64
		want error
	}{
		{"solve fails", fails, 0, rigid.ErrSingular},
		{"solve gives NaN", sick, 0, rigid.ErrNotFinite},
		{"law of nil", rigid.LawOf(nil), 0, rigid.ErrInput},
		{"then nil", rigid.Linear(1, 0).Then(nil), 0, rigid.ErrInput},
		{"nil then", rigid.Law(nil).Then(rigid.Linear(1, 0)), 0, rigid.ErrInput},
		{"NaN into a linear law", rigid.Linear(1, 0), nan, rigid.ErrNotFinite},
		{"infinity times 0", rigid.Linear(0, 0), math.Inf(1), rigid.ErrNotFinite},
		{"linear overflow", rigid.Linear(1e300, 0), 1e300, rigid.ErrNotFinite},
		{"linear of NaN", rigid.Linear(1, nan), 0, rigid.ErrNotFinite},
		{"the first fails", fails.Then(rigid.Linear(1, 0)), 0, rigid.ErrSingular},
		{"the second fails", rigid.Linear(1, 0).Then(fails), 0, rigid.ErrSingular},
		{"the chain overflows", rigid.Linear(1e200, 0).Then(rigid.Linear(1e200, 0)), 1e-200, rigid.ErrNotFinite},
	} {
		if got, err := c.law(c.in); err != c.want || got != (rigid.Coefficients{}) {
			t.Errorf("%s: %v, %v", c.why, got, err)
		}
	}
}

// A chain of a gear, a crank press and a change of unit is the formula as a whole.
func TestLawThen(t *testing.T) {
	whole := lawOf(func(x jet) jet {
		s, c := x.mul(constant(0.25)).add(constant(0.3)).sincos()
		h := s.mul(constant(0.05))
		ram := c.mul(constant(0.05)).add(constant(0.04).add(h.mul(h).neg()).sqrt())
		return ram.mul(constant(1000)).add(constant(-250))
	})
	chain := rigid.Linear(0.25, 0.3).Then(sliderCrank(0.05, 0.2, 0)).Then(rigid.Linear(1000, -250))
	rnd := newRandom(100)
	for range rounds {
		x := 10 * rnd.number()
		want, _ := whole(x)
		got, err := chain(x)
		if err != nil || got.In != x {
			t.Fatal(got, err)
		}
		near(t, "Out", got.Out, want.Out, 1e-12)
		near(t, "First", got.First, want.First, 1e-13)
		near(t, "Second", got.Second, want.Second, 1e-13)
	}
}

func TestLawSweep(t *testing.T) {
	for _, n := range []int{2, 3, 7, 1000} {
		over := rigid.Interval{Lo: -1, Hi: 1e-17} // Lo + (Hi − Lo) is 0
		var at []float64
		for c, err := range rigid.Law(sineLaw).Sweep(over, n) {
			if err != nil || c != sine(c.In) {
				t.Fatal(c, err)
			}
			at = append(at, c.In)
		}
		if len(at) != n || at[0] != over.Lo || at[n-1] != over.Hi {
			t.Fatalf("%d points, %v to %v", len(at), at[0], at[len(at)-1])
		}
		for i := 1; i < n; i++ {
			near(t, "step", at[i]-at[i-1], (over.Hi-over.Lo)/float64(n-1), 1e-15)
		}
	}
}

// A law that does not say where it is can be searched all the same.
func TestLawWithoutIn(t *testing.T) {
	law := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		c := sine(x)
		c.In = 0
		return c, nil
	})
	i := 0.0
	for c := range law.Sweep(rigid.Interval{Lo: 0, Hi: 4}, 5) {
		if c != sine(i) {
			t.Errorf("%v: %+v", i, c)
		}
		i++
	}
	dead, err := law.Extremes(rigid.Interval{Lo: 1, Hi: 2})
	if err != nil {
		t.Fatal(err)
	}
	places(t, "dead centre", dead, 1e-15, math.Pi/2)
}

func TestLawSweepErrors(t *testing.T) {
	part := only(sineLaw, rigid.Interval{Lo: 1, Hi: 2})
	good, bad := 0, 0
	for c, err := range part.Sweep(rigid.Interval{Lo: 0, Hi: 3}, 7) {
		switch {
		case err == nil:
			good++
		case err != rigid.ErrUnreachable || c != (rigid.Coefficients{In: c.In}) || c.In != float64(good+bad)/2:
			t.Errorf("%+v, %v", c, err)
		default:
			bad++
		}
	}
	if good != 3 || bad != 4 {
		t.Errorf("%d with a value, %d without; want 3 and 4", good, bad)
	}
	for range part.Sweep(turn, 7) {
		break // may be left at any time
	}
	for _, c := range []struct {
		over rigid.Interval
		n    int
		want error
	}{
		{turn, 1, rigid.ErrInput},
		{turn, -1, rigid.ErrInput},
		{rigid.Interval{Lo: 1, Hi: 0}, 5, rigid.ErrInput},
		{rigid.Interval{Lo: math.NaN(), Hi: 0}, 5, rigid.ErrNotFinite},
		{rigid.Interval{Lo: 0, Hi: math.Inf(1)}, 5, rigid.ErrNotFinite},
		{rigid.Interval{Lo: -1e308, Hi: 1e308}, 5, rigid.ErrNotFinite},
	} {
		n := 0
		for got, err := range part.Sweep(c.over, c.n) {
			if n++; err != c.want || got != (rigid.Coefficients{}) {
				t.Errorf("%v, %d: %v, %v", c.over, c.n, got, err)
			}
		}
		if n != 1 {
			t.Errorf("%v, %d: %d points", c.over, c.n, n)
		}
	}
}

// A law is evaluated and solved in a control loop: nothing is allocated, with an
// answer or an error.
func TestLawNoAllocation(t *testing.T) {
	press := sliderCrank(0.05, 0.2, 0.01)
	over := rigid.Interval{Lo: 0.2, Hi: 3}
	back, err := press.Inverse(over)
	if err != nil {
		t.Fatal(err)
	}
	chain := rigid.Linear(0.5, 0).Then(press).Then(back)
	solver := rigid.LawOf(func(in rigid.Coordinate) (rigid.Coordinate, error) {
		return rigid.Coordinate{Pos: math.Sin(in.Pos), Vel: math.Cos(in.Pos) * in.Vel}, nil
	})
	limited := fourBar(4, 5, 2, 5, 1)
	ram, _ := press(1)
	half := rigid.Interval{Lo: -math.Pi / 2, Hi: math.Pi / 2}
	up, err := limited.Strokes(rigid.Interval{Lo: 1, Hi: 2}) // to the end of its range
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name string
		call func()
		want error
	}{
		{"LawOf", func() { sinkAny.coefficients, sinkError = solver(1) }, nil},
		{"Linear", func() { sinkAny.coefficients, sinkError = rigid.Linear(2, 1)(1) }, nil},
		{"Linear NaN", func() { sinkAny.coefficients, sinkError = rigid.Linear(2, 1)(math.NaN()) }, rigid.ErrNotFinite},
		{"Then", func() { sinkAny.coefficients, sinkError = chain(1) }, nil},
		{"Then, out of reach", func() { sinkAny.coefficients, sinkError = chain(0.1) }, rigid.ErrUnreachable},
		{"Inverse", func() { sinkAny.coefficients, sinkError = back(ram.Out) }, nil},
		{"Inverse, out of reach", func() { sinkAny.coefficients, sinkError = back(1) }, rigid.ErrUnreachable},
		{"Inverse NaN", func() { sinkAny.coefficients, sinkError = back(math.NaN()) }, rigid.ErrNotFinite},
		{"Solve", func() {
			sinkAny.coordinate, sinkError = press.Solve(rigid.Coordinate{Pos: ram.Out, Vel: 1}, over)
		}, nil},
		{"Solve at a dead centre", func() {
			sinkAny.coordinate, sinkError = rigid.Law(sineLaw).Solve(rigid.Coordinate{Pos: 1}, half)
		}, nil},
		{"Solve for rates there", func() {
			sinkAny.coordinate, sinkError = rigid.Law(sineLaw).Solve(rigid.Coordinate{Pos: 1, Vel: 1}, half)
		}, rigid.ErrSingular},
		{"Solve, out of reach", func() {
			sinkAny.coordinate, sinkError = press.Solve(rigid.Coordinate{Pos: 1}, over)
		}, rigid.ErrUnreachable},
		{"Solve up to the end of a range", func() {
			sinkAny.coordinate, sinkError = limited.Solve(rigid.Coordinate{Pos: 2}, up[0])
		}, nil},
		{"Solve NaN", func() {
			sinkAny.coordinate, sinkError = press.Solve(rigid.Coordinate{Pos: math.NaN()}, over)
		}, rigid.ErrNotFinite},
		{"Solve on no stroke", func() {
			sinkAny.coordinate, sinkError = press.Solve(rigid.Coordinate{Pos: 1}, rigid.Interval{})
		}, rigid.ErrInput},
	} {
		sinkError = nil
		if n := testing.AllocsPerRun(100, c.call); n != 0 {
			t.Errorf("%s: %v allocations", c.name, n)
		}
		if sinkError != c.want {
			t.Errorf("%s: %v, want %v", c.name, sinkError, c.want)
		}
	}
	for _, n := range []int{2, 1000} { // only the iterator may be made
		if got := testing.AllocsPerRun(10, func() {
			for c := range press.Sweep(turn, n) {
				sinkFloat = c.Out
			}
		}); got > 1 {
			t.Errorf("Sweep of %d: %v allocations", n, got)
		}
	}
}
