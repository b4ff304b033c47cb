package planar

import "slices"

// A tie is a joint of a unit, as rows make it.
type tie struct {
	row  *row
	pin  bool
	a, b int // clusters that it joins; 0 is what is known
}

// A puzzle is a unit on the way to its op: bodies of known relative pose are
// clusters.
type puzzle struct {
	*stage
	cluster map[int]int // of each body; 0 is what is known
	leaders []int       // first body of each cluster
	ties    []tie
}

// stage finds the ops for a unit: closed forms where there are any.
func (c *compiler) stage(u *stage) error {
	for _, b := range u.bodies {
		c.turn(b)
	}
	defer func() {
		for _, b := range u.bodies {
			c.done[b] = true
		}
	}()
	if c.customary(u) {
		return c.higher(u)
	}
	p := c.puzzle(u)
	for _, form := range []func(*puzzle) bool{c.explicit, c.rolling, c.dyad} {
		if form(p) {
			return nil
		}
	}
	return c.higher(u)
}

// puzzle fuses the bodies of a unit that turn together and are pinned to each
// other, or guided along two lines: their relative pose is known.
func (c *compiler) puzzle(u *stage) *puzzle {
	p := &puzzle{stage: u, cluster: map[int]int{}}
	root := map[int]int{0: 0}
	for _, b := range u.bodies {
		root[b] = b
	}
	find := func(b int) int {
		for root[b] != b {
			b = root[b]
		}
		return b
	}
	for again := true; again; {
		again = false
		rows := map[[2]int]int{}
		for _, i := range u.rows {
			r := &c.rows[i]
			a, okA := root[r.a]
			b, okB := root[r.b]
			if !okA || !okB || r.a == 0 || r.b == 0 || c.class[r.a] != c.class[r.b] || c.known(r.a) || r.kind == rowRack {
				continue
			}
			a, b = find(a), find(b)
			pair := [2]int{min(a, b), max(a, b)}
			if rows[pair]++; a != b && rows[pair] == 2 {
				root[pair[1]], again = pair[0], true
				break
			}
		}
	}
	number := map[int]int{}
	p.leaders = []int{0}
	for _, b := range slices.Sorted(slices.Values(u.bodies)) {
		r := find(b)
		if number[r] == 0 {
			number[r] = len(p.leaders)
			p.leaders = append(p.leaders, r)
		}
		p.cluster[b] = number[r]
	}
	for _, i := range u.rows {
		r := &c.rows[i]
		t := tie{row: r, pin: r.kind == rowX, a: p.cluster[r.a], b: p.cluster[r.b]}
		if r.kind != rowY && t.a != t.b {
			p.ties = append(p.ties, t)
		}
	}
	return p
}

// end returns the side of a tie that is on a cluster, and the other.
func (t *tie) end(cluster int) (own, other spot) {
	a, b := spot{t.row.a, t.row.pa}, spot{t.row.b, t.row.pb}
	if t.a == cluster {
		return a, b
	}
	return b, a
}

// between returns the ties of two clusters.
func (p *puzzle) between(a, b int) []tie {
	var ties []tie
	for _, t := range p.ties {
		if t.a == a && t.b == b || t.a == b && t.b == a {
			ties = append(ties, t)
		}
	}
	return ties
}

// explicit recognises bodies of known angle: one pinned to what is known, one guided
// along two lines, or two of them pinned to each other, each guided along a line.
func (c *compiler) explicit(p *puzzle) bool {
	if len(p.psi) > 0 || len(p.ties) == 0 {
		return false
	}
	t := p.ties[0]
	switch n := len(p.bodies); {
	case n == 1 && len(p.ties) == 1 && t.pin:
		own, on := t.end(1)
		c.pin(p.group, &pin{on: on, of: own})
		return true
	case n == 1 && len(p.ties) == 2:
		own, _ := t.end(1)
		return c.meeting(p, p.ties[0], p.ties[1], own, own)
	case n == 2 && len(p.ties) == 3:
		pins, one, two := p.between(1, 2), p.between(0, 1), p.between(0, 2)
		if len(pins) != 1 || !pins[0].pin || len(one) != 1 || len(two) != 1 {
			return false
		}
		own, other := pins[0].end(1)
		return c.meeting(p, one[0], two[0], own, other)
	}
	return false
}

// pin emits a pin, as one with the input that turns the body where that is all.
func (c *compiler) pin(group int, p *pin) {
	if last := len(c.ops) - 1; last >= 0 {
		if o, ok := cranked(c.ops[last], p); ok {
			c.ops[last], c.groupOf[last] = o, group
			return
		}
	}
	c.emit(group, p)
}

// rolling recognises a pinion, pinned at its centre, on a rack that is known.
func (c *compiler) rolling(p *puzzle) bool {
	if len(p.bodies) != 1 || len(p.psi) != 1 || len(p.ties) != 2 {
		return false
	}
	pins, rack := p.ties[0], p.ties[1]
	if !pins.pin {
		pins, rack = rack, pins
	}
	own, on := pins.end(1)
	r := rack.row
	if !pins.pin || r.kind != rowRack || r.b != own.body || !c.one(r.pb, own.at) || !c.known(r.a) {
		return false
	}
	o := &roll{pinion: own, centre: on, rack: spot{r.a, r.pa}, u: r.u, rate: r.rate, value: r.value, phase: -1, by: c.total(r.a)}
	if r.phased {
		o.phase = r.joint
	}
	c.emit(p.group, o)
	c.source(own.body)
	return true
}

// higher leaves a unit to Newton's method.
func (c *compiler) higher(u *stage) error {
	b := &block{group: u.group}
	for _, body := range u.bodies {
		b.unknowns = append(b.unknowns, c.xy(body), c.xy(body)+1)
	}
	for _, k := range u.psi {
		b.unknowns = append(b.unknowns, c.system.psi(k))
	}
	slices.Sort(b.unknowns)
	b.rows = u.rows
	c.readAngles(u)
	n, err := newNewton(&c.system, b)
	if err != nil {
		return err
	}
	g := &group{n: n, at: len(c.newtons), linear: len(u.psi)+len(n.customs) == 0}
	c.newtons = append(c.newtons, n)
	c.geared = c.geared || len(n.customs) > 0 // a Constraint may read whole turns
	c.emit(u.group, g)
	for _, body := range c.turnedBy(u) {
		if !c.known(body) {
			c.source(body)
		}
		c.counted[body], c.turned[body] = true, true
		g.bodies = append(g.bodies, body)
	}
	return nil
}

// turnedBy returns the bodies of a unit's rows that its free angles turn.
func (c *compiler) turnedBy(u *stage) []int {
	var bodies []int
	for _, i := range u.rows {
		for b := range c.rows[i].bodies {
			turns := slices.ContainsFunc(c.angles[b].psi, func(t term) bool { return slices.Contains(u.psi, t.Index) })
			if turns && !slices.Contains(bodies, b) {
				bodies = append(bodies, b)
			}
		}
	}
	slices.Sort(bodies)
	return bodies
}

// readAngles notes the free angles of earlier units for a Newton group.
func (c *compiler) readAngles(u *stage) {
	for _, i := range u.rows {
		for b := range c.rows[i].bodies {
			for _, t := range c.angles[b].psi {
				if slices.Contains(u.psi, t.Index) {
					continue
				}
				if l := c.reduce(linear{psi: map[int]float64{t.Index: 1}}); len(l.psi) == 0 {
					c.emit(-1, &read{t.Index, l.sum()})
				}
			}
		}
	}
}
