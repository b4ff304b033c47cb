package rigidtest_test

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
)

// A state is what a mechanism package writes: motions and coordinates by name.
type state struct {
	Crank, Rod                      rigid.Motion
	Contact                         rigid.Point
	Turn, Swing, Slide, Arc, Travel rigid.Coordinate
	Knee                            rigid.Side
	Transmission, Margin            float64
	Path                            rigid.Path
	Circle                          rigid.Circle
	Velocity                        rigid.VelocityTerms
	Acceleration                    rigid.AccelerationTerms
	Mount                           rigid.Placement
	Misfit                          rigid.Misfit
	Range                           rigid.Interval
	Ratio                           rigid.Coefficients
	Seen                            []rigid.Point
	Train                           map[string]rigid.Coordinate
	Behind                          *rigid.Motion
	Pole                            r2.Vec
	Drive                           struct{ Turn, Slide, Time float64 }
	Whatever                        any
}

func point(x float64) rigid.Point {
	return rigid.Point{Pos: r2.Vec{X: x, Y: 2 * x}, Vel: r2.Vec{X: 3 * x, Y: 4 * x}, Acc: r2.Vec{X: 5 * x, Y: 6 * x}}
}

func motion(x float64) rigid.Motion {
	return rigid.Motion{
		Pose: rigid.NewPose(x, 2*x, 3*x), Vel: r2.Vec{X: 4 * x, Y: 5 * x}, Acc: r2.Vec{X: 6 * x, Y: 7 * x},
		Omega: 8 * x, Alpha: 9 * x,
	}
}

func coordinate(x float64) rigid.Coordinate { return rigid.Coordinate{Pos: x, Vel: 2 * x, Acc: 3 * x} }

// newState returns a state without a zero in it, the same each time.
func newState() *state {
	path, err := point(0.3).Path()
	if err != nil {
		panic(err)
	}
	path.Curvature, path.SpeedRate = 2, 3
	behind, m := motion(0.8), motion(0.35)
	local := point(0.9)
	return &state{
		Crank: motion(0.5), Rod: motion(-0.7), Contact: point(0.2),
		Turn: coordinate(1.1), Swing: coordinate(0.4), Slide: coordinate(0.6), Arc: coordinate(2), Travel: coordinate(-3),
		Knee: rigid.Right, Transmission: 1.2, Margin: 0.8, Path: path,
		Circle:   rigid.Circle{Centre: r2.Vec{X: 1, Y: 2}, Radius: 3},
		Velocity: m.VelocityTerms(local), Acceleration: m.AccelerationTerms(local),
		Mount: rigid.Placement{X: 1, Y: 2, Angle: 3}, Misfit: rigid.Misfit{Pos: 1, Vel: 2, Acc: 3},
		Range: rigid.Interval{Lo: -1, Hi: 1}, Ratio: rigid.Coefficients{In: 1, Out: 2, First: 3, Second: 4},
		Seen:   []rigid.Point{point(1), point(2)},
		Train:  map[string]rigid.Coordinate{"sun": coordinate(1), "arm": coordinate(2), "Turn": coordinate(3)},
		Behind: &behind, Pole: r2.Vec{X: 1, Y: 2}, Drive: struct{ Turn, Slide, Time float64 }{1, 2, 3}, Whatever: motion(0.9),
	}
}

// A row names a number of a state, the tolerance that holds for it and whether
// Angles is the option that applies it. Slack is the difference allowed.
type row struct {
	name   string
	number func(s *state) *float64
	angles bool
	slack  float64
}

var tolerance = rigidtest.Tolerance{Pos: 1e-3, Vel: 1e-2, Acc: 1e-1, Relative: 1e-5}

const slackPos, slackVel, slackAcc, slackRelative = 1e-3, 1e-2, 1e-1, 1e-5

