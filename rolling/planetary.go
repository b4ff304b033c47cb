package rolling

import (
	"errors"
	"math"
)

// Causes for which the gears of a planetary stage do not fit together.
var (
	// ErrTeeth: sun, planet and ring do not have one axis.
	ErrTeeth = errors.New("twopoint: ring teeth must be sun + 2 × planet, or sun + planet + step")
	// ErrSpacing: equally spaced planets do not mesh with sun and ring at once.
	ErrSpacing = errors.New("twopoint: so many planets cannot be assembled at equal spacing")
	// ErrNeighbours: the tips of neighbouring planets run into each other.
	ErrNeighbours = errors.New("twopoint: so many planets touch their neighbours")
)

// A Planetary is a stage of a sun, a ring and planets on a carrier, by its numbers of
// teeth. In a stepped planet Planet meshes with the sun, and Step, a second gear
// fixed to it, with the ring. More fields may come: write keyed literals.
type Planetary struct {
	Sun     int `json:"sun"`
	Planet  int `json:"planet"`
	Step    int `json:"step"` // 0: the planets are not stepped
	Ring    int `json:"ring"`
	Planets int `json:"planets"` // how many, for CheckSpacing and CheckNeighbours
}

// mostTeeth keeps the products of two numbers of teeth within 64 bits.
const mostTeeth = 1e9

// Meshes returns the stage's two meshes: the planet, one member for all of them as
// they turn alike, with sun and ring.
func (p Planetary) Meshes(sun, planet, ring, carrier Member) []Mesh {
	return []Mesh{
		{A: sun, B: planet, Arm: carrier, TeethA: p.Sun, TeethB: p.Planet},
		{A: planet, B: ring, Arm: carrier, TeethA: p.step(), TeethB: p.Ring, Internal: true},
	}
}

// CheckTeeth reports whether sun, planets and ring of one module, without profile
// shift, have one axis:
//
//	Ring = Sun + 2·Planet,  Ring = Sun + Planet + Step  for stepped planets
//
// If not it returns a *rigid.DimensionError with Name Ring and ErrTeeth; for teeth
// below one ErrNotPositive, above 1e9 ErrInput.
func (p Planetary) CheckTeeth() error {
	r := p.check()
	if r.OK() && int64(p.Ring) != int64(p.Sun)+int64(p.Planet)+int64(p.step()) {
		r.Add("Ring", float64(p.Ring), ErrTeeth)
	}
	return r.Err()
}

// CheckSpacing reports whether the planets, all alike, can be assembled at equal
// spacing. One more planet fits where the first was when, with the ring held, the
// carrier has gone on by 1/Planets of a turn: the sun must then stand, to a tooth, as
// a planet set into the ring at any of its teeth meets it, which is so when
//
//	(Sun + Ring)/Planets,  (Sun·Step + Ring·Planet)/(Planets·gcd(Planet, Step))  if stepped
//
// is whole. If not it returns a *rigid.DimensionError with Name Planets and
// ErrSpacing; other errors as CheckTeeth, and ErrNotPositive without planets.
func (p Planetary) CheckSpacing() error {
	r := p.checkPlanets()
	if r.OK() {
		planet, step := int64(p.Planet), int64(p.step())
		meets := int64(p.Sun)*step + int64(p.Ring)*planet
		if meets/gcd(planet, step)%int64(p.Planets) != 0 {
			r.Add("Planets", float64(p.Planets), ErrSpacing)
		}
	}
	return r.Err()
}

// CheckNeighbours reports whether equally spaced planets stay clear of each other,
// with teeth that stand one module over the pitch circle, which is common practice:
//
//	(Sun + Planet)·sin(π/Planets) > max(Planet, Step) + 2
//
// If not it returns a *rigid.DimensionError with Name Planets and ErrNeighbours;
// other errors as CheckSpacing.
func (p Planetary) CheckNeighbours() error {
	r := p.checkPlanets()
	chord := float64(p.Sun+p.Planet) * math.Sin(math.Pi/float64(p.Planets))
	if r.OK() && p.Planets > 1 && chord <= float64(max(p.Planet, p.Step)+2) {
		r.Add("Planets", float64(p.Planets), ErrNeighbours)
	}
	return r.Err()
}

// step returns the teeth of the planet's gear that meshes with the ring.
func (p Planetary) step() int {
	if p.Step == 0 {
		return p.Planet
	}
	return p.Step
}

func (p Planetary) check() *report {
	r := &report{}
	p.count(r, "Sun", p.Sun)
	p.count(r, "Planet", p.Planet)
	p.count(r, "Step", p.step())
	p.count(r, "Ring", p.Ring)
	return r
}

func (p Planetary) checkPlanets() *report {
	r := p.check()
	p.count(r, "Planets", p.Planets)
	return r
}

func (p Planetary) count(r *report, name string, z int) {
	r.teeth(name, z)
	if z > mostTeeth {
		r.Add(name, float64(z), errMany)
	}
}

func gcd(a, b int64) int64 {
	for b != 0 {
		a, b = b, a%b
	}
	return a
}
