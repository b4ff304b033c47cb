package planar_test

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// guessed gives a design a Guess, in which links left out are at the origin.
func guessed(d Design, at ...rigid.Placement) Design {
	d.Guess = make([]rigid.Placement, len(d.Links))
	copy(d.Guess[1:], at)
	return d
}

// cranks is a beam on so many parallel cranks, guessed roughly at an angle.
func cranks(n int, angle float64) Design {
	var p plan
	beam := p.Link("beam")
	at := []rigid.Placement{{X: 0.05*math.Cos(angle) + 0.001, Y: 0.05*math.Sin(angle) - 0.002}}
	for i := range n {
		x := 0.1 * float64(i)
		crank := p.Link(fmt.Sprint("crank", i))
		p.pin(Frame.At(x, 0), crank.At(0, 0))
		p.pin(crank.At(0.05, 0), beam.At(x, 0))
		at = append(at, rigid.Placement{X: x, Angle: angle + 0.01*float64(i%3)})
	}
	p.turn(2, Frame)
	return guessed(p.Design, at...)
}

// offCrank has a third crank that is too long, on a pivot from which it reaches its
// pin at an angle of 1 rad all the same.
func offCrank() Design {
	p := plan{cranks(2, 1)}
	crank := p.Link("off")
	s, c := math.Sincos(1)
	x, y := 0.2+0.05*c-0.06*c, 0.05*s-0.06*s
	p.pin(Frame.At(x, y), crank.At(0, 0))
	p.pin(crank.At(0.06, 0), Link(1).At(0.2, 0))
	p.Guess = append(p.Guess, rigid.Placement{X: x, Y: y, Angle: 1})
	return p.Design
}

// geared ties the cranks of a parallelogram by equal wheels and a belt as well.
func gearedParallelogram() Design {
	d := cranks(2, 1)
	d.Joints = append(d.Joints, GearPair{A: 2, B: 3, Arm: Frame, TeethA: 30, TeethB: 30, Internal: true})
	return d
}

// fourSlots is a ram on four pins in two parallel slots.
func fourSlots() Design {
	p := sliderCrank()
	p.Joints = p.Joints[:3]
	for _, x := range []float64{-0.05, 0.05} {
		p.slot(Link(3).At(x, 0.02), Frame.Line(0, 0.02, 0))
		p.slot(Link(3).At(x, -0.02), Frame.Line(0, -0.02, 0))
	}
	return guessed(driven(p, 1, 0), rigid.Placement{Angle: 1}, rigid.Placement{X: 0.027, Y: 0.042, Angle: -0.2}, rigid.Placement{X: 0.22})
}

// threeBlocks carries a bar on three blocks of one rail.
func threeBlocks() Design {
	var p plan
	bar := p.Link("bar")
	at := []rigid.Placement{{X: 0.01}}
	for i := range 3 {
		x := 0.1 * float64(i)
		block := p.Link(fmt.Sprint("block", i))
		p.guide(Frame.Line(0, 0, 0), block.Line(0, 0, 0))
		p.pin(block.At(0, 0), bar.At(x, 0))
		at = append(at, rigid.Placement{X: x + 0.01})
	}
	p.slide(Link(2).Line(0, 0, 0), Frame.Line(0, 0, 0))
	return guessed(p.Design, at...)
}

// guidedPeaucellier guides the point that goes straight by itself along its line,
// so far off it.
func guidedPeaucellier(off float64) Design {
	p := plan{peaucellier("QB")}
	// O = (0, 0), Q = (1.2, 0), QB at 0.9 rad; OB·OD = 16, D on x = 20/3.
	polar := func(r, angle float64) (x, y float64) { s, c := math.Sincos(angle); return r * c, r * s }
	bx, by := polar(1.2, 0.9)
	bx += 1.2
	ob, dir := math.Hypot(bx, by), math.Atan2(by, bx)
	dx, dy := polar(16/ob, dir)
	half := math.Acos((ob + 16/ob) / 2 / 5)
	ax, ay := polar(5, dir+half)
	cx, cy := polar(5, dir-half)
	to := func(x, y, tox, toy float64) rigid.Placement {
		return rigid.Placement{X: x + 0.02, Y: y - 0.01, Angle: math.Atan2(toy-y, tox-x) + 0.01}
	}
	p.slot(Link(7).At(0, 0), Frame.Line(20.0/3+off, 0, math.Pi/2))
	return guessed(p.Design, to(1.2, 0, bx, by), to(0, 0, ax, ay), to(ax, ay, bx, by), to(0, 0, cx, cy),
		to(bx, by, cx, cy), to(cx, cy, dx, dy), to(dx, dy, ax, ay))
}

