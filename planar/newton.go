package planar

import (
	"errors"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A newton solves a unit that no closed form covers: a group of higher class, or
// links of known angles that slide on one another in a ring.
//
// Its unknowns are absolute angles, and slides along a spanning tree: every body
// hangs on the one before by a pin or by a guide, so that its place is a sum of
// vectors fixed in bodies, and only the joints that close loops leave equations.
// Angles are held as unit vectors, which a correction turns without trigonometry.
//
// Its workspace is a slice of size() float64s that belongs to one scene. What place
// finds beyond poses is kept there: unit vectors, slides, slopes and their factors.
type newton struct {
	n, free, slides int     // unknowns: free angles, then slides
	length          float64 // of the group: slides are unknowns in units of it
	psi             []int   // of its free angles, indices into system.free
	whole           []int   // of its free angles: those of which whole turns are needed, not the direction alone
	members         []member
	tree            []limb
	loops           []loop
	chords          []chord // of all loops, in their order
	customs         []ruled // the equations of Constraints, after those of the loops
	parts           customParts
	closed          int      // loops that are equations; those after them are the arms of customs
	cells           [][4]int // of loops that are parallelograms: the chords that are their sides, in the order around
}

// A member is a body of the group's equations.
type member struct {
	body  int
	own   []term // free angles of the group, by their place in newton.psi
	rest  angle  // what else its angle is made of, its psi those of earlier steps
	fixed bool   // rest is a constant
	same  bool   // its angle is a free one
	u     r2.Vec // the unit vector at rest, if fixed
	hangs bool   // its place is found by the group
}

// plain reports whether the body turns with one free angle, or against it.
func (m *member) plain() bool { return len(m.own) == 1 && math.Abs(m.own[0].Coef) == 1 }

// A limb hangs a member on a base that is placed before it:
//
//	origin of member = origin of base + R_base·pBase − R_member·pMember
//
// Where slide is not −1, one of the two points lies that far along u, on the line
// of the base or, if back, of the member. A limb without a base (−1) puts its
// member's origin at two slides along the frame's axes.
type limb struct {
	base, member   int
	pBase, pMember r2.Vec
	u              r2.Vec
	slide          int
	back           bool
}

// A loop is a joint that is left over by the tree. With C from a's point to b's, u
// and n = u⊥ turning with a, it asks for
//
//	C = 0;  n·C = value;  u·C = value + in;  u·C + rate·(θb − θa) = value
//
// where C is, by the limbs, a sum of chords between the origins of two known bodies:
//
//	C = origin of to − origin of from + Σ chords
type loop struct {
	kind     rowKind // rowX stands for both rows of a pin
	a, b     int
	u        r2.Vec
	value    float64
	drive    int
	rate     float64
	phase    int // index of the joint whose phase is read at Assemble, or −1
	from, to int // known members
	// of newton.chords: those fixed in known bodies, then those that the unknowns move
	still, moved, end int
	mixed             bool // one of them is
	cell              int  // index into newton.cells, else −1
}

// A chord is a vector fixed in a member; with a slide, so many times the vector.
type chord struct {
	member int
	v      r2.Vec
	slide  int     // or −1
	col    int     // of the free angle that turns the member, where it is one; else −1
	coef   float64 // of that
	mixed  bool    // more than one does
	first  bool    // of its loop in col
}

// largestGroup is the number of unknowns up to which the dense factors of a group
// are of use.
const largestGroup = 128

// newNewton prepares the solution of a unit, or says why it can't: too large a
// group. The rows' points and the angles are in the axes of scene.m.
func newNewton(s *system, b *block) (*newton, error) {
	n := &newton{}
	placed := map[int]bool{}
	for _, k := range b.unknowns {
		if k >= s.psi(0) {
			n.psi = append(n.psi, k-s.psi(0))
		} else {
			placed[k/2+1] = true
		}
	}
	n.free = len(n.psi)
	for _, i := range b.rows {
		r := &s.rows[i]
		for body := range r.bodies {
			n.member(s, body, placed)
		}
		n.length = math.Max(n.length, math.Max(r2.Norm(r.pa), math.Max(r2.Norm(r.pb), math.Abs(r.rate))))
	}
	if n.length == 0 {
		n.length = s.length
	}
	order, rings := ringed(s.rows, b.rows)
	n.span(s, order)
	for i := range n.loops {
		n.cellOf(&n.loops[i], rings)
	}
	n.closed = len(n.loops)
	n.rule(s, b.rows)
	n.n = n.free + n.slides
	n.count()
	rows := 0
	for _, l := range n.loops[:n.closed] {
		rows++
		if l.kind == rowX {
			rows++
		}
	}
	for i := range n.customs {
		rows += len(n.customs[i].nth)
	}
	if rows != n.n {
		return nil, errors.New("twopoint: a group of higher class whose equations do not match its unknowns")
	}
	if n.n > largestGroup {
		return nil, errors.New("twopoint: a group of higher class with more than 128 angles and slides")
	}
	return n, nil
}

// count notes which angles are needed over whole turns: those in racks, and those
// that turn a member at another speed.
func (n *newton) count() {
	see := func(i int) {
		for _, t := range n.members[i].own {
			if !slices.Contains(n.whole, t.Index) {
				n.whole = append(n.whole, t.Index)
			}
		}
	}
	for i := range n.loops {
		if l := &n.loops[i]; l.kind == rowRack {
			see(l.a)
			see(l.b)
		}
	}
	for i := range n.customs {
		for _, r := range n.customs[i].riders {
			see(r.member)
		}
	}
	for i := range n.members {
		if m := &n.members[i]; len(m.own) > 0 && !m.plain() {
			see(i)
		}
	}
}

// member returns the place of a body in members, entered if it is new.
func (n *newton) member(s *system, body int, placed map[int]bool) int {
	if i := slices.IndexFunc(n.members, func(m member) bool { return m.body == body }); i >= 0 {
		return i
	}
	form := s.angles[body]
	m := member{body: body, hangs: placed[body], rest: form, u: r2.Vec{X: math.Cos(form.Const), Y: math.Sin(form.Const)}}
	m.rest.psi = nil
	for _, t := range form.psi {
		if k := slices.Index(n.psi, t.Index); k >= 0 {
			m.own = append(m.own, term{k, t.Coef})
		} else {
			m.rest.psi = append(m.rest.psi, t)
		}
	}
	m.fixed = len(m.rest.psi)+len(m.rest.in)+len(m.rest.phase) == 0
	m.same = m.fixed && m.plain() && m.own[0].Coef == 1 && form.Const == 0
	n.members = append(n.members, m)
	return len(n.members) - 1
}
