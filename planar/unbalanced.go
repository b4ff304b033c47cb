package planar

import (
	"fmt"
	"slices"
)

// An imbalance is what keeps a design from moving as its drives say: joints that
// hold one another doubly, and bodies that stay free.
type imbalance struct {
	over   int   // equations too many
	joints []int // that hold each other doubly; counts on through the drives
	under  int   // motions that nothing holds
	bodies []int // that have them
}

// unbalanced tells the imbalance of the rows, given in the order of solution, by
// the null spaces of their matrix: the left one combines rows to nothing, the right
// one moves bodies and changes no row.
func (b *builder) unbalanced(order []int, rows []form) error {
	var m imbalance
	columns := transpose(rows, b.unknowns())
	slices.Reverse(columns)
	left := kernel(columns, len(rows))
	m.over = len(left)
	for _, v := range left {
		for _, t := range v.terms {
			m.joints = append(m.joints, b.rows[order[t.index]].joint)
		}
	}
	right := kernel(rows, b.unknowns())
	m.under = len(right)
	for _, v := range right {
		for _, t := range v.terms {
			m.bodies = append(m.bodies, b.moved(t.index)...)
		}
	}
	return b.explain(&m)
}

// moved returns the bodies that an unknown moves.
func (b *builder) moved(unknown int) []int {
	if unknown < b.system.psi(0) {
		return []int{unknown/2 + 1}
	}
	var bodies []int
	for i, f := range b.psi {
		if _, ok := f.of(unknown - b.system.psi(0)); ok {
			bodies = append(bodies, i)
		}
	}
	return bodies
}

func (b *builder) explain(m *imbalance) error {
	hint := "; if the dimensions make them agree, the design needs a Guess"
	if b.d.Guess != nil {
		hint = ""
	}
	over := fmt.Errorf("%w: %s too many%s", ErrOverconstrained, count(m.over, "constraint"), hint)
	under := fmt.Errorf("%w: %s missing: %s free", ErrUnderconstrained, count(m.under, "drive or joint"), list(b.d.names(b.linksIn(m.bodies))))
	switch {
	case m.over == 0:
		bad := b.refuse(under).(*DesignError)
		bad.Links = b.d.names(b.linksIn(m.bodies))
		bad.Err = fmt.Errorf("%w: %s missing, for links that stay free", ErrUnderconstrained, count(m.under, "drive or joint"))
		return bad
	case m.under == 0:
		return b.refuse(over, m.joints...)
	}
	return b.refuse(fmt.Errorf("%w; %w", over, under), m.joints...)
}

// linksIn returns the links of bodies, the hidden ones left out.
func (b *builder) linksIn(bodies []int) []Link {
	var links []Link
	for l, s := range b.seats[:b.links] {
		if slices.Contains(bodies, s.body) {
			links = append(links, Link(l))
		}
	}
	return links
}

func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
