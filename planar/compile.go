package planar

import (
	"maps"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A program says how a system is solved: ops in the order of solution. It is
// immutable.
type program struct {
	system   // rows and angles in the axes of the scenes' motions: those of the links
	ops      []op
	groupOf  []int      // of every op, or −1
	link     []int      // the motion of every link of the Design
	offset   []float64  // of every link: its angle in its body's axes
	counted  []bool     // bodies whose whole turns are counted
	whole    []angleSum // the angle of every body
	geared   bool       // whether an angle is a broken multiple of one that is counted
	newtons  []*newton  // groups of higher class: Move needs path rates where there are any
	perStep  []float64  // of each drive: steps per rad or m
	faults   []faults
	breaches []error // of every check

	bodies, motions, psis, dyads, tris, rods, slots, meets int
}

// tolerance is what counts as the limit of a reach, over the largest length.
const tolerance = 1e-14

// A compiler turns a system into a program.
type compiler struct {
	*program
	stages  []stage
	basis   []linear // what is known of the free angles
	turned  []bool   // bodies whose angle is set
	done    []bool   // bodies that are placed
	visible []bool   // bodies that a guess tells of
	pins    pinned
}

// A stage is a block of whole bodies: what it places and turns.
type stage struct {
	rows   []int // a rowX stands for its rowY too
	bodies []int // that it places
	psi    []int
	group  int
}

// compile turns the blocks of a system into ops.
func compile(s *system, names []string) (*program, error) {
	c := &compiler{program: &program{system: *s, bodies: len(s.angles), motions: len(s.angles), psis: len(s.free)}}
	c.seat()
	c.pins = findPins(c.rows)
	c.unite()
	c.turned, c.counted, c.done = make([]bool, c.bodies), make([]bool, c.bodies), make([]bool, c.bodies)
	c.turned[0] = true
	for i := range c.stages {
		if err := c.stage(&c.stages[i]); err != nil {
			return nil, &DesignError{Err: err, Links: c.namesOf(c.stages[i].group, names)}
		}
	}
	for b := range c.bodies {
		c.turn(b)
		c.whole = append(c.whole, c.total(b))
	}
	c.links()
	c.name(names)
	c.unsolved()
	c.steps()
	return c.program, nil
}

// seat chooses the axes of each body: those of its first link.
func (c *compiler) seat() {
	first := make([]r2.Vec, c.bodies)
	c.visible = make([]bool, c.bodies)
	seen := make([]bool, c.bodies)
	for l, s := range c.seats {
		if !seen[s.body] {
			seen[s.body], first[s.body] = true, s.local.Origin
			c.visible[s.body] = l < c.system.links
		}
	}
	first[0] = r2.Vec{}
	c.rows = slices.Clone(c.rows)
	move := func(r *row) {
		r.pa, r.pb = r2.Sub(r.pa, first[r.a]), r2.Sub(r.pb, first[r.b])
	}
	for i := range c.rows {
		move(&c.rows[i])
	}
	c.checks = slices.Clone(c.checks)
	for i := range c.checks {
		move(&c.checks[i].row)
	}
	c.seats = slices.Clone(c.seats)
	for i := range c.seats {
		s := &c.seats[i]
		s.local.Origin = r2.Sub(s.local.Origin, first[s.body])
	}
}

// steps sets how far each drive goes in one step.
func (c *compiler) steps() {
	c.perStep = make([]float64, c.drives)
	for i := range c.perStep {
		c.perStep[i] = 1 / longestTurn
	}
	for _, r := range c.rows {
		if r.kind == rowSlide && r.drive >= 0 {
			c.perStep[r.drive] = 1 / (longestSlide * c.length)
		}
	}
}

// links gives every link of the Design a motion: its body's, or one of its own.
func (c *compiler) links() {
	for _, s := range c.seats[:c.system.links] {
		c.offset = append(c.offset, s.local.Angle())
		if s.local.Origin == (r2.Vec{}) && s.local.Axis == (r2.Vec{X: 1}) {
			c.link = append(c.link, s.body)
			continue
		}
		c.link = append(c.link, c.motions)
		c.emit(-1, &seated{c.motions, s.body, s.local})
		c.motions++
	}
}

func (c *compiler) emit(group int, o op) {
	if s, ok := o.(*spin); ok {
		c.geared = c.geared || slices.ContainsFunc(s.by.bodies, func(t term) bool { return t.Coef != math.Trunc(t.Coef) })
	}
	c.ops = append(c.ops, o)
	c.groupOf = append(c.groupOf, group)
}

// unite makes units of whole bodies out of the blocks, in the order of solution:
// blocks that find x and y of one body are one. A body placed by a pin before its
// angle is known is placed with the angle; other rows with its pin take the body
// that it is pinned to.
func (c *compiler) unite() {
	of := make([]int, c.system.unknowns())
	for i, b := range c.blocks {
		for _, u := range b.unknowns {
			of[u] = i
		}
	}
	root := make([]int, len(c.blocks))
	for i := range root {
		root[i] = i
	}
	find := func(i int) int {
		for root[i] != i {
			i = root[i]
		}
		return i
	}
	for b := 1; b < c.bodies; b++ {
		root[find(of[c.xy(b)])] = find(of[c.xy(b)+1])
	}
	c.together(root, find)
	for b := 1; b < c.bodies; b++ {
		c.unseat(b, of, root, find)
	}
	number := map[int]int{}
	for i, b := range c.blocks {
		r := find(i)
		n, ok := number[r]
		if !ok {
			n = len(c.stages)
			number[r] = n
			c.stages = append(c.stages, stage{group: b.group})
		}
		c.stages[n].take(&c.system, &b)
	}
	unitOf := make([]int, len(of))
	for u, i := range of {
		unitOf[u] = number[find(i)]
	}
	c.sort(unitOf)
}

// unseat puts the pin of a body with the block that finds its angle, if that comes
// later and has rows with the body.
func (c *compiler) unseat(body int, of, root []int, find func(int) int) {
	block := of[c.xy(body)]
	at := find(block)
	for _, t := range c.angles[body].psi {
		later := find(of[c.system.psi(t.Index)])
		if later == at || !c.pinnedBy(body, block) {
			continue
		}
		r := &c.rows[c.blocks[block].rows[0]]
		on, own := spot{r.a, r.pa}, spot{r.b, r.pb}
		if r.a == body {
			on, own = own, on
		}
		for _, i := range c.blocks[later].rows {
			if c.rows[i].touches(body) {
				root[at] = later
			}
		}
		c.refer(own, on, r.joint)
		return
	}
}

// pinnedBy reports whether a block of one unknown or two places a body by a pin.
func (c *compiler) pinnedBy(body, block int) bool {
	b := &c.blocks[block]
	r := &c.rows[b.rows[0]]
	return len(b.unknowns) <= 2 && (r.kind == rowX || r.kind == rowY) && (r.a == body || r.b == body)
}

// refer makes other rows with a body's pin take the body that it is pinned to.
func (c *compiler) refer(own, on spot, joint int) {
	for i := range c.rows {
		r := &c.rows[i]
		if r.joint == joint || r.custom != nil {
			continue
		}
		if r.b == own.body && c.one(r.pb, own.at) && r.kind != rowRack {
			r.b, r.pb = on.body, on.at
		} else if r.a == own.body && c.one(r.pa, own.at) && (r.kind == rowX || r.kind == rowY) {
			r.a, r.pa = on.body, on.at
		}
	}
}

// one reports whether two points of a body are one.
func (c *compiler) one(p, q r2.Vec) bool { return r2.Norm(r2.Sub(p, q)) <= same*c.length }

// take adds a block.
func (u *stage) take(s *system, b *block) {
	u.rows = append(u.rows, b.rows...)
	for _, k := range b.unknowns {
		if k >= s.psi(0) {
			u.psi = append(u.psi, k-s.psi(0))
		} else if body := k/2 + 1; !slices.Contains(u.bodies, body) {
			u.bodies = append(u.bodies, body)
		}
	}
	u.group = max(u.group, b.group)
	slices.Sort(u.rows)
}

// sort puts the units in the order of solution.
func (c *compiler) sort(unitOf []int) {
	waits := func(n int, visit func(int)) {
		u := &c.stages[n]
		see := func(body int) {
			if body == 0 {
				return
			}
			visit(unitOf[c.xy(body)])
			for _, t := range c.angles[body].psi {
				visit(unitOf[c.system.psi(t.Index)])
			}
		}
		for _, i := range u.rows {
			for body := range c.rows[i].bodies {
				see(body)
			}
		}
		for _, b := range u.bodies {
			see(b)
		}
	}
	var sorted []stage
	for _, part := range strong(len(c.stages), waits) {
		all := c.stages[part[0]]
		for _, n := range part[1:] {
			o := &c.stages[n]
			all.rows = slices.Sorted(slices.Values(append(all.rows, o.rows...)))
			all.bodies = append(all.bodies, o.bodies...)
			all.psi = append(all.psi, o.psi...)
			all.group = max(all.group, o.group)
		}
		sorted = append(sorted, all)
	}
	c.stages = sorted
}

// A pinned tells which points of bodies lie on one pin.
type pinned struct {
	first  map[int]int   // of a point: another of its pin, or nothing
	spot   map[int]spot  // of every point
	points map[int][]int // of a pin
	bodies map[int][]int // of a body: its points
}

func findPins(rows []row) pinned {
	p := pinned{map[int]int{}, map[int]spot{}, map[int][]int{}, map[int][]int{}}
	for i := range rows {
		r := &rows[i]
		p.spot[r.at], p.spot[r.bt] = spot{r.a, r.pa}, spot{r.b, r.pb}
		if a, b := p.of(r.at), p.of(r.bt); r.kind == rowX && a != b {
			p.first[a] = b
		}
	}
	for _, i := range slices.Sorted(maps.Keys(p.spot)) {
		p.points[p.of(i)] = append(p.points[p.of(i)], i)
		p.bodies[p.spot[i].body] = append(p.bodies[p.spot[i].body], i)
	}
	return p
}

// of returns the point that stands for a point's pin.
func (p *pinned) of(point int) int {
	for {
		next, ok := p.first[point]
		if !ok {
			return point
		}
		point = next
	}
}

// A linear is an angle as a linear form: of free angles that are not known, angles
// of bodies, inputs, phases.
type linear struct {
	psi, body, in, phase map[int]float64
	c                    float64
	pivot                int
}

// linear returns the angle of a body in free angles.
func (c *compiler) linear(body int) linear { return c.reduce(form0(&c.angles[body])) }

func form0(a *angle) linear {
	l := linear{psi: map[int]float64{}, body: map[int]float64{}, in: map[int]float64{}, phase: map[int]float64{}, c: a.Const}
	for _, t := range a.psi {
		l.psi[t.Index] += t.Coef
	}
	for _, t := range a.in {
		l.in[t.Index] += t.Coef
	}
	for _, t := range a.phase {
		l.phase[t.Index] += t.Coef
	}
	return l
}

// add returns l + k·o.
func (l linear) add(k float64, o *linear) linear {
	sum := linear{c: l.c + k*o.c}
	both := func(a, b map[int]float64) map[int]float64 {
		s := map[int]float64{}
		for i, v := range a {
			s[i] = v
		}
		for i, v := range b {
			w := s[i] + k*v
			if math.Abs(w) < 1e-12*(math.Abs(s[i])+math.Abs(k*v)) || w == 0 {
				delete(s, i)
			} else {
				s[i] = w
			}
		}
		return s
	}
	sum.psi, sum.body, sum.in, sum.phase = both(l.psi, o.psi), both(l.body, o.body), both(l.in, o.in), both(l.phase, o.phase)
	return sum
}

// reduce puts what is known in place of free angles.
func (c *compiler) reduce(l linear) linear {
	for i := range c.basis {
		b := &c.basis[i]
		if k := l.psi[b.pivot]; k != 0 {
			l = l.add(-k, b)
			delete(l.psi, b.pivot)
		}
	}
	return l
}

// source notes that the angle of a body has been solved: its form less itself is 0.
func (c *compiler) source(body int) {
	c.counted[body], c.turned[body] = true, true
	l := c.linear(body)
	if len(l.psi) == 0 {
		return
	}
	l = l.add(-1, &linear{body: map[int]float64{body: 1}})
	l.pivot = -1
	for i := range l.psi {
		if l.pivot < 0 || math.Abs(l.psi[i]) > math.Abs(l.psi[l.pivot]) || math.Abs(l.psi[i]) == math.Abs(l.psi[l.pivot]) && i < l.pivot {
			l.pivot = i
		}
	}
	k := l.psi[l.pivot]
	c.basis = append(c.basis, linear{}.add(1/k, &l))
	c.basis[len(c.basis)-1].pivot = l.pivot
}

// known reports whether the angle of a body is known.
func (c *compiler) known(body int) bool { return len(c.linear(body).psi) == 0 }

// sum returns a known angle.
func (l *linear) sum() angleSum {
	s := angleSum{c: l.c}
	s.u = r2.Vec{X: math.Cos(l.c), Y: math.Sin(l.c)}
	if l.c == 0 {
		s.u = r2.Vec{X: 1}
	}
	list := func(m map[int]float64) (t []term) {
		for i, k := range m {
			t = append(t, term{i, k})
		}
		slices.SortFunc(t, func(a, b term) int { return a.Index - b.Index })
		return t
	}
	s.bodies, s.in, s.phase = list(l.body), list(l.in), list(l.phase)
	return s
}

// total returns the angle of a body with its whole turns.
func (c *compiler) total(body int) angleSum {
	if c.counted[body] {
		return angleSum{bodies: []term{{body, 1}}, u: r2.Vec{X: 1}}
	}
	l := c.linear(body)
	return l.sum()
}

// turn sets the angle of a body, if it is known and not set.
func (c *compiler) turn(body int) {
	if c.turned[body] || !c.known(body) {
		return
	}
	c.turned[body] = true
	l := c.linear(body)
	if s := l.sum(); s.follows() {
		c.emit(-1, &follow{body, s.bodies[0].Index, s.u})
	} else {
		c.emit(-1, &spin{body, s})
	}
}
