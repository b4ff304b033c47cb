package planar_test

import (
	"fmt"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// stacker is the five-bar that sets tiles onto pallets in an invented roof-tile
// press line: two driven arms, two rods that meet in the gripper.
func stacker() (*planar.State, planar.Attachment, error) {
	d := planar.Design{Links: []string{"frame"}}
	left, right := d.Link("left arm"), d.Link("right arm")
	leftRod, rightRod := d.Link("left rod"), d.Link("right rod")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(-0.1, 0), B: left.At(0, 0)},
		planar.Revolute{A: planar.Frame.At(0.1, 0), B: right.At(0, 0)},
		planar.Revolute{A: left.At(0.25, 0), B: leftRod.At(0, 0)},
		planar.Revolute{A: right.At(0.25, 0), B: rightRod.At(0, 0)},
		planar.Revolute{A: leftRod.At(0.35, 0), B: rightRod.At(0.35, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: left, From: planar.Frame}, planar.Turn{Of: right, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		return nil, planar.Attachment{}, err
	}
	guess := []rigid.Placement{{}, {X: -0.1, Angle: 2}, {X: 0.1, Angle: 1}, {X: -0.2, Y: 0.2, Angle: 1}, {X: 0.2, Y: 0.2, Angle: 2}}
	st, err := l.Assemble(guess, rigid.Coordinate{Pos: 120 * rigid.Degree}, rigid.Coordinate{Pos: 60 * rigid.Degree})
	return st, leftRod.At(0.35, 0), err
}

func ExampleInfluence() {
	st, gripper, err := stacker()
	if err != nil {
		fmt.Println(err)
		return
	}
	by := make([]planar.Influence, 2)
	if err := st.Influences(by, gripper); err != nil {
		fmt.Println(err)
		return
	}
	for i, x := range by {
		fmt.Printf("arm %d moves the gripper by (%.4f, %.4f) m/rad\n", i+1, x.Point.X, x.Point.Y)
	}
	fmt.Printf("condition %.3f\n", planar.Condition(by))
	// Output:
	// arm 1 moves the gripper by (-0.1827, -0.1534) m/rad
	// arm 2 moves the gripper by (-0.1827, 0.1534) m/rad
	// condition 1.192
}

func ExampleTool() {
	st, gripper, err := stacker()
	if err != nil {
		fmt.Println(err)
		return
	}
	// The gripper goes down at 0.2 m/s and brakes with 1 m/s².
	arms := make([]rigid.Coordinate, 2)
	err = st.Drive(arms, planar.Tool{At: gripper, Vel: r2.Vec{Y: -0.2}, Acc: r2.Vec{Y: 1}})
	if err != nil {
		fmt.Println(err)
		return
	}
	for i, c := range arms {
		fmt.Printf("arm %d at %.1f°: %.4f rad/s, %.4f rad/s²\n", i+1, c.Pos/rigid.Degree, c.Vel, c.Acc)
	}
	// Output:
	// arm 1 at 120.0°: 0.6521 rad/s, -3.8284 rad/s²
	// arm 2 at 60.0°: -0.6521 rad/s, 3.8284 rad/s²
}

// tilter is a four-bar that tilts moulds in the invented roof-tile press line; its
// driven arm does not turn fully.
func tilter() (*planar.State, error) {
	d := planar.Design{Links: []string{"frame"}}
	arm, rod, mould := d.Link("arm"), d.Link("rod"), d.Link("mould")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: arm.At(0, 0)},
		planar.Revolute{A: arm.At(0.16, 0), B: rod.At(0, 0)},
		planar.Revolute{A: rod.At(0.28, 0), B: mould.At(0.08, 0)},
		planar.Revolute{A: planar.Frame.At(0.3, 0), B: mould.At(0, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: arm, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		return nil, err
	}
	guess := []rigid.Placement{{}, {Angle: 1}, {X: 0.09, Y: 0.13, Angle: -0.2}, {X: 0.3, Angle: 1.2}}
	return l.Assemble(guess, rigid.Coordinate{Pos: 60 * rigid.Degree})
}

func ExampleLimit() {
	st, err := tilter()
	if err != nil {
		fmt.Println(err)
		return
	}
	lo, hi, err := st.Limits(rigid.Interval{Lo: -120 * rigid.Degree, Hi: 240 * rigid.Degree})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("the arm goes from %.3f° (%v) to %.3f° (%v)\n", lo.In/rigid.Degree, lo.Kind, hi.In/rigid.Degree, hi.Kind)
	// Output:
	// the arm goes from 38.048° (end of the drive) to 98.386° (end of the drive)
}

func ExampleLimitKind() {
	st, err := tilter()
	if err != nil {
		fmt.Println(err)
		return
	}
	// Within the swing that the machine uses nothing is in the way.
	lo, hi, err := st.Limits(rigid.Interval{Lo: 45 * rigid.Degree, Hi: 90 * rigid.Degree})
	fmt.Println(lo.Kind == planar.NoLimit && hi.Kind == planar.NoLimit, err)
	// Output:
	// true <nil>
}

// The law of the mould's angle for the arm's, with all that a law answers.
func ExampleState_Law() {
	st, err := tilter()
	if err != nil {
		fmt.Println(err)
		return
	}
	tilt := st.Law(func(st *planar.State) rigid.Coordinate { return st.Turn(3, planar.Frame) })
	c, err := tilt(70 * rigid.Degree)
	fmt.Printf("mould at %.2f°, first coefficient %.4f %v\n", c.Out/rigid.Degree, c.First, err)
	// Output:
	// mould at 72.02°, first coefficient 1.9956 <nil>
}
