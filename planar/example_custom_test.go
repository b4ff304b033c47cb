package planar_test

import (
	"fmt"
	"math"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A lift for green tiles hangs on a belt that a spool winds: the belt is 2 mm thick,
// so that a turn winds more of it the fuller the spool is. The platform is guided
// upright, and the length wound is
//
//	s = radius·θ + thickness·θ²/4π
type beltLift struct {
	Spool, Platform planar.Link
	Radius, Belt    float64
}

// Links: the platform's height counts in the frame, so that this is tied too.
func (b beltLift) Links() []planar.Link { return []planar.Link{b.Spool, b.Platform, planar.Frame} }

func (b beltLift) Rows() int { return 1 }

// Depends tells that the spool's turn and the platform's height alone matter.
func (b beltLift) Depends(_, i int) planar.Unknowns {
	return [...]planar.Unknowns{planar.OfAngle, planar.OfY, 0}[i]
}

// Evaluate writes  Φ = y − s(θ).
func (b beltLift) Evaluate(e *planar.Evaluation) error {
	spool, platform := &e.Links[0], &e.Links[1]
	k := b.Belt / (4 * math.Pi)
	q := &e.Rows[0]
	q.Residual = platform.Pose.Origin.Y - b.Radius*spool.Turn - k*spool.Turn*spool.Turn
	q.Slopes[1].Y = 1
	q.Slopes[0].Angle = -b.Radius - 2*k*spool.Turn
	q.Bias = -2 * k * spool.Omega * spool.Omega
	return nil
}

// tileLift is the lift as a design.
func tileLift() planar.Design {
	var d planar.Design
	spool, platform := d.Link("spool"), d.Link("platform")
	up := 90 * rigid.Degree
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0.4, 2), B: spool.At(0, 0)},
		planar.Prismatic{A: planar.Frame.Line(0, 0, up), B: platform.Line(0, 0, up)},
		planar.Custom{By: beltLift{spool, platform, 0.08, 0.002}},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: spool, From: planar.Frame}}
	d.Guess = []rigid.Placement{{}, {X: 0.4, Y: 2}, {}}
	return d
}

func ExampleConstraint() {
	lift, err := planar.New(tileLift())
	if err != nil {
		fmt.Println(err)
		return
	}
	st, err := lift.Assemble(nil, rigid.Coordinate{})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, turns := range []float64{0, 1, 2} {
		if err := st.Move(rigid.Coordinate{Pos: turns * rigid.Revolution, Vel: 1}); err != nil {
			fmt.Println(err)
		}
		p := st.Point(planar.Link(2).At(0, 0))
		fmt.Printf("%.0f turns: %.4f m at %.4f m/s\n", turns, p.Pos.Y, p.Vel.Y)
	}
	// Output:
	// 0 turns: 0.0000 m at 0.0800 m/s
	// 1 turns: 0.5089 m at 0.0820 m/s
	// 2 turns: 1.0304 m at 0.0840 m/s
}

func ExampleCustom() {
	fmt.Println(tileLift().Joints[2])
	// Output: custom: link 1, link 2, frame by planar_test.beltLift
}

func ExampleDeclarer() {
	var c planar.Declarer = beltLift{1, 2, 0.08, 0.002}
	fmt.Println(c.Depends(0, 0) == planar.OfAngle, c.Depends(0, 1) == planar.OfY)
	// Output: true true
}

func ExampleUnknowns() {
	on := planar.OfX | planar.OfY
	fmt.Println(on&planar.OfAngle == 0, on|planar.OfAngle == planar.OfAll)
	// Output: true true
}

// asked evaluates a Constraint by hand, as its author may want to.
func asked(c planar.Constraint, at ...rigid.Placement) *planar.Evaluation {
	e := &planar.Evaluation{Rows: make([]planar.Equation, c.Rows())}
	for _, p := range at {
		e.Links = append(e.Links, planar.Moving{Motion: rigid.Motion{Pose: p.Pose()}, Turn: p.Angle})
	}
	for i := range e.Rows {
		e.Rows[i].Slopes = make([]planar.Slope, len(at))
	}
	if m, ok := c.(planar.Rememberer); ok {
		e.Memory = make([]float64, m.Memory())
	}
	return e
}

