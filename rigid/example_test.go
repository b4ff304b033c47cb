package rigid_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// The examples follow one invented machine, a press line for roof tiles: a crank
// press, a feeder that swings tiles in, and a cart that rolls them out.

// The crank press turns at 90 rpm and gains 4 rad/s²; its crank pin is 60 mm out.
func ExampleMotion() {
	crank := rigid.Motion{Pose: rigid.NewPose(0, 0, 30*rigid.Degree), Omega: 90 * rigid.RPM, Alpha: 4}
	pin := crank.At(r2.Vec{X: 60 * rigid.Millimetre})
	fmt.Printf("place %.4f m\n", pin.Pos)
	fmt.Printf("velocity %.4f m/s\n", pin.Vel)
	fmt.Printf("acceleration %.4f m/s²\n", pin.Acc)
	// Output:
	// place {0.0520 0.0300} m
	// velocity {-0.2827 0.4897} m/s
	// acceleration {-4.7356 -2.4569} m/s²
}

// The feeder's arm swings at 2 rad/s while a gripper on it moves out at 0.3 m/s.
func ExampleMotion_Carry() {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0.4, 0), Omega: 2}
	gripper := rigid.Point{Pos: r2.Vec{X: 0.5}, Vel: r2.Vec{X: 0.3}}
	fmt.Printf("%.2f m/s\n", arm.Carry(gripper).Vel)
	// Output: {0.30 1.00} m/s
}

// A camera on the swinging arm sees a tile at rest on the table go past.
func ExampleMotion_Observe() {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0.4, 90*rigid.Degree), Omega: 2}
	tile := rigid.Point{Pos: r2.Vec{X: 0.3, Y: 0.6}}
	seen := arm.Observe(tile)
	fmt.Printf("at %.2f m, at %.2f m/s\n", seen.Pos, seen.Vel)
	// Output: at {0.20 -0.30} m, at {-0.60 -0.40} m/s
}

// The gripper turns back on the arm as fast as the arm swings, so the tile stays level.
func ExampleMotion_Compose() {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0.4, 0.5), Omega: 2, Alpha: 1}
	gripper := rigid.Motion{Pose: rigid.NewPose(0.5, 0, -0.5), Omega: -2, Alpha: -1}
	tile := arm.Compose(&gripper)
	fmt.Printf("angle %.1f rad, %.1f rad/s, %.1f rad/s²\n", tile.Pose.Angle(), tile.Omega, tile.Alpha)
	fmt.Printf("%.3f m/s\n", tile.Vel)
	// Output:
	// angle 0.0 rad, 0.0 rad/s, 0.0 rad/s²
	// {-0.479 0.878} m/s
}

// A wheel of the tile cart, 100 mm in radius, rolls at 0.5 m/s: it turns about its
// contact with the rail.
func ExampleMotion_Pole() {
	wheel := rigid.Motion{Pose: rigid.NewPose(2, 0.1, 0), Vel: r2.Vec{X: 0.5}, Omega: -5}
	pole, err := wheel.Pole()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.2f m\n", pole)
	_, err = new(rigid.Motion).Pole()
	fmt.Println(err)
	// Output:
	// {2.00 0.00} m
	// twopoint: no pole: it lies at infinity
}

// Crank and feeder touch, for an instant, as two wheels would that roll on each
// other at their relative pole.
func ExampleRelativePole() {
	crank := rigid.Motion{Omega: 9}
	feeder := rigid.Motion{Pose: rigid.NewPose(0.8, 0, 0), Omega: -3}
	pole, err := rigid.RelativePole(&crank, &feeder)
	fmt.Printf("%.2f m, %v\n", pole, err)
	// Output: {0.20 0.00} m, <nil>
}

// The cart's wheel rolls evenly: its points on the inflection circle, between rail
// and axle, go straight at this instant.
func ExampleCircle() {
	wheel := rigid.Motion{Pose: rigid.NewPose(2, 0.1, 0), Vel: r2.Vec{X: 0.5}, Omega: -5}
	circle, err := wheel.InflectionCircle()
	fmt.Printf("centre %.2f m, radius %.2f m, %v\n", circle.Centre, circle.Radius, err)
	// Output: centre {2.00 0.05} m, radius 0.05 m, <nil>
}

