package planar

import (
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// Sensitivity writes into dst the derivatives of a point's position, velocity and
// acceleration by each of the dimensions, the motions of the drives being given: in
// m, m/s and m/s² per m or per rad, in the frame's axes. The point stays where it is
// in its link. len(dst) is len(by).
//
// They are exact: the equations of all joints, differentiated by the dimension and
// by time. Phases read at Assemble are held as they were read. A parallelogram is
// differentiated as the four-bar that a change of one length makes of it: singular
// where it lies flat, though the State passes there.
//
// Errors, with dst as it was:
//
//	rigid.ErrInput      dst of a wrong length, a dimension without entries, a zero
//	                    State, a Custom joint in the design
//	ErrReference        an entry or a link that does not exist
//	rigid.ErrSingular   the position does not determine the derivatives
//	ErrInconsistent     joints that repeat each other would no longer agree
//	rigid.ErrNotFinite  a result would overflow, or the point is no number
//
// Nothing is allocated but a workspace, in the State's first call and in one with
// more dimensions than before.
func (s *State) Sensitivity(dst []rigid.Point, of Attachment, by ...Dimension) error {
	v, err := s.vary(len(dst), by, of.Link, of.Link)
	if err != nil {
		return err
	}
	for i := range by {
		if err := v.by(&by[i]); err != nil {
			return err
		}
		p := v.point(of)
		if !numeric(p.Pos, p.Vel, p.Acc) {
			return rigid.ErrNotFinite
		}
		v.points[i] = p
	}
	copy(dst, v.points)
	return nil
}

// TurnSensitivity writes into dst the derivatives of the turn of a link as seen from
// another, in rad, rad/s and rad/s² per m or per rad. All else is as for Sensitivity.
func (s *State) TurnSensitivity(dst []rigid.Coordinate, of, from Link, by ...Dimension) error {
	return s.scalars(dst, Turn{of, from}, of, from, by)
}

// SlideSensitivity writes into dst the derivatives of the displacement of the point
// of one line along another, as Slide has it, in m, m/s and m/s² per m or per rad.
// Both lines stay where they are in their links. All else is as for Sensitivity.
func (s *State) SlideSensitivity(dst []rigid.Coordinate, of, from Line, by ...Dimension) error {
	return s.scalars(dst, Slide{of, from}, of.Link, from.Link, by)
}

func (s *State) scalars(dst []rigid.Coordinate, what Drive, of, from Link, by []Dimension) error {
	v, err := s.vary(len(dst), by, of, from)
	if err != nil {
		return err
	}
	for i := range by {
		if err := v.by(&by[i]); err != nil {
			return err
		}
		c := v.measured(what)
		if c.Pos*0+c.Vel*0+c.Acc*0 != 0 {
			return rigid.ErrNotFinite
		}
		v.scalars[i] = c
	}
	copy(dst, v.scalars)
	return nil
}

// vary readies the workspace for so many dimensions at the State's place.
func (s *State) vary(n int, by []Dimension, of, from Link) (*variation, error) {
	if s.l == nil || n != len(by) {
		return nil, rigid.ErrInput
	}
	_, ok := s.slot(of)
	if _, ok2 := s.slot(from); !ok || !ok2 {
		return nil, ErrReference
	}
	if s.variation == nil {
		s.variation = newVariation(s)
	}
	v := s.variation
	if len(v.points) < n {
		v.points, v.scalars = make([]rigid.Point, n), make([]rigid.Coordinate, n)
	}
	v.points, v.scalars = v.points[:max(n, len(v.points))], v.scalars[:max(n, len(v.scalars))]
	return v, v.begin()
}

// A deviation is the derivative of a link's motion by a dimension: of its origin in
// the frame, and of its angle.
type deviation struct {
	origin rigid.Point
	turn   rigid.Coordinate
}

// A variation differentiates the equations of a State's joints by a dimension p.
// In the frame's axes, link by link, with δ for the derivative by p of x, y and
// angle, every equation is
//
//	K δ = −F      K δ̇ = −Ḟ − K̇ δ      K δ̈ = −F̈ − 2 K̇ δ̇ − K̈ δ
//
// F being what p does while all links stay where they are. There may be more
// equations than unknowns: joints may repeat each other.
type variation struct {
	s       *State
	length  float64 // in units of which lengths are
	bonds   []bond
	column  []int // of every link: its first column, −1 for the frame
	n       int   // unknowns
	lu      skyline
	force   []rigid.Coordinate // F of every bond
	right   []float64
	x       [3][]float64
	links   []deviation
	points  []rigid.Point
	scalars []rigid.Coordinate
	orders  int  // 3, or 1 for places alone
	unknown bool // a joint that no equation is known for
}

func newVariation(s *State) *variation {
	links := s.l.program.system.links
	v := &variation{s: s, length: s.l.program.length, n: 3 * (links - 1), orders: 3, links: make([]deviation, links)}
	v.column = s.l.program.columns()
	v.bonds, v.unknown = s.l.design.bonds(v.column)
	v.force, v.right = make([]rigid.Coordinate, len(v.bonds)), make([]float64, len(v.bonds))
	for i := range v.x {
		v.x[i] = make([]float64, v.n)
	}
	v.lu = newSkyline(len(v.bonds), v.n)
	return v
}

// begin factors K at the State's place.
func (v *variation) begin() error {
	if v.unknown {
		return rigid.ErrInput
	}
	if !(v.s.Margin() >= rigid.LeastMargin) {
		return rigid.ErrSingular
	}
	v.lu.clear()
	for i := range v.bonds {
		t := &v.bonds[i]
		t.refresh(v.s, v.length)
		for end := range t.link {
			if c := v.column[t.link[end]]; c >= 0 {
				for k := range 3 {
					v.lu.add(i, c+k, t.coef[end][k].Pos)
				}
			}
		}
	}
	if !v.lu.factor() {
		return rigid.ErrSingular
	}
	return nil
}

// by finds the derivatives of all links' motions by a dimension.
func (v *variation) by(m *Dimension) error {
	if len(m.Of) == 0 {
		return rigid.ErrInput
	}
	clear(v.force)
	size := 0.0
	for _, e := range m.Of {
		if !v.s.l.design.has(e) {
			return ErrReference
		}
		for i := range v.bonds {
			if t := &v.bonds[i]; t.joint == e.Joint {
				f := t.force(v.s, e, v.length)
				v.force[i] = sumOf(v.force[i], f)
				size = max(size, magnitude(f.Pos), magnitude(f.Vel), magnitude(f.Acc))
			}
		}
	}
	for order := range v.x[:v.orders] {
		size = max(size, v.sides(order))
		if !v.lu.solve(v.x[order], v.right, size) {
			return ErrInconsistent
		}
	}
	v.read()
	return nil
}

// sides writes the right-hand sides for a derivative by time, and returns the
// largest.
func (v *variation) sides(order int) (size float64) {
	for i := range v.bonds {
		f, t := &v.force[i], &v.bonds[i]
		sum := -[...]float64{f.Pos, f.Vel, f.Acc}[order]
		for end := 0; order > 0 && end < len(t.link); end++ {
			c := v.column[t.link[end]]
			for k := 0; c >= 0 && k < 3; k++ {
				a := &t.coef[end][k]
				if order == 1 {
					sum -= a.Vel * v.x[0][c+k]
				} else {
					sum -= 2*a.Vel*v.x[1][c+k] + a.Acc*v.x[0][c+k]
				}
			}
		}
		v.right[i] = sum
		size = max(size, magnitude(sum))
	}
	return size
}

// read lays out the solution link by link, lengths in m.
func (v *variation) read() {
	l := v.length
	for i, c := range v.column {
		if c < 0 {
			continue
		}
		d := &v.links[i]
		for order, to := range [...]*r2.Vec{&d.origin.Pos, &d.origin.Vel, &d.origin.Acc} {
			*to = r2.Vec{X: l*v.x[order][c] + 0, Y: l*v.x[order][c+1] + 0} // no −0
		}
		d.turn = rigid.Coordinate{Pos: v.x[0][c+2] + 0, Vel: v.x[1][c+2] + 0, Acc: v.x[2][c+2] + 0}
	}
}

// point returns the derivative of a point of a link,
//
//	δO + δθ k×r
func (v *variation) point(of Attachment) rigid.Point {
	r := fixed(v.s.Motion(of.Link), r2.Vec{X: of.X, Y: of.Y})
	d := &v.links[of.Link]
	turned := product(d.turn, quarter(r))
	return rigid.Point{
		Pos: r2.Add(d.origin.Pos, turned.Pos),
		Vel: r2.Add(d.origin.Vel, turned.Vel),
		Acc: r2.Add(d.origin.Acc, turned.Acc),
	}
}

// measured returns the derivative of the motion that a drive would drive: for a
// slide along u, and a reach along e, of e = b − a
//
//	u·δe + (u×e) δθ of u,   e·δe/|e|, the place alone
func (v *variation) measured(what Drive) rigid.Coordinate {
	switch m := what.(type) {
	case Turn:
		a, b := v.links[m.Of].turn, v.links[m.From].turn
		return rigid.Coordinate{Pos: a.Pos - b.Pos, Vel: a.Vel - b.Vel, Acc: a.Acc - b.Acc}
	case Slide:
		a, b := m.From.Link.At(m.From.X, m.From.Y), m.Of.Link.At(m.Of.X, m.Of.Y)
		u := fixed(v.s.Motion(m.From.Link), rigid.NewPose(0, 0, m.From.Angle).Axis)
		e, de := less(v.s.Point(b), v.s.Point(a)), less(v.point(b), v.point(a))
		return sumOf(dotted(&u, &de), times(crossed(&u, &e), v.links[m.From.Link].turn))
	case Reach:
		e, de := less(v.s.Point(m.B), v.s.Point(m.A)), less(v.point(m.B), v.point(m.A))
		return rigid.Coordinate{Pos: r2.Dot(e.Pos, de.Pos) / r2.Norm(e.Pos)}
	}
	return rigid.Coordinate{}
}
