package fourbar

import (
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/internal/enum"
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

var branches = enum.Names[Branch]{Type: "Branch", Wrong: rigid.ErrInput, Of: []string{"open", "crossed", "parallel", "contrary"}}

// String returns the branch's name in lower case.
func (b Branch) String() string { return branches.String(b) }

// MarshalText returns the branch's name in lower case; ErrInput for an unknown one.
func (b Branch) MarshalText() ([]byte, error) { return branches.Text(b) }

// UnmarshalText reads a branch's name in lower case; any other text is an error that
// wraps ErrInput and tells the names.
func (b *Branch) UnmarshalText(text []byte) error { return branches.Read(b, text) }

// Causes for which dimensions are refused.
var (
	errClose     = dims.Because(rigid.ErrUnreachable, "the longest link must be shorter than the other three together")
	errBranch    = dims.Because(rigid.ErrInput, "the branches are Open, Crossed, Parallel and Contrary")
	errUnequal   = dims.Because(rigid.ErrInput, "a parallelogram needs Frame = Coupler and Crank = Follower")
	errRhombus   = dims.Because(rigid.ErrChangePoint, "Contrary needs Frame ≠ Crank")
	errPositions = dims.Because(rigid.ErrSingular, "the precision positions do not determine the lengths")
	errEndless   = dims.Because(rigid.ErrUnreachable, "the precision positions ask for links without end")
)

// check returns every *rigid.DimensionError of the dimensions, joined.
func (d Dimensions) check() error {
	var f dims.Faults
	f.Length("Frame", d.Frame)
	f.Length("Crank", d.Crank)
	f.Length("Coupler", d.Coupler)
	f.Length("Follower", d.Follower)
	f.Mount(d.Mount)
	if f.OK() {
		f.Add("", 0, d.closeError())
		f.Add("Branch", float64(d.Branch), d.branchError())
	}
	return f.Err()
}

// closeError reports whether the links close at no crank angle: the longest is
// longer than the other three together. Where they are as long as those, all lie
// in one line for good, which is no mechanism either.
func (d Dimensions) closeError() error {
	l := d.longest()
	if rest := d.Frame + d.Crank + d.Coupler + d.Follower - l; rest-l <= equal*l {
		return errClose
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
			return errUnequal
		}
		if d.Branch == Contrary && math.Abs(d.Frame-d.Crank) <= tol {
			return errRhombus
		}
		return nil
	}
	return errBranch
}
