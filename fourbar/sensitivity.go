package fourbar

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
)

// A LengthSensitivity is how an output changes with one length, the motion of the
// crank and all other lengths being what they are.
type LengthSensitivity struct {
	Swing rigid.Coordinate // of the follower: rad/m, rad/(s·m), rad/(s²·m)
	Point rigid.Point      // of the coupler point, in the frame: m/m, 1/s, 1/s²
}

// A Sensitivity is how the follower and a coupler point change with each length.
// Times the tolerances of the lengths its absolute values add up to the worst
// case, their squares to the square of the likely error.
type Sensitivity struct{ Frame, Crank, Coupler, Follower LengthSensitivity }

// Sensitivity writes into dst the derivatives, by each length, of the follower's
// motion and of that of a coupler point (in m in the coupler, whose axes stay at
// its pins), for a motion of the crank in rad, rad/s and rad/s². They are exact:
// the closure equation differentiated by the length, and by time. A length of
// Parallel or Contrary changes alone too, which leaves the exact parallelogram.
//
// Errors as Solve, and ErrSingular where Margin is below rigid.LeastMargin, also
// for a crank at rest. On an error dst is as it was.
func (l *Linkage) Sensitivity(dst *Sensitivity, turn rigid.Coordinate, coupler r2.Vec) error {
	var st State
	if err := l.Solve(&st, turn); err != nil {
		return err
	}
	if st.Margin < rigid.LeastMargin {
		return rigid.ErrSingular
	}
	if coupler.X*0+coupler.Y*0 != 0 {
		return rigid.ErrNotFinite
	}
	v := variation{u2: st.Crank.Pose.Axis, st: &st}
	side := 1.0
	if sideOf(st.Coupler.Pose.Axis, st.Follower.Pose.Axis) == rigid.Right {
		side = -1
	}
	if !l.byCrank.dyad.Place(&v.t, l.byCrank.span(less(v.u2, l.axis)), side) {
		return rigid.ErrSingular
	}
	v.t.R, v.t.Q = l.mounted(v.t.R), l.mounted(v.t.Q)
	v.point = r2.Sub(st.Coupler.At(coupler).Pos, st.Coupler.Pose.Origin)
	s := Sensitivity{
		Frame:    v.by(r2.Scale(-1, l.axis), 0, 0),
		Crank:    v.by(v.u2, turn.Vel, turn.Acc),
		Coupler:  v.by(st.Coupler.Pose.Axis, st.Coupler.Omega, st.Coupler.Alpha),
		Follower: v.by(r2.Scale(-1, st.Follower.Pose.Axis), st.Follower.Omega, st.Follower.Alpha),
	}
	s.Crank.Point = v.carried(s.Crank.Point, turn)
	for _, x := range [...]*LengthSensitivity{&s.Frame, &s.Crank, &s.Coupler, &s.Follower} {
		p := &x.Point
		for _, v := range [...]r2.Vec{p.Pos, p.Vel, p.Acc, {X: x.Swing.Vel, Y: x.Swing.Acc}} {
			if v.X*0+v.Y*0 != 0 {
				return rigid.ErrNotFinite
			}
		}
	}
	*dst = s
	return nil
}

// A variation differentiates the closure r − q + a·u2 − d = 0 by a length.
type variation struct {
	t     dyad.Triangle // r and q along coupler and follower
	u2    r2.Vec
	point r2.Vec // from the crank pin to the coupler point
	st    *State
}

// by returns the derivatives by a length that adds f to the closure, f a unit
// vector that turns with w and al. With ′ for the derivative by the length, and f
// the part of it that is explicit,
//
//	0 = f + r⊥θ3′ − q⊥θ4′
//	0 = w f⊥ − ω3θ3′ r + ω4θ4′ q + r⊥ω3′ − q⊥ω4′
//	0 = al f⊥ − w²f − (α3θ3′ + 2ω3ω3′) r − ω3²θ3′ r⊥ + (α4θ4′ + 2ω4ω4′) q + ω4²θ4′ q⊥ + r⊥α3′ − q⊥α4′
//
// the second and third by time. The coupler point, ρ from the crank pin, moves as
// r does; the length of the crank also moves the pin.
func (v *variation) by(f r2.Vec, w, al float64) LengthSensitivity {
	w3, al3, w4, al4 := v.st.Coupler.Omega, v.st.Coupler.Alpha, v.st.Follower.Omega, v.st.Follower.Alpha
	r, q := v.t.R, v.t.Q
	t3, t4 := v.t.Rates(f)
	v3, v4 := v.t.Rates(sum(cross(w, f), r2.Scale(-w3*t3, r), r2.Scale(w4*t4, q)))
	a3, a4 := v.t.Rates(sum(cross(al, f), r2.Scale(-w*w, f),
		r2.Scale(-(al3*t3+2*w3*v3), r), cross(-w3*w3*t3, r),
		r2.Scale(al4*t4+2*w4*v4, q), cross(w4*w4*t4, q)))
	return LengthSensitivity{
		Swing: rigid.Coordinate{Pos: t4, Vel: v4, Acc: a4},
		Point: rigid.Point{
			Pos: cross(t3, v.point),
			Vel: sum(cross(v3, v.point), r2.Scale(-w3*t3, v.point)),
			Acc: sum(cross(a3-w3*w3*t3, v.point), r2.Scale(-(al3*t3+2*w3*v3), v.point)),
		},
	}
}

// carried adds the derivative of the crank pin by the crank's length, u2.
func (v *variation) carried(p rigid.Point, turn rigid.Coordinate) rigid.Point {
	return rigid.Point{
		Pos: r2.Add(p.Pos, v.u2),
		Vel: r2.Add(p.Vel, cross(turn.Vel, v.u2)),
		Acc: sum(p.Acc, cross(turn.Acc, v.u2), r2.Scale(-turn.Vel*turn.Vel, v.u2)),
	}
}

// cross returns w × v.
func cross(w float64, v r2.Vec) r2.Vec { return r2.Vec{X: -w * v.Y, Y: w * v.X} }

func sum(all ...r2.Vec) r2.Vec {
	var s r2.Vec
	for _, v := range all {
		s = r2.Add(s, v)
	}
	return s
}
