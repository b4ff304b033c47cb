package planar

import (
	"errors"
	"fmt"
	"iter"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
)

// A Sample is what was read at one instant: the encoders of all drives, in their
// order, and of what a Calibration calls outputs, in rad or m. NaN in Out is a
// reading that is missing.
type Sample struct{ In, Out []float64 }

// A Calibration says what to find, and from which readings.
type Calibration struct {
	// Outputs are what is read: the motions that drives like these would drive. A
	// Slide along a line of the frame is a coordinate of a point.
	Outputs []Drive
	// By are the dimensions to find. Their entries count on through the outputs:
	// len(Joints)+len(Drives)+i is output i, of which the entries say where the
	// sensor is mounted. The Phase of a drive or an output is added to its reading:
	// the zero of its encoder, which Design.Zero names.
	By []Dimension
	// Noise is the standard deviation of each output's readings; nil: as of one
	// another, all the same.
	Noise []float64
	// Outliers is the share of the readings that may be grossly wrong, below 0.5.
	// Readings off by more than 3.5 standard deviations are then left out, of which
	// one in two thousand is right.
	Outliers float64
}

// Calibrated is what a calibration found.
type Calibrated struct {
	Design Design    // with the changes made, but for the zeros of encoders and what belongs to outputs
	Change []float64 // by how much each dimension differs from the design's, m or rad

	// Covariance is that of Change, from the readings as they scatter: also when
	// Noise is wrong by a factor. What lies in Alike has no part in it.
	Covariance *mat.SymDense

	RMS      float64 // of the residuals, in units of Noise: near 1 where model and Noise are right
	Readings int     // that were used
	Outliers int     // left out
	Lost     int     // readings of samples that the linkage cannot reach

	// Alike are sets of dimensions, by their places in By, that these readings cannot
	// tell apart, mostly pairs: changed together they change the readings by less than
	// a ten thousandth of what each does. A set of one changes no reading. One
	// combination of each set stays as it was in the design.
	Alike [][]int
	// Constant are the drives whose readings never change.
	Constant []int

	Passes    int  // over the log
	Converged bool // false: stopped after 100 passes
}

// Deviation returns the standard deviation of a change, in m or rad: infinite for one
// that stands in Alike, NaN for one that does not exist.
func (c *Calibrated) Deviation(i int) float64 {
	if c.Covariance == nil || i < 0 || i >= len(c.Change) {
		return math.NaN()
	}
	for _, set := range c.Alike {
		for _, k := range set {
			if k == i {
				return math.Inf(1)
			}
		}
	}
	return math.Sqrt(c.Covariance.At(i, i))
}

// Correlation returns how much the errors of two changes go together, within [−1, 1];
// near ±1 the readings hardly tell the two apart. It is NaN where a deviation is not
// a positive number.
func (c *Calibrated) Correlation(i, j int) float64 {
	a, b := c.Deviation(i), c.Deviation(j)
	if !(a > 0 && b > 0) || math.IsInf(a+b, 1) {
		return math.NaN()
	}
	return c.Covariance.At(i, j) / (a * b)
}

// ErrTooFew: fewer readings than dimensions to find, or no more.
var ErrTooFew = errors.New("twopoint: too few readings")

// Calibrate finds the dimensions for which the linkage agrees best with a log of
// readings, by least squares. The State says in which assembly mode the machine is;
// it had best be near the first sample, and stays where it is. Phases that were read
// at Assemble count as given.
//
// The log is read several times over, in its order, and no sample is kept: memory does
// not grow with it. It must give the same samples each time; the slices may be used
// again for the next one. Samples must follow each other closely enough that a Move
// leads from one to the next; turns may jump by whole revolutions.
//
// The method is Levenberg and Marquardt's, on a QR factorisation that takes up the
// readings one by one by Givens rotations.
//
// A result comes with every warning in it: see Calibrated. There is none where the
// error is not nil. It wraps
//
//	rigid.ErrInput      a wrong number of readings, outputs, noises; a log that reads differently again
//	rigid.ErrNotFinite  a reading, but for NaN in Out
//	ErrReference        an entry or link that does not exist
//	ErrInconsistent     dimensions that joints which repeat each other do not leave free
//	ErrTooFew           too few readings
//
// or what New and Assemble have to say of the design as it is, or is the log's own.
func (s *State) Calibrate(log iter.Seq2[Sample, error], c Calibration) (*Calibrated, error) {
	f, err := s.fitter(log, c)
	if err != nil {
		return nil, err
	}
	if err := f.fit(); err != nil {
		return nil, err
	}
	return f.result()
}

// fitter checks what is asked for.
func (s *State) fitter(log iter.Seq2[Sample, error], c Calibration) (*fitter, error) {
	switch {
	case s.l == nil || log == nil:
		return nil, rigid.ErrInput
	case len(c.By) == 0 || len(c.Outputs) == 0:
		return nil, fmt.Errorf("%w: %d dimensions to find from %d outputs", rigid.ErrInput, len(c.By), len(c.Outputs))
	case c.Noise != nil && len(c.Noise) != len(c.Outputs):
		return nil, fmt.Errorf("%w: %d noises for %d outputs", rigid.ErrInput, len(c.Noise), len(c.Outputs))
	case !(c.Outliers >= 0 && c.Outliers < 0.5):
		return nil, fmt.Errorf("%w: a share of outliers of %g", rigid.ErrInput, c.Outliers)
	}
	for _, n := range c.Noise {
		if !(n > 0) || math.IsInf(n, 1) {
			return nil, fmt.Errorf("%w: a noise of %g", rigid.ErrInput, n)
		}
	}
	f := &fitter{s: s, log: log, c: c, cut: math.Inf(1)}
	f.machine()
	check := checker{d: &f.all}
	for i, o := range c.Outputs {
		check.drive("Outputs", i, o)
	}
	if !check.OK() {
		return nil, errors.Join(check.Faults...)
	}
	for i, m := range c.By {
		if len(m.Of) == 0 {
			return nil, fmt.Errorf("%w: dimension %d has no entries", rigid.ErrInput, i)
		}
		for _, e := range m.Of {
			if !f.all.has(e) {
				return nil, fmt.Errorf("%w: dimension %d: %v", ErrReference, i, e)
			}
		}
	}
	f.split()
	return f, nil
}
