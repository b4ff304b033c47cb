package fourbar

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// solveRare is Solve for what its inner loop leaves out: Parallel and Contrary, a
// crank at rest, the neighbourhood of a limit and what lies beyond it, lengths of very
// different size, and rates that are not finite or may overflow.
func (l *Linkage) solveRare(dst *State, turn rigid.Coordinate) error {
	if l.dim.Branch > Crossed {
		return l.solveCell(dst, turn)
	}
	k, t := &l.byCrank, dyad.Triangle{}
	p := pose{crank: dyad.Link{Axis: direction(turn.Pos), Omega: turn.Vel, Alpha: turn.Acc}}
	margin, err := l.solve(k, &t, &p.coupler, &p.follower, &p.crank, l.side)
	if err != nil {
		return err
	}
	if !l.write(dst, &p) {
		return rigid.ErrNotFinite
	}
	dst.Turn = turn
	dst.Margin = margin
	dst.Branch = l.dim.Branch
	dst.Transmission = trig.Angle(k.dyad.Cos(&t), margin)
	dst.Swing.Pos = l.swing(turn.Pos, p.follower.Axis)
	return nil
}

// A pose is the motion of the three moving links in the mechanism's own axes.
type pose struct{ crank, coupler, follower dyad.Link }

// direction returns the unit vector at an angle.
func direction(angle float64) r2.Vec {
	sin, cos := trig.Sincos(angle)
	return r2.Vec{X: cos, Y: sin}
}

// write writes the links' motions and the sides of the pose, turned by Mount, whose
// origin is added last so that a small machine far from it keeps its accuracy. It
// reports false, and writes nothing, where a rate is not finite.
func (l *Linkage) write(dst *State, p *pose) bool {
	w, al, w2 := p.crank.Omega, p.crank.Alpha, p.crank.Omega*p.crank.Omega
	axis := l.mounted(p.crank.Axis)
	arm := r2.Scale(l.crank, axis)
	acc := r2.Vec{X: -al*arm.Y - w2*arm.X, Y: al*arm.X - w2*arm.Y}
	if acc.X*0+acc.Y*0+al*0+p.coupler.Alpha*0+p.follower.Alpha*0 != 0 { // NaN unless all are finite
		return false
	}
	m := &dst.Crank
	m.Pose.Origin, m.Pose.Axis = l.origin, axis
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = w, al

	m = &dst.Coupler
	m.Pose.Origin = r2.Add(l.origin, arm)
	m.Pose.Axis = l.mounted(p.coupler.Axis)
	m.Vel.X, m.Vel.Y = -w*arm.Y, w*arm.X
	m.Acc = acc
	m.Omega, m.Alpha = p.coupler.Omega, p.coupler.Alpha

	m = &dst.Follower
	m.Pose.Origin, m.Pose.Axis = l.pivot, l.mounted(p.follower.Axis)
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = p.follower.Omega, p.follower.Alpha

	dst.Swing.Vel, dst.Swing.Acc = p.follower.Omega, p.follower.Alpha
	dst.Knee = sideOf(p.coupler.Axis, p.crank.Axis)
	dst.Lean = sideOf(p.crank.Axis, p.follower.Axis)
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
