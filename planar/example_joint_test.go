package planar_test

import (
	"fmt"
	"math"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

func ExampleSlidingPin() {
	tell(trimmer())
	// Output:
	// class 1: crank
	// class 2: lever
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
