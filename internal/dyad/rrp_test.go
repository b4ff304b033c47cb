package dyad_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/num/hyperdual"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
)

func TestRRPAgainstHyperdualNumbers(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 3))
	for i := range 2000 {
		e, angle, s, g := 2*rng.Float64()-1, random(rng, -4, 4), random(rng, -2, 2), moving(rng)
		length := signal{Real: 0.2 + rng.Float64()}
		if i%4 != 0 { // every fourth rod keeps its length
			length = random(rng, 0.2, 1.2)
		}
		side := 1 - 2*float64(i%2)
		tilt := random(rng, -1.3, 1.3) // of the rod against the guide, or its other way
		th := hyperdual.Add(tilt, angle)
		if side < 0 {
			th.Real += math.Pi
		}
		u := heading(angle)
		pin := g.plus(u.times(s)).plus(u.left().times(signal{Real: e}))
		a := pin.minus(heading(th).times(length))

		guide := line(g, angle, e)
		k := dyad.RRP{L: length.Real, Grow: length.E1mag / length.Real, Grow2: length.E1E2mag / length.Real}
		p, at, ok := k.PlaceOn(a.pos(), &guide, side)
		if !ok {
			t.Fatalf("machine %d: no place", i)
		}
		near(t, "slide", at, s.Real, 2e-14)
		axis := k.Axis(p, guide.U)
		near(t, "axis x", axis.X, math.Cos(th.Real), 5e-14)
		near(t, "axis y", axis.Y, math.Sin(th.Real), 5e-14)
		near(t, "unit axis", math.Hypot(axis.X, axis.Y), 1, 4e-16)
		near(t, "margin", k.Margin(p), math.Cos(tilt.Real), 5e-14)
		v := guide.Axes(r2.Sub(a.vel(), guide.Drift(at)))
		omega, slide := p.Rates(k.Drift(p, v))
		near(t, "omega", omega, th.E1mag, 1e-11)
		near(t, "speed", slide, s.E1mag, 1e-11)
		b := guide.Axes(r2.Sub(a.acc(), guide.Bias(at, slide)))
		alpha, second := p.Rates(k.Bias(p, b, omega))
		near(t, "alpha", alpha, th.E1E2mag, 1e-10)
		near(t, "acceleration", second, s.E1E2mag, 1e-10)
		if t.Failed() {
			t.Fatalf("machine %d: e %v angle %v length %v tilt %v", i, e, angle, length, tilt)
		}
	}
}

func TestRRPLimits(t *testing.T) {
	for _, row := range []struct {
		name string
		eta  float64
		side float64
		ok   bool
		xi   float64
	}{
		{"3-4-5 triangle", 3, 1, true, 4},
		{"below, behind", -3, -1, true, -4},
		{"square to the guide", 5, 1, true, 0},
		{"out of reach", 5.0001, 1, false, 0},
		{"out of reach below", -5.0001, 1, false, 0},
		{"not a number", math.NaN(), 1, false, 0},
		{"infinite", math.Inf(1), 1, false, 0},
	} {
		k := dyad.RRP{L: 5}
		p, ok := k.Place(row.eta, row.side)
		if ok != row.ok {
			t.Errorf("%s: ok = %v", row.name, ok)
		}
		if ok {
			near(t, row.name, p.Xi, row.xi, 1e-15)
			near(t, row.name+": margin", k.Margin(p), math.Abs(row.xi)/5, 1e-15)
		}
	}
}

func TestRRPAllocatesNothing(t *testing.T) {
	k, g := dyad.RRP{L: 1}, dyad.Line{U: r2.Vec{X: 1}}
	var rates float64
	if n := testing.AllocsPerRun(100, func() {
		p, _, _ := k.PlaceOn(r2.Vec{Y: 0.5}, &g, 1)
		w, _ := p.Rates(k.Drift(p, r2.Vec{X: 1}))
		rates, _ = p.Rates(k.Bias(p, r2.Vec{}, w))
		k.Axis(p, g.U)
		k.PlaceOn(r2.Vec{Y: 2}, &g, 1)
	}); n != 0 || math.IsNaN(rates) {
		t.Errorf("%v allocations", n)
	}
}
