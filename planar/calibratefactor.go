package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
)

// A triangle is R of a QR factorisation of rows of slopes and a residual, taken up
// one by one.
type triangle struct {
	n int // columns, that of the residual included
	r []float64
}

func newTriangle(n int) triangle { return triangle{n + 1, make([]float64, (n+1)*(n+1))} }

// add takes up a row by Givens rotations; the row is overwritten.
func (t *triangle) add(row []float64) {
	n := t.n
	for k, x := range row {
		if x == 0 {
			continue
		}
		r := t.r[k*n : k*n+n]
		h := math.Hypot(r[k], x)
		c, s := r[k]/h, x/h
		r[k] = h
		for j := k + 1; j < n; j++ {
			r[j], row[j] = c*r[j]+s*row[j], c*row[j]-s*r[j]
		}
	}
}

// A split is a triangle by its singular values, columns made of unit length.
type split struct {
	size  []float64 // of the columns
	s     []float64
	v     mat.Dense
	along []float64 // of the residual, on each left vector
	rest  float64   // square of what no step takes away
}

func (f *fitter) factors() *split {
	t := &f.now.r
	n := t.n - 1
	p := &split{size: make([]float64, n), along: make([]float64, n)}
	most := 0.0
	for j := range n {
		for i := range n {
			p.size[j] = math.Hypot(p.size[j], t.r[i*t.n+j])
		}
		most = math.Max(most, p.size[j]*f.unit(j))
	}
	a := mat.NewDense(n, n, nil)
	for j := range n {
		if p.size[j]*f.unit(j) <= 1e-11*most { // nothing but rounding
			p.size[j] = 0
			continue
		}
		for i := range n {
			a.Set(i, j, t.r[i*t.n+j]/p.size[j])
		}
	}
	var svd mat.SVD
	if !svd.Factorize(a, mat.SVDFull) {
		p.s = make([]float64, n)
		p.v = *mat.NewDense(n, n, nil)
		return p
	}
	p.s = svd.Values(nil)
	var u mat.Dense
	svd.UTo(&u)
	svd.VTo(&p.v)
	for k := range n {
		for i := range n {
			p.along[k] += u.At(i, k) * t.r[i*t.n+n]
		}
	}
	last := t.r[n*t.n+n]
	p.rest = last * last
	return p
}

// unit is a change of a dimension that counts as large.
func (f *fitter) unit(j int) float64 {
	if e := f.c.By[j].Of[0]; e.Part == Angle {
		return 1
	} else if e.Part == Phase {
		switch f.all.at(e.Joint).(type) {
		case GearPair, Turn:
			return 1
		}
	}
	return f.s.l.program.length
}

// step returns the damped step, without what the readings cannot tell apart, and the
// share of the squared residuals that it should take away.
func (p *split) step(damping float64) (step []float64, gain float64) {
	step = make([]float64, len(p.s))
	for k, s := range p.s {
		if s < alike {
			continue
		}
		y := s * p.along[k] / (s*s + damping*p.s[0]*p.s[0])
		gain += p.along[k] * p.along[k]
		for j := range step {
			if p.size[j] > 0 {
				step[j] += p.v.At(j, k) * y / p.size[j]
			}
		}
	}
	if all := p.total(); all > 0 {
		gain /= all
	}
	return step, gain
}

// total returns the square of all residuals.
func (p *split) total() float64 {
	sum := p.rest
	for _, x := range p.along {
		sum += x * x
	}
	return sum
}

// sets names the dimensions of each combination that changes no reading: a basis of
// such combinations, brought to the fewest dimensions by elimination.
func (p *split) sets(rank int) (all [][]int) {
	const part = 0.03 // of the largest, that counts
	n := len(p.s)
	rows := make([][]float64, 0, n-rank)
	for k := rank; k < n; k++ {
		row := make([]float64, n)
		for j := range row {
			row[j] = p.v.At(j, k)
		}
		rows = append(rows, row)
	}
	taken := make([]bool, n)
	for i, row := range rows {
		pivot := -1
		for j, x := range row {
			if !taken[j] && (pivot < 0 || math.Abs(x) > math.Abs(row[pivot])) {
				pivot = j
			}
		}
		taken[pivot] = true
		for k, other := range rows {
			if k != i {
				by := other[pivot] / row[pivot]
				for j := range other {
					other[j] -= by * row[j]
				}
			}
		}
	}
	for _, row := range rows {
		most := 0.0
		for _, x := range row {
			most = math.Max(most, math.Abs(x))
		}
		var set []int
		for j, x := range row {
			if math.Abs(x) > part*most {
				set = append(set, j)
			}
		}
		all = append(all, set)
	}
	slices.SortFunc(all, slices.Compare[[]int])
	return all
}
