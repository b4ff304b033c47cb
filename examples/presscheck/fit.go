package main

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// The unknowns of a press: what its own numbers must be corrected by.
const (
	zero   = iota // of the encoder, as an angle of the crank, rad
	drift         // of that zero, rad in a turn of the crank
	ram           // of the ram scale, m
	crank         // m
	rod           // m
	offset        // m
	unknowns
)

type vector [unknowns]float64

// A sums holds the normal equations of least squares for the unknowns: it takes any
// number of samples and stays as large as it is.
type sums struct {
	n  float64
	a  [unknowns]vector // Σ jᵀj
	b  vector           // Σ j·y
	yy float64          // Σ y²
}

// add takes a sample y with its derivatives j by the unknowns.
func (s *sums) add(j *vector, y float64) {
	for p := range j {
		for q := range j {
			s.a[p][q] += j[p] * j[q]
		}
		s.b[p] += j[p] * y
	}
	s.yy += y * y
	s.n++
}

func (s *sums) plus(o *sums) {
	for p := range s.a {
		for q := range s.a[p] {
			s.a[p][q] += o.a[p][q]
		}
		s.b[p] += o.b[p]
	}
	s.yy += o.yy
	s.n += o.n
}

// without returns the equations with unknown p eliminated (Schur complement): it
// may be another in each stretch that is summed up, and is fitted in each.
func (s *sums) without(p int) sums {
	r := *s
	w := s.a[p][p]
	for i := range r.a {
		for k := range r.a[i] {
			r.a[i][k] -= s.a[i][p] * s.a[p][k] / w
		}
		r.b[i] -= s.a[i][p] * s.b[p] / w
	}
	r.yy -= s.b[p] * s.b[p] / w
	r.n--
	return r
}

// A solution is what the equations say. Cov is in units of the squared scatter, and
// 0 for what was not free.
type solution struct {
	x   vector
	cov [unknowns]vector
	sse float64 // Σ (y − j·x)²
	dof float64 // samples less unknowns
}

// solve fits the free unknowns; the others stay as in given. It reports false where
// the samples don't determine them.
func (s *sums) solve(given vector, free ...int) (solution, bool) {
	r := solution{x: given, dof: s.n - float64(len(free))}
	if r.dof < 1 {
		return r, false
	}
	n := len(free)
	if n == 0 {
		r.sse = s.sse(&r.x)
		return r, true
	}
	a, b := mat.NewSymDense(n, nil), mat.NewVecDense(n, nil)
	scale := make([]float64, n) // of the columns, to 1
	for i, p := range free {
		scale[i] = math.Sqrt(s.a[p][p])
		r.x[p] = 0
	}
	for i, p := range free {
		rest := s.b[p]
		for q := range given {
			rest -= s.a[p][q] * r.x[q]
		}
		b.SetVec(i, rest/scale[i])
		for k := i; k < n; k++ {
			a.SetSym(i, k, s.a[p][free[k]]/scale[i]/scale[k])
		}
	}
	var c mat.Cholesky
	var x mat.VecDense
	var inv mat.SymDense
	if !c.Factorize(a) || c.Cond() > 1e12 || c.SolveVecTo(&x, b) != nil || c.InverseTo(&inv) != nil {
		return r, false
	}
	for i, p := range free {
		r.x[p] = x.AtVec(i) / scale[i]
		for k, q := range free {
			r.cov[p][q] = inv.At(i, k) / scale[i] / scale[k]
		}
	}
	r.sse = s.sse(&r.x)
	return r, true
}

func (s *sums) sse(x *vector) float64 {
	e := s.yy
	for p := range x {
		e -= 2 * x[p] * s.b[p]
		for q := range x {
			e += x[p] * s.a[p][q] * x[q]
		}
	}
	return max(e, 0) // rounding
}

// rms is the scatter about the fit.
func (r *solution) rms() float64 { return math.Sqrt(r.sse / r.dof) }

// variance returns that of Σ h·x in units of the squared scatter.
func (r *solution) variance(h *vector) float64 {
	var v float64
	for p := range h {
		for q := range h {
			v += h[p] * r.cov[p][q] * h[q]
		}
	}
	return v
}
