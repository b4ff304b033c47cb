package planar

import (
	"errors"
	"fmt"

	"example.com/twopoint/rigid"
)

// A Dimension is one physical dimension of a machine: every number of a Design that
// changes with it, each by as much. A hole that two revolutes use stands in both;
// Hole finds all its entries.
//
// A radius acts by the ratio, or as the pinion's rolling radius, alone: where the
// centres move with it their holes are further entries. A GearPair with teeth has no
// entry for its radii, for the teeth make the ratio.
type Dimension struct{ Of []Entry }

// An Entry is one number of a Design.
type Entry struct {
	// Joint is an index into Design.Joints, counting on through Drives:
	// len(Joints)+i is drive i. In a calibration it counts on through the outputs.
	Joint int
	End   End
	Part  Part
}

// An End is a side of a joint or drive. In a SlidingPin A is the Pin and B the Slot,
// in a RackPair A is the Pinion and B the Rack, in a Turn or Slide A is Of and B
// From. For a radius or a phase it is not read.
type End uint8

// The ends of a joint; only a GearPair has an Arm.
const (
	A End = iota
	B
	Arm
)

// A Part tells which number of an end.
//
//	X, Y      of a point, m in its link's axes
//	Angle     of a line, rad; of the mark from which a GearPair or a driven Turn
//	          counts the turn of a link, though no field shows it
//	RadiusA   of a GearPair; the Radius of a RackPair, m
//	RadiusB   of a GearPair, m
//	Phase     of a GearPair, rad, or a RackPair, m. Of a drive, what is added to the
//	          input, rad or m: the zero of its encoder, though no field shows it
type Part uint8

// The parts of an end.
const (
	X Part = iota
	Y
	Angle
	RadiusA
	RadiusB
	Phase
)

// Hole returns the dimension of which every entry is part p of an attachment equal
// to a, or of a line that starts there. It has no entries where there is none.
func (d *Design) Hole(a Attachment, p Part) Dimension {
	var m Dimension
	for i := range len(d.Joints) + len(d.Drives) {
		for _, end := range [...]End{A, B} {
			l, ok := d.end(i, end)
			if ok && l.Link.At(l.X, l.Y) == a && d.has(Entry{i, end, p}) && p <= Angle {
				m.Of = append(m.Of, Entry{Joint: i, End: end, Part: p})
			}
		}
	}
	return m
}

// Zero returns the dimension that is added to the input of a drive: the zero of its
// encoder. In a calibration len(Drives)+i is output i.
func (d *Design) Zero(drive int) Dimension {
	return Dimension{[]Entry{{Joint: len(d.Joints) + drive, Part: Phase}}}
}

// at returns joint i, which counts on through the drives.
func (d *Design) at(i int) any {
	switch {
	case i < 0 || i >= len(d.Joints)+len(d.Drives):
		return nil
	case i < len(d.Joints):
		return d.Joints[i]
	}
	return d.Drives[i-len(d.Joints)]
}

// end returns an end of a joint or drive that is a point or a line.
func (d *Design) end(i int, e End) (Line, bool) {
	a, b, ok := ends(d.at(i))
	if e == B {
		a = b
	}
	return a, ok && e <= B
}

// ends returns the ends of a joint or drive as lines, false where it has no points.
func ends(j any) (a, b Line, ok bool) {
	line := func(a Attachment) Line { return a.Link.Line(a.X, a.Y, 0) }
	switch j := j.(type) {
	case Revolute:
		return line(j.A), line(j.B), true
	case Prismatic:
		return j.A, j.B, true
	case SlidingPin:
		return line(j.Pin), j.Slot, true
	case Fixed:
		return j.A, j.B, true
	case RackPair:
		return line(j.Pinion), j.Rack, true
	case Slide:
		return j.Of, j.From, true
	case Reach:
		return line(j.A), line(j.B), true
	}
	return Line{}, Line{}, false
}

// has reports whether the design, its drives' zeros included, has an entry.
func (d *Design) has(e Entry) bool { return has(d.at(e.Joint), e) }

