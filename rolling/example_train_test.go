package rolling_test

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

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
	// twopoint: ring: nothing determines its turn, a drive or a mesh is missing
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
