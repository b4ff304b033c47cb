package rolling_test

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

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
	// twopoint: dimension Centres = 0.27: it contradicts the other dimensions
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
