package dyad

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// RPR holds the constant of a block that slides on a link between two revolute
// joints: A, on the block, lies at distance E left of the line through C along
// the slot, where C is the joint of the link with the slot.
type RPR struct {
	E float64
}

// Slot is the place of an RPR dyad, d = A − C = Sigma·U + E·U⊥: the unit vector
// along the slot, and how far along it A lies.
type Slot struct {
	U     r2.Vec
	Sigma float64
}

// Place solves the place of the dyad for d = A − C on the given side, +1 for A
// ahead of C along the slot and −1 for behind. With complex numbers for vectors
//
//	d = U·(σ + ie),  σ² = |d|² − e²  ⇒  U = d·(σ − ie)/|d|²
//
// It reports false where A is nearer to C than |E|, or in it, and leaves t as it
// was; at that limit Sigma is 0 and there are no rates.
func (k *RPR) Place(t *Slot, d r2.Vec, side float64) bool {
	d2 := d.X*d.X + d.Y*d.Y
	l, e := math.Sqrt(d2), math.Abs(k.E)
	p := (l - e) * (l + e)
	if !(p >= 0) || d2 == 0 {
		return false
	}
	s := side * math.Sqrt(p)
	u, v := s/d2, k.E/d2
	t.U = unit(r2.Vec{X: u*d.X + v*d.Y, Y: u*d.Y - v*d.X})
	t.Sigma = s
	return true
}

// Rates returns the slot's angular velocity and the speed along it from
// v = vA − vC, or their derivatives from the w of Bias: v = ω d⊥ + σ' U, whence
//
//	ω = v·U⊥/σ,  σ' = v·U + ωe
func (k *RPR) Rates(t *Slot, v r2.Vec) (omega, slide float64) {
	omega = (v.Y*t.U.X - v.X*t.U.Y) / t.Sigma
	return omega, v.X*t.U.X + v.Y*t.U.Y + omega*k.E
}

// Bias returns the w of Rates for the second derivatives, a = aA − aC less the
// normal and the Coriolis term:
//
//	w = a + ω²(σ U + e U⊥) − 2ωσ' U⊥
func (k *RPR) Bias(t *Slot, a r2.Vec, omega, slide float64) r2.Vec {
	u, w2 := t.U, omega*omega
	along, left := w2*t.Sigma, w2*k.E-2*omega*slide
	return r2.Vec{X: a.X + along*u.X - left*u.Y, Y: a.Y + along*u.Y + left*u.X}
}

// Margin returns |σ| over the greater of |d| and size, the largest distance
// between joints that the caller knows: |σ|/|d| alone is 1 however near A comes to
// C where E is 0. It is 0 where all of them are.
func (k *RPR) Margin(t *Slot, size float64) float64 {
	s := math.Abs(t.Sigma)
	if l := max(math.Hypot(t.Sigma, k.E), size); l > 0 {
		return s / l
	}
	return 0
}
