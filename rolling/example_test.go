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

// The spur gears before the press: 23 teeth on the motor, 81 on the flywheel's shaft.
func ExamplePair() {
	p, err := rolling.NewPair(rolling.PairDimensions{TeethA: 23, TeethB: 81, Centres: 0.26})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.PairState
	if err := p.Solve(&st, rigid.Coordinate{Pos: 810, Vel: 1460 * rigid.RPM}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("flywheel %v rad, %.2f rpm\n", st.TurnB.Pos, st.TurnB.Vel/rigid.RPM)
	fmt.Printf("pitch point at %.4f m, %.3f m/s\n", st.PitchA.Pos.X, r2.Norm(st.PitchA.Vel))
	// Output:
	// flywheel -230 rad, -414.57 rpm
	// pitch point at 0.0575 m, 8.791 m/s
}

// What contradicts itself is refused.
func ExamplePairDimensions() {
	_, err := rolling.NewPair(rolling.PairDimensions{RadiusA: 0.0575, RadiusB: 0.2025, Centres: 0.27})
	fmt.Println(err)
	// Output:
	// twopoint: dimension Centres = 0.27: wrong input: it contradicts the other dimensions
}

// The friction wheel that drives the glazing drum from inside hangs on a swinging arm.
func ExamplePairState() {
	p, err := rolling.NewPair(rolling.PairDimensions{RadiusA: 0.6, RadiusB: 0.08, Internal: true})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.PairState
	if err := p.SolveB(&st, rigid.Coordinate{Vel: 30}); err != nil {
		fmt.Println(err)
		return
	}
	arm := rigid.Motion{Omega: 0.5}
	if err := st.On(&arm); err != nil {
		fmt.Println(err)
		return
	}
	pole, err := rigid.RelativePole(&st.A, &st.B)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("drum %.1f rad/s, relative centre at %.2f m\n", st.A.Omega, pole.X)
	// Output:
	// drum 4.5 rad/s, relative centre at 0.60 m
}

// The pusher that loads the kiln cars: a pinion of 22 teeth on a rack of 25 mm pitch.
func ExampleRack() {
	p, err := rolling.NewRack(rolling.RackDimensions{Teeth: 22, Pitch: 0.025})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.RackState
	if err := p.SolveSlide(&st, rigid.Coordinate{Pos: 1.1, Vel: 0.3}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.4f turns, %.2f rpm\n", st.Turn.Pos/rigid.Revolution, st.Turn.Vel/rigid.RPM)
	// Output:
	// 2.0000 turns, 32.73 rpm
}

func ExampleRackDimensions() {
	_, err := rolling.NewRack(rolling.RackDimensions{Teeth: 22})
	fmt.Println(err)
	// Output:
	// twopoint: dimension Pitch = 0: must be positive
}

func ExampleRackState() {
	p, err := rolling.NewRack(rolling.RackDimensions{Radius: 0.0875, Mount: rigid.Placement{Angle: math.Pi / 2}})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.RackState
	if err := p.Solve(&st, rigid.Coordinate{Vel: 2}); err != nil {
		fmt.Println(err)
		return
	}
	// the pusher's rack stands upright right of the pinion and rises
	fmt.Printf("at %.4f m, %.3f m/s up\n", st.Rack.Pose.Origin.X, st.Rack.Vel.Y)
	// Output:
	// at 0.0875 m, 0.175 m/s up
}

// The chain from the dryer's drive to its drum.
func ExampleBelt() {
	p, err := rolling.NewBelt(rolling.BeltDimensions{TeethA: 19, TeethB: 57, Pitch: 0.0254, Centres: 0.9})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.BeltState
	if err := p.Solve(&st, rigid.Coordinate{Vel: 90 * rigid.RPM}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("drum %.0f rpm, chain %.3f m/s, %.1f links\n", st.TurnB.Vel/rigid.RPM, st.Slide.Vel, p.Length()/0.0254)
	// Output:
	// drum 30 rpm, chain 0.724 m/s, 109.9 links
}

func ExampleBeltDimensions() {
	_, err := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.2, RadiusB: 0.3, Centres: 0.4})
	fmt.Println(errors.Is(err, rigid.ErrUnreachable))
	// Output:
	// true
}

// A crossed belt turns the stacker's rollers contrary ways.
func ExampleBeltState() {
	p, err := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.06, RadiusB: 0.09, Centres: 0.5, Crossed: true})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st rolling.BeltState
	if err := p.SolveSlide(&st, rigid.Coordinate{Vel: 0.36}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.0f and %.0f rad/s\n", st.A.Omega, st.B.Omega)
	// Output:
	// 6 and -4 rad/s
}