// Redundant constraints that agree are checked, not solved: which are left out, and
// the groups that remain. That a beam on n parallel cranks and the doubly guided
// straight-line cell of Peaucellier move is textbook knowledge.
func TestRedundant(t *testing.T) {
	tests := []struct {
		name   string
		design Design
		groups string
		aside  string
	}{
		{"double parallelogram", cranks(3, 1), "crank0 | beam+crank2 RRR | crank1 RPR", "length of crank1 at joint 2"},
		{"double parallelogram guessed flat", cranks(3, 0), "crank0 | beam+crank2 RRR | crank1 RPR", "length of crank1 at joint 2"},
		{"six cranks", cranks(6, 1), "crank0 | beam+crank5 RRR | crank1 RPR | crank2 RPR | crank3 RPR | crank4 RPR",
			"length of crank1 at joint 2, length of crank2 at joint 4, length of crank3 at joint 6, length of crank4 at joint 8"},
		{"parallelogram with a belt", gearedParallelogram(), "crank0 | beam+crank1 RRR", "mesh of joint 4"},
		{"four slots", fourSlots(), "crank | rod+ram 3", "slot of joint 3, slot of joint 5"},
		{"three blocks on one rail", threeBlocks(), "block0 | bar+block2 RRP | block1", "guide of joint 2"},
		{"doubly guided straight line", guidedPeaucellier(0), "QB | OA+AB RRR | OC+BC RRR | CD+DA RRR", "slot of joint 10"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			l, err := New(test.design)
			if err != nil {
				t.Fatal(err)
			}
			if got := groups(l); got != test.groups {
				t.Errorf("groups\n got %s\nwant %s", got, test.groups)
			}
			if got := strings.Join(Checks(l), ", "); got != test.aside {
				t.Errorf("set aside %s, want %s", got, test.aside)
			}
			if got := l.Mobility(); got != 1 {
				t.Errorf("mobility %d, want 1", got)
			}
			test.design.Guess = nil
			if _, err := New(test.design); !errors.Is(err, ErrOverconstrained) || !strings.Contains(err.Error(), "takes a Guess") {
				t.Errorf("without a guess: %v", err)
			}
		})
	}
}

// What does not agree is refused with the gap.
func TestContradictions(t *testing.T) {
	long := cranks(3, 1)
	long.Joints[5] = Revolute{A: Link(4).At(0.06, 0), B: Link(1).At(0.2, 0)}
	twice := guessed(driven(fourBar(), 1, 0), rigid.Placement{Angle: 1}, rigid.Placement{X: 0.027, Y: 0.042, Angle: 0.3}, rigid.Placement{X: 0.18, Angle: 1.2})
	twice.Drives = append(twice.Drives, Turn{Of: 3, From: Frame})
	idle := cranks(4, 1)
	idle.Drives = nil
	tests := []struct {
		name   string
		design Design
		err    error
		joints []int
		drives []int
		says   string
	}{
		{"third crank too long", long, ErrInconsistent, []int{0, 1, 2, 3, 4, 5}, nil, "from the guess they miss each other by 0.00"},
		{"third crank that fits in one place", offCrank(), ErrInconsistent, []int{0, 1, 2, 3, 4, 5}, nil, "at the guess alone"},
		{"straight line beside the guide", guidedPeaucellier(0.01), ErrInconsistent, nil, nil, "they miss each other by 0.00"},
		{"two drives of one motion", twice, ErrOverconstrained, nil, []int{0, 1}, "not free of each other"},
		{"more than are looked through", cranks(200, 1), ErrOverconstrained, nil, nil, "more than 200"},
		{"redundant and no drive", idle, ErrUnderconstrained, nil, nil, "1 drive or joint missing"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			_, err := New(test.design)
			bad, ok := errors.AsType[*DesignError](err)
			if !ok || !errors.Is(err, test.err) {
				t.Fatalf("%v, want %v", err, test.err)
			}
			if test.joints != nil && !slices.Equal(bad.Joints, test.joints) || !slices.Equal(bad.Drives, test.drives) {
				t.Errorf("joints %v, drives %v; want %v, %v", bad.Joints, bad.Drives, test.joints, test.drives)
			}
			if !strings.Contains(err.Error(), test.says) {
				t.Errorf("%q does not say %q", err, test.says)
			}
		})
	}
}
