package planar

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A State is an assembled linkage at one place of its drives. It belongs to one
// goroutine. Assemble, AssembleMode and Clone make one; a zero State gives
// rigid.ErrInput and NaN.
type State struct {
	l     *Linkage
	now   *scene             // where the linkage is
	next  *scene             // where Move tries to go
	spare *scene             // for Moves of several steps
	start []float64          // total angles of the bodies at Assemble
	most  []float64          // by how much each redundant constraint may be off, m or rad
	to    []rigid.Coordinate // where Move is to go
	doubt []int              // ops that may have crossed a gap
	stop  stop
	void  rigid.Motion // NaN
	// of Sensitivity, once it has been asked for
	variation *variation
}

func newState(l *Linkage) *State {
	p := l.program
	c := &choice{branch: make([]branch, p.dyads), phase: make([]float64, len(l.design.Joints))}
	most := make([]float64, len(p.checks))
	for i := range most {
		most[i] = math.Inf(1) // until check sets it
	}
	for i := range c.branch {
		c.branch[i] = left
	}
	nan := math.NaN()
	v := r2.Vec{X: nan, Y: nan}
	return &State{
		l: l, now: p.newScene(c), next: p.newScene(c), spare: p.newScene(c),
		start: make([]float64, p.bodies), most: most,
		to: make([]rigid.Coordinate, p.drives), doubt: make([]int, 0, p.dyads),
		void: rigid.Motion{Pose: rigid.Pose{Origin: v, Axis: v}, Vel: v, Acc: v, Omega: nan, Alpha: nan},
	}
}

// Clone returns a State of its own in the same place.
func (s *State) Clone() *State {
	if s.l == nil {
		return &State{}
	}
	c := newState(s.l)
	_ = c.Set(s) // of one linkage
	return c
}

// Set puts the State where from is, whole turns and assembly mode included. Both
// must be of one Linkage, else it returns rigid.ErrInput. It doesn't allocate.
func (s *State) Set(from *State) error {
	if s.l == nil || s.l != from.l {
		return rigid.ErrInput
	}
	s.now.set(from.now)
	copy(s.now.branch, from.now.branch)
	copy(s.now.phase, from.now.phase)
	copy(s.start, from.start)
	copy(s.most, from.most)
	copy(s.to, from.to)
	s.stop = from.stop
	return nil
}

// slot returns the motion of a link, or false.
func (s *State) slot(l Link) (int, bool) {
	if s.l == nil || l < 0 || int(l) >= len(s.l.program.link) {
		return 0, false
	}
	return s.l.program.link[l], true
}

// Motion returns the motion of a link. It is in the State: valid until the next
// Move, and not to be written. That of a link that doesn't exist is NaN.
func (s *State) Motion(l Link) *rigid.Motion {
	i, ok := s.slot(l)
	switch {
	case ok:
		return &s.now.m[i]
	case s.l == nil:
		return &newVoid().void
	}
	return &s.void
}

func newVoid() *State {
	nan := math.NaN()
	v := r2.Vec{X: nan, Y: nan}
	return &State{void: rigid.Motion{Pose: rigid.Pose{Origin: v, Axis: v}, Vel: v, Acc: v, Omega: nan, Alpha: nan}}
}

// Point returns the motion of a point of a link, NaN for a link that doesn't exist.
func (s *State) Point(a Attachment) rigid.Point {
	return s.Motion(a.Link).At(r2.Vec{X: a.X, Y: a.Y})
}

