package planar

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"
)

// assemble solves the place of the unit at sc.in from the rough poses of its bodies
// in sc.m, earlier bodies being exact. It returns solved or unreachable.
//
// The misses at the rough place are led to nothing in proportion, Newton's method
// following with the same acceptance as in a motion: so it finds the assembly mode
// to which that path leads. Where the path ends at a singular place, damped steps
// (Levenberg, Marquardt) look for one near.
func (n *newton) assemble(sc *scene, d *desk) status {
	d.still()
	n.rough(sc, d)
	n.weigh(sc, d)
	start := n.save(d, nil)
	if n.align(sc, d, 0); !slices.Contains(d.cells, 1) || !n.bring(sc, d, start) || !n.aligned(d) {
		clear(d.cells)
		if !n.bring(sc, d, start) {
			n.fail(d)
			return unreachable
		}
		n.align(sc, d, nearly)
	}
	n.lay(sc, d)
	d.factor()
	n.pose(sc, d)
	return solved
}

// bring makes the loops close from the unknowns given.
func (n *newton) bring(sc *scene, d *desk, start []float64) bool {
	n.restore(d, start)
	if n.lead(sc, d) {
		return true
	}
	n.restore(d, start)
	return n.damped(sc, d)
}

// rough reads the unknowns off the poses in sc.
func (n *newton) rough(sc *scene, d *desk) {
	n.prepare(sc, d)
	for k := range n.free {
		d.dir[2*k], d.dir[2*k+1] = 1, 0
		for i := range n.members {
			m := &n.members[i]
			if !m.plain() || m.own[0].Index != k {
				continue
			}
			u := back(r2.Vec{X: d.rest[3*i], Y: d.rest[3*i+1]}, sc.m[m.body].Pose.Axis)
			d.dir[2*k], d.dir[2*k+1] = u.X, m.own[0].Coef*u.Y
			break
		}
		turnBy(d.dir[2*k:], d.dir[2*k:], 0)
		d.angle[k] = math.Atan2(d.dir[2*k+1], d.dir[2*k])
	}
	for i := range n.tree {
		l := &n.tree[i]
		if l.slide < 0 {
			continue
		}
		to := &sc.m[n.members[l.member].body]
		if l.base < 0 {
			d.slide[l.slide], d.slide[l.slide+1] = to.Pose.Origin.X, to.Pose.Origin.Y
			continue
		}
		from := &sc.m[n.members[l.base].body]
		gap := r2.Sub(to.Pose.Point(l.pMember), from.Pose.Point(l.pBase))
		if l.back {
			d.slide[l.slide] = -r2.Dot(turned(to.Pose.Axis, l.u), gap)
		} else {
			d.slide[l.slide] = r2.Dot(turned(from.Pose.Axis, l.u), gap)
		}
	}
}

// read reads the phases of meshes that are unread off the poses in sc. Those of gears
// leave the direction of a member open, by whole turns of it and no others.
func (n *newton) read(sc *scene, d *desk, unread []bool) {
	n.rough(sc, d)
	for i := range n.members {
		m := &n.members[i]
		for _, t := range m.rest.phase {
			if unread[t.Index] {
				unread[t.Index] = false
				sc.phase[t.Index] += rigid.Wrap(sc.m[m.body].Pose.Angle()-n.total(sc, d, i)) / t.Coef
				n.prepare(sc, d)
			}
		}
	}
	n.lay(sc, d)
	row := 0
	for i := range n.closed {
		l := &n.loops[i]
		if l.phase >= 0 && unread[l.phase] {
			unread[l.phase] = false
			sc.phase[l.phase] += d.miss[row]
		}
		if row++; l.kind == rowX {
			row++
		}
	}
}

// lead brings the misses down to nothing in proportion.
func (n *newton) lead(sc *scene, d *desk) bool {
	n.lay(sc, d)
	if !d.factor() {
		return false
	}
	base, sign := append([]float64(nil), d.miss...), d.last[detSign]
	var kept []float64
	for share, step := 1.0, 0.5; share > 0; {
		kept = n.save(d, kept)
		next := math.Max(share-step, 0)
		if n.follow(sc, d, base, next, sign) {
			share, step = next, 2*step
			continue
		}
		n.restore(d, kept)
		if step /= 2; step < 1e-6 {
			return false
		}
	}
	return true
}

// follow corrects until the misses are share times those in base.
func (n *newton) follow(sc *scene, d *desk, base []float64, share, sign float64) bool {
	first := 0.0
	for turn := range mostTurns {
		n.lay(sc, d)
		if !d.factor() || d.last[detSign] != sign {
			return false
		}
		size := n.correct(d, base, share)
		switch {
		case turn == 0 && !(size <= 2*widest), turn == 1 && size > math.Max(contracts*first, settled):
			return false
		case size <= settled:
			return true
		}
		if turn == 0 {
			first = size
		}
	}
	return false
}

// damped makes the sum of the squared misses least by steps
//
//	(JᵀJ + λ diag JᵀJ) x = Jᵀ miss
//
// and reports whether that is nothing.
func (n *newton) damped(sc *scene, d *desk) bool {
	sum := func() float64 {
		n.lay(sc, d)
		s := 0.0
		for _, v := range d.miss {
			s += v * v
		}
		return s
	}
	best, damp := sum(), 1e-3
	var kept []float64
	for range 200 {
		var normal mat.Dense
		j := mat.NewDense(n.n, n.n, d.j)
		normal.Mul(j.T(), j)
		for k := range n.n {
			normal.Set(k, k, normal.At(k, k)*(1+damp)+1e-30*n.length*n.length)
		}
		var right, x mat.VecDense
		right.MulVec(j.T(), mat.NewVecDense(n.n, d.miss))
		if x.SolveVec(&normal, &right) != nil && x.Len() == 0 {
			return false
		}
		kept = n.save(d, kept)
		size := mat.Norm(&x, math.Inf(1))
		n.take(d, x.RawVector().Data, 1/math.Max(1, size))
		if s := sum(); s < best {
			best, damp = s, math.Max(damp/10, 1e-15)
			if size <= settled && math.Sqrt(s) <= 1e-12*n.length {
				return d.factor()
			}
			continue
		}
		if math.Sqrt(best) <= 1e-12*n.length {
			n.restore(d, kept)
			sum()
			return d.factor()
		}
		n.restore(d, kept)
		sum()
		if damp *= 10; damp > 1e12 {
			return false
		}
	}
	return false
}

// save copies the unknowns.
func (n *newton) save(d *desk, to []float64) []float64 {
	return append(append(append(append(to[:0], d.dir...), d.angle...), d.slide...), d.memory...)
}

// restore puts copied unknowns back.
func (n *newton) restore(d *desk, from []float64) {
	copy(d.dir, from)
	copy(d.angle, from[2*n.free:])
	copy(d.slide, from[3*n.free:])
	copy(d.memory, from[3*n.free+n.slides:])
}
