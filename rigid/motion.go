package rigid

import "gonum.org/v1/gonum/spatial/r2"

// A Motion is the motion of a rigid body in a frame at one instant: its pose,
// the velocity and acceleration of its origin in m/s and m/s², its angular
// velocity in rad/s and angular acceleration in rad/s², both positive
// counter-clockwise. The zero Motion is the frame itself, at rest.
//
// The methods take a pointer, since a copy of 80 bytes shows in a control loop; they
// don't change it.
type Motion struct {
	Pose         Pose
	Vel, Acc     r2.Vec // of Pose.Origin
	Omega, Alpha float64
}

// At returns the motion of a point fixed in the body, local in m in the body's
// axes: the two-point equation, with r from the origin to the point,
//
//	v = Vel + ω×r
//	a = Acc + α×r − ω²r
func (m *Motion) At(local r2.Vec) Point {
	r := turn(m.Pose.axis(), local)
	w, al, w2 := m.Omega, m.Alpha, m.Omega*m.Omega
	return Point{
		Pos: r2.Vec{X: m.Pose.Origin.X + r.X, Y: m.Pose.Origin.Y + r.Y},
		Vel: r2.Vec{X: m.Vel.X - w*r.Y, Y: m.Vel.Y + w*r.X},
		Acc: r2.Vec{X: m.Acc.X - al*r.Y - w2*r.X, Y: m.Acc.Y + al*r.X - w2*r.Y},
	}
}

// Carry returns the motion of a point that moves in the body as local says, in
// the body's axes. With r from the origin to the point, and u and b its velocity
// and acceleration in the body,
//
//	v = Vel + ω×r + u
//	a = Acc + α×r − ω²r + b + 2ω×u
func (m *Motion) Carry(local Point) Point {
	u := m.Pose.axis()
	p, v, a := m.At(local.Pos), turn(u, local.Vel), turn(u, local.Acc)
	c := 2 * m.Omega
	return Point{
		Pos: p.Pos,
		Vel: r2.Vec{X: p.Vel.X + v.X, Y: p.Vel.Y + v.Y},
		Acc: r2.Vec{X: p.Acc.X + a.X - c*v.Y, Y: p.Acc.Y + a.Y + c*v.X},
	}
}

// VelocityTerms are the terms of the velocity of a point that moves in a body,
// in m/s, in the frame's axes.
type VelocityTerms struct {
	Base     r2.Vec // of the body's origin
	Turning  r2.Vec // ω×r
	Relative r2.Vec // as seen from the body
}

// Sum returns the velocity.
func (t VelocityTerms) Sum() r2.Vec { return r2.Add(r2.Add(t.Base, t.Turning), t.Relative) }

// AccelerationTerms are the terms of the acceleration of a point that moves in a
// body, in m/s², in the frame's axes.
type AccelerationTerms struct {
	Base       r2.Vec // of the body's origin
	Tangential r2.Vec // α×r
	Normal     r2.Vec // −ω²r
	Relative   r2.Vec // as seen from the body
	Coriolis   r2.Vec // 2ω×u, u the velocity as seen from the body
}

// Sum returns the acceleration.
func (t AccelerationTerms) Sum() r2.Vec {
	return r2.Vec{
		X: t.Base.X + t.Tangential.X + t.Normal.X + t.Relative.X + t.Coriolis.X,
		Y: t.Base.Y + t.Tangential.Y + t.Normal.Y + t.Relative.Y + t.Coriolis.Y,
	}
}

// VelocityTerms returns the terms of the velocity of a point that moves in the
// body as local says, in the body's axes. For a point fixed in the body give its
// place alone: Relative is zero then.
func (m *Motion) VelocityTerms(local Point) VelocityTerms {
	u := m.Pose.axis()
	return VelocityTerms{
		Base:     m.Vel,
		Turning:  cross(m.Omega, turn(u, local.Pos)),
		Relative: turn(u, local.Vel),
	}
}

// AccelerationTerms returns the terms of the acceleration of a point that moves
// in the body as local says, in the body's axes. For a point fixed in the body
// give its place alone: Relative and Coriolis are zero then.
func (m *Motion) AccelerationTerms(local Point) AccelerationTerms {
	u := m.Pose.axis()
	r := turn(u, local.Pos)
	return AccelerationTerms{
		Base:       m.Acc,
		Tangential: cross(m.Alpha, r),
		Normal:     r2.Scale(-m.Omega*m.Omega, r),
		Relative:   turn(u, local.Acc),
		Coriolis:   cross(2*m.Omega, turn(u, local.Vel)),
	}
}

// Observe returns the motion of p, given in the frame, as an observer riding on
// the body sees it, in the body's axes: the inverse of Carry.
func (m *Motion) Observe(p Point) Point {
	u := m.Pose.axis()
	r := r2.Sub(p.Pos, m.Pose.Origin)
	w, al, w2 := m.Omega, m.Alpha, m.Omega*m.Omega
	v := r2.Vec{X: p.Vel.X - m.Vel.X + w*r.Y, Y: p.Vel.Y - m.Vel.Y - w*r.X}
	a := r2.Vec{
		X: p.Acc.X - m.Acc.X + al*r.Y + w2*r.X + 2*w*v.Y,
		Y: p.Acc.Y - m.Acc.Y - al*r.X + w2*r.Y - 2*w*v.X,
	}
	return Point{Pos: back(u, r), Vel: back(u, v), Acc: back(u, a)}
}

// origin returns the motion of the body's origin.
func (m *Motion) origin() Point { return Point{Pos: m.Pose.Origin, Vel: m.Vel, Acc: m.Acc} }

// Compose returns the motion in the frame of a child whose motion is given
// relative to the body, as an observer riding on the body sees it.
func (m *Motion) Compose(child *Motion) Motion {
	o := m.Carry(child.origin())
	return Motion{
		Pose:  Pose{Origin: o.Pos, Axis: unit(turn(m.Pose.axis(), child.Pose.axis()))},
		Vel:   o.Vel,
		Acc:   o.Acc,
		Omega: m.Omega + child.Omega,
		Alpha: m.Alpha + child.Alpha,
	}
}

// Relative returns the motion of the body as an observer riding on to sees it,
// in the axes of to: to.Compose of the result is the body's own motion again.
func (m *Motion) Relative(to *Motion) Motion {
	o := to.Observe(m.origin())
	return Motion{
		Pose:  Pose{Origin: o.Pos, Axis: unit(back(to.Pose.axis(), m.Pose.axis()))},
		Vel:   o.Vel,
		Acc:   o.Acc,
		Omega: m.Omega - to.Omega,
		Alpha: m.Alpha - to.Alpha,
	}
}

// finite reports whether every number of the motion is finite.
func (m *Motion) finite() bool {
	return finite(m.Pose.Origin.X, m.Pose.Origin.Y, m.Pose.Axis.X, m.Pose.Axis.Y,
		m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha)
}
