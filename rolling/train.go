package rolling

import (
	"math"
	"math/big"

	"example.com/twopoint/rigid"
)

// A Train is a gear train, ordinary or epicyclic, of any number of members and
// driven ones, solved exactly. It never changes, so that any number of goroutines
// may share it. The zero Train is no mechanism: its methods return ErrInput, or a
// zero design.
type Train struct {
	design TrainDesign
	exact  [][]*big.Rat // turn of every member over that of every drive
	turns  []double     // the same rounded, member by member
	most   []float64    // the greatest magnitude, drive by drive
}

// NewTrain returns the train of a design, of which it keeps a copy. The turns of all
// members are found from those of the drives by elimination of the meshes' equations
// with rational numbers. Meshes that repeat what others say, as those of several
// equal planets do, are dropped.
//
// It returns a *rigid.DimensionError, or several joined by errors.Join, each with a
// member's name: ErrNotPositive for teeth below one; ErrInput for a member that no
// mesh or drive determines (a drive is missing), for a drive whose turn the others
// determine already (one drive too many), for one that the train does not let turn or
// a mesh whose members can never turn (a locked train), for a member that meshes with
// itself, is driven twice or has another's name; ErrNotFinite where a ratio overflows.
// Its Value is the number of teeth, or NaN where they are not at fault. A reference to
// no member is ErrInput with the path of the field as Name and the index as Value.
func NewTrain(d TrainDesign) (*Train, error) {
	var r report
	d.check(&r)
	if !r.OK() {
		return nil, r.Err()
	}
	t := &Train{design: d.clone(), exact: eliminate(&d, &r)}
	if r.OK() {
		t.checkLocked(&r)
	}
	if r.OK() {
		t.round(&r)
	}
	if !r.OK() {
		return nil, r.Err()
	}
	return t, nil
}

// checkLocked reports the meshes whose members all rest whatever the drives do.
func (t *Train) checkLocked(r *report) {
	rests := func(m Member) bool {
		for _, c := range t.exact[m] {
			if c.Sign() != 0 {
				return false
			}
		}
		return true
	}
	for _, m := range t.design.Meshes {
		if rests(m.A) && rests(m.B) && rests(m.Arm) {
			held := max(m.A, m.B) // one of them is not the frame
			r.member(t.design.name(held), errLocked)
		}
	}
}

// round makes the numbers that Solve uses.
func (t *Train) round(r *report) {
	t.most = make([]float64, len(t.design.Drives))
	for i, row := range t.exact {
		for j, c := range row {
			d := doubleOf(c)
			if math.IsInf(d.hi, 0) {
				r.member(t.design.name(Member(i)), errRatio)
			}
			t.turns = append(t.turns, d)
			t.most[j] = max(t.most[j], math.Abs(d.hi))
		}
	}
}

// Design returns a copy of the design.
func (t *Train) Design() TrainDesign { return t.design.clone() }

// Solve writes the turn of every member, in rad, into dst: dst[m] is that of Member
// m, dst[0] rests. In are the turns of the drives in the order of TrainDesign.Drives,
// counted from a position in which all turns are 0. A result is the float64 nearest
// to the exact one for the numbers given, however many turns they are and however
// nearly the drives cancel each other: only a tie may go either way.
//
// ErrInput unless dst has one element for each member and in one for each drive;
// ErrNotFinite where a given number is not finite or a result might overflow. On
// error dst is as before. It does not allocate. Dst and in must not overlap.
func (t *Train) Solve(dst []rigid.Coordinate, in ...rigid.Coordinate) error {
	n := len(in)
	if len(t.exact) == 0 || len(dst) != len(t.exact) || n != len(t.most) {
		return rigid.ErrInput
	}
	size := 0.0
	for j, c := range in {
		size += t.most[j] * (math.Abs(c.Pos) + math.Abs(c.Vel) + math.Abs(c.Acc))
	}
	if size*0 != 0 {
		return rigid.ErrNotFinite
	}
	for i := range dst {
		var pos, vel, acc double
		for j, k := range t.turns[i*n : (i+1)*n] {
			pos = pos.plus(k.times(in[j].Pos))
			vel = vel.plus(k.times(in[j].Vel))
			acc = acc.plus(k.times(in[j].Acc))
		}
		dst[i] = rigid.Coordinate{Pos: pos.hi, Vel: vel.hi, Acc: acc.hi}
	}
	return nil
}

// Ratio returns the exact ratio of the turn of out to that of in, with the other
// drives at rest. In must be a drive, or, in a train of one drive, any member that
// turns. ErrInput for other members and a zero Train, ErrSingular where in rests.
func (t *Train) Ratio(out, in Member) (*big.Rat, error) {
	if len(t.exact) == 0 || !t.design.has(out) || !t.design.has(in) {
		return nil, rigid.ErrInput
	}
	for j, drive := range t.design.Drives {
		if drive == in {
			return new(big.Rat).Set(t.exact[out][j]), nil
		}
	}
	switch {
	case len(t.most) != 1 || in == 0:
		return nil, rigid.ErrInput
	case t.exact[in][0].Sign() == 0:
		return nil, rigid.ErrSingular
	}
	return new(big.Rat).Quo(t.exact[out][0], t.exact[in][0]), nil
}
