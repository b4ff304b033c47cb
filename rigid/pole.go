package rigid

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A Circle is a circle in the frame, its centre and radius in m.
type Circle struct {
	Centre r2.Vec
	Radius float64
}

// Pole returns the instantaneous centre of velocity, in m in the frame: the point
// of the body at rest at this instant. With r from the origin to it,
//
//	Vel + ω×r = 0
//
// A body that does not turn has none: ErrNoPole, also where it lies too far away
// for a float64. ErrNotFinite where the motion is not finite or a difference of
// two velocities overflows.
func (m *Motion) Pole() (r2.Vec, error) {
	var frame Motion
	return RelativePole(m, &frame)
}

// RelativePole returns the instantaneous centre of a relative to b, in m in the
// frame of both: the place where a point of a and a point of b have one velocity.
// By the Aronhold–Kennedy theorem the three relative poles of three bodies lie on
// one line. Errors as Pole; ErrNoPole where both turn at one rate.
func RelativePole(a, b *Motion) (r2.Vec, error) {
	if !a.finite() || !b.finite() {
		return r2.Vec{}, ErrNotFinite
	}
	w := a.Omega - b.Omega
	// velocity of a's origin less that of b's point there
	v := r2.Sub(r2.Sub(a.Vel, b.Vel), cross(b.Omega, r2.Sub(a.Pose.Origin, b.Pose.Origin)))
	if !finite(w, v.X, v.Y) {
		return r2.Vec{}, ErrNotFinite
	}
	p := r2.Vec{X: a.Pose.Origin.X - v.Y/w, Y: a.Pose.Origin.Y + v.X/w}
	if !finite(p.X, p.Y) {
		return r2.Vec{}, ErrNoPole
	}
	return p, nil
}

// AccelerationPole returns the point of the body without acceleration at this
// instant, in m in the frame. With r from the origin to it,
//
//	Acc + α×r − ω²r = 0,  that is  r = (ω²·Acc + α×Acc)/(ω⁴ + α²)
//
// A body without angular velocity and acceleration has none: ErrNoPole, also
// where it lies too far away for a float64. ErrNotFinite where the motion is not
// finite, or ω² or √(ω⁴ + α²) overflows.
func (m *Motion) AccelerationPole() (r2.Vec, error) {
	w2 := m.Omega * m.Omega
	h := math.Hypot(w2, m.Alpha)
	if !m.finite() || !finite(h) {
		return r2.Vec{}, ErrNotFinite
	}
	c, s := w2/h, m.Alpha/h
	r := turn(r2.Vec{X: c, Y: s}, r2.Vec{X: m.Acc.X / h, Y: m.Acc.Y / h})
	p := r2.Add(m.Pose.Origin, r)
	if !finite(p.X, p.Y) {
		return r2.Vec{}, ErrNoPole
	}
	return p, nil
}

// InflectionCircle returns the circle of the points of the body whose paths are
// straight at this instant, in m in the frame. It passes through the pole, whose
// acceleration is a: for r from the pole to a point of it,
//
//	v×a(r) = 0  with  v = ω×r,  a(r) = a + α×r − ω²r   ⇒   r·r = r·a/ω²
//
// so its diameter is a/ω². Of a body that turns about a fixed point the radius
// is 0. Errors as Pole, and ErrNotFinite where ω² overflows. Source: the inflection
// circle of the Euler–Savary theory, in any textbook of plane kinematics.
func (m *Motion) InflectionCircle() (Circle, error) {
	p, err := m.Pole()
	if err != nil {
		return Circle{}, err
	}
	w2 := m.Omega * m.Omega
	if !finite(w2) {
		return Circle{}, ErrNotFinite
	}
	r := r2.Sub(p, m.Pose.Origin)
	a := r2.Sub(r2.Add(m.Acc, cross(m.Alpha, r)), r2.Scale(w2, r))
	d := r2.Vec{X: a.X / w2 / 2, Y: a.Y / w2 / 2}
	c := Circle{Centre: r2.Add(p, d), Radius: math.Hypot(d.X, d.Y)}
	if !finite(c.Centre.X, c.Centre.Y, c.Radius) {
		return Circle{}, ErrNoPole
	}
	return c, nil
}
