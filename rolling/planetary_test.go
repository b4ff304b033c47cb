package rolling_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

func TestPlanetaryChecks(t *testing.T) {
	good := rolling.Planetary{Sun: 24, Planet: 18, Ring: 60, Planets: 3}
	for name, err := range map[string]error{"teeth": good.CheckTeeth(), "spacing": good.CheckSpacing(), "neighbours": good.CheckNeighbours()} {
		if err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
	for _, row := range []struct {
		name  string
		p     rolling.Planetary
		check func(rolling.Planetary) error
		field string
		cause error
	}{
		{"ring too small", rolling.Planetary{Sun: 24, Planet: 18, Ring: 59}, rolling.Planetary.CheckTeeth, "Ring", rolling.ErrTeeth},
		{"stepped", rolling.Planetary{Sun: 24, Planet: 30, Step: 16, Ring: 84}, rolling.Planetary.CheckTeeth, "Ring", rolling.ErrTeeth},
		{"no sun", rolling.Planetary{Planet: 18, Ring: 60}, rolling.Planetary.CheckTeeth, "Sun", rigid.ErrNotPositive},
		{"too many teeth", rolling.Planetary{Sun: 24, Planet: 18, Ring: 1e9 + 1}, rolling.Planetary.CheckTeeth, "Ring", rigid.ErrInput},
		{"no planets", rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}, rolling.Planetary.CheckSpacing, "Planets", rigid.ErrNotPositive},
		{"five of 84", rolling.Planetary{Sun: 24, Planet: 18, Ring: 60, Planets: 5}, rolling.Planetary.CheckSpacing, "Planets", rolling.ErrSpacing},
		{"eight too thick", rolling.Planetary{Sun: 24, Planet: 18, Ring: 60, Planets: 7}, rolling.Planetary.CheckNeighbours, "Planets", rolling.ErrNeighbours},
		{"negative step", rolling.Planetary{Sun: 24, Planet: 18, Step: -1, Ring: 60, Planets: 7}, rolling.Planetary.CheckNeighbours, "Step", rigid.ErrNotPositive},
	} {
		err := row.check(row.p)
		checkRefused(t, err != nil, err, row.field, row.cause)
	}
	if err := (rolling.Planetary{Sun: 24, Planet: 30, Step: 16, Ring: 70}).CheckTeeth(); err != nil {
		t.Error(err)
	}
	if err := (rolling.Planetary{Sun: 24, Planet: 18, Ring: 60, Planets: 1}).CheckNeighbours(); err != nil {
		t.Error(err)
	}
}

// fits reports whether planets at equal spacing mesh with a sun and a ring at once, by
// trying: teeth of each gear stand at equal angles, with one planet in mesh; another
// of the same shape, at any of the turns in which its step fits the ring, must fit the
// sun. Angles are counted in turns.
func fits(p rolling.Planetary) bool {
	step := p.Step
	if step == 0 {
		step = p.Planet
	}
	whole := func(x float64) bool { return math.Abs(x-math.Round(x)) < 1e-9 }
	for k := 1; k < p.Planets; k++ {
		at := float64(k) / float64(p.Planets)
		fit := false
		for j := range step {
			// on the line of centres the ring is at phase at·Ring; the step, turned by
			// δ and seen from there at δ − at, meshes where (δ − at)·Step ≡ −at·Ring
			delta := at - (at*float64(p.Ring)-float64(j))/float64(step)
			// towards the sun the planet's phase is (δ − at)·Planet, the sun's at·Sun
			fit = fit || whole((delta-at)*float64(p.Planet)-at*float64(p.Sun))
		}
		if !fit {
			return false
		}
	}
	return true
}

// TestSpacingByTrying compares the condition with a search over tooth positions.
func TestSpacingByTrying(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 9))
	yes := 0
	for range 5000 {
		p := rolling.Planetary{Sun: 10 + rng.IntN(40), Planet: 10 + rng.IntN(30), Ring: 40 + rng.IntN(80), Planets: 2 + rng.IntN(5)}
		if rng.IntN(2) == 0 {
			p.Step = 10 + rng.IntN(30)
		}
		want := fits(p)
		if got := p.CheckSpacing() == nil; got != want {
			t.Fatalf("%+v: %v, by trying %v", p, got, want)
		}
		if want {
			yes++
		}
	}
	if yes < 500 || yes > 4500 {
		t.Fatalf("%d of 5000 fit: no test", yes)
	}
}
