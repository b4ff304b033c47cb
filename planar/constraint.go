package planar

import (
	"fmt"

	"example.com/twopoint/rigid"
)

// A Custom joint ties links by a Constraint of the user's own: a pin on a curve, a
// cam with a table for its profile, a belt that runs off a spool. It takes as many
// freedoms as the constraint has equations. A group that it is part of is solved by
// Newton's method.
type Custom struct{ By Constraint }

func (Custom) joint() {}

var _ Joint = Custom{}

// A Constraint is what a Custom joint asks of its links: scalar equations
//
//	Φ(x, y, θ of every link) = 0
//
// between places that it reads and rates that follow from them. The package
// planartest tells whether one is right.
//
// A Constraint is one value for all goroutines: Evaluate changes nothing but what e
// points to. Move allocates nothing if Evaluate does not. Links and Rows return the
// same at any time; New reads them.
type Constraint interface {
	// Links returns the links that it ties, two or more, no two alike. Where a link
	// is in the frame says nothing by itself: what depends on that ties the link to
	// Frame.
	Links() []Link
	// Rows returns the number of equations, mostly 1.
	Rows() int
	// Evaluate writes the equations into e.Rows for the motions in e.Links. An error
	// says that there is no value here, as beyond the end of a slot: the linkage
	// doesn't go there.
	Evaluate(e *Evaluation) error
}

// A Declarer is a Constraint that depends on some unknowns of its links alone, which
// lets New solve in smaller groups. Any other Constraint counts as depending on all.
type Declarer interface {
	Constraint
	// Depends returns on what of its i-th link an equation depends.
	Depends(row, i int) Unknowns
}

// Unknowns are unknowns of a link, added up: OfX + OfY.
type Unknowns uint8

// The unknowns of a link.
const (
	OfX     Unknowns = 1 << iota // x of its origin
	OfY                          // y of its origin
	OfAngle                      // its angle
	OfAll   = OfX | OfY | OfAngle
)

// A Rememberer is a Constraint that keeps numbers from one place to the next, such
// as the parameter of a point on a curve: the State keeps them for it.
type Rememberer interface {
	Constraint
	// Memory returns how many.
	Memory() int
}

// An Evaluation is where a Constraint is asked for its equations. It belongs to the
// State: valid during the call alone.
type Evaluation struct {
	Links  []Moving   // given: the links in the order of Constraint.Links
	Rows   []Equation // asked for: zero when given
	Memory []float64  // a Rememberer's: as it left them at the place before; zero at Assemble
}

// A Moving link is where it is and how it moves, in the frame.
//
// Acc and Alpha are always zero. So the accelerations that rigid.Motion.At and
// Observe give here are just what a Bias is made of.
type Moving struct {
	rigid.Motion
	Turn float64 // rad: its angle with whole turns, as State.Turn counts them
}

// An Equation is one of a Constraint's: by how much it misses, and what its
// derivatives by time are,
//
//	Φ′ = Σ Slopes·(x′, y′, θ′)
//	Φ″ = Σ Slopes·(x″, y″, θ″) + Bias
//
// Bias is Φ″ for the velocities in Evaluation.Links while no link has an
// acceleration; it is zero for links at rest.
type Equation struct {
	Residual float64 // m or rad; it changes its sign where the equation holds
	Slopes   []Slope // derivatives of Residual, one for each link; those of Frame are not read
	Bias     float64 // per s²
}

// A Slope is the derivative of a residual by x and y of a link's origin, in the
// frame's axes, and by its angle.
type Slope struct{ X, Y, Angle float64 }

// String returns the joint in one line: what the Constraint calls itself, else its type.
func (j Custom) String() string { return naming(Link.String).joint(j) }

// calledItself returns what a constraint calls itself.
func calledItself(c Constraint) string {
	if s, ok := c.(fmt.Stringer); ok {
		return s.String()
	}
	return fmt.Sprintf("%T", c)
}
