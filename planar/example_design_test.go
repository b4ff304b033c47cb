package planar_test

import (
	"errors"
	"fmt"
	"math"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// The examples are of an invented roof-tile press line.

// tell prints the groups of a design, or what is wrong with it.
func tell(d planar.Design) {
	l, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, g := range l.Groups() {
		fmt.Print("class ", g.Class, ":")
		for _, link := range g.Links {
			fmt.Print(" ", d.Links[link])
		}
		fmt.Println()
	}
}

// The press itself: a crank, a rod and a ram in a straight guide.
func ExampleNew() {
	const (
		frame = planar.Frame + iota
		crank
		rod
		ram
	)
	press, err := planar.New(planar.Design{
		Links: []string{"frame", "crank", "rod", "ram"},
		Joints: []planar.Joint{
			planar.Revolute{A: frame.At(0, 0), B: crank.At(0, 0)},
			planar.Revolute{A: crank.At(0.05, 0), B: rod.At(0, 0)},
			planar.Revolute{A: rod.At(0.2, 0), B: ram.At(0, 0)},
			planar.Prismatic{A: frame.Line(0, 0, 0), B: ram.Line(0, 0, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: crank, From: frame}},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println("mobility", press.Mobility(), "groups", len(press.Groups()))
	// Output: mobility 1 groups 2
}

// A feeder's four-bar, link by link.
func ExampleDesign() {
	var d planar.Design
	crank, coupler, rocker := d.Link("crank"), d.Link("coupler"), d.Link("rocker")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: crank.At(0, 0)},
		planar.Revolute{A: crank.At(0.08, 0), B: coupler.At(0, 0)},
		planar.Revolute{A: coupler.At(0.26, 0), B: rocker.At(0.18, 0)},
		planar.Revolute{A: planar.Frame.At(0.24, 0), B: rocker.At(0, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: crank, From: planar.Frame}}
	tell(d)
	// Output:
	// class 1: crank
	// class 2: coupler rocker
}

// Without the motor the feeder is free to move.
func ExampleDesignError() {
	var d planar.Design
	crank, coupler, rocker := d.Link("crank"), d.Link("coupler"), d.Link("rocker")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: crank.At(0, 0)},
		planar.Revolute{A: crank.At(0.08, 0), B: coupler.At(0, 0)},
		planar.Revolute{A: coupler.At(0.26, 0), B: rocker.At(0.18, 0)},
		planar.Revolute{A: planar.Frame.At(0.24, 0), B: rocker.At(0, 0)},
	}
	_, err := planar.New(d)
	if bad, ok := errors.AsType[*planar.DesignError](err); ok {
		fmt.Println(errors.Is(err, planar.ErrUnderconstrained), bad.Links)
	}
	fmt.Println(err)
	// Output:
	// true [crank coupler rocker]
	// twopoint: under-constrained: 1 drive or joint missing, these links stay free (links crank, coupler, rocker)
}

// The dyad of a press is a rod with two revolutes and a ram in a guide.
func ExampleGroup() {
	l, err := planar.New(trimmer())
	if err != nil {
		fmt.Println(err)
		return
	}
	g := l.Groups()[1]
	fmt.Println(g.Links, g.Class, g.Kind)
	// Output: [link 2] 2 RPR
}

// The lever that trims the tiles' edges is a dyad of kind RPR: pinned to the frame,
// guided on a block that is pinned to the crank.
func ExampleKind() {
	l, err := planar.New(trimmer())
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, g := range l.Groups() {
		fmt.Println(g.Links, g.Kind)
	}
	// Output:
	// [link 1] no dyad
	// [link 2] RPR
}

// trimmer is a crank whose pin slides in a lever.
func trimmer() planar.Design {
	const (
		crank planar.Link = iota + 1
		lever
	)
	return planar.Design{
		Links: []string{"frame", "crank", "lever"},
		Joints: []planar.Joint{
			planar.Revolute{A: planar.Frame.At(0, 0.24), B: crank.At(0, 0)},
			planar.Revolute{A: planar.Frame.At(0, 0), B: lever.At(0, 0)},
			planar.SlidingPin{Pin: crank.At(0.12, 0), Slot: lever.Line(0, 0, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: crank, From: planar.Frame}},
	}
}

func ExampleSlidingPin() {
	tell(trimmer())
	// Output:
	// class 1: crank
	// class 2: lever
}

func ExampleLinkage() {
	l, err := planar.New(trimmer())
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(l.Design().Links, l.Mobility())
	// Output: [frame crank lever] 1
}

// Links are indices into the design, which has their names.
func ExampleLink() {
	var d planar.Design
	tray := d.Link("tray")
	fmt.Println(tray, d.Links[tray])
	// Output: link 1 tray
}

func ExampleAttachment() {
	var d planar.Design
	tray := d.Link("tray")
	hinge := tray.At(0.4, 0.05)
	fmt.Println(hinge.X, hinge.Y)
	// Output: 0.4 0.05
}

func ExampleLine() {
	var d planar.Design
	tray := d.Link("tray")
	rail := tray.Line(0, 0.05, 90*rigid.Degree)
	fmt.Printf("%.4f\n", rail.Angle)
	// Output: 1.5708
}

// A crossbar joined by one pin to two links of a lift takes a Revolute more.
func ExampleRevolute() {
	var d planar.Design
	left, right, hook := d.Link("left"), d.Link("right"), d.Link("hook")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: left.At(0, 0)},
		planar.Revolute{A: left.At(0.5, 0), B: right.At(0.5, 0)},
		planar.Revolute{A: planar.Frame.At(0.6, 0), B: right.At(0, 0)},
		planar.Revolute{A: left.At(0.5, 0), B: hook.At(0, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: hook, From: planar.Frame}}
	tell(d)
	// Output:
	// class 2: left right
	// class 1: hook
}

// A wedge lifts the mould: guides alone.
func ExamplePrismatic() {
	var d planar.Design
	wedge, mould := d.Link("wedge"), d.Link("mould")
	const slope = 10 * rigid.Degree
	d.Joints = []planar.Joint{
		planar.Prismatic{A: planar.Frame.Line(0, 0, 0), B: wedge.Line(0, 0, 0)},
		planar.Prismatic{A: wedge.Line(0, 0, slope), B: mould.Line(0, 0, slope)},
		planar.Prismatic{A: planar.Frame.Line(0.3, 0, math.Pi/2), B: mould.Line(0, 0, math.Pi/2)},
	}
	d.Drives = []planar.Drive{planar.Slide{Of: wedge.Line(0, 0, 0), From: planar.Frame.Line(0, 0, 0)}}
	tell(d)
	// Output:
	// class 1: wedge
	// class 1: mould
}

// The gripper is bolted to the arm.
func ExampleFixed() {
	var d planar.Design
	arm, gripper := d.Link("arm"), d.Link("gripper")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: arm.At(0, 0)},
		planar.Fixed{A: arm.Line(0.6, 0, 0), B: gripper.Line(0, 0, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: arm, From: planar.Frame}}
	tell(d)
	// Output: class 1: arm gripper
}

