package planar_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
)

// A plan is a design with short ways to add to it.
type plan struct{ Design }

// links appends links by name.
func (p *plan) links(names ...string) []Link {
	out := make([]Link, len(names))
	for i, name := range names {
		out[i] = p.Link(name)
	}
	return out
}

func (p *plan) pin(a, b Attachment) { p.Joints = append(p.Joints, Revolute{A: a, B: b}) }
func (p *plan) guide(a, b Line)     { p.Joints = append(p.Joints, Prismatic{A: a, B: b}) }
func (p *plan) slot(a Attachment, s Line) {
	p.Joints = append(p.Joints, SlidingPin{Pin: a, Slot: s})
}
func (p *plan) turn(of, from Link)  { p.Drives = append(p.Drives, Turn{Of: of, From: from}) }
func (p *plan) slide(of, from Line) { p.Drives = append(p.Drives, Slide{Of: of, From: from}) }
func (p *plan) reach(a, b Attachment) {
	p.Drives = append(p.Drives, Reach{A: a, B: b})
}

// pinned joins links at arbitrary different points: structure alone counts.
func (p *plan) pinned(pairs ...[2]Link) {
	for i, pair := range pairs {
		x := 0.1 + 0.17*float64(i)
		p.pin(pair[0].At(x, x*x), pair[1].At(0.3-x, 0.2+x*x*x))
	}
}

// groups writes the groups of a linkage: links, then the class or the kind.
func groups(l *Linkage) string {
	d := l.Design()
	var text []string
	for _, g := range l.Groups() {
		var names []string
		for _, l := range g.Links {
			names = append(names, d.Links[l])
		}
		class := [...]string{RRR: " RRR", RRP: " RRP", RPR: " RPR", PRP: " PRP", RPP: " RPP"}[g.Kind]
		if g.Class > 2 || g.Class == 2 && g.Kind == NoDyad {
			class = fmt.Sprintf(" %d", g.Class)
		}
		text = append(text, strings.Join(names, "+")+class)
	}
	return strings.Join(text, " | ")
}

// wattI and its like drive one link of the six-bar by its angle to the frame. The
// chains are from the theory of machines: in Watt's the two links with three pins
// are neighbours, in Stephenson's they are not.
func wattI(driven int) Design {
	var p plan
	l := p.links("base", "arm", "coupler", "rocker", "link")
	// The frame is a link of two pins, arm and base have three.
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[2]}, [2]Link{l[2], l[1]}, [2]Link{l[1], 0},
		[2]Link{l[0], l[3]}, [2]Link{l[2], l[4]}, [2]Link{l[3], l[4]})
	p.turn(l[driven], Frame)
	return p.Design
}

func wattII(driven int) Design {
	var p plan
	l := p.links("crank", "rod", "beam", "link", "rocker")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[2], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonI(driven int) Design {
	var p plan
	l := p.links("left", "bar", "right", "link", "tie")
	// left and right have three pins each; frame and bar join them, link and tie too.
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[0], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], l[2]})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonII(driven int) Design {
	var p plan
	l := p.links("base", "one", "two", "plate", "crank")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[0], l[2]}, [2]Link{l[1], l[3]},
		[2]Link{l[2], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonIII(driven int) Design {
	var p plan
	l := p.links("crank", "plate", "rocker", "link", "lever")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[1], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}

func fourBar() plan {
	var p plan
	l := p.links("crank", "rod", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.05, 0), l[1].At(0, 0))
	p.pin(l[1].At(0.2, 0), l[2].At(0.12, 0))
	p.pin(Frame.At(0.18, 0), l[2].At(0, 0))
	return p
}

func sliderCrank() plan {
	var p plan
	l := p.links("crank", "rod", "ram")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.05, 0), l[1].At(0, 0))
	p.pin(l[1].At(0.2, 0), l[2].At(0, 0))
	p.guide(Frame.Line(0, 0, 0), l[2].Line(0, 0, 0))
	return p
}

func driven(p plan, of, from Link) Design {
	p.turn(of, from)
	return p.Design
}

