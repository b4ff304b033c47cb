package slidercrank_test

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// The strike-off carriage of an invented roof-tile press line: a blade on a ram
// cuts the clay off flush above the mould and returns fast.
var carriage = slidercrank.QuickReturnDimensions{
	Crank: 0.12, Centre: 0.3, Arm: 0.5, Rod: 0.2,
	Guide: rigid.Placement{X: 0.15, Angle: math.Pi / 2},
}

func ExampleQuickReturn() {
	drive, err := slidercrank.NewQuickReturn(carriage)
	if err != nil {
		fmt.Println(err)
		return
	}
	cutting, back, err := drive.Strokes()
	if err != nil {
		fmt.Println(err)
		return
	}
	ratio, _ := drive.TimeRatio()
	stroke, _ := drive.Stroke()
	fmt.Printf("stroke %.1f mm, time ratio %.2f\n", stroke/rigid.Millimetre, ratio)
	fmt.Printf("cutting over %.1f° of the crank, return over %.1f°\n",
		(cutting.Turn.Hi-cutting.Turn.Lo)/rigid.Degree, (back.Turn.Hi-back.Turn.Lo)/rigid.Degree)
	// Output:
	// stroke 400.0 mm, time ratio 1.71
	// cutting over 227.2° of the crank, return over 132.8°
}

func ExampleQuickReturn_SolveTravel() {
	drive, err := slidercrank.NewQuickReturn(carriage)
	if err != nil {
		fmt.Println(err)
		return
	}
	// The blade is to pass the middle of the tile at 0.4 m/s, cutting. The output
	// pin lies right of the line from the lever pivot to the ram pin.
	var st slidercrank.QuickReturnState
	err = drive.SolveTravel(&st, rigid.Coordinate{Pos: 0.25, Vel: 0.4}, rigid.Right, rigid.Right)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("crank at %.1f°, %.1f rpm\n", st.Turn.Pos/rigid.Degree, st.Turn.Vel/rigid.RPM)
	// Output:
	// crank at 22.5°, 26.8 rpm
}

func ExampleQuickReturnState() {
	drive, err := slidercrank.NewQuickReturn(carriage)
	if err != nil {
		fmt.Println(err)
		return
	}
	var st slidercrank.QuickReturnState
	for _, turn := range []float64{-60, 0, 60, 180} {
		if err := drive.Solve(&st, rigid.Coordinate{Pos: turn * rigid.Degree, Vel: 30 * rigid.RPM}); err != nil {
			fmt.Println(err)
			return
		}
		fmt.Printf("%4.0f°: blade at %5.1f mm, %+.3f m/s, %+.2f m/s²\n", turn, st.Travel.Pos/rigid.Millimetre, st.Travel.Vel, st.Travel.Acc)
	}
	// Output:
	// -60°: blade at  59.0 mm, +0.333 m/s, +0.60 m/s²
	//    0°: blade at 193.6 mm, +0.449 m/s, +0.10 m/s²
	//   60°: blade at 336.4 mm, +0.364 m/s, -0.68 m/s²
	//  180°: blade at 193.6 mm, -1.047 m/s, +0.57 m/s²
}

func ExampleQuickReturnDimensions() {
	far := carriage
	far.Guide.X = 0.6 // farther from the lever's end than the rod is long
	_, err := slidercrank.NewQuickReturn(far)
	fmt.Println(err)
	// Output:
	// twopoint: dimensions: the rod reaches the guide at no angle of the crank
}

func ExampleRamStroke() {
	drive, err := slidercrank.NewQuickReturn(carriage)
	if err != nil {
		fmt.Println(err)
		return
	}
	cutting, back, err := drive.Strokes()
	if err != nil {
		fmt.Println(err)
		return
	}
	crank := 30 * rigid.RPM
	for _, s := range []slidercrank.RamStroke{cutting, back} {
		fmt.Printf("%.1f to %.1f mm, at most %.3f m/s and %.2f m/s²\n",
			s.From/rigid.Millimetre, s.To/rigid.Millimetre, math.Abs(s.Speed.First)*crank, math.Abs(s.Acc.Second)*crank*crank)
	}
	// Output:
	// -0.2 to 399.8 mm, at most 0.452 m/s and 2.01 m/s²
	// 399.8 to -0.2 mm, at most 1.051 m/s and 4.09 m/s²
}
