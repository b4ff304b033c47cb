package planar_test

import (
	"fmt"
	"math"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// The examples are of an invented roof-tile press line. Results are those of ideal
// links: no safety function.

// tilePress is its press: a crank, a rod and a ram in a guide along x.
func tilePress() planar.Design {
	var d planar.Design
	crank, rod, ram := d.Link("crank"), d.Link("rod"), d.Link("ram")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: crank.At(0, 0)},
		planar.Revolute{A: crank.At(0.05, 0), B: rod.At(0, 0)},
		planar.Revolute{A: rod.At(0.2, 0), B: ram.At(0, 0)},
		planar.Prismatic{A: planar.Frame.Line(0, 0, 0), B: ram.Line(0, 0, 0)},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: crank, From: planar.Frame}}
	return d
}

// pressAt is the press with its crank at an angle.
func pressAt(d planar.Design, turn float64) *planar.State {
	l, err := planar.New(d)
	if err != nil {
		panic(err)
	}
	st, err := l.Assemble([]rigid.Placement{{}, {}, {X: 0.05}, {X: 0.25}}, rigid.Coordinate{Pos: turn, Vel: 10})
	if err != nil {
		panic(err)
	}
	return st
}

// What a tenth of a millimetre in the crank, the rod or the guide's height does to the
// ram.
func ExampleState_Sensitivity() {
	d := tilePress()
	crank, rod, ram := planar.Link(1), planar.Link(2), planar.Link(3)
	st := pressAt(d, 60*rigid.Degree)
	by := []planar.Dimension{
		d.Hole(crank.At(0.05, 0), planar.X), d.Hole(rod.At(0.2, 0), planar.X), {Of: []planar.Entry{{Joint: 3, End: planar.A, Part: planar.Y}}},
	}
	dst := make([]rigid.Point, len(by))
	if err := st.Sensitivity(dst, ram.At(0, 0), by...); err != nil {
		fmt.Println(err)
		return
	}
	for i, name := range []string{"crank", "rod", "guide"} {
		fmt.Printf("%s: %+.4f mm, %+.2f mm/s\n", name, 0.1*dst[i].Pos.X, 0.1*dst[i].Vel.X)
	}
	// Output:
	// crank: +0.0308 mm, -1.09 mm/s
	// rod: +0.1024 mm, +0.03 mm/s
	// guide: +0.0222 mm, +0.13 mm/s
}

// The angle of the rod hardly depends on its length.
func ExampleState_TurnSensitivity() {
	d := tilePress()
	dst := make([]rigid.Coordinate, 1)
	err := pressAt(d, math.Pi/2).TurnSensitivity(dst, 2, planar.Frame, d.Hole(planar.Link(2).At(0.2, 0), planar.X))
	fmt.Printf("%.3f mrad/mm %v\n", dst[0].Pos, err)
	// Output: 1.291 mrad/mm <nil>
}

// The lengths' tolerances at the ram.
func ExampleWorstCase() {
	d := tilePress()
	by := []planar.Dimension{d.Hole(planar.Link(1).At(0.05, 0), planar.X), d.Hole(planar.Link(2).At(0.2, 0), planar.X)}
	dst := make([]rigid.Point, len(by))
	if err := pressAt(d, 1).Sensitivity(dst, planar.Link(3).At(0, 0), by...); err != nil {
		fmt.Println(err)
		return
	}
	tolerances := []float64{0.02 * rigid.Millimetre, 0.05 * rigid.Millimetre}
	worst, _ := planar.WorstCase(dst, tolerances)
	likely, _ := planar.RootSumSquare(dst, tolerances)
	fmt.Printf("± %.4f mm at worst, ± %.4f mm likely\n", worst.Pos.X/rigid.Millimetre, likely.Pos.X/rigid.Millimetre)
	// Output: ± 0.0583 mm at worst, ± 0.0516 mm likely
}

// A pin hole of the rod that two joints share is one dimension.
func ExampleDimension() {
	d := tilePress()
	d.Joints = append(d.Joints, planar.Revolute{A: planar.Link(2).At(0.2, 0), B: d.Link("gauge").At(0, 0)})
	fmt.Println(d.Hole(planar.Link(2).At(0.2, 0), planar.X).Of)
	// Output: [joint 2, a, x joint 4, a, x]
}

// The height of the guide alone.
func ExampleEntry() {
	d := tilePress()
	raised, err := d.With(planar.Dimension{Of: []planar.Entry{{Joint: 3, End: planar.A, Part: planar.Y}}}, 0.01)
	fmt.Println(raised.Joints[3].(planar.Prismatic).A.Y, err)
	// Output: 0.01 <nil>
}

