package dyad_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/num/hyperdual"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
)

// A signal is a scalar with its first and second derivative by time, carried by
// hyperdual numbers: what the closed forms return is compared with derivatives
// that no formula of theirs made.
type signal = hyperdual.Number

// polynomial returns a + b·t + c·t²/2 at t = 0.
func polynomial(a, b, c float64) signal {
	return signal{Real: a, E1mag: b, E2mag: b, E1E2mag: c}
}

// random returns a polynomial with its place in [lo, hi) and rates in [−3, 3).
func random(rng *rand.Rand, lo, hi float64) signal {
	return polynomial(lo+(hi-lo)*rng.Float64(), 6*rng.Float64()-3, 6*rng.Float64()-3)
}

// A track is a point of the plane that moves.
type track struct{ x, y signal }

func (p track) plus(q track) track { return track{hyperdual.Add(p.x, q.x), hyperdual.Add(p.y, q.y)} }
func (p track) times(f signal) track {
	return track{hyperdual.Mul(f, p.x), hyperdual.Mul(f, p.y)}
}
func (p track) left() track         { return track{hyperdual.Scale(-1, p.y), p.x} }
func (p track) minus(q track) track { return p.plus(q.times(signal{Real: -1})) }
func (p track) pos() r2.Vec         { return r2.Vec{X: p.x.Real, Y: p.y.Real} }
func (p track) vel() r2.Vec         { return r2.Vec{X: p.x.E1mag, Y: p.y.E1mag} }
func (p track) acc() r2.Vec         { return r2.Vec{X: p.x.E1E2mag, Y: p.y.E1E2mag} }

// heading returns the unit vector at an angle.
func heading(angle signal) track { return track{hyperdual.Cos(angle), hyperdual.Sin(angle)} }

// moving returns a point with random place and rates.
func moving(rng *rand.Rand) track { return track{random(rng, -1, 1), random(rng, -1, 1)} }

// near reports numbers that differ by more than tol.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.17g, want %.17g", what, got, want)
	}
}

func TestRPRAgainstHyperdualNumbers(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 1))
	for i := range 2000 {
		e := 2*rng.Float64() - 1
		angle, sigma, c := random(rng, -4, 4), random(rng, 0.3, 2), moving(rng)
		side := 1.0
		if i%2 == 1 {
			side, sigma = -1, hyperdual.Scale(-1, sigma)
		}
		u := heading(angle)
		a := c.plus(u.times(sigma)).plus(u.left().times(signal{Real: e}))
		d := a.minus(c)

		k := dyad.RPR{E: e}
		var s dyad.Slot
		if !k.Place(&s, d.pos(), side) {
			t.Fatalf("machine %d: no place", i)
		}
		near(t, "axis x", s.U.X, u.x.Real, 2e-14)
		near(t, "axis y", s.U.Y, u.y.Real, 2e-14)
		near(t, "sigma", s.Sigma, sigma.Real, 1e-14)
		omega, slide := k.Rates(&s, d.vel())
		near(t, "omega", omega, angle.E1mag, 1e-12)
		near(t, "slide", slide, sigma.E1mag, 1e-12)
		alpha, second := k.Rates(&s, k.Bias(&s, d.acc(), omega, slide))
		near(t, "alpha", alpha, angle.E1E2mag, 1e-11)
		near(t, "slide acceleration", second, sigma.E1E2mag, 1e-11)
		if t.Failed() {
			t.Fatalf("machine %d: e %v angle %v sigma %v", i, e, angle, sigma)
		}
	}
}

func TestRPRLimits(t *testing.T) {
	for _, row := range []struct {
		name  string
		e     float64
		d     r2.Vec
		ok    bool
		sigma float64
	}{
		{"3-4-5 triangle", 3, r2.Vec{X: 5}, true, 4},
		{"offset to the right", -3, r2.Vec{Y: 5}, true, 4},
		{"at the least distance", 3, r2.Vec{X: 3}, true, 0},
		{"inside the least distance", 3, r2.Vec{X: 2.9}, false, 0},
		{"pin in the pivot", 0, r2.Vec{}, false, 0},
		{"not a number", 0, r2.Vec{X: math.NaN()}, false, 0},
	} {
		k := dyad.RPR{E: row.e}
		s := dyad.Slot{Sigma: 7}
		if ok := k.Place(&s, row.d, 1); ok != row.ok {
			t.Errorf("%s: ok = %v", row.name, ok)
			continue
		}
		if !row.ok && s != (dyad.Slot{Sigma: 7}) {
			t.Errorf("%s: the place was touched: %v", row.name, s)
		}
		if row.ok {
			near(t, row.name, s.Sigma, row.sigma, 1e-15)
		}
	}
}

func TestRPRMargin(t *testing.T) {
	k := dyad.RPR{E: 3}
	var s dyad.Slot
	near(t, "margin of no size at all", (&dyad.RPR{}).Margin(&s, 0), 0, 0)
	if !k.Place(&s, r2.Vec{X: 5}, -1) {
		t.Fatal("no place")
	}
	near(t, "margin by the distance", k.Margin(&s, 2), 0.8, 1e-15)
	near(t, "margin by the size", k.Margin(&s, 8), 0.5, 1e-15)
}

func TestSlotAndLinesAllocateNothing(t *testing.T) {
	k := dyad.RPR{E: 0.1}
	var s dyad.Slot
	var m dyad.Meeting
	one, two := dyad.Line{U: r2.Vec{X: 1}}, dyad.Line{U: r2.Vec{Y: 1}}
	if n := testing.AllocsPerRun(100, func() {
		k.Place(&s, r2.Vec{X: 1, Y: 1}, 1)
		w, v := k.Rates(&s, r2.Vec{X: 1})
		k.Rates(&s, k.Bias(&s, r2.Vec{}, w, v))
		m.Place(&one, &two)
		m.Rates(r2.Sub(two.Drift(m.S2), one.Drift(m.S1)))
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
