package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// joints writes the equations of all joints and drives.
func (b *builder) joints() error {
	pins := newPins()
	joints := map[Joint]int{}
	for i, j := range b.d.Joints {
		j = tidied(j)
		if _, own := j.(Custom); !own { // a Constraint may not be comparable
			if first, ok := joints[j]; ok {
				return b.refuse(fmt.Errorf("%w: two joints say the same", ErrOverconstrained), first, i)
			}
			joints[j] = i
		}
		if err := b.joint(pins, i, j); err != nil {
			return err
		}
	}
	if err := b.drive(pins); err != nil {
		return err
	}
	return b.meshes()
}

// tidied returns a joint that is the same from both sides with the lower link first.
func tidied(j Joint) Joint {
	switch j := j.(type) {
	case Revolute:
		if j.B.Link < j.A.Link {
			return Revolute{A: j.B, B: j.A}
		}
	case Prismatic:
		if j.B.Link < j.A.Link {
			return Prismatic{A: j.B, B: j.A}
		}
	case Fixed:
		if j.B.Link < j.A.Link {
			return Fixed{A: j.B, B: j.A}
		}
	}
	return j
}

func (b *builder) joint(pins *pins, i int, j Joint) error {
	switch j := j.(type) {
	case Revolute:
		switch b.aside[i].unit {
		case kept:
			return b.hinge(pins, j.A, j.B, i)
		case lengthUnit, armUnit:
			return b.stretch(pins, j, i)
		case pinUnit:
			r := b.along(rowX, j.A.Link.Line(j.A.X, j.A.Y, 0), j.B.Link.Line(j.B.X, j.B.Y, 0), i)
			b.checkLater(r, "pin")
			r.kind = rowY
			b.checkLater(r, "pin")
		}
	case Prismatic:
		return b.guide(pins, j, i)
	case SlidingPin:
		return b.slot(pins, j, i)
	case GearPair:
		b.gears(j, i)
	case RackPair:
		return b.rack(j, i)
	case Custom:
		return b.custom(j, i)
	}
	return nil
}

// Pins are where points of several bodies coincide.
type pins struct {
	members map[int][]int  // of a pin, by its first point: all its points
	joints  map[int][]int  // and the joints that make it
	guides  map[[2]int]int // first Prismatic between two bodies: its index
}

func newPins() *pins {
	return &pins{map[int][]int{}, map[int][]int{}, map[[2]int]int{}}
}

func (p *pins) of(first int) []int {
	if m := p.members[first]; m != nil {
		return m
	}
	return []int{first}
}

// hinge makes two points coincide. Between bodies that share the pin already it
// says nothing new.
func (b *builder) hinge(pins *pins, from, to Attachment, joint int) error {
	i, j := b.point(from), b.point(to)
	p, q := b.pin(i), b.pin(j)
	if p == q {
		return nil
	}
	members := append(pins.of(p), pins.of(q)...)
	joints := append(append(pins.joints[p], pins.joints[q]...), joint)
	for _, m := range pins.of(p) {
		for _, n := range pins.of(q) {
			if b.points[m].body != b.points[n].body {
				continue
			}
			gap := r2.Norm(r2.Sub(b.points[m].at, b.points[n].at))
			return b.refuse(fmt.Errorf("%w: one pin in two points of a link, %.3g m apart", ErrInconsistent, gap), joints...)
		}
	}
	b.pinOf[q] = p
	pins.members[p], pins.joints[p] = members, joints
	x := row{kind: rowX, a: b.points[i].body, b: b.points[j].body, pa: b.points[i].at, pb: b.points[j].at, joint: joint, drive: -1, at: i, bt: j}
	y := x
	y.kind = rowY
	b.rows = append(b.rows, x, y)
	return nil
}

// along returns a row of the given kind: of the point of one line beside another.
func (b *builder) along(kind rowKind, from, of Line, joint int) row {
	i, j := b.point(from.Link.At(from.X, from.Y)), b.point(of.Link.At(of.X, of.Y))
	return row{
		kind: kind, a: b.points[i].body, b: b.points[j].body, pa: b.points[i].at, pb: b.points[j].at,
		u: b.seats[from.Link].local.Compose(rigid.NewPose(0, 0, from.Angle)).Axis, joint: joint, drive: -1, at: i, bt: j,
	}
}

// angle returns the angle of a line in its body's axes.
func (b *builder) angle(l Line) float64 { return b.seats[l.Link].local.Angle() + l.Angle }

// guide keeps a line on another: an equation between angles and one of place.
func (b *builder) guide(pins *pins, j Prismatic, joint int) error {
	r := b.along(rowGuide, j.A, j.B, joint)
	turn := b.angle(j.A) - b.angle(j.B) // of b as seen from a
	if r.a == r.b {
		miss := math.Max(math.Abs(cross(r.u, r2.Sub(r.pb, r.pa))), b.length*math.Abs(rigid.Wrap(turn)))
		return b.within(miss, joint)
	}
	b.turn(turnRow{of: newForm(formTerm{r.b, one}, formTerm{r.a, one.negative()}), value: turn, joint: joint, drive: -1})
	if b.aside[joint].unit == guideUnit {
		b.checkLater(r, "guide")
		return nil
	}
	pair := [2]int{min(r.a, r.b), max(r.a, r.b)}
	if first, ok := pins.guides[pair]; ok {
		if miss, parallel := b.beside(first, r, turn); parallel {
			return b.within(miss, first, joint)
		}
	} else {
		pins.guides[pair] = joint
	}
	b.rows = append(b.rows, r)
	return nil
}

