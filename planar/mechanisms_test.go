package planar_test

import (
	"fmt"
	"math"

	. "example.com/twopoint/planar"
)

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
