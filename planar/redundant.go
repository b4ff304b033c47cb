package planar

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
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
	const limit = 200 // bodies: matrices are dense here
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
