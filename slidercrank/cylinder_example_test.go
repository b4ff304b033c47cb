package slidercrank_test

import (
	"fmt"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// The actuator that tilts the mould of an invented roof-tile press line: pinned to
// the frame and to an arm of the mould's shaft.
var tilter = slidercrank.CylinderDimensions{Crank: 0.25, Centre: 0.6}

func ExampleOscillatingCylinder() {
	tilt, err := slidercrank.NewOscillatingCylinder(tilter)
	if err != nil {
		fmt.Println(err)
		return
	}
	// The actuator extends at 50 mm/s.
	var st slidercrank.CylinderState
	for _, length := range []float64{0.45, 0.60, 0.75, 0.90} {
		err := tilt.SolveSlide(&st, rigid.Coordinate{Pos: length, Vel: 0.05}, rigid.Right)
		if err != nil {
			fmt.Printf("%.0f mm: %v\n", length/rigid.Millimetre, err)
			continue
		}
		fmt.Printf("%.0f mm: mould arm at %5.1f°, %+.2f rad/s, margin %.2f\n",
			length/rigid.Millimetre, st.Turn.Pos/rigid.Degree, st.Turn.Vel, st.Margin)
	}
	// Output:
	// 450 mm: mould arm at 137.2°, -0.22 rad/s, margin 0.91
	// 600 mm: mould arm at 102.0°, -0.20 rad/s, margin 0.98
	// 750 mm: mould arm at  62.2°, -0.28 rad/s, margin 0.71
	// 900 mm: twopoint: out of reach of the links
}

func ExampleCylinderState() {
	tilt, err := slidercrank.NewOscillatingCylinder(tilter)
	if err != nil {
		fmt.Println(err)
		return
	}
	// The mould is to turn at 0.2 rad/s: how fast must the actuator be?
	var st slidercrank.CylinderState
	if err := tilt.Solve(&st, rigid.Coordinate{Pos: 80 * rigid.Degree, Vel: 0.2}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("actuator %.1f mm long, %+.1f mm/s, at %.1f° to the line of pivots\n",
		st.Slide.Pos/rigid.Millimetre, st.Slide.Vel/rigid.Millimetre, st.Swing.Pos/rigid.Degree)
	// Output:
	// actuator 688.9 mm long, -42.9 mm/s, at 20.9° to the line of pivots
}

func ExampleCylinderDimensions() {
	tilt, err := slidercrank.NewOscillatingCylinder(tilter)
	if err != nil {
		fmt.Println(err)
		return
	}
	need := tilt.Lengths()
	fmt.Printf("for a whole turn of the arm the actuator goes from %.0f to %.0f mm\n", need.Lo/rigid.Millimetre, need.Hi/rigid.Millimetre)
	// Output:
	// for a whole turn of the arm the actuator goes from 350 to 850 mm
}
