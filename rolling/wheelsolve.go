package rolling

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// Solve writes the motion of the wheel that turns as given, in rad, and rolls
// without slip. The contact particle is at rest then and has the acceleration
// ω²ρ towards the wheel's centre, whatever the angular acceleration.
//
// Errors: ErrInput for a zero Wheel, ErrNotFinite where a given number or a
// result is not finite. On error dst is as before. It does not allocate.
func (w *Wheel) Solve(dst *WheelState, turn rigid.Coordinate) error {
	r := w.dim.Radius
	path := product(-r, turn.Pos)
	travel := rigid.Coordinate{Pos: path.hi, Vel: -r * turn.Vel, Acc: -r * turn.Acc}
	return w.place(dst, turn, travel, path.lo, 0, 0)
}

// SolveTravel is Solve for a given travel of the wheel's centre along its own
// path, in m, positive towards +x of the track. Turn is not wrapped.
func (w *Wheel) SolveTravel(dst *WheelState, travel rigid.Coordinate) error {
	return w.place(dst, scaled(w.perTravel, travel), travel, 0, 0, 0)
}

// SolveArc is Solve for a given arc of the contact along the track, in m: the
// rolled length. Of a ring on a peg arc and travel have opposite signs. Turn is
// not wrapped.
func (w *Wheel) SolveArc(dst *WheelState, arc rigid.Coordinate) error {
	path := w.lay.times(arc.Pos)
	travel := rigid.Coordinate{Pos: path.hi, Vel: w.lay.hi * arc.Vel, Acc: w.lay.hi * arc.Acc}
	err := w.place(dst, scaled(w.perArc, arc), travel, path.lo, 0, 0)
	if err == nil {
		dst.Arc = arc
	}
	return err
}

// place writes the state of a wheel that turns and travels as given; low is what
// travel.Pos lacks, slip and slipRate are velocity and acceleration of the contact
// particle along the track, travel + r·turn.
//
// With φ the angle from the x axis down to the track's tangent t, and the mechanism's
// axes as complex numbers, chords of circles about the track's centre give the
// places without a difference of nearly equal numbers:
//
//	g = sin(φ/2)·(cos(φ/2) − i·sin(φ/2))
//	contact = 2R·g,  centre = i·r + 2(R + r)·g,  t = 1 − 2i·g
//
// The centre moves with v along t, which turns at −v/(R + r); the contact particle,
// at −r from it along the normal, has the acceleration along the normal
//
//	ω²r − v²/(R + r) = ω²ρ + slip·(2rω − slip)/(R + r)  with  v = slip − rω
func (w *Wheel) place(dst *WheelState, turn, travel rigid.Coordinate, low, slip, slipRate float64) error {
	if w.dim.Radius == 0 {
		return rigid.ErrInput
	}
	u := w.axis
	t, contact := u, r2.Vec{X: travel.Pos * u.X, Y: travel.Pos * u.Y}
	centre := contact
	s, c := trig.Sincos(turn.Pos)
	if w.reach != 0 {
		sh, ch := w.half.by(double{travel.Pos, low}).sincos()
		k, j := sh*ch, sh*sh
		g := r2.Vec{X: u.X*k + u.Y*j, Y: u.Y*k - u.X*j}
		t = r2.Vec{X: u.X + 2*g.Y, Y: u.Y - 2*g.X}
		contact = r2.Vec{X: w.ground * g.X, Y: w.ground * g.Y}
		centre = r2.Vec{X: w.reach * g.X, Y: w.reach * g.Y}
	}
	v, rate, normal := travel.Vel, travel.Acc, -travel.Vel*travel.Vel*w.bend
	pull := turn.Vel*turn.Vel*w.rho + slip*(2*w.dim.Radius*turn.Vel-slip)*w.bend
	arc := rigid.Coordinate{Pos: w.arc.hi * travel.Pos, Vel: w.arc.hi * v, Acc: w.arc.hi * rate}
	at := r2.Vec{X: w.origin.X + (w.up.X + centre.X), Y: w.origin.Y + (w.up.Y + centre.Y)}
	acc := r2.Vec{X: rate*t.X - normal*t.Y, Y: rate*t.Y + normal*t.X}
	pulled := r2.Vec{X: slipRate*t.X - pull*t.Y, Y: slipRate*t.Y + pull*t.X}
	// a sum is NaN or infinite if a term is; one beyond 1.8e308 counts as an overflow too
	if ((turn.Pos+turn.Vel)+(turn.Acc+arc.Pos)+(arc.Vel+arc.Acc)+((at.X+at.Y)+(v+slip))+((acc.X+acc.Y)+(pulled.X+pulled.Y)))*0 != 0 {
		return rigid.ErrNotFinite
	}
	m := &dst.Wheel // field by field: a literal of the whole state would be copied
	m.Pose.Origin = at
	m.Pose.Axis = r2.Vec{X: u.X*c - u.Y*s, Y: u.X*s + u.Y*c}
	m.Vel = r2.Vec{X: v * t.X, Y: v * t.Y}
	m.Acc = acc
	m.Omega, m.Alpha = turn.Vel, turn.Acc
	dst.Contact.Pos = r2.Vec{X: w.origin.X + contact.X, Y: w.origin.Y + contact.Y}
	dst.Contact.Vel = r2.Vec{X: slip * t.X, Y: slip * t.Y}
	dst.Contact.Acc = pulled
	dst.Turn, dst.Arc, dst.Travel = turn, arc, travel
	return nil
}

// On moves a state, solved on a resting track, onto a ground that carries the track
// and moves as given: a turntable, a carriage, a swinging frame. Wheel and Contact
// become motions in the machine, with the ground's; Turn, Arc and Travel stay as the
// ground sees them. Where the turn in the machine is given, solve for that turn
// less the ground's. ErrNotFinite as Solve; then the state is as before.
func (s *WheelState) On(ground *rigid.Motion) error {
	wheel, contact := ground.Compose(&s.Wheel), ground.Carry(s.Contact)
	if !finiteMotion(&wheel) || !finitePoint(contact) {
		return rigid.ErrNotFinite
	}
	s.Wheel, s.Contact = wheel, contact
	return nil
}
