package encoder_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

func newRates(t testing.TB, window, degree int) *encoder.Rates {
	t.Helper()
	r, err := encoder.NewRates(window, degree)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// The filter's coefficients are its answers to a single 1 among zeros. A. Savitzky
// and M. J. E. Golay, Analytical Chemistry 36 (1964), with the corrections of J.
// Steinier, Y. Termonia and J. Deltour (1972): the tables from memory, and the same
// as scipy.signal.savgol_coeffs gives.
func TestSavitzkyGolay(t *testing.T) {
	for _, c := range []struct {
		what         string
		degree       int
		derivative   int
		coefficients []float64
		norm         float64
	}{
		{"smoothing, quadratic and cubic", 2, 0, []float64{-3, 12, 17, 12, -3}, 35},
		{"smoothing, quadratic and cubic", 3, 0, []float64{-3, 12, 17, 12, -3}, 35},
		{"smoothing, quadratic and cubic", 2, 0, []float64{-2, 3, 6, 7, 6, 3, -2}, 21},
		{"smoothing, quadratic and cubic", 3, 0, []float64{-21, 14, 39, 54, 59, 54, 39, 14, -21}, 231},
		{"first derivative, quadratic", 2, 1, []float64{-2, -1, 0, 1, 2}, 10},
		{"first derivative, quadratic", 2, 1, []float64{-3, -2, -1, 0, 1, 2, 3}, 28},
		{"first derivative, cubic and quartic", 3, 1, []float64{1, -8, 0, 8, -1}, 12},
		{"first derivative, cubic and quartic", 4, 1, []float64{22, -67, -58, 0, 58, 67, -22}, 252},
		{"second derivative, quadratic and cubic", 2, 2, []float64{2, -1, -2, -1, 2}, 7},
		{"second derivative, quadratic and cubic", 3, 2, []float64{5, 0, -3, -4, -3, 0, 5}, 42},
		{"second derivative, quartic", 4, 2, []float64{-13, 67, -19, -70, -19, 67, -13}, 132},
	} {
		const tick = 0x1p-10
		n := len(c.coefficients)
		for one, want := range c.coefficients {
			r := newRates(t, n, c.degree)
			for i := range n {
				pos := 0.0
				if i == one {
					pos = 1
				}
				got, at, ok := r.Add(1e6+tick*float64(i), pos)
				if ok != (i == n-1) {
					t.Fatalf("%s: ok %v at sample %d of %d", c.what, ok, i+1, n)
				}
				if !ok {
					continue
				}
				if at != 1e6+tick*float64(n/2) {
					t.Errorf("%s: at %v, want the middle", c.what, at)
				}
				value := [...]float64{got.Pos, got.Vel * tick, got.Acc * tick * tick}[c.derivative]
				if math.Abs(value-want/c.norm) > 2e-15 {
					t.Errorf("%s of %d, coefficient %d: %.17g, want %.17g", c.what, n, one, value, want/c.norm)
				}
			}
		}
	}
}

// A polynomial of the fitted degree comes back with its derivatives, at uneven
// times, long after the clock's zero, at any scale of time and place.
func TestRatesOfPolynomials(t *testing.T) {
	rnd := rand.New(rand.NewPCG(2, 1))
	for range 300 {
		degree := 1 + rnd.IntN(6)
		window := degree + 1 + rnd.IntN(20)
		tick := math.Ldexp(1, rnd.IntN(20)-20)
		start := math.Round(rnd.Float64()*1e5) * tick // so that times are exact
		var k [7]float64
		for i := range degree + 1 {
			k[i] = 2*rnd.Float64() - 1
		}
		// value and derivatives in ticks from the start
		poly := func(x float64) (y, d, dd float64) {
			x /= float64(window)
			for i := degree; i >= 0; i-- {
				dd = dd*x + 2*d
				d = d*x + y
				y = y*x + k[i]
			}
			return y, d / float64(window), dd / float64(window*window)
		}
		r := newRates(t, window, degree)
		x := 0.0
		for i := range 2 * window {
			x += float64(1+rnd.IntN(256)) / 256
			y, _, _ := poly(x)
			got, at, ok := r.Add(start+x*tick, y)
			if ok != (i >= window-1) {
				t.Fatalf("sample %d of %d: ok %v", i+1, window, ok)
			}
			if !ok {
				continue
			}
			y, d, dd := poly((at - start) / tick)
			// with samples bunched at random the last polynomials are small
			tol := 1e-13 * math.Pow(10, float64(degree-1)/2)
			if math.Abs(got.Pos-y) > tol || math.Abs(got.Vel*tick-d) > tol || math.Abs(got.Acc*tick*tick-dd) > tol {
				t.Fatalf("degree %d, window %d, tick %g: %v; want %g, %g, %g", degree, window, tick, got, y, d/tick, dd/tick/tick)
			}
		}
	}
}

// A long way and a long time from zero cost nothing but their own rounding.
func TestRatesFarFromZero(t *testing.T) {
	r := newRates(t, 9, 2)
	const tick, far = 1e-3, 1e6 * rigid.Revolution
	clock := 1.8e9 // seconds since 1970; a float64 there has steps of 2.4e-7 s
	for i := range 1000 {
		now := clock + tick*float64(i)
		got, at, ok := r.Add(now, far+30*(now-clock))
		if ok && (math.Abs(got.Vel-30) > 1e-6 || math.Abs(got.Pos-far-30*(at-clock)) > 2e-9) {
			t.Fatalf("sample %d: %v at %v", i, got, at)
		}
	}
}

func TestRatesRefuse(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	clean, dirty := newRates(t, 4, 2), newRates(t, 4, 2)
	for i := range 20 {
		now := float64(i)
		pos := now * now
		c, at, ok := clean.Add(now, pos)
		d, dAt, dOK := dirty.Add(now, pos)
		if c != d || at != dAt || ok != dOK {
			t.Fatalf("sample %d: a refused sample left a trace: %v, %v", i, d, c)
		}
		for _, bad := range []struct{ t, pos float64 }{
			{now, pos}, {now, 5}, {now - 0.5, 5}, {-inf, 5}, {nan, 5}, {inf, 5}, {now + 0.5, nan}, {now + 0.5, inf},
		} {
			if c, at, ok := dirty.Add(bad.t, bad.pos); ok || at != 0 || c != (rigid.Coordinate{}) {
				t.Fatalf("sample (%v, %v) after %v is taken: %v, %v, %v", bad.t, bad.pos, now, c, at, ok)
			}
		}
	}
	// after a Reset time may begin anew, and the window fills again
	dirty.Reset()
	for i := range 4 {
		now := float64(i - 100)
		c, at, ok := dirty.Add(now, 3*now)
		if ok != (i == 3) || ok && (math.Abs(c.Vel-3) > 1e-13 || at != -98.5) {
			t.Errorf("after Reset, sample %d: %v, %v, %v", i, c, at, ok)
		}
	}
}

func TestRatesOverflow(t *testing.T) {
	r := newRates(t, 2, 1)
	r.Add(0, 0)
	if c, at, ok := r.Add(1e-200, 1e200); ok || at != 0 || c != (rigid.Coordinate{}) {
		t.Errorf("a velocity beyond the numbers: %v, %v, %v", c, at, ok)
	}
}

func TestRatesWithoutAnswer(t *testing.T) {
	var zero encoder.Rates
	if c, at, ok := zero.Add(1, 1); ok || at != 0 || c != (rigid.Coordinate{}) {
		t.Errorf("the zero Rates: %v, %v, %v", c, at, ok)
	}
	zero.Reset()
	for _, c := range []struct {
		why       string
		time, pos [3]float64
	}{
		{"times overflow", [3]float64{-1e308, 0, 1e308}, [3]float64{0, 1, 2}},
		{"places overflow", [3]float64{0, 1, 2}, [3]float64{-1e308, 0, 1e308}},
		{"acceleration overflows", [3]float64{0, 1e-200, 2e-200}, [3]float64{0, 1, 0}},
		{"two of three samples at one time but for rounding", [3]float64{0, 1e-15, 1}, [3]float64{0, 1, 2}},
	} {
		r := newRates(t, 3, 2)
		for i := range 3 {
			if got, at, ok := r.Add(c.time[i], c.pos[i]); ok || at != 0 || got != (rigid.Coordinate{}) {
				t.Errorf("%s: %v at %v", c.why, got, at)
			}
		}
	}
}

// The middle of the window is the quietest place, as Rates promises: with noise of
// 1 the values have the variance of the published sums of squares, 17/35, 1/10, 2/7.
func TestRatesNoise(t *testing.T) {
	rnd := rand.New(rand.NewPCG(3, 1))
	r := newRates(t, 5, 2)
	var sum, square [3]float64
	n := 200_000
	if testing.Short() {
		n = 50_000
	}
	for i := range n {
		c, _, _ := r.Add(float64(i), rnd.NormFloat64())
		for k, x := range []float64{c.Pos, c.Vel, c.Acc} {
			sum[k] += x
			square[k] += x * x
		}
	}
	for k, want := range []float64{17.0 / 35, 1.0 / 10, 2.0 / 7} {
		if got := square[k]/float64(n) - sum[k]*sum[k]/float64(n*n); math.Abs(got/want-1) > 0.05 {
			t.Errorf("variance of derivative %d: %g, want %g", k, got, want)
		}
	}
}

func TestNewRatesErrors(t *testing.T) {
	for _, c := range []struct {
		window, degree int
		names          []string
	}{
		{2, 1, nil}, {7, 6, nil}, {65536, 2, nil},
		{2, 2, []string{"window"}}, {-1, 2, []string{"window"}}, {65537, 2, []string{"window"}},
		{9, 0, []string{"degree"}}, {9, 7, []string{"degree"}}, {0, -1, []string{"degree", "window"}},
	} {
		r, err := encoder.NewRates(c.window, c.degree)
		if (err == nil) != (c.names == nil) || (r == nil) != (err != nil) {
			t.Errorf("NewRates(%d, %d): %v, %v", c.window, c.degree, r, err)
			continue
		}
		if err == nil {
			continue
		}
		parts := []error{err}
		if joined, ok := err.(interface{ Unwrap() []error }); ok {
			parts = joined.Unwrap()
		}
		if len(parts) != len(c.names) || !errors.Is(err, rigid.ErrInput) {
			t.Errorf("NewRates(%d, %d): %v", c.window, c.degree, err)
			continue
		}
		for i, name := range c.names {
			if d, ok := errors.AsType[*rigid.DimensionError](parts[i]); !ok || d.Name != name {
				t.Errorf("NewRates(%d, %d): %v, want %s", c.window, c.degree, parts[i], name)
			}
		}
	}
}

func FuzzRates(f *testing.F) {
	f.Add(uint8(5), uint8(2), 0.0, 1.0, 2.0, 3.0, 0.0, 1.0)
	f.Add(uint8(3), uint8(2), 0.0, 1e-300, 1e300, 1e308, 1e308, -1e308)
	f.Add(uint8(2), uint8(1), math.NaN(), 1.0, 1.0, 0.0, 5.0, math.Inf(1))
	f.Fuzz(func(t *testing.T, window, degree uint8, t0, t1, t2, t3, x, y float64) {
		r, err := encoder.NewRates(int(window), int(degree))
		if err != nil {
			return
		}
		for i, now := range []float64{t0, t1, t2, t3, t3 + 1, t3 + 1.5, t3 + 1e3} {
			pos := x
			if i%2 == 1 {
				pos = y
			}
			c, at, ok := r.Add(now, pos)
			if !ok && (c != rigid.Coordinate{} || at != 0) {
				t.Fatalf("%v, %v without ok", c, at)
			}
			for _, v := range []float64{c.Pos, c.Vel, c.Acc, at} {
				if v*0 != 0 {
					t.Fatalf("%v at %v with ok", c, at)
				}
			}
			if ok && at > now {
				t.Fatalf("at %v, after the newest sample %v", at, now)
			}
		}
	})
}
