package slidercrank_test

import (
	"fmt"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// The lever that strikes off the surplus clay of a tile, in an invented roof-tile
// press line.
var strikeOff = slidercrank.LeverDimensions{Crank: 0.12, Centre: 0.24}

func ExampleSlottedLever() {
	lever, err := slidercrank.NewSlottedLever(strikeOff)
	if err != nil {
		fmt.Println(err)
		return
	}
	ratio, err := lever.TimeRatio()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("slow stroke : quick stroke = %.2f\n", ratio)
	for _, c := range lever.DeadCentres() {
		fmt.Printf("lever rests at %+.1f° with the crank at %+.1f°\n", c.Out/rigid.Degree, c.In/rigid.Degree)
	}
	// Output:
	// slow stroke : quick stroke = 2.00
	// lever rests at -30.0° with the crank at -120.0°
	// lever rests at +30.0° with the crank at +120.0°
}

func ExampleSlottedLever_SolveSwing() {
	lever, err := slidercrank.NewSlottedLever(strikeOff)
	if err != nil {
		fmt.Println(err)
		return
	}
	// Which crank speed gives the blade, on the lever, 1 rad/s on the slow stroke?
	var st slidercrank.LeverState
	err = lever.SolveSwing(&st, rigid.Coordinate{Pos: 10 * rigid.Degree, Vel: 1}, rigid.Right)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("crank at %.1f°, %.1f rpm\n", st.Turn.Pos/rigid.Degree, st.Turn.Vel/rigid.RPM)

	err = lever.SolveSwing(&st, rigid.Coordinate{Pos: 40 * rigid.Degree}, rigid.Right)
	fmt.Println(err)
	// Output:
	// crank at 30.3°, 29.6 rpm
	// twopoint: out of reach of the links
}

func ExampleLeverDimensions() {
	// A crank as long as the centre distance would pass the lever pivot.
	_, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: 0.2, Centre: 0.2})
	fmt.Println(err)
	// Output:
	// twopoint: dimensions: crank and centre distance differ by just the slot's offset, so that the motion could go on in two ways: a change point
}

func ExampleLeverState() {
	lever, err := slidercrank.NewSlottedLever(strikeOff)
	if err != nil {
		fmt.Println(err)
		return
	}
	var st slidercrank.LeverState
	if err := lever.Solve(&st, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 30 * rigid.RPM}); err != nil {
		fmt.Println(err)
		return
	}
	pin := st.Pin()
	fmt.Printf("block %.1f mm from the lever pivot, %.0f mm/s\n", st.Slide.Pos/rigid.Millimetre, st.Slide.Vel/rigid.Millimetre)
	fmt.Printf("tangential %.3f\nnormal     %.3f\nrelative   %.3f\nCoriolis   %.3f\nsum        %.3f\n",
		pin.Tangential, pin.Normal, pin.Relative, pin.Coriolis, pin.Sum())
	// Output:
	// block 317.5 mm from the lever pivot, -247 mm/s
	// tangential {0.109 -0.314}
	// normal     {-0.242 -0.084}
	// relative   {-0.604 -0.209}
	// Coriolis   {0.145 -0.419}
	// sum        {-0.592 -1.026}
}
