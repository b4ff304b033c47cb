package rigid_test

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A jet is a number with its first and second derivative by time: arithmetic on
// jets differentiates exactly, and knows nothing of two-point equations.
type jet struct{ v, d, dd float64 }

func (a jet) add(b jet) jet { return jet{a.v + b.v, a.d + b.d, a.dd + b.dd} }
func (a jet) neg() jet      { return jet{-a.v, -a.d, -a.dd} }
func (a jet) mul(b jet) jet {
	return jet{a.v * b.v, a.d*b.v + a.v*b.d, a.dd*b.v + 2*a.d*b.d + a.v*b.dd}
}

func (a jet) sincos() (s, c jet) {
	sin, cos := math.Sincos(a.v)
	s = jet{sin, cos * a.d, cos*a.dd - sin*a.d*a.d}
	c = jet{cos, -sin * a.d, -sin*a.dd - cos*a.d*a.d}
	return s, c
}

// A jetPose is a pose whose place and angle move.
type jetPose struct{ x, y, angle jet }

// point returns a point of the body that moves in it, in the frame.
func (p jetPose) point(x, y jet) (jet, jet) {
	s, c := p.angle.sincos()
	return p.x.add(c.mul(x)).add(s.mul(y).neg()), p.y.add(s.mul(x)).add(c.mul(y))
}

func (p jetPose) compose(child jetPose) jetPose {
	x, y := p.point(child.x, child.y)
	return jetPose{x, y, p.angle.add(child.angle)}
}

func (p jetPose) motion() rigid.Motion {
	o := jetPoint(p.x, p.y)
	return rigid.Motion{
		Pose: rigid.NewPose(p.x.v, p.y.v, p.angle.v), Vel: o.Vel, Acc: o.Acc,
		Omega: p.angle.d, Alpha: p.angle.dd,
	}
}

func jetPoint(x, y jet) rigid.Point {
	return rigid.Point{Pos: r2.Vec{X: x.v, Y: y.v}, Vel: r2.Vec{X: x.d, Y: y.d}, Acc: r2.Vec{X: x.dd, Y: y.dd}}
}

func (r random) jet() jet { return jet{r.number(), r.number(), r.number()} }

func (r random) jetPose() jetPose { return jetPose{r.jet(), r.jet(), r.jet()} }

// cubic is a jet that goes on in time: its value t seconds on, as a polynomial.
func (a jet) cubic(third, t float64) float64 { return a.v + t*(a.d+t*(a.dd/2+t*third)) }
