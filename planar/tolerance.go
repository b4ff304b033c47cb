package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// WorstCase returns how far the position, velocity and acceleration of a point may be
// off at most, along the frame's x and y, when every dimension is off by its
// tolerance in the worst way: to first order
//
//	Σ |sensitivity| × tolerance
//
// by are the derivatives from State.Sensitivity; tolerances are ± so many m or rad,
// one a dimension. A wrong number of them, or one below zero, is an error that wraps
// rigid.ErrInput.
func WorstCase(by []rigid.Point, tolerances []float64) (rigid.Point, error) {
	return band(by, tolerances, func(sum, x float64) float64 { return sum + math.Abs(x) })
}

// RootSumSquare returns how far they are likely to be off, when the dimensions are
// off independently of one another:
//
//	√ Σ (sensitivity × tolerance)²
//
// Tolerances of so many standard deviations give as many. All else is as for
// WorstCase.
func RootSumSquare(by []rigid.Point, tolerances []float64) (rigid.Point, error) {
	return band(by, tolerances, math.Hypot)
}

// band adds up the effects of all dimensions, number by number.
func band(by []rigid.Point, tolerances []float64, add func(sum, x float64) float64) (rigid.Point, error) {
	if len(by) != len(tolerances) {
		return rigid.Point{}, fmt.Errorf("%w: %d tolerances for %d dimensions", rigid.ErrInput, len(tolerances), len(by))
	}
	var sum rigid.Point
	for i, p := range by {
		t := tolerances[i]
		if t < 0 {
			return rigid.Point{}, fmt.Errorf("%w: tolerance %d is %g", rigid.ErrInput, i, t)
		}
		all := func(s, v r2.Vec) r2.Vec { return r2.Vec{X: add(s.X, t*v.X), Y: add(s.Y, t*v.Y)} }
		sum = rigid.Point{Pos: all(sum.Pos, p.Pos), Vel: all(sum.Vel, p.Vel), Acc: all(sum.Acc, p.Acc)}
	}
	if !numeric(sum.Pos, sum.Vel, sum.Acc) {
		return rigid.Point{}, rigid.ErrNotFinite
	}
	return sum, nil
}
