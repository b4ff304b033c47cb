package planar

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"
)

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
		weights := c.weights(i)
		last := len(weights) - 1
		for _, weight := range weights[:last] {
			if !t.take(c.rows, weight) {
				return false
			}
		}
		if pivot, _ := t.pivot(c.rows, weights[last]); pivot == nil {
			return false
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
	pivot, size := s.pivot(rows, weight)
	if pivot == nil {
		return false
	}
	by := size(pivot)
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

// pivot returns the vector of the left null space that has most of a combination of
// rows, nil where none has any, and how much one has.
func (s *survey) pivot(rows []int, weight []float64) (most *mat.VecDense, size func(*mat.VecDense) float64) {
	const least = 1e-6
	size = func(v *mat.VecDense) float64 {
		sum := 0.0
		for k, row := range rows {
			sum += weight[k] * v.AtVec(row)
		}
		return sum
	}
	best := least
	for _, v := range s.left {
		if by := math.Abs(size(v)); by >= best && (most == nil || by > best) {
			most, best = v, by
		}
	}
	return most, size
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
		case Custom:
			if len(row.custom.on) == 1 && row.custom.memory == 0 {
				add(candidate{joint: row.joint, setting: setting{unit: meshUnit}, rows: []int{i}})
			}
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
