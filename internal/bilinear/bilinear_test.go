package bilinear

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
	"math/rand/v2"
	"reflect"
	"testing"
)

// random returns a system of forms that have every term.
func random(r *rand.Rand, l int) *System {
	draw := func() complex128 { return complex(r.NormFloat64(), r.NormFloat64()) }
	s := &System{}
	n := 2*l + 1
	for range l {
		z, w := make([]complex128, n), make([]complex128, n)
		for i := range n {
			z[i], w[i] = draw(), draw()
		}
		s.Z, s.W = append(s.Z, z), append(s.W, w)
	}
	for range 2 * l {
		var form []Term
		for i := range n {
			for j := range n {
				form = append(form, Term{i, j, draw()})
			}
		}
		s.Forms = append(s.Forms, form)
	}
	return s
}

// miss returns by how much an end misses the equations.
func (s *System) miss(e *End) float64 {
	most := 0.0
	for i := range s.Z {
		most = max(most, cmplx.Abs(dot(s.Z[i], e.Z)), cmplx.Abs(dot(s.W[i], e.W)))
	}
	for _, form := range s.Forms {
		sum := complex128(0)
		for _, t := range form {
			sum += t.Coef * e.Z[t.I] * e.W[t.J]
		}
		most = math.Max(most, cmplx.Abs(sum))
	}
	return most
}

// same reports whether two vectors of unit length are one but for a factor.
func same(a, b []complex128) bool {
	sum := complex128(0)
	for i := range a {
		sum += cmplx.Conj(a[i]) * b[i]
	}
	return cmplx.Abs(sum) > 1-1e-10
}

// TestRandom finds as many solutions of systems without a zero as their
// two-homogeneous Bézout number says: C(2L, L).
func TestRandom(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	for l, paths := range []int{1, 2, 6, 20, 70} {
		if l == 0 || l == 4 && testing.Short() {
			continue
		}
		if Paths(l) != float64(paths) {
			t.Errorf("%v paths for %d rows", Paths(l), l)
		}
		for range 4 - min(l, 3) {
			s := random(r, l)
			ends, err := s.Solve(7)
			if err != nil || len(ends) != paths {
				t.Errorf("%d rows: %d ends, %v", l, len(ends), err)
			}
			for i := range ends {
				e := &ends[i]
				if !e.Regular || e.Infinite || !(s.miss(e) < 1e-11) {
					t.Errorf("%d rows: %v %v, off by %.2g", l, e.Regular, e.Infinite, s.miss(e))
				}
				for _, o := range ends[:i] {
					if same(e.Z, o.Z) && same(e.W, o.W) {
						t.Errorf("%d rows: one solution twice", l)
					}
				}
			}
		}
	}
}

// loop is z₁ + z₂ = long·z₀, the same in w, z₁ on the unit circle, z₂ there too or
// real.
func loop(long float64, slides bool) *System {
	row := []complex128{1, 1, complex(-long, 0)}
	s := &System{Z: [][]complex128{row}, W: [][]complex128{row}}
	s.Forms = [][]Term{{{0, 0, 1}, {2, 2, -1}}, {{1, 1, 1}, {2, 2, -1}}}
	if slides {
		s.Forms[1] = []Term{{1, 2, 1}, {2, 1, -1}}
	}
	return s
}

// TestKnown solves loops with known solutions: a crank of 1 whose end is on the line
// through its pivot has z₁ = ±1; two bars of 1 have cos θ = long/2, one solution
// twice when they are stretched; bars between two circles about one centre have
// none that is finite.
func TestKnown(t *testing.T) {
	for seed := range uint64(5) {
		ends, err := loop(3, true).Solve(seed)
		if err != nil || len(ends) != 2 {
			t.Fatalf("%d ends, %v", len(ends), err)
		}
		sum := complex128(0)
		for _, e := range ends {
			at := e.Z[0] / e.Z[2]
			sum += at
			if !e.Regular || e.Infinite || !(cmplx.Abs(at*at-1) < 1e-12) {
				t.Errorf("crank at %v", at)
			}
		}
		if !(cmplx.Abs(sum) < 1e-12) {
			t.Error("one solution twice")
		}
		for _, long := range []float64{0.3, 1.9, 2.1} {
			ends, err := loop(long, false).Solve(seed)
			sum := complex128(0)
			for _, e := range ends {
				at := e.Z[0] / e.Z[2]
				sum += at
				if !e.Regular || e.Infinite || !(cmplx.Abs((at+1/at)/2-complex(long/2, 0)) < 1e-12) {
					t.Errorf("%v: bar at %v", long, at)
				}
			}
			if err != nil || len(ends) != 2 || !(cmplx.Abs(sum-complex(long, 0)) < 1e-11) {
				t.Errorf("%v: %d ends, sum %v, %v", long, len(ends), sum, err)
			}
		}
		ends, err = loop(2, false).Solve(seed)
		if err != nil || len(ends) != 2 {
			t.Errorf("%d ends, %v", len(ends), err)
		}
		for _, e := range ends {
			if at := e.Z[0] / e.Z[2]; e.Regular || e.Infinite || !(cmplx.Abs(at-1) < 1e-6) {
				t.Errorf("stretched: %v %v %v", e.Regular, e.Infinite, at)
			}
		}
		// z₁ + 0·z₂ = 3: |z₁| = 1 cannot be
		row := []complex128{1, 0, -3}
		none := loop(0, false)
		none.Z, none.W = [][]complex128{row}, [][]complex128{row}
		ends, err = none.Solve(seed)
		for _, e := range ends {
			if !e.Infinite {
				t.Errorf("no solution: %v", e)
			}
		}
		if err != nil || len(ends) != 2 {
			t.Errorf("%d ends, %v", len(ends), err)
		}
	}
}

func TestRefused(t *testing.T) {
	s := random(rand.New(rand.NewPCG(2, 2)), 2)
	s.Z[1] = s.Z[0]
	if ends, err := s.Solve(0); len(ends) > 0 || !errors.Is(err, ErrRank) {
		t.Errorf("%d ends, %v", len(ends), err)
	}
	s = random(rand.New(rand.NewPCG(2, 2)), 2)
	s.Z[1][1] = cmplx.NaN()
	if ends, err := s.Solve(0); len(ends) > 0 || err == nil {
		t.Errorf("%d ends, %v", len(ends), err)
	}
}

func TestSameAgain(t *testing.T) {
	s := random(rand.New(rand.NewPCG(3, 3)), 2)
	a, _ := s.Solve(1)
	b, _ := s.Solve(1)
	c, _ := s.Solve(2)
	if !reflect.DeepEqual(a, b) || reflect.DeepEqual(a, c) {
		t.Error("the seed is not all that counts")
	}
}

func BenchmarkSolve(b *testing.B) {
	for l := 1; l <= 5; l++ {
		s := random(rand.New(rand.NewPCG(4, uint64(l))), l)
		b.Run(fmt.Sprintf("%d paths", int(Paths(l))), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := s.Solve(1); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
