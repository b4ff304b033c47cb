package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
)

const (
	mostPasses = 100
	alike      = 1e-4 // least singular value of columns of unit length
)

// fit changes the dimensions until the residuals grow no less: Levenberg and
// Marquardt's damped steps, in units in which every dimension changes the readings by
// as much.
func (f *fitter) fit() error {
	if err := f.start(); err != nil {
		return err
	}
	damping, refused := 1e-4, 0
	for f.passes < mostPasses && !f.done {
		step, gain := f.factors().step(damping)
		if f.done = f.still(step); f.done {
			break
		}
		next, err := f.run(plus(f.change, step))
		if err != nil {
			return err
		}
		if next == nil || !f.better(next) {
			damping, refused = math.Max(damping*10, 1e-4), refused+1
			f.done = refused > 3 && gain < 1e-6 || refused > 20
			continue
		}
		// within a hundredth of a standard deviation of all changes together
		f.done = gain*float64(next.used) < 1e-4 && damping <= 1e-4
		f.now, f.change, refused = next, plus(f.change, step), 0
		damping = math.Max(damping/10, 1e-12)
		if moved, err := f.trim(); err != nil {
			return err
		} else if moved {
			f.done = false
		}
	}
	return nil
}

// start reads the log with no changes.
func (f *fitter) start() (err error) {
	if f.now, err = f.run(f.change); err != nil {
		return err
	} else if f.now == nil {
		return f.why
	}
	if _, err = f.trim(); err != nil {
		return err
	}
	if f.now.used <= len(f.change) {
		return ErrTooFew
	}
	return nil
}

// trim moves the cut to where the residuals have it now, and reads the log again if
// it has moved by more than a tenth.
func (f *fitter) trim() (moved bool, err error) {
	if f.c.Outliers == 0 {
		return false, nil
	}
	cut := f.now.spread.cut(f.c.Outliers)
	if math.Abs(cut/f.cut-1) <= 0.1 { // infinite at first
		return false, nil
	}
	f.cut = cut
	f.now, err = f.run(f.change)
	return true, err
}

// still reports whether a step is no more than rounding.
func (f *fitter) still(step []float64) bool {
	for j, x := range step {
		if math.Abs(x) > 1e-14*f.unit(j) {
			return false
		}
	}
	return true
}

func plus(a, b []float64) []float64 {
	sum := make([]float64, len(a))
	for i := range sum {
		sum[i] = a[i] + b[i]
	}
	return sum
}

// better reports whether a pass has lesser residuals than the last, and loses hardly
// more readings.
func (f *fitter) better(p *pass) bool {
	if p.lost > f.now.lost+(p.used+p.out)/100 || p.used <= len(f.change) {
		return false
	}
	return p.spread.cost(f.cut) < f.now.spread.cost(f.cut)
}

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
	return f.s.l.system.length
}

// step returns the damped step, without what the readings cannot tell apart, and the
// share of the squared residuals that it should take away.
func (p *split) step(damping float64) (step []float64, gain float64) {
	step = make([]float64, len(p.s))
	rest := p.rest
	for k, s := range p.s {
		rest += p.along[k] * p.along[k]
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
	if rest > 0 {
		gain /= rest
	}
	return step, gain
}

// result writes up the last pass that was accepted.
func (f *fitter) result() (*Calibrated, error) {
	n := len(f.change)
	if f.now.used <= n {
		return nil, ErrTooFew
	}
	d, _ := f.changed(f.change)
	d.Drives = d.Drives[:len(f.s.now.in)]
	d.Guess = f.s.l.Design().Guess
	p := f.factors()
	c := &Calibrated{
		Design: d, Change: f.change, Covariance: mat.NewSymDense(n, nil),
		Readings: f.now.used, Outliers: f.now.out, Lost: f.now.lost,
		Passes: f.passes, Converged: f.done,
	}
	sum, rank := p.rest, 0
	for k, s := range p.s {
		sum += p.along[k] * p.along[k]
		if s >= alike {
			rank++
		}
	}
	c.RMS = math.Sqrt(sum / float64(f.now.used))
	variance := sum / float64(f.now.used-rank)
	for i := range n {
		for j := i; j < n; j++ {
			v := 0.0
			for k, s := range p.s {
				if s >= alike && p.size[i] > 0 && p.size[j] > 0 {
					v += p.v.At(i, k) / s * p.v.At(j, k) / s
				}
			}
			if v != 0 {
				v *= variance / p.size[i] / p.size[j]
			}
			c.Covariance.SetSym(i, j, v)
		}
	}
	c.Alike = p.sets(rank)
	for i, span := range f.span {
		if span.Hi-span.Lo <= 1e-9*math.Min(1, f.s.l.system.length) {
			c.Constant = append(c.Constant, i)
		}
	}
	return c, nil
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
