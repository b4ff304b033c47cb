package rigid_test

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// press is the law of the tile press: a crank of 60 mm and a rod of 240 mm drive the
// ram along x.
var press = rigid.LawOf(func(turn rigid.Coordinate) (rigid.Coordinate, error) {
	crank := rigid.Motion{Pose: rigid.NewPose(0, 0, turn.Pos), Omega: turn.Vel, Alpha: turn.Acc}
	pin := crank.At(r2.Vec{X: 0.06})
	end := r2.Vec{X: pin.Pos.X + math.Sqrt(0.24*0.24-pin.Pos.Y*pin.Pos.Y)}
	_, ram, err := rigid.Guided(pin, end, r2.Vec{X: 1})
	ram.Pos = end.X
	return ram, err
})

// oneTurn holds each position of the crank once.
var oneTurn = rigid.Interval{Lo: -math.Pi, Hi: math.Pi}

// Where the ram of the tile press is at 60° of the crank, and how it moves at 45 rpm.
func ExampleLaw() {
	c, err := press(60 * rigid.Degree)
	if err != nil {
		fmt.Println(err)
		return
	}
	ram := c.Output(45*rigid.RPM, 0)
	fmt.Printf("%.4f m, %.4f m/s, %.4f m/s²\n", ram.Pos, ram.Vel, ram.Acc)
	// Output: 0.2643 m, -0.2762 m/s, -0.4998 m/s²
}

// The two dead centres of the press, and its stroke.
func ExampleLaw_Extremes() {
	dead, err := press.Extremes(oneTurn)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, c := range dead {
		fmt.Printf("crank at %.0f°: ram at %.3f m\n", c.In/rigid.Degree, c.Out)
	}
	fmt.Printf("stroke %.3f m\n", math.Abs(dead[1].Out-dead[0].Out))
	// Output:
	// crank at -180°: ram at 0.180 m
	// crank at 0°: ram at 0.300 m
	// stroke 0.120 m
}

// How fast the ram is at 45 rpm of the crank, at the most, and how much it is accelerated.
func ExampleLaw_Peaks() {
	speed, acc, err := press.Peaks(oneTurn)
	if err != nil {
		fmt.Println(err)
		return
	}
	const crank = 45 * rigid.RPM
	for _, c := range speed {
		fmt.Printf("%.2f°: %.4f m/s\n", c.In/rigid.Degree, c.Output(crank, 0).Vel)
	}
	greatest := 0.0
	for _, c := range acc {
		greatest = max(greatest, math.Abs(c.Output(crank, 0).Acc))
	}
	fmt.Printf("%.4f m/s²\n", greatest)
	// Output:
	// -76.72°: 0.2915 m/s
	// 76.72°: -0.2915 m/s
	// 1.6655 m/s²
}

// The ram goes out on one stroke and in on the other.
func ExampleLaw_Strokes() {
	strokes, err := press.Strokes(oneTurn)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, s := range strokes {
		fmt.Printf("%.0f° to %.0f°\n", s.Lo/rigid.Degree, s.Hi/rigid.Degree)
	}
	// Output:
	// -180° to 0°
	// 0° to 180°
}

// Which crank motion makes the ram close at a steady 0.2 m/s, 10 mm before its outer
// dead centre, and at that dead centre itself, where there is none.
func ExampleLaw_Solve() {
	closing := rigid.Interval{Lo: -math.Pi, Hi: 0}
	for _, ram := range []rigid.Coordinate{{Pos: 0.29, Vel: 0.2}, {Pos: 0.3, Vel: 0.2}, {Pos: 0.3}} {
		crank, err := press.Solve(ram, closing)
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Printf("%.2f°, %.1f rpm, %.1f rad/s²\n", crank.Pos/rigid.Degree, crank.Vel/rigid.RPM, crank.Acc)
	}
	// Output:
	// -30.12°, 52.1 rpm, 48.3 rad/s²
	// twopoint: singular position: the rates are not determined
	// 0.00°, 0.0 rpm, 0.0 rad/s²
}

// A table of crank angles for ram positions, made once, on the closing stroke.
func ExampleLaw_Inverse() {
	crank, err := press.Inverse(rigid.Interval{Lo: -math.Pi, Hi: 0})
	if err != nil {
		fmt.Println(err)
		return
	}
	for c, err := range crank.Sweep(rigid.Interval{Lo: 0.18, Hi: 0.3}, 5) {
		if err != nil { // the dead centres, where the ram cannot drive the crank
			fmt.Printf("%.2f m: %v\n", c.In, err)
			continue
		}
		fmt.Printf("%.2f m: %.1f°, %.2f rad/m\n", c.In, c.Out/rigid.Degree, c.First)
	}
	// Output:
	// 0.18 m: twopoint: singular position: the rates are not determined
	// 0.21 m: -113.1°, 20.16 rad/m
	// 0.24 m: -82.8°, 16.27 rad/m
	// 0.27 m: -54.3°, 17.86 rad/m
	// 0.30 m: twopoint: singular position: the rates are not determined
}

// The motor turns the crank by a gear of 12 : 1, and the operator reads mm from the
// table: the ram by the motor's angle.
func ExampleLaw_Then() {
	table := rigid.Linear(1.0/12, 0).Then(press).Then(rigid.Linear(-1/rigid.Millimetre, 300))
	c, err := table(6 * math.Pi)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.2f mm above the table, %.3f mm/rad\n", c.Out, c.First)
	// Output: 67.62 mm above the table, 5.000 mm/rad
}

func ExampleLaw_Sweep() {
	for c, err := range press.Sweep(rigid.Interval{Lo: 0, Hi: math.Pi}, 5) {
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Printf("%3.0f° %.4f m\n", c.In/rigid.Degree, c.Out)
	}
	// Output:
	//   0° 0.3000 m
	//  45° 0.2786 m
	//  90° 0.2324 m
	// 135° 0.1938 m
	// 180° 0.1800 m
}
