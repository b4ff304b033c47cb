package main

import (
	"errors"
	"math"
	"os"
	"testing"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/examples/internal/presslog"
	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/rigid/rigidtest"
	"example.com/twopoint/slidercrank"
)

// An acceptance test as one writes it for one's own machine: the motion of the press
// at some crank angles of a recording, against the press as drawn and set.
//
// The library's State is compared as a whole. What was measured, crank and ram, is put
// through it: the crank drives the ideal press, and the ram, driving the same press
// back, says where the links really were.
func TestAcceptance(t *testing.T) {
	press, err := slidercrank.New(slidercrank.Dimensions{Crank: 0.120, Rod: 0.480, Offset: 0.015})
	if err != nil {
		t.Fatal(err)
	}
	same := cmp.Options{
		rigidtest.Lengths(rigidtest.Tolerance{Pos: 2e-4, Vel: 5e-3, Acc: 0.2, Relative: 2e-3}),
		rigidtest.Angles(rigidtest.Tolerance{Pos: 2e-3, Vel: 0.1, Acc: 2}),
	}
	differing := func(file string) (n, seen int, diff string) {
		for crank, ram := range measured(t, file) {
			var ideal, real slidercrank.State
			if err := press.Solve(&ideal, crank); err != nil {
				t.Fatal(err)
			}
			if err := press.SolveSlide(&real, ram, ideal.Knee); err != nil || real.Margin < 0.5 {
				continue // near a dead centre the ram does not tell the crank's motion
			}
			real.Turn.Pos = rigid.Nearest(real.Turn.Pos, ideal.Turn.Pos)
			real.Margin = ideal.Margin // of another drive
			seen++
			if d := cmp.Diff(ideal, real, same); d != "" {
				n, diff = n+1, d
			}
		}
		return n, seen, diff
	}
	if n, seen, diff := differing("logs/good.csv"); n != 0 || seen < 20 {
		t.Errorf("the press differs at %d of %d instants (-ideal +measured):\n%s", n, seen, diff)
	}
	if n, _, _ := differing("logs/missed-counts.csv"); n < 5 {
		t.Errorf("missed counts show at %d instants", n)
	}
}

// measured gives the motion of crank and ram in the middle of every 25 samples, with
// the encoder's zero and the scale's offset as presscheck told them.
func measured(t *testing.T, file string) func(yield func(crank, ram rigid.Coordinate) bool) {
	const window, offset = 25, -2.1e-3
	return func(yield func(crank, ram rigid.Coordinate) bool) {
		f, err := os.Open(file)
		if err != nil {
			t.Fatal(err)
		}
		defer f.Close()
		e := encoder.Encoder{PerTurn: 5 * 4096, Zero: 6234}
		turn, err := encoder.NewRates(window, 3)
		ram, err2 := encoder.NewRates(window, 3)
		if err := errors.Join(err, err2); err != nil {
			t.Fatal(err)
		}
		var last presslog.Sample
		n := 0
		for s, err := range presslog.Samples(f, "motor_counts") {
			const fastest = 0.33                                                                   // m/s, at 24 rpm
			if err != nil || n > 0 && math.Abs(s.Ram-last.Ram) > fastest*(s.Time-last.Time)+1e-4 { // a spoilt line, a glitch of the scale
				continue
			}
			last = s
			turns, angle, err := e.Angle(s.Counts)
			if err != nil {
				t.Fatal(err)
			}
			c, _, ok := turn.Add(s.Time, float64(turns)*rigid.Revolution+angle)
			r, _, ok2 := ram.Add(s.Time, s.Ram-offset)
			if n++; ok && ok2 && n%window == 0 && !yield(c, r) {
				return
			}
		}
	}
}

// The same by the equations that make the fit linear: its derivatives by the lengths
// are those of the press itself.
func TestDerivatives(t *testing.T) {
	d := slidercrank.Dimensions{Crank: 0.120, Rod: 0.480, Offset: 0.015}
	at := func(d slidercrank.Dimensions, turn float64) float64 {
		y := d.Offset - d.Crank*math.Sin(turn)
		return d.Crank*math.Cos(turn) + math.Sqrt(d.Rod*d.Rod-y*y)
	}
	press, err := slidercrank.New(d)
	if err != nil {
		t.Fatal(err)
	}
	m := &model{press: press}
	const h = 1e-5
	for turn := -3.0; turn < 9; turn += 0.37 {
		got, _, err := m.row(point{turn: turn}, 0.25)
		if err != nil {
			t.Fatal(err)
		}
		slope := func(lo, hi slidercrank.Dimensions, dt float64) float64 {
			return (at(hi, turn+dt) - at(lo, turn-dt)) / (2 * h)
		}
		var want vector
		want[zero] = slope(d, d, h)
		want[drift] = want[zero] / 4
		want[ram] = 1
		for _, l := range []struct {
			at     int
			length func(*slidercrank.Dimensions) *float64
		}{
			{crank, func(d *slidercrank.Dimensions) *float64 { return &d.Crank }},
			{rod, func(d *slidercrank.Dimensions) *float64 { return &d.Rod }},
			{offset, func(d *slidercrank.Dimensions) *float64 { return &d.Offset }},
		} {
			lo, hi := d, d
			*l.length(&lo) -= h
			*l.length(&hi) += h
			want[l.at] = slope(lo, hi, 0)
		}
		for p := range want {
			if math.Abs(got[p]-want[p]) > 1e-8 {
				t.Errorf("turn %g, unknown %d: %g, want %g", turn, p, got[p], want[p])
			}
		}
	}
}
