package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// meshes checks that gears, and pinions on their racks, are held at the distance
// that their radii ask for.
func (b *builder) meshes() error {
	for i, j := range b.d.Joints {
		var err error
		switch j := j.(type) {
		case GearPair:
			err = b.centres(j, i)
		case RackPair:
			err = b.pitch(j, i)
		}
		if err != nil {
			return err
		}
	}
	return nil
}

// meshed is how nearly, over the radii, a distance must be that of the radii.
const meshed = 1e-9

// centres checks the distance of the centres of gears whose radii are given, where
// both are pinned to their arm.
func (b *builder) centres(g GearPair, joint int) error {
	a, okA := b.centre(g.A, b.seats[g.Arm].body)
	c, okB := b.centre(g.B, b.seats[g.Arm].body)
	if g.RadiusA == 0 || !okA || !okB {
		return nil
	}
	want, got := g.RadiusA+g.RadiusB, r2.Norm(r2.Sub(a, c))
	if g.Internal {
		want = math.Abs(g.RadiusA - g.RadiusB)
	}
	if math.Abs(got-want) <= meshed*(g.RadiusA+g.RadiusB) {
		return nil
	}
	return b.refuse(fmt.Errorf("%w: the radii put the gears' centres %.9g m apart, their pins %.9g m", ErrInconsistent, want, got), joint)
}

// pitch checks the distance of a pinion from its rack, where the link that it is
// pinned to is guided on the rack.
func (b *builder) pitch(r RackPair, joint int) error {
	rack := b.seats[r.Rack.Link].body
	for i, j := range b.d.Joints {
		g, ok := j.(Prismatic)
		if !ok || b.aside[i].unit != kept {
			continue
		}
		if b.seats[g.A.Link].body != rack {
			g.A, g.B = g.B, g.A
		}
		c, pinned := b.centre(r.Pinion.Link, b.seats[g.B.Link].body)
		if b.seats[g.A.Link].body != rack || !pinned {
			continue
		}
		// The rack's line as seen from the other body, anywhere along the guide.
		guide := b.line(g.B)
		line := guide.Compose(b.line(g.A).Inverse()).Compose(b.line(r.Rack))
		left, want := cross(line.Axis, r2.Sub(c, line.Origin)), r.Radius
		if r.Right {
			want = -want
		}
		if math.Abs(cross(line.Axis, guide.Axis)) > lined {
			return b.refuse(fmt.Errorf("%w: the rack is not parallel to its guide", ErrInconsistent), i, joint)
		}
		if math.Abs(left-want) > meshed*r.Radius {
			return b.refuse(fmt.Errorf("%w: the pinion's centre lies %.9g m left of the rack's line, its radius puts it at %.9g m",
				ErrInconsistent, left, want), i, joint)
		}
	}
	return nil
}

// line returns the axes of a line in its body.
func (b *builder) line(l Line) rigid.Pose { return b.seats[l.Link].local.Compose(l.pose()) }

// centre returns the pin of a link on the body that carries it, in that body's axes.
func (b *builder) centre(l Link, carrier int) (r2.Vec, bool) {
	for _, i := range b.inBody[carrier] {
		for _, j := range b.inBody[b.seats[l].body] {
			if i != j && b.pin(i) == b.pin(j) {
				return b.points[i].at, true
			}
		}
	}
	return r2.Vec{}, false
}