func peaucellier(driven string) Design {
	var p plan
	l := p.links("QB", "OA", "AB", "OC", "BC", "CD", "DA")
	qb, oa, ab, oc, bc, cd, da := l[0], l[1], l[2], l[3], l[4], l[5], l[6]
	p.pin(Frame.At(1.2, 0), qb.At(0, 0))
	p.pin(Frame.At(0, 0), oa.At(0, 0))
	p.pin(Frame.At(0, 0), oc.At(0, 0))
	p.pin(oa.At(5, 0), ab.At(0, 0)) // A, of three links
	p.pin(oa.At(5, 0), da.At(3, 0))
	p.pin(qb.At(1.2, 0), ab.At(3, 0)) // B, of three links
	p.pin(qb.At(1.2, 0), bc.At(0, 0))
	p.pin(oc.At(5, 0), bc.At(3, 0)) // C, of three links
	p.pin(oc.At(5, 0), cd.At(0, 0))
	p.pin(cd.At(3, 0), da.At(0, 0)) // D
	for i, name := range p.Links {
		if name == driven {
			p.turn(Link(i), Frame)
		}
	}
	return p.Design
}

// scissor is a lift of so many stages of crossed bars with a platform on top.
func scissor(stages int) Design {
	var p plan
	var left, right Link
	for i := range stages {
		l := p.links(fmt.Sprint("L", i), fmt.Sprint("R", i))
		if i == 0 {
			p.pin(Frame.At(0, 0), l[0].At(-0.5, 0))
			p.slot(l[1].At(-0.5, 0), Frame.Line(0, 0, 0))
		} else {
			p.pin(left.At(0.5, 0), l[1].At(-0.5, 0))
			p.pin(right.At(0.5, 0), l[0].At(-0.5, 0))
		}
		p.pin(l[0].At(0, 0), l[1].At(0, 0))
		left, right = l[0], l[1]
	}
	top := p.Link("top")
	p.pin(right.At(0.5, 0), top.At(0, 0))
	p.slot(left.At(0.5, 0), top.Line(0, 0, 0))
	p.turn(1, Frame)
	return p.Design
}

func scissorGroups(stages int) string {
	text := "L0 | R0 RRP"
	for i := 1; i < stages; i++ {
		text += fmt.Sprintf(" | L%d+R%d RRR", i, i)
	}
	return text + " | top RPR"
}

func quickReturn() Design {
	var p plan
	l := p.links("crank", "lever", "link", "ram")
	p.pin(Frame.At(0, 0.3), l[0].At(0, 0))
	p.pin(Frame.At(0, 0), l[1].At(0, 0))
	p.slot(l[0].At(0.12, 0), l[1].Line(0, 0, 0))
	p.pin(l[1].At(0.6, 0), l[2].At(0, 0))
	p.pin(l[2].At(0.2, 0), l[3].At(0, 0))
	p.guide(Frame.Line(0, 0.7, 0), l[3].Line(0, 0, 0))
	p.turn(l[0], Frame)
	return p.Design
}

func wedge(rod bool) Design {
	var p plan
	l := p.links("wedge", "lifter")
	p.guide(Frame.Line(0, 0, 0), l[0].Line(0, 0, 0))
	p.guide(l[0].Line(0, 0, 0.2), l[1].Line(0, 0, 0.2))
	p.guide(Frame.Line(0.3, 0, math.Pi/2), l[1].Line(0, 0, math.Pi/2))
	p.slide(l[0].Line(0, 0, 0), Frame.Line(0, 0, 0))
	if rod {
		m := p.links("rod", "crank")
		p.pin(l[1].At(0, 0.1), m[0].At(0, 0))
		p.pin(m[0].At(0.3, 0), m[1].At(0.2, 0))
		p.pin(m[1].At(0, 0), Frame.At(0.4, 0.5))
	}
	return p.Design
}

// wedgeOnCarrier has the wedge drive on a link that turns.
func wedgeOnCarrier() Design {
	var p plan
	l := p.links("carrier", "wedge", "lifter")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.guide(l[0].Line(0, 0, 0), l[1].Line(0, 0, 0))
	p.guide(l[1].Line(0, 0, 0.2), l[2].Line(0, 0, 0.2))
	p.guide(l[0].Line(0.3, 0, math.Pi/2), l[2].Line(0, 0, math.Pi/2))
	p.turn(l[0], Frame)
	p.slide(l[1].Line(0, 0, 0), l[0].Line(0, 0, 0))
	return p.Design
}

