package planar_test

import (
	"errors"
	"fmt"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// press is the crank press of the (invented) roof-tile press line.
func press() (*planar.Linkage, []rigid.Placement) {
	const (
		frame = planar.Frame + iota
		crank
		rod
		ram
	)
	press, err := planar.New(planar.Design{
		Links: []string{"frame", "crank", "rod", "ram"},
		Joints: []planar.Joint{
			planar.Revolute{A: frame.At(0, 0), B: crank.At(0, 0)},
			planar.Revolute{A: crank.At(0.05, 0), B: rod.At(0, 0)},
			planar.Revolute{A: rod.At(0.2, 0), B: ram.At(0, 0)},
			planar.Prismatic{A: frame.Line(0, 0, 0), B: ram.Line(0, 0, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: crank, From: frame}},
	})
	if err != nil {
		panic(err)
	}
	return press, []rigid.Placement{crank: {}, rod: {X: 0.05}, ram: {X: 0.25}}
}

// A control loop moves the press tick by tick and reads the face of its ram.
func Example() {
	const ram = planar.Link(3)
	press, guess := press()
	st, err := press.Assemble(guess, rigid.Coordinate{})
	if err != nil {
		panic(err)
	}
	for tick := range 3 {
		angle := float64(tick) * 30 * rigid.Degree
		if err := st.Move(rigid.Coordinate{Pos: angle, Vel: 60 * rigid.RPM}); err != nil {
			fmt.Println("hold:", err)
			continue
		}
		face := st.Point(ram.At(0.03, 0))
		fmt.Printf("%2.0f°: %.4f m %7.4f m/s %7.3f m/s²\n", angle/rigid.Degree, face.Pos.X, face.Vel.X, face.Acc.X)
	}
	// Output:
	//  0°: 0.2800 m  0.0000 m/s  -2.467 m/s²
	// 30°: 0.2717 m -0.1914 m/s  -1.964 m/s²
	// 60°: 0.2503 m -0.3069 m/s  -0.740 m/s²
}

// The ram drives: it can't pull the crank over its dead centre. Stop tells which
// links stop it and how far it can go.
func ExampleState_Stop() {
	press, guess := press()
	d := press.Design()
	d.Drives = []planar.Drive{planar.Slide{Of: planar.Link(3).Line(0, 0, 0), From: planar.Frame.Line(0, 0, 0)}}
	byRam, err := planar.New(d)
	if err != nil {
		panic(err)
	}
	guess[1].Angle, guess[2] = 1, rigid.Placement{X: 0.027, Y: 0.042, Angle: -0.2}
	st, err := byRam.Assemble(guess, rigid.Coordinate{Pos: 0.22})
	if err != nil {
		panic(err)
	}
	err = st.Move(rigid.Coordinate{Pos: 0.27})
	fmt.Println(err)
	fmt.Println(errors.Is(err, rigid.ErrUnreachable))
	stop, _ := st.Stop()
	fmt.Printf("group %d, after %.2f of the way; short of closing by %.2f m\n", stop.Group, stop.Done, stop.Gap)
	fmt.Printf("still at %.2f m, margin %.2f\n", st.Motion(3).Pose.Origin.X, st.Margin())
	// Output:
	// twopoint: out of reach of the links (links crank, rod)
	// true
	// group 1, after 0.60 of the way; short of closing by 0.02 m
	// still at 0.22 m, margin 0.96
}

// Which term of the acceleration moves the ram: seen from the rod it swings.
func ExampleState_AccelerationTerms() {
	const rod, ram = planar.Link(2), planar.Link(3)
	press, guess := press()
	st, err := press.Assemble(guess, rigid.Coordinate{Pos: 1, Vel: 60 * rigid.RPM})
	if err != nil {
		panic(err)
	}
	terms := st.AccelerationTerms(ram.At(0.03, 0), rod)
	for _, t := range []struct {
		name string
		x    float64
	}{
		{"base", terms.Base.X}, {"tangential", terms.Tangential.X}, {"normal", terms.Normal.X},
		{"relative", terms.Relative.X}, {"Coriolis", terms.Coriolis.X}, {"sum", terms.Sum().X},
	} {
		fmt.Printf("%-10s %6.3f m/s²\n", t.name, t.x)
	}
	// Output:
	// base       -1.067 m/s²
	// tangential  0.351 m/s²
	// normal     -0.170 m/s²
	// relative   -0.023 m/s²
	// Coriolis    0.045 m/s²
	// sum        -0.863 m/s²
}

// The other assembly mode of the press has its ram on the other side of the crank.
func ExampleLinkage_AssembleMode() {
	press, _ := press()
	for _, mode := range []string{".+", ".-"} {
		st, err := press.AssembleMode(mode, rigid.Coordinate{Pos: 60 * rigid.Degree})
		if err != nil {
			panic(err)
		}
		fmt.Printf("%s ram at %6.3f m\n", st.Mode(), st.Motion(3).Pose.Origin.X)
	}
	// Output:
	// .+ ram at  0.220 m
	// .- ram at -0.170 m
}

// A sweep: the ram's travel, and its velocity as a derivative by
// the crank angle.
func ExampleState_Sweep() {
	press, guess := press()
	st, err := press.Assemble(guess, rigid.Coordinate{})
	if err != nil {
		panic(err)
	}
	for in, err := range st.Sweep(rigid.Interval{Hi: 150 * rigid.Degree}, 4) {
		if err != nil {
			panic(err)
		}
		ram := st.Motion(3)
		fmt.Printf("%3.0f°  %.4f m  %7.4f m/rad\n", in.Pos/rigid.Degree, ram.Pose.Origin.X, ram.Vel.X)
	}
	// Output:
	//   0°  0.2500 m   0.0000 m/rad
	//  50°  0.2284 m  -0.0446 m/rad
	// 100°  0.1852 m  -0.0470 m/rad
	// 150°  0.1551 m  -0.0195 m/rad
}
