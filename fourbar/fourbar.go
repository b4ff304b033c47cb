package fourbar

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A Linkage is a four-bar linkage made by New. It never changes, so that any number of
// goroutines may share it. The zero Linkage is no mechanism: its methods return
// ErrInput, or NaN or nothing where they return no error.
type Linkage struct {
	dim                             Dimensions // as given
	frame, crank, coupler, follower float64    // as solved: Parallel and Contrary take the means
	longest                         float64

	origin r2.Vec // of Mount
	axis   r2.Vec // of Mount: the unit vector along the mechanism's x axis
	pivot  r2.Vec // of the follower

	side    float64 // +1 for Open, −1 for Crossed
	turns   bool    // whether the crank turns fully
	winding winding

	byCrank, byFollower, byCoupler drive
	quick                          kernel
}

// A State is the motion of all links at one instant. More fields may come: write
// keyed literals.
type State struct {
	Crank    rigid.Motion // origin at its fixed pivot, x axis to the crank pin
	Coupler  rigid.Motion // origin at the crank pin, x axis to the follower pin
	Follower rigid.Motion // origin at its fixed pivot, x axis to the follower pin

	Turn  rigid.Coordinate // of the crank from the mechanism's x axis
	Swing rigid.Coordinate // of the follower from the mechanism's x axis

	Branch Branch     // of the pose
	Knee   rigid.Side // side, of the line from crank pivot to follower pin, of the crank pin
	Lean   rigid.Side // side, of the crank's direction, of the follower's: the sign of sin(Swing − Turn)

	Transmission float64 // angle at the follower pin between coupler and follower, in [0, π]
	Margin       float64 // least absolute sine at the joint that flattens in the direction solved: 0 at a limit, at most 1
}

// New returns the linkage with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: each length must be
// positive, finite and from 1e-60 to 1e60 m (ErrNotPositive, ErrNotFinite,
// ErrInput), and so with an empty Name for lengths that close at no crank angle
// (ErrUnreachable), and with the Name Branch for an unknown branch or one that the
// lengths do not allow: Parallel and Contrary need Frame = Coupler and Crank =
// Follower within 1e-12 of the longest (ErrInput), of which the means are taken,
// and Contrary also Frame ≠ Crank (ErrChangePoint).
func New(d Dimensions) (*Linkage, error) {
	if err := d.check(); err != nil {
		return nil, err
	}
	mount := d.Mount.Pose()
	l := &Linkage{
		dim:   d,
		frame: d.Frame, crank: d.Crank, coupler: d.Coupler, follower: d.Follower,
		origin: mount.Origin, axis: mount.Axis,
	}
	if d.Branch == Parallel || d.Branch == Contrary {
		l.frame = d.Frame/2 + d.Coupler/2
		l.crank = d.Crank/2 + d.Follower/2
		l.coupler, l.follower = l.frame, l.crank
	}
	a, b, c := l.crank, l.coupler, l.follower
	l.longest = max(l.frame, a, b, c)
	l.side = 1
	if d.Branch == Crossed {
		l.side = -1
	}
	l.turns = l.crankTurns()
	l.winding = l.newWinding()
	l.pivot = r2.Add(l.origin, r2.Scale(l.frame, l.axis))
	l.byCrank = newDrive(l.frame, a, b, c)
	l.byFollower = newDrive(l.frame, -c, a, b)
	l.byCoupler = newDrive(l.frame, b, a, c)
	l.quick = l.newKernel()
	return l, nil
}

// Dimensions returns the dimensions as given to New.
func (l *Linkage) Dimensions() Dimensions { return l.dim }
