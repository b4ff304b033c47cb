package slidercrank_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// TestSliderCrankAllocatesNothing: neither on success nor on failure.
func TestSliderCrankAllocatesNothing(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 0.1, Rod: 0.3, Offset: 0.02})
	rocks := newPress(t, slidercrank.Dimensions{Crank: 0.3, Rod: 0.2, Offset: 0.15})
	law := rigid.Law(l.Coefficients)
	var zero slidercrank.Linkage
	var st slidercrank.State
	var sum float64
	for name, f := range map[string]func() error{
		"Solve":                       func() error { return l.Solve(&st, rigid.Coordinate{Pos: 1, Vel: 2, Acc: 3}) },
		"Solve, place":                func() error { return l.Solve(&st, rigid.Coordinate{Pos: 1}) },
		"Solve, not finite":           func() error { return l.Solve(&st, rigid.Coordinate{Pos: math.NaN()}) },
		"Solve, overflow":             func() error { return l.Solve(&st, rigid.Coordinate{Vel: 1e200}) },
		"Solve, unreachable":          func() error { return rocks.Solve(&st, rigid.Coordinate{Pos: -1}) },
		"Solve, singular":             func() error { return rocks.Solve(&st, rigid.Coordinate{Pos: -0.16744807921968935, Vel: 1}) },
		"Solve, zero linkage":         func() error { return zero.Solve(&st, rigid.Coordinate{}) },
		"SolveSlide":                  func() error { return l.SolveSlide(&st, rigid.Coordinate{Pos: 0.3, Vel: 2, Acc: 3}, rigid.Right) },
		"SolveSlide, at a limit":      func() error { return l.SolveSlide(&st, rigid.Coordinate{Pos: st.Slide.Pos}, rigid.Right) },
		"SolveSlide, unreachable":     func() error { return l.SolveSlide(&st, rigid.Coordinate{Pos: 0.1}, rigid.Left) },
		"SolveSlide, other branch":    func() error { return l.SolveSlide(&st, rigid.Coordinate{Pos: -0.3}, rigid.Left) },
		"SolveSlide, not finite":      func() error { return l.SolveSlide(&st, rigid.Coordinate{Acc: math.Inf(1)}, rigid.Left) },
		"SolveSlide, no such knee":    func() error { return l.SolveSlide(&st, rigid.Coordinate{Pos: 0.3}, 5) },
		"Coefficients":                func() error { _, err := l.Coefficients(1); return err },
		"Coefficients, unreachable":   func() error { _, err := rocks.Coefficients(-1); return err },
		"Coefficients as a Law":       func() error { _, err := law(2); return err },
		"DeadCentres":                 func() error { _, _, err := l.DeadCentres(); return err },
		"DeadCentres, no inner":       func() error { _, _, err := rocks.DeadCentres(); return err },
		"Stroke":                      func() error { _, err := l.Stroke(); return err },
		"TimeRatio, unreachable":      func() error { _, err := rocks.TimeRatio(); return err },
		"PressureAngle of the State":  func() error { sum += st.PressureAngle(); return nil },
		"PressureAngles and the rest": func() error { a, b := l.PressureAngles(); sum += a + b + l.Dimensions().Rod; return nil },
	} {
		if n := testing.AllocsPerRun(100, func() {
			if err := f(); err != nil {
				sum++
			}
		}); n != 0 {
			t.Errorf("%s: %v allocations", name, n)
		}
	}
}
