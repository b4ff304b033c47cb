package planar

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
)

// The causes for which New refuses a Design, found in a DesignError. A number
// that is not one has a *rigid.DimensionError there instead.
var (
	// ErrReference: a link, joint or drive that does not exist or is of no use.
	ErrReference = errors.New("twopoint: wrong reference")
	// ErrOverconstrained: joints or drives hold each other doubly.
	ErrOverconstrained = errors.New("twopoint: over-constrained")
	// ErrUnderconstrained: links stay free with every drive held.
	ErrUnderconstrained = errors.New("twopoint: under-constrained")
	// ErrInconsistent: joints contradict one another.
	ErrInconsistent = errors.New("twopoint: inconsistent")
	// ErrTooFar: a motion that takes more steps than one call may.
	ErrTooFar = errors.New("twopoint: too far for one move")
)

// A DesignError tells which links, joints and drives New refuses, and why. Its
// cause is one of the package's errors or a *rigid.DimensionError; errors.Is and
// errors.AsType find it.
type DesignError struct {
	Err    error
	Links  []string // names of the links concerned
	Joints []int    // indices into Design.Joints
	Drives []int    // indices into Design.Drives
}

// Error returns a message that begins with "twopoint: ".
func (e *DesignError) Error() string {
	cause := "wrong design"
	if e.Err != nil {
		cause = strings.ReplaceAll(e.Err.Error(), "twopoint: ", "")
	}
	var where []string
	if len(e.Links) > 0 {
		where = append(where, "links "+list(e.Links))
	}
	if len(e.Joints) > 0 {
		where = append(where, "joints "+list(numbers(e.Joints)))
	}
	if len(e.Drives) > 0 {
		where = append(where, "drives "+list(numbers(e.Drives)))
	}
	if len(where) == 0 {
		return "twopoint: " + cause
	}
	return "twopoint: " + cause + " (" + strings.Join(where, "; ") + ")"
}

// Unwrap returns the cause.
func (e *DesignError) Unwrap() error { return e.Err }

// list joins the first few of all, and tells how many there are beyond.
func list(all []string) string {
	const most = 12
	if len(all) <= most {
		return strings.Join(all, ", ")
	}
	return strings.Join(all[:most], ", ") + fmt.Sprintf(" and %d more", len(all)-most)
}

func numbers(all []int) []string {
	text := make([]string, len(all))
	for i, n := range all {
		text[i] = strconv.Itoa(n)
	}
	return text
}
