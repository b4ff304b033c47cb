package main

import (
	"errors"
	"fmt"
	"io"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/examples/internal/presslog"
)

// A checker takes a log sample by sample; nothing in it grows with the log.
type checker struct {
	c       *config
	guard   *guard
	fitter  *fitter
	motions *comparer
	log     logged
	begin   float64
	last    float64
	err     error // of a point
}

func newChecker(c *config) (*checker, error) {
	k := &checker{c: c, fitter: newFitter(c)}
	var err error
	if k.guard, err = newGuard(c, k.point); err != nil {
		return nil, err
	}
	k.motions, err = newComparer(c)
	return k, err
}

// check reads a log to its end. A malformed line goes to skip, and on goes the
// reading unless skip returns an error.
func check(c *config, log io.Reader, skip func(error) error) (*report, error) {
	k, err := newChecker(c)
	if err != nil {
		return nil, err
	}
	for s, err := range presslog.Samples(log, "motor_counts") {
		if err == nil {
			err = k.take(s)
		}
		if bad := (*presslog.LineError)(nil); errors.As(err, &bad) {
			k.log.Skipped++
			err = skip(err)
		}
		if err != nil {
			return nil, err
		}
	}
	return k.report()
}

// take takes one sample. What the sample itself is to blame for is a
// *presslog.LineError.
func (k *checker) take(s presslog.Sample) error {
	turn, err := k.c.crank(s.Counts)
	if err != nil {
		return &presslog.LineError{Line: s.Line, Err: err}
	}
	if k.log.Samples == 0 {
		k.begin = s.Time
	} else if s.Time <= k.last {
		return &presslog.LineError{Line: s.Line, Err: presslog.ErrOrder}
	}
	k.last = s.Time
	k.log.Samples++
	k.guard.take(point{time: s.Time, turn: turn, ram: s.Ram})
	return k.err
}

// point takes what the guard passes on.
func (k *checker) point(p point) {
	if k.err != nil {
		return
	}
	if k.err = k.fitter.take(p); k.err != nil {
		return
	}
	k.err = k.motions.take(p, k.fitter.known, k.c.Tolerance.Motion)
}

// report ends the log and judges it.
func (k *checker) report() (*report, error) {
	k.guard.flush()
	if k.err != nil {
		return nil, k.err
	}
	f := k.fitter
	if f.model != nil {
		f.close()
	}
	if f.whole < k.c.Turns {
		return nil, fmt.Errorf("the log has %d whole turns of the crank in %d samples, %d are needed", f.whole, k.log.Samples, k.c.Turns)
	}
	j := &judge{c: k.c, f: f}
	r := &report{Log: k.log, MoreJumps: k.guard.more, Verdict: verdict{Faults: []string{}}}
	r.Log.Glitches, r.Log.Turns, r.Log.LeftOut, r.Log.Seconds = k.guard.glitches, f.whole, f.loud, k.last-k.begin
	var ok bool
	if r.Slip, ok = j.solve(); !ok {
		return nil, fmt.Errorf("the log does not determine the press: %d of %d turns are like one another", f.whole-f.loud, f.whole)
	}
	r.Jumps = j.jumps(k.guard.jumps)
	if !r.Slip.Total.beyond(k.c.Tolerance.Slip) {
		r.Links = j.links()
	}
	r.Pattern = j.pattern(&j.best)
	r.Calibration = j.calibration()
	r.Motion = k.motions.motions
	if r.Motion.Differ > 0 {
		r.Motion.Diff = cmp.Diff(r.Motion.Ideal, r.Motion.Measured, k.motions.same)
	}
	r.judge(&k.c.Tolerance)
	return r, nil
}

// judge gives the verdict. Slip smears the pattern over the turn, so nothing is said
// of lengths then; and a wrong motion is a fault of its own where no other explains it.
func (r *report) judge(t *tolerance) {
	fault := func(found bool, name string) {
		if found {
			r.Verdict.Faults = append(r.Verdict.Faults, name)
		}
	}
	slipped := r.Slip.Total.beyond(t.Slip)
	jumped := r.MoreJumps > 0
	for _, j := range r.Jumps {
		jumped = jumped || !j.Refuted
	}
	fault(slipped && r.Slip.Total.Value < 0, faultSlip)
	fault(jumped || slipped && r.Slip.Total.Value > 0, faultCounts)
	if n := len(r.Links.Wrong); n == 1 {
		fault(true, faultLink+": "+r.Links.Wrong[0].Name)
	} else {
		fault(n > 1, faultLink)
	}
	fault(!slipped && r.Pattern.Worst.beyond(t.Pattern), faultPattern)
	fault(r.Calibration.Scatter > t.Scatter, faultScatter)
	fault(float64(r.Log.Glitches) > t.Glitches*float64(r.Log.Samples), faultGlitches)
	fault(len(r.Verdict.Faults) == 0 && r.Motion.Differ > 0, faultMotion)
	r.Verdict.Pass = len(r.Verdict.Faults) == 0
	if r.Verdict.Pass && len(r.Links.Untold) > 0 {
		r.Verdict.Pass = false
		r.Verdict.Why = fmt.Sprintf("the log is too short or too rough to tell these lengths to their tolerances: %v", r.Links.Untold)
	}
}
