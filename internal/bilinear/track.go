package bilinear

import (
	"math"
	"math/cmplx"
)

// A tracker follows the solutions of
//
//	H = (1 − s)·γ·(a·T)(b·U) + s·F(T, U) = 0
//
// from s = 0, where they are known, to 1. T and U are coordinates in the subspaces,
// z = Σ T·basis, held to unit length at every step: the patches p·T = 1 and q·U = 1
// have p = conj(T), q = conj(U).
type tracker struct {
	l      int
	zs, ws [][]complex128 // rows: numbers of z; columns: T
	forms  [][]Term
	a, b   [][]complex128
	gamma  complex128
	pq     []complex128 // p, then q

	z, w   []complex128
	j, h   []complex128
	k      [4][]complex128
	x0, xt []complex128
}

// spread writes z and w.
func (t *tracker) spread(x []complex128) {
	for i := range t.z {
		t.z[i], t.w[i] = dot(t.zs[i], x[:t.l+1]), dot(t.ws[i], x[t.l+1:])
	}
}

func dot(a, b []complex128) complex128 {
	sum := complex128(0)
	for i, v := range a {
		sum += v * b[i]
	}
	return sum
}

// lay writes H, ∂H/∂x, and into rate −∂H/∂s unless that is nil.
func (t *tracker) lay(x []complex128, s float64, rate []complex128) {
	n, m := len(x), t.l+1
	t.spread(x)
	clear(t.j)
	g, f := complex(1-s, 0)*t.gamma, complex(s, 0)
	for i, form := range t.forms {
		row := t.j[i*n : i*n+n]
		value := complex128(0)
		for _, e := range form {
			z, w := e.Coef*t.z[e.I], e.Coef*t.w[e.J]
			value += z * t.w[e.J]
			z, w = f*z, f*w
			zs, ws := t.zs[e.I], t.ws[e.J]
			for k := range m {
				row[k] += w * zs[k]
				row[m+k] += z * ws[k]
			}
		}
		a, b := dot(t.a[i], x[:m]), dot(t.b[i], x[m:])
		t.h[i] = g*a*b + f*value
		if rate != nil {
			rate[i] = t.gamma*a*b - value
		}
		a, b = g*a, g*b
		for k := range m {
			row[k] += b * t.a[i][k]
			row[m+k] += a * t.b[i][k]
		}
	}
	copy(t.j[(n-2)*n:], t.pq[:m])
	copy(t.j[(n-1)*n+m:], t.pq[m:])
	t.h[n-2], t.h[n-1] = dot(t.pq[:m], x[:m])-1, dot(t.pq[m:], x[m:])-1
	if rate != nil {
		rate[n-2], rate[n-1] = 0, 0
	}
}

// patch brings T and U to unit length, and the patches to where they are.
func (t *tracker) patch(x []complex128) {
	m := t.l + 1
	unit(x[:m])
	unit(x[m:])
	for i, v := range x {
		t.pq[i] = cmplx.Conj(v)
	}
}

// correct makes one step of Newton's method, and returns its length.
func (t *tracker) correct(x []complex128, s float64) (size, ratio float64, ok bool) {
	t.lay(x, s, nil)
	if ratio, ok = solve(t.j, t.h); !ok {
		return 0, 0, false
	}
	for i, v := range t.h {
		x[i] -= v
	}
	return norm(t.h), ratio, true
}

// predict goes from x at s a step h on, by the method of Runge and Kutta.
func (t *tracker) predict(to, x []complex128, s, h float64) bool {
	copy(to, x)
	for i, at := range [4]float64{0, 0.5, 0.5, 1} {
		if i > 0 {
			for n, v := range t.k[i-1] {
				to[n] = x[n] + complex(at*h, 0)*v
			}
		}
		t.lay(to, s+at*h, t.k[i])
		if _, ok := solve(t.j, t.k[i]); !ok {
			return false
		}
	}
	for n := range to {
		to[n] = x[n] + complex(h/6, 0)*(t.k[0][n]+2*t.k[1][n]+2*t.k[2][n]+t.k[3][n])
	}
	return true
}

// What the predictor may be off, what Newton's second step may be of the first, and
// the least step.
const (
	off       = 1e-3
	contracts = 0.1
	exact     = 1e-8
	leastStep = 1e-6 // of what is left of the way
	mostSteps = 1000
)

// track follows x from s to end.
func (t *tracker) track(x []complex128, s, end float64) bool {
	h := 0.05 * (1 - s)
	for steps, good := 0, 0; s < end; steps++ {
		if steps == mostSteps || h < leastStep*(1-s) {
			return false
		}
		t.patch(x)
		next := math.Min(s+h, end)
		if !t.predict(t.xt, x, s, next-s) || !t.settle(t.xt, next) {
			h, good = h/2, 0
			continue
		}
		copy(x, t.xt)
		s = next
		if good++; good == 2 {
			h, good = 2*h, 0
		}
		h = math.Min(h, math.Max(0.5*(1-s), end-s))
	}
	return true
}

// settle brings x onto its path, if that is the one that it was predicted on.
func (t *tracker) settle(x []complex128, s float64) bool {
	first, _, ok := t.correct(x, s)
	if !ok || !(first <= off) {
		return false
	}
	for range 3 {
		next, _, ok := t.correct(x, s)
		if !ok || !(next <= math.Max(contracts*first, exact)) {
			return false
		}
		if next <= exact {
			return true
		}
		first = next
	}
	return false
}
