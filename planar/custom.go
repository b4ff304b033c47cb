package planar

import (
	"fmt"

	"example.com/twopoint/rigid"
)

// A custom is a Custom joint as New has read it. Its rows are those of the system
// that point to it.
type custom struct {
	by     Constraint
	joint  int
	links  []Link
	bodies []int        // of the links
	points []int        // their origins
	on     [][]Unknowns // by row and link
	memory int
	faults [faultKinds]error
}

// mostRows is the number of equations that a Constraint may have.
const mostRows = 64

// A checkable constraint tells what is wrong with its own numbers.
type checkable interface{ check() error }

// custom checks what can be told of a Constraint without evaluating it.
func (c *checker) custom(at string, j Custom) {
	if j.By == nil {
		c.wrong("%s has no Constraint", at)
		return
	}
	if own, ok := j.By.(checkable); ok {
		if err := own.check(); err != nil {
			c.Faults = append(c.Faults, fmt.Errorf("%s: %w", at, err))
			return
		}
	}
	links := j.By.Links()
	if len(links) < 2 {
		c.wrong("%s: its Constraint ties %s; what depends on the place of one link ties it to Frame", at, count(len(links), "link", "links"))
	}
	for i, l := range links {
		if l < 0 || int(l) >= len(c.d.Links) {
			c.wrong("%s: link %d of %d does not exist", at, l, len(c.d.Links))
			return
		}
		for _, k := range links[:i] {
			if k == l {
				c.wrong("%s: its Constraint names %s twice", at, c.d.name(l))
				c.concern(l)
			}
		}
	}
	if n := j.By.Rows(); n < 1 || n > mostRows {
		c.wrong("%s: its Constraint has %d equations, not 1 to %d", at, n, mostRows)
	}
	if m, ok := j.By.(Rememberer); ok && (m.Memory() < 0 || m.Memory() > 1<<16) {
		c.wrong("%s: its Constraint keeps %d numbers", at, m.Memory())
	}
}

// linksOfConstraint returns the links of a Constraint, if there is one.
func linksOfConstraint(c Constraint) []Link {
	if c == nil {
		return nil
	}
	return append([]Link(nil), c.Links()...)
}

// custom writes the rows of a Custom joint.
func (b *builder) custom(j Custom, joint int) error {
	c := &custom{by: j.By, joint: joint, links: linksOfConstraint(j.By)}
	for _, l := range c.links {
		i := b.point(l.At(0, 0))
		c.points, c.bodies = append(c.points, i), append(c.bodies, b.points[i].body)
	}
	declared, _ := j.By.(Declarer)
	for row := range j.By.Rows() {
		on := make([]Unknowns, len(c.links))
		for i := range on {
			if on[i] = OfAll; declared != nil {
				on[i] = declared.Depends(row, i) & OfAll
			}
		}
		c.on = append(c.on, on)
	}
	if m, ok := j.By.(Rememberer); ok {
		c.memory = m.Memory()
	}
	c.name(b.d)
	last := len(c.links) - 1
	for i := range c.on {
		r := row{kind: rowCustom, a: c.bodies[0], b: c.bodies[last], at: c.points[0], bt: c.points[last],
			pa: b.points[c.points[0]].at, pb: b.points[c.points[last]].at, drive: -1, joint: joint, custom: c, nth: i}
		if len(b.customSlopes(b.scatter(make([]form, b.bodies())), r, true).terms) == 0 {
			return b.refuse(fmt.Errorf("%w: equation %d of its Constraint depends on nothing that could hold between these links alone; one that depends on their place in the frame ties them to Frame", ErrReference, i), joint)
		}
		if b.aside[joint].unit != kept {
			b.checkLater(r, "constraint")
			continue
		}
		b.rows = append(b.rows, r)
	}
	return nil
}

// A faultKind is why a Constraint gives no equations.
type faultKind int

const (
	noNumber   faultKind = iota // NaN or an infinity
	wrongCount                  // lists of another length
	noValue                     // its own error
	faultKinds
)

// name makes the errors of a custom.
func (c *custom) name(d *Design) {
	who := fmt.Sprintf("the constraint of joint %d (links %s)", c.joint, list(d.names(c.links)))
	for kind, f := range [faultKinds]struct {
		cause error
		does  string
	}{
		noNumber:   {rigid.ErrNotFinite, "gives a number that is not finite"},
		wrongCount: {rigid.ErrInput, "gives another number of equations or slopes than it has"},
		noValue:    {rigid.ErrUnreachable, "has no value there"},
	} {
		c.faults[kind] = fmt.Errorf("%w: %s %s", f.cause, who, f.does)
	}
}

// bodies yields the bodies of a row.
func (r *row) bodies(yield func(int) bool) {
	if r.custom == nil {
		_ = yield(r.a) && yield(r.b)
		return
	}
	for _, b := range r.custom.bodies {
		if !yield(b) {
			return
		}
	}
}

// touches reports whether a row has a body.
func (r *row) touches(body int) bool {
	for b := range r.bodies {
		if b == body {
			return true
		}
	}
	return false
}

// customSlopes returns random derivatives of a Constraint's row where it declares
// that there are any, as builder.slopes does for the rows whose derivatives are
// known. They make no difference between links that move as one, since the frame is
// no more than one of the links:
//
//	Σ sx = 0,  Σ sy = 0,  Σ (sθ + x·sy − y·sx) = 0
//
// By the link's x and y the body's angle counts as well: with v = p − O from the
// body's origin to the link's,
//
//	dx = dOx − v.y·dθ,   dy = dOy + v.x·dθ
//
// Of raw ones those of the links are returned, numbered by threes.
func (b *builder) customSlopes(s *scatter, r row, raw bool) form {
	c := r.custom
	var still [3]form
	var rows []form
	for i, body := range c.bodies {
		p := s.pin(b.pin(c.points[i]))
		x, y, turn := formTerm{3 * i, one}, formTerm{3*i + 1, one}, formTerm{3*i + 2, one}
		still[0], still[1] = still[0].plus(one, newForm(x)), still[1].plus(one, newForm(y))
		still[2] = still[2].plus(one, newForm(turn, formTerm{y.index, coefficient{exact: p[0]}}, formTerm{x.index, coefficient{exact: p[1].negative()}}))
		for k, t := range []formTerm{x, y, turn} {
			if body > 0 && c.on[r.nth][i]>>k&1 == 0 {
				rows = append(rows, newForm(t))
			}
		}
	}
	var at form
	for _, v := range kernel(append(rows, still[:]...), 3*len(c.bodies)) {
		at = at.plus(coefficient{exact: s.number()}, v)
	}
	if raw {
		return at
	}
	var f form
	add := func(k residue, index int) {
		f = f.plus(coefficient{exact: k}, newForm(formTerm{index, one}))
	}
	for i, body := range c.bodies {
		if body == 0 {
			continue
		}
		p, o := s.pin(b.pin(c.points[i])), s.origins[body]
		v := minus(p, o)
		sx, _ := at.of(3 * i)
		sy, _ := at.of(3*i + 1)
		turn, _ := at.of(3*i + 2)
		add(sx.exact, b.xy(body))
		add(sy.exact, b.xy(body)+1)
		by := turn.exact.plus(v[0].times(sy.exact)).minus(v[1].times(sx.exact))
		for _, t := range s.angles[body].terms {
			add(t.by.exact.times(by), b.system.psi(t.index))
		}
	}
	return f
}
