package dyad

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// RRR holds the constants of two links of lengths B = |AB| and C = |CB| between
// revolute joints.
type RRR struct {
	B, C   float64
	ib, ic float64 // 1/b, 1/c
	g      float64 // 2bc
	IG     float64 // 1/2bc
	n      float64 // b² + c²
	BB, CC float64 // 2b², 2c²
	Short  float64 // |AC|² below which AC is the shortest side
	m      float64 // (b − c)(b + c)
	s      float64 // (b + c)²
	e      float64 // (b − c)²
	point  float64 // |AC|² below which A and C are one point: then the direction AC is rounding
}

// NewRRR returns the constants of links of lengths b and c, both positive.
func NewRRR(b, c float64) RRR {
	point := 0x1p-50 * (b + c)
	return RRR{
		B: b, C: c, ib: 1 / b, ic: 1 / c,
		g: 2 * b * c, IG: 1 / (2 * b * c), n: b*b + c*c,
		BB: 2 * b * b, CC: 2 * c * c, Short: min(b*b, c*c),
		m: (b - c) * (b + c), s: (b + c) * (b + c), e: (b - c) * (b - c),
		point: point * point,
	}
}

// Triangle is the place of an RRR dyad: the vectors R = AB and Q = CB, X = |AC|² −
// |AB|² − |CB|², which is −2 R·Q, and F = 2 R×Q, four times the area, positive
// where B lies left of the line A→C.
type Triangle struct {
	R, Q r2.Vec
	X, F float64
}

// Place solves the place of the dyad for d = C − A on the given side, +1 for B
// left of the line A→C and −1 for right. It reports false out of reach, where d
// is 0 within rounding or not a number, and leaves t as it was. At a limit F is
// 0, and there are no rates.
func (k *RRR) Place(t *Triangle, d r2.Vec, side float64) bool {
	d2 := d.X*d.X + d.Y*d.Y
	x, u, v, p := k.Sides(d2)
	if !(p >= 0 && d2 > k.point) {
		return false
	}
	k.set(t, d, 0.5/d2, u, v, x, side*math.Sqrt(p))
	return true
}

// Sides returns for d² = |AC|²
//
//	x = d² − b² − c²,  u = d² + b² − c²,  v = b² − c² − d²,  F² = (2bc − x)(2bc + x)
//
// F² is 16 times the square of the area. All are formed from x, so that its rounding
// is to all of them one small change of d. Where d is the shortest side it would be
// a large one: there F² has Heron's factors.
func (k *RRR) Sides(d2 float64) (x, u, v, ff float64) {
	x = d2 - k.n
	if d2 < k.Short {
		return x, d2 + k.m, k.m - d2, (k.s - d2) * (d2 - k.e)
	}
	return x, x + k.BB, -(x + k.CC), (k.g - x) * (k.g + x)
}

// A Link is the direction of a link, with its angular velocity and acceleration.
type Link struct {
	Axis         r2.Vec
	Omega, Alpha float64
}

// Move is Place, Axes, Rates and Bias in one, for inner loops: it solves both links
// for d = C − A, w = vA − vC and z = aA − aC on the given side. It reports false,
// and changes nothing, where Place does. Where the links lie in one line the rates
// are not finite: see Margin.
func (k *RRR) Move(t *Triangle, ab, cb *Link, d, w, z r2.Vec, side float64) bool {
	d2 := d.X*d.X + d.Y*d.Y
	x, u, v, p := k.Sides(d2)
	if !(p >= 0 && d2 > k.point) {
		return false
	}
	f := side * math.Sqrt(p)
	i, c := 0.5/d2, -2/p     // while the root is on its way
	u, v, h := u*i, v*i, f*i // as in set
	hx, hy := h*d.X, h*d.Y
	rx, ry := u*d.X-hy, u*d.Y+hx
	qx, qy := v*d.X-hy, v*d.Y+hx
	t.R, t.Q, t.X, t.F = r2.Vec{X: rx, Y: ry}, r2.Vec{X: qx, Y: qy}, x, f

	c *= f // −2/F
	w1, w2 := c*(w.X*qx+w.Y*qy), c*(w.X*rx+w.Y*ry)
	ab.Omega, cb.Omega = w1, w2
	ww1, ww2 := w1*w1, w2*w2
	z1x, z1y := z.X-ww1*rx+ww2*qx, z.Y-ww1*ry+ww2*qy
	z2x, z2y := z1x, z1y
	if d2 < k.Short { // R may be nearly Q: R = Q + d, ω2 − ω1 = −2 w·d/F
		e := c * (w.X*d.X + w.Y*d.Y) * (w1 + w2) // ω2² − ω1²
		z1x, z1y = z.X-ww1*d.X+e*qx, z.Y-ww1*d.Y+e*qy
		z2x, z2y = z.X-ww2*d.X+e*rx, z.Y-ww2*d.Y+e*ry
	}
	ab.Alpha, cb.Alpha = c*(z1x*qx+z1y*qy), c*(z2x*rx+z2y*ry)
	ab.Axis = unit(r2.Vec{X: k.ib * rx, Y: k.ib * ry})
	cb.Axis = unit(r2.Vec{X: k.ic * qx, Y: k.ic * qy})
	return true
}

