package planar_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// fourBarOf returns a four-bar of the given lengths, driven at the crank.
func fourBarOf(t testing.TB, a, b, c, d float64) *Linkage {
	var p plan
	l := p.links("crank", "coupler", "follower")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(a, 0), l[1].At(0, 0))
	p.pin(l[1].At(b, 0), l[2].At(c, 0))
	p.pin(Frame.At(d, 0), l[2].At(0, 0))
	p.turn(l[0], Frame)
	f, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// blocked returns by how much, over (b + c)², the loop of a four-bar fails to close
// somewhere between two crank angles: |AC|² = a² + d² − 2ad cos φ is extreme at the
// ends and at multiples of π.
func blocked(a, b, c, d, from, to float64) float64 {
	most, least := (b+c)*(b+c), (b-c)*(b-c)
	worst := 0.0
	see := func(phi float64) {
		d2 := a*a + d*d - 2*a*d*math.Cos(phi)
		worst = max(worst, (d2-most)/most, (least-d2)/most)
	}
	see(from)
	see(to)
	lo, hi := min(from, to), max(from, to)
	for k := math.Ceil(lo / math.Pi); k*math.Pi < hi; k++ {
		see(k * math.Pi)
	}
	return worst
}

// TestNoGapIsCrossed drives random four-bars by steps of all sizes both ways. A Move
// must fail just where the loop doesn't close at some place of the path, found from
// the lengths alone; it may miss gaps where it nearly does.
func TestNoGapIsCrossed(t *testing.T) {
	random := rand.New(rand.NewPCG(7, 1))
	bars, moves := 3000, 12
	if testing.Short() {
		bars = 300
	}
	gaps, small, refused, passed := 0, 0, 0, 0
	for range bars {
		a, b, c, d := 0.3+random.Float64(), 0.3+random.Float64(), 0.3+random.Float64(), 0.3+random.Float64()
		l := fourBarOf(t, a, b, c, d)
		phi := random.Float64() * 6
		mode := ".+"
		if random.IntN(2) == 0 {
			mode = ".-"
		}
		s, err := l.AssembleMode(mode, rigid.Coordinate{Pos: phi})
		if err != nil {
			if blocked(a, b, c, d, phi, phi) == 0 {
				t.Fatalf("%v %v %v %v at %v: %v", a, b, c, d, phi, err)
			}
			continue
		}
		for range moves {
			step := math.Pow(10, -2.5+3.3*random.Float64())
			if random.IntN(2) == 0 {
				step = -step
			}
			gap := blocked(a, b, c, d, phi, phi+step)
			err := s.Move(rigid.Coordinate{Pos: phi + step})
			switch {
			case err == nil && gap > 1e-5:
				t.Errorf("%v %v %v %v from %v by %v: crossed a gap of %.2g", a, b, c, d, phi, step, gap)
			case err != nil && gap == 0:
				refused++
				t.Errorf("%v %v %v %v from %v by %v: %v", a, b, c, d, phi, step, err)
			case err != nil && !errors.Is(err, rigid.ErrUnreachable):
				t.Errorf("%v %v %v %v from %v by %v: %v", a, b, c, d, phi, step, err)
			}
			if gap > 1e-5 {
				gaps++
			} else if gap > 0 && err == nil {
				small++
			}
			if err == nil {
				passed++
				phi += step
			}
			if got := s.Mode(); got != mode {
				t.Fatalf("mode %s after %s", got, mode)
			}
		}
	}
	t.Logf("%d moves passed, %d gaps refused, %d of below 1e-5 crossed", passed, gaps, small)
}

// TestPartingMotions drives four-bars to and over flattened positions in which two
// motions part, for lengths that make them exact: a kite, and a change point that is
// no parallelogram. The position itself is given, no way leads over it.
func TestPartingMotions(t *testing.T) {
	for _, bar := range [][4]float64{{1, 1.5, 1.5, 2}, {2, 1.5, 1.5, 1}, {1, 2, 1, 2.5}, {1, 2.5, 1.5, 2}} {
		a, b, c, d := bar[0], bar[1], bar[2], bar[3]
		flat := math.Pi
		if math.Abs(a-d) == math.Abs(b-c) {
			flat = 0
		}
		if got := blocked(a, b, c, d, flat, flat); got > 1e-15 || a+d != b+c && math.Abs(a-d) != math.Abs(b-c) {
			continue
		}
		l := fourBarOf(t, a, b, c, d)
		for _, way := range []float64{-1, 1} {
			s, err := l.AssembleMode(".+", at(flat-0.5*way))
			if err != nil {
				t.Fatal(err)
			}
			for _, step := range []float64{0.6, 0.51, 1.5, 0.5 + 1e-3} {
				if err := s.Move(at(flat + way*(step-0.5))); !errors.Is(err, rigid.ErrSingular) {
					t.Errorf("%v over %v by %v: %v", bar, flat, step*way, err)
				}
			}
			if err := s.Move(at(flat - 0.3*way)); err != nil {
				t.Errorf("%v: %v", bar, err)
			}
		}
	}
}

// TestGapDownAChain moves two drives at once, past a gap of a dyad whose known bodies
// move several times as fast as the drives: in a step that both ends and the size of
// the step alone would let pass.
func TestGapDownAChain(t *testing.T) {
	g := grow(1146, 0, 9, 4)
	l, s := assemble(t, g.Design, g.guess(), g.in...)
	if err := s.Move(at(-0.9345614504725758), at(0.2827770415793002)); err != nil {
		t.Fatal(err)
	}
	was := s.Clone()
	if err := s.Move(at(-0.37264143100041447), at(-0.9369612085926176)); !errors.Is(err, rigid.ErrUnreachable) {
		t.Fatalf("crossed a gap: %v", err)
	}
	stop, ok := s.Stop()
	if !ok || !(math.Abs(stop.Done-0.04426) < 1e-3) || !(stop.Gap > 1e-4) || far(l, s, was) != 0 {
		t.Errorf("%+v", stop)
	}
}

// TestNoRatesWhenFlat asks for rates at and next to a flattened position: refused as
// singular, the place alone is given.
func TestNoRatesWhenFlat(t *testing.T) {
	l := fourBarOf(t, 1, 2.5, 1.5, 2)
	for _, phi := range []float64{0, 1e-9, -3e-9} {
		s, err := l.AssembleMode(".+", at(phi))
		if err != nil {
			t.Fatal(err)
		}
		if m := s.Margin(); !(m < rigid.LeastMargin) {
			t.Errorf("margin %v at %v", m, phi)
		}
		if err := s.Move(unit(phi)); !errors.Is(err, rigid.ErrSingular) {
			t.Errorf("rates at %v: %v", phi, err)
		}
		if err := s.Move(at(phi)); err != nil {
			t.Errorf("place at %v: %v", phi, err)
		}
	}
}
