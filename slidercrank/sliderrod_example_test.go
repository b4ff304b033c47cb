package slidercrank_test

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// The guide frame that turns a tile over in an invented roof-tile press line: a
// carrier with one end on an upright and one on a rail.
var carrier = slidercrank.RodDimensions{Length: 0.7, Angle: math.Pi / 2}

func ExampleSliderRod() {
	rod, err := slidercrank.NewSliderRod(carrier)
	if err != nil {
		fmt.Println(err)
		return
	}
	// The end on the rail is pushed inwards at 0.1 m/s; the other one rises.
	var st slidercrank.RodState
	if err := rod.SolveA(&st, rigid.Coordinate{Pos: -0.42, Vel: 0.1}, rigid.Right); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("upper end at %.0f mm, %+.3f m/s; carrier at %.1f°, %+.3f rad/s\n",
		st.SlideB.Pos/rigid.Millimetre, st.SlideB.Vel, st.Turn.Pos/rigid.Degree, st.Turn.Vel)
	// Output:
	// upper end at 560 mm, +0.075 m/s; carrier at 53.1°, +0.179 rad/s
}

func ExampleEllipse() {
	rod, err := slidercrank.NewSliderRod(carrier)
	if err != nil {
		fmt.Println(err)
		return
	}
	e := rod.Ellipse(r2.Vec{X: 0.2})
	fmt.Printf("the clamp at 200 mm draws an ellipse of half axes %.0f and %.0f mm\n", e.Major/rigid.Millimetre, e.Minor/rigid.Millimetre)
	// Output:
	// the clamp at 200 mm draws an ellipse of half axes 500 and 200 mm
}

func ExampleRodState() {
	rod, err := slidercrank.NewSliderRod(carrier)
	if err != nil {
		fmt.Println(err)
		return
	}
	var st slidercrank.RodState
	if err := rod.Solve(&st, rigid.Coordinate{Pos: 130 * rigid.Degree, Vel: -0.5}); err != nil {
		fmt.Println(err)
		return
	}
	pole, err := st.Rod.Pole()
	fixed, _ := rod.Cardan()
	fmt.Printf("pole at (%.3f, %.3f) m, on the circle of %.3f m; %v\n", pole.X, pole.Y, fixed.Radius, err)
	// Output:
	// pole at (0.450, 0.536) m, on the circle of 0.700 m; <nil>
}

func ExampleRodDimensions() {
	_, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Length: 0.7, Angle: math.Pi})
	fmt.Println(err)
	// Output:
	// twopoint: dimension Angle = 3.141592653589793: the two guides are parallel
}
