package planar

import "slices"

// group finds the driving links and Assur groups: bodies that must be solved
// together when angles are not eliminated beforehand.
func (b *builder) group() {
	q := b.full()
	of, by := match(q.rows, q.unknowns)
	waits := make([][]int, b.bodies()) // for the bodies that a body's rows need
	for i, row := range q.rows {
		own := q.bodies[of[i]][0]
		for _, t := range row.terms {
			waits[own] = append(waits[own], q.bodies[t.index][0])
		}
	}
	_ = by
	sets := strong(b.bodies(), func(body int, visit func(int)) {
		for _, w := range waits[body] {
			visit(w)
		}
	})
	groupOf := minusOnes(b.bodies())
	for _, bodies := range sets {
		if bodies[0] == 0 {
			continue
		}
		for _, body := range bodies {
			groupOf[body] = len(b.groups)
		}
		b.groups = append(b.groups, b.classify(bodies, groupOf))
	}
	for i := range b.blocks {
		for _, row := range b.blocks[i].rows {
			r := b.rows[row]
			for body := range r.bodies {
				b.blocks[i].group = max(b.blocks[i].group, groupOf[body])
			}
		}
	}
}

// A contour is a group seen as clusters of bodies with known relative pose, and
// the joints among them and to what is known before, which is cluster 0.
type contour struct {
	clusters int
	known    []bool // of every cluster: its angle is known
	joints   []contourJoint
}

type contourJoint struct {
	kind   byte // 'R', 'P', or 0 for any other
	a, b   int  // clusters
	pa, pb int  // pins, for the contour through a pin of several bodies
}

// classify tells class and kind of a group.
func (b *builder) classify(bodies, groupOf []int) Group {
	g := Group{Links: b.linksIn(bodies)}
	if len(bodies) == 2 {
		whole := b.contour(bodies, groupOf, apart(bodies))
		if g.Kind = whole.kind(); g.Kind != NoDyad {
			g.Class = 2
			return g
		}
	}
	c := b.contour(bodies, groupOf, b.fused(bodies))
	for cluster := c.clusters; cluster > 0; cluster-- {
		if c.known[cluster] {
			c.contract(cluster)
		}
	}
	switch {
	case c.clusters == 1:
		g.Class = 1
	case c.clusters == 2:
		g.Class, g.Kind = 2, c.kind()
	default:
		g.Class = max(3, c.girth())
	}
	return g
}

// contour returns the clusters of a group, given by the root of each body's.
func (b *builder) contour(bodies, groupOf []int, cluster map[int]int) *contour {
	name := map[int]int{0: 0}
	c := &contour{known: []bool{true}}
	for _, body := range bodies {
		if root := cluster[body]; name[root] == 0 {
			c.clusters++
			name[root] = c.clusters
			c.known = append(c.known, b.class[root] == 0)
		}
	}
	solved := func(body int) bool { return body == 0 || groupOf[body] >= 0 }
	for _, r := range b.rows {
		i, j := name[cluster[r.a]], name[cluster[r.b]]
		if i == j || r.kind == rowY || !solved(r.a) || !solved(r.b) {
			continue
		}
		c.joints = append(c.joints, contourJoint{kind: jointKind(r.kind), a: i, b: j, pa: b.pin(r.at), pb: b.pin(r.bt)})
	}
	return c
}

// apart makes every body a cluster of its own.
func apart(bodies []int) map[int]int {
	root := map[int]int{}
	for _, body := range bodies {
		root[body] = body
	}
	return root
}

func jointKind(k rowKind) byte {
	switch k {
	case rowX:
		return 'R'
	case rowGuide:
		return 'P'
	}
	return 0
}

