package planar

import (
	"slices"

	"gonum.org/v1/gonum/mat"
)

// A Jacobian has the slopes of a group of higher class, as they are solved with and
// by differences of what its loops miss.
type Jacobian struct{ Slopes, Differences *mat.Dense }

// Higher returns the slopes of all groups of higher class.
func Higher(s *State) []Jacobian {
	var all []Jacobian
	c := s.Clone()
	for i, n := range s.l.program.newtons {
		d := &c.now.desks[i]
		n.lay(c.now, d)
		j := Jacobian{mat.NewDense(n.n, n.n, slices.Clone(d.j)), mat.NewDense(n.n, n.n, nil)}
		start := n.save(d, nil)
		const h = 1e-6
		for k := range n.n {
			x := make([]float64, n.n)
			x[k] = 1
			for _, way := range []float64{-h, h} {
				n.restore(d, start)
				n.take(d, x, -way)
				n.lay(c.now, d)
				for r, miss := range d.miss {
					j.Differences.Set(r, k, j.Differences.At(r, k)+miss/way/2)
				}
			}
		}
		all = append(all, j)
	}
	return all
}
