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

// with returns the four-bar after a change.
func with(change func(p *plan)) Design {
	p := fourBar()
	p.turn(1, Frame)
	change(&p)
	return p.Design
}

// A refusal is what New says of a design that it refuses.
type refusal struct {
	name   string
	design Design
	err    error
	links  string // names, joined by blanks
	joints []int
	drives []int
	says   string // part of the message
}

func refusals() []refusal {
	crank, rod, rocker := Link(1), Link(2), Link(3)
	return []refusal{
		{name: "empty design", err: ErrReference, says: "a link that moves"},
		{name: "frame alone", design: Design{Links: []string{"frame"}}, err: ErrReference},
		{name: "unknown link", design: with(func(p *plan) { p.pin(Link(4).At(0, 0), rod.At(0, 0)) }),
			err: ErrReference, joints: []int{4}, says: "link 4 of 4 does not exist"},
		{name: "negative link", design: with(func(p *plan) { p.pin(Link(-1).At(0, 0), rod.At(0, 0)) }),
			err: ErrReference, joints: []int{4}},
		{name: "unknown link in a drive", design: with(func(p *plan) { p.turn(9, Frame) }), err: ErrReference, drives: []int{1}},
		{name: "joint of a link with itself", design: with(func(p *plan) { p.pin(rod.At(0, 0), rod.At(1, 0)) }),
			err: ErrReference, links: "rod", joints: []int{4}, says: "rod is tied to itself"},
		{name: "gear that is its own arm", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rod, Arm: crank, TeethA: 1, TeethB: 1})
		}), err: ErrReference, links: "crank", joints: []int{4}},
		{name: "drive of a link from itself", design: with(func(p *plan) { p.turn(rod, rod) }), err: ErrReference, links: "rod", drives: []int{1}},
		{name: "no joint at all", design: with(func(p *plan) { p.Joints = append(p.Joints, nil) }), err: ErrReference, joints: []int{4}},
		{name: "pointer to a joint", design: with(func(p *plan) { p.Joints = append(p.Joints, &Revolute{}) }),
			err: ErrReference, joints: []int{4}, says: "*planar.Revolute"},
		{name: "joint made of another", design: with(func(p *plan) { p.Joints = append(p.Joints, struct{ Revolute }{}) }),
			err: ErrReference, joints: []int{4}},
		{name: "no drive", design: with(func(p *plan) { p.Drives = append(p.Drives, nil) }), err: ErrReference, drives: []int{1}},
		{name: "pointer to a drive", design: with(func(p *plan) { p.Drives = append(p.Drives, (*Turn)(nil)) }), err: ErrReference, drives: []int{1}},
		{name: "two links of one name", design: with(func(p *plan) { p.Links[3] = "rod" }), err: ErrReference, says: `the same name "rod"`},
		{name: "guess of the wrong length", design: with(func(p *plan) { p.Guess = make([]rigid.Placement, 3) }),
			err: ErrReference, says: "Guess has 3 placements for 4 links"},
		{name: "guess that is no number", design: with(func(p *plan) {
			p.Guess = make([]rigid.Placement, 4)
			p.Guess[2].Angle = math.NaN()
		}), err: rigid.ErrNotFinite, says: "Guess[2].Angle"},
		{name: "not a number", design: with(func(p *plan) { p.pin(crank.At(math.NaN(), 0), rod.At(0, 0)) }),
			err: rigid.ErrNotFinite, joints: []int{4}, says: "Joints[4].A.X"},
		{name: "infinite angle", design: with(func(p *plan) { p.slide(crank.Line(0, 0, math.Inf(1)), rod.Line(0, 0, 0)) }),
			err: rigid.ErrNotFinite, drives: []int{1}, says: "Drives[1].Of.Angle"},
		{name: "too large", design: with(func(p *plan) { p.pin(crank.At(1e61, 0), rod.At(0, 0)) }),
			err: rigid.ErrInput, joints: []int{4}, says: "Joints[4].A.X"},
		{name: "too small", design: scaled(driven(fourBar(), 1, 0), 1e-61), err: rigid.ErrInput, says: "largest length"},
		{name: "gears of neither teeth nor radii", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rocker, Arm: Frame})
		}), err: ErrReference, joints: []int{4}},
		{name: "negative teeth", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rocker, Arm: Frame, TeethA: -10, TeethB: 20})
		}), err: rigid.ErrNotPositive, joints: []int{4}, says: "TeethA"},
		{name: "half of the radii", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rocker, Arm: Frame, RadiusA: 0.1})
		}), err: rigid.ErrNotPositive, joints: []int{4}, says: "RadiusB"},
		{name: "teeth against radii", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rocker, Arm: Frame, TeethA: 10, TeethB: 20, RadiusA: 0.1, RadiusB: 0.21})
		}), err: rigid.ErrInput, joints: []int{4}, says: "not the teeth's 0.5"},
		{name: "phase given and read", design: with(func(p *plan) {
			p.Joints = append(p.Joints, GearPair{A: crank, B: rocker, Arm: Frame, TeethA: 10, TeethB: 20, Phase: 1, AsAssembled: true})
		}), err: rigid.ErrInput, joints: []int{4}, says: "Phase"},
		{name: "rack without a radius", design: with(func(p *plan) {
			p.Joints = append(p.Joints, RackPair{Pinion: crank.At(0, 0), Rack: rocker.Line(0, 0, 0)})
		}), err: rigid.ErrNotPositive, joints: []int{4}, says: "Radius"},
		{name: "gears too far apart for their radii", design: gearsApart(0.19), err: ErrInconsistent, joints: []int{2},
			says: "centres 0.15 m apart, their pins 0.19"},

		{name: "pinion on the wrong side", design: rackOff(true, 0, 0), err: ErrInconsistent, links: "frame pinion rack", joints: []int{1, 2},
			says: "lies 0.02 m left of the rack's line, its radius puts it at -0.02 m"},
		{name: "pinion too far", design: rackOff(false, 0.001, 0), err: ErrInconsistent, joints: []int{1, 2}, says: "lies 0.021 m"},
		{name: "rack askew", design: rackOff(false, 0, 0.01), err: ErrInconsistent, joints: []int{1, 2}, says: "not parallel"},
		{name: "planets whose phases do not fit", design: func() Design {
			d := epicyclic(2, false)
			g := d.Joints[6].(GearPair)
			g.Phase = 0.1
			d.Joints[6] = g
			return d
		}(), err: ErrInconsistent, joints: []int{3, 4, 6, 7}, says: "AsAssembled"},

		{name: "teeth and radii that differ", design: meshTwice(0.03, 0.11), err: ErrOverconstrained, joints: []int{2, 3}, drives: []int{0}},
		{name: "missing drive", design: fourBar().Design, err: ErrUnderconstrained, links: "crank rod rocker", says: "1 drive or joint missing"},
		{name: "isolated link", design: with(func(p *plan) { p.Link("loose") }), err: ErrUnderconstrained, links: "loose", says: "3 drives or joints missing"},
		{name: "two drives of one freedom", design: with(func(p *plan) { p.turn(rocker, Frame) }),
			err: ErrOverconstrained, drives: []int{0, 1}, says: "1 constraint too many"},
		{name: "one drive twice", design: with(func(p *plan) { p.turn(crank, Frame) }),
			err: ErrOverconstrained, links: "frame crank", drives: []int{0, 1}},
		{name: "one drive twice, the other way", design: with(func(p *plan) { p.turn(Frame, crank) }),
			err: ErrOverconstrained, links: "frame crank", drives: []int{0, 1}},
		{name: "one joint twice", design: with(func(p *plan) { p.pin(rod.At(0, 0), crank.At(0.05, 0)) }),
			err: ErrOverconstrained, links: "crank rod", joints: []int{1, 4}, says: "the same"},
		{name: "drives round a ring", design: driveRing(), err: ErrOverconstrained, drives: []int{0, 1, 2}, says: "driven or held twice"},
		{name: "drive of a guided link's angle", design: with(func(p *plan) {
			p.guide(rocker.Line(0, 0, 0), p.Link("block").Line(0, 0, 0))
			p.turn(4, rocker)
		}), err: ErrOverconstrained, links: "rocker block", joints: []int{4}, drives: []int{1}},
		{name: "drive of links fixed to each other", design: with(func(p *plan) { l := p.Link("plate"); p.fix(1, l); p.turn(l, crank) }),
			err: ErrOverconstrained, links: "crank plate", drives: []int{1}, says: "fixed to each other"},
		{name: "third crank", design: thirdCrank(0.05), err: ErrOverconstrained, says: "takes a Guess"},
		{name: "three guides of different slopes that contradict", design: badWedge(), err: ErrInconsistent,
			links: "frame wedge lifter", joints: []int{0, 1, 2}, says: "by -0.1 rad"},
		{name: "parallel rails that miss each other", design: rails(0.01, 0), err: ErrInconsistent, links: "frame table", joints: []int{0, 1}, says: "0.01 m"},
		{name: "rails that should be parallel", design: rails(0, 0.01), err: ErrInconsistent, links: "frame table", joints: []int{0, 1}, says: "0.01 rad"},
		{name: "one pin in two points", design: with(func(p *plan) { p.pin(crank.At(0.06, 0), rod.At(0, 0)) }),
			err: ErrInconsistent, links: "crank rod", joints: []int{1, 4}, says: "0.01 m apart"},
		{name: "links fixed in a ring that does not close", design: fixedRing(1e-6), err: ErrInconsistent, says: "ring"},
		{name: "parallel guides of one block", design: parallelGuides(), err: ErrOverconstrained, links: "frame crank block yoke"},

		// Counts agree in the next two, and yet one part holds itself twice while another is free.
		{name: "floating ring of guides", design: floatingRing(), err: ErrUnderconstrained, says: "1 drive or joint missing", links: "one two three rod"},
		{name: "floating pair pinned twice", design: floatingPair(), err: ErrOverconstrained, links: "one two", joints: []int{2, 3},
			says: "1 drive or joint missing, one, two stay free"},
	}
}

