package planar

import (
	"math"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A scene is a linkage at one place of its drives: what the steps of a program
// read and write. Steps go in the order of solution, so that a step finds what it
// needs of the bodies that are solved before it.
type scene struct {
	in    []rigid.Coordinate // the inputs
	m     []rigid.Motion     // of the bodies, in the axes in which the program's rows have their points; then of links that have axes of their own
	psi   []rigid.Coordinate // the free angles that a later step reads, whole turns included
	turns []int32            // whole turns of each body
	guard []guard            // of the dyads
	tri   []dyad.Triangle    // of the RRR dyads
	rods  []dyad.Rod         // of the RRP dyads
	slots []dyad.Slot        // of the RPR dyads
	meets []dyad.Meeting     // of the lines that meet
	work  []float64          // of the groups of higher class
	desks []desk             // the same, laid out

	asides []evaluation // of the redundant equations of Constraints

	*choice
}

// A choice is what a linkage is assembled by. The scenes of a State share one.
type choice struct {
	branch []branch  // of the dyads
	phase  []float64 // by joint of the Design: phases read at Assemble
}

// A branch is the side of a dyad, or the motion of a parallelogram cell.
type branch int8

const (
	right    branch = -1
	left     branch = 1
	parallel branch = 2
	contrary branch = 3
)

// A status says how a step went.
type status uint8

const (
	solved      status = iota
	doubtful           // solved, but there may be a gap on the way
	unreachable        // the loop doesn't close at these inputs
	singular           // the rates are not determined
	tooLong            // not sure to be on the same assembly mode: take half the step
)

func (p *program) newScene(c *choice) *scene {
	s := &scene{
		in: make([]rigid.Coordinate, p.drives), m: make([]rigid.Motion, p.motions),
		psi: make([]rigid.Coordinate, p.psis), turns: make([]int32, p.bodies),
		guard: make([]guard, p.dyads), tri: make([]dyad.Triangle, p.tris), rods: make([]dyad.Rod, p.rods),
		slots: make([]dyad.Slot, p.slots), meets: make([]dyad.Meeting, p.meets),
		choice: c,
	}
	s.desks, s.work = desks(p.newtons)
	s.asides = p.asides()
	s.m[0].Pose.Axis.X = 1
	return s
}

// set copies another scene of the same program but for the choice.
func (s *scene) set(from *scene) {
	copy(s.in, from.in)
	copy(s.m, from.m)
	copy(s.psi, from.psi)
	copy(s.turns, from.turns)
	copy(s.guard, from.guard)
	copy(s.tri, from.tri)
	copy(s.rods, from.rods)
	copy(s.slots, from.slots)
	copy(s.meets, from.meets)
	copy(s.work, from.work)
}

// rest sets all rates to zero.
func (s *scene) rest() {
	for i := range s.m {
		m := &s.m[i]
		m.Vel, m.Acc, m.Omega, m.Alpha = r2.Vec{}, r2.Vec{}, 0, 0
	}
	for i := range s.psi {
		s.psi[i].Vel, s.psi[i].Acc = 0, 0
	}
}

// finite reports whether the accelerations are finite, and so all before them.
func (s *scene) finite() bool {
	sum := 0.0
	for i := range s.m {
		m := &s.m[i]
		sum += m.Alpha*0 + (m.Acc.X*0 + m.Acc.Y*0)
	}
	return sum == 0
}

// A spot is a point fixed in a body, in the body's axes.
type spot struct {
	body int
	at   r2.Vec
}

// place returns where a spot is.
func (s *scene) place(p *spot) r2.Vec {
	m := &s.m[p.body]
	r := turned(m.Pose.Axis, p.at)
	return r2.Vec{X: m.Pose.Origin.X + r.X, Y: m.Pose.Origin.Y + r.Y}
}

// hang puts the origin of a body of known angle where p is at the place given.
func (s *scene) hang(p *spot, at r2.Vec) {
	m := &s.m[p.body]
	r := turned(m.Pose.Axis, p.at)
	m.Pose.Origin = r2.Vec{X: at.X - r.X, Y: at.Y - r.Y}
}

// carry sets the velocity and acceleration of a body's origin from those of p in it:
//
//	v − ω×r,  a − α×r + ω²r
func (s *scene) carry(p *spot, vel, acc r2.Vec) {
	m := &s.m[p.body]
	r := turned(m.Pose.Axis, p.at)
	w, al, w2 := m.Omega, m.Alpha, m.Omega*m.Omega
	m.Vel = r2.Vec{X: vel.X + w*r.Y, Y: vel.Y - w*r.X}
	m.Acc = r2.Vec{X: acc.X + al*r.Y + w2*r.X, Y: acc.Y - al*r.X + w2*r.Y}
}

// count carries the whole turns of a body on from the place that was, where it
// turned by less than half a revolution. It reports false where it turned by more
// than a quarter, so that this isn't sure.
func (s *scene) count(was *scene, body int) bool {
	s.turns[body] = was.turns[body]
	a, b := &was.m[body].Pose.Axis, &s.m[body].Pose.Axis
	return (a.Y < 0) == (b.Y < 0) || s.cross(*a, *b, body)
}

// cross counts a turn of a body that has crossed the x axis from a to b.
func (s *scene) cross(a, b r2.Vec, body int) bool {
	if (cross(a, b) > 0) == (b.Y < 0) { // past the negative x axis
		if b.Y < 0 {
			s.turns[body]++
		} else {
			s.turns[body]--
		}
	}
	return a.X*b.X+a.Y*b.Y >= 0
}

// total returns the angle of a counted body, whole turns included.
func (s *scene) total(body int) float64 {
	u := s.m[body].Pose.Axis
	return math.Atan2(u.Y+0, u.X) + rigid.Revolution*float64(s.turns[body])
}

// turned returns v turned by the angle of the unit vector u.
func turned(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X - u.Y*v.Y, Y: u.X*v.Y + u.Y*v.X}
}

