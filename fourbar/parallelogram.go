package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
)

// The parallelogram in its two motions, which pass the position with all links in
// one line: neither form has a root of a difference or divides by the sine of the
// angle between two links.

// solveCell is Solve for Parallel and Contrary.
func (l *Linkage) solveCell(dst *State, turn rigid.Coordinate) error {
	p := pose{crank: dyad.Link{Axis: direction(turn.Pos), Omega: turn.Vel, Alpha: turn.Acc}}
	l.cell(&p.crank, &l.byCrank, &p.coupler, &p.follower)
	if err := l.writeCell(dst, &p, turn.Pos); err != nil {
		return err
	}
	dst.Turn = turn
	dst.Swing.Pos = turn.Pos
	if l.dim.Branch == Contrary {
		dst.Swing.Pos = l.swing(turn.Pos, p.follower.Axis)
	}
	dst.Margin = min(math.Abs(r2.Cross(p.coupler.Axis, p.follower.Axis)), 1)
	return nil
}

// solveCellBack is SolveFollower for Parallel and Contrary.
func (l *Linkage) solveCellBack(dst *State, swing rigid.Coordinate) error {
	p := pose{follower: dyad.Link{Axis: direction(swing.Pos), Omega: swing.Vel, Alpha: swing.Acc}}
	l.cell(&p.follower, &l.byFollower, &p.coupler, &p.crank)
	if err := l.writeCell(dst, &p, swing.Pos); err != nil {
		return err
	}
	dst.Swing = swing
	dst.Margin = min(math.Abs(r2.Cross(p.crank.Axis, p.coupler.Axis)), 1)
	return nil
}

func (l *Linkage) writeCell(dst *State, p *pose, in float64) error {
	if in*0 != 0 {
		return rigid.ErrNotFinite
	}
	return l.writeBack(dst, p)
}

// cell solves the coupler and the link opposite to a driven crank or follower.
//
// Parallel: the coupler keeps the frame's direction, the opposite link the driven
// one's. Contrary is the mirror image of that in the diagonal d of drive.span,
// which turns at ωd: with e = d/|d| as a complex number the frame's direction 1 and
// the driven link's u become e² and e²u*, their angular velocities 2ωd and 2ωd − ω.
// With m = arm·u, d' = −ω m⊥ and so on,
//
//	ωd = d×d'/d² = −ω d·m/d²,  αd = (−α d·m − ω (2ωd − ω) d×m)/d²
func (l *Linkage) cell(driven *dyad.Link, k *drive, coupler, opposite *dyad.Link) {
	if l.dim.Branch == Parallel {
		coupler.Axis, *opposite = r2.Vec{X: 1}, *driven
		return
	}
	u, d := driven.Axis, k.span(driven.Axis)
	i := 1 / (d.X*d.X + d.Y*d.Y)
	e2 := r2.Vec{X: (d.X - d.Y) * (d.X + d.Y) * i, Y: 2 * d.X * d.Y * i}
	coupler.Axis, opposite.Axis = e2, less(e2, u)
	if driven.Omega == 0 && driven.Alpha == 0 {
		return
	}
	dot, cross := k.arm*r2.Dot(d, u)*i, k.arm*r2.Cross(d, u)*i
	coupler.Omega = -2 * driven.Omega * dot
	opposite.Omega = coupler.Omega - driven.Omega
	coupler.Alpha = -2 * (driven.Alpha*dot + driven.Omega*opposite.Omega*cross)
	opposite.Alpha = coupler.Alpha - driven.Alpha
}

// less returns the unit vector at the angle of u less that of v.
func less(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X + u.Y*v.Y, Y: u.Y*v.X - u.X*v.Y}
}

// parallelCoupler is SolveCoupler for Parallel.
func parallelCoupler(coupler rigid.Coordinate) error {
	switch angle := rigid.Wrap(coupler.Pos); {
	case angle*0 != 0 || coupler.Vel*0 != 0 || coupler.Acc*0 != 0:
		return rigid.ErrNotFinite
	case math.Abs(angle) > closed:
		return rigid.ErrUnreachable
	}
	return rigid.ErrSingular
}

// contraryCoupler solves crank and follower of Contrary for the coupler's angle θ.
// They lie symmetric about a line at the angle θ/2, at −β and +β from it or from
// its other direction, where r − q = d of the drive gives
//
//	Crank sin β = Frame sin(θ/2)
//
// and the side of the follower from the crank is that of sin β cos β.
func (l *Linkage) contraryCoupler(p *pose, in rigid.Coordinate, side float64) (margin float64, err error) {
	half := direction(in.Pos / 2)
	s, c := half.Y, half.X
	ratio := l.frame / l.crank
	sin := ratio * s
	over := l.frame*math.Abs(s) - l.crank
	if !(over <= closed*l.longest) {
		if in.Pos*0 != 0 {
			return 0, rigid.ErrNotFinite
		}
		return 0, rigid.ErrUnreachable
	}
	cos := math.Copysign(math.Sqrt(max((1-sin)*(1+sin), 0)), side)
	if sin < 0 {
		cos = -cos
	}
	if over > 0 {
		sin = math.Copysign(1, sin)
	}
	p.crank.Axis = less(half, r2.Vec{X: cos, Y: sin})
	p.follower.Axis = less(half, r2.Vec{X: cos, Y: -sin})
	if in.Vel != 0 || in.Acc != 0 {
		if math.Abs(cos) < rigid.LeastMargin {
			return 0, rigid.ErrSingular
		}
		w, al := in.Vel/2, in.Acc/2
		b1 := ratio * c * w / cos
		b2 := (ratio*(c*al-s*w*w) + sin*b1*b1) / cos
		p.crank.Omega, p.follower.Omega = w-b1, w+b1
		p.crank.Alpha, p.follower.Alpha = al-b2, al+b2
	}
	return min(2*math.Abs(sin*cos), 1), nil
}
