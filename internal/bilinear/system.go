// Package bilinear finds all solutions of square systems of bilinear forms, by
// continuation from a product start system (Morgan & Sommese 1987, from memory).
//
// The unknowns are two points z and w of projective spaces of one dimension, each
// held to a linear subspace; every equation is linear in z and linear in w.
package bilinear

import (
	"errors"
	"math"
	"math/cmplx"
)

// A Term is Coef·z[I]·w[J].
type Term struct {
	I, J int
	Coef complex128
}

// A System asks, with L the number of rows of Z and of W, that
//
//	Z·z = 0,  W·w = 0,  Σ terms of every form = 0
//
// for z and w of 2L+1 numbers each, of which a common factor does not matter. The
// last number of each is 0 at infinity. There must be 2L forms; then there are at
// most C(2L, L) isolated solutions.
type System struct {
	Z, W  [][]complex128
	Forms [][]Term
}

// An End is where a path ends: z and w of unit length.
type End struct {
	Z, W     []complex128
	Regular  bool // Newton's method converges there as to a simple solution
	Infinite bool
}

// ErrRank is returned for linear equations that depend on each other.
var ErrRank = errors.New("bilinear: dependent linear equations")

// ErrLost is returned where a path cannot be followed.
var ErrLost = errors.New("bilinear: a path is lost")

// Paths returns C(2L, L), the number of paths for L rows.
func Paths(l int) float64 {
	n := 1.0
	for i := 1; i <= l; i++ {
		n = n * float64(l+i) / float64(i)
	}
	return math.Round(n)
}

// null returns an orthonormal basis of the vectors x for which rows·x = 0, by Gram
// and Schmidt's method, twice over: first of the rows, conjugated, then of the unit
// vectors, the one that is farthest from what there is first.
func null(rows [][]complex128, n int) ([][]complex128, error) {
	var basis [][]complex128
	for _, r := range rows {
		v := make([]complex128, n)
		for i, x := range r {
			v[i] = cmplx.Conj(x)
		}
		size := norm(v)
		if !(size > 0) || !(without(v, basis) > 1e-12*size) {
			return nil, ErrRank
		}
		basis = append(basis, unit(v))
	}
	for len(basis) < n {
		var best []complex128
		most := 0.0
		for i := range n {
			v := make([]complex128, n)
			v[i] = 1
			if left := without(v, basis); left > most {
				best, most = v, left
			}
		}
		basis = append(basis, unit(best))
	}
	return basis[len(rows):], nil
}

// without takes from v what lies in an orthonormal basis, and returns the length of
// what is left.
func without(v []complex128, basis [][]complex128) float64 {
	for range 2 {
		for _, b := range basis {
			k := complex128(0)
			for i, x := range b {
				k += cmplx.Conj(x) * v[i]
			}
			for i, x := range b {
				v[i] -= k * x
			}
		}
	}
	return norm(v)
}

func norm(v []complex128) float64 {
	sum := 0.0
	for _, x := range v {
		sum += real(x)*real(x) + imag(x)*imag(x)
	}
	return math.Sqrt(sum)
}

func unit(v []complex128) []complex128 {
	k := complex(1/norm(v), 0)
	for i := range v {
		v[i] *= k
	}
	return v
}

// solve solves a·x = x in place by elimination with partial pivoting; a, by rows, is
// overwritten. It reports false for a matrix that is singular, and returns the
// least pivot over the greatest.
func solve(a, x []complex128) (ratio float64, ok bool) {
	n := len(x)
	least, most := math.Inf(1), 0.0
	for k := range n {
		best, size := k, -1.0
		for i := k; i < n; i++ {
			if s := rough(a[i*n+k]); s > size {
				best, size = i, s
			}
		}
		if !(size > 0) || size > math.MaxFloat64 {
			return 0, false
		}
		least, most = math.Min(least, size), math.Max(most, size)
		rowK := a[k*n : k*n+n]
		if best != k {
			other := a[best*n : best*n+n]
			for i, v := range rowK {
				rowK[i], other[i] = other[i], v
			}
			x[k], x[best] = x[best], x[k]
		}
		inverse := 1 / rowK[k]
		rowK[k] = inverse
		for i := k + 1; i < n; i++ {
			row := a[i*n : i*n+n]
			if row[k] == 0 {
				continue
			}
			f := row[k] * inverse
			for c := k + 1; c < n; c++ {
				row[c] -= f * rowK[c]
			}
			x[i] -= f * x[k]
		}
	}
	for i := n - 1; i >= 0; i-- {
		sum := x[i]
		for c := i + 1; c < n; c++ {
			sum -= a[i*n+c] * x[c]
		}
		x[i] = sum * a[i*n+i]
	}
	return least / most, true
}

func rough(x complex128) float64 { return math.Abs(real(x)) + math.Abs(imag(x)) }
