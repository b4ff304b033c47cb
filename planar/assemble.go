package planar

import (
	"fmt"
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// Assemble puts the linkage together from a rough position: one placement for each
// link, of which guess[0] is not read; nil stands for the Design's Guess. The drives
// are at in exactly, with the rates given there.
//
// Of several assembly modes it is the one that the linkage gets to from the guess:
// the groups are put together where the drives stand in the guess, each nearest to
// where its links are there, and the drives then moved to in. Where that fails they
// are put together at in, in the same way.
//
// The error tells which links stay apart and by how far. It wraps
// rigid.ErrUnreachable, rigid.ErrSingular (rates at a singular position),
// rigid.ErrInput (a wrong number of placements or inputs, no guess at all, a
// Linkage that no New made), rigid.ErrNotFinite or ErrTooFar.
func (l *Linkage) Assemble(guess []rigid.Placement, in ...rigid.Coordinate) (*State, error) {
	if guess == nil && l.program != nil {
		guess = l.design.Guess
	}
	switch {
	case l.program == nil:
		return nil, rigid.ErrInput
	case guess == nil:
		return nil, fmt.Errorf("%w: no guess, and none in the design", rigid.ErrInput)
	case len(guess) != l.program.system.links:
		return nil, fmt.Errorf("%w: %d placements for %d links", rigid.ErrInput, len(guess), l.program.system.links)
	case len(in) != l.program.drives:
		return nil, fmt.Errorf("%w: %d inputs for %d drives", rigid.ErrInput, len(in), l.program.drives)
	}
	sum := 0.0
	for _, c := range in {
		sum += c.Pos*0 + c.Vel*0 + c.Acc*0
	}
	for _, g := range guess[1:] {
		sum += g.X*0 + g.Y*0 + g.Angle*0
	}
	if sum != 0 {
		return nil, rigid.ErrNotFinite
	}
	if !l.extended(in) {
		return nil, rigid.ErrUnreachable
	}
	s := newState(l)
	for i := range in {
		s.now.in[i].Pos = rigid.Nearest(s.driven(i, guess), in[i].Pos)
		if _, ok := l.design.Drives[i].(Turn); !ok {
			s.now.in[i].Pos = s.driven(i, guess)
		}
	}
	if s.choose(guess) == nil {
		s.settle()
		if s.Move(in...) == nil && s.begin() == nil {
			return s, nil
		}
	}
	for i, c := range in {
		s.now.in[i] = rigid.Coordinate{Pos: c.Pos}
	}
	if err := s.choose(guess); err != nil {
		return nil, err
	}
	s.settle()
	if err := s.Move(in...); err != nil {
		return nil, err
	}
	if err := s.begin(); err != nil {
		return nil, err
	}
	return s, nil
}

// choose solves the ops one after another from rough poses, each on the branch that
// is nearest.
func (s *State) choose(guess []rigid.Placement) error {
	s.rough(guess)
	s.readPhases(guess)
	sc := s.now
	unread := s.unread()
	for i, o := range s.l.program.ops {
		st := solved
		if r, ok := o.(reader); ok {
			r.read(sc, unread)
		}
		if v, ok := o.(solver); ok {
			st = v.choose(sc)
		} else {
			st = o.place(sc, sc)
		}
		if st != solved {
			err, own := s.l.program.faultAt(i, st, sc)
			if own != nil {
				return fmt.Errorf("%w: %w", err, own)
			}
			if v, ok := o.(solver); ok && st == unreachable {
				err = fmt.Errorf("%w: they stay %.3g m apart", err, v.gap(sc))
			}
			return err
		}
	}
	return nil
}

// rough puts bodies and free angles where the guess has them.
func (s *State) rough(guess []rigid.Placement) {
	p := s.l.program
	sc := s.now
	for i := range sc.meets {
		sc.meets[i].Kappa = 0
	}
	for i := range sc.turns {
		sc.turns[i] = 0
	}
	clear(sc.work)
	for l := len(guess) - 1; l > 0; l-- {
		if t := p.seats[l]; t.body > 0 {
			sc.m[t.body].Pose = guess[l].Pose().Compose(t.local.Inverse())
		}
	}
	at := func(a Attachment) r2.Vec {
		if a.Link == Frame {
			return r2.Vec{X: a.X, Y: a.Y}
		}
		return guess[a.Link].Pose().Point(r2.Vec{X: a.X, Y: a.Y})
	}
	for i, h := range p.hidden {
		body := p.seats[p.system.links+i].body
		if h.part == slotBlock {
			p.roughBlock(sc, body)
			continue
		}
		m := &sc.m[body]
		j := s.l.design.Drives[h.joint-len(s.l.design.Joints)].(Reach)
		a, b := at(j.A), at(j.B)
		m.Pose = rigid.NewPose(a.X, a.Y, math.Atan2(b.Y-a.Y, b.X-a.X))
		if h.part == rod {
			m.Pose.Origin = b
		}
	}
	for k, b := range p.free {
		sc.psi[k] = rigid.Coordinate{Pos: sc.m[b].Pose.Angle()}
	}
}

// roughBlock puts the hidden block of a slot at its pin, along the slot.
func (p *program) roughBlock(sc *scene, block int) {
	for i := range p.rows {
		r := &p.rows[i]
		own, other := spot{r.b, r.pb}, spot{r.a, r.pa}
		if r.a == block {
			own, other = other, own
		}
		switch {
		case own.body != block:
		case r.kind == rowX:
			sc.hang(&own, sc.place(&other))
		case r.kind == rowGuide:
			turn := p.angles[block].Const - p.angles[other.body].Const
			sc.m[block].Pose.Axis = rotate(sc.m[other.body].Pose.Axis, turn)
		}
	}
}

// guessed returns where a guess has a link.
func (s *State) guessed(guess []rigid.Placement, l Link) rigid.Pose {
	if l == Frame {
		return rigid.NewPose(0, 0, 0)
	}
	return guess[l].Pose()
}

// driven returns where a guess has a drive.
func (s *State) driven(i int, guess []rigid.Placement) float64 {
	at := func(l Link, x, y float64) r2.Vec { return s.guessed(guess, l).Point(r2.Vec{X: x, Y: y}) }
	angle := func(l Link) float64 { return guessedAngle(guess, l) }
	switch d := s.l.design.Drives[i].(type) {
	case Turn:
		return angle(d.Of) - angle(d.From)
	case Slide:
		u := s.guessed(guess, d.From.Link).Compose(rigid.NewPose(0, 0, d.From.Angle)).Axis
		return r2.Dot(u, r2.Sub(at(d.Of.Link, d.Of.X, d.Of.Y), at(d.From.Link, d.From.X, d.From.Y)))
	case Reach:
		return r2.Norm(r2.Sub(at(d.A.Link, d.A.X, d.A.Y), at(d.B.Link, d.B.X, d.B.Y)))
	}
	return 0
}

// settle makes the place that choose found the State's.
func (s *State) settle() {
	s.now.rest()
	copy(s.to, s.now.in)
}

// begin counts whole turns from here: angles are principal values. A gear on a
// link that has passed half a turn on the way here, which was counted until now,
// stands otherwise then.
func (s *State) begin() error {
	p, turned := s.l.program, false
	for i, n := range s.now.turns {
		turned = turned || n != 0
		s.now.turns[i] = 0
	}
	if turned && p.geared {
		unread := s.unread()
		for i, o := range p.ops {
			if r, ok := o.(reader); ok {
				r.read(s.now, unread)
			}
			if st := o.place(s.now, s.now); st != solved && st != doubtful {
				return p.fault(i, st)
			}
		}
		if err := s.Move(slices.Clone(s.to)...); err != nil {
			return err
		}
	}
	for b := range s.start {
		s.start[b] = p.whole[b].value(s.now)
	}
	if err := s.check(); err != nil {
		return err
	}
	if err := s.tied(); err != nil {
		return err
	}
	return s.lively()
}

// lively refuses a linkage that is singular wherever it goes, by its dimensions.
func (s *State) lively() error {
	const flat = 1e-7
	if s.Margin() >= flat {
		return nil
	}
	c, moved := s.Clone(), false
	for _, part := range []float64{0.01, -0.01, 0.02, -0.02} { // of a step
		in := s.Inputs()
		for i := range in {
			in[i] = rigid.Coordinate{Pos: in[i].Pos + part/s.l.program.perStep[i]}
		}
		if c.Move(in...) != nil {
			continue
		}
		if moved = true; c.Margin() >= flat {
			return nil
		}
	}
	if !moved {
		return nil
	}
	for i, o := range s.l.program.ops {
		if o, ok := o.(solver); ok && o.margin(s.now) < flat {
			return fmt.Errorf("%w, here and on", s.l.program.fault(i, singular))
		}
	}
	return nil
}
