package rigid

import "gonum.org/v1/gonum/spatial/r2"

// Guided returns the motion of a body of which one point's motion is known and
// another point is guided along a fixed line: two scalar equations for two
// unknowns, the body's angular velocity and the speed along the line, and again
// for the accelerations.
//
// The known point moves as a. The guided one is at b, in m, and its line runs along
// the direction of along, whose length does not matter. The origin of body is the
// known point, its x axis points to b; slide is the motion of b along the line, with
// Pos 0 at b as given. With r = b − a.Pos, R = |r|, e = r/R, u the unit vector of
// along and n = u⊥, the parts along n and e of
//
//	a.Vel + ω×r = slide.Vel·u,  a.Acc + α×r − ω²r = slide.Acc·u
//
// are one equation each for ω, slide.Vel, α and slide.Acc:
//
//	ω = −a.Vel·n/(R e·u)                 slide.Vel = a.Vel·e/(e·u)
//	α = −(a.Acc·n − ω²R e·n)/(R e·u)     slide.Acc = (a.Acc·e − ω²R)/(e·u)
//
// Zero Vel and Acc of a ask for the place only. |e·u| is the margin: rates asked
// for below LeastMargin, where the line stands square to r, are ErrSingular. So are
// b at the known point and a zero along, always. ErrNotFinite where a number or a
// result is not finite.
func Guided(a Point, b r2.Vec, along r2.Vec) (body Motion, slide Coordinate, err error) {
	r := r2.Sub(b, a.Pos)
	if !finite(r.X, r.Y, a.Vel.X, a.Vel.Y, a.Acc.X, a.Acc.Y, along.X, along.Y) {
		return Motion{}, Coordinate{}, ErrNotFinite
	}
	if r == (r2.Vec{}) || along == (r2.Vec{}) {
		return Motion{}, Coordinate{}, ErrSingular
	}
	e, u := direction(r), direction(along)
	body = Motion{Pose: Pose{Origin: a.Pos, Axis: e}}
	if a.Vel == (r2.Vec{}) && a.Acc == (r2.Vec{}) {
		return body, slide, nil
	}
	margin := r2.Dot(e, u)
	if margin < LeastMargin && margin > -LeastMargin {
		return Motion{}, Coordinate{}, ErrSingular
	}
	// u×x is the part of x along n
	length := r2.Dot(e, r)
	body.Vel, body.Acc = a.Vel, a.Acc
	body.Omega = -r2.Cross(u, a.Vel) / margin / length
	pull := body.Omega * body.Omega * length // ω²R, towards a
	body.Alpha = -(r2.Cross(u, a.Acc) - pull*r2.Cross(u, e)) / margin / length
	slide.Vel = r2.Dot(a.Vel, e) / margin
	slide.Acc = (r2.Dot(a.Acc, e) - pull) / margin
	if !body.finite() || !finite(slide.Vel, slide.Acc) {
		return Motion{}, Coordinate{}, ErrNotFinite
	}
	return body, slide, nil
}
