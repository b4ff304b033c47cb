package planar

import (
	"maps"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A stage is a block of whole bodies: what it places and turns.
type stage struct {
	rows   []int // a rowX stands for its rowY too
	bodies []int // that it places
	psi    []int
	group  int
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
