package planar_test

import (
	"math"

	. "example.com/twopoint/planar"
)

func scaled(d Design, by float64) Design {
	size := func(a Attachment) Attachment { return a.Link.At(a.X*by, a.Y*by) }
	for i, j := range d.Joints {
		r := j.(Revolute)
		d.Joints[i] = Revolute{A: size(r.A), B: size(r.B)}
	}
	return d
}

func gearsApart(centres float64) Design {
	var p plan
	l := p.links("one", "two")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(centres, 0), l[1].At(0, 0))
	p.Joints = append(p.Joints, GearPair{A: l[0], B: l[1], Arm: Frame, RadiusA: 0.05, RadiusB: 0.1})
	p.turn(l[0], Frame)
	return p.Design
}

// rackOff is the rack press with its pinion on the other side, too far, or its rack
// turned.
func rackOff(right bool, far, askew float64) Design {
	d := rackPress()
	d.Joints[0] = Revolute{A: Frame.At(0, 0.02+far), B: Link(1).At(0, 0)}
	r := d.Joints[2].(RackPair)
	r.Right, r.Rack.Angle = right, askew
	d.Joints[2] = r
	return d
}

// driveRing drives three turns of which the third is the sum of the others.
func driveRing() Design {
	var p plan
	l := p.links("one", "two")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(1, 0), l[1].At(0, 0))
	p.turn(l[0], Frame)
	p.turn(l[1], l[0])
	p.turn(l[1], Frame)
	return p.Design
}

// thirdCrank has three cranks under one beam; the third is of its own length.
func thirdCrank(length float64) Design {
	var p plan
	l := p.links("crank", "beam", "second", "third")
	for i, at := range []float64{0, 0.2, 0.4} {
		crank, size := []Link{l[0], l[2], l[3]}[i], 0.05
		if i == 2 {
			size = length
		}
		p.pin(Frame.At(at, 0), crank.At(0, 0))
		p.pin(crank.At(size, 0), l[1].At(at, 0))
	}
	p.turn(l[0], Frame)
	return p.Design
}

func badWedge() Design {
	d := wedge(false)
	d.Joints[2] = Prismatic{A: Frame.Line(0.3, 0, math.Pi/2), B: Link(2).Line(0, 0, math.Pi/2-0.1)}
	return d
}

// rails guide a table on two rails, the second of which is off.
func rails(off, angle float64) Design {
	var p plan
	table := p.Link("table")
	p.guide(Frame.Line(0, 0, 0), table.Line(0, 0, 0))
	p.guide(Frame.Line(0, 0.5, 0), table.Line(0.1, 0.5+off, angle))
	p.slide(table.Line(0, 0, 0), Frame.Line(0, 0, 0))
	return p.Design
}

func fixedRing(off float64) Design {
	p := fourBar()
	l := p.links("plate", "bracket")
	p.Joints = append(p.Joints,
		Fixed{A: Link(2).Line(0.1, 0.1, 0.3), B: l[0].Line(0, 0, 0)},
		Fixed{A: l[0].Line(0.1, 0, 0.2), B: l[1].Line(0, 0, 0)},
		Fixed{A: l[1].Line(off, 0, 0), B: Link(2).Line(0.1+0.1*math.Cos(0.3), 0.1+0.1*math.Sin(0.3), 0.5)})
	p.turn(1, Frame)
	return p.Design
}

// parallelGuides is a Scotch yoke whose slot lies along the guide.
func parallelGuides() Design {
	d := scotchYoke()
	d.Joints[2] = Prismatic{A: Link(3).Line(0, 0, 0), B: Link(2).Line(0, 0, 0)}
	return d
}

func floatingRing() Design {
	var p plan
	l := p.links("crank", "one", "two", "three", "rod")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.1, 0), l[1].At(0, 0))
	p.guide(l[1].Line(0, 0, 0), l[2].Line(0, 0, 0))
	p.guide(l[2].Line(0, 0, 1), l[3].Line(0, 0, 1))
	p.guide(l[3].Line(0, 0, 2), l[1].Line(0, 0, 2))
	p.pin(l[3].At(0.2, 0.1), l[4].At(0, 0))
	p.pin(l[4].At(0.3, 0), Frame.At(0.5, 0))
	p.turn(l[0], Frame)
	return p.Design
}

func floatingPair() Design {
	var p plan
	l := p.links("crank", "one", "two")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.1, 0), l[1].At(0, 0))
	p.pin(l[1].At(0.1, 0), l[2].At(0, 0))
	p.pin(l[1].At(0.2, 0.1), l[2].At(0.1, 0.1))
	p.turn(l[0], Frame)
	return p.Design
}
