package rigid

import (
	"errors"
	"math"
	"strconv"
	"strings"
)

// The causes for which the library refuses. Solvers, laws and poles return these
// very values, which cost nothing, so == and errors.Is both serve; those of package
// planar may wrap them, for errors.Is.
var (
	// ErrUnreachable: no position of the links fits the given one.
	ErrUnreachable = errors.New("twopoint: out of reach of the links")
	// ErrSingular: at this position the driven motion does not determine the
	// rates asked for, or what is asked for has no value.
	ErrSingular = errors.New("twopoint: singular position: the rates are not determined")
	// ErrNoPole: the body translates, so its pole lies at infinity.
	ErrNoPole = errors.New("twopoint: no pole: it lies at infinity")
	// ErrNotFinite: a given number is NaN or infinite, or a result would overflow.
	ErrNotFinite = errors.New("twopoint: number not finite")
	// ErrInput: a wrong count or length, an unknown link or member, or a mechanism
	// that no constructor made.
	ErrInput = errors.New("twopoint: wrong input")
)

// Further causes, found in a DimensionError alone.
var (
	// ErrNotPositive: the dimension must be greater than zero.
	ErrNotPositive = errors.New("twopoint: must be positive")
	// ErrChangePoint: the dimensions let all links fall into one line where the
	// motion could go on in two ways, and the mechanism asked for does not.
	ErrChangePoint = errors.New("twopoint: the links have a change point")
)

// A DimensionError tells which dimension a constructor refuses, and why.
// Constructors return a pointer to one, or several joined by errors.Join;
// errors.AsType[*DimensionError] finds the first, errors.Is the cause.
type DimensionError struct {
	Name  string  // path of the field, or name of the member; empty where no one field is to blame
	Value float64 // as given; NaN too where a part, not a number, is to blame
	Err   error   // to errors.Is one of ErrNotPositive, ErrNotFinite, ErrUnreachable, ErrChangePoint, ErrInput and ErrSingular
}

// Error returns a message that begins with "twopoint: ".
func (e *DimensionError) Error() string {
	cause := "unknown cause"
	if e.Err != nil {
		cause = strings.TrimPrefix(e.Err.Error(), "twopoint: ") // Error says it already
	}
	switch {
	case e.Name == "":
		return "twopoint: dimensions: " + cause
	case math.IsNaN(e.Value) && e.Err != ErrNotFinite:
		return "twopoint: " + e.Name + ": " + cause
	}
	return "twopoint: dimension " + e.Name + " = " + strconv.FormatFloat(e.Value, 'g', -1, 64) + ": " + cause
}

// Unwrap returns the cause.
func (e *DimensionError) Unwrap() error { return e.Err }
