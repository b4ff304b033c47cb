package rolling

import (
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// equal is how far two lengths may differ, relative to the greater, and still be
// one: lengths come as decimals.
const equal = 4 * 0x1p-52

// agree is how far redundant dimensions may differ, relative to the greater.
const agree = 1e-9

// Causes for which a dimension is refused.
var (
	errFills = dims.Because(rigid.ErrSingular, "the wheel fills the circle it runs in")
	errAgree = dims.Because(rigid.ErrInput, "it contradicts the other dimensions")
	errTeeth = dims.Because(rigid.ErrNotPositive, "a gear must have a tooth at least")
	errMany  = dims.Because(rigid.ErrInput, "no more than 1e9 are taken")
	errSize  = dims.Because(rigid.ErrNotPositive, "teeth without radii need the distance of the centres")
	errBends = dims.Because(rigid.ErrInput, "a track must have a bend at least")
	errBent  = dims.Because(rigid.ErrInput, "length × curvature must not be over 1e4 rad")
	errTouch = dims.Because(rigid.ErrUnreachable, "the pulleys would touch")
)

// Causes for which a member of a train is refused.
var (
	errFew    = dims.Because(rigid.ErrInput, "a train has a frame and another member at least")
	errNone   = dims.Because(rigid.ErrInput, "no member has this index")
	errFrame  = dims.Because(rigid.ErrInput, "the frame cannot be driven")
	errTwice  = dims.Because(rigid.ErrInput, "it occurs twice")
	errSelf   = dims.Because(rigid.ErrInput, "it meshes with itself or is its own arm")
	errFree   = dims.Because(rigid.ErrInput, "nothing determines its turn, a drive or a mesh is missing")
	errDriven = dims.Because(rigid.ErrInput, "the other drives determine its turn, one drive is too many")
	errLocked = dims.Because(rigid.ErrInput, "it cannot turn, the train is locked")
	errRatio  = dims.Because(rigid.ErrNotFinite, "its turn over that of a drive overflows")
)

// A report collects the errors of a constructor.
type report struct{ dims.Faults }

// member adds an error for a member as a whole, of which no number is at fault.
func (r *report) member(name string, cause error) { r.Add(name, math.NaN(), cause) }

// teeth adds an error for a number of teeth below one.
func (r *report) teeth(name string, z int) {
	if z < 1 {
		r.Add(name, float64(z), errTeeth)
	}
}

// agrees adds an error unless x is want to within 1e-9.
func (r *report) agrees(name string, x, want float64) {
	if math.Abs(x-want) > agree*max(math.Abs(x), math.Abs(want)) {
		r.Add(name, x, errAgree)
	}
}

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
