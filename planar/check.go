package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// Agreed says by how much a redundant constraint may be off: of the largest length,
// or in rad.
const agreed = 1e-9

// miss returns by how much a redundant constraint doesn't hold, in m or rad.
func (p *program) miss(i int, sc *scene) float64 {
	c := &p.checks[i]
	if c.row.custom != nil {
		return math.Abs(p.miscustom(i, sc))
	}
	if c.angle == nil {
		return math.Abs(p.residual(&c.row, sc))
	}
	off := p.signed(i, sc)
	if c.angle.phased {
		off -= sc.phase[c.angle.joint]
	}
	if c.angle.mod {
		off = rigid.Wrap(off)
	}
	return math.Abs(off)
}

// residual returns by how much a row doesn't hold, in m.
func (p *program) residual(r *row, sc *scene) float64 {
	a, b := sc.place(&spot{r.a, r.pa}), sc.place(&spot{r.b, r.pb})
	d := r2.Sub(b, a)
	u := turned(sc.m[r.a].Pose.Axis, r.u)
	switch r.kind {
	case rowX:
		return d.X
	case rowY:
		return d.Y
	case rowGuide:
		return cross(u, d) - r.value
	case rowSlide:
		off := r2.Dot(u, d) - r.value
		if r.drive >= 0 { // a length that is checked has none
			off -= sc.in[r.drive].Pos
		}
		return off
	}
	off := r2.Dot(u, d) + r.rate*(p.whole[r.b].value(sc)-p.whole[r.a].value(sc)) - r.value
	if r.phased {
		off -= sc.phase[r.joint]
	}
	return off
}

// check holds the redundant constraints against the position assembled, and sets by
// how much they may be off from there on: ten times as much, if that is more than
// what rounding may do. Meshes read their phase here.
func (s *State) check() error {
	p := s.l.program
	for i := range p.checks {
		if a := p.checks[i].angle; a != nil && a.phased {
			s.now.phase[a.joint] = 0
			s.now.phase[a.joint] = p.signed(i, s.now)
		}
		scale := p.length
		if p.checks[i].angle != nil {
			scale = 1
		}
		miss := p.miss(i, s.now)
		if !(miss <= 10*agreed*scale) {
			return fmt.Errorf("%w, by %.3g", p.breaches[i], miss)
		}
		s.most[i] = math.Max(agreed*scale, 10*miss)
	}
	return nil
}

// signed returns the sum of angles of a check less its constant.
func (p *program) signed(i int, sc *scene) float64 {
	a := p.checks[i].angle
	off := -a.Const
	for _, t := range a.of {
		off += t.Coef * p.whole[t.Index].value(sc)
	}
	return off
}

// unsolved makes the errors of the redundant constraints.
func (c *compiler) unsolved() {
	for i := range c.checks {
		c.breaches = append(c.breaches, fmt.Errorf("%w: the %s, which follows from the others, doesn't hold", ErrInconsistent, c.checks[i].unit))
	}
}
