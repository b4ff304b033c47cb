package planar_test

import (
	"encoding/json"
	"errors"
	"fmt"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A design as it stands in a file of the tile press line: the drive of the tray.
const trayFile = `{
	"links": ["frame", "crank", "rod", "tray"],
	"joints": [
		{"revolute": {"a": {"link": "frame"}, "b": {"link": "crank"}}},
		{"revolute": {"a": {"link": "crank", "x": 0.12}, "b": {"link": "rod"}}},
		{"revolute": {"a": {"link": "rod", "x": 0.45}, "b": {"link": "tray"}}},
		{"prismatic": {"a": {"link": "frame", "y": 0.05}, "b": {"link": "tray"}}}
	],
	"drives": [{"turn": {"of": "crank", "from": "frame"}}]
}`

func ExampleDesign_UnmarshalJSON() {
	var d planar.Design
	if err := json.Unmarshal([]byte(trayFile), &d); err != nil {
		fmt.Println(err)
		return
	}
	tray, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(tray)

	err = json.Unmarshal([]byte(`{"links": ["frame", "crank"], "drives": [{"turn": {"off": "crank"}}]}`), &d)
	fmt.Println(errors.Is(err, rigid.ErrInput), err)
	// Output:
	// crank, class 1; rod + tray, RRP
	// true twopoint: wrong input: drives[0].turn.off: unknown key
}

func ExampleDesign_MarshalJSON() {
	var d planar.Design
	flap := d.Link("flap")
	d.Joints = []planar.Joint{planar.Revolute{A: planar.Frame.At(0.4, 0), B: flap.At(0, 0)}}
	d.Drives = []planar.Drive{planar.Reach{A: planar.Frame.At(0.7, -0.4), B: flap.At(0.5, 0)}}
	text, err := json.Marshal(d)
	fmt.Println(string(text), err)
	// Output:
	// {"links":["frame","flap"],"joints":[{"revolute":{"a":{"link":"frame","x":0.4,"y":0},"b":{"link":"flap","x":0,"y":0}}}],"drives":[{"reach":{"a":{"link":"frame","x":0.7,"y":-0.4},"b":{"link":"flap","x":0.5,"y":0}}}]} <nil>
}

// The lift under the stack of tiles has three stages of crossed bars; a cylinder from
// the lowest bar to the highest lifts it, so that all bars are one group. How fast the
// platform rises on the cylinder's 20 mm/s depends on its height.
func Example_lift() {
	const (
		stages = 3
		half   = 0.5 // m, of a bar
	)
	var d planar.Design
	left, right := make([]planar.Link, stages), make([]planar.Link, stages)
	for i := range stages {
		left[i], right[i] = d.Link(fmt.Sprint("left", i)), d.Link(fmt.Sprint("right", i))
		d.Joints = append(d.Joints, planar.Revolute{A: left[i].At(0, 0), B: right[i].At(0, 0)})
		if i > 0 {
			d.Joints = append(d.Joints,
				planar.Revolute{A: left[i-1].At(half, 0), B: right[i].At(-half, 0)},
				planar.Revolute{A: right[i-1].At(half, 0), B: left[i].At(-half, 0)})
		}
	}
	platform := d.Link("platform")
	d.Joints = append(d.Joints,
		planar.Revolute{A: planar.Frame.At(0, 0), B: left[0].At(-half, 0)},
		planar.SlidingPin{Pin: right[0].At(-half, 0), Slot: planar.Frame.Line(0, 0, 0)},
		planar.Revolute{A: right[stages-1].At(half, 0), B: platform.At(0, 0)},
		planar.SlidingPin{Pin: left[stages-1].At(half, 0), Slot: platform.Line(0, 0, 0)})
	d.Drives = []planar.Drive{planar.Reach{A: left[0].At(-0.3, 0), B: right[stages-1].At(0.2, 0)}}
	lift, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	guess := make([]rigid.Placement, len(d.Links))
	for i := range stages { // roughly, bars at 30° and 150°
		y := 0.25 + 0.5*float64(i)
		guess[left[i]], guess[right[i]] = rigid.Placement{X: 0.43, Y: y, Angle: 0.5}, rigid.Placement{X: 0.43, Y: y, Angle: 2.6}
	}
	guess[platform] = rigid.Placement{Y: 1.5}
	st, err := lift.Assemble(guess, rigid.Coordinate{Pos: 1.3})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, length := range []float64{0.9, 1.3, 1.7, 2.1, 2.6} {
		err := st.Move(rigid.Coordinate{Pos: length, Vel: 0.02})
		if errors.Is(err, rigid.ErrUnreachable) {
			fmt.Printf("%.1f m: out of reach\n", length)
			continue
		}
		top := st.Point(platform.At(0, 0))
		fmt.Printf("%.1f m: platform at %.3f m, rising at %.1f mm/s\n", length, top.Pos.Y, top.Vel.Y*1000)
	}
	// Output:
	// 0.9 m: platform at 1.074 m, rising at 24.2 mm/s
	// 1.3 m: platform at 1.557 m, rising at 24.1 mm/s
	// 1.7 m: platform at 2.038 m, rising at 24.1 mm/s
	// 2.1 m: platform at 2.519 m, rising at 24.0 mm/s
	// 2.6 m: out of reach
}
