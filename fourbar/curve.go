package fourbar

import (
	"iter"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A CurvePoint is one point of a coupler curve.
type CurvePoint struct {
	Turn  float64     // of the crank, in rad
	Point rigid.Point // for a crank that turns at 1 rad/s: derivatives by Turn
	Path  rigid.Path  // tangent and curvature of the curve; zero at a cusp
	Cusp  bool        // the point is at rest, within rounding: the curve turns back on itself
}

// Curve yields n points of the curve that a coupler point, in m in the coupler,
// traces over an interval of the crank angle, in equal steps with both ends
// exactly. Path.Centre of each gives the centre of curvature. Cusps and double
// points are points like others.
//
// Outside Range it yields the Turn with ErrUnreachable, and at a limit of the crank
// the Turn and the place, Point.Pos, with ErrSingular, and goes on; the way past a
// limit is the other branch. Where n is below 2 or the interval is not finite or
// not in order, it yields one error, ErrInput or ErrNotFinite, and ends.
func (l *Linkage) Curve(coupler r2.Vec, over rigid.Interval, n int) iter.Seq2[CurvePoint, error] {
	return func(yield func(CurvePoint, error) bool) {
		switch {
		case (over.Hi-over.Lo)*0+coupler.X*0+coupler.Y*0 != 0:
			yield(CurvePoint{}, rigid.ErrNotFinite)
			return
		case n < 2 || over.Hi < over.Lo || l.longest == 0:
			yield(CurvePoint{}, rigid.ErrInput)
			return
		}
		for i := range n {
			turn := over.Lo + (over.Hi-over.Lo)*(float64(i)/float64(n-1))
			if i == n-1 {
				turn = over.Hi
			}
			if !yield(l.curvePoint(coupler, turn)) {
				return
			}
		}
	}
}

func (l *Linkage) curvePoint(coupler r2.Vec, turn float64) (CurvePoint, error) {
	var st State
	p := CurvePoint{Turn: turn}
	err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1})
	if err != nil {
		if l.Solve(&st, rigid.Coordinate{Pos: turn}) == nil {
			p.Point = st.Coupler.At(coupler)
		}
		return p, err
	}
	p.Point = st.Coupler.At(coupler)
	// At a cusp the velocity of the crank pin and that about it cancel, but for rounding.
	terms := l.crank + math.Abs(st.Coupler.Omega)*r2.Norm(coupler)
	if r2.Norm(p.Point.Vel) < 16*0x1p-52*terms {
		p.Cusp = true
		return p, nil
	}
	p.Path, err = p.Point.Path()
	return p, err
}