func ExampleEvaluation() {
	c := beltLift{1, 2, 0.08, 0.002}
	e := asked(c, rigid.Placement{Angle: 3}, rigid.Placement{Y: 0.25}, rigid.Placement{})
	fmt.Println(c.Evaluate(e))
	fmt.Printf("%.6f m\n", e.Rows[0].Residual)
	// Output:
	// <nil>
	// 0.008568 m
}

func ExampleEquation() {
	c := beltLift{1, 2, 0.08, 0.002}
	e := asked(c, rigid.Placement{Angle: 3}, rigid.Placement{Y: 0.25}, rigid.Placement{})
	e.Links[0].Omega = 10
	_ = c.Evaluate(e)
	fmt.Printf("%.4f m/s²\n", e.Rows[0].Bias)
	// Output: -0.0318 m/s²
}

func ExampleSlope() {
	c := beltLift{1, 2, 0.08, 0.002}
	e := asked(c, rigid.Placement{Angle: 3}, rigid.Placement{Y: 0.25}, rigid.Placement{})
	_ = c.Evaluate(e)
	fmt.Printf("%.4f\n", e.Rows[0].Slopes)
	// Output: [{0.0000 0.0000 -0.0810} {0.0000 1.0000 0.0000} {0.0000 0.0000 0.0000}]
}

func ExampleMoving() {
	m := planar.Moving{Turn: 3 * rigid.Revolution}
	m.Omega = 2
	fmt.Printf("%.2f rad, %v\n", m.Turn, m.At(rigid.NewPose(0.1, 0, 0).Origin).Acc)
	// Output: 18.85 rad, {-0.4 0}
}

// A pusher's lever carries a curved slot, in which a pin of the slide runs: here a
// circle of 300 mm, the same as a bar of that length.
func ExampleRoller() {
	var d planar.Design
	lever, slide := d.Link("lever"), d.Link("slide")
	slot := planar.Profile{On: lever.Line(0.1, 0, 0), Curve: planar.Circle(0.3), Over: rigid.Interval{Lo: -math.Pi / 2, Hi: math.Pi / 2}}
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: lever.At(0, 0)},
		planar.Prismatic{A: planar.Frame.Line(0, 0, 0), B: slide.Line(0, 0, 0)},
		planar.Custom{By: planar.Roller{Centre: slide.At(0, 0), On: slot}},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: lever, From: planar.Frame}}
	d.Guess = []rigid.Placement{{}, {}, {X: 0.4}}
	l, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	st, err := l.Assemble(nil, rigid.Coordinate{Pos: 60 * rigid.Degree})
	if err != nil {
		fmt.Println(err)
		return
	}
	angle := 60 * rigid.Degree
	bar := 0.1*math.Cos(angle) + math.Sqrt(0.09-math.Pow(0.1*math.Sin(angle), 2))
	fmt.Printf("slot %.6f m, bar %.6f m\n", st.Point(slide.At(0, 0)).Pos.X, bar)
	// Output: slot 0.337228 m, bar 0.337228 m
}

func ExampleRememberer() {
	var c planar.Rememberer = planar.Roller{}
	fmt.Println(c.Memory())
	// Output: 2
}

