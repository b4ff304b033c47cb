package planar

import (
	"math"
	"slices"

	"example.com/twopoint/internal/dyad"
	"gonum.org/v1/gonum/spatial/r2"
)

// dyad recognises two links and three joints.
func (c *compiler) dyad(p *puzzle) bool {
	across := p.contract()
	var links []int
	for i := 1; i < len(p.leaders); i++ {
		if i != across {
			links = append(links, i)
		}
	}
	if len(links) != 2 {
		return false
	}
	for _, two := range [][2]int{{links[0], links[1]}, {links[1], links[0]}} {
		out, in := p.between(0, two[0]), p.between(0, two[1])
		if len(out) != 1 || len(in) != 1 || !out[0].pin {
			return false
		}
		d := dyadTies{one: two[0], two: two[1], out: out[0], in: in[0], across: across}
		switch {
		case across > 0:
			return in[0].pin && c.rrrAcross(p, d)
		case len(p.between(two[0], two[1])) != 1:
			return false
		}
		d.mid = p.between(two[0], two[1])[0]
		switch {
		case in[0].pin && d.mid.pin:
			return c.rrr(p, d)
		case in[0].pin:
			return c.rpr(p, d)
		case d.mid.pin && c.rrp(p, d):
			return true
		}
	}
	return false
}

// dyadTies are the joints of a dyad: between what is known and the first link,
// between the links, and between what is known and the second.
type dyadTies struct {
	one, two     int
	out, mid, in tie
	across       int
}

// contract returns a body of known angle between two pins of other clusters, 0 if
// there is none.
func (p *puzzle) contract() int {
	if len(p.leaders) != 4 {
		return 0
	}
	for i := 1; i < 4; i++ {
		var pins, others int
		for _, t := range p.ties {
			if t.a != i && t.b != i {
				continue
			}
			if others++; t.pin && t.a > 0 && t.b > 0 {
				pins++
			}
		}
		if pins == 2 && others == 2 {
			return i
		}
	}
	return 0
}

// seen returns those of the bodies that a guess tells of.
func (c *compiler) seen(bodies ...int) []int {
	return slices.DeleteFunc(bodies, func(b int) bool { return !c.visible[b] })
}

func (c *compiler) limit() float64 { return tolerance * c.length }

func (c *compiler) rrr(p *puzzle, d dyadTies) bool {
	one, a := d.out.end(d.one)
	two, at := d.in.end(d.two)
	mid1, mid2 := d.mid.end(d.one)
	if mid1.body == one.body && mid2.body == two.body && len(p.bodies) == 2 {
		ab, cb := r2.Sub(mid1.at, one.at), r2.Sub(mid2.at, two.at)
		o := newRRR(a, at, one, two, ab, cb)
		o.i, o.tri, o.limit, o.seen = c.dyads, c.tris, c.limit(), c.seen(one.body, two.body)
		o.cell = c.cell(o, d)
		c.emit(p.group, o)
		c.dyads++
		c.tris++
		c.source(one.body)
		c.source(two.body)
		return true
	}
	return c.fused(p, &fused{a: a, c: at, one: one, two: two, across: -1}, mid1, mid2)
}

// rrrAcross recognises two links that meet across a body of known angle.
func (c *compiler) rrrAcross(p *puzzle, d dyadTies) bool {
	first, second := p.between(d.one, d.across), p.between(d.two, d.across)
	if len(first) != 1 || len(second) != 1 {
		return false
	}
	one, a := d.out.end(d.one)
	two, at := d.in.end(d.two)
	mid1, p1 := first[0].end(d.one)
	mid2, p2 := second[0].end(d.two)
	if p1.body != p2.body || !c.known(p1.body) {
		return false
	}
	o := &fused{a: a, c: at, one: one, two: two, across: p1.body, shift: r2.Sub(p2.at, p1.at)}
	if !c.fused(p, o, mid1, mid2) {
		return false
	}
	c.emit(p.group, &pin{on: mid1, of: p1})
	return true
}

func (c *compiler) fused(p *puzzle, o *fused, mid1, mid2 spot) bool {
	before := *c.program
	var slots1, slots2 map[int]int
	var ok1, ok2 bool
	o.arm1, slots1, ok1 = c.arm(p, o.one, mid1)
	o.arm2, slots2, ok2 = c.arm(p, o.two, mid2)
	if !ok1 || !ok2 {
		*c.program = before
		return false
	}
	o.i, o.tri, o.limit, o.seen = c.dyads, c.tris, c.limit(), c.seen(o.one.body, o.two.body)
	c.dyads++
	c.tris++
	c.emit(p.group, o)
	c.source(o.one.body)
	c.source(o.two.body)
	c.ride(p, o.one.body, slots1)
	c.ride(p, o.two.body, slots2)
	return true
}

func (c *compiler) rrp(p *puzzle, d dyadTies) bool {
	one, a := d.out.end(d.one)
	mid1, mid2 := d.mid.end(d.one)
	if !c.known(mid2.body) || d.in.row.kind != rowGuide && d.in.row.kind != rowSlide && d.in.row.kind != rowRack {
		return false
	}
	own, _ := d.in.end(d.two)
	if own.body != mid2.body {
		return false
	}
	guide, ok := c.track(d.in.row, mid2)
	if !ok {
		return false
	}
	before := *c.program
	rod, slots, ok := c.arm(p, one, mid1)
	if !ok {
		*c.program = before
		return false
	}
	o := &rrp{rod: rod, i: c.dyads, at: c.rods, a: a, guide: guide, one: one, two: mid2, limit: c.limit(), seen: c.seen(one.body, mid2.body)}
	c.dyads++
	c.rods++
	c.emit(p.group, o)
	c.source(one.body)
	c.ride(p, one.body, slots)
	return true
}

func (c *compiler) rpr(p *puzzle, d dyadTies) bool {
	r := d.mid.row
	if len(p.bodies) != 2 || r.kind != rowGuide {
		return false
	}
	one, a := d.out.end(d.one)
	two, at := d.in.end(d.two)
	if r.a == one.body { // the slot is in the second
		one, a, two, at = two, at, one, a
	}
	turn, ok := c.fixedTurn(one.body, two.body)
	if !ok {
		return false
	}
	n := r2.Vec{X: -r.u.Y, Y: r.u.X}
	// n·(A − C) = n·(A − pb) + value + n·(pa − C), in the axes of the slot
	e := r2.Dot(n, rotate(r2.Sub(one.at, r.pb), turn)) + r.value + r2.Dot(n, r2.Sub(r.pa, two.at))
	o := &rpr{k: dyad.RPR{E: e}, i: c.dyads, at: c.slots, a: a, c: at, one: one, two: two, limit: c.limit(), seen: c.seen(one.body, two.body)}
	o.u2 = r2.Vec{X: r.u.X, Y: -r.u.Y}
	o.u1 = turned(o.u2, r2.Vec{X: math.Cos(turn), Y: math.Sin(turn)})
	o.size = c.reachOf(p)
	c.dyads++
	c.slots++
	c.emit(p.group, o)
	c.source(one.body)
	c.source(two.body)
	return true
}

// reachOf returns the largest distance between points of one body in a unit's rows.
func (c *compiler) reachOf(p *puzzle) float64 {
	var all []spot
	for _, i := range p.rows {
		r := &c.rows[i]
		all = append(all, spot{r.a, r.pa}, spot{r.b, r.pb})
	}
	size := 0.0
	for i, s := range all {
		for _, t := range all[:i] {
			if s.body == t.body {
				size = math.Max(size, r2.Norm(r2.Sub(s.at, t.at)))
			}
		}
	}
	return size
}
