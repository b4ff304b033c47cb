package planar_test

import (
	"fmt"
	"math"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// An opening is by how much a motion misses what the joints and drives ask of it:
// places over the size, velocities over the greatest velocity, and so on. All
// closed, with links that are rigid by construction, is all that a solution is.
type opening struct {
	pos, vel, acc float64
	where         string
}

// open measures how far the joints and drives of a linkage are from holding, from
// the links' motions alone.
func open(l *Linkage, s *State, in []rigid.Coordinate) opening {
	d := l.Design()
	o := opening{}
	size, speed, surge := scales(l, s, in)
	see := func(where string, miss, scale, rate, rates, second, seconds float64) {
		for i, v := range [3]float64{miss / scale, rate / rates, second / seconds} {
			to := [3]*float64{&o.pos, &o.vel, &o.acc}[i]
			if v = math.Abs(v); !(v <= *to) {
				*to = v
				o.where = where
			}
		}
	}
	point := func(where string, p rigid.Point) {
		for _, v := range [2][3]float64{{p.Pos.X, p.Vel.X, p.Acc.X}, {p.Pos.Y, p.Vel.Y, p.Acc.Y}} {
			see(where, v[0], size, v[1], speed*size, v[2], surge*size)
		}
	}
	turn := func(where string, pos, vel, acc float64) {
		see(where, math.Remainder(pos, 2*math.Pi), 1, vel, speed, acc, surge)
	}
	// across returns the motion of a point square to a line.
	across := func(p Attachment, line Line) rigid.Point {
		q := s.Motion(line.Link).Observe(s.Point(p))
		a := rigid.NewPose(line.X, line.Y, line.Angle)
		y := func(v r2.Vec) r2.Vec { return r2.Vec{X: r2.Cross(a.Axis, v)} }
		return rigid.Point{Pos: y(r2.Sub(q.Pos, a.Origin)), Vel: y(q.Vel), Acc: y(q.Acc)}
	}
	angle := func(l Link) rigid.Coordinate {
		m := s.Motion(l)
		return rigid.Coordinate{Pos: m.Pose.Angle(), Vel: m.Omega, Acc: m.Alpha}
	}
	for i, j := range d.Joints {
		name := fmt.Sprintf("joint %d, %T", i, j)
		switch j := j.(type) {
		case Revolute:
			a, b := s.Point(j.A), s.Point(j.B)
			point(name, rigid.Point{Pos: r2.Sub(b.Pos, a.Pos), Vel: r2.Sub(b.Vel, a.Vel), Acc: r2.Sub(b.Acc, a.Acc)})
		case Prismatic:
			point(name, across(j.B.Link.At(j.B.X, j.B.Y), j.A))
			a, b := angle(j.A.Link), angle(j.B.Link)
			turn(name, b.Pos+j.B.Angle-a.Pos-j.A.Angle, b.Vel-a.Vel, b.Acc-a.Acc)
		case SlidingPin:
			point(name, across(j.Pin, j.Slot))
		case Fixed:
			a, b := s.Point(j.A.Link.At(j.A.X, j.A.Y)), s.Point(j.B.Link.At(j.B.X, j.B.Y))
			point(name, rigid.Point{Pos: r2.Sub(b.Pos, a.Pos), Vel: r2.Sub(b.Vel, a.Vel), Acc: r2.Sub(b.Acc, a.Acc)})
			c, e := angle(j.A.Link), angle(j.B.Link)
			turn(name, e.Pos+j.B.Angle-c.Pos-j.A.Angle, e.Vel-c.Vel, e.Acc-c.Acc)
		case GearPair:
			k := float64(j.TeethA) / float64(j.TeethB)
			if j.TeethA == 0 {
				k = j.RadiusA / j.RadiusB
			}
			if !j.Internal {
				k = -k
			}
			a, b, m := angle(j.A), angle(j.B), angle(j.Arm)
			turn(name, 0, b.Vel-m.Vel-k*(a.Vel-m.Vel), b.Acc-m.Acc-k*(a.Acc-m.Acc))
		case RackPair:
			k := j.Radius
			if j.Right {
				k = -k
			}
			p := s.Slide(j.Pinion.Link.Line(j.Pinion.X, j.Pinion.Y, 0), j.Rack)
			a, b := angle(j.Rack.Link), angle(j.Pinion.Link)
			see(name, 0, 1, p.Vel+k*(b.Vel-a.Vel), speed*size, p.Acc+k*(b.Acc-a.Acc), surge*size)
		}
	}
	for i, m := range d.Drives {
		name := fmt.Sprintf("drive %d, %T", i, m)
		want := in[i]
		switch m := m.(type) {
		case Turn:
			a, b := angle(m.Of), angle(m.From)
			turn(name, a.Pos-b.Pos-want.Pos, a.Vel-b.Vel-want.Vel, a.Acc-b.Acc-want.Acc)
		case Slide:
			got := s.Slide(m.Of, m.From)
			see(name, got.Pos-want.Pos, size, got.Vel-want.Vel, speed*size, got.Acc-want.Acc, surge*size)
		case Reach:
			a, b := s.Point(m.A), s.Point(m.B)
			r, v, c := r2.Sub(b.Pos, a.Pos), r2.Sub(b.Vel, a.Vel), r2.Sub(b.Acc, a.Acc)
			see(name, r2.Norm(r)-want.Pos, size, r2.Dot(r, v)/want.Pos-want.Vel, speed*size,
				(r2.Dot(r, c)+r2.Dot(v, v)-want.Vel*want.Vel)/want.Pos-want.Acc, surge*size)
		}
	}
	return o
}

// scales returns the sizes that errors are measured by: of the linkage, of its
// rates, of their derivatives.
func scales(l *Linkage, s *State, in []rigid.Coordinate) (size, speed, surge float64) {
	size = 1e-300
	n := len(l.Design().Links)
	for i := range n {
		m := s.Motion(Link(i))
		size = math.Max(size, r2.Norm(m.Pose.Origin))
	}
	for _, j := range l.Design().Joints {
		if r, ok := j.(Revolute); ok {
			size = max(size, math.Hypot(r.A.X, r.A.Y), math.Hypot(r.B.X, r.B.Y))
		}
	}
	speed, surge = 1e-300, 1e-300
	for i := range n {
		m := s.Motion(Link(i))
		w := math.Max(math.Abs(m.Omega), r2.Norm(m.Vel)/size)
		speed = math.Max(speed, w)
		surge = max(surge, math.Abs(m.Alpha), r2.Norm(m.Acc)/size, w*w)
	}
	return size, speed, surge
}
