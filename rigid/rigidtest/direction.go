package rigidtest

import (
	"math"
	"reflect"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A direction is what a Diff shows instead of the two components of a unit
// vector: they would both be off where the one angle is.
type direction struct {
	Angle  radians
	Length norm
}

type (
	radians float64
	norm    float64
)

// isAxis reports whether a path ends in the axis of a pose.
func isAxis(p cmp.Path) bool {
	owner, name := vectorField(p)
	return owner == reflect.TypeFor[rigid.Pose]() && name == "Axis"
}

// isHeading reports whether a path ends in a unit vector of a rigid.Path.
func isHeading(p cmp.Path) bool {
	owner, name := vectorField(p)
	return owner == reflect.TypeFor[rigid.Path]() && (name == "Tangent" || name == "Normal")
}

// vectorField returns the field in which a path ends, if it is a vector.
func vectorField(p cmp.Path) (owner reflect.Type, name string) {
	if len(p) == 0 || p.Last().Type() != vector {
		return nil, ""
	}
	owner, name, _ = field(p, len(p)-1)
	return owner, name
}

// axis is the direction of a pose's axis: a zero one reads as (1, 0).
func axis(u r2.Vec) direction {
	if u == (r2.Vec{}) {
		u.X = 1
	}
	return heading(u)
}

// heading is the direction of a vector; of one that is not finite NaN.
func heading(u r2.Vec) direction {
	h := math.Hypot(u.X, u.Y)
	return direction{Angle: radians(math.Atan2(u.Y, u.X) + 0*h), Length: norm(h)}
}
