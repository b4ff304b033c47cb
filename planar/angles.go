package planar

import (
	"fmt"
	"math"
	"slices"

	"example.com/twopoint/rigid"
)

// A turnRow is an equation between angles of bodies:
//
//	of(θ) = value (+ in[drive]) (+ phase, when phased)
type turnRow struct {
	of     form
	value  float64
	phased bool
	joint  int
	drive  int // or −1
}

func (b *builder) turn(r turnRow) { b.turns = append(b.turns, r) }

// solveAngles eliminates the equations between angles alone, joints before drives,
// so that every angle is a form of a few free ones, the inputs and a constant. Row
// by row, unknowns are numbered: bodies, then drives, then phases by joint.
func (b *builder) solveAngles() error {
	n, drives := b.bodies(), len(b.d.Drives)
	e := newElimination(n + drives + len(b.d.Joints))
	e.put(0, form{}) // the frame
	for _, r := range b.ordered() {
		f := form{constant: -r.value}.plus(one, r.of)
		if r.drive >= 0 {
			f = f.plus(one.negative(), newForm(formTerm{n + r.drive, one}))
		}
		if r.phased {
			f = f.plus(one.negative(), newForm(formTerm{n + drives + r.joint, one}))
		}
		reduced := e.reduce(f)
		if pivot := reduced.largest(n); pivot >= 0 {
			e.solve(reduced, pivot)
			b.used = append(b.used, r)
		} else if err := b.repeated(r, reduced); err != nil {
			return err
		}
	}
	b.readAngles(e)
	return nil
}

// ordered returns the equations in the order of elimination: known ones, those
// whose phase is read from a position, drives.
func (b *builder) ordered() []turnRow {
	var known, read, driven []turnRow
	for _, r := range b.turns {
		switch {
		case r.drive >= 0:
			driven = append(driven, r)
		case r.phased:
			read = append(read, r)
		default:
			known = append(known, r)
		}
	}
	return append(append(known, read...), driven...)
}

// repeated judges an equation that follows from those used before.
func (b *builder) repeated(r turnRow, reduced form) error {
	const enough = 1e-9 // rad
	if r.phased {
		return nil // whatever its phase is when it is read, it holds
	}
	joints, whole := b.combination(append(slices.Clone(b.used), r))
	if r.drive >= 0 {
		return b.refuse(fmt.Errorf("%w: one turn is driven or held twice", ErrOverconstrained), joints...)
	}
	off := reduced.constant
	if whole {
		off = rigid.Wrap(off)
	}
	if math.Abs(off) > enough*(1+math.Abs(r.value)) {
		return b.refuse(fmt.Errorf("%w: the angles contradict each other by %.3g rad%s", ErrInconsistent, off, b.hint(joints)), joints...)
	}
	return nil
}

// hint tells how the phase of a gear pair is found, where one is concerned.
func (b *builder) hint(joints []int) string {
	for _, i := range joints {
		if i < len(b.d.Joints) {
			if _, ok := b.d.Joints[i].(GearPair); ok {
				return "; AsAssembled reads a phase from the position"
			}
		}
	}
	return ""
}

// combination returns the joints of the rows that give the last one, and whether
// they do so with whole multiples, so that the sum counts modulo a revolution.
func (b *builder) combination(rows []turnRow) (joints []int, whole bool) {
	forms := make([]form, len(rows))
	for i, r := range rows {
		forms[i] = r.of.without(0)
	}
	whole = true
	for _, v := range kernel(transpose(forms, b.bodies()), len(rows)) {
		last, ok := v.of(len(rows) - 1)
		if !ok {
			continue
		}
		for _, t := range v.terms {
			joints = append(joints, rows[t.index].joint)
			whole = whole && t.by.exact.times(last.exact.inverse()).small()
			for _, c := range rows[t.index].of.terms {
				whole = whole && c.by.exact.small()
			}
		}
	}
	return joints, whole
}

// small reports whether a residue is that of a whole number of few digits.
func (a residue) small() bool {
	const most = 1000
	return a <= most || a >= prime-most
}

// readAngles takes the bodies' angles from the elimination.
func (b *builder) readAngles(e *elimination) {
	n := b.bodies()
	free := make([]int, n)
	for i := range n {
		if !e.solved[i] {
			free[i] = len(b.free)
			b.free = append(b.free, i)
		}
	}
	classes := map[string]int{"": 0}
	for i := range n {
		f := e.reduce(newForm(formTerm{i, one}))
		a := angle{Const: f.constant}
		var psi form
		for _, t := range f.terms {
			switch k := t.index; {
			case k < n:
				psi.terms = append(psi.terms, formTerm{free[k], t.by})
				a.psi = append(a.psi, term{free[k], t.by.value})
			case k < n+len(b.d.Drives):
				a.in = append(a.in, term{k - n, t.by.value})
			default:
				a.phase = append(a.phase, term{k - n - len(b.d.Drives), t.by.value})
			}
		}
		b.angles, b.psi = append(b.angles, a), append(b.psi, psi)
		key := psi.key()
		if _, ok := classes[key]; !ok {
			classes[key] = len(classes)
		}
		b.class = append(b.class, classes[key])
	}
}

// key returns a text that equal forms share, but for the constant.
func (f form) key() string {
	key := ""
	for _, t := range f.terms {
		key += fmt.Sprintf("%d:%d ", t.index, t.by.exact)
	}
	return key
}
