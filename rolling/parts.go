package rolling

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// wholeTurn returns the range of an input that turns without limit.
func wholeTurn(made bool) []rigid.Interval {
	if !made {
		return nil
	}
	return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
}

// linear returns the coefficients of factor·in; a zero factor is that of a mechanism
// that no constructor made.
func linear(factor double, in float64) (rigid.Coefficients, error) {
	c := rigid.Coefficients{In: in, Out: factor.times(in).float(), First: factor.hi}
	switch {
	case factor.hi == 0:
		return rigid.Coefficients{}, rigid.ErrInput
	case !finite(c.In, c.Out):
		return rigid.Coefficients{}, rigid.ErrNotFinite
	}
	return c, nil
}

// scaled returns c times a constant.
func scaled(by double, c rigid.Coordinate) rigid.Coordinate {
	return rigid.Coordinate{Pos: by.times(c.Pos).float(), Vel: by.hi * c.Vel, Acc: by.hi * c.Acc}
}

// perp returns v turned a quarter left.
func perp(v r2.Vec) r2.Vec { return r2.Vec{X: -v.Y, Y: v.X} }

// turned returns v turned by the angle of the unit vector u: the complex product u·v.
func turned(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X - u.Y*v.Y, Y: u.X*v.Y + u.Y*v.X}
}

// spin returns the motion of a body that turns about the origin of pose; angle is
// its turn to 32 digits.
func spin(pose rigid.Pose, turn rigid.Coordinate, angle double) rigid.Motion {
	s, c := angle.sincos()
	return rigid.Motion{
		Pose:  rigid.Pose{Origin: pose.Origin, Axis: turned(pose.Axis, r2.Vec{X: c, Y: s})},
		Omega: turn.Vel, Alpha: turn.Acc,
	}
}

// carry puts two bodies and two points, given relative to a ground, into the frame in
// which the ground moves as given; on error it leaves all as they were.
func carry(ground, a, b *rigid.Motion, p, q *rigid.Point) error {
	bodyA, bodyB := ground.Compose(a), ground.Compose(b)
	pointP, pointQ := ground.Carry(*p), ground.Carry(*q)
	if !finiteMotion(&bodyA) || !finiteMotion(&bodyB) || !finitePoint(pointP) || !finitePoint(pointQ) {
		return rigid.ErrNotFinite
	}
	*a, *b, *p, *q = bodyA, bodyB, pointP, pointQ
	return nil
}

func finiteMotion(m *rigid.Motion) bool {
	return finite(m.Pose.Origin.X, m.Pose.Origin.Y, m.Pose.Axis.X, m.Pose.Axis.Y,
		m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha)
}

func finitePoint(p rigid.Point) bool {
	return finite(p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y)
}
