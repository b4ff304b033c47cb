package rigidtest

import (
	"reflect"
	"slices"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A kind is the unit of a number: metres or radians.
type kind int

const (
	other kind = iota // not ours
	length
	angle
)

// A measure is the tolerance that holds for a number.
type measure int

const (
	pos measure = iota
	vel
	acc
	ratio   // by Relative alone
	bearing // an angle modulo a revolution
)

var (
	float  = reflect.TypeFor[float64]()
	vector = reflect.TypeFor[r2.Vec]()
	home   = reflect.TypeFor[rigid.Motion]().PkgPath()
)

// byType are the measures that a field's type decides, whatever its own name:
// those of the numbers of this struct, or of its vectors.
var byType = map[reflect.Type]measure{
	reflect.TypeFor[rigid.VelocityTerms]():     vel,
	reflect.TypeFor[rigid.AccelerationTerms](): acc,
}

// byName are the measures that a field's name decides.
var byName = map[string]measure{
	"Vel": vel, "First": vel, "Omega": vel, "Speed": vel,
	"Acc": acc, "Second": acc, "Alpha": acc, "SpeedRate": acc,
	"Margin": ratio, "Curvature": ratio, "Angle": bearing,
}

// lengths are the names of plain numbers that Lengths compares in any struct.
var lengths = []string{"Slide", "Arc", "Travel", "Margin"}

// inherits are the structs whose numbers are lengths or angles by the field that
// the struct stands in.
var inherits = []reflect.Type{
	reflect.TypeFor[rigid.Coordinate](),
	reflect.TypeFor[rigid.Coefficients](),
	reflect.TypeFor[rigid.Interval](),
}

// leaf tells what kind of number a path ends in, if it is one of ours, and by
// which tolerance it is compared.
func leaf(p cmp.Path, angles []string) (kind, measure) {
	if len(p) == 0 || p.Last().Type() != float {
		return other, pos
	}
	owner, name, at := field(p, len(p)-1)
	switch {
	case owner == vector:
		return vectorLeaf(p, at)
	case slices.Contains(inherits, owner):
		_, outer, _ := field(p, at-1)
		if slices.Contains(angles, outer) {
			return angle, byName[name]
		}
		return length, byName[name]
	case slices.Contains(angles, name) || name == "Transmission":
		return angle, pos
	case slices.Contains(lengths, name):
		return length, byName[name]
	case owner == nil || owner.PkgPath() != home:
		return other, pos
	case name == "Omega" || name == "Alpha" || name == "Angle":
		return angle, byName[name]
	}
	return length, byName[name]
}

// vectorLeaf tells the same of a component of the vector whose component stands
// at step at.
func vectorLeaf(p cmp.Path, at int) (kind, measure) {
	if isAxis(p[:at]) || isHeading(p[:at]) {
		return other, pos // Angles compares the vector as a whole
	}
	owner, name, _ := field(p, at-1)
	if m, ok := byType[owner]; ok {
		return length, m
	}
	return length, byName[name]
}

// field returns the nearest name at or before step i of a path: of a struct's
// field, with the struct's type, or a string key of a map, with none; and its step.
func field(p cmp.Path, i int) (owner reflect.Type, name string, at int) {
	for ; i > 0; i-- { // step 0 is the root, which has no name
		switch s := p[i].(type) {
		case cmp.StructField:
			return p[i-1].Type(), s.Name(), i
		case cmp.MapIndex:
			if s.Key().Kind() == reflect.String {
				return nil, s.Key().String(), i
			}
		}
	}
	return nil, "", -1
}