func oldham() Design {
	var p plan
	l := p.links("shaft", "disc", "output")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0.018, 0), l[2].At(0, 0))
	p.guide(l[0].Line(0, 0, 0), l[1].Line(0, 0, 0))
	p.guide(l[1].Line(0, 0, math.Pi/2), l[2].Line(0, 0, math.Pi/2))
	p.turn(l[0], Frame)
	return p.Design
}

// trammel guides two pins of a rod along crossed slots, with blocks of its own or not.
func trammel(blocks, byBlock bool) Design {
	var p plan
	rod := p.Link("rod")
	if blocks {
		l := p.links("along", "across")
		p.guide(Frame.Line(0, 0, 0), l[0].Line(0, 0, 0))
		p.guide(Frame.Line(0, 0, math.Pi/2), l[1].Line(0, 0, math.Pi/2))
		p.pin(rod.At(0, 0), l[0].At(0, 0))
		p.pin(rod.At(0.7, 0), l[1].At(0, 0))
	} else {
		p.slot(rod.At(0, 0), Frame.Line(0, 0, 0))
		p.slot(rod.At(0.7, 0), Frame.Line(0, 0, math.Pi/2))
	}
	if byBlock {
		p.slide(Link(2).Line(0, 0, 0), Frame.Line(0, 0, 0))
	} else {
		p.turn(rod, Frame)
	}
	return p.Design
}

func scotchYoke() Design {
	var p plan
	l := p.links("crank", "block", "yoke")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.05, 0), l[1].At(0, 0))
	p.guide(l[2].Line(0, 0, math.Pi/2), l[1].Line(0, 0, math.Pi/2))
	p.guide(Frame.Line(0, 0, 0), l[2].Line(0, 0, 0))
	p.turn(l[0], Frame)
	return p.Design
}

// fiveBar has two cranks: both driven, geared, or with gears on the coupler.
func fiveBar(how string) Design {
	var p plan
	l := p.links("left", "right", "one", "two")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0.2, 0), l[1].At(0, 0))
	p.pin(l[0].At(0.1, 0), l[2].At(0, 0))
	p.pin(l[1].At(0.1, 0), l[3].At(0, 0))
	p.pin(l[2].At(0.3, 0), l[3].At(0.3, 0))
	p.turn(l[0], Frame)
	switch how {
	case "driven":
		p.turn(l[1], Frame)
	case "geared":
		p.Joints = append(p.Joints, GearPair{A: l[0], B: l[1], Arm: Frame, TeethA: 40, TeethB: 20})
	case "coupler":
		p.Joints = append(p.Joints, GearPair{A: l[0], B: l[3], Arm: l[2], TeethA: 40, TeethB: 20})
	}
	return p.Design
}

func rackPress() Design {
	var p plan
	l := p.links("pinion", "rack", "rod", "crank")
	p.pin(Frame.At(0, 0.02), l[0].At(0, 0))
	p.guide(Frame.Line(0, 0, 0), l[1].Line(0, 0, 0))
	p.Joints = append(p.Joints, RackPair{Pinion: l[0].At(0, 0), Rack: l[1].Line(0, 0, 0), Radius: 0.02})
	p.pin(l[1].At(0, 0), l[2].At(0, 0))
	p.pin(l[2].At(0.3, 0), l[3].At(0.1, 0))
	p.pin(l[3].At(0, 0), Frame.At(0.3, 0.2))
	p.turn(l[0], Frame)
	return p.Design
}

// digger has a boom and a bucket, each on a cylinder.
func digger(cylinders bool) Design {
	var p plan
	boom, bucket := p.Link("boom"), p.Link("bucket")
	p.pin(Frame.At(0, 0), boom.At(0, 0))
	p.pin(boom.At(2, 0), bucket.At(0, 0))
	ends := [][2]Attachment{{Frame.At(0.5, -0.5), boom.At(1, -0.1)}, {boom.At(1, 0.2), bucket.At(0.1, 0.3)}}
	for i, e := range ends {
		if !cylinders {
			p.reach(e[0], e[1])
			continue
		}
		l := p.links(fmt.Sprint("barrel", i), fmt.Sprint("piston", i))
		p.pin(e[0], l[0].At(0, 0))
		p.guide(l[0].Line(0, 0, 0), l[1].Line(0, 0, 0))
		p.pin(l[1].At(0, 0), e[1])
		p.slide(l[1].Line(0, 0, 0), l[0].Line(0, 0, 0))
	}
	return p.Design
}

