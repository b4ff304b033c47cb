package planar

import (
	"math"

	"example.com/twopoint/rigid"
)

// A walk goes along the path of a Move in steps.
type walk struct {
	*State
	from, to *scene
	t        float64 // how far along the path from is
	legs     [mostHalvings + 1]leg
	top      int
	suspect  suspect
	paced    int  // the first op without path rates at the end of the last step, −1 where none were solved
	close    bool // whether the last step was cut as it is next to a limit
	failed   bool // whether the last step was too long
}

// A leg is a step that lies ahead: its end, and how often it has been halved.
type leg struct {
	t     float64
	depth int
}

// A suspect is the condition for a dyad to close that had the walk cut a step, what
// it was expected to be there, and by how much that was wrong.
type suspect struct {
	op, room  int
	predicted float64
	off       float64
	size      float64 // of the motion of the drives in the step
	pending   bool
}

// walk moves the State to s.to in n equal steps, or more. In none it stays where it is,
// and only its rates change.
func (s *State) walk(n int, moving bool) error {
	w := walk{State: s, from: s.spare, to: s.next, paced: -1}
	w.from.set(s.now)
	w.suspect.op = -1
	steps := 0
	for part := 1; part <= n; part++ {
		w.legs[0], w.top = leg{t: float64(part) / float64(n)}, 0
		for w.top >= 0 {
			l := &w.legs[w.top]
			st, op, cut := w.step(l.t)
			w.failed = st == tooLong
			switch st {
			case solved:
				if steps++; steps > mostSteps {
					s.stop = stop{err: ErrTooFar, op: -1, done: w.t, blocked: l.t}
					return ErrTooFar
				}
				w.t = l.t
				w.from, w.to = w.to, w.from
				w.top--
			case tooLong:
				if l.depth == mostHalvings || w.top == mostHalvings {
					return s.fail(op, s.l.program.stuck(op, w.from), w.t, l.t, w.to)
				}
				if !w.close {
					l.depth++
				}
				w.top++
				w.legs[w.top] = leg{w.t + cut*(l.t-w.t), l.depth}
			default:
				if st == singular {
					st, op = w.beyond(l.t, op)
				}
				return s.fail(op, st, w.t, l.t, w.to)
			}
		}
	}
	path, ops := 0.0, len(s.l.program.ops)
	if len(s.to) == 1 {
		path = w.from.in[0].Vel
	}
	copy(w.from.in, s.to)
	if !moving {
		w.from.rest()
		return s.accept(w.from)
	}
	if path != 0 && w.paced == ops {
		w.from.drive(path, s.to[0])
		return s.accept(w.from)
	}
	if op := s.l.program.rate(w.from); op < ops {
		return s.fail(op, singular, 1, 1, w.from)
	}
	return s.accept(w.from)
}

// rate solves all rates, and returns the first op whose rates are not determined.
func (p *program) rate(sc *scene) int {
	first := len(p.ops)
	for i, o := range p.ops {
		if !o.rates(sc) {
			first = min(first, i)
		}
	}
	return first
}