// Turn returns the turn of a link as seen from another, in rad. It is continuous
// over any number of revolutions: of a driven pair the input itself, of another in
// (−π, π] at Assemble. It is NaN for a link that doesn't exist.
func (s *State) Turn(of, from Link) rigid.Coordinate {
	i, ok := s.slot(of)
	k, ok2 := s.slot(from)
	if !ok || !ok2 {
		return rigid.Coordinate{Pos: math.NaN(), Vel: math.NaN(), Acc: math.NaN()}
	}
	for n, d := range s.l.design.Drives {
		if t, ok := d.(Turn); ok && t.Of == of && t.From == from {
			return s.now.in[n]
		}
	}
	a, b := &s.now.m[i], &s.now.m[k]
	u := back(b.Pose.Axis, a.Pose.Axis)
	since := s.whole(of, s.now) - s.whole(from, s.now)
	first := s.first(of) - s.first(from)
	return rigid.Coordinate{
		Pos: rigid.Nearest(math.Atan2(u.Y+0, u.X), since-first+rigid.Wrap(first)),
		Vel: a.Omega - b.Omega,
		Acc: a.Alpha - b.Alpha,
	}
}

// whole returns the angle of a link with its whole turns.
func (s *State) whole(l Link, sc *scene) float64 {
	p := s.l.program
	return p.whole[p.seats[l].body].value(sc) + p.offset[l]
}

// first returns the same at Assemble.
func (s *State) first(l Link) float64 {
	p := s.l.program
	return s.start[p.seats[l].body] + p.offset[l]
}

// Slide returns the displacement of the point of line of along the line from, in m,
// as an observer on from's link sees it. It is NaN for a link that doesn't exist.
func (s *State) Slide(of, from Line) rigid.Coordinate {
	p := s.Motion(from.Link).Observe(s.Point(Attachment{of.Link, of.X, of.Y}))
	u := rigid.NewPose(0, 0, from.Angle).Axis
	return rigid.Coordinate{
		Pos: r2.Dot(u, r2.Sub(p.Pos, r2.Vec{X: from.X, Y: from.Y})),
		Vel: r2.Dot(u, p.Vel),
		Acc: r2.Dot(u, p.Acc),
	}
}

// Margin returns the least margin of the groups: a sine, 0 where the drives don't
// determine the rates, 1 where nothing can fail. Below rigid.LeastMargin no rates
// are given. It is NaN of a zero State.
func (s *State) Margin() float64 {
	if s.l == nil {
		return math.NaN()
	}
	least := 1.0
	for _, o := range s.l.program.ops {
		if o, ok := o.(solver); ok {
			least = math.Min(least, o.margin(s.now))
		}
	}
	return least
}

// AccelerationTerms returns the terms of the acceleration of a point with in as the
// moving frame: the base, tangential and normal terms of in's motion, and the
// relative and Coriolis terms of the point's motion as an observer on in sees it.
// Their sum is the acceleration of the point; all are in m/s², in the frame's axes.
// It is NaN where a link doesn't exist.
func (s *State) AccelerationTerms(of Attachment, in Link) rigid.AccelerationTerms {
	m := s.Motion(in)
	return m.AccelerationTerms(m.Observe(s.Point(of)))
}

// VelocityTerms returns the terms of the velocity of a point with in as the moving
// frame, in m/s, in the frame's axes. Their sum is NaN where a link doesn't exist.
func (s *State) VelocityTerms(of Attachment, in Link) rigid.VelocityTerms {
	m := s.Motion(in)
	return m.VelocityTerms(m.Observe(s.Point(of)))
}

// Pole returns the instantaneous centre of a relative to b, in m in the frame:
// where a point of each has one velocity. Errors are those of rigid.RelativePole,
// and rigid.ErrInput for a link that doesn't exist.
func (s *State) Pole(a, b Link) (r2.Vec, error) {
	_, okA := s.slot(a)
	if _, ok := s.slot(b); !ok || !okA {
		return r2.Vec{}, rigid.ErrInput
	}
	return rigid.RelativePole(s.Motion(a), s.Motion(b))
}

// Inputs returns the motions of the drives, in their order, in a new list. In a loop
// Turn and Slide read a driven turn or displacement without allocation.
func (s *State) Inputs() []rigid.Coordinate {
	if s.l == nil {
		return nil
	}
	return slices.Clone(s.now.in)
}
