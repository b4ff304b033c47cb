package planar

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"
)

// agree is how nearly, over the largest length, equations must hold together.
const agree = 1e-9

// solvable returns the system of a design. Where joints hold each other doubly, but
// the dimensions make them agree, the redundant ones are set aside: found at several
// positions near the Guess, by the rank of the equations there.
func solvable(d *Design) (*system, error) {
	b, err := build(d, nil)
	if err == nil {
		return b.system, nil
	}
	if b.imbalance == nil || b.imbalance.over == 0 || d.Guess == nil || b.bodies() < 2 {
		return nil, err
	}
	r := relaxation{b: b, aside: aside{}}
	if err := r.look(); err != nil {
		return nil, err
	}
	return r.choose()
}

// A relaxation finds what to set aside.
type relaxation struct {
	b         *builder
	start     *position
	positions []*survey
	aside     aside
}

// A survey is a position with its left null space: combinations of equations that
// vanish there.
type survey struct {
	*position
	rank        int
	left, right []*mat.VecDense
}

func (p *position) survey() (*survey, bool) {
	slopes, _ := p.matrix()
	var svd mat.SVD
	if !svd.Factorize(slopes, mat.SVDFull) {
		return nil, false
	}
	s := &survey{position: p, rank: svd.Rank(1e-9)}
	var u, v mat.Dense
	svd.UTo(&u)
	svd.VTo(&v)
	m, n := slopes.Dims()
	for k := s.rank; k < m; k++ {
		s.left = append(s.left, mat.VecDenseCopyOf(u.ColView(k)))
	}
	for k := s.rank; k < n; k++ {
		s.right = append(s.right, mat.VecDenseCopyOf(v.ColView(k)))
	}
	return s, true
}

// look closes the guess, moves the drives both ways and keeps the positions of
// largest rank.
func (r *relaxation) look() error {
	const limit = 100 // bodies: matrices are dense here
	if r.b.bodies() > limit {
		return r.refuse(fmt.Errorf("%w, and of %d bodies, more than %d, which can be left out is not looked for", ErrOverconstrained, r.b.bodies(), limit))
	}
	start := r.b.guessed()
	if gap := start.close(); !(gap <= agree) {
		return r.refuse(fmt.Errorf("%w: from the guess they miss each other by %.3g m", ErrInconsistent, gap*r.b.length))
	}
	start.hold()
	r.start = start
	first, ok := start.survey()
	if !ok {
		return r.refuse(fmt.Errorf("%w: the rank at the guess is not to be found", ErrInconsistent))
	}
	all := []*survey{first}
	gap := math.Inf(1)
	for _, way := range []float64{1, -1} {
		at, by := start, 0.0
		for i, to := range []float64{0.003, 0.07, 0.15, 0.23, 0.36, 0.48, 0.61} {
			at = at.turned(way * (to - by))
			by = to
			left := at.close()
			gap = math.Min(gap, left)
			if !(left <= agree) {
				break
			}
			if i == 2 || i == 4 || i == 5 {
				continue // on the way
			}
			if s, ok := at.survey(); ok {
				all = append(all, s)
			}
		}
	}
	if len(all) == 1 && len(r.b.d.Drives) > 0 {
		return r.stuck(first, gap)
	}
	most := slices.MaxFunc(all, func(s, t *survey) int { return s.rank - t.rank }).rank
	for _, s := range all {
		if s.rank == most {
			r.positions = append(r.positions, s)
		}
	}
	return r.balance()
}

// refuse names the joints that hold each other doubly.
func (r *relaxation) refuse(err error) error {
	joints := slices.DeleteFunc(slices.Clone(r.b.imbalance.joints), func(i int) bool { return i >= len(r.b.d.Joints) })
	return r.b.refuse(err, joints...)
}

// stuck explains why no drive moves from the guess.
func (r *relaxation) stuck(first *survey, gap float64) error {
	for _, v := range first.left {
		if drives := r.drivesIn(v); len(drives) > 0 {
			return r.b.refuse(fmt.Errorf("%w: these drives are not free of each other, or drive what is held", ErrOverconstrained), drives...)
		}
	}
	return r.refuse(fmt.Errorf("%w: they agree at the guess alone, and miss each other by %.3g m a little further", ErrInconsistent, gap*r.b.length))
}

// drivesIn returns the drives in a combination of equations, counted on from the joints.
func (r *relaxation) drivesIn(v *mat.VecDense) []int {
	var drives []int
	for i := range v.Len() {
		if drive, ok := r.start.driven(i); ok && math.Abs(v.AtVec(i)) > 1e-6 {
			drives = append(drives, len(r.b.d.Joints)+drive)
		}
	}
	return drives
}

