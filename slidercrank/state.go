package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A State is the motion of all links of a slider-crank at one instant. Turn and
// Slide are in the mechanism's own axes, without Mount. More fields may come:
// write keyed literals.
type State struct {
	Crank  rigid.Motion // origin at its pivot, x axis to the crank pin
	Rod    rigid.Motion // origin at the crank pin, x axis to the slider pin
	Slider rigid.Motion // origin at its pin, axes as the mechanism's

	Turn  rigid.Coordinate // of the crank from the mechanism's x axis
	Slide rigid.Coordinate // of the slider: the x of its pin

	Branch Branch     // of the pose
	Knee   rigid.Side // side, of the line from the crank pivot to the slider pin, of the crank pin
	Margin float64    // least |sin| at the joint that flattens in the direction solved: 0 at a limit, at most 1
}

// PressureAngle returns the acute angle in rad, in [0, π/2], between the rod and
// the guide. Its tangent is the side thrust on the guide over the force along it,
// friction aside.
func (s *State) PressureAngle() float64 {
	u, g := s.Rod.Pose.Axis, s.Slider.Pose.Axis
	return math.Atan2(math.Abs(r2.Cross(g, u)), math.Abs(r2.Dot(g, u)))
}

// links writes the links' motions, adding Mount's origin last, from the unit
// vector along the crank and the rod, in the mechanism's own axes, how they turn,
// and dst.Slide.
func (l *Linkage) links(dst *State, crank, rod r2.Vec, w, al, omega, alpha float64) {
	u := turned(l.axis, crank)
	set(&dst.Crank, l.origin, r2.Vec{}, r2.Vec{}, u, w, al)
	setPinned(&dst.Rod, l.origin, r2.Scale(l.crank, u), w, al, turned(l.rodAxis, rod), omega, alpha)
	setGuided(&dst.Slider, l.origin, l.axis, l.offset, &dst.Slide)
	unsign(&dst.Rod, &dst.Slider)
}

// setPinned writes the motion of a link along axis whose origin is pinned to the
// end a of a link that turns about o with w and al.
func setPinned(m *rigid.Motion, o, a r2.Vec, w, al float64, axis r2.Vec, omega, alpha float64) {
	m.Pose.Origin.X, m.Pose.Origin.Y = o.X+a.X, o.Y+a.Y
	m.Pose.Axis = axis
	m.Vel, m.Acc = swung(a, w, al)
	m.Omega, m.Alpha = omega, alpha
}

// swung returns the velocity and the acceleration of the end a of a link that turns
// about its other end.
func swung(a r2.Vec, w, al float64) (vel, acc r2.Vec) {
	w2 := w * w
	return r2.Vec{X: -w * a.Y, Y: w * a.X}, r2.Vec{X: -al*a.Y - w2*a.X, Y: al*a.X - w2*a.Y}
}

// setGuided writes the motion of a slider on a guide along u, which passes o at
// the given offset.
func setGuided(m *rigid.Motion, o, u, offset r2.Vec, s *rigid.Coordinate) {
	m.Pose.Origin.X, m.Pose.Origin.Y = o.X+(s.Pos*u.X+offset.X), o.Y+(s.Pos*u.Y+offset.Y)
	m.Pose.Axis = u
	m.Vel.X, m.Vel.Y = s.Vel*u.X, s.Vel*u.Y
	m.Acc.X, m.Acc.Y = s.Acc*u.X, s.Acc*u.Y
	m.Omega, m.Alpha = 0, 0
}

// unsign makes 0 of −0 in the rates of links, which links at rest would have from the
// products with their rates.
func unsign(links ...*rigid.Motion) {
	for _, m := range links {
		m.Vel, m.Acc = r2.Add(m.Vel, r2.Vec{}), r2.Add(m.Acc, r2.Vec{})
	}
}
