package planar

import (
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// span grows the tree by pins, then by guides, and leaves the other joints as
// loops. A body that neither reaches floats: its place is two slides.
func (n *newton) span(s *system, rows []int) {
	hung := make([]bool, len(n.members))
	for i := range n.members {
		hung[i] = !n.members[i].hangs
	}
	used := make([]bool, len(rows))
	grow := func(kind rowKind) bool {
		for k, i := range rows {
			r := &s.rows[i]
			a, b := n.member(s, r.a, nil), n.member(s, r.b, nil)
			if used[k] || r.kind != kind || hung[a] == hung[b] {
				continue
			}
			used[k] = true
			n.hang(r, a, b, hung[b])
			hung[a], hung[b] = true, true
			return true
		}
		return false
	}
	for {
		if grow(rowX) || grow(rowGuide) {
			continue
		}
		i := slices.Index(hung, false)
		if i < 0 {
			break
		}
		hung[i] = true
		n.tree = append(n.tree, limb{base: -1, member: i, slide: n.slide(2)})
	}
	for k, i := range rows {
		if r := &s.rows[i]; !used[k] && r.kind != rowY && r.custom == nil {
			n.close(s, r)
		}
	}
}

// slide enters new unknown slides, and returns the first.
func (n *newton) slide(more int) int {
	n.slides += more
	return n.slides - more
}

// hang enters a limb: b on a, or a on b if back. A guide's line is fixed in a.
func (n *newton) hang(r *row, a, b int, back bool) {
	l := limb{base: a, member: b, pBase: r.pa, pMember: r.pb, slide: -1, back: back}
	if r.kind == rowGuide {
		l.slide, l.u = n.slide(1), r.u
		l.pBase = r2.Add(r.pa, r2.Scale(r.value, r2.Vec{X: -r.u.Y, Y: r.u.X}))
	}
	if back {
		l.base, l.member, l.pBase, l.pMember = b, a, l.pMember, l.pBase
	}
	n.tree = append(n.tree, l)
}

// close enters a loop.
func (n *newton) close(s *system, r *row) {
	l := loop{kind: r.kind, a: n.member(s, r.a, nil), b: n.member(s, r.b, nil), u: r.u, value: r.value, drive: r.drive, rate: r.rate, phase: -1}
	if r.phased {
		l.phase = r.joint
	}
	n.connect(s, l, r.pa, r.pb)
}

// connect enters a loop with the chords from point pa of its a to pb of its b.
func (n *newton) connect(s *system, l loop, pa, pb r2.Vec) {
	var all []chord
	all = n.add(all, l.b, -1, pb, 1)
	all = n.add(all, l.a, -1, pa, -1)
	l.to, all = n.trace(s, all, l.b, 1)
	l.from, all = n.trace(s, all, l.a, -1)
	all = slices.DeleteFunc(all, func(a chord) bool { return r2.Norm(a.v) <= 1e-16*n.length })
	l.still = len(n.chords)
	for _, moved := range []bool{false, true} {
		if moved {
			l.moved = len(n.chords)
		}
		for _, a := range all {
			if moved == (a.slide >= 0 || len(n.members[a.member].own) > 0) {
				n.chords = append(n.chords, a)
			}
		}
	}
	l.end = len(n.chords)
	n.firsts(&l)
	l.cell = -1
	n.loops = append(n.loops, l)
}

// firsts marks the first chord of a loop in every column, where each chord has one.
func (n *newton) firsts(l *loop) {
	chords, seen := n.chords[l.moved:l.end], make([]bool, n.free)
	l.mixed = slices.ContainsFunc(chords, func(c chord) bool { return c.mixed })
	for i := range chords {
		if c := &chords[i]; c.col >= 0 {
			c.first = !l.mixed && !seen[c.col]
			seen[c.col] = true
		}
	}
}

// trace adds sign times the chords of the limbs from a known member, which it
// returns, to a member.
func (n *newton) trace(s *system, all []chord, member int, sign float64) (int, []chord) {
	for n.members[member].hangs {
		l := &n.tree[slices.IndexFunc(n.tree, func(l limb) bool { return l.member == member })]
		if l.base < 0 {
			frame := n.member(s, 0, nil)
			all = n.add(all, frame, l.slide, r2.Vec{X: 1}, sign)
			all = n.add(all, frame, l.slide+1, r2.Vec{Y: 1}, sign)
			return frame, all
		}
		all = n.add(all, l.base, -1, l.pBase, sign)
		all = n.add(all, l.member, -1, l.pMember, -sign)
		switch {
		case l.slide >= 0 && l.back:
			all = n.add(all, l.member, l.slide, l.u, -sign)
		case l.slide >= 0:
			all = n.add(all, l.base, l.slide, l.u, sign)
		}
		member = l.base
	}
	return member, all
}

// add adds sign times a vector to the chords, in one with another of its kind.
func (n *newton) add(all []chord, member, slide int, v r2.Vec, sign float64) []chord {
	v = r2.Scale(sign, v)
	for i := range all {
		if a := &all[i]; a.member == member && a.slide == slide {
			a.v = r2.Add(a.v, v)
			return all
		}
	}
	a := chord{member: member, v: v, slide: slide, col: -1}
	switch own := n.members[member].own; len(own) {
	case 0:
	case 1:
		a.col, a.coef = own[0].Index, own[0].Coef
	default:
		a.mixed = true
	}
	return append(all, a)
}