// balance refuses what redundancy does not explain: links that stay free, and
// drives that are held.
func (r *relaxation) balance() error {
	s := r.positions[0]
	if n := len(s.right); n > 0 {
		free := r.free()
		return &DesignError{
			Err:   fmt.Errorf("%w: %s missing, these links stay free", ErrUnderconstrained, count(n, "drive or joint", "drives or joints")),
			Links: r.b.d.names(r.b.linksIn(free)),
		}
	}
	var drives []int
	for _, v := range s.left {
		drives = append(drives, r.drivesIn(v)...)
	}
	if len(drives) > 0 {
		return r.b.refuse(fmt.Errorf("%w: these drives are not free of each other, or drive what is held", ErrOverconstrained), drives...)
	}
	return nil
}

// free returns the bodies that move with every drive held.
func (r *relaxation) free() []int {
	bodies := map[int]bool{}
	n := r.b.bodies() - 1
	for _, v := range r.positions[0].right {
		for u := range v.Len() {
			if math.Abs(v.AtVec(u)) <= 1e-6 {
				continue
			}
			if u < 2*n {
				bodies[u/2+1] = true
			} else {
				bodies[u-2*n+1] = true
			}
		}
	}
	var out []int
	for body := range bodies {
		out = append(out, body)
	}
	return out
}

// A candidate is a unit that could be set aside.
type candidate struct {
	joint int
	setting
	rows  []int    // its equations
	along []r2.Vec // of a length: its direction, at every position
	cost  float64
}

// choose sets units aside, of the first kind in the order of preference that has
// one, the cheapest to solve without, until no equation is too many. What costs the
// same goes at once, but for the last one, after which all must be solvable.
func (r *relaxation) choose() (*system, error) {
	units := r.candidates()
	for len(r.positions[0].left) > 0 {
		spare := r.cheapest(units)
		if len(spare) == 0 {
			return nil, r.refuse(fmt.Errorf("%w: %s too many, and none can be left out", ErrOverconstrained,
				count(len(r.positions[0].left), "constraint", "constraints")))
		}
		r.leave(spare[0])
		for _, c := range spare[1:] {
			if len(r.positions[0].left) > 1 && c.cost-spare[0].cost < 1e-3 && r.spare(c) {
				r.leave(c)
			}
		}
	}
	b, err := build(r.b.d, r.aside)
	return b.system, err
}

// leave sets a candidate aside.
func (r *relaxation) leave(c candidate) {
	r.aside[c.joint] = c.setting
	for i, s := range r.positions {
		for _, weight := range c.weights(i) {
			s.take(c.rows, weight)
		}
	}
}

// cheapest returns the candidates of the first kind that has any, by cost.
func (r *relaxation) cheapest(units []candidate) []candidate {
	var out []candidate
	for _, c := range units {
		if len(out) > 0 && c.unit > out[0].unit {
			break
		}
		if !r.spare(c) {
			continue
		}
		var ok bool
		if c.cost, ok = r.cost(c); ok {
			out = append(out, c)
		}
	}
	slices.SortStableFunc(out, func(c, d candidate) int { return cmp.Compare(c.cost, d.cost) })
	return out
}

// spare reports whether the rank stays, at every position, without the candidate.
func (r *relaxation) spare(c candidate) bool {
	if _, gone := r.aside[c.joint]; gone {
		return false
	}
	for i, s := range r.positions {
		t := &survey{position: s.position, left: s.left}
		for _, weight := range c.weights(i) {
			if !t.take(c.rows, weight) {
				return false
			}
		}
	}
	return true
}

// cost returns what it costs to solve without the candidate as well. What is left
// must be solvable when it is the last.
func (r *relaxation) cost(c candidate) (float64, bool) {
	with := aside{c.joint: c.setting}
	for joint, s := range r.aside {
		with[joint] = s
	}
	b, err := build(r.b.d, with)
	last := len(r.positions[0].left) == len(c.weights(0))
	if last && err != nil || err != nil && b.imbalance == nil {
		return 0, false
	}
	return b.cost(), true
}

// cost sums up the components of the equations that are left: 1 for lines that meet
// and for a dyad, 2 for a linear one, more than the cube of its angles for any other; of equals the smaller.
func (b *builder) cost() float64 {
	q := b.reduced()
	of, by := match(q.rows, q.unknowns)
	cost := 0.0
	for _, rows := range components(q.rows, of, by) {
		angles, places := 0.0, 0
		for _, row := range rows {
			if of[row] >= b.system.psi(0) {
				angles++
			} else {
				places++
			}
		}
		switch {
		case len(rows) == 1:
		case angles <= 2 && places <= 2+2*int(angles):
			cost++
		case angles == 0:
			cost += 2
		default:
			cost += 2 + angles*angles*angles
		}
		cost += 1e-6 * float64(len(rows)*len(rows))
	}
	return cost
}

