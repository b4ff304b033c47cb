package planar

import (
	"math"
	"math/big"
	"math/bits"
)

// A residue is a number modulo the prime 2⁶¹ − 1. Equations whose coefficients are
// residues have an exact rank: no tolerance says what is zero. A rank taken at
// random places modulo p is the rank at almost all real places (Schwartz, Zippel).
type residue uint64

const prime = 1<<61 - 1

func (a residue) plus(b residue) residue {
	s := a + b
	if s >= prime {
		s -= prime
	}
	return s
}

func (a residue) negative() residue {
	if a == 0 {
		return 0
	}
	return prime - a
}

func (a residue) minus(b residue) residue { return a.plus(b.negative()) }

// times uses 2⁶¹ = 1 modulo p: the product's high and low 61 bits are added.
func (a residue) times(b residue) residue {
	hi, lo := bits.Mul64(uint64(a), uint64(b))
	return residue(lo & prime).plus(residue(hi<<3 | lo>>61))
}

// inverse is a^(p−2), by Fermat; 0 of 0.
func (a residue) inverse() residue {
	inv, power := residue(1), a
	for e := uint64(prime - 2); e > 0; e >>= 1 {
		if e&1 == 1 {
			inv = inv.times(power)
		}
		power = power.times(power)
	}
	return inv
}

// integer returns n modulo p.
func integer(n int64) residue {
	if n < 0 {
		return residue(uint64(-n) % prime).negative()
	}
	return residue(uint64(n) % prime)
}

// A coefficient is a number kept twice: as it is used, and as a residue, which
// tells exactly whether it is zero.
type coefficient struct {
	value float64
	exact residue
}

var one = coefficient{1, 1}

func (a coefficient) times(b coefficient) coefficient {
	return coefficient{a.value * b.value, a.exact.times(b.exact)}
}

func (a coefficient) plus(b coefficient) coefficient {
	return coefficient{a.value + b.value, a.exact.plus(b.exact)}
}

func (a coefficient) negative() coefficient {
	return coefficient{-a.value, a.exact.negative()}
}

func (a coefficient) inverse() coefficient {
	return coefficient{1 / a.value, a.exact.inverse()}
}

// quotient returns a/b of whole numbers.
func quotient(a, b int) coefficient {
	return coefficient{float64(a) / float64(b), integer(int64(a)).times(integer(int64(b)).inverse())}
}

// rational returns the simplest fraction within 1e-12 of x > 0, so that ratios of
// radii given as decimals are as exact as those of teeth; x itself, which is a
// whole number times a power of 2, where there is none with a short denominator.
func rational(x float64) coefficient {
	const enough, most = 1e-12, 1e6
	p0, q0, p1, q1 := 0.0, 1.0, 1.0, 0.0 // convergents of the continued fraction
	for r := x; ; r = 1 / (r - math.Floor(r)) {
		a := math.Floor(r)
		p0, q0, p1, q1 = p1, q1, a*p1+p0, a*q1+q0
		if !(p1 < most) || !(q1 < most) {
			return dyadic(x)
		}
		if math.Abs(p1/q1-x) <= enough*x {
			return quotient(int(p1), int(q1))
		}
	}
}

// dyadic returns a finite float64 exactly.
func dyadic(x float64) coefficient {
	r := new(big.Rat).SetFloat64(x)
	mod := func(n *big.Int) residue {
		return residue(new(big.Int).Mod(n, big.NewInt(prime)).Uint64())
	}
	return coefficient{x, mod(r.Num()).times(mod(r.Denom()).inverse())}
}
