package slidercrank

import (
	"math"

	"example.com/twopoint/rigid"
)

// turns returns the crank's angles that have a position. Its ends are where σ = 0:
//
//	4rc cos²(φ/2) = e² − (r − c)²,  4rc sin²(φ/2) = (r + c)² − e²
func (k *slotForm) turns() []rigid.Interval {
	if k.r == 0 {
		return nil
	}
	if k.least > 0 {
		return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	}
	end := 2 * math.Atan2(math.Sqrt(k.most), math.Sqrt(-k.least))
	return []rigid.Interval{{Lo: -end, Hi: end}}
}

// deadCentres returns the crank's angles where ψ' = 0. The lower one comes first, at φ
// in (−π, 0); the upper one is in (0, π). The derivatives of the way back lead to
//
//	ψ'' = ∓r/σ
//
// as ξ goes to 0.
func (k *slotForm) deadCentres() []rigid.Coefficients {
	var found []rigid.Coefficients
	for _, side := range [...]float64{-1, 1} {
		if swing, sigma := k.deadCentre(side); sigma > 0 {
			found = append(found, rigid.Coefficients{
				In: swing + side*math.Pi/2, Out: swing, Second: -side * k.r / sigma,
			})
		}
	}
	return found
}

// deadCentre returns ψ and σ where the crank is at right angles to the line, the pin
// at r on the line's left normal through the crank pivot for side = 1, at −r for −1,
// and σ = 0 where it never is:
//
//	e + c sin ψ = ±r,  φ = ψ ± π/2,  σ = c cos ψ
func (k *slotForm) deadCentre(side float64) (swing, sigma float64) {
	y := side*k.r - k.e
	sigma, _ = leg(k.c, y, 0)
	return math.Atan2(y, sigma), sigma
}

// swings returns the angles of the line where it turns back, and those at the ends of
// turns, NaN for each that there is not. At these d = ieu, so that from |d − c| = r
//
//	u = (y − ix)/e,  x = (e² + c² − r²)/2c = |e| − (r − c + |e|)(r + c − |e|)/2c
//	y² = e² − x² = [e² − (r − c)²][(r + c)² − e²]/4c²
func (k *slotForm) swings() [4]float64 {
	var all [4]float64
	for i, side := range [...]float64{-1, 1} {
		all[i], all[2+i] = math.NaN(), math.NaN()
		if swing, sigma := k.deadCentre(side); sigma > 0 {
			all[i] = swing
		}
		if k.least < 0 {
			d, y := math.Abs(k.e), math.Sqrt(-k.least*k.most)/(2*k.c)
			p, q := k.gap+d, k.most/(k.r+k.c+d)
			if k.across > 0 {
				p = -k.least / p
			}
			all[2+i] = math.Atan2((p*q/(2*k.c)-d)*k.e, side*y*d)
		}
	}
	return all
}
