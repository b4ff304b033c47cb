package planar

import (
	"maps"
	"slices"
)

// arm returns the vector between two points of a cluster in the axes of the body of
// the first, where needed by emitting the motions of its bodies relative to that.
func (c *compiler) arm(p *puzzle, from, to spot) (arm, map[int]int, bool) {
	if from.body == to.body {
		slots := map[int]int{from.body: 0}
		return rigidArm(from.at, to.at), slots, c.relative(p, from.body, slots)
	}
	slots := map[int]int{from.body: 0}
	if !c.relative(p, from.body, slots) {
		return arm{}, nil, false
	}
	return arm{from.at, spot{slots[to.body], to.at}}, slots, true
}

// relative emits the motions of a cluster's bodies relative to one of them.
func (c *compiler) relative(p *puzzle, first int, slots map[int]int) bool {
	var members []int
	for b, n := range p.cluster {
		if n == p.cluster[first] && b != first {
			members = append(members, b)
		}
	}
	slices.Sort(members)
	for again := true; again; {
		again = false
		for _, b := range members {
			if _, ok := slots[b]; !ok && c.beside(p, b, first, slots) {
				again = true
			}
		}
	}
	return len(slots) == len(members)+1
}

// beside emits the motion of a body relative to the first of its cluster, if it is
// tied to bodies for which that is done.
func (c *compiler) beside(p *puzzle, body, first int, slots map[int]int) bool {
	var pins *row
	var lines []*row
	for _, i := range p.rows {
		r := &c.rows[i]
		other := r.a
		if r.a == body {
			other = r.b
		} else if r.b != body {
			continue
		}
		if _, ok := slots[other]; !ok {
			continue
		}
		switch r.kind {
		case rowX:
			pins = r
		case rowGuide, rowSlide:
			lines = append(lines, r)
		}
	}
	if pins == nil && len(lines) < 2 {
		return false
	}
	slot := c.motions
	a, b := form0(&c.angles[body]), form0(&c.angles[first])
	l := a.add(-1, &b)
	turn := &spin{slot, l.sum()}
	on := func(r *row) (own, other spot) {
		own, other = spot{r.b, r.pb}, spot{r.a, r.pa}
		if r.a == body {
			own, other = other, own
		}
		return own, spot{slots[other.body], other.at}
	}
	if pins != nil {
		own, other := on(pins)
		c.emit(p.group, turn)
		c.emit(p.group, &pin{on: other, of: spot{slot, own.at}})
	} else {
		own, _ := on(lines[0])
		k1, ok1 := c.track(lines[0], own)
		k2, ok2 := c.track(lines[1], own)
		if !ok1 || !ok2 {
			return false
		}
		k1.relative(slots, body, slot)
		k2.relative(slots, body, slot)
		c.emit(p.group, turn)
		c.emit(p.group, &meet{at: c.meets, one: k1, two: k2, of: []spot{{slot, own.at}}})
		c.meets++
	}
	c.motions++
	slots[body] = slot
	return true
}

// relative puts the slots of relative motions in place of bodies.
func (k *track) relative(slots map[int]int, body, slot int) {
	k.on.body = slots[k.on.body]
	if k.with == body {
		k.with = slot
	} else {
		k.with = slots[k.with]
	}
}

// ride emits the motions of a cluster's bodies but for the first.
func (c *compiler) ride(p *puzzle, first int, slots map[int]int) {
	for _, b := range slices.Sorted(maps.Keys(slots)) {
		if b == first {
			continue
		}
		c.counted[b], c.turned[b] = true, true
		c.emit(p.group, &ride{body: b, on: first, relative: slots[b]})
	}
}
