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
// there is a pose on a branch that the mechanism can come to.
func (l *Linkage) triangle(t *dyad.Triangle, pos float64, knee rigid.Side) bool {
	side, slack, s := 1-2*float64(knee), beyond*l.size, math.Abs(pos)
	if s-l.outer > slack || l.folds && l.inner-s > slack || l.full && -pos*l.side > slack {
		return false
	}
	stretched := s >= l.outer
	if stretched || l.folds && s <= l.inner || l.full && pos*l.side < 0 {
		l.flat(t, math.Copysign(1, pos), side, stretched)
		return true
	}
	return l.bySlide.Place(t, r2.Vec{X: pos, Y: l.guide}, side)
}

// flat places crank and rod in one line, at a dead centre: the crank along the
// vector d to the slider pin and the rod on from it, or one folded on the other.
// Folded with equal lengths in line, d is 0 and they stand square to the guide, as
// they do for the slightest slide.
func (l *Linkage) flat(t *dyad.Triangle, ahead, side float64, stretched bool) {
	r, rod, s := l.given.Crank, l.given.Rod, l.outer
	q := -rod
	if !stretched {
		s, r, q = l.inner, math.Copysign(r, r-rod), math.Copysign(rod, r-rod)
	}
	d := r2.Vec{X: ahead * s, Y: l.guide}
	if s == 0 && l.guide == 0 {
		d, r, q = r2.Vec{Y: side * ahead}, math.Abs(r), math.Abs(q)
	}
	u := r2.Unit(d)
	t.R, t.Q, t.F = r2.Scale(r, u), r2.Scale(q, u), 0
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
