package slidercrank_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"log"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// tilePress is the crank press of the invented roof-tile press line: the guide of
// its ram points down, so that Mount turns the mechanism's x axis by −90°.
var tilePress = slidercrank.Dimensions{
	Crank:  120 * rigid.Millimetre,
	Rod:    480 * rigid.Millimetre,
	Offset: 15 * rigid.Millimetre,
	Mount:  rigid.Placement{Y: 1.8, Angle: -math.Pi / 2},
}

// The machine's dimensions usually stand in a file of its own.
func ExampleDimensions() {
	const file = `{"crank": 0.12, "rod": 0.48, "offset": 0.015, "branch": "ahead", "mount": {"y": 1.8, "angle": -1.5707963267948966}}`
	var d slidercrank.Dimensions
	if err := json.Unmarshal([]byte(file), &d); err != nil {
		log.Fatal(err)
	}
	fmt.Println(d == tilePress)

	d.Crank = -d.Crank
	_, err := slidercrank.New(d)
	if bad, ok := errors.AsType[*rigid.DimensionError](err); ok {
		fmt.Println(bad.Name, bad.Value)
	}
	// Output:
	// true
	// Crank -0.12
}

// A crank longer than the rod can only rock, and the slider is ahead of the crank pin
// or behind it.
func ExampleBranch() {
	for _, branch := range []slidercrank.Branch{slidercrank.Ahead, slidercrank.Behind} {
		l, err := slidercrank.New(slidercrank.Dimensions{Crank: 0.3, Rod: 0.25, Branch: branch})
		if err != nil {
			log.Fatal(err)
		}
		var st slidercrank.State
		if err := l.Solve(&st, rigid.Coordinate{Pos: 20 * rigid.Degree}); err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%s: %.3f m\n", branch, st.Slide.Pos)
	}
	// Output:
	// ahead: 0.510 m
	// behind: 0.054 m
}

// One tick of the press's control: where everything is and how it moves.
func ExampleLinkage_Solve() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	var st slidercrank.State // one for the whole run
	crank := rigid.Coordinate{Pos: 70 * rigid.Degree, Vel: 45 * rigid.RPM}
	if err := press.Solve(&st, crank); err != nil {
		log.Fatal(err)
	}
	fmt.Printf("ram %.1f mm, %.3f m/s, %.2f m/s²\n", st.Slide.Pos/rigid.Millimetre, st.Slide.Vel, st.Slide.Acc)
	middle := st.Rod.At(r2.Vec{X: 0.24})
	fmt.Printf("rod's middle %.3f m/s, its pressure angle %.1f°\n", r2.Norm(middle.Vel), st.PressureAngle()/rigid.Degree)
	// Output:
	// ram 511.0 mm, -0.572 m/s, -0.47 m/s²
	// rod's middle 0.560 m/s, its pressure angle 11.8°
}

// A ram speed is commanded: which crank speed gives it?
func ExampleLinkage_SolveSlide() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	var st slidercrank.State
	for _, place := range []float64{0.500, 0.5998124} {
		ram := rigid.Coordinate{Pos: place, Vel: -0.2}
		switch err := press.SolveSlide(&st, ram, rigid.Left); {
		case err == nil && st.Margin < 0.05:
			fmt.Printf("%.3f m: too near the dead centre, margin %.4f\n", place, st.Margin)
		case err == nil:
			fmt.Printf("%.3f m: crank at %.1f°, %.1f rpm\n", place, st.Turn.Pos/rigid.Degree, st.Turn.Vel/rigid.RPM)
		default:
			fmt.Printf("%.3f m: %v\n", place, err)
		}
	}
	// Output:
	// 0.500 m: crank at 75.2°, 15.6 rpm
	// 0.600 m: too near the dead centre, margin 0.0012
}

