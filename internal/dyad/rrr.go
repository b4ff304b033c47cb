package dyad

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// RRR holds the constants of two links of lengths B = |AB| and C = |CB| between
// revolute joints.
type RRR struct {
	B, C float64
	g    float64 // 2bc
	n    float64 // b² + c²
	m    float64 // (b − c)(b + c)
	s    float64 // (b + c)²
	e    float64 // (b − c)²
}

// NewRRR returns the constants of links of lengths b and c, both positive.
func NewRRR(b, c float64) RRR {
	return RRR{B: b, C: c, g: 2 * b * c, n: b*b + c*c, m: (b - c) * (b + c), s: (b + c) * (b + c), e: (b - c) * (b - c)}
}

// Triangle is the place of an RRR dyad: the vectors R = AB and Q = CB, and F =
// 2 R×Q, four times the area, positive where B lies left of the line A→C.
type Triangle struct {
	R, Q r2.Vec
	F    float64
}

// Area16 returns 16 times the square of the triangle's area for |AC|² = d2, in the
// form that has the least rounding error there: the law of cosines where the angle
// at B is between 60° and 120°, Heron's formula elsewhere. It is negative out of reach.
func (k *RRR) Area16(d2 float64) float64 {
	x := d2 - k.n
	if math.Abs(x) <= k.g/2 {
		return (k.g - x) * (k.g + x)
	}
	return (k.s - d2) * (d2 - k.e)
}

// Place solves the place of the dyad for d = C − A on the given side, +1 for B
// left of the line A→C and −1 for right. It reports false out of reach and leaves
// t as it was; at a limit F is 0 and there are no rates.
func (k *RRR) Place(t *Triangle, d r2.Vec, side float64) bool {
	d2 := d.X*d.X + d.Y*d.Y
	p := k.Area16(d2)
	if !(p >= 0) || d2 == 0 {
		return false
	}
	f := side * math.Sqrt(p)
	i := 0.5 / d2
	u, v, h := (d2+k.m)*i, (k.m-d2)*i, f*i
	t.R = r2.Vec{X: u*d.X - h*d.Y, Y: u*d.Y + h*d.X}
	t.Q = r2.Vec{X: v*d.X - h*d.Y, Y: v*d.Y + h*d.X} // not R − d, which cancels
	t.F = f
	return true
}

// Axes returns the unit vectors along AB and CB.
func (k *RRR) Axes(t *Triangle) (ab, cb r2.Vec) {
	return unit(r2.Scale(1/k.B, t.R)), unit(r2.Scale(1/k.C, t.Q))
}

// Rates returns the two links' first or second derivatives of the angle from the
// closure A + R = C + Q: with w = vA − vC, w + ω1 R⊥ − ω2 Q⊥ = 0, whence
//
//	ω1 = −w·Q/(R×Q),  ω2 = −w·R/(R×Q),  R×Q = F/2
//
// and for the accelerations the same with w = aA − aC − ω1²R + ω2²Q.
func (t *Triangle) Rates(w r2.Vec) (ab, cb float64) {
	k := -2 / t.F
	return k * (w.X*t.Q.X + w.Y*t.Q.Y), k * (w.X*t.R.X + w.Y*t.R.Y)
}

// Bias returns the w of Rates for the second derivatives, a = aA − aC.
func (t *Triangle) Bias(a r2.Vec, w1, w2 float64) r2.Vec {
	w1, w2 = w1*w1, w2*w2
	return r2.Vec{X: a.X - w1*t.R.X + w2*t.Q.X, Y: a.Y - w1*t.R.Y + w2*t.Q.Y}
}

// Margin returns |sin| of the angle between the links.
func (k *RRR) Margin(t *Triangle) float64 { return math.Abs(t.F) / k.g }

// unit brings a vector within rounding of length 1 nearer to it: 3/2 − n/2 is
// 1/√n to first order about n = 1.
func unit(u r2.Vec) r2.Vec {
	n := 1.5 - 0.5*(u.X*u.X+u.Y*u.Y)
	return r2.Vec{X: n * u.X, Y: n * u.Y}
}
