package rigid

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A Point is the motion of a point in a frame: place in m, velocity in m/s,
// acceleration in m/s². The zero Point rests at the origin.
type Point struct{ Pos, Vel, Acc r2.Vec }

// A Path is the motion of a point along its own path.
type Path struct {
	Speed     float64 // m/s, never negative
	SpeedRate float64 // m/s²: the tangential part of the acceleration
	Curvature float64 // 1/m, positive where the path bends left
	Tangent   r2.Vec  // unit vector along the velocity
	Normal    r2.Vec  // unit vector, left of Tangent
}

// Path returns the motion along the point's path, from
//
//	Acc = SpeedRate·Tangent + Speed²·Curvature·Normal
//
// A point at rest has no tangent: ErrSingular. Where a given number or a result
// is not finite it returns ErrNotFinite.
func (p Point) Path() (Path, error) {
	v := math.Hypot(p.Vel.X, p.Vel.Y)
	if !finite(v, p.Acc.X, p.Acc.Y) {
		return Path{}, ErrNotFinite
	}
	if v == 0 {
		return Path{}, ErrSingular
	}
	t := direction(p.Vel)
	path := Path{
		Speed:     v,
		SpeedRate: r2.Dot(t, p.Acc),
		Curvature: r2.Cross(t, p.Acc) / v / v,
		Tangent:   t,
		Normal:    r2.Vec{X: -t.Y, Y: t.X},
	}
	if !finite(path.SpeedRate, path.Curvature) {
		return Path{}, ErrNotFinite
	}
	return path, nil
}

// Centre returns the centre of curvature, in m, relative to the point:
// Normal/Curvature. Where the path is straight it lies at infinity: ErrNoPole.
// ErrNotFinite where a field is not finite.
func (p Path) Centre() (r2.Vec, error) {
	if !finite(p.Curvature, p.Normal.X, p.Normal.Y) {
		return r2.Vec{}, ErrNotFinite
	}
	c := r2.Vec{X: p.Normal.X / p.Curvature, Y: p.Normal.Y / p.Curvature}
	if !finite(c.X, c.Y) {
		return r2.Vec{}, ErrNoPole
	}
	return c, nil
}

// direction returns the unit vector along v, which is not zero and finite, of
// any magnitude: a v whose length overflows or is subnormal is brought near 1 by a
// power of two first.
func direction(v r2.Vec) r2.Vec {
	h := math.Hypot(v.X, v.Y)
	if !(0x1p-1000 < h && h < 0x1p1000) {
		_, e := math.Frexp(max(math.Abs(v.X), math.Abs(v.Y)))
		v = r2.Vec{X: math.Ldexp(v.X, -e), Y: math.Ldexp(v.Y, -e)}
		h = math.Hypot(v.X, v.Y)
	}
	return unit(r2.Vec{X: v.X / h, Y: v.Y / h})
}
