package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
)

// A drive is the linkage as one driven link sees it: the two others are the RRR
// dyad whose outer pins are d = base − arm·u apart, u the unit vector along the
// driven link and base = (Frame, 0), all in the mechanism's own axes. With r and q
// along the links of the dyad, r − q = d, and u2, u3, u4 along crank, coupler and
// follower:
//
//	driven    arm   r          q
//	crank      a     b·u3       c·u4
//	follower  −c     a·u2      −b·u3
//	coupler    b     a·u2       c·u4
type drive struct {
	dyad      dyad.RRR
	base, arm float64 // length of the frame, signed length of the driven link
	long      bool    // whether the driven link is longer than the frame
	slack     float64 // how near to the end of the dyad's reach counts as at it
	near      float64 // no margin at such a place is greater
}

// newDrive returns the linkage as a link of signed length arm sees it.
//
// With τ the slack F² is at most τ·2(r + q)·4rq near either end of the reach, and so
// the square of the margin at most 2τ(1/r + 1/q).
func newDrive(base, arm, r, q float64) drive {
	slack := 8 * 0x1p-52 * max(base, math.Abs(arm), r, q)
	return drive{
		dyad: dyad.NewRRR(r, q), base: base, arm: arm, long: math.Abs(arm) > base,
		slack: slack, near: 2 * math.Sqrt(2*slack*(1/r+1/q)),
	}
}

// span returns d for the driven link along u.
func (k *drive) span(u r2.Vec) r2.Vec {
	return r2.Vec{X: k.base - k.arm*u.X, Y: -k.arm * u.Y}
}

// move solves the dyad for a driven link that moves. It reports false where the
// dyad does not close; where it is flat the rates are not finite.
//
// It looks from the longer of the frame and the driven link. With a driven link
// much longer than the frame all links turn almost as one, and seen from the
// frame the accelerations would be small differences of large terms. With m the
// shorter of the two, the velocity of the dyad's first outer pin less that of the
// second is ω×m, their acceleration α×m − ω²m seen from the frame and α×m + ω²m
// seen from the driven link, whose own ω and α are added in the end.
func (k *drive) move(t *dyad.Triangle, r, q, driven *dyad.Link, side float64) bool {
	arm := r2.Vec{X: k.arm * driven.Axis.X, Y: k.arm * driven.Axis.Y}
	w, al := driven.Omega, driven.Alpha
	m, w2 := arm, -w*w
	if k.long {
		m, w2 = r2.Vec{X: k.base}, -w2
	}
	ok := k.dyad.Move(t, r, q,
		r2.Vec{X: k.base - arm.X, Y: -arm.Y},
		r2.Vec{X: -w * m.Y, Y: w * m.X},
		r2.Vec{X: w2*m.X - al*m.Y, Y: w2*m.Y + al*m.X}, side)
	if k.long {
		r.Omega, r.Alpha = r.Omega+w, r.Alpha+al
		q.Omega, q.Alpha = q.Omega+w, q.Alpha+al
	}
	return ok
}

// solve solves the dyad of a driven link at rest or in motion, and says why where
// there is no answer. It gives the sine of the angle between the dyad's links.
func (l *Linkage) solve(k *drive, t *dyad.Triangle, r, q, driven *dyad.Link, side float64) (margin float64, err error) {
	d := k.span(driven.Axis)
	moves := driven.Omega != 0 || driven.Alpha != 0
	if ok := moves && k.move(t, r, q, driven, side) || k.dyad.Place(t, d, side); ok {
		margin = k.dyad.Margin(t)
	}
	if !(margin > k.near) && !k.inside(d) {
		if err := l.atLimit(k, t, d); err != nil {
			return 0, err
		}
		margin = 0
	}
	if !moves {
		r.Axis, q.Axis = k.dyad.Axes(t)
	} else if margin < rigid.LeastMargin {
		return 0, rigid.ErrSingular
	}
	return margin, nil
}

// inside reports whether d lies within the dyad's reach by more than rounding: an
// angle at a limit comes back with the rounding of what it was found from.
func (k *drive) inside(d r2.Vec) bool {
	x := math.Hypot(d.X, d.Y)
	return (k.dyad.B+k.dyad.C)-x > k.slack && x-math.Abs(k.dyad.B-k.dyad.C) > k.slack
}

// atLimit places the dyad where d is not inside its reach: flat where d is within
// rounding of a limit, else with the reason why not.
func (l *Linkage) atLimit(k *drive, t *dyad.Triangle, d r2.Vec) error {
	switch gap, near := k.dyad.Gap(math.Hypot(d.X, d.Y)), closed*l.longest; {
	case l.longest == 0:
		return rigid.ErrInput
	case math.IsNaN(gap):
		return rigid.ErrNotFinite
	case gap > near:
		return rigid.ErrUnreachable
	case math.Abs(k.dyad.B-k.dyad.C) <= near && math.Hypot(d.X, d.Y) <= near:
		return rigid.ErrSingular // both links may turn about the one point
	}
	k.dyad.Flatten(t, d)
	return nil
}

// closed is the gap, of the longest link, that counts as closed.
const closed = 1e-14
