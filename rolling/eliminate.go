package rolling

import "math/big"

// A system is the meshes' equations, a row each, for the turns of all members but
// the frame; the columns are those of the members that are not driven, then of the
// drives, the last first.
type system struct {
	rows   [][]*big.Rat
	column []Member // member of a column
	free   int      // number of columns of members that are not driven
}

// eliminate returns the turn of every member over that of every drive, by
// Gauss–Jordan elimination. A member's column without a pivot is free; a pivot in a
// drive's column is an equation between drives alone.
func eliminate(d *TrainDesign, r *report) [][]*big.Rat {
	s := newSystem(d)
	pivots := make([]int, 0, len(s.rows)) // column of the pivot, row by row
	for c, m := range s.column {
		found := s.pivot(len(pivots), c)
		switch {
		case found && c >= s.free:
			r.member(d.name(m), s.overdriven(len(pivots)))
		case !found && c < s.free:
			r.member(d.name(m), errFree)
		}
		if found {
			pivots = append(pivots, c)
		}
	}
	if !r.OK() {
		return nil
	}
	return s.solution(d, pivots)
}

func newSystem(d *TrainDesign) *system {
	s := &system{}
	of := make([]int, len(d.Members)) // column of a member, −1 the frame's
	for m := range of {
		of[m] = -1
	}
	for i := len(d.Drives) - 1; i >= 0; i-- {
		of[d.Drives[i]] = len(d.Members) // for now: not free
	}
	for m := 1; m < len(of); m++ {
		if of[m] < 0 {
			of[m] = len(s.column)
			s.column = append(s.column, Member(m))
		}
	}
	s.free = len(s.column)
	for i := len(d.Drives) - 1; i >= 0; i-- {
		of[d.Drives[i]] = len(s.column)
		s.column = append(s.column, d.Drives[i])
	}
	for _, m := range d.Meshes {
		s.rows = append(s.rows, willis(m, of, len(s.column)))
	}
	return s
}

// willis returns the row (A − Arm)·TeethA ± (B − Arm)·TeethB = 0.
func willis(m Mesh, of []int, columns int) []*big.Rat {
	row := make([]*big.Rat, columns)
	for c := range row {
		row[c] = new(big.Rat)
	}
	a, b := new(big.Rat).SetInt64(int64(m.TeethA)), new(big.Rat).SetInt64(int64(m.TeethB))
	if m.Internal {
		b.Neg(b)
	}
	arm := new(big.Rat).Add(a, b)
	for _, term := range [...]struct {
		member Member
		factor *big.Rat
	}{{m.A, a}, {m.B, b}, {m.Arm, arm.Neg(arm)}} {
		if c := of[term.member]; c >= 0 {
			row[c].Add(row[c], term.factor)
		}
	}
	return row
}

// pivot brings a row with something in column c to row k, makes that 1 and clears
// the column in all other rows. It reports whether there is one from row k on.
func (s *system) pivot(k, c int) bool {
	p := k
	for p < len(s.rows) && s.rows[p][c].Sign() == 0 {
		p++
	}
	if p == len(s.rows) {
		return false
	}
	s.rows[k], s.rows[p] = s.rows[p], s.rows[k]
	row := s.rows[k]
	by := new(big.Rat).Inv(row[c])
	for _, x := range row {
		x.Mul(x, by)
	}
	for i, other := range s.rows {
		if i == k || other[c].Sign() == 0 {
			continue
		}
		f := new(big.Rat).Set(other[c])
		for j, x := range other {
			if row[j].Sign() != 0 {
				x.Sub(x, new(big.Rat).Mul(f, row[j]))
			}
		}
	}
	return true
}

// overdriven returns the cause for which an equation between drives alone, row k,
// refuses the drive of its pivot: it must not turn at all, or as others do.
func (s *system) overdriven(k int) error {
	others := 0
	for _, x := range s.rows[k] {
		if x.Sign() != 0 {
			others++
		}
	}
	if others > 1 {
		return errDriven
	}
	return errLocked
}

// solution reads the turns off the rows: member + Σ coefficient·drive = 0.
func (s *system) solution(d *TrainDesign, pivots []int) [][]*big.Rat {
	n := len(d.Drives)
	turns := make([][]*big.Rat, len(d.Members))
	for m := range turns {
		turns[m] = make([]*big.Rat, n)
		for j := range turns[m] {
			turns[m][j] = new(big.Rat)
		}
	}
	for j, m := range d.Drives {
		turns[m][j].SetInt64(1)
	}
	for k, c := range pivots {
		for j := range n {
			turns[s.column[c]][j].Neg(s.rows[k][len(s.column)-1-j])
		}
	}
	return turns
}
