package planar

import (
	"errors"
	"fmt"
	"iter"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// ErrIncomplete: Modes cannot tell whether it has found every assembly mode.
var ErrIncomplete = errors.New("twopoint: assembly modes not complete")

// Modes yields every assembly mode with the drives at in, each as a State of its own
// that counts whole turns from there. Branches that don't close are left out, and so
// are those in which a redundant constraint doesn't hold; a linkage that closes in no
// way yields nothing.
//
// They come in the order of the groups: of a dyad + before −, of a parallelogram cell
// its parallel motion before its contrary one, of a group of higher class in no order
// of meaning but always the same. A dyad that is stretched or folded has one mode, not
// two. The two motions of a parallelogram cell count as two even where it is flat and
// both are in one place, for they part from there; inside a group of higher class it is
// the parallel one there. Gears and racks that are as assembled have the phase of the
// Design's Guess, or 0 without one.
//
// Modes of a group of revolutes, guides and slots are all real solutions of its
// equations. They are at most C(2L, L) for L closed loops: 2, 6, 20, 70, … For two
// loops the bound of 6 is that of Gosselin, Sefrioui and Richard (1992); the equations
// are those of Wampler (2001), in which angles are complex numbers of unit length,
// and all their complex solutions are found by continuation (from memory). That
// takes about a millisecond for two loops, five for three, and a second for six.
//
// An error stands in the place of a mode, and the modes go on after it:
//
//	rigid.ErrSingular   rates are asked for, and the drives don't determine them
//	                    there, or nowhere near
//	ErrIncomplete       there may be modes that are not among those yielded: a
//	                    group of higher class has a gear, a rack or a Constraint in it,
//	                    or more than 5 000 possible solutions, or places in which links
//	                    move with the drives held; or the search was given up, after a
//	                    million branches without a mode
//	rigid.ErrInput      a wrong number of inputs, a Linkage that no New made, or a wrong
//	                    Constraint
//	rigid.ErrNotFinite
//
// ErrIncomplete comes last. The number of modes may double with every dyad: who
// wants but some of them stops the iteration.
func (l *Linkage) Modes(in ...rigid.Coordinate) iter.Seq2[*State, error] {
	in = slices.Clone(in)
	return func(yield func(*State, error) bool) {
		if l.program == nil || len(in) != l.program.drives {
			yield(nil, rigid.ErrInput)
			return
		}
		q := search{s: newState(l), in: in, yield: yield, lacks: map[int]error{}}
		for i, c := range in {
			if c.Pos*0+c.Vel*0+c.Acc*0 != 0 {
				yield(nil, rigid.ErrNotFinite)
				return
			}
			q.moving = q.moving || c.Vel != 0 || c.Acc != 0
			q.s.now.in[i].Pos = c.Pos
		}
		for i, d := range l.design.Drives {
			if _, ok := d.(Reach); ok && in[i].Pos <= 0 {
				return // no distance
			}
		}
		q.s.build()
		if !q.from(0) {
			return
		}
		for i := range l.program.ops {
			if err := q.lacks[i]; err != nil && !yield(nil, err) {
				return
			}
		}
	}
}

// build takes the phases that are as assembled from the Design's Guess, as Assemble
// does: where the drives stand there, whole turns as in the inputs.
func (s *State) build() {
	guess := s.l.design.Guess
	if guess == nil || !slices.Contains(s.unread(), true) {
		return
	}
	t := newState(s.l)
	for i := range t.now.in {
		t.now.in[i].Pos = t.driven(i, guess)
		if _, ok := s.l.design.Drives[i].(Turn); ok {
			t.now.in[i].Pos = rigid.Nearest(t.now.in[i].Pos, s.now.in[i].Pos)
		}
	}
	if t.choose(guess) != nil {
		t.readPhases(guess)
	}
	copy(s.now.phase, t.now.phase)
}

// A search goes through the branches of the ops, depth first.
type search struct {
	s      *State // whose scene is worked on
	in     []rigid.Coordinate
	moving bool
	yield  func(*State, error) bool
	lacks  map[int]error // why ops may have more solutions
	tries  int           // branches since the last mode
}

// mostTries is how many branches are tried for one mode.
const mostTries = 1_000_000

// from solves the ops from i on, each on all its branches, and reports whether to go
// on.
func (q *search) from(i int) bool {
	sc, ops := q.s.now, q.s.l.program.ops
	for ; i < len(ops); i++ {
		switch o := ops[i].(type) {
		case branched:
			return q.sides(i, o)
		case *group:
			return q.solutions(i, o)
		case solver:
			if !closes(o.choose(sc)) {
				return true
			}
		default:
			if !closes(o.place(sc, sc)) {
				return true
			}
		}
	}
	return q.found()
}

func closes(st status) bool { return st == solved || st == doubtful }

// sides solves the ops from a dyad on, on each of its branches that leads to another
// place.
func (q *search) sides(i int, o branched) bool {
	sc := q.s.now
	branches := []branch{left, right}
	if cellular(o) {
		branches = o.(*rrr).cell.branches()
	}
	var places [][]rigid.Pose
	for _, b := range branches {
		if q.tries++; q.tries > mostTries {
			q.yield(nil, fmt.Errorf("%w: no mode among %d branches", ErrIncomplete, mostTries))
			return false
		}
		sc.branch[o.number()] = b
		if !closes(o.place(sc, sc)) {
			continue
		}
		p := posed(sc, o)
		if b != contrary && slices.ContainsFunc(places, func(q []rigid.Pose) bool { return together(p, q) }) {
			continue
		}
		places = append(places, p)
		if !q.from(i + 1) {
			return false
		}
	}
	return true
}

// posed returns the poses of a dyad's links.
func posed(sc *scene, o branched) []rigid.Pose {
	var one, two int
	switch o := o.(type) {
	case *rrr:
		one, two = o.one.body, o.two.body
	case *fused:
		one, two = o.one.body, o.two.body
	case *rrp:
		one, two = o.one.body, o.two.body
	case *rpr:
		one, two = o.one.body, o.two.body
	}
	return []rigid.Pose{sc.m[one].Pose, sc.m[two].Pose}
}

// together reports whether links have the same directions, to what rounding leaves of
// them at the least margin. The two sides of a dyad turn one of its links at least by
// the angle between the links.
func together(p, q []rigid.Pose) bool {
	for i := range p {
		if r2.Norm(r2.Sub(p[i].Axis, q[i].Axis)) > 2*rigid.LeastMargin {
			return false
		}
	}
	return true
}

// found yields the place that the scene has come to, if redundant constraints hold.
func (q *search) found() bool {
	s := q.s.Clone()
	s.settle()
	switch err := s.begin(); {
	case errors.Is(err, ErrInconsistent):
		return true
	case err != nil:
		return q.yield(nil, err)
	}
	q.tries = 0
	if q.moving {
		copy(s.now.in, q.in)
		copy(s.to, q.in)
		if op := s.l.program.rate(s.now); op < len(s.l.program.ops) {
			return q.yield(nil, s.l.program.fault(op, singular))
		}
	}
	return q.yield(s, nil)
}

// solutions solves the ops from a group on, at each of its solutions.
func (q *search) solutions(i int, o *group) bool {
	sc := q.s.now
	d := &sc.desks[o.at]
	d.still()
	places, err := o.n.solutions(sc, d)
	if err != nil && q.lacks[i] == nil {
		q.lacks[i] = &groupError{q.s.l.names(q.s.l.program.groupOf[i]), fmt.Errorf("%w: %w", ErrIncomplete, err)}
	}
	var seen [][]float64
	for _, at := range places {
		if q.tries++; q.tries > mostTries {
			q.yield(nil, fmt.Errorf("%w: no mode among %d branches", ErrIncomplete, mostTries))
			return false
		}
		o.n.unfold(sc, d, at)
		if n := len(seen); len(o.n.cells) > 0 {
			if seen = o.n.gather(seen, d, o.n.extent(d)); len(seen) == n {
				continue
			}
		}
		d.factor()
		o.n.pose(sc, d)
		if !q.from(i + 1) {
			return false
		}
	}
	return true
}

// names returns the names of a group's links.
func (l *Linkage) names(group int) (names []string) {
	if group < 0 {
		return nil
	}
	for _, k := range l.program.groups[group].Links {
		names = append(names, l.design.Links[k])
	}
	return names
}
