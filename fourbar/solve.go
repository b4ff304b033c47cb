package fourbar

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// Solve writes into dst the motion of all links for a motion of the crank, in rad,
// rad/s and rad/s². Turn is the input as given. It gives every field of dst;
// where it returns an error it leaves dst as it was:
//
//   - ErrUnreachable: Turn.Pos lies outside Range;
//   - ErrSingular: Margin is below rigid.LeastMargin, at a limit of the crank or a
//     change point, and turn has a velocity or acceleration; or, of a kite with
//     Crank = Frame and Coupler = Follower, the two fixed joints of the coupler and
//     the follower fall together, which leaves their place open;
//   - ErrNotFinite: a number of turn is NaN or infinite, or a result would overflow;
//   - ErrInput: the linkage is not from New.
//
// A crank at rest, with velocity and acceleration 0, asks for the place alone,
// which a limit of the crank has too.
func (l *Linkage) Solve(dst *State, turn rigid.Coordinate) error {
	if l.dim.Branch > Crossed {
		return l.solveCell(dst, turn)
	}
	k, u := &l.byCrank, direction(turn.Pos)
	d := k.span(u)
	var t dyad.Triangle
	if !k.dyad.Place(&t, d, l.side) {
		if err := l.atLimit(k, &t, d); err != nil {
			return err
		}
	}
	margin := k.dyad.Margin(&t)
	p := pose{crank: link{u, turn.Vel, turn.Acc}, arm: r2.Scale(l.crank, u)}
	if turn.Vel != 0 || turn.Acc != 0 {
		if margin < rigid.LeastMargin {
			return rigid.ErrSingular
		}
		p.coupler.omega, p.follower.omega, p.coupler.alpha, p.follower.alpha = k.rates(&t, u, turn.Vel, turn.Acc)
	}
	p.coupler.axis, p.follower.axis = k.dyad.Axes(&t)
	if !l.write(dst, &p) {
		return rigid.ErrNotFinite
	}
	dst.Turn = turn
	dst.Margin = margin
	dst.Branch = l.dim.Branch
	dst.Transmission = trig.Angle(k.dyad.Cos(&t), margin)
	dst.Swing.Pos = l.swing(turn.Pos, p.follower.axis)
	return nil
}

// A link is what the closure equations determine of a link's motion.
type link struct {
	axis         r2.Vec
	omega, alpha float64
}

// A pose is the motion of the three moving links in the mechanism's own axes.
type pose struct {
	crank, coupler, follower link
	arm                      r2.Vec // along the crank, for the motion of its pin
}

// direction returns the unit vector at an angle.
func direction(angle float64) r2.Vec {
	sin, cos := trig.Sincos(angle)
	return r2.Vec{X: cos, Y: sin}
}

// write writes the links' motions and the sides of the pose, turned by Mount, whose
// origin is added last so that a small machine far from it keeps its accuracy. It
// reports false, and writes nothing, where a rate is not finite.
func (l *Linkage) write(dst *State, p *pose) bool {
	w, al, w2 := p.crank.omega, p.crank.alpha, p.crank.omega*p.crank.omega
	arm := l.mounted(p.arm)
	acc := r2.Vec{X: -al*arm.Y - w2*arm.X, Y: al*arm.X - w2*arm.Y}
	if acc.X*0+acc.Y*0+al*0+p.coupler.alpha*0+p.follower.alpha*0 != 0 { // NaN unless all are finite
		return false
	}
	m := &dst.Crank
	m.Pose.Origin, m.Pose.Axis = l.origin, l.mounted(p.crank.axis)
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = w, al

	m = &dst.Coupler
	m.Pose.Origin.X = l.origin.X + l.crank*dst.Crank.Pose.Axis.X
	m.Pose.Origin.Y = l.origin.Y + l.crank*dst.Crank.Pose.Axis.Y
	m.Pose.Axis = l.mounted(p.coupler.axis)
	m.Vel.X, m.Vel.Y = -w*arm.Y, w*arm.X
	m.Acc = acc
	m.Omega, m.Alpha = p.coupler.omega, p.coupler.alpha

	m = &dst.Follower
	m.Pose.Origin, m.Pose.Axis = l.pivot, l.mounted(p.follower.axis)
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = p.follower.omega, p.follower.alpha

	dst.Swing.Vel, dst.Swing.Acc = p.follower.omega, p.follower.alpha
	dst.Knee = sideOf(p.coupler.axis, p.crank.axis)
	dst.Lean = sideOf(p.crank.axis, p.follower.axis)
	return true
}

// mounted returns a vector of the mechanism's axes in the machine's.
func (l *Linkage) mounted(v r2.Vec) r2.Vec {
	return r2.Vec{X: l.axis.X*v.X - l.axis.Y*v.Y, Y: l.axis.X*v.Y + l.axis.Y*v.X}
}

// sideOf returns the side of the direction u on which v lies.
func sideOf(u, v r2.Vec) rigid.Side {
	if u.X*v.Y < u.Y*v.X {
		return rigid.Right
	}
	return rigid.Left
}

// sign returns +1 for Left and −1 for Right.
func sign(s rigid.Side) float64 { return 1 - 2*float64(s) }
