package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// An Ellipse is the path of a point of a SliderRod, lengths in m in the frame.
type Ellipse struct {
	Centre       r2.Vec
	Major, Minor float64 // half axes, Major ≥ Minor; Minor 0: a straight line passed to and fro
	Angle        float64 // of the major axis, in (−π/2, π/2]; any does where the half axes are equal
}

// Ellipse returns the path of the rod's point at local, in m in the rod's axes. With
// complex numbers for vectors, p for the point and θ for the rod's turn, the place
// is
//
//	(p − q)·exp(iθ) + g·exp(−iθ),  q = L/2·(1 + i cot γ),  g = iL·exp(iγ)/(2 sin γ)
//
// the sum of two vectors that turn against one another, so that the half axes are
// ||p − q| ± |g||; |q| = |g|. All parts are zero for a zero SliderRod; NaN comes
// out where local is not finite.
func (s *SliderRod) Ellipse(local r2.Vec) Ellipse {
	if s.l == 0 {
		return Ellipse{}
	}
	q := s.centre()
	g := math.Abs(s.l / (2 * s.sin))
	f := r2.Sub(local, q)
	reach := math.Hypot(f.X, f.Y)
	// |g|² − |p − q|² without the squares that cancel where the path is nearly straight
	power := local.X*(2*q.X-local.X) + local.Y*(2*q.Y-local.Y)
	return Ellipse{
		Centre: s.mount.Origin,
		Major:  reach + g,
		Minor:  math.Abs(power) / (reach + g),
		Angle:  s.major(f),
	}
}

// major returns the angle of the major axis, where both turning vectors, f and g of
// Ellipse, lie along one another: half the sum of their angles, in the frame.
func (s *SliderRod) major(f r2.Vec) float64 {
	g := r2.Vec{X: -s.sin, Y: s.cos} // i·exp(iγ), times the sign of sin γ
	if s.sin < 0 {
		g = r2.Scale(-1, g)
	}
	sum := math.Atan2(g.Y, g.X) + math.Atan2(f.Y, f.X)
	u := s.mount.Axis
	a := math.Remainder(sum/2+math.Atan2(u.Y, u.X), math.Pi)
	if a <= -math.Pi/2 {
		return math.Pi / 2
	}
	return a
}

// centre returns the centre of the moving Cardan circle in the rod.
func (s *SliderRod) centre() r2.Vec {
	return r2.Vec{X: s.l / 2, Y: s.l / 2 * (s.cos / s.sin)}
}

// Cardan returns the two Cardan circles, the centrodes of the rod's motion: the
// fixed one about the crossing of the guides, of radius L/|sin Angle|, in the
// frame, on which the rod's velocity pole runs; and the moving one, half as large,
// in the rod's axes, that rolls inside it without slip. Points of the moving one
// run in straight lines through the crossing. Both are zero for a zero SliderRod.
func (s *SliderRod) Cardan() (fixed, moving rigid.Circle) {
	if s.l == 0 {
		return rigid.Circle{}, rigid.Circle{}
	}
	r := math.Abs(s.l / s.sin)
	return rigid.Circle{Centre: s.mount.Origin, Radius: r}, rigid.Circle{Centre: s.centre(), Radius: r / 2}
}
