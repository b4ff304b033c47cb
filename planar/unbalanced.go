package planar

import (
	"fmt"
	"slices"
	"strconv"
)

// An imbalance is what keeps a design from moving as its drives say: joints that
// hold one another doubly, and bodies that stay free.
type imbalance struct {
	over   int   // equations too many
	joints []int // that hold each other doubly; counts on through the drives
	under  int   // motions that nothing holds
	bodies []int // that have them
}

// unbalanced tells the imbalance of the equations by the null spaces of their
// matrix: the left one combines rows to nothing, the right one moves bodies and
// changes no row.
func (b *builder) unbalanced() error {
	q := b.full()
	of, by := match(q.rows, q.unknowns)
	blocks := components(q.rows, of, by)
	q = q.inOrder(blocks)
	var m imbalance
	left := kernel(backwards(transpose(q.rows, q.unknowns), blocks, of), len(q.rows))
	m.over = len(left)
	for _, v := range left {
		for _, t := range v.terms {
			m.joints = append(m.joints, q.joints[t.index])
		}
	}
	right := kernel(q.rows, q.unknowns)
	m.under = len(right)
	for _, v := range right {
		for _, t := range v.terms {
			m.bodies = append(m.bodies, q.bodies[t.index]...)
		}
	}
	b.imbalance = &m
	return b.explain(&m)
}

// backwards returns the columns of unknowns in the order opposite to that of
// solution, those of no row last.
func backwards(columns []form, blocks [][]int, of []int) []form {
	var out []form
	taken := make([]bool, len(columns))
	for _, row := range slices.Backward(slices.Concat(blocks...)) {
		if u := of[row]; u >= 0 {
			out = append(out, columns[u])
			taken[u] = true
		}
	}
	for u, column := range columns {
		if !taken[u] {
			out = append(out, column)
		}
	}
	return out
}

// explain makes the imbalance an error.
func (b *builder) explain(m *imbalance) error {
	free := b.d.names(b.linksIn(m.bodies))
	missing := fmt.Errorf("%w: %s missing", ErrUnderconstrained, count(m.under, "drive or joint", "drives or joints"))
	if m.over == 0 {
		return &DesignError{Err: fmt.Errorf("%w, these links stay free", missing), Links: free}
	}
	err := fmt.Errorf("%w: %s too many", ErrOverconstrained, count(m.over, "constraint", "constraints"))
	if b.d.Guess == nil {
		err = fmt.Errorf("%w, unless the dimensions make them agree, which takes a Guess to see", err)
	}
	if m.under > 0 {
		err = fmt.Errorf("%w; %w, %s stay free", err, missing, list(free))
	}
	return b.refuse(err, m.joints...)
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

func count(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return strconv.Itoa(n) + " " + many
}
