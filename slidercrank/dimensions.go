package slidercrank

import (
	"errors"
	"math"
	"strconv"

	"example.com/twopoint/rigid"
)

// Dimensions of a slider-crank, in m, and where it is mounted. The crank pivot is
// the origin of the mechanism's own axes, the guide the line y = Offset along their
// x axis. More fields may come: write keyed literals.
type Dimensions struct {
	Crank  float64         `json:"crank"`  // crank pivot to crank pin
	Rod    float64         `json:"rod"`    // crank pin to slider pin
	Offset float64         `json:"offset"` // of the guide, to the left of its direction +x; 0: in line
	Branch Branch          `json:"branch"` // on which side of the crank pin the slider is
	Mount  rigid.Placement `json:"mount"`  // of the mechanism's own axes in the machine
}

// A Branch is a way to assemble crank, rod and slider.
type Branch uint8

// Where the crank turns fully the two are assemblies that no motion joins;
// elsewhere the mechanism goes from one to the other at the ends of Range.
const (
	Ahead  Branch = iota // slider pin at greater x than the crank pin
	Behind               // slider pin at smaller x than the crank pin
)

var branchNames = [...]string{"ahead", "behind"}

// String returns "ahead" or "behind".
func (b Branch) String() string {
	if int(b) < len(branchNames) {
		return branchNames[b]
	}
	return "Branch(" + strconv.Itoa(int(b)) + ")"
}

// MarshalText returns "ahead" or "behind"; ErrInput for any other value.
func (b Branch) MarshalText() ([]byte, error) {
	if int(b) >= len(branchNames) {
		return nil, rigid.ErrInput
	}
	return []byte(branchNames[b]), nil
}

// UnmarshalText reads "ahead" or "behind"; anything else is ErrInput.
func (b *Branch) UnmarshalText(text []byte) error {
	for i, name := range branchNames {
		if name == string(text) {
			*b = Branch(i)
			return nil
		}
	}
	return rigid.ErrInput
}

// check returns every *rigid.DimensionError of the dimensions, joined.
func (d Dimensions) check() error {
	var f faults
	f.length("Crank", d.Crank)
	f.length("Rod", d.Rod)
	f.distance("Offset", d.Offset)
	f.mount(d.Mount)
	if int(d.Branch) >= len(branchNames) {
		f.add("Branch", float64(d.Branch), rigid.ErrInput)
	}
	// Where the offset is as long as crank and rod together, they lie in one line
	// for good, which is no mechanism either.
	rod, _ := d.settle()
	if len(f) == 0 && d.Crank+rod-math.Abs(d.Offset) <= equal*math.Abs(d.Offset) {
		f.add("", 0, rigid.ErrUnreachable)
	}
	return f.join()
}

// settle returns Rod, and whether there is a change point: Rod = Crank ± |Offset|
// within rounding, where crank and rod can both stand square to the guide. Rod is
// then that sum to the last digit, so that they do at the quarter turn.
func (d Dimensions) settle() (rod float64, changes bool) {
	e := math.Abs(d.Offset)
	slack := equal * max(d.Crank, d.Rod, e)
	for _, sum := range [...]float64{d.Crank + e, d.Crank - e} {
		if sum > 0 && math.Abs(d.Rod-sum) <= slack {
			return sum, true
		}
	}
	return d.Rod, false
}

const (
	// equal is the difference, of the longest length, below which sums of lengths
	// count as equal: lengths come as decimals, whose sums are rounded.
	equal = 4 * 0x1p-52
	// beyond is how far, of the largest length, a position may lie beyond a limit
	// and still count as the limit.
	beyond = 1e-14
	// Lengths that the library takes, in m. Between them no product of four lengths
	// overflows or underflows.
	leastLength    = 1e-60
	greatestLength = 1e60
)

// faults collects what is wrong with the dimensions given to a constructor.
type faults []error

// add reports one dimension, or all of them where name is empty.
func (f *faults) add(name string, value float64, cause error) {
	*f = append(*f, &rigid.DimensionError{Name: name, Value: value, Err: cause})
}

// length checks a length that must be positive.
func (f *faults) length(name string, x float64) {
	switch {
	case !finite(x):
		f.add(name, x, rigid.ErrNotFinite)
	case x <= 0:
		f.add(name, x, rigid.ErrNotPositive)
	case x < leastLength || x > greatestLength:
		f.add(name, x, rigid.ErrInput)
	}
}

// distance checks a distance that may be 0 or negative.
func (f *faults) distance(name string, x float64) {
	switch {
	case !finite(x):
		f.add(name, x, rigid.ErrNotFinite)
	case math.Abs(x) > greatestLength:
		f.add(name, x, rigid.ErrInput)
	}
}

// number checks a number of any size, such as an angle.
func (f *faults) number(name string, x float64) {
	if !finite(x) {
		f.add(name, x, rigid.ErrNotFinite)
	}
}

// mount checks the field Mount.
func (f *faults) mount(m rigid.Placement) {
	f.number("Mount.X", m.X)
	f.number("Mount.Y", m.Y)
	f.number("Mount.Angle", m.Angle)
}

// join returns nil, the one fault there is, or all of them joined.
func (f faults) join() error {
	if len(f) == 1 {
		return f[0]
	}
	return errors.Join(f...)
}

// finite reports whether x is neither NaN nor infinite.
func finite(x float64) bool { return x-x == 0 }