func ExampleVelocityTerms() {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0.4, 30*rigid.Degree), Vel: r2.Vec{X: 0.1}, Omega: 2}
	terms := arm.VelocityTerms(rigid.Point{Pos: r2.Vec{X: 0.5}, Vel: r2.Vec{X: 0.3}})
	fmt.Printf("base %.2f, turning %.2f, relative %.2f\n", terms.Base, terms.Turning, terms.Relative)
	fmt.Printf("sum %.2f m/s\n", terms.Sum())
	// Output:
	// base {0.10 0.00}, turning {-0.50 0.87}, relative {0.26 0.15}
	// sum {-0.14 1.02} m/s
}

// Which part of the gripper's acceleration comes from what.
func ExampleAccelerationTerms() {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0.4, 30*rigid.Degree), Omega: 2, Alpha: 3}
	gripper := rigid.Point{Pos: r2.Vec{X: 0.5}, Vel: r2.Vec{X: 0.3}, Acc: r2.Vec{X: 0.7}}
	terms := arm.AccelerationTerms(gripper)
	fmt.Printf("tangential %.2f\n", terms.Tangential)
	fmt.Printf("normal     %.2f\n", terms.Normal)
	fmt.Printf("relative   %.2f\n", terms.Relative)
	fmt.Printf("Coriolis   %.2f\n", terms.Coriolis)
	fmt.Printf("sum        %.2f m/s²\n", terms.Sum())
	// Output:
	// tangential {-0.75 1.30}
	// normal     {-1.73 -1.00}
	// relative   {0.61 0.35}
	// Coriolis   {-0.60 1.04}
	// sum        {-2.48 1.69} m/s²
}

// The press stands 3 m along the line, turned a quarter left.
func ExamplePose() {
	press := rigid.NewPose(3, 0, 90*rigid.Degree)
	die := press.Point(r2.Vec{X: 0.2, Y: 0.1})
	fmt.Printf("die in the hall %.1f m, in the press %.1f m\n", die, press.Local(die))
	turned := press.Compose(rigid.NewPose(0.2, 0.1, 45*rigid.Degree))
	fmt.Printf("its tool at %.0f°\n", turned.Angle()/rigid.Degree)
	// Output:
	// die in the hall {2.9 0.2} m, in the press {0.2 0.1} m
	// its tool at 135°
}

func ExamplePlacement() {
	var mount rigid.Placement
	if err := json.Unmarshal([]byte(`{"x": 3, "y": 0.25, "angle": 1.5}`), &mount); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.2f m, %.1f rad\n", mount.Pose().Origin, mount.Pose().Angle())
	// Output: {3.00 0.25} m, 1.5 rad
}

// A point of the feeder's gripper, measured, and where its path bends.
func ExamplePoint() {
	gripper := rigid.Point{Pos: r2.Vec{X: 1, Y: 0.5}, Vel: r2.Vec{Y: 2}, Acc: r2.Vec{X: -8, Y: 1}}
	path, err := gripper.Path()
	if err != nil {
		fmt.Println(err)
		return
	}
	centre, err := path.Centre()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("centre of curvature %.1f m\n", r2.Add(gripper.Pos, centre))
	// Output: centre of curvature {0.5 0.5} m
}

func ExamplePath() {
	path, err := rigid.Point{Vel: r2.Vec{Y: 2}, Acc: r2.Vec{X: -8, Y: 1}}.Path()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.1f m/s, %.1f m/s² along, bends left by %.1f /m\n", path.Speed, path.SpeedRate, path.Curvature)
	// Output: 2.0 m/s, 1.0 m/s² along, bends left by 2.0 /m
}

// The ram's measured position is 4 ms old when it arrives.
func ExampleCoordinate() {
	ram := rigid.Coordinate{Pos: 0.180, Vel: -0.5, Acc: 12}
	now := ram.After(4e-3)
	fmt.Printf("%.6f m, %.3f m/s\n", now.Pos, now.Vel)
	// Output: 0.178096 m, -0.452 m/s
}

// The feeder may only be loaded while the crank is within 20° to 160°, whatever the turn.
func ExampleInterval() {
	open := rigid.Interval{Lo: 20 * rigid.Degree, Hi: 160 * rigid.Degree}
	for _, turn := range []float64{1000, 1003} {
		angle, ok := open.Angle(turn)
		fmt.Printf("%.0f rad: %v (%.1f°)\n", turn, ok, rigid.Wrap(angle)/rigid.Degree)
	}
	// Output:
	// 1000 rad: true (55.8°)
	// 1003 rad: false (-132.3°)
}