func has(j any, e Entry) bool {
	switch j := j.(type) {
	case Revolute:
		return e.End <= B && e.Part <= Y
	case Prismatic, Fixed:
		return e.End <= B && e.Part <= Angle
	case SlidingPin:
		return e.End <= B && (e.Part <= Y || e.Part == Angle && e.End == B)
	case GearPair:
		return e.Part == Angle && e.End <= Arm || e.Part == Phase || (e.Part == RadiusA || e.Part == RadiusB) && j.TeethA == 0
	case RackPair:
		return e.End <= B && (e.Part <= Y || e.Part == Angle && e.End == B) || e.Part == RadiusA || e.Part == Phase
	case Turn:
		return e.Part == Angle && e.End <= B || e.Part == Phase
	case Slide:
		return e.End <= B && e.Part <= Angle || e.Part == Phase
	case Reach:
		return e.End <= B && e.Part <= Y || e.Part == Phase
	}
	return false
}

// With returns a copy of the design with every entry of the dimension greater by the
// number given, in m or rad. The error wraps ErrReference for an entry that does not
// exist, rigid.ErrInput for one that no field holds: the zero of a drive.
func (d *Design) With(m Dimension, by float64) (Design, error) {
	c := d.clone()
	for _, e := range m.Of {
		if !d.has(e) {
			return Design{}, fmt.Errorf("%w: %v", ErrReference, e)
		}
		if err := c.add(e, by); err != nil {
			return Design{}, fmt.Errorf("%w: %v", err, e)
		}
	}
	return c, nil
}

// String returns the entry as "joint 2, a, x".
func (e Entry) String() string { return fmt.Sprintf("joint %d, %v, %v", e.Joint, e.End, e.Part) }

var errNoField = errors.New("no field")

// add changes an entry in place.
func (d *Design) add(e Entry, by float64) error {
	if e.Joint < len(d.Joints) {
		j, ok := added(d.Joints[e.Joint], e, by)
		if ok {
			d.Joints[e.Joint] = j.(Joint)
			return nil
		}
	} else if m, ok := added(d.Drives[e.Joint-len(d.Joints)], e, by); ok {
		d.Drives[e.Joint-len(d.Joints)] = m.(Drive)
		return nil
	}
	return fmt.Errorf("%w: %w", rigid.ErrInput, errNoField)
}

// added returns a joint or drive with an entry, which it has, greater by a number;
// false where no field holds it.
func added(j any, e Entry, by float64) (any, bool) {
	switch j := j.(type) {
	case Revolute:
		return j, inPoint(pick(e.End, &j.A, &j.B), e.Part, by)
	case Prismatic:
		return j, inLine(pick(e.End, &j.A, &j.B), e.Part, by)
	case Fixed:
		return j, inLine(pick(e.End, &j.A, &j.B), e.Part, by)
	case SlidingPin:
		if e.End == A {
			return j, inPoint(&j.Pin, e.Part, by)
		}
		return j, inLine(&j.Slot, e.Part, by)
	case GearPair:
		j.add(e, by)
		return j, true
	case RackPair:
		switch {
		case e.Part == Phase:
			j.Phase += by
		case e.Part == RadiusA:
			j.Radius += by
		case e.End == A:
			return j, inPoint(&j.Pinion, e.Part, by)
		default:
			return j, inLine(&j.Rack, e.Part, by)
		}
		return j, true
	case Slide:
		return j, inLine(pick(e.End, &j.Of, &j.From), e.Part, by)
	case Reach:
		return j, inPoint(pick(e.End, &j.A, &j.B), e.Part, by)
	}
	return j, false
}

// add changes an entry. That of the mark of a link acts on the phase, by
//
//	(θB + b) − ρ (θA + a) + (ρ − 1) (θarm + m) = Phase
func (g *GearPair) add(e Entry, by float64) {
	switch e.Part {
	case RadiusA:
		g.RadiusA += by
	case RadiusB:
		g.RadiusB += by
	case Phase:
		g.Phase += by
	default:
		g.Phase -= g.marks()[e.End] * by
	}
}

// marks returns the coefficients of the turns of A, B and the arm.
func (g GearPair) marks() [3]float64 {
	k := g.ratio().value
	return [3]float64{-k, 1, k - 1}
}

func pick[T any](e End, a, b *T) *T {
	if e == B {
		return b
	}
	return a
}

func inPoint(a *Attachment, p Part, by float64) bool {
	switch p {
	case X:
		a.X += by
	case Y:
		a.Y += by
	default:
		return false
	}
	return true
}

func inLine(l *Line, p Part, by float64) bool {
	switch p {
	case X:
		l.X += by
	case Y:
		l.Y += by
	case Angle:
		l.Angle += by
	default:
		return false
	}
	return true
}
