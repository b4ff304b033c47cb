package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestPublishedStraightLines: Peaucellier's and Hart's exact straight lines, a·b
// constant (Wikipedia, Peaucellier–Lipkin linkage; archive.lib.msu.edu, Hart).
func TestPublishedStraightLines(t *testing.T) {
	guess := make([]rigid.Placement, 8)
	for i, g := range []rigid.Placement{{X: 1.2, Angle: .9}, {Angle: .9}, {X: 3, Y: 3.5, Angle: 4}, {Angle: .2}, {X: 2, Y: 1, Angle: .5}, {X: 4, Y: 1, Angle: 1.5}, {X: 6.6, Y: 3.2, Angle: 2.7}} {
		guess[i+1] = g
	}
	_, s := assemble(t, peaucellier("QB"), guess, rigid.Coordinate{Pos: 0.9, Vel: 2, Acc: 1})
	d := s.Point(Link(6).At(3, 0))
	check(t, "Peaucellier",
		known{"x of D", d.Pos.X, 6.6666666666666666667, 6.6667, 5e-5},
		known{"y of D", d.Pos.Y, 3.2203671041105224701, 0, 0},
		known{"vx of D", d.Vel.X, 0, 0, 0},
		known{"vy of D", d.Vel.Y, 8.2222813094522455671, 0, 0},
		known{"ax of D", d.Acc.X, 0, 0, 0},
		known{"ay of D", d.Acc.Y, 12.054769929636963601, 0, 0})
	for k := -50; k <= 50; k++ {
		if err := s.Move(unit(float64(k) / 50)); err != nil {
			t.Fatal(err)
		}
		if x := s.Point(Link(6).At(3, 0)).Pos.X; !(math.Abs(x-20.0/3) < 1e-13*20) {
			t.Errorf("at %v: x of D %v", float64(k)/50, x)
		}
	}

	// Hart: AD = BC = 5, AB = CD = 3, O on AB at 0.4, P on AD, P' on BC
	var p plan
	l := p.links("QP", "AB", "AD", "BC", "CD")
	qp, ab, ad, bc, cd := l[0], l[1], l[2], l[3], l[4]
	p.pin(Frame.At(1, 0), qp.At(0, 0))
	p.pin(Frame.At(0, 0), ab.At(1.2, 0))
	p.pin(ab.At(0, 0), ad.At(0, 0))
	p.pin(qp.At(1, 0), ad.At(2, 0))
	p.pin(ab.At(3, 0), bc.At(0, 0))
	p.pin(bc.At(5, 0), cd.At(0, 0))
	p.pin(cd.At(3, 0), ad.At(5, 0))
	p.turn(qp, Frame)
	h, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	found := false
	for _, m := range []string{".+x", ".-x"} {
		s, err := h.AssembleMode(m, rigid.Coordinate{Pos: 0.6, Vel: 1.5, Acc: -0.8})
		if err != nil {
			t.Fatal(err)
		}
		q := s.Point(bc.At(3, 0))
		if q.Pos.Y < 0 {
			continue
		}
		found = true
		check(t, "Hart "+m,
			known{"x of P'", q.Pos.X, 1.92, 1.92, 1e-12},
			known{"y of P'", q.Pos.Y, 0.59392559925047660743, 0, 0},
			known{"vy of P'", q.Vel.Y, 1.5777920380644678669, 0, 0},
			known{"ay of P'", q.Acc.Y, -0.10938667938953660553, 0, 0})
	}
	if !found {
		t.Error("Hart: no mode with P' above")
	}
}
