package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A FlatFace is a Constraint: the flat face of a follower on the profile of a cam.
// The face may translate or swing, as its link is held.
//
// The profile runs counter-clockwise and lies right of the face as one looks along
// its line; with Left set it lies left. It must be convex where it touches. Of
// several points of contact, the guess takes the outermost.
//
// With m the face's normal, away from the profile, f its point and c that of the
// profile whose tangent is parallel to the face,
//
//	Φ = m·(f − c),  Φ″ = m·f″ − 2ω u·f′ − ω²·(Φ + 1/κ)
//
// for a face along u that turns at ω, with f moving, as seen from the profile: the
// derivative by the place of contact is zero (the theorem of the envelope).
type FlatFace struct {
	Face Line
	On   Profile
	Left bool
}

// Links returns the cam's link and the follower's.
func (f FlatFace) Links() []Link { return []Link{f.On.On.Link, f.Face.Link} }

// Rows returns 1.
func (f FlatFace) Rows() int { return 1 }

// Memory returns 2: whether there is a place before, and its parameter.
func (f FlatFace) Memory() int { return 2 }

// String returns the constraint in a few words.
func (f FlatFace) String() string { return "flat face on a profile" }

func (f FlatFace) check() error {
	if err := f.On.check(); err != nil {
		return err
	}
	return finiteLine(f.Face)
}

func (f FlatFace) marks() []Attachment {
	return append(f.On.marks(), f.Face.Link.At(f.Face.X, f.Face.Y))
}

// Evaluate writes the equation.
func (f FlatFace) Evaluate(e *Evaluation) error {
	p, axes := e.seen(&f.On, r2.Vec{X: f.Face.X, Y: f.Face.Y})
	face := e.Links[1].Pose.Compose(rigid.NewPose(0, 0, f.Face.Angle)).Axis
	u := back(axes.Axis, face)
	m := r2.Vec{X: -u.Y, Y: u.X}
	if f.Left {
		m = r2.Vec{X: u.Y, Y: -u.X}
	}
	ahead := r2.Vec{X: -m.Y, Y: m.X} // of the profile where it touches
	if e.Memory[0] == 0 {
		e.Memory[1] = f.On.outermost(m)
	}
	t, c, err := f.On.seek(e.Memory[1], func(c rigid.Point) (value, slope float64) {
		// m·c′ = 0, with m·c″ below 0 at an outermost point
		return r2.Dot(m, c.Vel), math.Min(r2.Dot(m, c.Acc), -1e-3*r2.Norm(c.Vel))
	})
	if err != nil {
		return err
	}
	speed := r2.Dot(ahead, c.Vel)
	bulge := -r2.Dot(m, c.Acc) / (speed * speed)
	if bulge <= 0 || speed <= 0 {
		return errFoot
	}
	e.Memory[0], e.Memory[1] = 1, f.On.wrap(t)
	w := e.Links[1].Omega - e.Links[0].Omega
	off := r2.Dot(m, r2.Sub(p.Pos, c.Pos))
	// As m turns at ω, it goes along with it: m′ = ω·m⊥, and ahead is m⊥.
	e.contact(0, 1, axes.Point(c.Pos), turned(axes.Axis, m))
	e.Rows[0].Residual = off
	e.Rows[0].Bias = r2.Dot(m, p.Acc) + 2*w*r2.Dot(ahead, p.Vel) - w*w*(off+1/bulge)
	return nil
}

// outermost returns the parameter of a point near the one farthest along m.
func (p *Profile) outermost(m r2.Vec) float64 {
	at, most := p.Over.Lo, math.Inf(-1)
	for t := range p.sample {
		if d := r2.Dot(m, p.Curve(t).Pos); d > most {
			at, most = t, d
		}
	}
	return at
}

// A Follower is a Constraint: one motion follows another by a law, as where a cam is
// given by what it does and not by its shape,
//
//	Of = By(Cam)
//
// Both are values of Turn, Slide or Reach, so that the follower may swing or
// translate; a cam mostly turns. Turns are compared modulo a revolution where Of is
// one. It has no value where the law has none.
type Follower struct {
	Of, Cam Drive
	By      rigid.Law
}

var _ Declarer = Follower{}

// Links returns the links of both motions.
func (f Follower) Links() []Link {
	l, n := f.ties()
	return append([]Link(nil), l[:n]...)
}

// ties returns the links of both motions, one of each.
func (f *Follower) ties() (l [4]Link, n int) {
	for _, m := range [2]Drive{f.Of, f.Cam} {
		a, b := endsOf(m)
		for _, link := range [2]Link{a, b} {
			if placeOf(&l, n, link) == n {
				l[n] = link
				n++
			}
		}
	}
	return l, n
}

func placeOf(l *[4]Link, n int, link Link) int {
	for i := range n {
		if l[i] == link {
			return i
		}
	}
	return n
}

// endsOf returns the links of a drive.
func endsOf(m Drive) (of, from Link) {
	switch m := m.(type) {
	case Turn:
		return m.Of, m.From
	case Slide:
		return m.Of.Link, m.From.Link
	case Reach:
		return m.A.Link, m.B.Link
	}
	return -1, -1
}

