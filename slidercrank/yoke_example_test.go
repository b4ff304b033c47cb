package slidercrank_test

import (
	"fmt"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// The shaker of a sand hopper in an invented roof-tile press line.
var shaker = slidercrank.YokeDimensions{Crank: 0.015}

func ExampleScotchYoke() {
	yoke, err := slidercrank.NewScotchYoke(shaker)
	if err != nil {
		fmt.Println(err)
		return
	}
	var st slidercrank.YokeState
	if err := yoke.Solve(&st, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 300 * rigid.RPM}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("stroke %.0f mm; at 60°: %.1f mm, %+.3f m/s, %+.2f m/s²\n",
		yoke.Stroke()/rigid.Millimetre, st.Slide.Pos/rigid.Millimetre, st.Slide.Vel, st.Slide.Acc)
	// Output:
	// stroke 30 mm; at 60°: 7.5 mm, -0.408 m/s, -7.40 m/s²
}

func ExampleYokeState() {
	yoke, err := slidercrank.NewScotchYoke(shaker)
	if err != nil {
		fmt.Println(err)
		return
	}
	// A yoke can't drive its crank through the end of the stroke.
	var st slidercrank.YokeState
	err = yoke.SolveSlide(&st, rigid.Coordinate{Pos: 0.015, Acc: 1}, rigid.Right)
	fmt.Println(err)
	err = yoke.SolveSlide(&st, rigid.Coordinate{Pos: 0.009, Vel: 0.1}, rigid.Left)
	fmt.Printf("crank at %.1f°, %.1f rad/s, margin %.1f; %v\n", st.Turn.Pos/rigid.Degree, st.Turn.Vel, st.Margin, err)
	// Output:
	// twopoint: singular position: the rates are not determined
	// crank at -53.1°, 8.3 rad/s, margin 0.8; <nil>
}

func ExampleYokeDimensions() {
	tilted := shaker
	tilted.Tilt = 30 * rigid.Degree
	yoke, err := slidercrank.NewScotchYoke(tilted)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("stroke %.1f mm with the slot at 30°\n", yoke.Stroke()/rigid.Millimetre)

	tilted.Tilt = 90 * rigid.Degree
	_, err = slidercrank.NewScotchYoke(tilted)
	fmt.Println(err)
	// Output:
	// stroke 34.6 mm with the slot at 30°
	// twopoint: dimension Tilt = 1.5707963267948966: the slot lies along the travel
}