// fused returns the root of the cluster of every body of a group: bodies of one
// class that two rows hold together.
func (b *builder) fused(bodies []int) map[int]int {
	root := apart(bodies)
	for merged := true; merged; {
		merged = false
		rows := map[[2]int]int{}
		for _, r := range b.rows {
			i, okA := root[r.a]
			j, okB := root[r.b]
			if !okA || !okB || i == j || b.class[r.a] != b.class[r.b] || r.kind == rowCustom {
				continue
			}
			pair := [2]int{min(i, j), max(i, j)}
			if rows[pair]++; rows[pair] == 2 {
				for body, k := range root {
					if k == pair[1] {
						root[body] = pair[0]
					}
				}
				merged = true
				break
			}
		}
	}
	return root
}

// contract takes out a cluster of known angle that has two revolutes and no other
// joint: it is a known distance between its neighbours.
func (c *contour) contract(cluster int) {
	var at []int
	for i, j := range c.joints {
		if j.a == cluster || j.b == cluster {
			at = append(at, i)
		}
	}
	if len(at) != 2 || c.joints[at[0]].kind != 'R' || c.joints[at[1]].kind != 'R' || c.clusters < 3 {
		return
	}
	far := func(j contourJoint) (int, int) {
		if j.a == cluster {
			return j.b, j.pb
		}
		return j.a, j.pa
	}
	one, two := c.joints[at[0]], c.joints[at[1]]
	var link contourJoint
	link.kind = 'R'
	link.a, link.pa = far(one)
	link.b, link.pb = far(two)
	if link.a == link.b {
		return
	}
	c.joints = slices.Delete(c.joints, at[1], at[1]+1)
	c.joints[at[0]] = link
	last := c.clusters
	c.known[cluster] = c.known[last]
	for i := range c.joints {
		j := &c.joints[i]
		if j.a == last {
			j.a = cluster
		}
		if j.b == last {
			j.b = cluster
		}
	}
	c.clusters--
}

// kind tells the kind of a group of two clusters.
func (c *contour) kind() Kind {
	if len(c.joints) != 3 {
		return NoDyad
	}
	var outer []byte
	var inner byte
	for _, j := range c.joints {
		if j.a != 0 && j.b != 0 {
			inner = j.kind
		} else {
			outer = append(outer, j.kind)
		}
	}
	if len(outer) != 2 {
		return NoDyad
	}
	slices.Sort(outer) // P before R
	switch string([]byte{outer[0], inner, outer[1]}) {
	case "RRR":
		return RRR
	case "PRR":
		return RRP
	case "RPR":
		return RPR
	case "PRP":
		return PRP
	case "PPR":
		return RPP
	}
	return NoDyad
}

// girth returns the number of links in the smallest closed contour of the group,
// 0 where there is none. A contour goes from link to pin to link: several links on
// one pin are none.
func (c *contour) girth() int {
	type end struct{ node, edge int }
	next := map[int][]end{} // clusters are numbered up from 1, joints down from −1
	pins := map[int]int{}   // first joint on a pin
	for i, j := range c.joints {
		if j.a == 0 || j.b == 0 {
			continue
		}
		node := -1 - i
		if j.kind == 'R' && j.pa == j.pb {
			if first, ok := pins[j.pa]; ok {
				node = first
			} else {
				pins[j.pa] = node
			}
		}
		for _, cl := range []int{j.a, j.b} {
			if !slices.ContainsFunc(next[node], func(e end) bool { return e.node == cl }) {
				next[node] = append(next[node], end{cl, 0})
				next[cl] = append(next[cl], end{node, 0})
			}
		}
	}
	best := 0
	for start := 1; start <= c.clusters; start++ {
		depth, from := map[int]int{start: 0}, map[int]int{}
		for queue := []int{start}; len(queue) > 0; queue = queue[1:] {
			at := queue[0]
			for _, e := range next[at] {
				if d, seen := depth[e.node]; !seen {
					depth[e.node], from[e.node] = depth[at]+1, at
					queue = append(queue, e.node)
				} else if from[at] != e.node {
					if around := (depth[at] + d + 1) / 2; best == 0 || around < best {
						best = around
					}
				}
			}
		}
	}
	return best
}