func xyStage() Design {
	var p plan
	l := p.links("carriage", "table")
	p.guide(Frame.Line(0, 0, 0), l[0].Line(0, 0, 0))
	p.guide(l[0].Line(0, 0, math.Pi/2), l[1].Line(0, 0, math.Pi/2))
	p.slide(l[0].Line(0, 0, 0), Frame.Line(0, 0, 0))
	p.slide(l[1].Line(0, 0, math.Pi/2), l[0].Line(0, 0, math.Pi/2))
	return p.Design
}

// epicyclic has a sun of 32, planets of 20 and a fixed annulus of 72 teeth.
func epicyclic(planets int, asAssembled bool) Design {
	var p plan
	l := p.links("sun", "arm")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0, 0), l[1].At(0, 0))
	for i := range planets {
		planet := p.Link(fmt.Sprint("planet", i))
		s, c := math.Sincos(2 * math.Pi * float64(i) / float64(planets))
		p.pin(l[1].At(0.052*c, 0.052*s), planet.At(0, 0))
		p.Joints = append(p.Joints,
			GearPair{A: l[0], B: planet, Arm: l[1], TeethA: 32, TeethB: 20, RadiusA: 0.032, RadiusB: 0.020, AsAssembled: asAssembled},
			GearPair{A: Frame, B: planet, Arm: l[1], TeethA: 72, TeethB: 20, RadiusA: 0.072, RadiusB: 0.020, Internal: true, AsAssembled: asAssembled})
	}
	p.turn(l[1], Frame)
	return p.Design
}

