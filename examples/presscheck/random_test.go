package main

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

func sampleConfigFor(t testing.TB) *config {
	t.Helper()
	c, err := readConfig("")
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func judged(t testing.TB, c *config, m made) *report {
	t.Helper()
	r, err := check(c, m.reader(), func(err error) error { return err })
	if err != nil {
		t.Fatalf("seed %d: %v", m.seed, err)
	}
	return r
}

// Each fault, of any size and place, gives its own verdict and no other.
func TestFaultsAreTold(t *testing.T) {
	either := func(rnd *rand.Rand, lo, hi float64) float64 {
		x := lo + (hi-lo)*rnd.Float64()
		if rnd.Uint64()&1 == 0 {
			return -x
		}
		return x
	}
	kinds := []struct {
		verdict string
		spoil   func(m *made, rnd *rand.Rand)
	}{
		{"", func(m *made, rnd *rand.Rand) {}},
		{"", func(m *made, rnd *rand.Rand) { m.crank += either(rnd, 0, 0.00009) }},
		{"link: crank", func(m *made, rnd *rand.Rand) { m.crank += either(rnd, 0.0002, 0.005) }},
		{"link: rod", func(m *made, rnd *rand.Rand) { m.rod += either(rnd, 0.001, 0.008) }},
		{"link: offset", func(m *made, rnd *rand.Rand) { m.offset += either(rnd, 0.001, 0.005) }},
		{"slip", func(m *made, rnd *rand.Rand) {
			rate := 0.0004 + 0.01*rnd.Float64()*rnd.Float64()
			m.slip = func(turned float64) float64 { return rate * math.Abs(turned) / 6 * sign(m.speed) }
		}},
		{"slip", func(m *made, rnd *rand.Rand) {
			at, size, length := 2+28*rnd.Float64(), 0.003+0.05*rnd.Float64(), 0.3+rnd.Float64()
			m.slip = func(turned float64) float64 {
				return size * min(max((math.Abs(turned)-at)/length, 0), 1) * sign(m.speed)
			}
		}},
		{"missed counts", func(m *made, rnd *rand.Rand) {
			at, n := 1+14*rnd.Float64(), int64(either(rnd, 12, 3000))
			m.lost = func(t float64) int64 {
				if t > at {
					return n
				}
				return 0
			}
		}},
		{"scatter", func(m *made, rnd *rand.Rand) { m.noise = 1e-4 }},
		{"pattern", func(m *made, rnd *rand.Rand) { // a coupling that does not turn evenly
			k := either(rnd, 2e-4, 5e-4)
			m.slip = func(turned float64) float64 { return k / 0.12 * math.Sin(3*turned) }
		}},
	}
	n := 8
	if testing.Short() {
		n = 1
	}
	for i, kind := range kinds {
		for k := range n {
			seed := uint64(1000*i + k)
			rnd := rand.New(rand.NewPCG(seed, 1))
			m := good(seed)
			m.zero, m.start, m.scale = int64(20480*rnd.Float64()), 7*rnd.Float64(), either(rnd, 0, 0.3)
			if rnd.Uint64()&1 == 0 {
				m.speed = -m.speed
			}
			kind.spoil(&m, rnd)
			r := judged(t, sampleConfigFor(t), m)
			if got := strings.Join(r.Verdict.Faults, ", "); got != kind.verdict || r.Verdict.Why != "" {
				t.Errorf("seed %d: %q, want %q (%s)\n%+v", seed, got, kind.verdict, r.Verdict.Why, r)
			}
		}
	}
}