// weights returns the combinations of the unit's rows that go, at a position.
func (c *candidate) weights(position int) [][]float64 {
	switch c.unit {
	case lengthUnit, armUnit:
		return [][]float64{{c.along[position].X, c.along[position].Y}}
	case pinUnit:
		return [][]float64{{1, 0}, {0, 1}}
	}
	return [][]float64{{1}}
}

// take leaves a combination of rows out: of the left null space it leaves the part
// that does not need it. It reports whether the combination was in it at all.
//
// Rows x and y of a pin, with multipliers (λx, λy), count λ·u times along u.
func (s *survey) take(rows []int, weight []float64) bool {
	const least = 1e-6
	size := func(v *mat.VecDense) float64 {
		sum := 0.0
		for k, row := range rows {
			sum += weight[k] * v.AtVec(row)
		}
		return sum
	}
	if len(s.left) == 0 {
		return false
	}
	pivot := slices.MaxFunc(s.left, func(v, w *mat.VecDense) int {
		return cmp.Compare(math.Abs(size(v)), math.Abs(size(w)))
	})
	by := size(pivot)
	if math.Abs(by) < least {
		return false
	}
	var left []*mat.VecDense
	for _, v := range s.left {
		if v != pivot {
			w := mat.VecDenseCopyOf(v)
			w.AddScaledVec(v, -size(v)/by, pivot)
			w.ScaleVec(1/mat.Norm(w, 2), w)
			left = append(left, w)
		}
	}
	s.left = left
	return true
}

// candidates lists the units, in the order of preference and then of joints.
func (r *relaxation) candidates() []candidate {
	var units []candidate
	add := func(c candidate) { units = append(units, c) }
	b := r.b
	for i, row := range b.rows {
		if row.joint >= len(b.d.Joints) {
			continue
		}
		switch b.d.Joints[row.joint].(type) {
		case SlidingPin:
			if row.kind == rowGuide {
				add(candidate{joint: row.joint, setting: setting{unit: meshUnit}, rows: []int{i}})
			}
		case RackPair:
			add(candidate{joint: row.joint, setting: setting{unit: meshUnit}, rows: []int{i}})
		case Prismatic:
			add(candidate{joint: row.joint, setting: setting{unit: guideUnit}, rows: []int{i}})
		case Revolute:
			if row.kind == rowX {
				r.lengths(i, add)
				add(candidate{joint: row.joint, setting: setting{unit: pinUnit}, rows: []int{i, i + 1}})
			}
		}
	}
	for i, t := range b.used {
		if p := r.positions[0]; p.read(len(b.rows) + i) {
			add(candidate{joint: t.joint, setting: setting{unit: meshUnit}, rows: []int{len(b.rows) + i}})
		}
	}
	slices.SortStableFunc(units, func(c, d candidate) int { return int(c.unit) - int(d.unit) })
	return units
}

// lengths lists the lengths between the pin of rows i and i+1 and the other pins of
// its two links.
func (r *relaxation) lengths(i int, add func(candidate)) {
	x := r.b.rows[i]
	for _, onB := range []bool{false, true} {
		body, at := x.a, x.pa
		if onB {
			body, at = x.b, x.pb
		}
		from, pins, ok := r.b.otherPin(body, at)
		if !ok {
			continue
		}
		c := candidate{joint: x.joint, setting: setting{unit: armUnit, onB: onB, from: from}, rows: []int{i, i + 1}}
		if pins == 2 {
			c.unit = lengthUnit
		}
		along := r2.Unit(r2.Sub(at, from))
		for _, s := range r.positions {
			pose := s.pose(body)
			pose.Origin = r2.Vec{}
			c.along = append(c.along, pose.Point(along))
		}
		add(c)
	}
}

// otherPin returns a body's first pin other than the one at a point, and how many
// pins it has.
func (b *builder) otherPin(body int, at r2.Vec) (from r2.Vec, pins int, ok bool) {
	seen := map[int]bool{}
	for _, r := range b.rows {
		if r.kind != rowX || r.a != body && r.b != body {
			continue
		}
		p, i := r.pa, r.at
		if r.b == body {
			p, i = r.pb, r.bt
		}
		if seen[i] {
			continue
		}
		seen[i] = true
		if !ok && r2.Norm(r2.Sub(p, at)) > same*b.length {
			from, ok = p, true
		}
	}
	return from, len(seen), ok
}
