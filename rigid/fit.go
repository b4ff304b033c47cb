package rigid

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A Misfit is how far tracked points are from a rigid motion, root mean square of
// the distances: in m, m/s and m/s².
type Misfit struct{ Pos, Vel, Acc float64 }

// Fit returns the motion of the body that fits tracked points best, and how far
// from it they are. The places of the points in the body, in m in its axes, are
// locals; their motions in the frame are points, in the same order. The pose makes
// the sum of the squared distances least, then Omega and Vel that of the
// velocities, then Alpha and Acc that of the accelerations. Points without
// velocity and acceleration, left zero, give the pose of a body at rest.
//
// With x and y the arms of a point from the centroids, in the body and in the
// frame, as complex numbers, and u the unit vector of the axis,
//
//	Σ|y − u·x|² is least where Re(u·Σ x·conj(y)) is greatest: u along Σ conj(x)·y
//	ω = Σ q×v/Σ q·q,  α = Σ q×a/Σ q·q   with q = u·x, v and a less their means
//
// the plane case of the orthogonal Procrustes problem (P. H. Schönemann, A
// generalized solution of the orthogonal Procrustes problem, Psychometrika 31,
// 1966; from memory). Far from the origin no digits are lost, since only arms
// enter. The body is never mirrored to fit.
//
// ErrInput for fewer than two points or lists of two lengths. ErrSingular where
// the points determine no direction: all locals or all points in one place (within
// 1e-150 m), or |Σ conj(x)·y| below LeastMargin of √(Σ|x|²·Σ|y|²), where it is 1
// for a rigid body. ErrNotFinite where a number, a result or a square on the way to it
// is not finite.
func Fit(locals []r2.Vec, points []Point) (Motion, Misfit, error) {
	if len(locals) != len(points) || len(locals) < 2 {
		return Motion{}, Misfit{}, ErrInput
	}
	t := tracked{locals: locals, points: points}
	if !t.finite() {
		return Motion{}, Misfit{}, ErrNotFinite
	}
	t.centre()
	if err := t.pose(); err != nil {
		return Motion{}, Misfit{}, err
	}
	t.rates()
	m, miss := t.motion(), t.misfit()
	if !m.finite() || !finite(miss.Pos, miss.Vel, miss.Acc) {
		return Motion{}, Misfit{}, ErrNotFinite
	}
	return m, miss, nil
}

// tracked is a fit on its way.
type tracked struct {
	locals       []r2.Vec
	points       []Point
	local        r2.Vec // centroid in the body
	centroid     Point  // its motion in the frame
	axis         r2.Vec
	size         float64 // Σ|x|²
	omega, alpha float64
}

func (t *tracked) finite() bool {
	for i, l := range t.locals {
		p := &t.points[i]
		if !finite(l.X, l.Y, p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y) {
			return false
		}
	}
	return true
}

// centre finds the centroids. A mean is taken of the differences from the first,
// so that equal vectors have exactly their value for a mean.
func (t *tracked) centre() {
	l0, p0 := t.locals[0], t.points[0]
	var l r2.Vec
	var p Point
	for i := range t.locals {
		l = r2.Add(l, r2.Sub(t.locals[i], l0))
		p.Pos = r2.Add(p.Pos, r2.Sub(t.points[i].Pos, p0.Pos))
		p.Vel = r2.Add(p.Vel, r2.Sub(t.points[i].Vel, p0.Vel))
		p.Acc = r2.Add(p.Acc, r2.Sub(t.points[i].Acc, p0.Acc))
	}
	k := 1 / float64(len(t.locals))
	t.local = r2.Add(l0, r2.Scale(k, l))
	t.centroid = Point{
		Pos: r2.Add(p0.Pos, r2.Scale(k, p.Pos)),
		Vel: r2.Add(p0.Vel, r2.Scale(k, p.Vel)),
		Acc: r2.Add(p0.Acc, r2.Scale(k, p.Acc)),
	}
}

// arm returns point i less the centroid: its place in the body, its motion in the frame.
func (t *tracked) arm(i int) (x r2.Vec, y Point) {
	p, c := &t.points[i], &t.centroid
	return r2.Sub(t.locals[i], t.local),
		Point{Pos: r2.Sub(p.Pos, c.Pos), Vel: r2.Sub(p.Vel, c.Vel), Acc: r2.Sub(p.Acc, c.Acc)}
}

// pose finds the axis.
func (t *tracked) pose() error {
	var sum r2.Vec
	var size float64
	for i := range t.locals {
		x, y := t.arm(i)
		sum = r2.Add(sum, back(x, y.Pos))
		t.size += r2.Norm2(x)
		size += r2.Norm2(y.Pos)
	}
	if !finite(t.size, size, sum.X, sum.Y) {
		return ErrNotFinite
	}
	const least = 1e-300 // below it a square loses digits
	h := math.Hypot(sum.X, sum.Y)
	if min(t.size, size) < least || h < LeastMargin*math.Sqrt(t.size)*math.Sqrt(size) {
		return ErrSingular
	}
	t.axis = direction(sum)
	return nil
}

// rates finds the angular velocity and acceleration. The normal part −ω²q of the
// accelerations points along q, so it adds nothing to q×a.
func (t *tracked) rates() {
	for i := range t.locals {
		x, y := t.arm(i)
		q := turn(t.axis, x)
		t.omega += r2.Cross(q, y.Vel) / t.size
		t.alpha += r2.Cross(q, y.Acc) / t.size
	}
}

// motion returns the motion of the body's origin, seen from the centroid: that
// one moves as the mean does, since the arms q sum to nothing.
func (t *tracked) motion() Motion {
	c := Motion{
		Pose: Pose{Origin: t.centroid.Pos, Axis: t.axis},
		Vel:  t.centroid.Vel, Acc: t.centroid.Acc,
		Omega: t.omega, Alpha: t.alpha,
	}
	o := c.At(r2.Scale(-1, t.local))
	c.Pose.Origin, c.Vel, c.Acc = o.Pos, o.Vel, o.Acc
	return c
}

// misfit takes the residuals between arms, where nothing cancels.
func (t *tracked) misfit() Misfit {
	var miss Misfit
	for i := range t.locals {
		x, y := t.arm(i)
		q := turn(t.axis, x)
		miss.Pos += r2.Norm2(r2.Sub(y.Pos, q))
		miss.Vel += r2.Norm2(r2.Sub(y.Vel, cross(t.omega, q)))
		miss.Acc += r2.Norm2(r2.Add(r2.Sub(y.Acc, cross(t.alpha, q)), r2.Scale(t.omega*t.omega, q)))
	}
	n := float64(len(t.locals))
	return Misfit{Pos: math.Sqrt(miss.Pos / n), Vel: math.Sqrt(miss.Vel / n), Acc: math.Sqrt(miss.Acc / n)}
}
