package main

import (
	"math"
	"math/rand/v2"
	"testing"
)

// An unknown eliminated is an unknown fitted: for the others it makes no difference.
func TestEliminated(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 1))
	truth := vector{0.3, 0, -2, 0.5, 0, 1}
	var s sums
	for range 50 {
		var j vector
		y := rnd.NormFloat64()
		for p := range j {
			j[p] = rnd.NormFloat64()
			y += j[p] * truth[p]
		}
		s.add(&j, y)
	}
	whole, ok := s.solve(vector{}, zero, ram, crank, offset)
	rest := s.without(zero)
	part, ok2 := rest.solve(vector{}, ram, crank, offset)
	if !ok || !ok2 || part.dof != whole.dof || whole.dof != 46 || math.Abs(part.sse-whole.sse) > 1e-9 {
		t.Fatalf("%v %v: %+v\n%+v", ok, ok2, part, whole)
	}
	for _, p := range []int{ram, crank, offset} {
		if math.Abs(part.x[p]-whole.x[p]) > 1e-12 || math.Abs(part.cov[p][p]-whole.cov[p][p]) > 1e-12 {
			t.Errorf("unknown %d: %g, %g", p, part.x[p], whole.x[p])
		}
		if math.Abs(whole.x[p]-truth[p]) > 5*whole.rms()*math.Sqrt(whole.cov[p][p]) {
			t.Errorf("unknown %d: %g, want %g", p, whole.x[p], truth[p])
		}
	}
	given, ok := s.solve(vector{offset: 1}, ram) // what is given has its share in y
	want := s
	for p := range want.b {
		want.b[p] -= s.a[p][offset]
	}
	if x := want.b[ram] / want.a[ram][ram]; !ok || math.Abs(given.x[ram]-x) > 1e-12 || given.x[offset] != 1 {
		t.Errorf("%+v, want %g", given.x, x)
	}
	if _, ok := s.solve(vector{}); !ok {
		t.Error("nothing free is refused")
	}
	if _, ok := new(sums).solve(vector{}, ram); ok {
		t.Error("no sample determines the unknowns")
	}
}

// However many turns there are, a bounded number of stretches is kept, with all that
// they weigh, and none is joined over a jump.
func TestStretchesAreBounded(t *testing.T) {
	f := newFitter(nil)
	const n = 5000
	for i := range n {
		s := stretch{weight: 1, rest: float64(i), turned: 1.01, from: float64(i), to: float64(i + 1)}
		if i%100 == 99 {
			s.cut = i
		}
		f.keep(s)
		if len(f.stretches) > mostStretches {
			t.Fatalf("%d stretches", len(f.stretches))
		}
	}
	var weight, rest float64
	cuts := 0
	for i, s := range f.stretches {
		weight, rest = weight+s.weight, rest+s.rest
		if s.cut > 0 {
			cuts++
			if s.from != float64(s.cut) {
				t.Errorf("jump %d begins at %g", s.cut, s.from)
			}
		}
		if i > 0 && s.from != f.stretches[i-1].to {
			t.Errorf("stretch %d begins at %g after %g", i, s.from, f.stretches[i-1].to)
		}
	}
	if weight != n || rest != n*(n-1)/2 || cuts != n/100 {
		t.Errorf("weight %g, rest %g, %d jumps", weight, rest, cuts)
	}
}
