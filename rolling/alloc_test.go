package rolling_test

import (
	"errors"
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// TestNoAllocation covers every call meant for a control loop, failing ones included.
func TestNoAllocation(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: 2})
	p := pair(t, rolling.PairDimensions{TeethA: 20, TeethB: 50, Centres: 0.35})
	r, err := rolling.NewRack(rolling.RackDimensions{Teeth: 20, Pitch: 0.01})
	q, err2 := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.1, RadiusB: 0.2, Centres: 1})
	if err := errors.Join(err, err2); err != nil {
		t.Fatal(err)
	}
	tr := train(t, coupledAnnuli())
	track := newTrack(t, bends...)
	law := w.TurnOn(track)
	var ws rolling.WheelState
	var ps rolling.PairState
	var rs rolling.RackState
	var bs rolling.BeltState
	var m rigid.Motion
	turns := make([]rigid.Coordinate, 7)
	arm := rigid.Motion{Omega: 1}
	good, bad := rigid.Coordinate{Pos: 1, Vel: 2, Acc: 3}, rigid.Coordinate{Pos: math.NaN()}
	failed := 0
	count := func(err error) {
		if err != nil {
			failed++
		}
	}
	calls := map[string]func(c rigid.Coordinate){
		"Wheel.Solve":        func(c rigid.Coordinate) { count(w.Solve(&ws, c)) },
		"Wheel.SolveTravel":  func(c rigid.Coordinate) { count(w.SolveTravel(&ws, c)) },
		"Wheel.SolveArc":     func(c rigid.Coordinate) { count(w.SolveArc(&ws, c)) },
		"Wheel.SolveSlip":    func(c rigid.Coordinate) { count(w.SolveSlip(&ws, c, c)) },
		"Wheel.SolveRatio":   func(c rigid.Coordinate) { count(w.SolveRatio(&ws, c, 0.1)) },
		"Wheel.SolveBelt":    func(c rigid.Coordinate) { count(w.SolveBelt(&ws, c, c)) },
		"Wheel.SolveTrack":   func(c rigid.Coordinate) { count(w.SolveTrack(&ws, track, c)) },
		"Wheel.Slip":         func(c rigid.Coordinate) { _, err := w.Slip(c, c); count(err) },
		"Wheel.Coefficients": func(c rigid.Coordinate) { _, err := w.Coefficients(c.Pos); count(err) },
		"Wheel.TurnOn":       func(c rigid.Coordinate) { _, err := law(c.Pos); count(err) },
		"WheelState.On":      func(c rigid.Coordinate) { arm.Omega = c.Pos; count(ws.On(&arm)) },
		"Pair.Solve":         func(c rigid.Coordinate) { count(p.Solve(&ps, c)) },
		"Pair.SolveB":        func(c rigid.Coordinate) { count(p.SolveB(&ps, c)) },
		"Pair.Coefficients":  func(c rigid.Coordinate) { _, err := p.Coefficients(c.Pos); count(err) },
		"PairState.On":       func(c rigid.Coordinate) { arm.Omega = c.Pos; count(ps.On(&arm)) },
		"Rack.Solve":         func(c rigid.Coordinate) { count(r.Solve(&rs, c)) },
		"Rack.SolveSlide":    func(c rigid.Coordinate) { count(r.SolveSlide(&rs, c)) },
		"Rack.Coefficients":  func(c rigid.Coordinate) { _, err := r.Coefficients(c.Pos); count(err) },
		"RackState.On":       func(c rigid.Coordinate) { arm.Omega = c.Pos; count(rs.On(&arm)) },
		"Belt.Solve":         func(c rigid.Coordinate) { count(q.Solve(&bs, c)) },
		"Belt.SolveB":        func(c rigid.Coordinate) { count(q.SolveB(&bs, c)) },
		"Belt.SolveSlide":    func(c rigid.Coordinate) { count(q.SolveSlide(&bs, c)) },
		"Belt.Coefficients":  func(c rigid.Coordinate) { _, err := q.Coefficients(c.Pos); count(err) },
		"BeltState.On":       func(c rigid.Coordinate) { arm.Omega = c.Pos; count(bs.On(&arm)) },
		"Train.Solve":        func(c rigid.Coordinate) { count(tr.Solve(turns, c, c)) },
		"Planet":             func(c rigid.Coordinate) { count(rolling.Planet(&m, c, c, 0.2, 1)) },
	}
	for name, call := range calls {
		for _, c := range []struct {
			in    rigid.Coordinate
			fails bool
		}{{good, false}, {bad, true}} {
			failed = 0
			if n := testing.AllocsPerRun(10, func() { call(c.in) }); n != 0 || (failed > 0) != c.fails {
				t.Errorf("%s of %+v: %v allocations, %d of 11 failed", name, c.in, n, failed)
			}
		}
	}
}
