package planar

import (
	"math"
	"slices"
)

// A form is a linear form: a sum of coefficients times numbered unknowns, sorted
// by number and without zeros, and a constant.
type form struct {
	terms    []formTerm
	constant float64
}

type formTerm struct {
	index int
	by    coefficient
}

// newForm returns the form with these terms, several of one unknown added up.
func newForm(terms ...formTerm) form {
	var f form
	for _, t := range terms {
		f = f.plus(t.by, form{terms: []formTerm{{t.index, one}}})
	}
	return f
}

// plus returns f + k·g.
func (f form) plus(k coefficient, g form) form {
	sum := form{constant: f.constant + k.value*g.constant}
	if len(f.terms)+len(g.terms) > 0 {
		sum.terms = make([]formTerm, 0, len(f.terms)+len(g.terms))
	}
	a, b := f.terms, g.terms
	for len(a) > 0 || len(b) > 0 {
		switch {
		case len(b) == 0 || len(a) > 0 && a[0].index < b[0].index:
			sum.terms = append(sum.terms, a[0])
			a = a[1:]
		case len(a) == 0 || b[0].index < a[0].index:
			sum.add(formTerm{b[0].index, k.times(b[0].by)})
			b = b[1:]
		default:
			sum.add(formTerm{a[0].index, a[0].by.plus(k.times(b[0].by))})
			a, b = a[1:], b[1:]
		}
	}
	return sum
}

func (f *form) add(t formTerm) {
	if t.by.exact != 0 {
		f.terms = append(f.terms, t)
	}
}

// of returns the coefficient of an unknown, and whether there is one.
func (f form) of(index int) (coefficient, bool) {
	i, ok := slices.BinarySearchFunc(f.terms, index, func(t formTerm, index int) int { return t.index - index })
	if !ok {
		return coefficient{}, false
	}
	return f.terms[i].by, true
}

// An elimination solves linear equations one by one. Every unknown is free, or
// solved: a form of free ones.
type elimination struct {
	solved []bool
	forms  []form
	users  [][]int // of a free unknown: which solved ones may have it in their forms
}

func newElimination(unknowns int) *elimination {
	return &elimination{
		solved: make([]bool, unknowns),
		forms:  make([]form, unknowns),
		users:  make([][]int, unknowns),
	}
}

// reduce writes f in free unknowns alone.
func (e *elimination) reduce(f form) form {
	out := form{constant: f.constant}
	for _, t := range f.terms {
		if e.solved[t.index] {
			out = out.plus(t.by, e.forms[t.index])
		} else {
			out = out.plus(t.by, form{terms: []formTerm{{t.index, one}}})
		}
	}
	return out
}

// solve takes up the equation reduced = 0 by solving it for its unknown pivot.
func (e *elimination) solve(reduced form, pivot int) {
	by, _ := reduced.of(pivot)
	k := by.inverse().negative()
	solution := form{}.plus(k, reduced).without(pivot)
	e.put(pivot, solution)
	for _, user := range e.users[pivot] {
		if by, ok := e.forms[user].of(pivot); ok {
			e.put(user, e.forms[user].without(pivot).plus(by, solution))
		}
	}
	e.users[pivot] = nil
}

// put sets the form of a solved unknown.
func (e *elimination) put(unknown int, f form) {
	before := e.forms[unknown]
	e.solved[unknown] = true
	e.forms[unknown] = f
	for _, t := range f.terms {
		if _, known := before.of(t.index); !known {
			e.users[t.index] = append(e.users[t.index], unknown)
		}
	}
}

func (f form) without(index int) form {
	terms := slices.DeleteFunc(slices.Clone(f.terms), func(t formTerm) bool { return t.index == index })
	return form{terms: terms, constant: f.constant}
}

// largest returns the unknown below limit that has the largest coefficient, or −1.
func (f form) largest(limit int) int {
	best, size := -1, -1.0
	for _, t := range f.terms {
		if t.index < limit && math.Abs(t.by.value) >= size*(1+1e-9) {
			best, size = t.index, math.Abs(t.by.value)
		}
	}
	return best
}

// eliminate solves as many of the equations as are independent, in their order,
// and returns those that are not.
func (e *elimination) eliminate(rows []form) (vanished []int) {
	for i, row := range rows {
		reduced := e.reduce(row)
		if len(reduced.terms) == 0 {
			vanished = append(vanished, i)
			continue
		}
		e.solve(reduced, e.leastUsed(reduced))
	}
	return vanished
}

// leastUsed returns the unknown of a form that the fewest solved ones need, so that
// few forms change.
func (e *elimination) leastUsed(f form) int {
	return slices.MinFunc(f.terms, func(s, t formTerm) int {
		return len(e.users[s.index]) - len(e.users[t.index])
	}).index
}

// kernel returns the null space of the rows, a vector for each free unknown.
func kernel(rows []form, unknowns int) []form {
	e := newElimination(unknowns)
	e.eliminate(rows)
	vectors := make([]form, unknowns)
	for u := range unknowns { // in this order, so that terms are sorted
		if !e.solved[u] {
			vectors[u].terms = append(vectors[u].terms, formTerm{u, one})
		}
		for _, t := range e.forms[u].terms {
			vectors[t.index].terms = append(vectors[t.index].terms, formTerm{u, t.by})
		}
	}
	return slices.DeleteFunc(vectors, func(v form) bool { return len(v.terms) == 0 })
}

// transpose returns the columns of the rows as rows.
func transpose(rows []form, unknowns int) []form {
	columns := make([]form, unknowns)
	for i, row := range rows {
		for _, t := range row.terms {
			columns[t.index].terms = append(columns[t.index].terms, formTerm{i, t.by})
		}
	}
	return columns
}
