package planar_test

import (
	"fmt"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A platform that lays tiles of the invented roof-tile press line on the belt hangs on
// three cylinders. With their lengths held it can hang in more than one way: those
// that turn a tile over must not be reached.
func ExampleLinkage_Modes() {
	var d planar.Design
	table := d.Link("table")
	for _, leg := range []struct{ frame, table planar.Attachment }{
		{planar.Frame.At(0, 0), table.At(-0.2, 0)},
		{planar.Frame.At(0.5, 0), table.At(0.2, 0)},
		{planar.Frame.At(0.7, 0.2), table.At(0.2, 0.1)},
	} {
		d.Drives = append(d.Drives, planar.Reach{A: leg.frame, B: leg.table})
	}
	lay, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	for s, err := range lay.Modes(rigid.Coordinate{Pos: 0.5}, rigid.Coordinate{Pos: 0.45}, rigid.Coordinate{Pos: 0.4}) {
		if err != nil {
			fmt.Println(err)
			return
		}
		at := s.Motion(table).Pose
		fmt.Printf("%.3f %.3f m, %.1f°\n", at.Origin.X, at.Origin.Y, at.Angle()/rigid.Degree)
	}
	// Output:
	// 0.296 0.470 m, -5.8°
	// 0.491 0.250 m, 91.8°
}
