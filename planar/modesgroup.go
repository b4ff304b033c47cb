package planar

import (
	"errors"
	"math"
	"math/cmplx"
	"math/rand/v2"

	"example.com/twopoint/internal/bilinear"
	"example.com/twopoint/rigid"
)

// Why a group's solutions may not be complete.
var (
	errUnbounded = errors.New("a gear, a rack or a constraint of the user's own inside a group of higher class")
	errTooMany   = errors.New("a group of more than 5 000 possible solutions")
	errContinua  = errors.New("a group that links can move in with the drives held, at some places")
	errLost      = errors.New("equations of a group that are too badly conditioned")
)

const (
	mostPaths    = 5000
	mostAttempts = 4
	mostStarts   = 100 // of a group with no bound
	oneplace     = 1e-7
)

// solutions returns the unknowns at every real solution of the group at sc.in, with
// an error where there may be others.
func (n *newton) solutions(sc *scene, d *desk) ([][]float64, error) {
	n.prepare(sc, d)
	if n.free == 0 && len(n.customs) == 0 {
		return n.linear(sc, d), nil
	}
	e, ok := n.equations(sc, d)
	switch {
	case !ok:
		return n.scatter(sc, d, e.scale), errUnbounded
	case bilinear.Paths(len(e.Z)) > mostPaths:
		return n.scatter(sc, d, e.scale), errTooMany
	}
	return n.continued(sc, d, e)
}

// continued returns the real ones of all complex solutions of a closure. Where the
// ends of the paths cannot be all of them the paths are followed again, chosen in
// another way.
func (n *newton) continued(sc *scene, d *desk, e *closure) (all [][]float64, err error) {
	for seed := range uint64(mostAttempts) {
		ends, lost := e.Solve(seed)
		if errors.Is(lost, bilinear.ErrRank) {
			return nil, errContinua
		}
		isolated, whole, lonely := sift(ends)
		for _, end := range isolated {
			if e.take(n, d, end) && n.polish(sc, d, 1e-3) {
				all = n.gather(all, d, e.scale)
			}
		}
		switch {
		case lost != nil || !whole:
			err = errLost
		case lonely == 0:
			return all, nil
		case seed > 0:
			return all, errContinua
		}
	}
	return all, err
}

// linear returns the one solution of equations without angles.
func (n *newton) linear(sc *scene, d *desk) [][]float64 {
	clear(d.slide)
	if !n.polish(sc, d, math.Inf(1)) {
		return nil
	}
	return [][]float64{n.save(d, nil)}
}

// polish corrects the unknowns until that doesn't help any more, and reports whether
// the loops close. No correction may be larger than most.
func (n *newton) polish(sc *scene, d *desk, most float64) bool {
	last := math.Inf(1)
	for range mostTurns {
		n.lay(sc, d)
		if !d.factor() {
			break
		}
		x := d.temp[:n.n]
		copy(x, d.miss)
		d.solve(x)
		size := 0.0
		for _, v := range x {
			size = math.Max(size, math.Abs(v))
		}
		if !(size <= most) {
			return false
		}
		n.take(d, x, 1)
		if size <= 1e-15 || size <= settled && size > last/2 {
			break
		}
		last = size
	}
	n.lay(sc, d)
	return n.misses(d) <= 1e-12
}

// misses returns the largest miss over the largest vector of the loops.
func (n *newton) misses(d *desk) float64 {
	miss, size := 0.0, n.extent(d)
	for _, v := range d.miss {
		miss = math.Max(miss, math.Abs(v)/size)
	}
	return miss
}

// extent returns the largest length in the loops.
func (n *newton) extent(d *desk) float64 {
	size := 0.0
	for i := range n.loops {
		l := &n.loops[i]
		size = max(size, math.Hypot(d.fixed[2*i], d.fixed[2*i+1]), math.Abs(l.value))
		for _, a := range n.chords[l.moved:l.end] {
			if a.slide < 0 {
				size = math.Max(size, math.Hypot(a.v.X, a.v.Y))
			}
		}
	}
	for _, s := range d.slide {
		size = math.Max(size, math.Abs(s))
	}
	if size == 0 {
		return n.length
	}
	return size
}

// gather adds the unknowns to the solutions, if they are not among them.
func (n *newton) gather(all [][]float64, d *desk, scale float64) [][]float64 {
	at := n.save(d, nil)
	for _, other := range all {
		off := 0.0
		for i, v := range at {
			switch {
			case i < 2*n.free:
				off = math.Max(off, math.Abs(v-other[i]))
			case i >= 3*n.free && i < 3*n.free+n.slides: // beyond it, what Constraints remember
				off = math.Max(off, math.Abs(v-other[i])/scale)
			}
		}
		for _, k := range n.whole {
			off = math.Max(off, math.Abs(at[2*n.free+k]-other[2*n.free+k]))
		}
		if off <= oneplace {
			return all
		}
	}
	return append(all, at)
}

// scatter looks for solutions by damped steps from many places: those at which angles
// of which whole turns count are principal values.
func (n *newton) scatter(sc *scene, d *desk, scale float64) (all [][]float64) {
	random := rand.New(rand.NewPCG(1, 2))
	for range mostStarts {
		for k := range n.free {
			d.angle[k] = math.Pi * (2*random.Float64() - 1)
			d.dir[2*k+1], d.dir[2*k] = math.Sincos(d.angle[k])
		}
		for k := range d.slide {
			d.slide[k] = 2 * scale * random.NormFloat64()
		}
		clear(d.memory)
		n.weigh(sc, d)
		closed := n.damped(sc, d)
		for _, k := range n.whole {
			d.angle[k] = rigid.Wrap(d.angle[k])
		}
		if closed && n.polish(sc, d, 1e-3) {
			all = n.gather(all, d, scale)
		}
	}
	return all
}

// sift returns the isolated solutions among the ends of all paths: those that are
// simple, and those at which several paths end. It reports whether they can be all
// solutions of real equations: simple ones all different and, with z and w exchanged
// and conjugated, among themselves again. Lonely paths are those that end where
// solutions are not isolated.
func sift(ends []bilinear.End) (isolated []*bilinear.End, whole bool, lonely int) {
	whole = true
	for i := range ends {
		a := &ends[i]
		if a.Infinite {
			continue
		}
		twins, mirrored, near := 0, false, 1e-6
		if !a.Regular {
			near = 1e-4
		}
		for k := range ends {
			b := &ends[k]
			if b.Infinite || a.Regular != b.Regular {
				continue
			}
			if i != k && beside(a.Z, b.Z, false, near) && beside(a.W, b.W, false, near) {
				twins++
			}
			mirrored = mirrored || beside(a.Z, b.W, true, near) && beside(a.W, b.Z, true, near)
		}
		switch {
		case a.Regular && (twins > 0 || !mirrored):
			whole = false
		case !a.Regular && twins == 0:
			lonely++
			continue
		}
		isolated = append(isolated, a)
	}
	return isolated, whole, lonely
}

// beside reports whether two unit vectors, one of them conjugated, are the same but
// for a factor.
func beside(a, b []complex128, conjugate bool, near float64) bool {
	sum := complex128(0)
	for i, v := range b {
		if !conjugate {
			v = cmplx.Conj(v)
		}
		sum += a[i] * v
	}
	// what is left of a beside b
	off := 0.0
	for i, v := range b {
		if conjugate {
			v = cmplx.Conj(v)
		}
		off += math.Pow(cmplx.Abs(a[i]-sum*v), 2)
	}
	return off <= near*near
}
