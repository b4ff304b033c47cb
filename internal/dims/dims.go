// Package dims is how constructors check their dimensions and report all that are
// wrong at once.
package dims

import (
	"errors"
	"math"

	"example.com/twopoint/rigid"
)

// Lengths that the library takes, in m. Between them no product of four lengths
// overflows or underflows.
const (
	Least    = 1e-60
	Greatest = 1e60
)

// A reason is a cause for which a dimension is refused that says more than the one
// of rigid it stands for.
type reason struct {
	cause error
	text  string
}

func (r *reason) Error() string { return "twopoint: " + r.text }
func (r *reason) Unwrap() error { return r.cause }

// Because returns an error that is the given cause to errors.Is and reads as text.
func Because(cause error, text string) error { return &reason{cause, text} }

var (
	errLength   = Because(rigid.ErrInput, "a length must lie between 1e-60 and 1e60 m")
	errDistance = Because(rigid.ErrInput, "no distance may be beyond 1e60 m")
)

// Faults collects what is wrong with the dimensions given to a constructor.
type Faults []error

// Add reports one dimension, or all of them where name is empty; nothing if the
// cause is nil.
func (f *Faults) Add(name string, value float64, cause error) {
	if cause != nil {
		*f = append(*f, &rigid.DimensionError{Name: name, Value: value, Err: cause})
	}
}

// Length checks a length that must be positive.
func (f *Faults) Length(name string, x float64) { f.Add(name, x, Length(x)) }

// Distance checks a distance that may be 0 or negative.
func (f *Faults) Distance(name string, x float64) { f.Add(name, x, Distance(x)) }

// Number checks a number of any size, such as an angle.
func (f *Faults) Number(name string, x float64) { f.Add(name, x, Number(x)) }

// Mount checks the field Mount.
func (f *Faults) Mount(m rigid.Placement) {
	f.Number("Mount.X", m.X)
	f.Number("Mount.Y", m.Y)
	f.Number("Mount.Angle", m.Angle)
}

// OK reports whether nothing is wrong so far.
func (f Faults) OK() bool { return len(f) == 0 }

// Err returns nil, the one fault there is, or all of them joined.
func (f Faults) Err() error {
	if len(f) == 1 {
		return f[0]
	}
	return errors.Join(f...)
}

// Length returns the cause for which x is refused as a length, or nil.
func Length(x float64) error {
	switch {
	case Number(x) != nil:
		return rigid.ErrNotFinite
	case x <= 0:
		return rigid.ErrNotPositive
	case x < Least || x > Greatest:
		return errLength
	}
	return nil
}

// Distance returns the cause for which x is refused as a distance, or nil.
func Distance(x float64) error {
	switch {
	case Number(x) != nil:
		return rigid.ErrNotFinite
	case math.Abs(x) > Greatest:
		return errDistance
	}
	return nil
}

// Number returns rigid.ErrNotFinite for NaN and the infinities, or nil.
func Number(x float64) error {
	if x-x != 0 {
		return rigid.ErrNotFinite
	}
	return nil
}
