package rolling

import (
	"errors"
	"fmt"
	"math"

	"example.com/twopoint/rigid"
)

// Lengths that the library takes, in m. Between them no product of four lengths
// overflows or underflows.
const (
	leastLength    = 1e-60
	greatestLength = 1e60
)

// equal is how far two lengths may differ, relative to the greater, and still be
// one: lengths come as decimals.
const equal = 4 * 0x1p-52

// agree is how far redundant dimensions may differ, relative to the greater.
const agree = 1e-9

// errFills is the cause for a wheel inside a circle of its own radius.
var errFills = fmt.Errorf("%w: the wheel fills the circle it runs in", rigid.ErrSingular)

// errAgree is the cause for redundant dimensions that contradict each other.
var errAgree = fmt.Errorf("%w: it contradicts the other dimensions", rigid.ErrInput)

// A report collects the errors of a constructor.
type report struct{ errs []error }

// add adds a *rigid.DimensionError, unless cause is nil.
func (r *report) add(name string, value float64, cause error) {
	if cause != nil {
		r.errs = append(r.errs, &rigid.DimensionError{Name: name, Value: value, Err: cause})
	}
}

// lengthError returns the cause for which x is refused as a length, or nil.
func lengthError(x float64) error {
	switch {
	case !finite(x):
		return rigid.ErrNotFinite
	case x <= 0:
		return rigid.ErrNotPositive
	case x < leastLength || x > greatestLength:
		return rigid.ErrInput
	}
	return nil
}

// teeth adds an error for a number of teeth below one.
func (r *report) teeth(name string, z int) {
	if z < 1 {
		r.add(name, float64(z), rigid.ErrNotPositive)
	}
}

// finite adds an error unless x is finite.
func (r *report) finite(name string, x float64) {
	if !finite(x) {
		r.add(name, x, rigid.ErrNotFinite)
	}
}

// mount adds an error for every number of p that is not finite.
func (r *report) mount(p rigid.Placement) {
	for _, f := range [...]struct {
		name  string
		value float64
	}{{"Mount.X", p.X}, {"Mount.Y", p.Y}, {"Mount.Angle", p.Angle}} {
		r.finite(f.name, f.value)
	}
}

// agrees adds an error unless x is want to within 1e-9.
func (r *report) agrees(name string, x, want float64) {
	if math.Abs(x-want) > agree*max(math.Abs(x), math.Abs(want)) {
		r.add(name, x, errAgree)
	}
}

// ok reports whether there is no error so far.
func (r *report) ok() bool { return len(r.errs) == 0 }

// err returns the errors joined.
func (r *report) err() error { return errors.Join(r.errs...) }

// same reports whether two lengths are one but for the rounding of decimals.
func same(a, b float64) bool { return math.Abs(a-b) <= equal*max(math.Abs(a), math.Abs(b)) }

// finite reports whether every number is neither NaN nor infinite: x·0 is 0 for
// a finite x and NaN for any other.
func finite(x ...float64) bool {
	s := 0.0
	for _, v := range x {
		s += v * 0
	}
	return s == 0
}