// back returns v turned by minus the angle of the unit vector u.
func back(u, v r2.Vec) r2.Vec {
	return r2.Vec{X: u.X*v.X + u.Y*v.Y, Y: u.X*v.Y - u.Y*v.X}
}

// swing returns the velocity and acceleration of a spot.
func (s *scene) swing(p *spot) (vel, acc r2.Vec) {
	m := &s.m[p.body]
	return swing(m, turned(m.Pose.Axis, p.at))
}

// nearest solves an op on the branch that leaves the bodies nearest to where they
// are: by the distance of origins, and of axes on the arm of the distance of the
// dyad's pins. The first of equally near ones is taken.
func (s *scene) nearest(o solver, i int, bodies []int, branches ...branch) status {
	var rough [8]rigid.Pose
	bodies = bodies[:min(len(bodies), len(rough))]
	for n, b := range bodies {
		rough[n] = s.m[b].Pose
	}
	best, found, failed := math.Inf(1), branches[0], solved
	for _, side := range branches {
		s.branch[i] = side
		if st := o.place(s, s); st != solved && st != doubtful {
			failed = st
			continue
		}
		off := 0.0
		for n, b := range bodies {
			p := s.m[b].Pose
			off += r2.Norm2(r2.Sub(p.Origin, rough[n].Origin)) + r2.Norm2(s.guard[i].d)*r2.Norm2(r2.Sub(p.Axis, rough[n].Axis))
		}
		if off < best*(1-1e-9) {
			best, found = off, side
		}
		for n, b := range bodies {
			s.m[b].Pose = rough[n]
		}
	}
	s.branch[i] = found
	if math.IsInf(best, 1) {
		return failed
	}
	if st := o.place(s, s); st != doubtful {
		return st
	}
	return solved
}