// A wrapped angle that goes past half a turn is followed on.
func ExampleNearest() {
	last := 3.0
	for _, wrapped := range []float64{3.1, -3.08, -2.9} {
		last = rigid.Nearest(wrapped, last)
		fmt.Printf("%.3f ", last)
	}
	// Output: 3.100 3.203 3.383
}

func ExampleWrap() {
	fmt.Printf("%.1f°\n", rigid.Wrap(725*rigid.Degree)/rigid.Degree)
	// Output: 5.0°
}

// The screw that lifts the press table: 8 mm a turn. Which turn gives which lift,
// and back.
func ExampleCoefficients() {
	lift := rigid.Coefficients{In: 1, Out: 8e-3 / rigid.Revolution, First: 8e-3 / rigid.Revolution}
	table := lift.Output(120*rigid.RPM, 0)
	fmt.Printf("table %.3f m/s\n", table.Vel)
	screw, err := lift.Inverse()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("screw %.0f rpm\n", screw.Output(0.004, 0).Vel/rigid.RPM)
	// Output:
	// table 0.016 m/s
	// screw 30 rpm
}

// A rod of the press: its crank pin is known, its other end guided along x.
func ExampleGuided() {
	crank := rigid.Motion{Pose: rigid.NewPose(0, 0, 60*rigid.Degree), Omega: 90 * rigid.RPM}
	pin := crank.At(r2.Vec{X: 0.06})
	end := r2.Vec{X: pin.Pos.X + math.Sqrt(0.24*0.24-pin.Pos.Y*pin.Pos.Y)}
	rod, ram, err := rigid.Guided(pin, end, r2.Vec{X: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("rod %.3f rad/s, ram %.4f m/s, %.3f m/s²\n", rod.Omega, ram.Vel, ram.Acc)
	// Output: rod -1.207 rad/s, ram -0.5524 m/s, -1.999 m/s²
}

// Three marks on a tile that swings past a camera, each seen to 0.1 mm.
func ExampleFit() {
	marks := []r2.Vec{{X: 0, Y: 0}, {X: 0.3, Y: 0}, {X: 0, Y: 0.2}}
	seen := []rigid.Point{
		{Pos: r2.Vec{X: 1.0001, Y: 0.5}, Vel: r2.Vec{X: 0.1}},
		{Pos: r2.Vec{X: 1, Y: 0.8001}, Vel: r2.Vec{X: -0.5}},
		{Pos: r2.Vec{X: 0.7999, Y: 0.5}, Vel: r2.Vec{X: 0.1, Y: -0.4}},
	}
	tile, misfit, err := rigid.Fit(marks, seen)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("turned %.1f°, %.2f rad/s\n", tile.Pose.Angle()/rigid.Degree, tile.Omega)
	fmt.Printf("off by %.2f mm\n", misfit.Pos/rigid.Millimetre)
	// Output:
	// turned 90.0°, 2.00 rad/s
	// off by 0.09 mm
}

// A misfit beyond what the camera can do tells that a mark has come loose.
func ExampleMisfit() {
	marks := []r2.Vec{{X: 0}, {X: 0.3}}
	_, misfit, err := rigid.Fit(marks, []rigid.Point{{}, {Pos: r2.Vec{X: 0.306}}})
	fmt.Printf("%.1f mm, %v\n", misfit.Pos/rigid.Millimetre, err)
	// Output: 3.0 mm, <nil>
}

func ExampleSide() {
	text, err := json.Marshal(map[string]rigid.Side{"knee": rigid.Right})
	fmt.Printf("%s, %v\n", text, err)
	// Output: {"knee":"right"}, <nil>
}

// What a constructor returns for a press with a rod of no length.
func ExampleDimensionError() {
	err := errors.Join(&rigid.DimensionError{Name: "Rod", Value: 0, Err: rigid.ErrNotPositive})
	if bad, ok := errors.AsType[*rigid.DimensionError](err); ok {
		fmt.Println(bad.Name, errors.Is(err, rigid.ErrNotPositive))
	}
	fmt.Println(err)
	// Output:
	// Rod true
	// twopoint: dimension Rod = 0: must be positive
}
