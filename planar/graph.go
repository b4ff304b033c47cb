package planar

import "slices"

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
	if b.seat() {
		if err := b.sort(); err != nil {
			return err
		}
	}
	b.group()
	return nil
}

// sort finds the blocks.
func (b *builder) sort() error {
	b.lines = nil
	s := b.scatter()
	forms := make([]form, len(b.rows))
	for i, r := range b.rows {
		forms[i] = b.slopes(s, r)
	}
	unknowns := b.unknowns()
	of, by := match(forms, unknowns)
	blocks := components(forms, of, by)
	return b.check(forms, blocks, of)
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

// check keeps the blocks if the equations determine every unknown once, in general
// position, and says otherwise what is too much and what is missing.
func (b *builder) check(forms []form, blocks [][]int, of []int) error {
	order := slices.Concat(blocks...)
	sorted := make([]form, len(order))
	for i, row := range order {
		sorted[i] = forms[row]
	}
	n := b.unknowns()
	e := newElimination(n)
	vanished := e.eliminate(sorted)
	if len(vanished) > 0 || len(sorted) < n {
		return b.unbalanced(order, sorted)
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

// seat moves the origin of bodies that turn on a pin known before to that pin.
func (b *builder) seat() bool { return false }

// group finds the Assur groups.
func (b *builder) group() {}