func TestRefusals(t *testing.T) {
	for _, test := range refusals() {
		t.Run(test.name, func(t *testing.T) {
			l, err := New(test.design)
			if l != nil || !errors.Is(err, test.err) {
				t.Fatalf("New: %v, %v; want %v", l, err, test.err)
			}
			bad, ok := errors.AsType[*DesignError](err)
			if !ok {
				t.Fatalf("%T is no *DesignError", err)
			}
			if got := strings.Join(bad.Links, " "); test.links != "" && got != test.links {
				t.Errorf("links %q, want %q", got, test.links)
			}
			if test.joints != nil && !slices.Equal(bad.Joints, test.joints) {
				t.Errorf("joints %v, want %v", bad.Joints, test.joints)
			}
			if test.drives != nil && !slices.Equal(bad.Drives, test.drives) {
				t.Errorf("drives %v, want %v", bad.Drives, test.drives)
			}
			if msg := err.Error(); !strings.HasPrefix(msg, "twopoint: ") || strings.Count(msg, "twopoint: ") != 1 || !strings.Contains(msg, test.says) {
				t.Errorf("message %q, want it to say %q", msg, test.says)
			}
			for _, name := range bad.Links {
				if !strings.Contains(err.Error(), name) {
					t.Errorf("message %q does not name %s", err, name)
				}
			}
		})
	}
}

