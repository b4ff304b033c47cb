package root_test

import (
	"errors"
	"math"
	"testing"

	"example.com/twopoint/internal/root"
)

// A counted function tells how often it was called.
type counted struct {
	f     func(x float64) root.Point
	calls int
}

func (c *counted) at(x float64) (root.Point, error) {
	c.calls++
	return c.f(x), nil
}

func (c *counted) find(t *testing.T, lo, hi, y float64) root.Point {
	t.Helper()
	p, err := root.Find(c.at, c.f(lo), c.f(hi), y)
	if err != nil {
		t.Fatal(err)
	}
	if !(lo <= p.In && p.In <= hi) {
		t.Fatalf("%v is outside %v to %v", p.In, lo, hi)
	}
	if c.calls > root.Calls {
		t.Fatalf("%d calls", c.calls)
	}
	return p
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: %.17g, want %.17g", what, got, want)
	}
}

// Constants that many tables give (from memory): Dottie's number, where cos x = x;
// the omega constant, where x·eˣ = 1; the plastic number, where x³ = x + 1, and
// Wallis's example x³ = 2x + 5, both from Newton's day.
func TestFindPublished(t *testing.T) {
	for _, c := range []struct {
		name         string
		lo, hi, y, x float64
		f            func(x float64) root.Point
	}{
		{"Dottie", 0, 1, 0, 0.73908513321516064166, func(x float64) root.Point {
			s, c := math.Sincos(x)
			return root.Point{In: x, Out: c - x, First: -s - 1, Second: -c}
		}},
		{"omega", 0, 1, 1, 0.56714329040978387300, func(x float64) root.Point {
			e := math.Exp(x)
			return root.Point{In: x, Out: x * e, First: (1 + x) * e, Second: (2 + x) * e}
		}},
		{"plastic", 1, 2, 1, 1.32471795724474602596, func(x float64) root.Point {
			return root.Point{In: x, Out: x*x*x - x, First: 3*x*x - 1, Second: 6 * x}
		}},
		{"Wallis", 2, 3, 5, 2.09455148154232659148, func(x float64) root.Point {
			return root.Point{In: x, Out: x*x*x - 2*x, First: 3*x*x - 2, Second: 6 * x}
		}},
	} {
		f := counted{f: c.f}
		near(t, c.name, f.find(t, c.lo, c.hi, c.y).In, c.x, 4e-16)
		if f.calls > 6 {
			t.Errorf("%s: %d calls", c.name, f.calls)
		}
	}
}

func kepler(e float64) func(x float64) root.Point {
	return func(x float64) root.Point {
		s, c := math.Sincos(x)
		return root.Point{In: x, Out: x - e*s, First: 1 - e*c, Second: e * s}
	}
}

// Kepler's equation M = E − e·sin E. J. Meeus, Astronomical Algorithms, chapter 30
// (from memory): e = 0.1, M = 5° gives 5.554589°, and e = 0.99, M = 0.2 gives
// 1.066997365 rad. The other digits are mpmath's,
// findroot(lambda E: E - e*sin(E) - M, 1), with e and M taken as float64.
func TestFindKepler(t *testing.T) {
	for _, c := range []struct{ e, m, want, tol float64 }{
		{0.1, 5 * math.Pi / 180, 0.096945871075967087294, 1e-16},
		{0.99, 0.2, 1.0669973652815631925, 1e-15},
	} {
		f := counted{f: kepler(c.e)}
		got := f.find(t, 0, math.Pi, c.m).In
		near(t, "E", got, c.want, c.tol)
		if f.calls > 8 {
			t.Errorf("e = %v: %d calls", c.e, f.calls)
		}
	}
}

// The hardest ends: f flat there, or rising without bound, or both, met from either
// side, with a root as near as float64 lets it be.
func TestFindNearEnds(t *testing.T) {
	parabola := func(x float64) root.Point { return root.Point{In: x, Out: x * x, First: 2 * x, Second: 2} }
	sqrt := func(x float64) root.Point {
		r := math.Sqrt(x)
		return root.Point{In: x, Out: r, First: 1 / (2 * r), Second: -1 / (4 * r * x)}
	}
	cube := func(x float64) root.Point { return root.Point{In: x, Out: x * x * x, First: 3 * x * x, Second: 6 * x} }
	for _, c := range []struct {
		name string
		f    func(x float64) root.Point
		x    func(y float64) float64
		lo   float64
		most int
	}{
		{"parabola", parabola, math.Sqrt, 0, 3},
		{"square root", sqrt, func(y float64) float64 { return y * y }, 1e-32, 6},
		{"cube, flatter than any step knows", cube, math.Cbrt, 0, 40},
	} {
		for y := 0.9; y > 1e-14; y *= 0.37 {
			f := counted{f: c.f}
			got := f.find(t, c.lo, 1, y)
			near(t, c.name, got.In/c.x(y), 1, 1e-15)
			if f.calls > c.most {
				t.Errorf("%s, %v: %d calls", c.name, y, f.calls)
			}
			down := counted{f: func(x float64) root.Point { // turned over, falling
				p := c.f(1 - x)
				return root.Point{In: x, Out: p.Out, First: -p.First, Second: p.Second}
			}}
			if y > 1e-3 {
				near(t, c.name+" falling", 1-down.find(t, 0, 1-c.lo, y).In, c.x(y), 1e-13)
			}
		}
	}
}

