package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// SolveFollower writes into dst the motion of all links for a motion of the
// follower, in rad, rad/s and rad/s², with the crank pin on the side knee of the
// line from the crank pivot to the follower pin. Swing is the input as given,
// Turn.Pos lies in (−π, π], and Margin is the sine between crank and coupler.
//
// Where the crank turns fully a pose on the other Branch is another assembly:
// ErrUnreachable. Elsewhere the linkage gets there through a limit of the crank,
// and dst.Branch tells which it is. Parallel and Contrary have one pose for a
// follower angle and do not look at knee. The other errors are those of Solve,
// and ErrInput for a knee that is neither Left nor Right.
func (l *Linkage) SolveFollower(dst *State, swing rigid.Coordinate, knee rigid.Side) error {
	if knee != rigid.Left && knee != rigid.Right {
		return rigid.ErrInput
	}
	if l.dim.Branch > Crossed {
		return l.solveCellBack(dst, swing)
	}
	p := pose{follower: dyad.Link{Axis: direction(swing.Pos), Omega: swing.Vel, Alpha: swing.Acc}}
	margin, err := l.solve(&l.byFollower, &dyad.Triangle{}, &p.crank, &p.coupler, &p.follower, sign(knee))
	if err != nil {
		return err
	}
	p.coupler.Axis = r2.Scale(-1, p.coupler.Axis)
	if err := l.writeBack(dst, &p); err != nil {
		return err
	}
	dst.Swing, dst.Knee, dst.Margin = swing, knee, margin
	return nil
}

// SolveCoupler writes into dst the motion of all links for a motion of the
// coupler, its angle in the mechanism's axes in rad and the rates in rad/s and
// rad/s², with the follower's direction on the side lean of the crank's. Turn.Pos
// lies in (−π, π], Swing.Pos is the one that Solve gives there, and Margin is the
// sine between crank and follower.
//
// Errors are those of SolveFollower, for lean as there for knee. The coupler of
// Parallel never turns, so it drives nothing: ErrSingular at its angle 0,
// ErrUnreachable at any other. At angle 0 Contrary has its links in one line,
// with the crank at 0 for Left and at π for Right, and Lean changes there.
func (l *Linkage) SolveCoupler(dst *State, coupler rigid.Coordinate, lean rigid.Side) error {
	switch {
	case lean != rigid.Left && lean != rigid.Right:
		return rigid.ErrInput
	case l.dim.Branch == Parallel:
		return parallelCoupler(coupler)
	}
	p := pose{coupler: dyad.Link{Axis: direction(coupler.Pos), Omega: coupler.Vel, Alpha: coupler.Acc}}
	var margin float64
	var err error
	if l.dim.Branch == Contrary {
		margin, err = l.contraryCoupler(&p, coupler, sign(lean))
	} else {
		margin, err = l.solve(&l.byCoupler, &dyad.Triangle{}, &p.crank, &p.follower, &p.coupler, sign(lean))
	}
	if err != nil {
		return err
	}
	if err := l.writeBack(dst, &p); err != nil {
		return err
	}
	dst.Swing.Pos = l.swing(dst.Turn.Pos, p.follower.Axis)
	dst.Lean, dst.Margin = lean, margin
	return nil
}

// writeBack writes a pose found from the follower or the coupler, but for what
// depends on the drive.
func (l *Linkage) writeBack(dst *State, p *pose) error {
	sin := l.kink(p)
	branch := l.dim.Branch
	if branch <= Crossed && sin*l.side < 0 {
		switch {
		case !l.turns:
			branch = Crossed - branch
		case math.Abs(sin) > l.byCrank.near:
			return rigid.ErrUnreachable
		}
	}
	if !l.write(dst, p) {
		return rigid.ErrNotFinite
	}
	dst.Turn = rigid.Coordinate{Pos: trig.Angle(p.crank.Axis.X, p.crank.Axis.Y), Vel: p.crank.Omega, Acc: p.crank.Alpha}
	if dst.Turn.Pos == -math.Pi {
		dst.Turn.Pos = math.Pi
	}
	dst.Branch = branch
	dst.Transmission = trig.Angle(r2.Dot(p.coupler.Axis, p.follower.Axis), math.Abs(sin))
	return nil
}

// kink returns the sine of the angle from the coupler's direction to the
// follower's: its product with the coupler's length is d×u4, d from the crank pin
// to the follower pivot, which keeps its digits where d is short.
func (l *Linkage) kink(p *pose) float64 {
	d := l.byCrank.span(p.crank.Axis)
	if d.X*d.X+d.Y*d.Y < l.coupler*l.coupler {
		return r2.Cross(d, p.follower.Axis) / l.coupler
	}
	return r2.Cross(p.coupler.Axis, p.follower.Axis)
}
