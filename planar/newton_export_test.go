package planar

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
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

// Factors are those of a square of slopes: its determinant's sign, the square of that
// over the product of the columns' lengths, and the solution, which takes the place
// of the right side. They are nil where it is singular.
func Factors(slopes *mat.Dense) (sign, square float64, solve func(x []float64)) {
	n, _ := slopes.Dims()
	d := (&newton{n: n}).desk(make([]float64, 20*(n+1)*(n+1)))
	for i := range n {
		copy(d.j[i*n:], slopes.RawRowView(i))
	}
	if !d.factor() {
		return d.last[detSign], d.last[detSquare], nil
	}
	return d.last[detSign], d.last[detSquare], d.solve
}

// Foresight returns by how much the free angles of the first group of higher class
// are off, at an input that the one drive goes on to, where its path is drawn on.
func Foresight(s *State, in float64) (float64, error) {
	c := s.Clone()
	n, p, d := c.l.program.newtons[0], &c.now.desks[0], &c.next.desks[0]
	if !c.now.foresee(in - c.now.in[0].Pos) {
		return 0, rigid.ErrInput
	}
	n.predict(p, d)
	drawn := slices.Clone(d.dir)
	if err := c.Move(rigid.Coordinate{Pos: in}); err != nil {
		return 0, err
	}
	off := 0.0
	for i, v := range c.now.desks[0].dir {
		off = math.Max(off, math.Abs(v-drawn[i]))
	}
	return off, nil
}
