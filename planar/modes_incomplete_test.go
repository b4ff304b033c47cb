package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestModesIncomplete asks for modes where their number has no bound, and where links
// can move with the drives held.
func TestModesIncomplete(t *testing.T) {
	geared := epicyclicFiveBar(17, 23, false)
	line := peaucellier("QB")
	line.Drives = []Drive{Slide{Of: Link(6).Line(3, 0, 0), From: Frame.Line(0, 0, math.Pi/2)}}
	for name, c := range map[string]struct {
		d    Design
		in   float64
		some int
	}{
		"gears on a coupler":                 {geared.Design, 1, 2},
		"Peaucellier's driven at the output": {line, 0.3, 1},
		"loops for more than 5 000 modes":    {scissorOn(8), scissorReach(8, 0.6, 0).Pos, 0},
	} {
		l, err := New(c.d)
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		modes, errs := all(l, at(c.in))
		if len(errs) != 1 || !errors.Is(errs[0], ErrIncomplete) || len(modes) < c.some {
			t.Errorf("%s: %d modes, %v", name, len(modes), errs)
		}
		for _, s := range modes {
			if o := open(l, s, []rigid.Coordinate{{Pos: c.in}}); !(o.pos < 1e-11) {
				t.Errorf("%s: %+v", name, o)
			}
		}
		t.Logf("%s: %d modes, %v", name, len(modes), errs)
	}
}

// scissorOn is a lift on a cylinder from its lowest bar to its highest.
func scissorOn(stages int) Design {
	d := scissor(stages)
	d.Drives = []Drive{Reach{A: Link(1).At(-0.3, 0), B: Link(2*stages).At(0.2, 0)}}
	return d
}

// TestModesOfConstraint finds both sides of a rocker whose pin runs in a circular slot
// of the crank: those of a four-bar with a bar in its place. Constraints have no bound.
func TestModesOfConstraint(t *testing.T) {
	slot, bar, _ := slotted(t)
	in := rigid.Coordinate{Pos: 0.4, Vel: 2, Acc: 1}
	want, errs := all(bar, in)
	if len(want) != 2 || len(errs) > 0 {
		t.Fatalf("%d modes of the four-bar, %v", len(want), errs)
	}
	got, errs := all(slot, in)
	if len(got) != 2 || len(errs) != 1 || !errors.Is(errs[0], ErrIncomplete) {
		t.Errorf("%d modes, %v", len(got), errs)
	}
	for _, s := range want {
		a, near := s.Turn(2, Frame), false
		for _, o := range got {
			b := o.Turn(2, Frame)
			near = near || math.Abs(a.Pos-b.Pos)+math.Abs(a.Vel-b.Vel)+math.Abs(a.Acc-b.Acc) < 1e-11
		}
		if !near {
			t.Errorf("no mode with the rocker at %+v", a)
		}
	}
}
