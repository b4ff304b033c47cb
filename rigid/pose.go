package rigid

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A Placement is a pose as people and configuration files write it: the place of
// a body's origin in m and the angle of its x axis in rad, counter-clockwise from
// the frame's. The zero Placement is unmoved.
type Placement struct {
	X     float64 `json:"x"`
	Y     float64 `json:"y"`
	Angle float64 `json:"angle"`
}

// Pose returns the placement as a Pose.
func (p Placement) Pose() Pose { return NewPose(p.X, p.Y, p.Angle) }

// A Pose is the place of a body in a frame: its origin in m, and the unit vector
// along its x axis, which stands for the angle. A zero Axis reads as (1, 0), so
// the zero Pose is the frame itself. A pose made by hand needs an Axis of length 1;
// those that the library returns have one.
type Pose struct{ Origin, Axis r2.Vec }

// NewPose returns the pose with its origin at (x, y), in m, turned by angle, in
// rad counter-clockwise.
func NewPose(x, y, angle float64) Pose {
	s, c := math.Sincos(angle)
	return Pose{Origin: r2.Vec{X: x, Y: y}, Axis: r2.Vec{X: c, Y: s}}
}

// axis returns Axis, or (1, 0) for a zero one.
func (p *Pose) axis() r2.Vec {
	if p.Axis.X == 0 && p.Axis.Y == 0 {
		return r2.Vec{X: 1}
	}
	return p.Axis
}

// Angle returns the angle of the body's x axis, in (−π, π].
func (p Pose) Angle() float64 {
	u := p.axis()
	if a := math.Atan2(u.Y, u.X); a != -math.Pi { // of a Y of −0 or next to it
		return a
	}
	return math.Pi
}

// Point returns the place in the frame of a point given in the body, in m:
//
//	Origin + local.X·Axis + local.Y·Axis⊥
func (p Pose) Point(local r2.Vec) r2.Vec { return r2.Add(p.Origin, turn(p.axis(), local)) }

// Local returns the place in the body of a point given in the frame, in m: the
// inverse of Point.
func (p Pose) Local(point r2.Vec) r2.Vec { return back(p.axis(), r2.Sub(point, p.Origin)) }

// Compose returns the pose in the frame of a child whose pose is given in the
// body. Its Axis is a unit vector however long the chain.
func (p Pose) Compose(child Pose) Pose {
	return Pose{Origin: p.Point(child.Origin), Axis: unit(turn(p.axis(), child.axis()))}
}

// Inverse returns the pose of the frame as seen from the body. Its Axis is a
// unit vector.
func (p Pose) Inverse() Pose {
	u := p.axis()
	u.Y = -u.Y
	return Pose{Origin: turn(u, r2.Scale(-1, p.Origin)), Axis: unit(u)}
}

// turn returns v turned by the angle of the unit vector u: the complex product u·v.
func turn(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X - u.Y*v.Y, Y: u.X*v.Y + u.Y*v.X}
}

// back returns v turned by minus the angle of the unit vector u: conj(u)·v.
func back(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X + u.Y*v.Y, Y: u.X*v.Y - u.Y*v.X}
}

// unit brings a vector to length 1. Near 1 one step of Newton's method on 1/√n
// about n = 1 does, 3/2 − n/2, whose error is ⅜(n−1)²; elsewhere by hypot.
func unit(u r2.Vec) r2.Vec {
	n := u.X*u.X + u.Y*u.Y
	if math.Abs(n-1) < 1e-8 {
		return r2.Scale(1.5-0.5*n, u)
	}
	h := math.Hypot(u.X, u.Y)
	return r2.Vec{X: u.X / h, Y: u.Y / h}
}

// cross returns v turned a quarter left and scaled by w: the velocity w × v.
func cross(w float64, v r2.Vec) r2.Vec { return r2.Vec{X: -w * v.Y, Y: w * v.X} }