// Whatever f does, the search ends inside the bracket, and at y if f takes it there.
func TestFindPathological(t *testing.T) {
	sign := func(x float64) float64 {
		if x < 0 {
			return -1
		}
		return 1
	}
	for name, f := range map[string]func(x float64) root.Point{
		"jump":              func(x float64) root.Point { return root.Point{In: x, Out: sign(x - 0.3)} },
		"no derivative":     func(x float64) root.Point { return root.Point{In: x, Out: x * x * x} },
		"false derivatives": func(x float64) root.Point { return root.Point{In: x, Out: x, First: -1e9, Second: 1e200} },
		"NaN derivatives": func(x float64) root.Point {
			return root.Point{In: x, Out: x, First: math.NaN(), Second: math.NaN()}
		},
		"overflow": func(x float64) root.Point { return root.Point{In: x, Out: 1e300 * x, First: 1e300} },
		"huge slope": func(x float64) root.Point {
			return root.Point{In: x, Out: math.Cbrt(x), First: 1 / (3 * math.Cbrt(x) * math.Cbrt(x)), Second: -2 / (9 * x * math.Cbrt(x) * math.Cbrt(x))}
		},
		"NaN inside": func(x float64) root.Point {
			if math.Abs(x) < 0.5 {
				return root.Point{In: x, Out: math.NaN(), First: math.NaN()}
			}
			return root.Point{In: x, Out: x}
		},
	} {
		for _, y := range []float64{-0.7, 0, 1e-9, 0.25} {
			c := counted{f: f}
			p := c.find(t, -1, 1, y)
			switch name {
			case "false derivatives": // a slope of 1e9 makes rounding of In 1e-6
				near(t, name, p.Out, y, 1e-6)
			case "jump", "NaN inside":
			default:
				near(t, name, p.Out, y, 1e-15)
			}
		}
	}
	jump := counted{f: func(x float64) root.Point { return root.Point{In: x, Out: sign(x - 0.3)} }}
	near(t, "beside the jump", jump.find(t, -1, 1, 0.5).In, 0.3, 1e-15)
}

func TestFindEndsAndErrors(t *testing.T) {
	bad := errors.New("bad")
	calls := 0
	f := func(x float64) (root.Point, error) { calls++; return root.Point{}, bad }
	a, b := root.Point{In: 1, Out: 2}, root.Point{In: 3, Out: 4}
	for _, end := range []root.Point{a, b} {
		if p, err := root.Find(f, a, b, end.Out); p != end || err != nil || calls != 0 {
			t.Errorf("end %v: %v, %v, %d calls", end, p, err, calls)
		}
	}
	if p, err := root.Find(f, a, b, 3); p != (root.Point{}) || err != bad || calls != 1 {
		t.Errorf("%v, %v, %d calls", p, err, calls)
	}
}

func TestBisect(t *testing.T) {
	calls := 0
	in, out := root.Bisect(func(x float64) bool { calls++; return x*x < 2 }, 1, 2)
	if in != math.Nextafter(out, 0) || in*in >= 2 || out*out < 2 {
		t.Errorf("%.17g, %.17g do not bracket √2", in, out)
	}
	if calls > 64 {
		t.Errorf("%d calls", calls)
	}
	in, out = root.Bisect(func(x float64) bool { return x > 0.1 }, 1, 0) // downwards
	near(t, "in", in, 0.1, 2e-17)
	if out > 0.1 || in <= 0.1 {
		t.Errorf("%v, %v", in, out)
	}
	in, out = root.Bisect(func(float64) bool { return false }, 1, 1)
	if in != 1 || out != 1 {
		t.Errorf("empty bracket: %v, %v", in, out)
	}
	calls = 0
	_, out = root.Bisect(func(float64) bool { calls++; return false }, 0, 1) // towards 0 there is no end of float64
	if calls != 64 || out != 0x1p-64 {
		t.Errorf("%v after %d calls", out, calls)
	}
}

// The minimum of the gamma function over positive numbers is at 1.46163214496836…
// (OEIS A030169, from memory) and is 0.88560319441088… (A030171).
func TestMinimum(t *testing.T) {
	calls := 0
	x := root.Minimum(func(x float64) float64 { calls++; return math.Gamma(x) }, 1, 3)
	near(t, "place", x, 1.46163214496836234126, 5e-8)
	near(t, "value", math.Gamma(x), 0.88560319441088870028, 4e-16)
	if calls != 48 {
		t.Errorf("%d calls", calls)
	}
	near(t, "falling", root.Minimum(func(x float64) float64 { return -x }, 1, 3), 3, 1e-9)
	near(t, "rising", root.Minimum(func(x float64) float64 { return x }, 1, 3), 1, 1e-9)
	near(t, "kink", root.Minimum(func(x float64) float64 { return math.Abs(x - 1.7) }, 1, 3), 1.7, 1e-9)
}

var sink float64

func TestNoAllocation(t *testing.T) {
	y := 0.3
	n := testing.AllocsPerRun(100, func() {
		p, _ := root.Find(func(x float64) (root.Point, error) {
			return root.Point{In: x, Out: x * x, First: 2 * x}, nil
		}, root.Point{}, root.Point{In: 1, Out: 1, First: 2}, y)
		in, _ := root.Bisect(func(x float64) bool { return x < y }, 0, 1)
		sink = p.In + in + root.Minimum(func(x float64) float64 { return (x - y) * (x - y) }, 0, 1)
	})
	if n != 0 {
		t.Errorf("%v allocations", n)
	}
}
