package planar

import (
	"maps"
	"math"
	"slices"

	"example.com/twopoint/internal/dyad"
	"gonum.org/v1/gonum/spatial/r2"
)

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

// meeting emits the lines that two ties keep two points of one pin on.
func (c *compiler) meeting(p *puzzle, one, two tie, first, second spot) bool {
	k1, ok1 := c.track(one.row, first)
	k2, ok2 := c.track(two.row, second)
	if !ok1 || !ok2 {
		return false
	}
	o := &meet{at: c.meets, one: k1, two: k2, of: []spot{first}}
	if second.body != first.body {
		o.of = append(o.of, second)
	}
	c.meets++
	c.emit(p.group, o)
	return true
}

// track returns the line on which a row keeps a point P of a body of known angle,
// the other body of the row being known. A row whose line is fixed in the other
// body puts
//
//	n·(P − pa) = value + n·(P − pb)        (guide)
//	u·(P − pa) = value + in + u·(P − pb)   (slide)
//
// which is a line there if the angle between the bodies is constant or P is pb. One
// whose line is fixed in the body itself puts
//
//	n·(P − pb) = n·(P − pa) − value
//	u·(P − pb) = u·(P − pa) − value − in
func (c *compiler) track(r *row, p spot) (k track, ok bool) {
	if r.kind == rowSlide || r.kind == rowRack {
		if k.by = c.displacement(r); k.by == nil {
			return k, false
		}
	}
	var beside r2.Vec
	if k.with = r.a; r.b == p.body {
		k.on = spot{r.a, r.pa}
		if beside, ok = c.besideOf(r, p); !ok {
			return k, false
		}
	} else {
		k.on, beside = spot{r.b, r.pb}, r2.Sub(p.at, r.pa)
	}
	u, n, sign := r.u, r2.Vec{X: -r.u.Y, Y: r.u.X}, 1.0
	if r.a == p.body {
		sign = -1
	}
	if r.kind == rowGuide {
		k.u, k.e = u, sign*r.value+r2.Dot(n, beside)
	} else { // the line is square to u, so that its right is u, or −u
		k.u, k.e = r2.Scale(sign, n), -r.value-sign*r2.Dot(u, beside)
	}
	return k, true
}

// besideOf returns the vector from the row's point of its body b to another in the
// axes of a, if it is fixed there.
func (c *compiler) besideOf(r *row, p spot) (r2.Vec, bool) {
	v := r2.Sub(p.at, r.pb)
	if v == (r2.Vec{}) {
		return v, true
	}
	a, b := form0(&c.angles[r.b]), form0(&c.angles[r.a])
	turn := a.add(-1, &b)
	return rotate(v, turn.c), len(turn.psi)+len(turn.in)+len(turn.phase) == 0
}

// displacement returns the part of a row's displacement along its line that
// changes: an input, or the turn of a pinion that is known.
func (c *compiler) displacement(r *row) *angleSum {
	if r.kind == rowSlide && r.drive < 0 {
		return &angleSum{}
	}
	if r.kind == rowSlide {
		return &angleSum{in: []term{{r.drive, 1}}}
	}
	if !c.known(r.a) || !c.known(r.b) {
		return nil
	}
	a, b := c.linear(r.a), c.linear(r.b)
	turn := b.add(-1, &a)
	turn = linear{}.add(-r.rate, &turn)
	if r.phased {
		turn.phase[r.joint]++
	}
	s := turn.sum()
	return &s
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
	fa, fb := form0(&c.angles[one.body]), form0(&c.angles[two.body])
	turn := fa.add(-1, &fb)
	if len(turn.psi)+len(turn.in)+len(turn.phase) > 0 {
		return false
	}
	n := r2.Vec{X: -r.u.Y, Y: r.u.X}
	// n·(A − C) = n·(A − pb) + value + n·(pa − C), in the axes of the slot
	e := r2.Dot(n, rotate(r2.Sub(one.at, r.pb), turn.c)) + r.value + r2.Dot(n, r2.Sub(r.pa, two.at))
	o := &rpr{k: dyad.RPR{E: e}, i: c.dyads, at: c.slots, a: a, c: at, one: one, two: two, limit: c.limit(), seen: c.seen(one.body, two.body)}
	o.u2 = r2.Vec{X: r.u.X, Y: -r.u.Y}
	o.u1 = turned(o.u2, r2.Vec{X: math.Cos(turn.c), Y: math.Sin(turn.c)})
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

// cell returns the parallelogram cell that a dyad is, or nil.
func (c *compiler) cell(o *rrr, d dyadTies) *cell {
	pa, pc := c.pinAt(d.out.row), c.pinAt(d.in.row)
	for _, i := range c.pins.points[pa] {
		for _, k := range c.pins.points[pc] {
			a, at := c.pins.spot[i], c.pins.spot[k]
			if a.body == at.body || !c.placed(a.body) || !c.placed(at.body) {
				continue
			}
			for _, oa := range c.pins.bodies[a.body] {
				for _, oc := range c.pins.bodies[at.body] {
					pin := c.pins.of(oa)
					if pin != c.pins.of(oc) || pin == pa || pin == pc {
						continue
					}
					l, m := r2.Norm(r2.Sub(a.at, c.pins.spot[oa].at)), r2.Norm(r2.Sub(at.at, c.pins.spot[oc].at))
					enough := even * math.Max(o.k.B, o.k.C)
					if math.Abs(l-o.k.C) > enough || math.Abs(m-o.k.B) > enough {
						continue
					}
					o.a, o.c = a, at
					return &cell{o: c.pins.spot[oa], rhombe: math.Abs(l-m) <= enough}
				}
			}
		}
	}
	return nil
}

func (c *compiler) pinAt(r *row) int { return c.pins.of(r.at) }

// placed reports whether a body has been placed before a dyad.
func (c *compiler) placed(body int) bool {
	return body == 0 || c.done[body]
}
