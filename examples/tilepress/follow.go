package main

import (
	"errors"
	"fmt"
	"io"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/examples/internal/presslog"
	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/slidercrank"
)

// A tick is the press at one instant of the log.
type tick struct {
	Time      float64                 `json:"time"`      // s
	Crank     rigid.Coordinate        `json:"crank"`     // rad
	Ram       rigid.Coordinate        `json:"ram"`       // m, ideal
	Terms     rigid.AccelerationTerms `json:"rodCentre"` // m/s², at the middle of the rod
	Commanded command                 `json:"commanded"`
}

// A command is the crank speed that gives the commanded ram speed, or why none does.
type command struct {
	RamSpeed   float64 `json:"ramSpeed"`   // m/s
	CrankSpeed float64 `json:"crankSpeed"` // rad/s
	Refused    string  `json:"refused,omitempty"`
}

// A difference is that of the measured ram and the ideal one.
type difference struct {
	Time       float64 `json:"time"`       // s
	Crank      float64 `json:"crank"`      // rad
	Measured   float64 `json:"measured"`   // m
	Ideal      float64 `json:"ideal"`      // m
	Difference float64 `json:"difference"` // m
}

// A place is a stretch of the log within the margin of a dead centre.
type place struct {
	From  float64 `json:"from"`  // s
	To    float64 `json:"to"`    // s
	Crank float64 `json:"crank"` // rad, where the margin was least
	Least float64 `json:"leastMargin"`
	Which string  `json:"deadCentre"` // outer or inner
}

// A summary closes a run.
type summary struct {
	Samples int        `json:"samples"`
	Skipped int        `json:"skipped"`
	Places  int        `json:"places"`
	Worst   difference `json:"worst"`
}

// A follower holds what one run needs; nothing in it grows with the log.
type follower struct {
	options
	*machine
	out          printer
	rates        *encoder.Rates
	inner, outer slidercrank.DeadCentre
	st, back     slidercrank.State
	near         *place
	last         float64 // time of the last sample taken, s
	sum          summary
}

// follow reads a log sample by sample and prints what the press did.
func follow(o options, m *machine, log io.Reader, stdout, stderr io.Writer) error {
	rates, err := encoder.NewRates(o.window, 2)
	if err != nil {
		return fmt.Errorf("-window %d: %w", o.window, err)
	}
	f := &follower{options: o, machine: m, out: newPrinter(o, stdout), rates: rates}
	if f.outer, f.inner, err = m.press.DeadCentres(); err != nil {
		return err
	}
	for s, err := range presslog.Samples(log, "crank_counts") {
		var bad *presslog.LineError
		if err == nil {
			err = f.take(s)
		}
		switch {
		case errors.As(err, &bad) && !o.strict:
			f.sum.Skipped++
			fmt.Fprintln(stderr, "skipped:", bad)
		case err != nil:
			return errors.Join(err, f.out.flush())
		}
	}
	f.leave()
	if f.sum.Samples == 0 {
		return errors.Join(errors.New("the log has no sample"), f.out.flush())
	}
	f.out.summary(f.sum)
	return f.out.flush()
}

// take takes one sample. What the sample itself is to blame for is a *presslog.LineError.
func (f *follower) take(s presslog.Sample) error {
	turns, angle, err := f.encoder.Angle(s.Counts)
	if err != nil {
		return &presslog.LineError{Line: s.Line, Err: fmt.Errorf("crank_counts %d: %w", s.Counts, err)}
	}
	turn := float64(turns)*rigid.Revolution + angle
	if f.sum.Samples > 0 && s.Time <= f.last {
		return &presslog.LineError{Line: s.Line, Err: presslog.ErrOrder}
	}
	if err := f.press.Solve(&f.st, rigid.Coordinate{Pos: turn}); err != nil {
		return &presslog.LineError{Line: s.Line, Err: err}
	}
	f.compare(s, turn)
	if err := f.watch(s.Time, turn); err != nil {
		return &presslog.LineError{Line: s.Line, Err: err}
	}
	crank, at, ok := f.rates.Add(s.Time, turn)
	if ok && f.sum.Samples%f.every == 0 {
		t, err := f.tick(at, crank)
		if err != nil {
			return &presslog.LineError{Line: s.Line, Err: err}
		}
		f.out.tick(t)
	}
	f.sum.Samples++
	f.last = s.Time
	return nil
}

// compare keeps the worst difference of the measured ram and the ideal one.
func (f *follower) compare(s presslog.Sample, turn float64) {
	ideal := f.st.Slide.Pos
	d := difference{Time: s.Time, Crank: rigid.Wrap(turn), Measured: s.Ram, Ideal: ideal, Difference: s.Ram - ideal}
	if f.sum.Samples == 0 || math.Abs(d.Difference) > math.Abs(f.sum.Worst.Difference) {
		f.sum.Worst = d
	}
}

// watch follows the margin of the solve back, the sine between crank and rod that
// vanishes at a dead centre, and reports a place when the press leaves it.
func (f *follower) watch(time, turn float64) error {
	if err := f.press.SolveSlide(&f.back, rigid.Coordinate{Pos: f.st.Slide.Pos}, f.st.Knee); err != nil {
		return err
	}
	margin := f.back.Margin
	if margin >= f.margin {
		f.leave()
		return nil
	}
	if f.near == nil {
		f.near = &place{From: time, Least: math.Inf(1), Which: f.nearest()}
	}
	f.near.To = time
	if margin < f.near.Least {
		f.near.Least, f.near.Crank = margin, rigid.Wrap(turn)
	}
	return nil
}

func (f *follower) nearest() string {
	if x := f.st.Slide.Pos; math.Abs(x-f.outer.Slide) < math.Abs(x-f.inner.Slide) {
		return "outer"
	}
	return "inner"
}

// leave ends the place the press was in, if it was in one.
func (f *follower) leave() {
	if f.near != nil {
		f.sum.Places++
		f.out.place(*f.near)
		f.near = nil
	}
}

// tick solves the press for a motion of the crank, and back for the commanded ram
// speed. A press at rest is answered at a dead centre too.
func (f *follower) tick(at float64, crank rigid.Coordinate) (tick, error) {
	st, back := &f.st, &f.back
	if err := f.press.Solve(st, crank); err != nil {
		return tick{}, err
	}
	t := tick{Time: at, Crank: crank, Ram: st.Slide}
	t.Crank.Pos = rigid.Wrap(crank.Pos)
	middle := rigid.Point{Pos: r2.Vec{X: f.press.Dimensions().Rod / 2}}
	t.Terms = st.Rod.AccelerationTerms(middle)
	t.Commanded.RamSpeed = f.ramSpeed
	if err := f.press.SolveSlide(back, rigid.Coordinate{Pos: st.Slide.Pos, Vel: f.ramSpeed}, st.Knee); err != nil {
		t.Commanded.Refused = err.Error()
	} else {
		t.Commanded.CrankSpeed = back.Turn.Vel
	}
	return t, nil
}
