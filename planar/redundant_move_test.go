package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestRedundantMoves drives linkages with constraints that follow from others, the
// cranks through their flattened positions: every joint must hold, solved or not.
func TestRedundantMoves(t *testing.T) {
	for _, test := range []struct {
		name     string
		design   Design
		from, to float64
		steps    int
	}{
		{"double parallelogram", cranks(3, 1), 0, 20, 640},
		{"double parallelogram guessed flat", cranks(3, 0), 0, -20, 640},
		{"six cranks", cranks(6, 1), 0, 20, 640},
		{"parallelogram with a belt", gearedParallelogram(), 1, 21, 640},
		{"four slots", fourSlots(), 1, 14, 300},
		{"three blocks on one rail", threeBlocks(), 0, 0.3, 20},
		{"doubly guided straight line", guidedPeaucellier(0), 0.9, -0.8, 60},
	} {
		t.Run(test.name, func(t *testing.T) {
			l, err := New(test.design)
			if err != nil {
				t.Fatal(err)
			}
			s, err := l.Assemble(nil, at(test.from))
			if err != nil {
				t.Fatal(err)
			}
			h := (test.to - test.from) / float64(test.steps)
			for k := range test.steps + 1 {
				in := rigid.Coordinate{Pos: test.from + h*float64(k), Vel: 1.5, Acc: -0.7}
				if err := s.Move(in); err != nil {
					t.Fatalf("at %v: %v", in.Pos, err)
				}
				if o := open(l, s, []rigid.Coordinate{in}); !(o.pos < 2e-14 && o.vel < 1e-11 && o.acc < 1e-10) {
					t.Fatalf("at %v: %+v", in.Pos, o)
				}
			}
		})
	}
}

// TestBrokenConstraint moves a linkage whose redundant constraint holds where it was
// designed and nowhere else: it is refused by New; one that is off by a hair, within
// what New takes, is refused by the Move on which it grows.
func TestBrokenConstraint(t *testing.T) {
	if _, err := New(guidedPeaucellier(1e-4)); !errors.Is(err, ErrInconsistent) {
		t.Errorf("guide off by 0.1 mm: %v", err)
	}
	d := guidedPeaucellier(0)
	slot := d.Joints[10].(SlidingPin)
	// turned by a hair about where D is at 0.9 rad: off by 5e-9 m at the places where
	// New looks, by more than 1e-9 of the size farther on
	slot.Slot = Frame.Line(20.0/3, 3.2203671041105224701, math.Pi/2+1.75e-9)
	d.Joints[10] = slot
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.Assemble(nil, at(0.9))
	if err != nil {
		t.Fatal(err)
	}
	was := s.Clone()
	for _, to := range []float64{0.5, 0, -0.5, -1} {
		err := s.Move(at(to))
		if err == nil {
			was = s.Clone()
			continue
		}
		if !errors.Is(err, ErrInconsistent) || far(l, s, was) != 0 {
			t.Errorf("at %v: %v", to, err)
		}
		stop, ok := s.Stop()
		if !ok || stop.Err != err || !(stop.Gap > 6e-9 && stop.Gap < 2e-8) || !(stop.Done > 0 && stop.Done < 1) {
			t.Errorf("at %v: %+v", to, stop)
		}
		from := s.Inputs()[0].Pos
		part := func(d float64) error { return s.Clone().Move(at(from + d*(to-from))) }
		if err, beyond := part(stop.Done), part(stop.Done+1e-6); err != nil || !errors.Is(beyond, ErrInconsistent) {
			t.Errorf("at %v: %v at the part %v of the way, %v beyond", to, err, stop.Done, beyond)
		}
		return
	}
	t.Error("never refused")
}
