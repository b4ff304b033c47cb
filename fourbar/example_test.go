package fourbar_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"os"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// The feeder of an invented roof-tile press line pushes a raw tile at every turn
// of its crank. Its pusher's tip is a point of the coupler.
func ExampleLinkage_Solve() {
	feeder, err := fourbar.New(fourbar.Dimensions{
		Frame: 0.300, Crank: 0.080, Coupler: 0.280, Follower: 0.200,
		Mount: rigid.Placement{X: 1.2, Y: 0.4},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st fourbar.State
	err = feeder.Solve(&st, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 30 * rigid.RPM})
	if err != nil {
		fmt.Println(err)
		return
	}
	tip := st.Coupler.At(r2.Vec{X: 0.350, Y: 0.050})
	fmt.Printf("tip at (%.4f, %.4f) m, %.3f m/s\n", tip.Pos.X, tip.Pos.Y, r2.Norm(tip.Vel))
	fmt.Printf("follower at %.2f°, %.3f rad/s\n", st.Swing.Pos/rigid.Degree, st.Swing.Vel)
	// Output:
	// tip at (1.5265, 0.6765) m, 0.109 m/s
	// follower at 93.49°, 0.736 rad/s
}

// What the roof-tile feeder is, before it moves.
func ExampleLinkage() {
	feeder, err := fourbar.New(fourbar.Dimensions{Frame: 0.300, Crank: 0.080, Coupler: 0.280, Follower: 0.200})
	if err != nil {
		fmt.Println(err)
		return
	}
	ratio, err := feeder.TimeRatio()
	least, greatest := feeder.Transmission()
	fmt.Println(feeder.Class())
	fmt.Printf("time ratio %.3f %v\n", ratio, err)
	fmt.Printf("transmission angle %.1f° to %.1f°\n", least/rigid.Degree, greatest/rigid.Degree)
	// Output:
	// crank-rocker
	// time ratio 1.089 <nil>
	// transmission angle 51.3° to 103.4°
}

func ExampleNew() {
	_, err := fourbar.New(fourbar.Dimensions{Frame: 0.300, Crank: -0.080, Coupler: 0.280, Follower: 0.200})
	if bad, ok := errors.AsType[*rigid.DimensionError](err); ok {
		fmt.Println(bad.Name, bad.Value)
	}
	fmt.Println(err)
	// Output:
	// Crank -0.08
	// twopoint: dimension Crank = -0.08: must be positive
}

// The dimensions of the roof-tile feeder in a configuration file.
func ExampleDimensions() {
	var d fourbar.Dimensions
	err := json.Unmarshal([]byte(`{"frame": 0.3, "crank": 0.08, "coupler": 0.28, "follower": 0.2, "branch": "crossed"}`), &d)
	fmt.Println(d.Crank, d.Branch, err)
	_ = json.NewEncoder(os.Stdout).Encode(d)
	// Output:
	// 0.08 crossed <nil>
	// {"frame":0.3,"crank":0.08,"coupler":0.28,"follower":0.2,"branch":"crossed","mount":{"x":0,"y":0,"angle":0}}
}

// Tiles travel on a carrier that two equal cranks move parallel to itself, through
// the position where all links lie in one line.
func ExampleBranch() {
	carrier, err := fourbar.New(fourbar.Dimensions{
		Frame: 0.600, Crank: 0.150, Coupler: 0.600, Follower: 0.150, Branch: fourbar.Parallel,
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st fourbar.State
	if err := carrier.Solve(&st, rigid.Coordinate{Pos: 180 * rigid.Degree, Vel: 2}); err != nil {
		fmt.Println(err)
		return
	}
	tile := st.Coupler.At(r2.Vec{X: 0.300})
	fmt.Printf("%v: carrier turns at %g rad/s, a tile moves at %.3f m/s\n", st.Branch, st.Coupler.Omega, tile.Vel.Y)
	// Output:
	// parallel: carrier turns at 0 rad/s, a tile moves at -0.300 m/s
}

// The clamp that holds the raw tile has a crank that cannot turn fully: where may
// it go, and how much is missing beyond?
func ExampleLinkage_Range() {
	clamp, err := fourbar.New(fourbar.Dimensions{Frame: 0.400, Crank: 0.250, Coupler: 0.200, Follower: 0.300})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, i := range clamp.Range() {
		fmt.Printf("crank from %.2f° to %.2f°\n", i.Lo/rigid.Degree, i.Hi/rigid.Degree)
	}
	var st fourbar.State
	turn := rigid.Coordinate{Pos: 120 * rigid.Degree}
	if err := clamp.Solve(&st, turn); errors.Is(err, rigid.ErrUnreachable) {
		fmt.Printf("at 120° the pins are %.1f mm apart\n", clamp.Gap(turn.Pos)/rigid.Millimetre)
	}
	// Output:
	// crank from -97.90° to 97.90°
	// at 120° the pins are 67.9 mm apart
}

// Which motion of the feeder's motor gives the follower 0.8 rad/s?
func ExampleState() {
	feeder, err := fourbar.New(fourbar.Dimensions{Frame: 0.300, Crank: 0.080, Coupler: 0.280, Follower: 0.200})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st fourbar.State
	err = feeder.SolveFollower(&st, rigid.Coordinate{Pos: 100 * rigid.Degree, Vel: 0.8}, rigid.Left)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("crank at %.2f°, %.3f rad/s, %v, margin %.2f\n", st.Turn.Pos/rigid.Degree, st.Turn.Vel, st.Branch, st.Margin)
	// Output:
	// crank at 81.93°, 2.303 rad/s, open, margin 0.84
}

// A follower's law of motion, and where it is fastest.
func ExampleLinkage_Coefficients() {
	feeder, err := fourbar.New(fourbar.Dimensions{Frame: 0.300, Crank: 0.080, Coupler: 0.280, Follower: 0.200})
	if err != nil {
		fmt.Println(err)
		return
	}
	c, err := feeder.Coefficients(60 * rigid.Degree)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("at the crank's 60°: %.2f°, %.4f, %.4f\n", c.Out/rigid.Degree, c.First, c.Second)
	out := c.Output(30*rigid.RPM, 0)
	fmt.Printf("at 30 rpm: %.3f rad/s, %.3f rad/s²\n", out.Vel, out.Acc)
	// Output:
	// at the crank's 60°: 93.49°, 0.2341, 0.3922
	// at 30 rpm: 0.736 rad/s, 3.871 rad/s²
}
