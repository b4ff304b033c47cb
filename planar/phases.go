package planar

import (
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// guessedAngle returns the angle that a guess has of a link.
func guessedAngle(guess []rigid.Placement, l Link) float64 {
	if l == Frame {
		return 0
	}
	return guess[l].Angle
}

// readPhases reads the phases that are as assembled from the guess.
func (s *State) readPhases(guess []rigid.Placement) {
	angle := func(l Link) float64 { return guessedAngle(guess, l) }
	for i, j := range s.l.design.Joints {
		switch j := j.(type) {
		case GearPair:
			if j.AsAssembled {
				k := j.ratio().value
				s.now.phase[i] = rigid.Wrap(angle(j.B) - k*angle(j.A) + (k-1)*angle(j.Arm))
			}
		case RackPair:
			if j.AsAssembled {
				rack := s.guessed(guess, j.Rack.Link)
				c := s.guessed(guess, j.Pinion.Link).Point(r2.Vec{X: j.Pinion.X, Y: j.Pinion.Y})
				u := rack.Compose(rigid.NewPose(0, 0, j.Rack.Angle)).Axis
				r := j.Radius
				if j.Right {
					r = -r
				}
				s.now.phase[i] = r2.Dot(u, r2.Sub(c, rack.Point(r2.Vec{X: j.Rack.X, Y: j.Rack.Y}))) + r*(angle(j.Pinion.Link)-angle(j.Rack.Link))
			}
		}
	}
}

// unread returns which phases are to be read from the position.
func (s *State) unread() []bool {
	unread := make([]bool, len(s.l.design.Joints))
	for i, j := range s.l.design.Joints {
		switch j := j.(type) {
		case GearPair:
			unread[i] = j.AsAssembled
		case RackPair:
			unread[i] = j.AsAssembled
		}
	}
	return unread
}

// A reader is an op with a phase that may have to be read from a position: poses
// of its bodies as they are in sc, before it is placed.
type reader interface {
	read(sc *scene, unread []bool)
}

func (o *spin) read(sc *scene, unread []bool) {
	for _, t := range o.by.phase {
		if unread[t.Index] {
			unread[t.Index] = false
			miss := rigid.Wrap(sc.m[o.body].Pose.Angle() - o.by.value(sc))
			sc.phase[t.Index] += miss / t.Coef
		}
	}
}

func (o *roll) read(sc *scene, unread []bool) {
	if o.phase >= 0 && unread[o.phase] {
		unread[o.phase] = false
		angle := sc.m[o.pinion.body].Pose.Angle()
		o.place(sc, sc)
		sc.phase[o.phase] += o.rate * rigid.Wrap(angle-sc.m[o.pinion.body].Pose.Angle())
	}
}

func (o *meet) read(sc *scene, unread []bool) {
	o.one.read(sc, &o.of[0], unread)
	o.two.read(sc, &o.of[0], unread)
}

func (o *rrp) read(sc *scene, unread []bool) { o.guide.read(sc, &o.two, unread) }

// read makes a line that moves with a phase pass through a point.
func (k *track) read(sc *scene, p *spot, unread []bool) {
	if k.by == nil {
		return
	}
	for _, t := range k.by.phase {
		if unread[t.Index] {
			unread[t.Index] = false
			l := k.line(sc)
			sc.phase[t.Index] -= (l.Axes(r2.Sub(sc.place(p), l.G)).Y - l.E) / t.Coef
		}
	}
}
