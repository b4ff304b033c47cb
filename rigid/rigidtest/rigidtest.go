// Package rigidtest compares motions in tests: two options for go-cmp, one for
// what is measured in metres and one for what is measured in radians.
//
//	opts := cmp.Options{
//		rigidtest.Lengths(rigidtest.Tolerance{Pos: 1e-6, Vel: 1e-4, Acc: 1e-2}),
//		rigidtest.Angles(rigidtest.Tolerance{Pos: 1e-5, Vel: 1e-3, Acc: 1e-1}),
//	}
//	if diff := cmp.Diff(want, got, opts); diff != "" {
//		t.Errorf("ram (-want +got):\n%s", diff)
//	}
//
// A State has a Margin, which these two ask to be equal. Leave it out to compare whole
// States of measured motions,
//
//	cmpopts.IgnoreFields(slidercrank.State{}, "Margin")
//
// or give Lengths a Relative, too, which then counts for every length and rate: with
// 1e-3 a place 0.5 m from the origin may be off by 0.5 mm, however small Pos is. A
// Margin belongs to the direction solved: Solve tells of the joint that flattens for a
// driving crank, a solve back of another. So a State and the same position solved back
// differ in Margin by definition: leave it out of a round trip.
//
// They serve every type of this library (motions, points, paths, terms,
// coordinates, coefficients, the states of the mechanisms) and any struct, slice,
// map or pointer that holds them. Given the same list of names the two cover
// disjoint numbers, so that go-cmp finds no ambiguity, and each number is compared
// by itself, so that a Diff names the one that is off. What neither covers, such
// as a branch or a knee, is compared exactly.
//
// What is a length and what an angle is told by type and field name:
//
//	type or field                              option   tolerance
//	r2.Vec in a field Vel                      Lengths  Vel
//	r2.Vec in a field Acc                      Lengths  Acc
//	r2.Vec of VelocityTerms, AccelerationTerms Lengths  Vel, Acc
//	any other r2.Vec but a direction           Lengths  Pos
//	Pose.Axis, Path.Tangent, Path.Normal       Angles   Pos, modulo a revolution
//	Motion.Omega, Motion.Alpha                 Angles   Vel, Acc
//	Coordinate.Pos, Vel, Acc                   by name  Pos, Vel, Acc
//	Coefficients.In, Out, First, Second        by name  Pos, Pos, Vel, Acc
//	Interval.Lo, Hi                            by name  Pos
//	Path.Speed, Path.SpeedRate                 Lengths  Vel, Acc
//	Misfit.Pos, Vel, Acc                       Lengths  Pos, Vel, Acc
//	Placement.Angle                            Angles   Pos, modulo a revolution
//	any other float64 of package rigid         Lengths  Pos
//	float64 in a field in the list             Angles   Pos
//	float64 in a field Transmission            Angles   Pos
//	float64 in a field Slide, Arc, Travel      Lengths  Pos
//	float64 in a field Margin, Path.Curvature  Lengths  Relative
//
// "By name": Angles, where the nearest struct field or string key of a map around
// it is in the list; Lengths elsewhere. Any other float64, such as a dimension
// that must come back as given, is left exact or to the caller's own options.
//
// A Coordinate's angle is not taken modulo a revolution: a turn lost or gained is
// an error of the motion. Where it is not, bring both into one revolution with
// [rigid.Wrap] or [rigid.Nearest] first.
package rigidtest

import (
	"math"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/rigid"
)

// A Tolerance says how far apart two numbers may be and still be equal: Pos, Vel
// and Acc in the unit of the number (m or rad, per s, per s²), Relative as a part
// of the greater of the two absolute values. Whichever allows more holds; both
// ends are included:
//
//	|x − y| ≤ max(Pos, Relative·max(|x|, |y|))
//
// A direction has no size to be a part of, so Relative counts there in rad, and
// its vector must be as near to a unit one as the other's. A
// Margin and a Curvature have no tolerance but Relative·max(1, |x|, |y|). The zero
// Tolerance asks for equal numbers, and math.Inf(1) lets all finite ones pass: so what
// was not measured is left out. NaN equals nothing, an infinity only itself.
type Tolerance struct {
	Pos      float64 `json:"pos"`
	Vel      float64 `json:"vel"`
	Acc      float64 `json:"acc"`
	Relative float64 `json:"relative"`
}

// Lengths returns the option that compares what is measured in metres: points,
// origins, velocities and accelerations of points, every Coordinate and
// Coefficients outside the fields named in angles, and Margins. Without names
// angles is "Turn", "Swing". The package documentation has the whole list.
func Lengths(t Tolerance, angles ...string) cmp.Option {
	return t.numbers(length, angles)
}

// Angles returns the option that compares what is measured in radians:
// directions modulo a revolution, angular velocities and accelerations,
// Transmission, and the Coordinates and Coefficients in the fields named in
// angles. Without names angles is "Turn", "Swing"; a list replaces these. Lengths
// must be given the same list: where the two differ a number is covered twice,
// and go-cmp panics, or not at all.
func Angles(t Tolerance, angles ...string) cmp.Option {
	return append(t.numbers(angle, angles),
		cmp.FilterPath(isAxis, cmp.Transformer("Direction", axis)),
		cmp.FilterPath(isHeading, cmp.Transformer("Direction", heading)),
		cmp.Comparer(func(x, y radians) bool { return t.sameDirection(float64(x), float64(y)) }),
		cmp.Comparer(func(x, y norm) bool { return near(max(t.Pos, t.Relative), 0)(float64(x), float64(y)) }))
}

// numbers returns a comparer for every measure of one kind of quantity.
func (t Tolerance) numbers(of kind, angles []string) cmp.Options {
	if len(angles) == 0 {
		angles = []string{"Turn", "Swing"}
	}
	equal := map[measure]func(x, y float64) bool{
		pos:     near(t.Pos, t.Relative),
		vel:     near(t.Vel, t.Relative),
		acc:     near(t.Acc, t.Relative),
		ratio:   near(t.Relative, t.Relative),
		bearing: t.sameDirection,
	}
	var opts cmp.Options
	for m, eq := range equal {
		filter := func(p cmp.Path) bool { k, got := leaf(p, angles); return k == of && got == m }
		opts = append(opts, cmp.FilterPath(filter, cmp.Comparer(eq)))
	}
	return opts
}

// near returns the comparison with an absolute and a relative tolerance.
func near(absolute, relative float64) func(x, y float64) bool {
	return func(x, y float64) bool {
		if x == y || math.IsInf(x, 0) || math.IsInf(y, 0) {
			return x == y
		}
		return math.Abs(x-y) <= max(absolute, relative*max(math.Abs(x), math.Abs(y)))
	}
}

// sameDirection compares two angles in rad modulo a revolution.
func (t Tolerance) sameDirection(x, y float64) bool {
	return near(max(t.Pos, t.Relative), 0)(rigid.Wrap(x-y), 0)
}
