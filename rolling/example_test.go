package rolling_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// All examples are set in one invented plant, a press line for roof tiles: a press with
// a planetary reducer, a conveyor to the dryer, and cars that roll through a kiln.

// A kiln car has wheels of 320 mm. Where the rail crosses a sag, curved upwards with a
// radius of 12 m, the wheel runs inside the curve.
func ExampleWheel() {
	w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.16, Ground: -12})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.WheelState
	if err := w.SolveArc(&st, rigid.Coordinate{Pos: 0.9, Vel: 0.5}); err != nil {
		fmt.Println(err)
		return
	}
	axle := st.Wheel.Pose.Origin
	fmt.Printf("axle at (%.4f, %.4f) m, %.4f m/s\n", axle.X, axle.Y, st.Travel.Vel)
	fmt.Printf("wheel turned %.4f rad, %.4f rad/s\n", st.Turn.Pos, st.Turn.Vel)
	fmt.Printf("contact: %.0f m/s, %.4f m/s²\n", r2.Norm(st.Contact.Vel), r2.Norm(st.Contact.Acc))
	// Output:
	// axle at (0.8872, 0.1933) m, 0.4933 m/s
	// wheel turned -5.5500 rad, -3.0833 rad/s
	// contact: 0 m/s, 1.5417 m/s²
}

// Dimensions are plain data, as a configuration file gives them; a wheel that cannot
// roll is refused with the field to blame.
func ExampleWheelDimensions() {
	var d rolling.WheelDimensions
	text := `{"radius": 0.16, "ground": -0.16, "mount": {"x": 4, "y": 0.2}}`
	if err := json.Unmarshal([]byte(text), &d); err != nil {
		fmt.Println(err)
		return
	}
	_, err := rolling.NewWheel(d)
	if bad, ok := errors.AsType[*rigid.DimensionError](err); ok {
		fmt.Println(bad.Name, bad.Value, errors.Is(err, rigid.ErrSingular))
	}
	// Output:
	// Ground -0.16 true
}

// The kiln's transfer car carries a kiln car across, on rails that it holds itself. A
// bolt on the rim of the kiln car's wheel describes a cycloid on the rails; in the hall
// the carriage's motion comes on top.
func ExampleWheelState() {
	w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.16})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.WheelState
	if err := w.Solve(&st, rigid.Coordinate{Pos: -math.Pi / 2, Vel: -2}); err != nil {
		fmt.Println(err)
		return
	}
	bolt := st.Wheel.At(r2.Vec{Y: -0.16})
	fmt.Printf("on the rails (%.3f, %.3f) m/s\n", bolt.Vel.X, bolt.Vel.Y)
	carriage := rigid.Motion{Pose: rigid.NewPose(3, 0, 0), Vel: r2.Vec{X: 0.25}}
	if err := st.On(&carriage); err != nil {
		fmt.Println(err)
		return
	}
	bolt = st.Wheel.At(r2.Vec{Y: -0.16})
	fmt.Printf("in the hall (%.3f, %.3f) m/s\n", bolt.Vel.X, bolt.Vel.Y)
	// Output:
	// on the rails (0.320, 0.320) m/s
	// in the hall (0.570, 0.320) m/s
}

// A measuring wheel on the conveyor belt and the encoder of its drum are compared.
func ExampleSlip() {
	drum, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.15})
	if err != nil {
		fmt.Println(err)
		return
	}
	turn := rigid.Coordinate{Pos: -40, Vel: -4}      // of the drum
	travel := rigid.Coordinate{Pos: 5.97, Vel: 0.58} // of the belt
	slip, err := drum.Slip(turn, travel)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("slid %.3f m, %.3f m/s, ratio %.3f\n", slip.Slide.Pos, slip.Slide.Vel, slip.Ratio)
	// Output:
	// slid -0.030 m, -0.020 m/s, ratio 0.033
}

func ExampleSlipLimits() {
	slip := rolling.Slip{Slide: rigid.Coordinate{Pos: -0.03, Vel: -0.02}, Ratio: 0.033}
	fmt.Println(slip.Within(rolling.SlipLimits{Speed: 0.05, Ratio: 0.04}))
	fmt.Println(slip.Within(rolling.SlipLimits{Length: 0.02}))
	// Output:
	// true
	// false
}

// The rail into the kiln rises by a transition curve of 2 m from the level to a curve of
// 10 m radius.
func ExampleBend() {
	rail, err := rolling.NewTrack(
		rolling.Bend{Length: 3},
		rolling.Bend{Length: 2, To: 0.1},
		rolling.Bend{Length: 1, From: 0.1, To: 0.1},
	)
	if err != nil {
		fmt.Println(err)
		return
	}
	p, err := rail(6)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("(%.4f, %.4f) m, slope %.2f rad, curvature %.1f /m\n", p.Pos.X, p.Pos.Y, p.Direction, p.Curvature)
	// Output:
	// (5.9864, 0.2160) m, slope 0.20 rad, curvature 0.1 /m
}

// A wheel of the kiln car on that rail: the law of its turn, and the state at one place.
func ExampleTrack() {
	rail, err := rolling.NewTrack(rolling.Bend{Length: 3}, rolling.Bend{Length: 2, To: 0.1})
	if err != nil {
		fmt.Println(err)
		return
	}
	w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.16})
	if err != nil {
		fmt.Println(err)
		return
	}
	law := w.TurnOn(rail)
	c, err := law(4)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("turn %.4f rad, %.4f rad/m\n", c.Out, c.First)
	var st rolling.WheelState
	if err := w.SolveTrack(&st, rail, rigid.Coordinate{Pos: 4, Vel: 0.5}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("axle (%.4f, %.4f) m/s\n", st.Wheel.Vel.X, st.Wheel.Vel.Y)
	fmt.Println(w.SolveTrack(&st, rail, rigid.Coordinate{Pos: 5.1}))
	// Output:
	// turn -24.9750 rad, -6.2000 rad/m
	// axle (0.4958, 0.0124) m/s
	// twopoint: out of reach of the links
}

// A track of one's own: the crown of the kiln door, a parabola near its top, good to the
// second order, y = −x²/8.
func ExampleTrackPoint() {
	crown := rolling.Track(func(arc float64) (rolling.TrackPoint, error) {
		return rolling.TrackPoint{
			Pos:       r2.Vec{X: arc, Y: -arc * arc / 8},
			Direction: -arc / 4,
			Curvature: -0.25,
		}, nil
	})
	w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.1})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.WheelState
	if err := w.SolveTrack(&st, crown, rigid.Coordinate{Vel: 0.2}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("axle %.3f m/s, wheel %.2f rad/s\n", st.Travel.Vel, st.Turn.Vel)
	// Output:
	// axle 0.205 m/s, wheel -2.05 rad/s
}