func rows() []row {
	l, a := false, true
	r := []row{
		{"Omega", func(s *state) *float64 { return &s.Crank.Omega }, a, slackVel},
		{"Alpha", func(s *state) *float64 { return &s.Rod.Alpha }, a, slackAcc},
		{"Transmission", func(s *state) *float64 { return &s.Transmission }, a, slackPos},
		{"Margin", func(s *state) *float64 { return &s.Margin }, l, slackRelative},
		{"Speed", func(s *state) *float64 { return &s.Path.Speed }, l, slackVel},
		{"SpeedRate", func(s *state) *float64 { return &s.Path.SpeedRate }, l, slackAcc},
		{"Curvature", func(s *state) *float64 { return &s.Path.Curvature }, l, 2 * slackRelative},
		{"Radius", func(s *state) *float64 { return &s.Circle.Radius }, l, slackPos},
		{"Mount.X", func(s *state) *float64 { return &s.Mount.X }, l, slackPos},
		{"Mount.Y", func(s *state) *float64 { return &s.Mount.Y }, l, slackPos},
		{"Mount.Angle", func(s *state) *float64 { return &s.Mount.Angle }, a, slackPos},
		{"Misfit.Pos", func(s *state) *float64 { return &s.Misfit.Pos }, l, slackPos},
		{"Misfit.Vel", func(s *state) *float64 { return &s.Misfit.Vel }, l, slackVel},
		{"Misfit.Acc", func(s *state) *float64 { return &s.Misfit.Acc }, l, slackAcc},
		{"Range.Lo", func(s *state) *float64 { return &s.Range.Lo }, l, slackPos},
		{"Range.Hi", func(s *state) *float64 { return &s.Range.Hi }, l, slackPos},
		{"Ratio.In", func(s *state) *float64 { return &s.Ratio.In }, l, slackPos},
		{"Ratio.Out", func(s *state) *float64 { return &s.Ratio.Out }, l, slackPos},
		{"Ratio.First", func(s *state) *float64 { return &s.Ratio.First }, l, slackVel},
		{"Ratio.Second", func(s *state) *float64 { return &s.Ratio.Second }, l, slackAcc},
		{"Drive.Turn", func(s *state) *float64 { return &s.Drive.Turn }, a, slackPos},
		{"Drive.Slide", func(s *state) *float64 { return &s.Drive.Slide }, l, slackPos},
	}
	vector := func(name string, v func(s *state) *r2.Vec, slack float64) {
		r = append(r, row{name + ".X", func(s *state) *float64 { return &v(s).X }, l, slack},
			row{name + ".Y", func(s *state) *float64 { return &v(s).Y }, l, slack})
	}
	vector("Origin", func(s *state) *r2.Vec { return &s.Rod.Pose.Origin }, slackPos)
	vector("Motion.Vel", func(s *state) *r2.Vec { return &s.Rod.Vel }, slackVel)
	vector("Motion.Acc", func(s *state) *r2.Vec { return &s.Rod.Acc }, slackAcc)
	vector("Behind.Acc", func(s *state) *r2.Vec { return &s.Behind.Acc }, slackAcc)
	vector("Contact.Pos", func(s *state) *r2.Vec { return &s.Contact.Pos }, slackPos)
	vector("Contact.Vel", func(s *state) *r2.Vec { return &s.Contact.Vel }, slackVel)
	vector("Seen[1].Acc", func(s *state) *r2.Vec { return &s.Seen[1].Acc }, slackAcc)
	vector("Centre", func(s *state) *r2.Vec { return &s.Circle.Centre }, slackPos)
	vector("Pole", func(s *state) *r2.Vec { return &s.Pole }, slackPos)
	vector("Velocity.Base", func(s *state) *r2.Vec { return &s.Velocity.Base }, slackVel)
	vector("Velocity.Turning", func(s *state) *r2.Vec { return &s.Velocity.Turning }, slackVel)
	vector("Velocity.Relative", func(s *state) *r2.Vec { return &s.Velocity.Relative }, slackVel)
	vector("Acceleration.Base", func(s *state) *r2.Vec { return &s.Acceleration.Base }, slackAcc)
	vector("Acceleration.Tangential", func(s *state) *r2.Vec { return &s.Acceleration.Tangential }, slackAcc)
	vector("Acceleration.Normal", func(s *state) *r2.Vec { return &s.Acceleration.Normal }, slackAcc)
	vector("Acceleration.Relative", func(s *state) *r2.Vec { return &s.Acceleration.Relative }, slackAcc)
	vector("Acceleration.Coriolis", func(s *state) *r2.Vec { return &s.Acceleration.Coriolis }, slackAcc)
	scalar := func(name string, c func(s *state) *rigid.Coordinate, angles bool) {
		r = append(r, row{name + ".Pos", func(s *state) *float64 { return &c(s).Pos }, angles, slackPos},
			row{name + ".Vel", func(s *state) *float64 { return &c(s).Vel }, angles, slackVel},
			row{name + ".Acc", func(s *state) *float64 { return &c(s).Acc }, angles, slackAcc})
	}
	scalar("Turn", func(s *state) *rigid.Coordinate { return &s.Turn }, a)
	scalar("Swing", func(s *state) *rigid.Coordinate { return &s.Swing }, a)
	scalar("Slide", func(s *state) *rigid.Coordinate { return &s.Slide }, l)
	scalar("Arc", func(s *state) *rigid.Coordinate { return &s.Arc }, l)
	scalar("Travel", func(s *state) *rigid.Coordinate { return &s.Travel }, l)
	return r
}
