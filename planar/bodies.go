package planar

import (
	"fmt"
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// Same says how nearly equal places must be to be one, over the largest length.
const same = 1e-12

// A builder turns a valid Design into a system.
type builder struct {
	*system
	d         *Design
	aside     aside
	points    []point
	imbalance *imbalance // what order found wrong, if it did
	inBody    [][]int    // of every body: its points
	pinOf     []int      // of every point: the pin it is part of, by way of other points
	turns     []turnRow  // equations between angles
	used      []turnRow  // those that are independent
	psi       []form     // of every body: its angle in free angles, exactly
	lines     []lineForm // directions that rows have used
	seated    []int      // of a body whose origin is a pin known before: that point, else −1
}

// A point of a body, in the body's axes.
type point struct {
	body int
	at   r2.Vec
}

// build sorts a valid design, without what is set aside. The builder is of use even
// after an error of balance.
func build(d *Design, a aside) (*builder, error) {
	b := &builder{system: &system{links: len(d.Links), drives: len(d.Drives)}, d: d, aside: a}
	if err := b.fuse(); err != nil {
		return b, err
	}
	b.hide()
	for _, step := range []func() error{b.joints, b.solveAngles, b.order} {
		if err := step(); err != nil {
			return b, err
		}
	}
	return b, nil
}

// fuse seats every link on a body. Links fixed to one another are one body, whose
// axes are those of the first of them; body 0 is the frame's.
func (b *builder) fuse() error {
	b.length = b.d.size()
	fixed := make([][]int, b.links) // Fixed joints at each link
	for i, j := range b.d.Joints {
		if f, ok := j.(Fixed); ok {
			fixed[f.A.Link] = append(fixed[f.A.Link], i)
			fixed[f.B.Link] = append(fixed[f.B.Link], i)
		}
	}
	b.seats = make([]seat, b.links)
	seated := make([]bool, b.links)
	bodies := 0
	for l := range b.links {
		if seated[l] {
			continue
		}
		b.seats[l], seated[l] = seat{bodies, rigid.NewPose(0, 0, 0)}, true
		for queue := []Link{Link(l)}; len(queue) > 0; queue = queue[1:] {
			for _, i := range fixed[queue[0]] {
				f := b.d.Joints[i].(Fixed)
				next, pose := across(f, queue[0])
				pose = b.seats[queue[0]].local.Compose(pose)
				if !seated[next] {
					b.seats[next], seated[next] = seat{bodies, pose}, true
					queue = append(queue, next)
				} else if gap := b.gap(b.seats[next].local, pose); gap > same*b.length {
					return b.refuse(fmt.Errorf("%w: links fixed to each other in a ring miss by %.3g m", ErrInconsistent, gap), i)
				}
			}
		}
		bodies++
	}
	b.inBody = make([][]int, bodies)
	return nil
}

// across returns the link on the other side of a Fixed joint, and its pose in from.
func across(f Fixed, from Link) (Link, rigid.Pose) {
	a, b := f.A.pose(), f.B.pose()
	if from == f.A.Link {
		return f.B.Link, a.Compose(b.Inverse())
	}
	return f.A.Link, b.Compose(a.Inverse())
}

// pose returns the axes whose origin is the line's point and whose x axis is the line.
func (l Line) pose() rigid.Pose { return rigid.NewPose(l.X, l.Y, l.Angle) }

// gap returns how far two poses are apart, an angle on the arm of the largest length.
func (b *builder) gap(p, q rigid.Pose) float64 {
	return math.Max(r2.Norm(r2.Sub(p.Origin, q.Origin)), b.length*r2.Norm(r2.Sub(p.Axis, q.Axis)))
}

// hide adds the hidden links, each a body of its own.
func (b *builder) hide() {
	add := func(joint int, parts ...hiddenPart) {
		for _, part := range parts {
			b.hidden = append(b.hidden, hidden{part, joint})
			b.seats = append(b.seats, seat{len(b.inBody), rigid.NewPose(0, 0, 0)})
			b.inBody = append(b.inBody, nil)
		}
	}
	for i, j := range b.d.Joints {
		unit := b.aside[i].unit
		switch j := j.(type) {
		case SlidingPin:
			if unit == kept && b.seats[j.Pin.Link].body != b.seats[j.Slot.Link].body {
				add(i, slotBlock)
			}
		case Revolute:
			if unit == lengthUnit || unit == armUnit {
				add(i, slotBlock)
			}
		}
	}
	for i, m := range b.d.Drives {
		if _, ok := m.(Reach); ok {
			add(len(b.d.Joints)+i, barrel, rod)
		}
	}
}

// bodies returns the number of bodies.
func (b *builder) bodies() int { return len(b.inBody) }

// hiddenOf returns the first hidden link of a joint or drive.
func (b *builder) hiddenOf(joint int) Link {
	i := slices.IndexFunc(b.hidden, func(h hidden) bool { return h.joint == joint })
	return Link(b.links + i)
}

// point returns the index of an attachment: points of one body that coincide are one.
func (b *builder) point(a Attachment) int {
	s := b.seats[a.Link]
	at := s.local.Point(r2.Vec{X: a.X, Y: a.Y})
	for _, i := range b.inBody[s.body] {
		if r2.Norm(r2.Sub(b.points[i].at, at)) <= same*b.length {
			return i
		}
	}
	i := len(b.points)
	b.points = append(b.points, point{s.body, at})
	b.inBody[s.body] = append(b.inBody[s.body], i)
	b.pinOf = append(b.pinOf, i)
	return i
}

// pin returns the first point of the pin that a point is part of.
func (b *builder) pin(i int) int {
	for b.pinOf[i] != i {
		b.pinOf[i] = b.pinOf[b.pinOf[i]]
		i = b.pinOf[i]
	}
	return i
}

// refuse returns a DesignError that names joints (counting on through the drives)
// and their links.
func (b *builder) refuse(err error, joints ...int) error {
	bad := &DesignError{Err: err}
	var links []Link
	joints = slices.Clone(joints)
	slices.Sort(joints)
	for _, i := range slices.Compact(joints) {
		if i < len(b.d.Joints) {
			bad.Joints = append(bad.Joints, i)
		} else {
			bad.Drives = append(bad.Drives, i-len(b.d.Joints))
		}
		links = append(links, b.d.linksOf(i)...)
	}
	bad.Links = b.d.names(tidy(links))
	return bad
}

// tidy sorts links and leaves one of each.
func tidy(links []Link) []Link {
	slices.Sort(links)
	return slices.Compact(links)
}

// linksOf returns the links of joint i, which counts on through the drives.
func (d *Design) linksOf(i int) []Link {
	if i >= len(d.Joints) {
		switch m := d.Drives[i-len(d.Joints)].(type) {
		case Turn:
			return []Link{m.Of, m.From}
		case Slide:
			return []Link{m.Of.Link, m.From.Link}
		case Reach:
			return []Link{m.A.Link, m.B.Link}
		}
		return nil
	}
	switch j := d.Joints[i].(type) {
	case Revolute:
		return []Link{j.A.Link, j.B.Link}
	case Prismatic:
		return []Link{j.A.Link, j.B.Link}
	case SlidingPin:
		return []Link{j.Pin.Link, j.Slot.Link}
	case Fixed:
		return []Link{j.A.Link, j.B.Link}
	case GearPair:
		return []Link{j.A, j.B, j.Arm}
	case RackPair:
		return []Link{j.Pinion.Link, j.Rack.Link}
	case Custom:
		return linksOfConstraint(j.By)
	}
	return nil
}
