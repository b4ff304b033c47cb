package planar

import (
	"math"

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
	var p *split // of the pass that was taken last
	for f.passes < mostPasses && !f.done {
		if p == nil {
			p = f.factors()
		}
		step, gain := p.step(damping)
		if f.done = f.still(step); f.done {
			break
		}
		to := plus(f.change, step)
		next, err := f.run(to)
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
		f.now, f.change, refused, p = next, to, 0, nil
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
	all, rank := p.total(), 0
	for _, s := range p.s {
		if s >= alike {
			rank++
		}
	}
	c.RMS = math.Sqrt(all / float64(f.now.used))
	variance := all / float64(f.now.used-rank)
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
		if span.Hi-span.Lo <= 1e-9*math.Min(1, f.s.l.program.length) {
			c.Constant = append(c.Constant, i)
		}
	}
	return c, nil
}
