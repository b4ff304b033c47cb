package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// Linkages come as near to a limit as one likes in one Move, stay there while the drive
// holds, and go back in one Move to where they came from.
func TestToLimitAndBack(t *testing.T) {
	tried := 0
	for _, w := range swaps() {
		easy, hard := w.linkages(t)
		truth, err := easy.Assemble(w.guess, rigid.Coordinate{Pos: w.from})
		if err != nil {
			t.Errorf("%s: %v", w.name, err)
			continue
		}
		home, err := hard.Assemble(placed(easy, truth), value(truth, w.hard))
		if err != nil {
			t.Errorf("%s: %v", w.name, err)
			continue
		}
		tried += toLimits(t, w.name, hard, home)
	}
	if tried < 8 {
		t.Errorf("%d limits tried", tried)
	}
}

func toLimits(t *testing.T, name string, l *Linkage, home *State) (tried int) {
	start := home.Inputs()[0].Pos
	lo, hi, err := home.Limits(rigid.Interval{Lo: start - 3, Hi: start + 3})
	if err != nil {
		t.Fatal(err)
	}
	for _, limit := range []Limit{lo, hi} {
		if limit.Kind != DriveEnd {
			continue
		}
		tried++
		for _, short := range []float64{1e-2, 1e-4, 1e-6, 1e-8} {
			s := home.Clone()
			near := rigid.Coordinate{Pos: limit.In + math.Copysign(short, start-limit.In)}
			if err := s.Move(near); err != nil {
				if !errors.Is(err, rigid.ErrSingular) || name != "scissor lift on a slanting cylinder" { // that comes by a place where motions part
					t.Errorf("%s to %g short of %g: %v", name, short, limit.In, err)
				}
				continue
			}
			there := s.Clone()
			if err := s.Move(near); err != nil || far(l, s, there) != 0 {
				t.Errorf("%s holding %g short of %g: %v", name, short, limit.In, err)
			}
			if err := s.Move(rigid.Coordinate{Pos: start}); err != nil {
				t.Errorf("%s back from %g short of %g: %v", name, short, limit.In, err)
			} else if gap := far(l, s, home); !(gap < 1e-12/home.Margin()) {
				t.Errorf("%s back from %g short of %g: %.2g from home", name, short, limit.In, gap)
			}
		}
	}
	return tried
}

// A place beyond a limit is not taken for one on the way to it, although Newton's method
// finds it from next to the limit.
func TestNotBeyondLimit(t *testing.T) {
	var p plan
	l := p.links("crank", "plate", "rocker", "rod", "lever")
	p.pin(Frame.At(0.3473, -1.2746), l[0].At(0.3973, 0.1274))
	p.pin(l[0].At(-0.4745, -1.1903), l[1].At(0.3313, -0.7021))
	p.pin(l[1].At(1.0687, 0.8649), l[2].At(-0.0377, 1.7846))
	p.pin(l[2].At(-0.2325, -0.2060), Frame.At(0.5123, -0.0703))
	p.pin(l[1].At(-0.1457, -0.6862), l[3].At(1.2405, -0.3566))
	p.pin(l[3].At(0.1144, -1.3253), l[4].At(1.8155, 0.7058))
	p.pin(l[4].At(0.3412, -1.6199), Frame.At(-1.0098, 1.4870))
	p.reach(Frame.At(-0.4045, -0.8336), l[3].At(0.6604, 0.4657))
	guess := []rigid.Placement{{},
		{X: 0.5526, Y: -0.9114, Angle: -2.3955},
		{X: -0.0598, Y: -0.4764, Angle: 2.5024},
		{X: 0.2419, Y: 0.0826, Angle: 1.9018},
		{X: -0.8219, Y: 0.0655, Angle: 0.2193},
		{X: 0.3722, Y: 0.5755, Angle: -2.3615},
	}
	lk, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	s, err := lk.Assemble(guess, rigid.Coordinate{Pos: 1.5025})
	if err != nil {
		t.Fatal(err)
	}
	const steps = 3000
	for k := range steps {
		to := 1.515 + 0.3*float64(k)/steps
		if err := s.Clone().Move(rigid.Coordinate{Pos: to}); !errors.Is(err, rigid.ErrUnreachable) {
			t.Errorf("to %g beyond the limit: %v", to, err)
		}
	}
}

// However short the steps, none leads onto another motion where motions part, not even
// one that ends there to rounding.
func TestShortStepsToChangePoint(t *testing.T) {
	cell, _ := swingThrough().linkages(t)
	tried := 0
	for s, err := range cell.Modes(rigid.Coordinate{Pos: 1.6}) {
		if err != nil {
			t.Fatal(err)
		}
		if lo, _, err := s.Limits(rigid.Interval{Lo: -3, Hi: 5}); err != nil || lo.Kind != ChangePoint {
			continue
		}
		tried++
		for _, h := range []float64{1e-2, 1e-3, 1e-4, 1e-5, 1e-6, 1e-7} {
			for k := range 25 {
				c := s.Clone()
				if err := c.Move(rigid.Coordinate{Pos: flatAt[0] + 5*h}); err != nil {
					t.Fatalf("to %g before the change point: %v", 5*h, err)
				}
				for i := 0; i < 7 && err == nil; i++ {
					err = c.Move(rigid.Coordinate{Pos: flatAt[0] + h*(5-float64(i)-float64(k)/25)})
				}
				if !errors.Is(err, rigid.ErrSingular) {
					t.Errorf("in steps of %g from %d/25 of one: %v", h, k, err)
				}
				err = nil
			}
		}
	}
	if tried != 1 {
		t.Errorf("%d modes come to a change point", tried)
	}
}
