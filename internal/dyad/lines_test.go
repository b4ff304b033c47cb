package dyad_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
)

// line returns the guide through a moving point at a moving angle.
func line(g track, angle signal, e float64) dyad.Line {
	return dyad.Line{
		G: g.pos(), V: g.vel(), A: g.acc(), U: heading(angle).pos(),
		Omega: angle.E1mag, Alpha: angle.E1E2mag, E: e,
	}
}

func TestMeetingAgainstHyperdualNumbers(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 2))
	for i := range 2000 {
		e1, e2 := 2*rng.Float64()-1, 2*rng.Float64()-1
		th1 := random(rng, -4, 4)
		th2 := th1
		th2.Real += 0.3 + 2.5*rng.Float64()
		if i%4 != 0 { // every fourth pair of guides turns together
			th2.E1mag, th2.E2mag, th2.E1E2mag = 1.3, 1.3, -0.7
		}
		g1, s1, s2 := moving(rng), random(rng, -2, 2), random(rng, -2, 2)
		u1, u2 := heading(th1), heading(th2)
		pin := g1.plus(u1.times(s1)).plus(u1.left().times(signal{Real: e1}))
		g2 := pin.minus(u2.times(s2)).minus(u2.left().times(signal{Real: e2}))

		one, two := line(g1, th1, e1), line(g2, th2, e2)
		var m dyad.Meeting
		if !m.Place(&one, &two) {
			t.Fatalf("machine %d: no place", i)
		}
		near(t, "s1", m.S1, s1.Real, 1e-13)
		near(t, "s2", m.S2, s2.Real, 1e-13)
		v1, v2 := m.Rates(r2.Sub(two.Drift(m.S2), one.Drift(m.S1)))
		near(t, "s1 rate", v1, s1.E1mag, 1e-12)
		near(t, "s2 rate", v2, s2.E1mag, 1e-12)
		a1, a2 := m.Rates(r2.Sub(two.Bias(m.S2, v2), one.Bias(m.S1, v1)))
		near(t, "s1 acceleration", a1, s1.E1E2mag, 1e-11)
		near(t, "s2 acceleration", a2, s2.E1E2mag, 1e-11)
		near(t, "margin", m.Margin(), math.Abs(math.Sin(th2.Real-th1.Real)), 1e-15)
		if t.Failed() {
			t.Fatalf("machine %d: e %v %v", i, e1, e2)
		}
	}
}

func TestMeetingOfParallelLines(t *testing.T) {
	u := r2.Vec{X: 0.6, Y: 0.8}
	for _, row := range []struct {
		name string
		g    r2.Vec
	}{
		{"apart", r2.Vec{X: 1}},
		{"on one another", r2.Vec{}},
		{"not a number", r2.Vec{X: math.NaN()}},
	} {
		one, two := dyad.Line{U: u}, dyad.Line{G: row.g, U: u}
		m := dyad.Meeting{S1: 7}
		if m.Place(&one, &two) || m.S1 != 7 {
			t.Errorf("%s: a place was found or written: %v", row.name, m)
		}
	}
}
