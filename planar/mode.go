package planar

import (
	"fmt"

	"example.com/twopoint/rigid"
)

// branched is a solver that is assembled on a branch.
type branched interface {
	solver
	number() int
}

func (o *rrr) number() int   { return o.i }
func (o *fused) number() int { return o.i }
func (o *rrp) number() int   { return o.i }
func (o *rpr) number() int   { return o.i }

// Mode returns the assembly mode: one rune for each of Linkage.Groups, in order.
//
//	rune     group
//	+ or -   the side of a dyad
//	= or x   a parallelogram cell in its parallel or its contrary motion
//	.        one solution
//	?        a group of higher class
//
// A dyad is + where its middle pin lies left of the line from the first link's outer
// pin to the second's, the slider pin ahead of the rod's outer pin along the guide,
// or the block ahead of the slotted link's pin along the slot. The - is a hyphen;
// AssembleMode takes the minus sign − for it too.
func (s *State) Mode() string {
	if s.l == nil {
		return ""
	}
	mode := make([]rune, len(s.l.program.groups))
	for i := range mode {
		mode[i] = '.'
	}
	for i, o := range s.l.program.ops {
		g := s.l.program.groupOf[i]
		if g < 0 {
			continue
		}
		switch o := o.(type) {
		case *group:
			if !o.linear {
				mode[g] = '?'
			}
		case branched:
			r := runes[s.now.branch[o.number()]]
			if mode[g] != '.' {
				r = '?'
			}
			mode[g] = r
		}
	}
	return string(mode)
}

var runes = map[branch]rune{left: '+', right: '-', parallel: '=', contrary: 'x'}

// AssembleMode puts the linkage together in the assembly mode that State.Mode
// names, with the drives at in. It returns an error that wraps rigid.ErrInput for a
// mode that the linkage doesn't have, and for a group of higher class, whose modes
// have no names; rigid.ErrUnreachable where the mode doesn't close at in.
func (l *Linkage) AssembleMode(mode string, in ...rigid.Coordinate) (*State, error) {
	if l.program == nil || len(in) != l.program.drives {
		return nil, rigid.ErrInput
	}
	s := newState(l)
	if err := s.setMode([]rune(mode)); err != nil {
		return nil, err
	}
	for i, c := range in {
		if c.Pos*0+c.Vel*0+c.Acc*0 != 0 {
			return nil, rigid.ErrNotFinite
		}
		s.now.in[i].Pos = c.Pos
	}
	if !l.extended(in) {
		return nil, rigid.ErrUnreachable
	}
	s.build()
	for i, o := range l.program.ops {
		if st := o.place(s.now, s.now); st != solved && st != doubtful {
			return nil, l.program.fault(i, st)
		}
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

func (s *State) setMode(mode []rune) error {
	p := s.l.program
	if len(mode) != len(p.groups) {
		return fmt.Errorf("%w: a mode of %d runes for %d groups", rigid.ErrInput, len(mode), len(p.groups))
	}
	used := make([]bool, len(mode))
	for i, o := range p.ops {
		g := p.groupOf[i]
		if g < 0 {
			continue
		}
		o, ok := o.(branched)
		if !ok {
			continue
		}
		used[g] = true
		b, ok := named(mode[g])
		if !ok || (b > left) != cellular(o) {
			return fmt.Errorf("%w: group %d can't have mode %q", rigid.ErrInput, g, mode[g])
		}
		s.now.branch[o.number()] = b
	}
	for g, m := range mode {
		if !used[g] && m != '.' {
			return fmt.Errorf("%w: group %d can't have mode %q", rigid.ErrInput, g, m)
		}
	}
	return nil
}

func named(r rune) (branch, bool) {
	for b, name := range runes {
		if name == r {
			return b, true
		}
	}
	return right, r == '−'
}

// cellular reports whether an op is a parallelogram cell.
func cellular(o branched) bool {
	r, ok := o.(*rrr)
	return ok && r.cell != nil
}