// What a fitter asks of a press.
func ExampleLinkage() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	stroke, err := press.Stroke()
	if err != nil {
		log.Fatal(err)
	}
	ratio, err := press.TimeRatio()
	if err != nil {
		log.Fatal(err)
	}
	_, tilt := press.PressureAngles()
	fmt.Printf("stroke %.2f mm, time ratio %.4f, pressure angle up to %.1f°\n", stroke/rigid.Millimetre, ratio, tilt/rigid.Degree)

	peaks, _, err := rigid.Law(press.Coefficients).Peaks(rigid.Interval{Hi: rigid.Revolution})
	if err != nil {
		log.Fatal(err)
	}
	for _, c := range peaks {
		top := c.Output(45*rigid.RPM, 0)
		fmt.Printf("top speed %.3f m/s with the crank at %.1f°\n", top.Vel, c.In/rigid.Degree)
	}
	// Output:
	// stroke 240.13 mm, time ratio 0.9894, pressure angle up to 16.3°
	// top speed -0.579 m/s with the crank at 78.3°
	// top speed 0.588 m/s with the crank at 284.8°
}

// The ram is at the ends of its stroke where crank and rod lie in one line.
func ExampleDeadCentre() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	outer, inner, err := press.DeadCentres()
	if err != nil {
		log.Fatal(err)
	}
	for _, c := range []slidercrank.DeadCentre{outer, inner} {
		fmt.Printf("crank at %.2f°, ram at %.2f mm\n", c.Turn/rigid.Degree, c.Slide/rigid.Millimetre)
	}
	// Output:
	// crank at 1.43°, ram at 599.81 mm
	// crank at -177.61°, ram at 359.69 mm
}

// The ram itself, and a point of it, in the frame of the hall.
func ExampleState() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	var st slidercrank.State
	if err := press.Solve(&st, rigid.Coordinate{Pos: 1, Vel: 5}); err != nil {
		log.Fatal(err)
	}
	face := st.Slider.At(r2.Vec{X: 0.2}) // of the die, 200 mm below the slider pin
	fmt.Printf("die at (%.3f, %.3f) m, rising at %.3f m/s\n", face.Pos.X, face.Pos.Y, face.Vel.Y)
	fmt.Printf("knee %v, branch %v, margin %.3f\n", st.Knee, st.Branch, st.Margin)
	// Output:
	// die at (0.015, 1.063) m, rising at 0.564 m/s
	// knee left, branch ahead, margin 0.984
}

// Which length has to be held most closely for the ram to come down where it should?
func ExampleSensitivity() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	bottom, _, err := press.DeadCentres()
	if err != nil {
		log.Fatal(err)
	}
	var s slidercrank.Sensitivity
	if err := press.Sensitivity(&s, rigid.Coordinate{Pos: bottom.Turn}, r2.Vec{}); err != nil {
		log.Fatal(err)
	}
	fmt.Printf("crank %.4f, rod %.4f, offset %.4f mm/mm\n", s.Crank.Slide.Pos, s.Rod.Slide.Pos, s.Offset.Slide.Pos)

	const tolerance = 0.05 // mm, of each length
	worst, squares := 0.0, 0.0
	for _, by := range []slidercrank.LengthSensitivity{s.Crank, s.Rod, s.Offset} {
		x := by.Slide.Pos * tolerance
		worst, squares = worst+math.Abs(x), squares+x*x
	}
	fmt.Printf("ram off by %.3f mm at worst, %.3f mm likely\n", worst, math.Sqrt(squares))
	// Output:
	// crank 1.0003, rod 1.0003, offset -0.0250 mm/mm
	// ram off by 0.101 mm at worst, 0.071 mm likely
}

func ExampleLengthSensitivity() {
	press, err := slidercrank.New(tilePress)
	if err != nil {
		log.Fatal(err)
	}
	var s slidercrank.Sensitivity
	turn := rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 40 * rigid.RPM}
	if err := press.Sensitivity(&s, turn, r2.Vec{X: 0.24}); err != nil {
		log.Fatal(err)
	}
	by, v := s.Crank.Slide, s.Crank.Point.Vel
	fmt.Printf("1 mm more crank: ram %.3f mm, %.2f mm/s; middle of the rod %.2f, %.2f mm/s\n", by.Pos, by.Vel, v.X, v.Y)
	// Output:
	// 1 mm more crank: ram 0.337 mm, -4.50 mm/s; middle of the rod 1.05, 4.06 mm/s
}
