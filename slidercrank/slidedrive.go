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
// where the slide cannot drive the crank, and for a slide that no more than rounding,
// some 2ε of its greatest, keeps from one. Errors: ErrUnreachable out of reach, and
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
// there is a pose on a branch that the mechanism can come to. With D the distance
// of the pin from the crank pivot and σo and σi the slide at the outer and the inner
// dead centre, the pin is beyond one of them by
//
//	D − (r + l) = (σ² − σo²)/(D + (r + l)),  |r − l| − D = (σi² − σ²)/(|r − l| + D)
//
// and at it, with crank and rod in one line, where no more than the rounding of the
// slide that Solve gives there is between them. That rounding, of ξ² = (l − η)(l + η),
// may also take a slide over to the other branch where it and ξ are both next to 0.
func (l *Linkage) triangle(t *dyad.Triangle, pos float64, knee rigid.Side) bool {
	d, side, s := r2.Vec{X: pos, Y: l.guide}, 1-2*float64(knee), math.Abs(pos)
	dist, far, near, slack := math.Hypot(pos, l.guide), l.crank+l.rod, math.Abs(l.crank-l.rod), beyond*l.size
	over, under := (s-l.outer)*(s+l.outer), (l.inner-s)*(l.inner+s)
	inner := math.Copysign(l.inner, pos)
	if l.full {
		inner = l.side * l.inner
	}
	switch {
	case over > slack*(dist+far) || l.folds && under > slack*(near+dist):
		return false
	case over >= -equal*far*far:
		l.flat(t, d, side)
	case l.folds && under >= -equal*far*near:
		if math.Abs(pos-inner) <= slack {
			d.X = inner
		}
		l.flat(t, d, side)
	case !l.bySlide.Place(t, d, side):
		l.flat(t, d, side)
	}
	xi := -t.Q.X
	return !l.full || xi*l.side >= 0 || math.Abs(xi*pos) <= equal*far*far
}

// flat places crank and rod in one line for the slider pin at d, stretched or one
// folded on the other. Equal lengths fold with the pin in the crank pivot, where any
// line will do: they stand square to d, as they do for the shortest d.
func (l *Linkage) flat(t *dyad.Triangle, d r2.Vec, side float64) {
	dist, u := math.Hypot(d.X, d.Y), r2.Vec{X: l.side}
	if dist > 0 {
		u = r2.Vec{X: d.X / dist, Y: d.Y / dist}
	}
	r, q := 1.0, -1.0
	switch {
	case 2*dist > l.crank+l.rod+math.Abs(l.crank-l.rod):
	case l.crank > l.rod:
		q = 1
	case l.crank < l.rod:
		r = -1
	default:
		u, r, q = r2.Vec{X: -u.Y, Y: u.X}, side, side
	}
	t.R, t.Q, t.F = r2.Scale(r*l.crank, u), r2.Scale(q*l.rod, u), 0
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