// The press's reducer: the motor turns the sun, the ring stands, the carrier drives the
// crank.
func ExampleTrain() {
	stage := rolling.Planetary{Sun: 24, Planet: 30, Ring: 84, Planets: 3}
	var d rolling.TrainDesign
	sun, planet, carrier := d.Member("sun"), d.Member("planet"), d.Member("carrier")
	d.Meshes = stage.Meshes(sun, planet, 0, carrier)
	d.Drives = []rolling.Member{sun}
	reducer, err := rolling.NewTrain(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	ratio, err := reducer.Ratio(carrier, sun)
	if err != nil {
		fmt.Println(err)
		return
	}
	turns := make([]rigid.Coordinate, len(d.Members))
	if err := reducer.Solve(turns, rigid.Coordinate{Vel: 1460 * rigid.RPM}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println("ratio", ratio.RatString())
	fmt.Printf("carrier %.2f rpm, planet %.2f rpm\n", turns[carrier].Vel/rigid.RPM, turns[planet].Vel/rigid.RPM)
	// Output:
	// ratio 2/9
	// carrier 324.44 rpm, planet -584.00 rpm
}

// Every error names its member: here the ring, which nothing holds.
func ExampleTrainDesign() {
	var d rolling.TrainDesign
	sun, planet := d.Member("sun"), d.Member("planet")
	carrier, ring := d.Member("carrier"), d.Member("ring")
	d.Meshes = rolling.Planetary{Sun: 24, Planet: 30, Ring: 84}.Meshes(sun, planet, ring, carrier)
	d.Drives = []rolling.Member{sun}
	_, err := rolling.NewTrain(d)
	fmt.Println(err)
	d.Drives = []rolling.Member{sun, ring} // a brake on the ring: drive it at 0
	_, err = rolling.NewTrain(d)
	fmt.Println(err)
	// Output:
	// twopoint: dimension ring = 4: wrong input: nothing determines its turn, a drive or a mesh is missing
	// <nil>
}

func ExampleMember() {
	var d rolling.TrainDesign
	motor := d.Member("motor")
	fmt.Println(motor, d.Members)
	// Output:
	// 1 [frame motor]
}

// The two-speed drive of the clay mixer: a stepped planet, 40 and 20 teeth in one piece,
// meshes with two suns.
func ExampleMesh() {
	const motor, output, planet, carrier = 1, 2, 3, 4
	mixer, err := rolling.NewTrain(rolling.TrainDesign{
		Members: []string{"frame", "motor", "output", "planet", "carrier"},
		Meshes: []rolling.Mesh{
			{A: motor, B: planet, Arm: carrier, TeethA: 20, TeethB: 40},
			{A: output, B: planet, Arm: carrier, TeethA: 40, TeethB: 20},
		},
		Drives: []rolling.Member{motor, carrier},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	turns := make([]rigid.Coordinate, 5)
	for _, held := range []float64{0, 15} { // rad/s of the carrier
		if err := mixer.Solve(turns, rigid.Coordinate{Vel: 100}, rigid.Coordinate{Vel: held}); err != nil {
			fmt.Println(err)
			return
		}
		fmt.Println(turns[output].Vel, "rad/s")
	}
	// Output:
	// 25 rad/s
	// 36.25 rad/s
}

// The tip of a planet's tooth in the press's reducer.
func ExamplePlanet() {
	carrier := rigid.Coordinate{Pos: 0.4, Vel: 8}
	planet := rigid.Coordinate{Pos: -0.72, Vel: -14.4}
	var m rigid.Motion
	if err := rolling.Planet(&m, carrier, planet, 0.135, 0); err != nil {
		fmt.Println(err)
		return
	}
	tip := m.At(r2.Vec{X: 0.08})
	fmt.Printf("centre %.3f m/s, tip %.3f m/s\n", r2.Norm(m.Vel), r2.Norm(tip.Vel))
	// Output:
	// centre 1.080 m/s, tip 1.187 m/s
}

// Do the numbers of teeth of the press's reducer fit?
func ExamplePlanetary() {
	stage := rolling.Planetary{Sun: 24, Planet: 30, Ring: 84, Planets: 3}
	fmt.Println(stage.CheckTeeth(), stage.CheckSpacing(), stage.CheckNeighbours())
	stage.Ring, stage.Planets = 83, 5
	fmt.Println(stage.CheckTeeth())
	fmt.Println(stage.CheckSpacing())
	// Output:
	// <nil> <nil> <nil>
	// twopoint: dimension Ring = 83: ring teeth must be sun + 2 × planet, or sun + planet + step
	// twopoint: dimension Planets = 5: so many planets cannot be assembled at equal spacing
}

// A straight-line drive for the tile ejector: a planet half as large as the ring it rolls
// in (Cardan circles). A pin on its pitch circle runs along a diameter of the ring, with
// a stroke of twice the ring's radius and without a guide, as the carrier turns evenly.
func Example_straightLine() {
	const ring, planet, carrier = 0, 1, 2
	drive, err := rolling.NewTrain(rolling.TrainDesign{
		Members: []string{"ring", "planet", "carrier"},
		Meshes:  []rolling.Mesh{{A: planet, B: ring, Arm: carrier, TeethA: 40, TeethB: 80, Internal: true}},
		Drives:  []rolling.Member{carrier},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	const radius = 0.06 // of planet and carrier
	turns := make([]rigid.Coordinate, 3)
	for k := range 5 {
		in := rigid.Coordinate{Pos: float64(k) * math.Pi / 4, Vel: 10}
		if err := drive.Solve(turns, in); err != nil {
			fmt.Println(err)
			return
		}
		var m rigid.Motion
		if err := rolling.Planet(&m, turns[carrier], turns[planet], radius, 0); err != nil {
			fmt.Println(err)
			return
		}
		pin := m.At(r2.Vec{X: radius})
		fmt.Printf("x %7.4f m, off the line %.0f µm, %.4f m/s\n", pin.Pos.X, math.Abs(pin.Pos.Y)*1e6, r2.Norm(pin.Vel))
	}
	// Output:
	// x  0.1200 m, off the line 0 µm, 0.0000 m/s
	// x  0.0849 m, off the line 0 µm, 0.8485 m/s
	// x  0.0000 m, off the line 0 µm, 1.2000 m/s
	// x -0.0849 m, off the line 0 µm, 0.8485 m/s
	// x -0.1200 m, off the line 0 µm, 0.0000 m/s
}
