package planar

import "fmt"

// drive writes the equations of the drives.
func (b *builder) drive(pins *pins) error {
	drives := map[Drive]int{}
	for i, m := range b.d.Drives {
		joint := len(b.d.Joints) + i
		if l := b.d.linksOf(joint); b.seats[l[0]].body == b.seats[l[1]].body {
			return b.refuse(fmt.Errorf("%w: a drive of links fixed to each other", ErrOverconstrained), joint)
		}
		switch m := m.(type) {
		case Turn:
			of, from := b.seats[m.Of], b.seats[m.From]
			b.turn(turnRow{
				of:    newForm(formTerm{of.body, one}, formTerm{from.body, one.negative()}),
				value: from.local.Angle() - of.local.Angle(), joint: joint, drive: i,
			})
		case Slide:
			r := b.along(rowSlide, m.From, m.Of, joint)
			r.drive = i
			b.rows = append(b.rows, r)
		case Reach:
			if err := b.reach(pins, m, i); err != nil {
				return err
			}
		}
		m = oneWay(m)
		if first, ok := drives[m]; ok {
			return b.refuse(fmt.Errorf("%w: two drives of one motion", ErrOverconstrained), len(b.d.Joints)+first, joint)
		}
		drives[m] = i
	}
	return nil
}

// oneWay returns a drive that is the same from both sides with the lower link first.
func oneWay(m Drive) Drive {
	switch m := m.(type) {
	case Turn:
		return Turn{Of: max(m.Of, m.From), From: min(m.Of, m.From)}
	case Reach:
		if m.B.Link < m.A.Link {
			return Reach{A: m.B, B: m.A}
		}
	}
	return m
}

// reach pins the hidden barrel and rod and drives one along the other.
func (b *builder) reach(pins *pins, m Reach, drive int) error {
	joint := len(b.d.Joints) + drive
	first := b.hiddenOf(joint)
	barrel, rod := first.Line(0, 0, 0), (first+1).Line(0, 0, 0)
	if err := b.hinge(pins, m.A, first.At(0, 0), joint); err != nil {
		return err
	}
	if err := b.hinge(pins, m.B, (first+1).At(0, 0), joint); err != nil {
		return err
	}
	if err := b.guide(pins, Prismatic{A: barrel, B: rod}, joint); err != nil {
		return err
	}
	r := b.along(rowSlide, barrel, rod, joint)
	r.drive = drive
	b.rows = append(b.rows, r)
	return nil
}
