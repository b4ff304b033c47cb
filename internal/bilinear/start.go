package bilinear

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
)

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
