package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// parallelogram is two cranks of a on pivots b apart, with a coupler between them.
func parallelogram(a, b float64) Design {
	var p plan
	l := p.links("left", "coupler", "right")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(b, 0), l[2].At(0, 0))
	p.pin(l[0].At(a, 0), l[1].At(0, 0))
	p.pin(l[1].At(b, 0), l[2].At(a, 0))
	p.turn(l[0], Frame)
	return p.Design
}

// TestParallelogram drives a parallelogram, and one on its right-hand crank, through
// their flattened positions for a thousand turns, in the parallel motion and, the
// first, in the contrary one, whose ratio is −(b+a)/(b−a) at 0 and its inverse at π
// (the ratio of elliptical gears runs between K and 1/K:
// http://cunningham-ind.com/ellipt.html; K = (b+a)/(b−a) from memory).
func TestParallelogram(t *testing.T) {
	var p plan
	p.Design = parallelogram(0.1, 0.3)
	l := p.links("upper", "last")
	p.pin(Link(3).At(0.2, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.25, 0), l[1].At(0.2, 0))
	p.pin(Frame.At(0.55, 0), l[1].At(0, 0))
	two, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	s, err := two.Assemble(make([]rigid.Placement, 6), at(0))
	if err != nil {
		t.Fatal(err)
	}
	if s.Mode() != ".==" {
		t.Fatalf("mode %s", s.Mode())
	}
	turns := 1000
	if testing.Short() {
		turns = 50
	}
	for k := range turns * 64 {
		in := rigid.Coordinate{Pos: float64(k) * math.Pi / 32, Vel: 2, Acc: 3}
		if err := s.Move(in); err != nil {
			t.Fatalf("step %d: %v", k, err)
		}
		for _, m := range []Link{3, 5} {
			if c := s.Motion(m); c.Omega != 2 || c.Alpha != 3 || !(r2.Norm(r2.Sub(c.Pose.Axis, s.Motion(1).Pose.Axis)) < 1e-15) {
				t.Fatalf("step %d: link %d: %+v", k, m, *c)
			}
		}
		if got := s.Turn(5, Frame).Pos; !(math.Abs(got-in.Pos) < 1e-12*(1+in.Pos)) {
			t.Fatalf("step %d: turned by %v of %v", k, got, in.Pos)
		}
		if o := open(two, s, []rigid.Coordinate{in}); k%97 == 0 && !(o.pos < 1e-14+3e-16*in.Pos && o.vel < 1e-14 && o.acc < 1e-14) {
			t.Fatalf("step %d: %+v", k, o)
		}
	}

	one, err := New(parallelogram(1, 2))
	if err != nil {
		t.Fatal(err)
	}
	s, err = one.AssembleMode(".x", at(0))
	if err != nil {
		t.Fatal(err)
	}
	for k := range turns * 64 {
		in := unit(float64(k) * math.Pi / 32)
		if err := s.Move(in); err != nil {
			t.Fatalf("step %d: %v", k, err)
		}
		// the half-angle law: tan(θ4/2) = −(b + a)/(b − a)·tan(θ/2)
		half, w := in.Pos/2, s.Motion(3).Omega
		c, sn := math.Cos(half), math.Sin(half)
		want := -3 / (c*c + 9*sn*sn)
		if !(math.Abs(w-want) < 1e-13*float64(1+k/64)) {
			t.Fatalf("step %d: ratio %v, want %v", k, w, want)
		}
		if got := s.Turn(3, Frame).Pos; !(math.Abs(math.Tan(got/2)*c+3*sn) < 1e-9*(1+math.Abs(math.Tan(got/2)))) {
			t.Fatalf("step %d: turned to %v", k, got)
		}
		if got, want := math.Round(s.Turn(3, Frame).Pos/math.Pi), -math.Round(in.Pos/math.Pi); k%32 == 0 && got != want {
			t.Fatalf("step %d: %v half turns, want %v", k, got, want)
		}
	}
}