// Ends are text in files.
func ExampleEnd() {
	var e planar.End
	err := e.UnmarshalText([]byte("arm"))
	fmt.Println(e == planar.Arm, err)
	// Output: true <nil>
}

// So are parts.
func ExamplePart() {
	var p planar.Part
	err := p.UnmarshalText([]byte("radiusA"))
	fmt.Println(p == planar.RadiusA, err)
	// Output: true <nil>
}

// readings is a log of the press as it was built: crank 50.2 mm, rod 199.5 mm, the
// scale of the ram 0.3 mm off. A log may as well come from a file, sample by sample.
func readings(yield func(planar.Sample, error) bool) {
	const crank, rod, zero = 0.0502, 0.1995, 0.0003
	for i := range 360 {
		turn := float64(i) * rigid.Degree
		s, c := math.Sincos(turn)
		ram := crank*c + math.Sqrt(rod*rod-crank*crank*s*s) - zero
		scale := math.Round(ram*1e6) / 1e6 // 1 µm steps
		if !yield(planar.Sample{In: []float64{turn}, Out: []float64{scale}}, nil) {
			return
		}
	}
}

// The lengths of the press as it is, and the zero of the ram's scale.
func ExampleState_Calibrate() {
	d := tilePress()
	ram := planar.Slide{Of: planar.Link(3).Line(0, 0, 0), From: planar.Frame.Line(0, 0, 0)}
	found, err := pressAt(d, 0).Calibrate(readings, planar.Calibration{
		Outputs: []planar.Drive{ram},
		By: []planar.Dimension{
			d.Hole(planar.Link(1).At(0.05, 0), planar.X), d.Hole(planar.Link(2).At(0.2, 0), planar.X), d.Zero(1),
		},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	for i, name := range []string{"crank", "rod", "zero"} {
		fmt.Printf("%s %+.2f mm, known to 0.01 mm: %t\n", name, found.Change[i]/rigid.Millimetre, 3*found.Deviation(i) < 1e-5)
	}
	fmt.Printf("residual %.1f µm\n", found.RMS*1e6)
	// Output:
	// crank +0.20 mm, known to 0.01 mm: true
	// rod -0.50 mm, known to 0.01 mm: true
	// zero +0.30 mm, known to 0.01 mm: true
	// residual 0.3 µm
}

// A scale on the ram cannot tell a longer rod from another zero where the crank
// hardly moves: the result names the two.
func ExampleCalibrated() {
	d := tilePress()
	still := func(yield func(planar.Sample, error) bool) {
		for range 10 {
			if !yield(planar.Sample{In: []float64{0.5}, Out: []float64{0.2418}}, nil) {
				return
			}
		}
	}
	found, err := pressAt(d, 0.5).Calibrate(still, planar.Calibration{
		Outputs: []planar.Drive{planar.Slide{Of: planar.Link(3).Line(0, 0, 0), From: planar.Frame.Line(0, 0, 0)}},
		By:      []planar.Dimension{d.Hole(planar.Link(2).At(0.2, 0), planar.X), d.Zero(1)},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println("alike", found.Alike, "drives that stand", found.Constant, "deviation", found.Deviation(0))
	// Output: alike [[0 1]] drives that stand [0] deviation +Inf
}

// A reading that is missing is NaN.
func ExampleSample() {
	s := planar.Sample{In: []float64{0.5}, Out: []float64{0.2418, math.NaN()}}
	fmt.Println(len(s.In), "drive,", len(s.Out), "outputs")
	// Output: 1 drive, 2 outputs
}

// Two sensors of different kinds are weighed by their noise.
func ExampleCalibration() {
	d := tilePress()
	ram := planar.Slide{Of: planar.Link(3).Line(0, 0, 0), From: planar.Frame.Line(0, 0, 0)}
	c := planar.Calibration{
		Outputs:  []planar.Drive{ram, planar.Turn{Of: 2, From: planar.Frame}},
		By:       []planar.Dimension{d.Zero(0), d.Zero(1), d.Zero(2)}, // of the drive, the scale, the encoder on the rod
		Noise:    []float64{2e-6, 1e-4},
		Outliers: 0.01,
	}
	_, err := pressAt(d, 0).Calibrate(readings, c)
	fmt.Println(err)
	// Output: twopoint: wrong input: sample 0 has 1 and 1 readings for 1 drives and 2 outputs
}
