package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// Solve writes into dst the motion of all links for a motion of the crank, turn in
// rad counter-clockwise from the mechanism's x axis, over any number of turns.
//
// Margin is the absolute cosine of the angle between rod and guide. Errors:
// ErrUnreachable outside Range; ErrSingular for rates where Margin is below
// rigid.LeastMargin; ErrNotFinite; ErrInput for a zero Linkage. Zero Vel and Acc ask
// for the place only. An error leaves dst as it was.
//
// With r the crank, φ its angle, θ the rod's, ξ and η the rod's components, σ the
// slide and e the offset, the closure and its derivatives by φ are
//
//	r·exp(iφ) + (ξ + iη) = σ + ie
//	θ' = −(r/ξ)cos φ,  θ'' = (r sin φ + θ'²η)/ξ
//	σ' = −(r/ξ)κ,      σ'' = −(r/ξ²)[(ξ cos φ + η sin φ)σ + κθ'η]
//
// with κ = ξ sin φ − η cos φ, the cross product of rod and crank over r. The last
// comes from κ' = (ξ cos φ + η sin φ)σ/ξ; the plain one, which sums the normal
// accelerations of crank and rod, cancels where one is folded on the other.
func (l *Linkage) Solve(dst *State, turn rigid.Coordinate) error {
	sin, cos := trig.Sincos(turn.Pos)
	w, al, w2 := turn.Vel, turn.Acc, turn.Vel*turn.Vel
	x, y := l.crank*cos, float64(l.crank*sin) // y not fused with what follows: see outward
	eta := l.guide - y
	p := (l.rod - eta) * (l.rod + eta) // ξ²: of float64 numbers 0 or at least 2⁻⁵² l², with Margin above rigid.LeastMargin
	if !(p > 0 && (w != 0 || al != 0)) {
		return l.park(dst, turn, r2.Vec{X: cos, Y: sin}, eta)
	}
	j, xi := 1/p, l.side*math.Sqrt(p) // the division beside the root
	i, k, pos := xi*j, xi*sin-eta*cos, x+xi
	rod1, slide1 := -x*i, -l.crank*k*i
	rod2 := (y + rod1*rod1*eta) * i
	slide2 := -l.crank * j * ((xi*cos+eta*sin)*pos + k*rod1*eta)
	omega, alpha := rod1*w, rod1*al+rod2*w2
	slide := rigid.Coordinate{Pos: pos, Vel: slide1 * w, Acc: slide1*al + slide2*w2}
	if (l.crank*(w2+math.Abs(al))+alpha+slide.Acc)*0 != 0 {
		return rigid.ErrNotFinite
	}
	dst.Turn, dst.Slide, dst.Margin = turn, slide, math.Abs(xi)*l.perRod
	dst.Branch, dst.Knee = l.given.Branch, rigid.Left
	if k < 0 {
		dst.Knee = rigid.Right
	}
	u := turned(l.axis, r2.Vec{X: cos, Y: sin}) // as in links, without the call
	set(&dst.Crank, l.origin, r2.Vec{}, r2.Vec{}, u, w, al)
	setPinned(&dst.Rod, l.origin, r2.Scale(l.crank, u), w, al, turned(l.rodAxis, r2.Vec{X: xi, Y: eta}), omega, alpha)
	setGuided(&dst.Slider, l.origin, l.axis, l.offset, &slide)
	return nil
}

// park is Solve for what has no rates: a crank at rest along the unit vector crank,
// with a rod that rises by eta, a singular position, and every input that is refused.
func (l *Linkage) park(dst *State, turn rigid.Coordinate, crank r2.Vec, eta float64) error {
	if turn.Pos*0+turn.Vel*0+turn.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	if l.crank == 0 {
		return rigid.ErrInput
	}
	rod, ok := l.byCrank.Place(eta, l.side)
	if !ok {
		if rod, ok = l.square(eta); !ok {
			return rigid.ErrUnreachable
		}
	}
	if turn.Vel != 0 || turn.Acc != 0 {
		return rigid.ErrSingular
	}
	dst.Turn, dst.Slide, dst.Margin = turn, rigid.Coordinate{Pos: l.crank*crank.X + rod.Xi}, math.Abs(rod.Xi)*l.perRod
	dst.Branch, dst.Knee = l.given.Branch, rigid.Left
	if rod.Xi*crank.Y < rod.Eta*crank.X {
		dst.Knee = rigid.Right
	}
	l.links(dst, crank, r2.Vec{X: rod.Xi, Y: rod.Eta}, 0, 0, 0, 0)
	return nil
}

// square returns the rod square to the guide where eta is beyond its length by a
// rounding, and reports whether it is no more than that.
func (l *Linkage) square(eta float64) (dyad.Rod, bool) {
	return dyad.Rod{Eta: math.Copysign(l.rod, eta)}, math.Abs(eta)-l.rod <= beyond*l.size
}
