// Package encoder turns the counts of an encoder into angles and rates.
//
// A count is whole, so an [Encoder] splits it into whole turns and the part of a
// turn that is left, by whole numbers: after 1e9 turns the angle is as exact as in
// the first. [Rates] makes velocity and acceleration of samples, which a difference
// of two counts gives only with the noise of both.
//
// Turns and angles are positive counter-clockwise, angles in rad, times in s. The
// package knows nothing of missed counts or of a shaft that slips: what it tells is
// as good as the encoder, and no safety function.
package encoder

import (
	"math"
	"math/bits"

	"example.com/twopoint/rigid"
)

// An Encoder says what the counts of an encoder mean. The zero Encoder refuses
// every count.
type Encoder struct {
	PerTurn int64 `json:"perTurn"` // counts in a turn of the shaft in question, after gearing and quadrature; at least 1
	Zero    int64 `json:"zero"`    // the count at which the shaft stands at turn 0, angle 0
	Reverse bool  `json:"reverse"` // counts grow as the shaft turns clockwise
}

// Angle returns where the shaft stands at a count: whole turns, and the angle
// beyond them in rad, in [0, 2π). Turns are rounded down, so that a quarter turn
// clockwise from zero is turn −1 and 3π/2. The whole angle is
//
//	turns·2π + angle
//
// or float64(turns)*rigid.Revolution+angle where a float64 has the digits for it.
// The relative error of angle is below 3e-16, for a PerTurn up to 2⁵³. ErrInput for
// a PerTurn below 1 and where count less Zero is beyond an int64.
func (e Encoder) Angle(count int64) (turns int64, angle float64, err error) {
	n, ok := e.fromZero(count)
	if !ok || e.PerTurn < 1 {
		return 0, 0, rigid.ErrInput
	}
	turns, part := n/e.PerTurn, n%e.PerTurn
	if part < 0 {
		turns, part = turns-1, part+e.PerTurn
	}
	angle = float64(part) / float64(e.PerTurn) * rigid.Revolution
	return turns, min(angle, belowTurn), nil
}

// belowTurn is the greatest angle below a whole turn: that of the last count of a
// PerTurn beyond 2⁵³, which a float64 rounds to all of it.
var belowTurn = math.Nextafter(rigid.Revolution, 0)

// Count returns the count nearest to turns·2π + angle, halves away from zero before
// Zero is added: the inverse of Angle, exact for a PerTurn below 2⁴⁹. The angle, in
// rad, may be any, negative or beyond a turn. ErrInput for a PerTurn below 1 and
// where the count, it less Zero, or the part of the angle alone is beyond an int64;
// ErrNotFinite where the angle is NaN or infinite.
func (e Encoder) Count(turns int64, angle float64) (int64, error) {
	if e.PerTurn < 1 {
		return 0, rigid.ErrInput
	}
	if math.IsNaN(angle) || math.IsInf(angle, 0) {
		return 0, rigid.ErrNotFinite
	}
	part := math.Round(angle / rigid.Revolution * float64(e.PerTurn))
	if math.Abs(part) >= 0x1p63 {
		return 0, rigid.ErrInput
	}
	n, ok := multiplyAdd(turns, e.PerTurn, int64(part))
	if !ok {
		return 0, rigid.ErrInput
	}
	count, ok := e.toCount(n)
	if !ok {
		return 0, rigid.ErrInput
	}
	return count, nil
}

// fromZero returns the counts from zero, positive counter-clockwise.
func (e Encoder) fromZero(count int64) (n int64, ok bool) {
	if e.Reverse {
		return subtract(e.Zero, count)
	}
	return subtract(count, e.Zero)
}

// toCount is the inverse of fromZero.
func (e Encoder) toCount(n int64) (count int64, ok bool) {
	if e.Reverse {
		return subtract(e.Zero, n)
	}
	count = e.Zero + n
	return count, (count < e.Zero) == (n < 0)
}

// subtract returns x − y and whether that is an int64.
func subtract(x, y int64) (int64, bool) {
	d := x - y
	return d, (d < x) == (y > 0)
}

// multiplyAdd returns x·y + z, y positive, and whether that is an int64. The product
// is made with 128 bits: it may be beyond an int64 where the sum is not.
func multiplyAdd(x, y, z int64) (int64, bool) {
	hi, lo := bits.Mul64(uint64(x), uint64(y))
	if x < 0 {
		hi -= uint64(y) // two's complement: x stands for x + 2⁶⁴
	}
	lo, carry := bits.Add64(lo, uint64(z), 0)
	hi, _ = bits.Add64(hi, uint64(z>>63), carry)
	return int64(lo), hi == uint64(int64(lo)>>63)
}