// A pinion of 20 teeth turns the drum of 60 that carries the moulds.
func ExampleGearPair() {
	var d planar.Design
	pinion, drum := d.Link("pinion"), d.Link("drum")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: pinion.At(0, 0)},
		planar.Revolute{A: planar.Frame.At(0.4, 0), B: drum.At(0, 0)},
		planar.GearPair{A: pinion, B: drum, Arm: planar.Frame, TeethA: 20, TeethB: 60, RadiusA: 0.1, RadiusB: 0.3},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: pinion, From: planar.Frame}}
	tell(d)
	// Output:
	// class 1: pinion
	// class 1: drum
}

// A pinion pushes the tray of tiles by a rack under it.
func ExampleRackPair() {
	var d planar.Design
	pinion, tray := d.Link("pinion"), d.Link("tray")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, -0.03), B: pinion.At(0, 0)},
		planar.Prismatic{A: planar.Frame.Line(0, 0, 0), B: tray.Line(0, 0, 0)},
		planar.RackPair{Pinion: pinion.At(0, 0), Rack: tray.Line(0, 0, 0), Radius: 0.03, Right: true},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: pinion, From: planar.Frame}}
	tell(d)
	// Output:
	// class 1: pinion
	// class 1: tray
}

// The two axes of the stacker.
func ExampleSlide() {
	var d planar.Design
	carriage, lift := d.Link("carriage"), d.Link("lift")
	level, upright := planar.Frame.Line(0, 2, 0), carriage.Line(0, 0, math.Pi/2)
	d.Joints = []planar.Joint{
		planar.Prismatic{A: level, B: carriage.Line(0, 0, 0)},
		planar.Prismatic{A: upright, B: lift.Line(0, 0, math.Pi/2)},
	}
	d.Drives = []planar.Drive{
		planar.Slide{Of: carriage.Line(0, 0, 0), From: level},
		planar.Slide{Of: lift.Line(0, 0, math.Pi/2), From: upright},
	}
	tell(d)
	// Output:
	// class 1: carriage
	// class 1: lift
}

// A flap driven by its angle.
func ExampleTurn() {
	var d planar.Design
	flap := d.Link("flap")
	d.Joints = []planar.Joint{planar.Revolute{A: planar.Frame.At(0, 0), B: flap.At(0, 0)}}
	d.Drives = []planar.Drive{planar.Turn{Of: flap, From: planar.Frame}}
	tell(d)
	// Output: class 1: flap
}

// The same flap on a cylinder.
func ExampleReach() {
	var d planar.Design
	flap := d.Link("flap")
	d.Joints = []planar.Joint{planar.Revolute{A: planar.Frame.At(0, 0), B: flap.At(0, 0)}}
	d.Drives = []planar.Drive{planar.Reach{A: planar.Frame.At(0.3, -0.4), B: flap.At(0.5, 0)}}
	tell(d)
	// Output: class 2: flap
}

// Joints are plain values of several types. Each prints as one line, or the design
// as many, with names.
func ExampleJoint() {
	for _, j := range trimmer().Joints {
		if pin, ok := j.(planar.Revolute); ok {
			fmt.Println("pin at", pin.A.X, pin.A.Y, "of the", pin.A.Link)
		}
	}
	fmt.Println(trimmer())
	// Output:
	// pin at 0 0.24 of the frame
	// pin at 0 0 of the frame
	// links: frame, crank, lever
	// joint 0: revolute: frame (0, 0.24), crank (0, 0)
	// joint 1: revolute: frame (0, 0), lever (0, 0)
	// joint 2: sliding pin: crank (0.12, 0) in lever (0, 0) at 0 rad
	// drive 0: turn: crank from frame
}

// A motor between two moving links turns a gripper on its arm.
func ExampleDrive() {
	var d planar.Design
	arm, gripper := d.Link("arm"), d.Link("gripper")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: arm.At(0, 0)},
		planar.Revolute{A: arm.At(0.6, 0), B: gripper.At(0, 0)},
	}
	d.Drives = []planar.Drive{
		planar.Turn{Of: arm, From: planar.Frame},
		planar.Turn{Of: gripper, From: arm},
	}
	tell(d)
	// Output:
	// class 1: arm
	// class 1: gripper
}