// Decompositions are those of the theory of machines (Assur's groups, as in
// Artobolevskii's textbook, from memory). Mobility is counted by hand, after Grübler
// and Kutzbach: F = 3(n − 1) − 2·(pins and guides) − (slots, meshes).
func TestGroups(t *testing.T) {
	tests := []struct {
		name     string
		design   Design
		mobility int
		want     string
	}{
		{"four-bar, crank", driven(fourBar(), 1, 0), 1, "crank | rod+rocker RRR"},
		{"four-bar, rocker", driven(fourBar(), 3, 0), 1, "rocker | crank+rod RRR"},
		{"four-bar, coupler's angle", driven(fourBar(), 2, 0), 1, "crank+rod+rocker RRR"},
		{"four-bar, at a moving pin", driven(fourBar(), 2, 3), 1, "crank+rod+rocker RRR"},
		{"slider-crank", driven(sliderCrank(), 1, 0), 1, "crank | rod+ram RRP"},
		{"slider-crank, rod's angle", driven(sliderCrank(), 2, 0), 1, "crank+rod+ram RRP"},
		{"Watt I, base", wattI(0), 1, "base | arm+coupler RRR | rocker+link RRR"},
		{"Watt I, arm", wattI(1), 1, "arm | base+coupler RRR | rocker+link RRR"},
		{"Watt I, coupler", wattI(2), 1, "base+arm+coupler RRR | rocker+link RRR"},
		{"Watt I, rocker", wattI(3), 1, "base+arm+coupler+rocker+link 3"},
		{"Watt I, link", wattI(4), 1, "base+arm+coupler+rocker+link 3"},
		{"Watt II, crank", wattII(0), 1, "crank | rod+beam RRR | link+rocker RRR"},
		{"Watt II, rod", wattII(1), 1, "crank+rod+beam RRR | link+rocker RRR"},
		{"Watt II, beam", wattII(2), 1, "beam | crank+rod RRR | link+rocker RRR"},
		{"Watt II, link", wattII(3), 1, "beam+link+rocker RRR | crank+rod RRR"},
		{"Watt II, rocker", wattII(4), 1, "rocker | beam+link RRR | crank+rod RRR"},
		{"Stephenson I, left", stephensonI(0), 1, "left | bar+right RRR | link+tie RRR"},
		{"Stephenson I, bar", stephensonI(1), 1, "left+bar+right RRR | link+tie RRR"},
		{"Stephenson I, right", stephensonI(2), 1, "right | left+bar RRR | link+tie RRR"},
		{"Stephenson I, link", stephensonI(3), 1, "left+bar+right+link+tie 4"},
		{"Stephenson I, tie", stephensonI(4), 1, "left+bar+right+link+tie 4"},
		{"Stephenson II, base", stephensonII(0), 1, "base | one+two+plate+crank 3"},
		{"Stephenson II, one", stephensonII(1), 1, "base+one+two+plate+crank 3"},
		{"Stephenson II, two", stephensonII(2), 1, "base+one+two+plate+crank 3"},
		{"Stephenson II, plate", stephensonII(3), 1, "base+one+two+plate+crank 4"},
		{"Stephenson II, crank", stephensonII(4), 1, "crank | base+one+two+plate 4"},
		{"Stephenson III, crank", stephensonIII(0), 1, "crank | plate+rocker RRR | link+lever RRR"},
		{"Stephenson III, plate", stephensonIII(1), 1, "crank+plate+rocker RRR | link+lever RRR"},
		{"Stephenson III, rocker", stephensonIII(2), 1, "rocker | crank+plate RRR | link+lever RRR"},
		{"Stephenson III, link", stephensonIII(3), 1, "crank+plate+rocker+link+lever 3"},
		{"Stephenson III, lever", stephensonIII(4), 1, "lever | crank+plate+rocker+link 3"},
		{"Peaucellier", peaucellier("QB"), 1, "QB | OA+AB RRR | OC+BC RRR | CD+DA RRR"},
		{"Peaucellier, from the output", peaucellier("DA"), 1, "QB+OA+AB+OC+BC+CD+DA 4"},
		{"scissor lift", scissor(40), 1, scissorGroups(40)},
		{"quick return with ram", quickReturn(), 1, "crank | lever RPR | link+ram RRP"},
		{"wedge", wedge(false), 1, "wedge | lifter"},
		{"wedge that drives a crank", wedge(true), 1, "wedge | lifter | rod+crank RRR"},
		{"wedge on a carrier", wedgeOnCarrier(), 2, "carrier | wedge | lifter"},
		{"Oldham coupling", oldham(), 1, "shaft | disc+output RPP"},
		{"trammel, rod driven", trammel(true, false), 1, "rod+along+across"},
		{"trammel with pins in slots", trammel(false, false), 1, "rod"},
		{"trammel, block driven", trammel(true, true), 1, "along | rod+across RRP"},
		{"Scotch yoke", scotchYoke(), 1, "crank | block+yoke RPP"},
		{"five-bar, two drives", fiveBar("driven"), 2, "left | right | one+two RRR"},
		{"five-bar, geared", fiveBar("geared"), 1, "left | right | one+two RRR"},
		{"five-bar, gears on the coupler", fiveBar("coupler"), 1, "left | right+one+two 3"},
		{"rack and slider-crank", rackPress(), 1, "pinion | rack | rod+crank RRR"},
		{"digger", digger(false), 2, "boom RRR | bucket RRR"},
		{"digger with its cylinders", digger(true), 2, "boom+barrel0+piston0 RRR | bucket+barrel1+piston1 RRR"},
		{"x-y stage", xyStage(), 2, "carriage | table"},
		{"epicyclic", epicyclic(1, false), 1, "arm | planet0 | sun"},
		{"epicyclic, third planet", epicyclic(3, true), 1, "arm | planet0 | sun | planet1 | planet2"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			l, err := New(test.design)
			if err != nil {
				t.Fatal(err)
			}
			if got := groups(l); got != test.want {
				t.Errorf("groups\n got %s\nwant %s", got, test.want)
			}
			if got := l.Mobility(); got != test.mobility {
				t.Errorf("mobility %d, want %d", got, test.mobility)
			}
		})
	}
}

// Blocks are as small as can be: driving links, wheels and planets take no
// equations to be solved together, nor does a pinion turned by its rack.
func TestBlocks(t *testing.T) {
	rack := rackPress()
	rack.Drives[0] = Slide{Of: Link(2).Line(0, 0, 0), From: Frame.Line(0, 0, 0)}
	for _, test := range []struct {
		name   string
		design Design
		want   string
	}{
		{"four-bar", driven(fourBar(), 1, 0), "[1 1 6]"},
		{"slider-crank", driven(sliderCrank(), 1, 0), "[1 1 5]"},
		{"epicyclic", epicyclic(3, true), "[1 1 1 1 1 1 1 1 1 1]"},
		{"rack that drives its pinion", rack, "[1 1 2 1 6]"},
	} {
		l, err := New(test.design)
		if err != nil {
			t.Fatal(err)
		}
		if got := fmt.Sprint(Sizes(l)); got != test.want {
			t.Errorf("%s: blocks of %s, want %s", test.name, got, test.want)
		}
	}
}