// What repeats other joints and agrees with them is let pass.
func TestRepeats(t *testing.T) {
	for name, d := range map[string]Design{
		"two rails":         rails(0, 0),
		"ring of pins":      pinRing(),
		"ring of Fixed":     fixedRing(0),
		"pins of one plate": with(func(p *plan) { l := p.Link("plate"); p.fix(2, l); p.pin(l.At(0.1, 0), Link(2).At(0.1, 0)) }),
		"gears at distance": gearsApart(0.15),
		"guides a turn off": turnOff(),
		"phase that is read": func() Design {
			d := meshTwice(0.03, 0.1)
			first, second := d.Joints[2].(GearPair), d.Joints[3].(GearPair)
			first.Phase, second.AsAssembled = 0.3, true
			d.Joints[2], d.Joints[3] = first, second
			return d
		}(),
		"radii for teeth": meshTwice(0.03, 0.1),
	} {
		if _, err := New(d); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// turnOff is a wedge drive whose angles add up to a whole turn.
func turnOff() Design {
	d := wedge(false)
	d.Joints[2] = Prismatic{A: Frame.Line(0.3, 0, math.Pi/2), B: Link(2).Line(0, 0, math.Pi/2-2*math.Pi)}
	return d
}

// meshTwice ties two wheels by teeth in the ratio of 3 to 10 and by radii as well.
func meshTwice(a, b float64) Design {
	var p plan
	l := p.links("one", "two")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(a+b, 0), l[1].At(0, 0))
	p.Joints = append(p.Joints,
		GearPair{A: l[0], B: l[1], Arm: Frame, TeethA: 18, TeethB: 60},
		GearPair{A: l[0], B: l[1], Arm: Frame, RadiusA: a, RadiusB: b})
	p.turn(l[0], Frame)
	return p.Design
}

func (p *plan) fix(a, b Link) {
	p.Joints = append(p.Joints, Fixed{A: a.Line(0, 0, 0), B: b.Line(0, 0, 0)})
}

// pinRing joins three links on one pin by three revolutes.
func pinRing() Design {
	var p plan
	l := p.links("left", "right", "strut")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(1, 0), l[1].At(0, 0))
	p.pin(l[0].At(1, 0), l[1].At(1, 0))
	p.pin(l[1].At(1, 0), l[2].At(0, 0))
	p.pin(l[2].At(0, 0), l[0].At(1, 0))
	p.turn(l[2], Frame)
	return p.Design
}

func TestZeroLinkage(t *testing.T) {
	var l Linkage
	if l.Mobility() != 0 || l.Groups() != nil || l.Design().Links != nil {
		t.Error("a Linkage that New did not make has a structure")
	}
}

// A Linkage shares nothing with the Design that it was made of, nor with the copies it gives.
func TestDesignIsCopied(t *testing.T) {
	d := driven(fourBar(), 1, 0)
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	d.Links[1], d.Joints[0], d.Drives[0] = "other", nil, nil
	l.Design().Links[2] = "other"
	l.Groups()[1].Links[0] = 0
	if got := fmt.Sprint(l.Design().Links, l.Design().Joints[0] != nil, l.Design().Drives[0] != nil, groups(l)); got !=
		"[frame crank rod rocker] true truecrank | rod+rocker RRR" {
		t.Error(got)
	}
}