// beside compares a guide between two bodies with an earlier one: whether it is
// parallel, and how far off then the line that it keeps is. Angles that contradict
// each other are left to the elimination of angles.
//
//	n·(pb − pa) = 0 for both, so  n·((pb − pb') − (pa − pa')) = 0
func (b *builder) beside(first int, r row, turn float64) (miss float64, parallel bool) {
	j := b.d.Joints[first].(Prismatic)
	f := b.along(rowGuide, j.A, j.B, first)
	known := b.angle(j.A) - b.angle(j.B)
	if f.a != r.a {
		f, known = b.along(rowGuide, j.B, j.A, first), -known
	}
	if math.Abs(cross(f.u, r.u)) > lined || math.Abs(rigid.Wrap(turn-known)) > lined {
		return 0, false
	}
	apart := r2.Sub(rotate(r2.Sub(r.pb, f.pb), turn), r2.Sub(r.pa, f.pa))
	return math.Abs(cross(r.u, apart)), true
}

// lined is the sine of the angle up to which lines are parallel.
const lined = 1e-9

func cross(a, b r2.Vec) float64 { return a.X*b.Y - a.Y*b.X }

func rotate(v r2.Vec, by float64) r2.Vec { return rigid.NewPose(0, 0, by).Point(v) }

// within refuses joints that ask more of one body, or of one pair, than holds.
func (b *builder) within(miss float64, joints ...int) error {
	if miss <= same*b.length {
		return nil
	}
	return b.refuse(fmt.Errorf("%w: they miss each other by %.3g m", ErrInconsistent, miss), joints...)
}

// slot keeps a pin in a slot.
func (b *builder) slot(pins *pins, j SlidingPin, joint int) error {
	if b.aside[joint].unit != kept || b.seats[j.Pin.Link].body == b.seats[j.Slot.Link].body {
		r := b.along(rowGuide, j.Slot, j.Pin.Link.Line(j.Pin.X, j.Pin.Y, 0), joint)
		if r.a != r.b {
			b.checkLater(r, "slot")
			return nil
		}
		return b.within(math.Abs(cross(r.u, r2.Sub(r.pb, r.pa))), joint)
	}
	return b.slide(pins, j, joint)
}

// slide ties a pin to a slot by a hidden block.
func (b *builder) slide(pins *pins, j SlidingPin, joint int) error {
	block := b.hiddenOf(joint)
	if err := b.hinge(pins, j.Pin, block.At(0, 0), joint); err != nil {
		return err
	}
	return b.guide(pins, Prismatic{A: j.Slot, B: block.Line(0, 0, 0)}, joint)
}

// ratio returns by how much B turns for one turn of A on the arm.
func (g GearPair) ratio() coefficient {
	k := quotient(g.TeethA, g.TeethB)
	if g.TeethA == 0 {
		k = rational(g.RadiusA / g.RadiusB)
	}
	if g.Internal {
		return k
	}
	return k.negative()
}

// gears writes  θB − ρ·θA + (ρ − 1)·θarm = Phase  for the links' own axes.
func (b *builder) gears(g GearPair, joint int) {
	k := g.ratio()
	arm := k.plus(one.negative())
	a, c, m := b.seats[g.A], b.seats[g.B], b.seats[g.Arm]
	own := c.local.Angle() - k.value*a.local.Angle() + arm.value*m.local.Angle()
	r := turnRow{
		of:     newForm(formTerm{c.body, one}, formTerm{a.body, k.negative()}, formTerm{m.body, arm}),
		value:  g.Phase - own,
		phased: g.AsAssembled, joint: joint, drive: -1,
	}
	if b.aside[joint].unit != kept {
		b.checkAngles(r)
		return
	}
	b.turn(r)
}

// rack writes  u·(c − p) + R·(θpinion − θrack) = Phase, −R on the right.
func (b *builder) rack(j RackPair, joint int) error {
	r := b.along(rowRack, j.Rack, j.Pinion.Link.Line(j.Pinion.X, j.Pinion.Y, 0), joint)
	if r.a == r.b {
		return b.refuse(fmt.Errorf("%w: a pinion fixed to its rack", ErrReference), joint)
	}
	r.rate = j.Radius
	if j.Right {
		r.rate = -j.Radius
	}
	own := b.seats[j.Pinion.Link].local.Angle() - b.seats[j.Rack.Link].local.Angle()
	r.value, r.phased = j.Phase-r.rate*own, j.AsAssembled
	if b.aside[joint].unit != kept {
		b.checkLater(r, "rack")
		return nil
	}
	b.rows = append(b.rows, r)
	return nil
}
