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
	w, al, w2 := turn.Vel, turn.Acc, turn.Vel*turn.Vel
	if turn.Pos*0+w*0+al*0 != 0 {
		return rigid.ErrNotFinite
	}
	if l.crank == 0 {
		return rigid.ErrInput
	}
	sin, cos := trig.Sincos(turn.Pos)
	x, y := l.crank*cos, float64(l.crank*sin) // y not fused with what follows: see outward
	rod, ok := l.byCrank.Place(l.guide-y, l.side)
	if !ok {
		if rod, ok = l.square(l.guide - y); !ok {
			return rigid.ErrUnreachable
		}
	}
	k := rod.Xi*sin - rod.Eta*cos
	slide, margin, omega, alpha := rigid.Coordinate{Pos: x + rod.Xi}, l.byCrank.Margin(rod), 0.0, 0.0
	if w != 0 || al != 0 {
		if margin < rigid.LeastMargin {
			return rigid.ErrSingular
		}
		i := 1 / rod.Xi
		rod1, slide1 := -x*i, -l.crank*k*i
		rod2 := (y + rod1*rod1*rod.Eta) * i
		slide2 := -l.crank * i * i * ((rod.Xi*cos+rod.Eta*sin)*slide.Pos + k*rod1*rod.Eta)
		omega, slide.Vel = rod1*w, slide1*w
		alpha, slide.Acc = rod1*al+rod2*w2, slide1*al+slide2*w2
		if (l.crank*(w2+math.Abs(al))+alpha+slide.Acc)*0 != 0 {
			return rigid.ErrNotFinite
		}
	}
	dst.Turn, dst.Slide, dst.Margin = turn, slide, margin
	dst.Branch, dst.Knee = l.given.Branch, rigid.Left
	if k < 0 {
		dst.Knee = rigid.Right
	}
	u := turned(l.axis, r2.Vec{X: cos, Y: sin}) // as in links, without the call
	set(&dst.Crank, l.origin, r2.Vec{}, r2.Vec{}, u, w, al)
	setPinned(&dst.Rod, l.origin, r2.Scale(l.crank, u), w, al, turned(l.rodAxis, r2.Vec{X: rod.Xi, Y: rod.Eta}), omega, alpha)
	setGuided(&dst.Slider, l.origin, l.axis, l.offset, &slide)
	return nil
}

// square returns the rod square to the guide where eta is beyond its length by a
// rounding, and reports whether it is no more than that.
func (l *Linkage) square(eta float64) (dyad.Rod, bool) {
	return dyad.Rod{Eta: math.Copysign(l.rod, eta)}, math.Abs(eta)-l.rod <= beyond*l.size
}