// Rows returns 1.
func (f Follower) Rows() int { return 1 }

// Depends returns OfAngle for links of which a turn alone counts.
func (f Follower) Depends(_, i int) Unknowns {
	l, n := f.ties()
	on := OfAngle
	for _, m := range [2]Drive{f.Of, f.Cam} {
		a, b := endsOf(m)
		if _, turn := m.(Turn); !turn && i < n && (l[i] == a || l[i] == b) {
			on = OfAll
		}
	}
	return on
}

// String returns the constraint in a few words.
func (f Follower) String() string { return "law of motion" }

func (f Follower) check() error {
	if f.By == nil {
		return fmt.Errorf("%w: a follower without a law", ErrReference)
	}
	for _, m := range [2]Drive{f.Of, f.Cam} {
		a, b := endsOf(m)
		if a == b {
			return fmt.Errorf("%w: %v is not the motion of one link against another", ErrReference, m)
		}
		var err error
		switch m := m.(type) {
		case Slide:
			if err = finiteLine(m.Of); err == nil {
				err = finiteLine(m.From)
			}
		case Reach:
			err = finiteAll("X", m.A.X, "Y", m.A.Y, "X", m.B.X, "Y", m.B.Y)
		}
		if err != nil {
			return err
		}
	}
	return nil
}

func (f Follower) marks() (all []Attachment) {
	for _, m := range [2]Drive{f.Of, f.Cam} {
		switch m := m.(type) {
		case Slide:
			all = append(all, m.Of.Link.At(m.Of.X, m.Of.Y), m.From.Link.At(m.From.X, m.From.Y))
		case Reach:
			all = append(all, m.A, m.B)
		}
	}
	return all
}

// Evaluate writes the equation:
//
//	Φ = out − f(in),  Φ″ = out″ − f″·in′² − f′·in″
func (f Follower) Evaluate(e *Evaluation) error {
	l, n := f.ties()
	in := e.measure(f.Cam, &l, n)
	law, err := f.By(in.c.Pos)
	if err != nil {
		return err
	}
	out := e.measure(f.Of, &l, n)
	q := &e.Rows[0]
	q.Residual = out.c.Pos - law.Out
	if _, turn := f.Of.(Turn); turn {
		q.Residual = rigid.Wrap(q.Residual)
	}
	q.Bias = out.c.Acc - law.Second*in.c.Vel*in.c.Vel - law.First*in.c.Acc
	out.add(q, 1)
	in.add(q, -law.First)
	return nil
}

// A measured drive is its motion, while no link has an acceleration, with its slopes
// by its two links.
type measured struct {
	c        rigid.Coordinate
	of, from int
	by, back Slope
}

// add adds so many times the slopes to those of an equation.
func (m *measured) add(q *Equation, k float64) {
	sum := func(s *Slope, t Slope) {
		s.X += k * t.X
		s.Y += k * t.Y
		s.Angle += k * t.Angle
	}
	sum(&q.Slopes[m.of], m.by)
	sum(&q.Slopes[m.from], m.back)
}

func (e *Evaluation) measure(m Drive, links *[4]Link, n int) (r measured) {
	a, b := endsOf(m)
	r.of, r.from = placeOf(links, n, a), placeOf(links, n, b)
	of, from := &e.Links[r.of], &e.Links[r.from]
	switch m := m.(type) {
	case Turn:
		r.c = rigid.Coordinate{Pos: of.Turn - from.Turn, Vel: of.Omega - from.Omega}
		r.by, r.back = Slope{Angle: 1}, Slope{Angle: -1}
	case Slide:
		p := of.At(r2.Vec{X: m.Of.X, Y: m.Of.Y})
		s := from.Observe(p)
		own := m.From.pose()
		r.c = rigid.Coordinate{Pos: own.Local(s.Pos).X, Vel: r2.Dot(own.Axis, s.Vel), Acc: r2.Dot(own.Axis, s.Acc)}
		r.slopes(of, from, p.Pos, turned(from.Pose.Axis, own.Axis))
	case Reach:
		p, q := of.At(r2.Vec{X: m.A.X, Y: m.A.Y}), from.At(r2.Vec{X: m.B.X, Y: m.B.Y})
		d, v := r2.Sub(p.Pos, q.Pos), r2.Sub(p.Vel, q.Vel)
		l := r2.Norm(d)
		u := r2.Scale(1/l, d)
		across := cross(u, v)
		r.c = rigid.Coordinate{Pos: l, Vel: r2.Dot(u, v), Acc: r2.Dot(u, r2.Sub(p.Acc, q.Acc)) + across*across/l}
		r.slopes(of, from, p.Pos, u)
	}
	return r
}

// slopes are those of a displacement along u of a point at p: see Evaluation.contact.
func (r *measured) slopes(of, from *Moving, p, u r2.Vec) {
	r.by = Slope{X: u.X, Y: u.Y, Angle: cross(r2.Sub(p, of.Pose.Origin), u)}
	r.back = Slope{X: -u.X, Y: -u.Y, Angle: -cross(r2.Sub(p, from.Pose.Origin), u)}
}
