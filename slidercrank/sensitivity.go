package slidercrank

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// A LengthSensitivity is how an output changes with one length, the motion of the
// crank and all other lengths being what they are.
type LengthSensitivity struct {
	Slide rigid.Coordinate // of the slider: m/m, 1/s, 1/s²
	Point rigid.Point      // of the rod's point, in the frame: m/m, 1/s, 1/s²
}

// A Sensitivity is how the slider and a point of the rod change with each length.
// Times the tolerances of the lengths its absolute values add up to the worst
// case, their squares to the square of the likely error.
type Sensitivity struct{ Crank, Rod, Offset LengthSensitivity }

// Sensitivity writes into dst the derivatives, by each length, of the slider's
// motion and of that of a point of the rod (in m in the rod, whose axes stay at
// its pins), for a motion of the crank in rad, rad/s and rad/s². They are exact:
// the closure equation differentiated by the length, and by time. A greater Offset
// also lifts the slider off the guide's old line, which Slide does not show.
//
// Errors as Solve, and ErrSingular where Margin is below rigid.LeastMargin, also
// for a crank at rest. On an error dst is as it was.
func (l *Linkage) Sensitivity(dst *Sensitivity, turn rigid.Coordinate, rod r2.Vec) error {
	var st State
	if err := l.Solve(&st, turn); err != nil {
		return err
	}
	if st.Margin < rigid.LeastMargin {
		return rigid.ErrSingular
	}
	sin, cos := trig.Sincos(turn.Pos)
	v := variation{omega: st.Rod.Omega, alpha: st.Rod.Alpha}
	v.rod, _ = l.byCrank.Place(l.guide-float64(l.crank*sin), l.side) // as in Solve
	along, u := r2.Vec{X: v.rod.Xi * l.perRod, Y: v.rod.Eta * l.perRod}, r2.Vec{X: cos, Y: sin}
	v.point = turned(along, rod)
	w, al := turn.Vel, turn.Acc
	s := Sensitivity{Crank: v.by(u, w, al), Rod: v.by(along, v.omega, v.alpha), Offset: v.by(r2.Vec{Y: -1}, 0, 0)}
	pin := &s.Crank.Point // moves by u too
	pin.Pos = r2.Add(pin.Pos, u)
	pin.Vel = r2.Add(pin.Vel, turned(u, r2.Vec{Y: w}))
	pin.Acc = r2.Add(pin.Acc, turned(u, r2.Vec{X: -w * w, Y: al}))
	for _, x := range [...]*LengthSensitivity{&s.Crank, &s.Rod, &s.Offset} {
		p := &x.Point
		p.Pos, p.Vel, p.Acc = turned(l.axis, p.Pos), turned(l.axis, p.Vel), turned(l.axis, p.Acc)
		for _, v := range [...]r2.Vec{p.Pos, p.Vel, p.Acc, {X: x.Slide.Vel, Y: x.Slide.Acc}} {
			if v.X*0+v.Y*0 != 0 {
				return rigid.ErrNotFinite
			}
		}
	}
	*dst = s
	return nil
}

// A variation differentiates the closure r·u + ρ − σ − ie = 0 by a length, with ρ along
// the rod at the angle θ, all in the mechanism's own axes.
type variation struct {
	rod          dyad.Rod // ρ
	omega, alpha float64  // of the rod
	point        r2.Vec   // from the crank pin to the rod's point
}

// by returns the derivatives by a length that adds f to the closure, f a unit
// vector that turns with w and al. With ′ for the derivative by the length,
//
//	0 = f + iθ′ρ − σ′
//	0 = iw f + (iω′ − ωθ′)ρ − σ̇′
//	0 = (i·al − w²)f + (i(α′ − ω²θ′) − αθ′ − 2ωω′)ρ − σ̈′
//
// in complex numbers, the second and the third being derivatives by time. The rod's
// point turns about the crank pin as ρ does, so that α′ − ω²θ′ is all that is needed.
func (v *variation) by(f r2.Vec, w, al float64) LengthSensitivity {
	rho := r2.Vec{X: v.rod.Xi, Y: v.rod.Eta}
	var zeroth, first, second r2.Vec // what ρ is turned by
	var by LengthSensitivity
	zeroth.Y, by.Slide.Pos = v.rod.Rates(f)
	first.X = -v.omega * zeroth.Y
	first.Y, by.Slide.Vel = v.rod.Rates(r2.Add(turned(f, r2.Vec{Y: w}), turned(rho, first)))
	second.X = -v.alpha*zeroth.Y - 2*v.omega*first.Y
	second.Y, by.Slide.Acc = v.rod.Rates(r2.Add(turned(f, r2.Vec{X: -w * w, Y: al}), turned(rho, second)))
	by.Point = rigid.Point{Pos: turned(v.point, zeroth), Vel: turned(v.point, first), Acc: turned(v.point, second)}
	return by
}
