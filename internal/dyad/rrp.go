package dyad

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// RRP holds the constants of a rod from a revolute joint A to a pin B that runs
// on a guide. Vectors are taken in the guide's own axes, x along it and y to its
// left: see Line.Axes.
type RRP struct {
	L     float64 // length of the rod
	Grow  float64 // L'/L, of a rod whose length changes
	Grow2 float64 // L"/L
}

// Rod is the place of an RRP dyad: AB = (Xi, Eta) in the guide's axes.
type Rod struct{ Xi, Eta float64 }

// Place solves the place of the dyad for a pin that runs at the distance eta to
// the left of A on the given side, +1 for B ahead of A along the guide and −1 for
// behind:
//
//	ξ² = (L − η)(L + η)
//
// It reports false out of reach; at that limit Xi is 0 and there are no rates.
func (k *RRP) Place(eta, side float64) (t Rod, ok bool) {
	p := (k.L - eta) * (k.L + eta)
	return Rod{side * math.Sqrt(p), eta}, p >= 0
}

// PlaceOn solves the place of the dyad for A at a and the pin on the guide g, and
// returns how far along the guide from G the pin lies:
//
//	G + σ U + e U⊥ = a + ξ U + η U⊥
func (k *RRP) PlaceOn(a r2.Vec, g *Line, side float64) (t Rod, s float64, ok bool) {
	d := g.Axes(r2.Vec{X: a.X - g.G.X, Y: a.Y - g.G.Y})
	t, ok = k.Place(g.E-d.Y, side)
	return t, d.X + t.Xi, ok
}

// Rates returns the rod's angular velocity and the pin's speed along the guide,
// or their derivatives, from w = ω(η, −ξ) + (σ', 0), whence
//
//	ω = −w.Y/ξ,  σ' = w.X − ωη
//
// For the first derivatives w is the Drift of v = vA less the guide's Drift, for
// the second the Bias of a = aA less the guide's Bias.
func (t Rod) Rates(w r2.Vec) (omega, slide float64) {
	omega = -w.Y / t.Xi
	return omega, w.X - omega*t.Eta
}

// Drift returns the w of Rates for the first derivatives; for a rod of fixed
// length it is v:
//
//	v + (L'/L) r
func (k *RRP) Drift(t Rod, v r2.Vec) r2.Vec {
	return r2.Vec{X: v.X + k.Grow*t.Xi, Y: v.Y + k.Grow*t.Eta}
}

// Bias returns the w of Rates for the second derivatives:
//
//	a + (L"/L − ω²) r + 2(L'/L) ω r⊥
func (k *RRP) Bias(t Rod, a r2.Vec, omega float64) r2.Vec {
	along, left := k.Grow2-omega*omega, 2*k.Grow*omega
	return r2.Vec{X: a.X + along*t.Xi - left*t.Eta, Y: a.Y + along*t.Eta + left*t.Xi}
}

// Axis returns the unit vector along the rod for a guide along u.
func (k *RRP) Axis(t Rod, u r2.Vec) r2.Vec {
	c, s := t.Xi/k.L, t.Eta/k.L
	return unit(r2.Vec{X: u.X*c - u.Y*s, Y: u.Y*c + u.X*s})
}

// Margin returns |sin| of the angle between the rod and the guide's normal.
func (k *RRP) Margin(t Rod) float64 { return math.Abs(t.Xi) / k.L }

// Axes returns v in the axes of the line, x along it and y to its left.
func (l *Line) Axes(v r2.Vec) r2.Vec {
	return r2.Vec{X: v.X*l.U.X + v.Y*l.U.Y, Y: v.Y*l.U.X - v.X*l.U.Y}
}
