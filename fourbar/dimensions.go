package fourbar

import (
	"errors"
	"math"
	"strconv"

	"example.com/twopoint/rigid"
)

// Dimensions of a four-bar linkage: the distances between the joints of each link
// in m, the assembly, and where the linkage is mounted. The crank's fixed pivot is
// the origin of the mechanism's own axes, the follower's is at (Frame, 0). More
// fields may come: write keyed literals.
type Dimensions struct {
	Frame    float64         `json:"frame"`    // crank pivot to follower pivot
	Crank    float64         `json:"crank"`    // crank pivot to crank pin
	Coupler  float64         `json:"coupler"`  // crank pin to follower pin
	Follower float64         `json:"follower"` // follower pivot to follower pin
	Branch   Branch          `json:"branch"`
	Mount    rigid.Placement `json:"mount"` // of the mechanism's own axes in the machine
}

// A Branch is a way to assemble the four links.
type Branch uint8

// Open and Crossed are the sides of the line from the crank pin to the follower's
// fixed pivot on which the follower pin lies. Where the crank turns fully they are
// two assemblies that no motion joins; elsewhere the linkage goes from one to the
// other at the limits of the crank, if something else than the crank drives it.
//
// Parallel and Contrary are the two motions of a parallelogram, which pass the
// position where all links lie in one line and change sides there. They need
// Frame = Coupler and Crank = Follower.
const (
	Open     Branch = iota // follower pin left of the line
	Crossed                // follower pin right of the line
	Parallel               // the coupler stays parallel to the frame
	Contrary               // crank and follower symmetric about an axis: the antiparallelogram; Frame ≠ Crank
)

var branchNames = [...]string{"open", "crossed", "parallel", "contrary"}

// String returns the branch's name in lower case.
func (b Branch) String() string {
	if int(b) < len(branchNames) {
		return branchNames[b]
	}
	return "Branch(" + strconv.Itoa(int(b)) + ")"
}

// MarshalText returns the branch's name in lower case; ErrInput for an unknown one.
func (b Branch) MarshalText() ([]byte, error) {
	if int(b) >= len(branchNames) {
		return nil, rigid.ErrInput
	}
	return []byte(branchNames[b]), nil
}

// UnmarshalText reads a branch's name in lower case; anything else is ErrInput.
func (b *Branch) UnmarshalText(text []byte) error {
	for i, name := range branchNames {
		if name == string(text) {
			*b = Branch(i)
			return nil
		}
	}
	return rigid.ErrInput
}

// Lengths that the library takes, in m. Between them no product of four lengths
// overflows or underflows.
const (
	leastLength    = 1e-60
	greatestLength = 1e60
)

// check returns every *rigid.DimensionError of the dimensions, joined.
func (d Dimensions) check() error {
	var errs []error
	report := func(name string, value float64, cause error) {
		if cause != nil {
			errs = append(errs, &rigid.DimensionError{Name: name, Value: value, Err: cause})
		}
	}
	report("Frame", d.Frame, lengthError(d.Frame))
	report("Crank", d.Crank, lengthError(d.Crank))
	report("Coupler", d.Coupler, lengthError(d.Coupler))
	report("Follower", d.Follower, lengthError(d.Follower))
	report("Mount.X", d.Mount.X, finiteError(d.Mount.X))
	report("Mount.Y", d.Mount.Y, finiteError(d.Mount.Y))
	report("Mount.Angle", d.Mount.Angle, finiteError(d.Mount.Angle))
	if len(errs) == 0 {
		report("", 0, d.closeError())
		report("Branch", float64(d.Branch), d.branchError())
	}
	return errors.Join(errs...)
}

func lengthError(x float64) error {
	switch {
	case finiteError(x) != nil:
		return rigid.ErrNotFinite
	case x <= 0:
		return rigid.ErrNotPositive
	case x < leastLength || x > greatestLength:
		return rigid.ErrInput
	}
	return nil
}

func finiteError(x float64) error {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return rigid.ErrNotFinite
	}
	return nil
}

// closeError reports whether the links close at no crank angle: the longest is
// longer than the other three together. Where they are as long as those, all lie
// in one line for good, which is no mechanism either.
func (d Dimensions) closeError() error {
	l := d.longest()
	if rest := d.Frame + d.Crank + d.Coupler + d.Follower - l; rest-l <= equal*l {
		return rigid.ErrUnreachable
	}
	return nil
}

func (d Dimensions) longest() float64 { return max(d.Frame, d.Crank, d.Coupler, d.Follower) }

// branchError reports whether the lengths do not allow the branch.
func (d Dimensions) branchError() error {
	switch d.Branch {
	case Open, Crossed:
		return nil
	case Parallel, Contrary:
		tol := 1e-12 * d.longest()
		if math.Abs(d.Frame-d.Coupler) > tol || math.Abs(d.Crank-d.Follower) > tol {
			return rigid.ErrInput
		}
		if d.Branch == Contrary && math.Abs(d.Frame-d.Crank) <= tol {
			return rigid.ErrChangePoint
		}
		return nil
	}
	return rigid.ErrInput
}
