package bilinear

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
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

// Solve follows all paths, in one order of choices for one seed. Its error is
// ErrRank, or ErrLost, with the ends found.
func (s *System) Solve(seed uint64) ([]End, error) {
	t, err := newTracker(s, seed)
	if err != nil {
		return nil, err
	}
	var ends []End
	x := make([]complex128, 2*(t.l+1))
	for pick := range choices(2*t.l, t.l) {
		if !t.start(x, pick) {
			err = ErrLost
			continue
		}
		end, ok := t.follow(x)
		if !ok {
			err = ErrLost
			continue
		}
		ends = append(ends, end)
	}
	return ends, err
}

func newTracker(s *System, seed uint64) (*tracker, error) {
	l := len(s.Z)
	t := &tracker{l: l, forms: s.Forms}
	for _, side := range []struct {
		rows [][]complex128
		to   *[][]complex128
	}{{s.Z, &t.zs}, {s.W, &t.ws}} {
		basis, err := null(side.rows, 2*l+1)
		if err != nil {
			return nil, err
		}
		for i := range 2*l + 1 {
			row := make([]complex128, l+1)
			for k, v := range basis {
				row[k] = v[i]
			}
			*side.to = append(*side.to, row)
		}
	}
	random := rand.New(rand.NewPCG(seed, 0x7e57))
	circle := func() complex128 { return cmplx.Rect(1, 2*math.Pi*random.Float64()) }
	t.gamma = circle()
	for range 2 * l {
		a, b := make([]complex128, l+1), make([]complex128, l+1)
		for k := range a {
			a[k], b[k] = circle(), circle()
		}
		t.a, t.b = append(t.a, unit(a)), append(t.b, unit(b))
	}
	n := 2 * (l + 1)
	vectors := make([]complex128, 10*n+n*n)
	for _, v := range []*[]complex128{&t.pq, &t.h, &t.k[0], &t.k[1], &t.k[2], &t.k[3], &t.x0, &t.xt} {
		*v, vectors = vectors[:n:n], vectors[n:]
	}
	t.j = vectors[:n*n]
	t.z, t.w = make([]complex128, 2*l+1), make([]complex128, 2*l+1)
	return t, nil
}

// choices yields all choices of k out of n, as flags.
func choices(n, k int) func(yield func([]bool) bool) {
	return func(yield func([]bool) bool) {
		pick := make([]bool, n)
		var from func(i, left int) bool
		from = func(i, left int) bool {
			if left == 0 {
				return yield(pick)
			}
			for ; i+left <= n; i++ {
				pick[i] = true
				if !from(i+1, left-1) {
					return false
				}
				pick[i] = false
			}
			return true
		}
		from(0, k)
	}
}

// start writes the solution of the start system at which the factors a·T of the
// forms picked vanish, and b·U of the others.
func (t *tracker) start(x []complex128, pick []bool) bool {
	var a, b [][]complex128
	for i, p := range pick {
		if p {
			a = append(a, t.a[i])
		} else {
			b = append(b, t.b[i])
		}
	}
	at, errA := null(a, t.l+1)
	bt, errB := null(b, t.l+1)
	if errA != nil || errB != nil {
		return false
	}
	copy(x, at[0])
	copy(x[t.l+1:], bt[0])
	return true
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

// follow takes a start to its end. A path that goes to infinity does so as a power
// of what is left of the way, which is told by comparing two places near the end.
func (t *tracker) follow(x []complex128) (End, bool) {
	const near, nearer = 1e-5, 1e-7
	if !t.track(x, 0, 1-near) {
		return End{}, false
	}
	first := t.far(x)
	reached := t.track(x, 1-near, 1-nearer)
	second := t.far(x)
	copy(t.x0, x)
	end := End{Regular: reached && t.finish(x)}
	if !end.Regular {
		copy(x, t.x0)
		end.Infinite = second < 0.7*first
		if !end.Infinite && !t.creep(x) {
			copy(x, t.x0)
		}
	}
	t.patch(x)
	t.spread(x)
	end.Z, end.W = append([]complex128(nil), t.z...), append([]complex128(nil), t.w...)
	n := 2 * t.l
	end.Infinite = end.Infinite || cmplx.Abs(t.z[n]) < 1e-10 || cmplx.Abs(t.w[n]) < 1e-10
	return end, true
}

// far returns how far x is from infinity.
func (t *tracker) far(x []complex128) float64 {
	t.patch(x)
	t.spread(x)
	n := 2 * t.l
	return cmplx.Abs(t.z[n]) * cmplx.Abs(t.w[n])
}

// finish goes to s = 1, and reports whether a simple solution is there.
func (t *tracker) finish(x []complex128) bool {
	t.patch(x)
	last := 0.1
	for range 10 {
		size, ratio, ok := t.correct(x, 1)
		if !ok || !(size <= last) || ratio < 1e-11 {
			return false
		}
		if size <= exact {
			size, _, ok = t.correct(x, 1)
			return ok && size <= 0.01*exact
		}
		last = 0.3 * size
	}
	return false
}

// creep goes to s = 1 where several solutions are one, to which Newton's method gets
// nearer by a constant factor, as far as rounding lets it: the root of what it is for
// two. It reports whether it got near.
func (t *tracker) creep(x []complex128) bool {
	const near = 1e-6
	t.patch(x)
	last := 0.1
	for last > exact {
		size, _, ok := t.correct(x, 1)
		if !ok {
			break
		}
		if !(size <= 0.95*last) {
			for i, v := range t.h {
				x[i] += v
			}
			break
		}
		last = size
	}
	return last <= near
}
