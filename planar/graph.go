package planar

import (
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// order sorts the equations and unknowns into blocks in the order of solution, or
// says what is over- or under-determined.
func (b *builder) order() error {
	b.seated = make([]int, b.bodies())
	for i := range b.seated {
		b.seated[i] = -1
	}
	if err := b.sort(); err != nil {
		return err
	}
	if b.settle() {
		if err := b.sort(); err != nil {
			return err
		}
	}
	b.group()
	return nil
}

// settle moves the origin of every body that turns on a pin known before to that
// pin, and reports whether there are any: place and angle then come one after the
// other. They are blocks of a body's three unknowns, two rows a revolute's.
func (b *builder) settle() bool {
	moved := false
	for _, bl := range b.blocks {
		if len(bl.unknowns) != 3 || bl.unknowns[2] < b.system.psi(0) || bl.unknowns[0]%2 != 0 || bl.unknowns[1] != bl.unknowns[0]+1 {
			continue
		}
		body := bl.unknowns[0]/2 + 1
		for _, i := range bl.rows {
			if r := b.rows[i]; r.kind == rowX && slices.Contains(bl.rows, i+1) {
				at := r.at
				if r.b == body {
					at = r.bt
				}
				b.center(body, at)
				moved = true
				break
			}
		}
	}
	return moved
}

// center makes a point its body's origin.
func (b *builder) center(body, at int) {
	b.seated[body] = at
	to := b.points[at].at
	for i := range b.seats {
		if s := &b.seats[i]; s.body == body {
			s.local.Origin = r2.Sub(s.local.Origin, to)
		}
	}
	for _, p := range b.inBody[body] {
		b.points[p].at = r2.Sub(b.points[p].at, to)
	}
	for i := range b.rows {
		b.rows[i].pa, b.rows[i].pb = b.points[b.rows[i].at].at, b.points[b.rows[i].bt].at
	}
	for i := range b.checks {
		r := &b.checks[i].row
		if b.checks[i].angle == nil {
			r.pa, r.pb = b.points[r.at].at, b.points[r.bt].at
		}
	}
}

// Equations are rows of slopes at a random place, with what they stand for.
type equations struct {
	rows     []form
	joints   []int   // of every row: its joint, counting on through the drives
	unknowns int     // the first of them are x and y of the bodies
	bodies   [][]int // of every unknown: the bodies that it moves
}

// reduced returns the equations of place in the unknowns that are left.
func (b *builder) reduced() *equations {
	q := b.places(b.psi, len(b.free))
	for body, f := range b.psi {
		for _, t := range f.terms {
			u := b.system.psi(t.index)
			q.bodies[u] = append(q.bodies[u], body)
		}
	}
	return q
}

// full returns the equations of place and of angles in the place and angle of every
// body: what is solved before angles are eliminated, as the textbooks see it.
func (b *builder) full() *equations {
	angles := make([]form, b.bodies())
	for i := range angles[1:] {
		angles[i+1] = newForm(formTerm{i, one})
	}
	q := b.places(angles, b.bodies()-1)
	for i := range angles[1:] {
		q.bodies[b.system.psi(i)] = []int{i + 1}
	}
	for _, r := range b.used {
		var f form
		for _, t := range r.of.terms {
			if t.index > 0 {
				f = f.plus(one, newForm(formTerm{b.system.psi(t.index - 1), t.by}))
			}
		}
		q.rows, q.joints = append(q.rows, f), append(q.joints, r.joint)
	}
	return q
}

// places returns the rows of the system, with so many unknown angles.
func (b *builder) places(angles []form, unknown int) *equations {
	b.lines = nil
	s := b.scatter(angles)
	q := &equations{unknowns: b.system.psi(unknown)}
	for _, r := range b.rows {
		q.rows, q.joints = append(q.rows, b.slopes(s, r)), append(q.joints, r.joint)
	}
	q.bodies = make([][]int, q.unknowns)
	for body := 1; body < b.bodies(); body++ {
		q.bodies[b.xy(body)], q.bodies[b.xy(body)+1] = []int{body}, []int{body}
	}
	return q
}

// sort finds the blocks, if the equations determine every unknown once in general
// position.
func (b *builder) sort() error {
	q := b.reduced()
	of, by := match(q.rows, q.unknowns)
	blocks := components(q.rows, of, by)
	if !q.inOrder(blocks).regular() {
		return b.unbalanced()
	}
	b.blocks = b.blocks[:0]
	for _, rows := range blocks {
		var unknowns []int
		for _, row := range rows {
			unknowns = append(unknowns, of[row])
		}
		slices.Sort(unknowns)
		b.blocks = append(b.blocks, block{unknowns: unknowns, rows: rows, group: -1})
	}
	return nil
}

// inOrder returns the equations in the order of solution, which keeps elimination
// within the blocks.
func (q *equations) inOrder(blocks [][]int) *equations {
	sorted := &equations{unknowns: q.unknowns, bodies: q.bodies}
	for _, row := range slices.Concat(blocks...) {
		sorted.rows, sorted.joints = append(sorted.rows, q.rows[row]), append(sorted.joints, q.joints[row])
	}
	return sorted
}

// regular reports whether there are as many rows as unknowns, all independent.
func (q *equations) regular() bool {
	vanished := newElimination(q.unknowns).eliminate(q.rows)
	return len(q.rows) == q.unknowns && len(vanished) == 0
}

// unknowns returns the number of scalar unknowns.
func (s *system) unknowns() int { return s.psi(len(s.free)) }

// match pairs as many rows as possible with an unknown in each: a maximum matching,
// by augmenting paths. of is the unknown of each row, by the row of each unknown, −1
// where there is none.
func match(rows []form, unknowns int) (of, by []int) {
	of, by = minusOnes(len(rows)), minusOnes(unknowns)
	seen := minusOnes(unknowns)
	var augment func(row, round int) bool
	augment = func(row, round int) bool {
		for _, t := range rows[row].terms { // a free one first
			if by[t.index] < 0 {
				of[row], by[t.index] = t.index, row
				return true
			}
		}
		for _, t := range rows[row].terms {
			if seen[t.index] == round {
				continue
			}
			seen[t.index] = round
			if augment(by[t.index], round) {
				of[row], by[t.index] = t.index, row
				return true
			}
		}
		return false
	}
	for row := range rows {
		augment(row, row)
	}
	return of, by
}

func minusOnes(n int) []int {
	s := make([]int, n)
	for i := range s {
		s[i] = -1
	}
	return s
}

// components returns the strongly connected components of the rows, in the order
// of solution: a row waits for the rows that give its other unknowns.
func components(rows []form, of, by []int) [][]int {
	return strong(len(rows), func(row int, visit func(int)) {
		for _, t := range rows[row].terms {
			if t.index != of[row] && by[t.index] >= 0 {
				visit(by[t.index])
			}
		}
	})
}

// strong returns the strongly connected components of a directed graph, every one
// after those that it leads to (Tarjan 1972). The order depends on nothing but the
// numbers of the nodes, so that a design always gives the same groups.
func strong(nodes int, next func(node int, visit func(int))) [][]int {
	index, low := minusOnes(nodes), make([]int, nodes)
	onStack := make([]bool, nodes)
	var stack []int
	var out [][]int
	count := 0
	var connect func(v int)
	connect = func(v int) {
		index[v], low[v] = count, count
		count++
		stack = append(stack, v)
		onStack[v] = true
		next(v, func(w int) {
			if index[w] < 0 {
				connect(w)
				low[v] = min(low[v], low[w])
			} else if onStack[w] {
				low[v] = min(low[v], index[w])
			}
		})
		if low[v] < index[v] {
			return
		}
		start := slices.Index(stack, v)
		for _, w := range stack[start:] {
			onStack[w] = false
		}
		out = append(out, slices.Sorted(slices.Values(stack[start:])))
		stack = stack[:start]
	}
	for v := range nodes {
		if index[v] < 0 {
			connect(v)
		}
	}
	return out
}
