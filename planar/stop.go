package planar

import (
	"slices"

	"example.com/twopoint/rigid"
)

// A Stop tells why and where a Move stopped.
type Stop struct {
	Err   error   // what Move returned
	Group int     // index into Linkage.Groups of the group that can't follow, or −1
	Links []Link  // its links
	Done  float64 // how far along the path, from 0 to 1, the linkage can go; within 1e-9 short of the obstacle. 0 for no path, or one too long
	Gap   float64 // m: how far the group's loop is from closing where the Move last tried; 0 where it closes
}

// stop is what Move notes when it fails.
type stop struct {
	err           error
	op            int // or −1
	done, blocked float64
	gap           float64
}

// fail notes why the linkage can't go from done to blocked, and returns the error.
func (s *State) fail(op int, st status, done, blocked float64, tried *scene) error {
	err, _ := s.l.program.faultAt(op, st, tried)
	s.stop = stop{err: err, op: op, done: done, blocked: blocked}
	if o, ok := s.l.program.ops[op].(solver); ok && st == unreachable {
		s.stop.gap = o.gap(tried)
	}
	return s.stop.err
}

// Stop returns why the last Move failed, false if it didn't. It finds how far the
// linkage can go by trying, so it takes as long as some dozens of Moves, and
// allocates; the State stays as it is.
func (s *State) Stop() (Stop, bool) {
	if s.stop.err == nil {
		return Stop{}, false
	}
	at := s.stop
	out := Stop{Err: at.err, Group: -1, Done: at.done, Gap: at.gap}
	if at.op >= 0 {
		out.Group = s.l.program.groupOf[at.op]
	}
	if out.Group >= 0 {
		out.Links = slices.Clone(s.l.program.groups[out.Group].Links)
	}
	if at.blocked > at.done {
		out.Done = s.reach(at.done, at.blocked)
	}
	s.stop = at
	return out, true
}

// reach finds how far along the path of the last Move the linkage can go, between a
// part known to be free and one known not to be.
func (s *State) reach(free, blocked float64) float64 {
	const tries = 40
	far := slices.Clone(s.to)
	from := s.Clone()
	for range tries {
		if blocked-free < 1e-9 {
			break
		}
		mid := (free + blocked) / 2
		for i := range s.to {
			s.to[i] = rigid.Coordinate{Pos: s.now.in[i].Pos + mid*(far[i].Pos-s.now.in[i].Pos)}
		}
		if from.Move(s.to...) == nil {
			free = mid
		} else {
			blocked = mid
		}
	}
	copy(s.to, far)
	return free
}
