package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// SolveSwing writes into dst the motion of all links for a motion of the lever,
// swing in rad as in LeverState. Of the two places where the crank pin can lie in
// the slot, knee picks one by the side of the perpendicular dropped from the crank
// pivot on the slot, taken in the direction of the lever's y axis: Left is nearer
// to the lever pivot, Right is farther. A turning lever has Right alone; of a
// swinging one the crank is on Left for the quick stroke and on Right for the slow
// one, and changes over at the dead centres, where the lever cannot drive it.
//
// Turn.Pos is in (−π, π]; Margin is |sin| of the angle between the crank and the
// slot's normal, 0 at the dead centres. Errors: ErrUnreachable where the slot is farther from the
// crank pivot than the crank reaches, or the pin would lie behind the lever pivot;
// ErrSingular for rates where Margin is below rigid.LeastMargin; ErrNotFinite;
// ErrInput for a zero SlottedLever or an unknown knee. An error leaves dst as it was.
func (l *SlottedLever) SolveSwing(dst *LeverState, swing rigid.Coordinate, knee rigid.Side) error {
	var m slotMotion
	if err := l.form.solveSwing(&m, swing, knee); err != nil {
		return err
	}
	l.form.write(&dst.Crank, &dst.Block, &dst.Lever, &m)
	dst.Turn, dst.Swing, dst.Slide = m.turn, m.swing, m.slide
	dst.Slot, dst.Knee, dst.Margin = l.given.Slot, knee, m.margin
	return nil
}

// solveSwing finds the motion for a motion of the line. With h the distance of the
// line from the crank pivot, to its left, and ξ the pin's place along the line from
// the foot of the perpendicular, the pin is at (x, y) = (ξ + ih)·exp(iψ) and
//
//	h = e + c sin ψ,  ξ² = r² − h²,  σ = c cos ψ + ξ,  φ = ψ + atan2(h, ξ)
//
// whence, the derivatives by ψ, with h' = c cos ψ and ξξ' = −hh',
//
//	φ' = σ/ξ        φ'' = −(c/ξ³)(ξy − hσ cos ψ)
//	σ' = −cy/ξ      σ'' = −(c/ξ³)(r²σ cos ψ − hξy)
//
// with c cos ψ = σ − ξ put in, so that where the pin is near to the line's pivot
// and σ and y are small there is no small difference of large terms.
func (k *slotForm) solveSwing(m *slotMotion, swing rigid.Coordinate, knee rigid.Side) error {
	if swing.Pos*0+swing.Vel*0+swing.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	if k.r == 0 || knee != rigid.Left && knee != rigid.Right {
		return rigid.ErrInput
	}
	sin, cos := math.Sincos(swing.Pos)
	h := k.e + k.c*sin
	xi, ok := leg(k.r, h, k.size)
	xi = settle(xi, k.r, math.Abs(k.e)+math.Abs(k.c*sin))
	if knee == rigid.Left {
		xi = -xi
	}
	sigma := k.c*cos + xi
	if sigma < 0 { // the end of Range: there ξ = −c cos ψ
		ok = ok && sigma >= -k.rounding(swing.Pos, sin, xi, h)
		xi, sigma = max(-k.r, min(k.r, -k.c*cos)), 0
	}
	if !ok {
		return rigid.ErrUnreachable
	}
	x, y := xi*cos-h*sin, xi*sin+h*cos
	m.margin = math.Abs(xi) / k.r
	m.swing = swing
	m.turn = rigid.Coordinate{Pos: rigid.Wrap(math.Atan2(y, x))}
	m.slide = rigid.Coordinate{Pos: sigma}
	u := k.mount.Axis
	m.crank = turned(u, r2.Vec{X: x / k.r, Y: y / k.r})
	m.line = turned(u, r2.Vec{X: cos, Y: sin})
	w, al := swing.Vel, swing.Acc
	if w == 0 && al == 0 {
		return nil
	}
	if m.margin < rigid.LeastMargin {
		return rigid.ErrSingular
	}
	i, w2 := 1/xi, w*w
	ci := k.c * i
	turn1, turn2 := sigma*i, -ci*(y-h*sigma*i*cos)*i
	slide1, slide2 := -ci*y, -ci*(k.r*i*k.r*i*sigma*cos-h*i*y)
	m.turn.Vel, m.turn.Acc = turn1*w, turn1*al+turn2*w2
	m.slide.Vel, m.slide.Acc = slide1*w, slide1*al+slide2*w2
	return m.finite(k.r)
}

// rounding returns how far σ may lie below 0 and still count as 0: what it is off by for
// twice the rounding of ψ and of the terms of h, since dσ/dψ = −cy/ξ and dξ/dh = −h/ξ, and
// a little more. Where the pin comes near to the line's pivot ξ is small at σ = 0.
func (k *slotForm) rounding(psi, sin, xi, h float64) float64 {
	terms := math.Abs(k.e) + math.Abs(k.c*sin)
	xi = max(math.Abs(xi), math.Sqrt(2*k.r*equal*terms)) // below that it is settled
	return beyond*k.size + 2*equal*(k.c*k.r*math.Abs(psi)+2*math.Abs(h)*terms)/xi
}

// leg returns the other leg of a right-angled triangle with the given hypotenuse,
// positive, and whether there is one; what is beyond by a rounding counts as none
// left.
func leg(hypotenuse, one, size float64) (float64, bool) {
	one = math.Abs(one)
	if d := hypotenuse - one; d > 0 {
		return math.Sqrt(d * (hypotenuse + one)), true
	} else if d >= -beyond*size {
		return 0, true
	}
	return 0, false
}

// settle returns the leg xi of a triangle, or 0 where it is no more than what is
// left of the rounding of a position at the limit: where the other leg is a sum
// of terms of the given size, so that ξ² is off by 2·hypotenuse·ε·size.
func settle(xi, hypotenuse, size float64) float64 {
	if xi*xi <= 2*hypotenuse*equal*size {
		return 0
	}
	return xi
}

// turned returns v turned by the angle of the unit vector u.
func turned(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X - u.Y*v.Y, Y: u.X*v.Y + u.Y*v.X}
}
