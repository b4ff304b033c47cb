package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// SolveSlide writes into dst the motion of all links for a motion of the slide, in
// m along the guide from the foot of the crank pivot. Of the two poses that fit,
// knee picks the one with the crank pin on that side of the line from the crank
// pivot to the slider pin. Turn.Pos is in (−π, π].
//
// Margin is |sin| of the angle between crank and rod: it is 0 at the dead centres,
// where the slide cannot drive the crank. Errors: ErrUnreachable out of reach, and
// where the pose is that of the other Branch but the crank turns fully, so that the
// two are different assemblies; ErrSingular for rates where Margin is below
// rigid.LeastMargin; ErrNotFinite; ErrInput for a zero Linkage or an unknown knee.
// Zero Vel and Acc ask for the place only. An error leaves dst as it was.
func (l *Linkage) SolveSlide(dst *State, slide rigid.Coordinate, knee rigid.Side) error {
	v, a := slide.Vel, slide.Acc
	if slide.Pos*0+v*0+a*0 != 0 {
		return rigid.ErrNotFinite
	}
	if l.crank == 0 || knee != rigid.Left && knee != rigid.Right {
		return rigid.ErrInput
	}
	var t dyad.Triangle
	if !l.triangle(&t, slide.Pos, knee) {
		return rigid.ErrUnreachable
	}
	crank, _ := l.bySlide.Axes(&t)
	turn := rigid.Coordinate{Pos: rigid.Wrap(trig.Angle(crank.X, crank.Y))}
	margin, omega, alpha := l.bySlide.Margin(&t), 0.0, 0.0
	if v != 0 || a != 0 {
		if margin < rigid.LeastMargin {
			return rigid.ErrSingular
		}
		turn.Vel, omega = t.Rates(r2.Vec{X: -v})
		turn.Acc, alpha = t.Rates(t.Bias(r2.Vec{X: -a}, turn.Vel, omega))
		if (l.crank*(turn.Vel*turn.Vel+math.Abs(turn.Acc))+alpha)*0 != 0 {
			return rigid.ErrNotFinite
		}
	}
	dst.Turn, dst.Slide, dst.Margin = turn, slide, margin
	dst.Branch, dst.Knee = l.branch(-t.Q.X), knee
	l.links(dst, crank, r2.Scale(-1, t.Q), turn.Vel, turn.Acc, omega, alpha)
	return nil
}

// triangle places crank and rod for the slider pin at pos, and reports whether
// there is a pose on a branch that the mechanism can come to. A slide no farther
// from a dead centre than the rounding of one that Solve gives there is at it.
func (l *Linkage) triangle(t *dyad.Triangle, pos float64, knee rigid.Side) bool {
	side, slack, s := 1-2*float64(knee), beyond*l.size, math.Abs(pos)
	near := equal * (l.crank + l.rod)
	if s-l.outer > slack || l.folds && l.inner-s > slack || l.full && -pos*l.side > slack {
		return false
	}
	d, ahead := r2.Vec{X: pos, Y: l.guide}, pos
	if l.full {
		ahead = l.side
	}
	switch {
	case s >= l.outer-near:
		d.X = math.Copysign(l.outer, ahead)
	case l.folds && s <= l.inner+near || pos*ahead < 0:
		d.X = math.Copysign(l.inner, ahead)
	case l.bySlide.Place(t, d, side):
		return true
	}
	l.flat(t, d, side)
	return true
}

// flat places crank and rod in one line, at a dead centre, for the slider pin at d.
// Where it is in the crank pivot, which takes equal lengths, every line will do:
// they stand square to d, as they do for the shortest d.
func (l *Linkage) flat(t *dyad.Triangle, d r2.Vec, side float64) {
	if math.Abs(d.X)+math.Abs(d.Y) > equal*l.size {
		l.bySlide.Flatten(t, d)
		return
	}
	if d.X == 0 && d.Y == 0 {
		d.X = l.side
	}
	u := r2.Scale(side, r2.Unit(d))
	u.X, u.Y = -u.Y, u.X
	t.R, t.Q, t.F = r2.Scale(l.crank, u), r2.Scale(l.rod, u), 0
}

// branch returns the branch of a pose whose rod goes xi along the guide.
func (l *Linkage) branch(xi float64) Branch {
	switch {
	case l.full || xi == 0:
		return l.given.Branch
	case xi > 0:
		return Ahead
	}
	return Behind
}
