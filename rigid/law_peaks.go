package rigid

import (
	"math"

	"example.com/twopoint/internal/root"
)

// A change is where a sign is lost on a part: between position a, the last with a
// sign, and b, the next with one. What lies between has none. Turns: the two differ.
type change struct {
	a, b  int // -1 and the length, where the part begins or ends without a sign
	turns bool
}

func changes(part []Coefficients, sign func(Coefficients) int) []change {
	var found []change
	a, before := -1, 0
	for b := range len(part) + 1 {
		after := 0
		if b < len(part) {
			if after = sign(part[b]); after == 0 {
				continue
			}
		}
		if turns := before*after < 0; turns || b > a+1 {
			found = append(found, change{a, b, turns})
		}
		a, before = b, after
	}
	return found
}

// deadCentres returns where First is 0 on a part between whose positions First only
// rises or only falls: exact are those where it changes sign, rough those where it
// but touches 0, and the ends of dwells, which go on for half a step at least.
func (s *scan) deadCentres(part []Coefficients) (exact, rough []Coefficients) {
	rest := func(c Coefficients) int { // 0 within what rounding of First and In can do
		return sign(c.First, min(rounding*(s.slope+math.Abs(c.In*c.Second)), LeastMargin*s.slope))
	}
	for _, ch := range changes(part, rest) {
		still := part[ch.a+1 : ch.b]
		switch n := len(still); {
		case n > 0 && still[n-1].In-still[0].In > (s.over.Hi-s.over.Lo)/(2*steps):
			rough = append(rough, s.dwell(part, ch.a+1, -1, rest), s.dwell(part, ch.b-1, 1, rest))
		case ch.turns:
			exact = s.cross(exact, part[ch.a], part[ch.b], first)
		default:
			least := still[0]
			for _, c := range still {
				if math.Abs(c.First) < math.Abs(least.First) {
					least = c
				}
			}
			rough = append(rough, least)
		}
	}
	return exact, rough
}

// dwell returns the end of a dwell beyond part[i], on the side that by tells.
func (s *scan) dwell(part []Coefficients, i, by int, rest func(Coefficients) int) Coefficients {
	end := part[i]
	if i+by < 0 || i+by == len(part) {
		return end
	}
	root.Bisect(func(x float64) bool {
		c, err := s.law.at(x)
		if err != nil || rest(c) != 0 {
			return false
		}
		end = c
		return true
	}, end.In, part[i+by].In)
	return end
}

// speedPeaks returns where Second changes sign on a part.
func (s *scan) speedPeaks(part []Coefficients) []Coefficients {
	var found []Coefficients
	for _, ch := range changes(part, func(c Coefficients) int { return sign(c.Second, s.noise()) }) {
		if ch.turns {
			found = s.cross(found, part[ch.a], part[ch.b], second)
		}
	}
	return found
}

// noise is what Second may be by rounding alone, where First stays the same.
func (s *scan) noise() float64 { return 16 * rounding * s.slope / (s.over.Hi - s.over.Lo) }

func first(c Coefficients) float64  { return c.First }
func second(c Coefficients) float64 { return c.Second }

// cross appends the position between a and b where the quantity changes sign, to the
// next float64. Where the law has no value on the way, or the quantity changes sign
// by growing without bound, there is none.
func (s *scan) cross(found []Coefficients, a, b Coefficients, quantity func(Coefficients) float64) []Coefficients {
	whole := true
	positive, most := quantity(a) > 0, math.Max(math.Abs(quantity(a)), math.Abs(quantity(b)))
	root.Bisect(func(x float64) bool {
		c, err := s.law.at(x)
		same := err == nil && quantity(c) > 0 == positive
		switch {
		case err != nil:
			whole = false
		case same:
			a = c
		default:
			b = c
		}
		return same
	}, a.In, b.In)
	if math.Abs(quantity(b)) < math.Abs(quantity(a)) {
		a = b
	}
	if !whole || math.Abs(quantity(a)) > most {
		return found
	}
	return append(found, a)
}

// accPeaks returns where Second turns from rising to falling on a part, or back.
func (s *scan) accPeaks(part []Coefficients) []Coefficients {
	var found []Coefficients
	level, rising := 0, 0 // where the present value was first met, and how
	for i := 1; i < len(part); i++ {
		was := part[level].Second
		now := sign(part[i].Second-was, s.noise()+rounding*math.Abs(was))
		if now == 0 {
			continue
		}
		if now != rising && rising != 0 {
			found = s.turn(found, part[level-1], part[i], rising)
		}
		level, rising = i, now
	}
	return found
}

// turn appends the position between a and b where Second is greatest, if it was
// rising, or least.
func (s *scan) turn(found []Coefficients, a, b Coefficients, rising int) []Coefficients {
	whole := true
	value := func(x float64) float64 {
		c, err := s.law.at(x)
		whole = whole && err == nil
		return -float64(rising) * c.Second
	}
	c, err := s.law.at(root.Minimum(value, a.In, b.In))
	if !whole || err != nil {
		return found
	}
	return append(found, c)
}
