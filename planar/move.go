package planar

import (
	"math"

	"example.com/twopoint/rigid"
)

// A Move is cut into steps of at most these, and may take so many of them, each
// halved so often.
const (
	longestTurn  = 0.25 // rad
	longestSlide = 0.25 // of the largest length
	mostSteps    = 256
	mostHalvings = 12
)

// Move moves the drives to the places in, one for each drive, with the velocities
// and accelerations given there. Inputs are literal: 0 and 2π differ by a turn, so
// a caller with a wrapped angle passes rigid.Nearest(angle, last).
//
// The linkage goes along the straight path from the inputs before to these, and
// stays in its assembly mode: it never jumps. No velocity or acceleration asks for
// the place alone, with all rates zero; that is answered at a limit of a drive too, to
// which a group of higher class comes as near as a margin of 1e-7.
//
// Errors leave the State as it was, and Stop tells more. They wrap
// rigid.ErrUnreachable where a group can't follow, at the place given or on the
// way; rigid.ErrSingular where the rates are not determined, or two motions part on
// the way; ErrInconsistent where a redundant constraint is broken. They are
// ErrTooFar for a path of more than 256 steps, of 0.25 rad or a quarter of the
// largest length each, or where a step would have to be halved more than 12 times;
// rigid.ErrInput for a wrong number of inputs; rigid.ErrNotFinite.
//
// Move doesn't allocate, even when it fails.
func (s *State) Move(in ...rigid.Coordinate) error {
	if s.l == nil {
		return rigid.ErrInput
	}
	if len(in) != len(s.to) {
		s.stop = stop{err: rigid.ErrInput, op: -1}
		return rigid.ErrInput
	}
	p := s.l.program
	finite, moving, steps := 0.0, false, 0.0
	for i := range in {
		c := &in[i]
		finite += c.Pos*0 + c.Vel*0 + c.Acc*0
		moving = moving || c.Vel != 0 || c.Acc != 0
		steps = max(steps, math.Abs(c.Pos-s.now.in[i].Pos)*p.perStep[i])
		s.to[i], s.next.in[i] = *c, *c
	}
	s.stop = stop{}
	if finite != 0 { // NaN
		s.stop = stop{err: rigid.ErrNotFinite, op: -1}
		return rigid.ErrNotFinite
	}
	if !s.l.extended(in) {
		s.stop = stop{err: rigid.ErrUnreachable, op: -1, blocked: 1}
		return s.stop.err
	}
	if steps > mostSteps {
		s.stop = stop{err: ErrTooFar, op: -1}
		return ErrTooFar
	}
	if steps <= 1 && len(p.newtons) == 0 {
		st, op := p.solve(s.now, s.next, moving)
		if st == solved {
			return s.accept(s.next)
		}
		if st == unreachable || st == singular {
			return s.fail(op, st, 0, 1, s.next)
		}
	}
	return s.walk(int(math.Ceil(steps)), moving)
}

// extended reports whether every driven distance is one: greater than 0.
func (l *Linkage) extended(in []rigid.Coordinate) bool {
	for i, d := range l.design.Drives {
		if _, ok := d.(Reach); ok && in[i].Pos <= 0 {
			return false
		}
	}
	return true
}

// solve runs the ops: places, and rates if moving.
func (p *program) solve(was, to *scene, moving bool) (status, int) {
	if !moving {
		for i, o := range p.ops {
			if st := o.place(was, to); st != solved {
				return st, i
			}
		}
		to.rest()
		return solved, 0
	}
	for i, o := range p.ops {
		if st := o.move(was, to); st != solved {
			return st, i
		}
	}
	return solved, 0
}

// accept makes a scene the State's place, if its numbers are finite and the redundant
// constraints hold there.
func (s *State) accept(to *scene) error {
	if !to.finite() {
		s.stop = stop{err: rigid.ErrNotFinite, op: -1, done: 1, blocked: 1}
		return s.stop.err
	}
	for i := range s.l.program.checks {
		if miss := s.l.program.miss(i, to); !(miss <= s.most[i]) {
			s.stop = stop{err: s.l.program.breaches[i], op: -1, gap: miss, blocked: 1}
			return s.stop.err
		}
	}
	if to == s.next {
		s.now, s.next = s.next, s.now
	} else {
		s.now, s.spare = s.spare, s.now
	}
	return nil
}
