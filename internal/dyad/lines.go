package dyad

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// A Line is a guide fixed in a body with known motion: G one of its points, with
// velocity V and acceleration A, U the unit vector along it, Omega and Alpha the
// body's rates. E is the distance, left of the guide, at which the pin runs that
// two guides have in common.
type Line struct {
	G, V, A, U      r2.Vec
	Omega, Alpha, E float64
}

// Meeting is the place of the pin that runs along two lines at once: how far along
// each it lies, and Kappa = u1×u2, the sine of the angle between them. It solves
// the PRP dyad (each link on a guide, the pin between them) and, since both
// orientations are known there, the RPP dyad too: its first line goes through the
// outer revolute joint along the prismatic joint between the links and turns with
// the second guide.
type Meeting struct {
	S1, S2, Kappa float64
	u1, u2        r2.Vec
}

// Place solves the place from the closure
//
//	G1 + σ1 u1 + e1 u1⊥ = G2 + σ2 u2 + e2 u2⊥
//
// It reports false where the lines are parallel, and leaves m as it was.
func (m *Meeting) Place(one, two *Line) bool {
	kappa := cross(one.U, two.U)
	r := r2.Vec{
		X: two.G.X - one.G.X - two.E*two.U.Y + one.E*one.U.Y,
		Y: two.G.Y - one.G.Y + two.E*two.U.X - one.E*one.U.X,
	}
	try := Meeting{Kappa: kappa, u1: one.U, u2: two.U}
	try.S1, try.S2 = try.Rates(r)
	if !(math.Abs(try.S1)+math.Abs(try.S2) < math.Inf(1)) { // also 0/0
		return false
	}
	*m = try
	return true
}

// Rates solves σ1' u1 − σ2' u2 = w for the speeds along the lines, w the
// difference of the lines' Drift, two less one, or for their derivatives, w that of
// the lines' Bias:
//
//	σ1' = w×u2/κ,  σ2' = w×u1/κ
func (m *Meeting) Rates(w r2.Vec) (s1, s2 float64) {
	return cross(w, m.u2) / m.Kappa, cross(w, m.u1) / m.Kappa
}

// Margin returns |sin| of the angle between the lines.
func (m *Meeting) Margin() float64 { return math.Abs(m.Kappa) }

// Drift returns the velocity of the line's body where the pin is, s along the line:
//
//	V + ω(s u⊥ − e u)
func (l *Line) Drift(s float64) r2.Vec {
	w, u := l.Omega, l.U
	return r2.Vec{X: l.V.X - w*(s*u.Y+l.E*u.X), Y: l.V.Y + w*(s*u.X-l.E*u.Y)}
}

// Bias returns the pin's acceleration but for the second derivative of s along the line, where it
// moves along the line at the speed v:
//
//	A + α(s u⊥ − e u) − ω²(s u + e u⊥) + 2ωv u⊥
func (l *Line) Bias(s, v float64) r2.Vec {
	u, w2 := l.U, l.Omega*l.Omega
	along := -l.Alpha*l.E - w2*s
	left := l.Alpha*s - w2*l.E + 2*l.Omega*v
	return r2.Vec{X: l.A.X + along*u.X - left*u.Y, Y: l.A.Y + along*u.Y + left*u.X}
}

// cross returns a×b, exactly 0 for a = b: the products are rounded before they are
// subtracted, on every processor.
func cross(a, b r2.Vec) float64 { return float64(a.X*b.Y) - float64(a.Y*b.X) }
