package slidercrank

import (
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/internal/enum"
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

var branches = enum.Names[Branch]{Type: "Branch", Wrong: rigid.ErrInput, Of: []string{"ahead", "behind"}}

// String returns "ahead" or "behind".
func (b Branch) String() string { return branches.String(b) }

// MarshalText returns "ahead" or "behind"; ErrInput for any other value.
func (b Branch) MarshalText() ([]byte, error) { return branches.Text(b) }

// UnmarshalText reads "ahead" or "behind"; any other text is an error that
// wraps ErrInput and tells the names.
func (b *Branch) UnmarshalText(text []byte) error { return branches.Read(b, text) }

// Causes for which dimensions are refused.
var (
	errBranch   = dims.Because(rigid.ErrInput, "the branches are Ahead and Behind")
	errShort    = dims.Because(rigid.ErrUnreachable, "crank and rod together must be longer than the offset")
	errSlot     = dims.Because(rigid.ErrUnreachable, "the slot's offset must be smaller than crank and centre distance together")
	errFlat     = dims.Because(rigid.ErrChangePoint, "crank and centre distance differ by just the slot's offset, so that the motion could go on in two ways: a change point")
	errRam      = dims.Because(rigid.ErrUnreachable, "the rod reaches the guide at no angle of the crank")
	errParallel = dims.Because(rigid.ErrSingular, "the two guides are parallel")
	errAlong    = dims.Because(rigid.ErrSingular, "the slot lies along the travel")
)

// check returns every *rigid.DimensionError of the dimensions, joined.
func (d Dimensions) check() error {
	var f dims.Faults
	f.Length("Crank", d.Crank)
	f.Length("Rod", d.Rod)
	f.Distance("Offset", d.Offset)
	f.Mount(d.Mount)
	if !branches.Has(d.Branch) {
		f.Add("Branch", float64(d.Branch), errBranch)
	}
	// Where the offset is as long as crank and rod together, they lie in one line
	// for good, which is no mechanism either.
	rod, _ := d.settle()
	if f.OK() && d.Crank+rod-math.Abs(d.Offset) <= equal*math.Abs(d.Offset) {
		f.Add("", 0, errShort)
	}
	return f.Err()
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
)
