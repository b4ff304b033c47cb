package planar

import (
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A system is a Design after everything that is exact: links fused into bodies,
// pins merged, sliding pins and driven distances taken apart into hidden bodies,
// the equations between angles alone eliminated, and the scalar equations that
// remain sorted into blocks in the order of solution. It is immutable once New
// has made it. Structure (what is solved when) ends here; the program compiled
// from it says how.
type system struct {
	links  int      // links of the Design, without the hidden ones
	seats  []seat   // of every link, then of every hidden one
	hidden []hidden // what hidden link links+i is
	angles []angle  // of every body; angles[0] is the frame's: zero
	class  []int    // of every body: bodies of one class have the same ψ-part; the frame's is 0
	free   []int    // ψk is the angle of body free[k]
	rows   []row    // all scalar equations that are solved
	blocks []block  // in the order of solution
	checks []check  // redundant equations set aside: verified after each Move
	groups []Group  // Assur groups, for Groups
	drives int      // inputs, in the order of Design.Drives
	length float64  // the largest length, m
}

// A hidden link is not in the Design: the block of a SlidingPin, whose origin is
// the pin and whose x axis runs along the slot (also of a Revolute of which the
// length of a link is set aside); or barrel and rod of a Reach, whose
// origins are its points A and B and whose x axes run from A to B.
type hidden struct {
	part  hiddenPart
	joint int // of the SlidingPin, or len(Joints) + index of the drive
}

type hiddenPart uint8

const (
	slotBlock hiddenPart = iota
	barrel
	rod
)

// A seat is where a link lies: on which body (0 is the frame's), in which pose.
type seat struct {
	body  int
	local rigid.Pose
}

// An angle is the linear form of a body's angle, in rad:
//
//	θ = Σ Coef·ψ + Σ Coef·in + Const
type angle struct {
	psi   []term // index into system.free
	in    []term // index of a drive
	Const float64
	// phases that are read at Assemble (AsAssembled), added with their coefficients
	phase []term // index of a joint of the Design
}

type term struct {
	Index int
	Coef  float64
}

// Scalar unknowns are numbered: x and y of body b > 0 are 2(b−1) and 2(b−1)+1;
// ψk is 2(bodies−1)+k.
func (s *system) xy(body int) int { return 2 * (body - 1) }
func (s *system) psi(k int) int   { return 2*(len(s.angles)-1) + k }

type rowKind uint8

const (
	rowX      rowKind = iota // x of the point on a = x of the point on b
	rowY                     // y, likewise; always the row after its rowX
	rowGuide                 // n·(pb − pa) = value, n = u⊥, u turning with a
	rowSlide                 // u·(pb − pa) = value + in[drive]
	rowRack                  // u·(pb − pa) + rate·(θb − θa) = value (+ phase), a the rack's body, b the pinion's
	rowCustom                // an equation of a Constraint, between any number of bodies
)

// A row is a scalar equation between two bodies. A row between two bodies counts
// the ψ of both as unknowns of it, even where a point is its body's origin, but for
// bodies that turn on a point known before (seated): their origin is that point,
// and rows with it hold their x and y alone.
type row struct {
	kind   rowKind
	a, b   int     // bodies
	pa, pb r2.Vec  // points of a and b, in their axes
	u      r2.Vec  // unit vector in a's axes (rowGuide, rowSlide, rowRack)
	value  float64 // m
	drive  int     // rowSlide: index of the drive, or −1
	rate   float64 // rowRack: signed radius, m/rad
	joint  int     // index into Design.Joints, or len(Joints) + index of the drive
	phased bool    // value is read at Assemble (AsAssembled)
	at, bt int     // indices of the points pa and pb: one point of one body has one index
	custom *custom // rowCustom: the joint; a and b are the first and the last of its bodies
	nth    int     // which of its equations
}

// A block is a square set of unknowns and rows that must be solved together, all
// else in its rows being known by then.
type block struct {
	unknowns []int
	rows     []int // indices into system.rows
	group    int   // index into system.groups of the group it is part of, or −1
}

// A check is an equation that holds by itself if the design is right.
type check struct {
	row   row
	angle *angleCheck // instead of row: a redundant equation between angles
	unit  string      // what to call it in an error
}

// An angleCheck is Σ Coef·θ(body) = Const, modulo 2π when Mod.
type angleCheck struct {
	of    []term
	Const float64
	mod   bool
	joint int
	// Const is what it is at Assemble (AsAssembled)
	phased bool
}
