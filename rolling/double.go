package rolling

import (
	"math"
	"math/big"

	"example.com/twopoint/internal/trig"
)

// A double is a number as the sum of two float64, lo smaller than a unit in the
// last place of hi: about 32 digits (Dekker 1971). Ratios and angles are kept so,
// so that after a million turns an angle has no error but that of the angle given.
//
// Conversions such as float64(a*b) keep a product from being fused with a sum.
type double struct{ hi, lo float64 }

// doubleOf returns r with 32 digits; hi is infinite where r is too large.
func doubleOf(r *big.Rat) double {
	hi, _ := r.Float64()
	if math.IsInf(hi, 0) {
		return double{hi: hi}
	}
	rest := new(big.Rat).SetFloat64(hi)
	lo, _ := rest.Sub(r, rest).Float64()
	return double{hi, lo}
}

// product returns a·b without error.
func product(a, b float64) double {
	p := float64(a * b)
	return double{p, math.FMA(a, b, -p)}
}

// times returns d·x.
func (d double) times(x float64) double {
	p := product(d.hi, x)
	p.lo += d.lo * x
	return p
}

// by returns d·e.
func (d double) by(e double) double {
	p := d.times(e.hi)
	p.lo += d.hi * e.lo
	return p
}

// plus returns d + e, by Knuth's sum without error of the leading parts.
func (d double) plus(e double) double {
	s := d.hi + e.hi
	t := s - d.hi
	lo := (d.hi - (s - t)) + (e.hi - t) + (d.lo + e.lo)
	hi := s + lo
	return double{hi, lo - (hi - s)}
}

// inverse returns 1/d to 32 digits, by one step of Newton's method.
func (d double) inverse() double {
	q := 1 / d.hi
	rest := math.FMA(-q, d.hi, 1) - q*d.lo
	return double{q, q * rest}
}

// float returns the float64 nearest to d.
func (d double) float() float64 { return d.hi + d.lo }

// sincos returns sine and cosine of the angle d, by the sum of two angles.
func (d double) sincos() (sin, cos float64) {
	s, c := trig.Sincos(d.hi)
	sl, cl := d.lo, 1.0
	if math.Abs(d.lo) > 1e-8 { // 1 − cos d.lo would no longer be below rounding
		sl, cl = trig.Sincos(d.lo)
	}
	return s*cl + c*sl, c*cl - s*sl
}
