package planar

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// An aside says, by joint, what of a design is not solved but checked.
type aside map[int]setting

// A setting is the unit of a joint that is set aside.
type setting struct {
	unit unit
	onB  bool   // of a lengthUnit: the link is that of B
	from r2.Vec // of a lengthUnit: the link's other pin, in the body's axes
}

// A unit is what of a joint is set aside as a whole, in order of preference.
type unit uint8

const (
	kept       unit = iota
	meshUnit        // a GearPair, RackPair or SlidingPin
	guideUnit       // the place of a Prismatic; its angle stays
	lengthUnit      // the length of a link of two pins: one slides along the link
	armUnit         // the same of a link of more pins
	pinUnit         // both equations of a Revolute
)

// checkLater keeps an equation that is not solved.
func (b *builder) checkLater(r row, what string) {
	b.checks = append(b.checks, check{row: r, unit: fmt.Sprintf("%s of joint %d", what, r.joint)})
}

func (b *builder) checkAngles(r turnRow) {
	a := &angleCheck{Const: r.value, mod: true, joint: r.joint, phased: r.phased}
	for _, t := range r.of.terms {
		a.of = append(a.of, term{t.index, t.by.value})
		a.mod = a.mod && (t.by.value == 1 || t.by.value == -1)
	}
	b.checks = append(b.checks, check{angle: a, unit: fmt.Sprintf("mesh of joint %d", r.joint)})
}

// stretched returns the slot along the line of two pins of a link in which the pin
// of a Revolute slides when that length is set aside.
func (b *builder) stretched(j Revolute, s setting) SlidingPin {
	link, other := j.A, j.B
	if s.onB {
		link, other = j.B, j.A
	}
	seat := b.seats[link.Link].local
	along := r2.Sub(seat.Point(r2.Vec{X: link.X, Y: link.Y}), s.from)
	return SlidingPin{Pin: other, Slot: link.Link.Line(link.X, link.Y, math.Atan2(along.Y, along.X)-seat.Angle())}
}

// stretch lets a pin slide along the line of two pins of its link, and checks that
// their distance stays.
func (b *builder) stretch(pins *pins, j Revolute, joint int) error {
	slot := b.stretched(j, b.aside[joint])
	r := b.along(rowSlide, slot.Slot, slot.Pin.Link.Line(slot.Pin.X, slot.Pin.Y, 0), joint)
	b.checks = append(b.checks, check{row: r, unit: fmt.Sprintf("length of %s at joint %d", b.d.name(slot.Slot.Link), joint)})
	return b.slide(pins, slot, joint)
}