// step tries to go to the place t of the path: solved, or tooLong with the part of
// the step at which to cut it.
func (w *walk) step(t float64) (st status, op int, cut float64) {
	p := w.l.program
	size := 0.0
	w.paced, w.close = -1, false
	for i := range w.to.in {
		a, b := w.now.in[i].Pos, w.State.to[i].Pos
		pos := a + t*(b-a)
		if t == 1 {
			pos = b
		}
		d := (t - w.t) * (b - a)
		size = math.Max(size, math.Abs(d)*p.perStep[i]*longestTurn)
		w.to.in[i] = rigid.Coordinate{Pos: pos, Vel: d}
		w.from.in[i].Vel, w.from.in[i].Acc = d, 0
	}
	rated, fresh := len(p.ops), false
	if len(p.newtons) > 0 && !(len(w.to.in) == 1 && w.from.foresee(w.to.in[0].Vel)) {
		w.from.rest()
		rated, fresh = p.rate(w.from), true
	}
	if st, op = w.place(); st != solved {
		return st, op, w.pace()
	}
	if w.suspect.pending {
		w.judge()
	}
	if op, ok := w.parting(t); ok {
		return singular, op, 0
	}
	if len(w.doubt) == 0 && len(p.newtons) == 0 {
		return solved, 0, 0
	}
	if !fresh && len(w.doubt) > 0 {
		w.from.rest()
		rated = p.rate(w.from)
	}
	w.to.rest()
	w.paced = p.rate(w.to)
	rated = min(rated, w.paced)
	if op, cut, ok := w.crossed(size, rated); ok {
		return tooLong, op, cut
	}
	for i, o := range p.ops {
		if g, ok := o.(*group); ok && rated == len(p.ops) && !g.n.agrees(&w.to.desks[g.at], &w.from.desks[g.at]) {
			return tooLong, i, w.pace()
		}
	}
	return solved, 0, 0
}

// place solves the place of to, and gathers the ops that may have crossed a gap.
func (w *walk) place() (status, int) {
	w.doubt = w.doubt[:0]
	for i, o := range w.l.program.ops {
		switch st := o.place(w.from, w.to); st {
		case solved:
		case doubtful:
			w.doubt = append(w.doubt, i)
		default:
			return st, i
		}
	}
	return solved, 0
}

// crossed looks for a gap in the step, by the cubic through both ends of each
// condition for a dyad to close. It may be off by
//
//	h⁴/384 × the fourth derivative
//
// taken as four times the condition's size for h in rad, by what its bends tell, and
// by what it was off at the last trial.
func (w *walk) crossed(h float64, rated int) (op int, cut float64, ok bool) {
	for _, i := range w.doubt {
		if i > rated {
			return i, w.pace(), true // no path rates here: cut until the guard is content
		}
		o := w.l.program.ops[i].(crosser)
		a, n := o.rooms(w.from)
		b, _ := o.rooms(w.to)
		for k := range n {
			path := through(a[k], b[k])
			at, value, dips := path.dip()
			if !dips {
				continue
			}
			off := math.Max(h*h*h*h/96*a[k].size, path.off(a[k], b[k]))
			if w.suspect.op == i && w.suspect.room == k {
				off = math.Max(off, 4*w.suspect.off)
			}
			if value > off {
				continue
			}
			if off > a[k].size { // next to a limit of another dyad: the cubic tells nothing
				return i, w.pace(), true
			}
			w.suspect = suspect{op: i, room: k, predicted: value, off: w.suspect.off, size: a[k].size, pending: true}
			return i, min(max(at, 1./16), 15./16), true
		}
	}
	return 0, 0, false
}

// judge compares the condition that had the step cut with what it was expected to be.
func (w *walk) judge() {
	s := &w.suspect
	s.pending = false
	r, _ := w.l.program.ops[s.op].(crosser).rooms(w.to)
	s.off = math.Abs(r[s.room].value - s.predicted)
}

// parting looks for a dyad that is flattened on the way, where two motions part.
func (w *walk) parting(t float64) (op int, ok bool) {
	const flat = 1e-7
	if t == 1 {
		return 0, false
	}
	for _, i := range w.doubt {
		if w.l.program.ops[i].(crosser).margin(w.to) < flat {
			return i, true
		}
	}
	return 0, false
}

// beyond tells what a dyad is that lies flat at t: one that ends the way, where the
// loop doesn't close a step further, or one where two motions part.
func (w *walk) beyond(t float64, op int) (status, int) {
	far := min(1, t+(t-w.t))
	w.from, w.to = w.to, w.from
	for i := range w.to.in {
		a, b := w.now.in[i].Pos, w.State.to[i].Pos
		w.to.in[i].Pos = a + far*(b-a)
	}
	if st, at := w.place(); st == unreachable {
		return st, at
	}
	return singular, op
}