// Flatten places the dyad with both links along d = C − A, which is not 0: its
// place at a limit, where rounding has put C a little too far or too near.
func (k *RRR) Flatten(t *Triangle, d r2.Vec) {
	d2 := d.X*d.X + d.Y*d.Y
	u := normal(d)
	t.R = r2.Scale(math.Copysign(k.B, d2+k.m), u)
	t.Q = r2.Scale(math.Copysign(k.C, k.m-d2), u)
	t.X, t.F = math.Copysign(k.g, d2-k.n), 0
}

// set gives t its vectors: with u along d and h the height of B over it,
//
//	R = (d² + b² − c²)/(2d) u + h u⊥,  Q = R − d
//
// where Q is formed as R is, since R − d cancels; i is 1/2d².
func (k *RRR) set(t *Triangle, d r2.Vec, i, u, v, x, f float64) {
	u, v, h := u*i, v*i, f*i
	t.R = r2.Vec{X: u*d.X - h*d.Y, Y: u*d.Y + h*d.X}
	t.Q = r2.Vec{X: v*d.X - h*d.Y, Y: v*d.Y + h*d.X}
	t.X, t.F = x, f
}

// Gap returns how far B would be from closing the dyad for |AC| = d: 0 within
// reach, else the distance between the nearest points of the circles about A and C.
func (k *RRR) Gap(d float64) float64 {
	return max(d-(k.B+k.C), math.Abs(k.B-k.C)-d, 0)
}

// Axes returns the unit vectors along AB and CB.
func (k *RRR) Axes(t *Triangle) (ab, cb r2.Vec) {
	return unit(r2.Scale(k.ib, t.R)), unit(r2.Scale(k.ic, t.Q))
}

// Rates returns the two links' first or second derivatives of the angle from the
// closure A + R = C + Q: with w = vA − vC, w + ω1 R⊥ − ω2 Q⊥ = 0, whence
//
//	ω1 = −w·Q/(R×Q),  ω2 = −w·R/(R×Q),  R×Q = F/2
//
// and for the accelerations the same with the w of Bias.
func (t *Triangle) Rates(w r2.Vec) (ab, cb float64) {
	k := -2 / t.F
	return k * (w.X*t.Q.X + w.Y*t.Q.Y), k * (w.X*t.R.X + w.Y*t.R.Y)
}

// Bias returns the w of Rates for the second derivatives, a = aA − aC:
//
//	a − ω1² R + ω2² Q
func (t *Triangle) Bias(a r2.Vec, w1, w2 float64) r2.Vec {
	w1, w2 = w1*w1, w2*w2
	return r2.Vec{X: a.X - w1*t.R.X + w2*t.Q.X, Y: a.Y - w1*t.R.Y + w2*t.Q.Y}
}

// Growth is how the lengths of the two links change, each derivative divided by
// the length: ḃ/b and b̈/b, ċ/c and c̈/c. Its zero value is two rigid links.
type Growth struct{ BVel, BAcc, CVel, CAcc float64 }

// Vel returns what changing lengths add to the w of Rates for the velocities:
//
//	ḃ/b R − ċ/c Q
func (g *Growth) Vel(t *Triangle) r2.Vec {
	return r2.Vec{X: g.BVel*t.R.X - g.CVel*t.Q.X, Y: g.BVel*t.R.Y - g.CVel*t.Q.Y}
}

// Acc returns what changing lengths add to that for the accelerations:
//
//	b̈/b R − c̈/c Q + 2(ḃ/b) ω1 R⊥ − 2(ċ/c) ω2 Q⊥
func (g *Growth) Acc(t *Triangle, w1, w2 float64) r2.Vec {
	w1, w2 = 2*g.BVel*w1, 2*g.CVel*w2
	return r2.Vec{
		X: g.BAcc*t.R.X - g.CAcc*t.Q.X - w1*t.R.Y + w2*t.Q.Y,
		Y: g.BAcc*t.R.Y - g.CAcc*t.Q.Y + w1*t.R.X - w2*t.Q.X,
	}
}

// Margin returns |sin| of the angle between the links, at most 1.
func (k *RRR) Margin(t *Triangle) float64 {
	m := math.Abs(t.F) * k.IG
	if m > 1 {
		return 1
	}
	return m
}

// Cos returns the cosine of the angle between the links at B.
func (k *RRR) Cos(t *Triangle) float64 { return -t.X * k.IG }

// unit brings a vector near length 1 to it: 3/2 − n/2 is 1/√n to first order about
// n = 1. Only a link shorter than the rounding of the other lengths is farther off.
func unit(u r2.Vec) r2.Vec {
	n := u.X*u.X + u.Y*u.Y
	if math.Abs(n-1) > 1e-8 {
		return normal(u)
	}
	n = 1.5 - 0.5*n
	return r2.Vec{X: n * u.X, Y: n * u.Y}
}

// normal returns the unit vector along u, (1, 0) where u is 0.
func normal(u r2.Vec) r2.Vec {
	h := math.Hypot(u.X, u.Y)
	if h == 0 {
		return r2.Vec{X: 1}
	}
	return r2.Vec{X: u.X / h, Y: u.Y / h}
}
