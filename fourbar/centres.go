package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A Centre is the instantaneous centre of two links: where a point of one and a
// point of the other have one velocity. It depends on the position alone.
type Centre struct {
	Point      r2.Vec // in the frame, in m; zero where it lies at infinity
	AtInfinity bool   // the two links turn at one rate
	Direction  r2.Vec // where AtInfinity: unit vector of the line, in the frame, on which it lies
}

// Centres are the instantaneous centres of the six pairs of links. By the theorem
// of Aronhold and Kennedy the three of any three links lie in one line.
type Centres struct {
	FrameCrank, CrankCoupler, CouplerFollower, FrameFollower Centre // the four joints
	FrameCoupler                                             Centre // on the lines of crank and follower
	CrankFollower                                            Centre // on the lines of frame and coupler
}

// parallel is the sine of an angle that rounding may make of 0.
const parallel = 4 * 0x1p-52

// Centres returns the instantaneous centres at a position that a solve of this
// linkage gave. Where all links lie in one line the position alone does not tell:
// there Parallel and Contrary have the centres of the motion that passes it, and
// other linkages ErrSingular. ErrInput for a linkage that is not from New,
// ErrNotFinite for a State with a number that is not finite.
func (l *Linkage) Centres(st *State) (Centres, error) {
	if l.longest == 0 {
		return Centres{}, rigid.ErrInput
	}
	u2, u3, u4 := st.Crank.Pose.Axis, st.Coupler.Pose.Axis, st.Follower.Pose.Axis
	o2, o4 := l.origin, l.pivot
	a := st.Coupler.Pose.Origin
	for _, v := range [...]r2.Vec{u2, u3, u4, a, st.Follower.Pose.Origin} {
		if v.X*0+v.Y*0 != 0 {
			return Centres{}, rigid.ErrNotFinite
		}
	}
	c := Centres{
		FrameCrank:      Centre{Point: o2},
		CrankCoupler:    Centre{Point: a},
		CouplerFollower: Centre{Point: st.Follower.At(r2.Vec{X: l.follower}).Pos},
		FrameFollower:   Centre{Point: o4},
	}
	if l.dim.Branch == Parallel {
		c.FrameCoupler = Centre{AtInfinity: true, Direction: u2}
		c.CrankFollower = Centre{AtInfinity: true, Direction: u3}
		return c, nil
	}
	flat := math.Abs(r2.Cross(l.axis, u2)) <= parallel && math.Abs(r2.Cross(l.axis, u4)) <= parallel
	switch {
	case !flat:
		c.FrameCoupler = meet(o2, u2, r2.Sub(o4, o2), u4)
		c.CrankFollower = meet(o2, l.axis, r2.Sub(a, o2), u3)
	case l.dim.Branch == Contrary:
		var unit State
		if err := l.Solve(&unit, rigid.Coordinate{Pos: st.Turn.Pos, Vel: 1}); err != nil {
			return Centres{}, err
		}
		// ω2 (A − O2) = ω3 (A − I),  ω2 (I − O2) = ω4 (I − O4)
		w3, w4 := unit.Coupler.Omega, unit.Follower.Omega
		c.FrameCoupler.Point = r2.Add(o2, r2.Scale(l.crank*(1-1/w3), u2))
		c.CrankFollower.Point = r2.Add(o2, r2.Scale(l.frame*w4/(w4-1), l.axis))
	default:
		return Centres{}, rigid.ErrSingular
	}
	return c, nil
}

// meet returns where the line through p along the unit vector u meets the one
// through p + r along v.
func meet(p, u, r, v r2.Vec) Centre {
	sin := r2.Cross(u, v)
	if math.Abs(sin) <= parallel {
		return Centre{AtInfinity: true, Direction: u}
	}
	return Centre{Point: r2.Add(p, r2.Scale(r2.Cross(r, v)/sin, u))}
}
