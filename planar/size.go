package planar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// size returns the largest length of the design: the diagonal of the box round the
// points of a link, the origin included for the frame's; 1 where there is none.
func (d *Design) size() float64 {
	type box struct {
		least, most r2.Vec
		used        bool
	}
	boxes := make([]box, len(d.Links))
	boxes[Frame].used = true
	around := func(l Link, x, y float64) {
		b := &boxes[l]
		if !b.used {
			*b = box{r2.Vec{X: x, Y: y}, r2.Vec{X: x, Y: y}, true}
		}
		b.least = r2.Vec{X: math.Min(b.least.X, x), Y: math.Min(b.least.Y, y)}
		b.most = r2.Vec{X: math.Max(b.most.X, x), Y: math.Max(b.most.Y, y)}
	}
	size := 0.0
	for a := range d.points() {
		around(a.Link, a.X, a.Y)
	}
	for _, b := range boxes {
		size = math.Max(size, math.Hypot(b.most.X-b.least.X, b.most.Y-b.least.Y))
	}
	for _, j := range d.Joints {
		switch j := j.(type) {
		case GearPair:
			size = max(size, j.RadiusA, j.RadiusB)
		case RackPair:
			size = math.Max(size, j.Radius)
		}
	}
	if size == 0 {
		return 1
	}
	return size
}

// A marked Constraint tells of points of its links.
type marked interface{ marks() []Attachment }

// points yields every point of the design, those of lines included.
func (d *Design) points() func(yield func(Attachment) bool) {
	start := func(l Line) Attachment { return l.Link.At(l.X, l.Y) }
	return func(yield func(Attachment) bool) {
		for _, j := range d.Joints {
			var a, b Attachment
			switch j := j.(type) {
			case Revolute:
				a, b = j.A, j.B
			case Prismatic:
				a, b = start(j.A), start(j.B)
			case SlidingPin:
				a, b = j.Pin, start(j.Slot)
			case Fixed:
				a, b = start(j.A), start(j.B)
			case RackPair:
				a, b = j.Pinion, start(j.Rack)
			case Custom:
				if m, ok := j.By.(marked); ok {
					for _, a := range m.marks() {
						if !yield(a) {
							return
						}
					}
				}
				continue
			default:
				continue
			}
			if !yield(a) || !yield(b) {
				return
			}
		}
		for _, m := range d.Drives {
			var a, b Attachment
			switch m := m.(type) {
			case Slide:
				a, b = start(m.Of), start(m.From)
			case Reach:
				a, b = m.A, m.B
			default:
				continue
			}
			if !yield(a) || !yield(b) {
				return
			}
		}
	}
}
