package slidercrank

import (
	"math"

	"example.com/twopoint/rigid"
)

// legs solves the link of a double slider that is driven by the slide of one end: a
// right-angled triangle of the hypotenuse l, 0 if no constructor made it, one leg η =
// k·slide, the other leg ξ, which knee Left makes negative. It returns ξ and the rates of
// the angle β between ξ and the link:
//
//	η = l sin β,  η' = ξβ',   η'' = ξβ'' − ηβ'²
//	ξ = l cos β,  ξ' = −ηβ',  ξ'' = −ηβ'' − ξβ'²
func legs(l, k float64, slide rigid.Coordinate, knee rigid.Side) (xi, angle rigid.Coordinate, err error) {
	if slide.Pos*0+slide.Vel*0+slide.Acc*0 != 0 {
		return xi, angle, rigid.ErrNotFinite
	}
	if l == 0 || knee != rigid.Left && knee != rigid.Right {
		return xi, angle, rigid.ErrInput
	}
	eta := k * slide.Pos
	x, ok := leg(l, eta, l)
	if !ok {
		return xi, angle, rigid.ErrUnreachable
	}
	if xi.Pos = settle(x, l, l); knee == rigid.Left {
		xi.Pos = -xi.Pos
	}
	if slide.Vel == 0 && slide.Acc == 0 {
		return xi, angle, nil
	}
	if math.Abs(xi.Pos)/l < rigid.LeastMargin {
		return xi, angle, rigid.ErrSingular
	}
	w := k * slide.Vel / xi.Pos
	angle.Vel, angle.Acc = w, (k*slide.Acc+eta*w*w)/xi.Pos
	xi.Vel, xi.Acc = -eta*w, -eta*angle.Acc-xi.Pos*w*w
	return xi, angle, nil
}

// past returns the motion of what is ξ past the foot of a perpendicular that moves by
// k·slide. The angle would give it too, but where the guides are nearly parallel as the
// small difference of large terms.
func past(k float64, slide, xi rigid.Coordinate) rigid.Coordinate {
	return rigid.Coordinate{Pos: k*slide.Pos + xi.Pos, Vel: k*slide.Vel + xi.Vel, Acc: k*slide.Acc + xi.Acc}
}