// The ejector's flat tappet on an eccentric moves harmonically.
func ExampleFlatFace() {
	var d planar.Design
	cam, tappet := d.Link("cam"), d.Link("tappet")
	up := 90 * rigid.Degree
	edge := planar.Profile{On: cam.Line(0.02, 0, 0), Curve: planar.Circle(0.05), Over: rigid.Interval{Hi: rigid.Revolution}, Closed: true}
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: cam.At(0, 0)},
		planar.Prismatic{A: planar.Frame.Line(0, 0, up), B: tappet.Line(0, 0, up)},
		planar.Custom{By: planar.FlatFace{Face: tappet.Line(0, 0, 0), On: edge}},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: cam, From: planar.Frame}}
	d.Guess = []rigid.Placement{{}, {}, {Y: 0.05}}
	l, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	st, err := l.Assemble(nil, rigid.Coordinate{Pos: 30 * rigid.Degree, Vel: 10})
	if err != nil {
		fmt.Println(err)
		return
	}
	p := st.Point(tappet.At(0, 0))
	fmt.Printf("%.4f m, %.4f m/s, %.4f m/s²\n", p.Pos.Y, p.Vel.Y, p.Acc.Y)
	// Output: 0.0600 m, 0.1732 m/s, -1.0000 m/s²
}

// The tile stacker's lever follows a cam of which a table is known: lever angles,
// every 30°.
func ExampleFollower() {
	var in, out []float64
	for i, degrees := range []float64{20, 20, 21.5, 27, 33, 38.5, 40, 40, 37, 30, 23, 20.3} {
		in, out = append(in, float64(30*i)*rigid.Degree), append(out, degrees*rigid.Degree)
	}
	law, err := planar.TableLaw(in, out, rigid.Revolution)
	if err != nil {
		fmt.Println(err)
		return
	}
	var d planar.Design
	cam, lever := d.Link("cam"), d.Link("lever")
	d.Joints = []planar.Joint{
		planar.Revolute{A: planar.Frame.At(0, 0), B: cam.At(0, 0)},
		planar.Revolute{A: planar.Frame.At(0.3, 0), B: lever.At(0, 0)},
		planar.Custom{By: planar.Follower{Of: planar.Turn{Of: lever}, Cam: planar.Turn{Of: cam}, By: law}},
	}
	d.Drives = []planar.Drive{planar.Turn{Of: cam}}
	d.Guess = []rigid.Placement{{}, {}, {X: 0.3}}
	l, err := planar.New(d)
	if err != nil {
		fmt.Println(err)
		return
	}
	st, err := l.Assemble(nil, rigid.Coordinate{Pos: 90 * rigid.Degree, Vel: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	turn := st.Turn(lever, planar.Frame)
	fmt.Printf("%.3f° at %.4f rad/s\n", turn.Pos/rigid.Degree, turn.Vel)
	// Output: 27.000° at 0.2055 rad/s
}

func ExampleTableLaw() {
	law, err := planar.TableLaw([]float64{0, 1, 2, 3}, []float64{0, 1, 4, 9}, 0)
	if err != nil {
		fmt.Println(err)
		return
	}
	k, err := law(1.5)
	fmt.Printf("%.4f %.4f %.4f %v\n", k.Out, k.First, k.Second, err)
	// Output: 2.2500 3.0000 2.0000 <nil>
}

// The edge of a cam by its radius at every angle.
func ExamplePolar() {
	edge := planar.Polar(func(in float64) (rigid.Coefficients, error) {
		sin, cos := math.Sincos(in)
		return rigid.Coefficients{In: in, Out: 0.05 - 0.01*cos, First: 0.01 * sin, Second: 0.01 * cos}, nil
	})
	p := edge(math.Pi / 2)
	fmt.Printf("%.3f %.3f %.3f\n", p.Pos, p.Vel, p.Acc)
	// Output: {0.000 0.050} {-0.050 0.010} {-0.020 -0.050}
}

func ExampleCurve() {
	slot := planar.Ellipse(0.5, 0.2)
	fmt.Printf("%.3f\n", slot(0).Pos)
	// Output: {0.500 0.000}
}

func ExampleProfile() {
	edge := planar.Profile{On: planar.Link(1).Line(0.02, 0, 0), Curve: planar.Circle(0.05), Over: rigid.Interval{Hi: rigid.Revolution}, Closed: true}
	fmt.Printf("%.2f\n", edge.Curve(edge.Over.Lo).Pos)
	// Output: {0.05 0.00}
}
