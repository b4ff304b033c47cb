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
