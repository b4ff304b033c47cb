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
	e := math.Abs(k.e)
	end := 2 * math.Atan2(math.Sqrt((k.r+k.c-e)*(k.r+k.c+e)), math.Sqrt(-k.least))
	return []rigid.Interval{{Lo: -end, Hi: end}}
}

// deadCentres returns the crank's angles where ψ' = 0, the crank being at right
// angles to the line: the pin is at ±r on the line's left normal through the crank
// pivot, so that
//
//	e + c sin ψ = ±r,  φ = ψ ± π/2,  ψ'' = ∓r/σ with σ = c cos ψ
//
// of which the last is the limit that the derivatives of the way back lead to, ξ
// going to 0. The lower one comes first, at φ in (−π, 0); the upper one is in (0, π).
func (k *slotForm) deadCentres() []rigid.Coefficients {
	var found []rigid.Coefficients
	for _, side := range [...]float64{-1, 1} {
		cos, ok := leg(k.c, side*k.r-k.e, 0)
		if !ok || cos == 0 {
			continue
		}
		swing := math.Atan2(side*k.r-k.e, cos)
		found = append(found, rigid.Coefficients{
			In: swing + side*math.Pi/2, Out: swing, Second: -side * k.r / cos,
		})
	}
	return found
}
