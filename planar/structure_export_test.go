package planar

import (
	"fmt"
	"slices"
)

// Checks returns what of a linkage is checked instead of solved.
func Checks(l *Linkage) []string {
	var units []string
	for _, c := range l.program.checks {
		units = append(units, c.unit)
	}
	return units
}

// Once reports whether every unknown and every row is in one block, and no row
// needs an unknown of a later one.
func Once(l *Linkage) error {
	s := &l.program.system
	var unknowns, rows []int
	for _, b := range s.blocks {
		if len(b.unknowns) != len(b.rows) || len(b.rows) == 0 || b.group < 0 || b.group >= len(s.groups) {
			return fmt.Errorf("block %+v", b)
		}
		unknowns, rows = append(unknowns, b.unknowns...), append(rows, b.rows...)
		for _, i := range b.rows {
			for _, body := range []int{s.rows[i].a, s.rows[i].b} {
				if body > 0 && !slices.Contains(unknowns, s.xy(body)) && !slices.Contains(unknowns, s.xy(body)+1) {
					return fmt.Errorf("row %d needs body %d before it has a place", i, body)
				}
			}
		}
	}
	slices.Sort(unknowns)
	slices.Sort(rows)
	if len(unknowns) != s.unknowns() || len(rows) != len(s.rows) {
		return fmt.Errorf("%d unknowns of %d, %d rows of %d", len(unknowns), s.unknowns(), len(rows), len(s.rows))
	}
	for i, u := range unknowns {
		if u != i || rows[i] != i {
			return fmt.Errorf("unknown %d and row %d at %d", u, rows[i], i)
		}
	}
	return nil
}

// Sizes returns the number of unknowns of every block, in the order of solution.
func Sizes(l *Linkage) []int {
	var sizes []int
	for _, b := range l.program.blocks {
		sizes = append(sizes, len(b.unknowns))
	}
	return sizes
}
