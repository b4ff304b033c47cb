package main

import (
	"math"
	"sort"

	"example.com/twopoint/rigid"
)

// A move takes the ram from where it stands to a place, from rest to rest, and
// lets it rest there.
type move struct {
	To    float64 `json:"to"`    // m along the guide
	Speed float64 `json:"speed"` // greatest, m/s
	Acc   float64 `json:"acc"`   // greatest, m/s²
	Jerk  float64 `json:"jerk"`  // greatest, m/s³
	Dwell float64 `json:"dwell"` // time at rest after it, s
}

// A segment is a stretch of constant jerk.
type segment struct {
	at, jerk float64 // begins at, s
	rigid.Coordinate
	limit float64 // acceleration of its move, m/s²
}

// A profile is the ram's place over the profile's own time, which runs on a clock
// that may be slowed: place, velocity and acceleration are continuous.
type profile struct {
	segments []segment
	end      float64 // s
}

func newProfile(start float64, moves []move) *profile {
	p := &profile{}
	for _, m := range moves {
		p.add(start, m)
		start = m.To
	}
	p.segments = append(p.segments, segment{at: p.end, Coordinate: rigid.Coordinate{Pos: start}})
	return p
}

// add appends the seven segments of a move: acceleration up, even and down, even
// speed, and the same backwards to rest.
func (p *profile) add(from float64, m move) {
	tj, ta, tv := m.times(math.Abs(m.To - from))
	c, j := rigid.Coordinate{Pos: from}, math.Copysign(m.Jerk, m.To-from)
	for _, s := range [...]struct{ t, jerk float64 }{{tj, j}, {ta, 0}, {tj, -j}, {tv, 0}, {tj, -j}, {ta, 0}, {tj, j}} {
		p.segments = append(p.segments, segment{p.end, s.jerk, c, m.Acc})
		c = withJerk(c, s.jerk, s.t)
		p.end += s.t
	}
	p.segments = append(p.segments, segment{at: p.end, Coordinate: rigid.Coordinate{Pos: m.To}, limit: m.Acc})
	p.end += m.Dwell
}

// times returns how long jerk, even acceleration and even speed last for a way of
// length d. With a = j·tj and v = a(tj + ta) the way without even speed is
//
//	d = v(2tj + ta) = a(tj + ta)(2tj + ta)
//
// which is solved for ta where v is not reached, and with ta = 0 for tj where a
// is not reached either.
func (m move) times(d float64) (tj, ta, tv float64) {
	if tj = m.Acc / m.Jerk; m.Speed > m.Acc*tj {
		ta = m.Speed/m.Acc - tj
	} else {
		tj = math.Sqrt(m.Speed / m.Jerk)
	}
	v := m.Jerk * tj * (tj + ta)
	if tv = d/v - (2*tj + ta); tv >= 0 {
		return tj, ta, tv
	}
	a := m.Jerk * tj
	if ta = (math.Sqrt(tj*tj+4*d/a) - 3*tj) / 2; ta >= 0 {
		return tj, ta, 0
	}
	return math.Cbrt(d / (2 * m.Jerk)), 0, 0
}

func withJerk(c rigid.Coordinate, jerk, t float64) rigid.Coordinate {
	n := c.After(t)
	n.Pos += jerk * t * t * t / 6
	n.Vel += jerk * t * t / 2
	n.Acc += jerk * t
	return n
}

// at returns the ram's motion at time s of an unslowed clock, and the greatest
// acceleration that its move allows.
func (p *profile) at(s float64) (rigid.Coordinate, float64) {
	n := sort.Search(len(p.segments), func(i int) bool { return p.segments[i].at > s })
	g := &p.segments[max(n-1, 0)]
	return withJerk(g.Coordinate, g.jerk, s-g.at), g.limit
}
