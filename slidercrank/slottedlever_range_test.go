package slidercrank_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// TestInversionsDeadCentresMissNone finds the changes of sign of First over Range by
// small steps, and holds the dead centres against them.
func TestInversionsDeadCentresMissNone(t *testing.T) {
	each(t, 19, func(t *testing.T, _ maker, m machine, _ rigid.Coordinate) {
		const steps = 2000
		for _, over := range m.over {
			step := (over.Hi - over.Lo) / steps
			inside := func(x, steps float64) bool { // not near an end that is one
				return over.Hi-over.Lo >= rigid.Revolution || over.Lo+steps*step < x && x < over.Hi-steps*step
			}
			var turns []float64
			lo, err1 := m.law(over.Lo + 0.3*step)
			for k := range steps {
				hi, err2 := m.law(over.Lo + (float64(k)+1.3)*step)
				if err1 == nil && err2 == nil && lo.First*hi.First < 0 && inside(hi.In, 4) {
					turns = append(turns, lo.In)
				}
				lo, err1 = hi, err2
			}
			known := 0
			for _, x := range m.dead {
				if at, ok := over.Angle(x.In); ok && inside(at, 2) {
					known++
				}
			}
			for _, at := range turns {
				found := false
				for _, x := range m.dead {
					found = found || math.Abs(math.Remainder(x.In-at-step/2, 2*math.Pi)) < step
				}
				if !found {
					t.Errorf("First changes sign near %v, dead centres: %+v", at, m.dead)
				}
			}
			if known < len(turns) || known > len(turns)+2 {
				t.Errorf("%d changes of sign, %d dead centres: %+v", len(turns), known, m.dead)
			}
		}
	})
}

// TestInversionsReturnedPositions: what the library returns it accepts, for the
// place at least.
func TestInversionsReturnedPositions(t *testing.T) {
	each(t, 20, func(t *testing.T, _ maker, m machine, _ rigid.Coordinate) {
		var turns []float64
		for _, over := range m.over {
			turns = append(turns, over.Lo, over.Hi)
			if !(over.Lo >= -math.Pi && over.Lo < math.Pi && over.Lo < over.Hi) {
				t.Errorf("range %+v", over)
			}
			if over.Hi-over.Lo < rigid.Revolution {
				for _, out := range []float64{over.Lo - 1e-6, over.Hi + 1e-6} {
					if _, err := m.solve(rigid.Coordinate{Pos: out}); !errors.Is(err, rigid.ErrUnreachable) {
						t.Errorf("beyond the range at %v: %v", out, err)
					}
				}
				for _, end := range []float64{over.Lo, over.Hi} {
					if _, err := m.solve(rigid.Coordinate{Pos: end, Vel: 1}); err != rigid.ErrSingular {
						t.Errorf("rates at the end of the range, %v: %v", end, err)
					}
				}
			}
		}
		for _, x := range m.dead {
			turns = append(turns, x.In)
			if _, err := m.back(rigid.Coordinate{Pos: x.In, Vel: 1}); err != rigid.ErrSingular {
				t.Errorf("the way back with rates from the dead centre %+v: %v", x, err)
			}
		}
		for _, at := range turns {
			s, err := m.solve(rigid.Coordinate{Pos: at})
			if err != nil {
				t.Errorf("turn %v: %v", at, err)
				continue
			}
			for _, x := range append(numbers(s, 1), numbers(s, 2)...) {
				if x != 0 {
					t.Fatalf("turn %v: a link at rest has a rate %v", at, x)
				}
			}
			for _, x := range numbers(s, 0) {
				if math.IsNaN(x) || math.IsInf(x, 0) {
					t.Fatalf("turn %v: %+v", at, s)
				}
			}
			got, err := m.back(rigid.Coordinate{Pos: at})
			if err != nil {
				t.Errorf("turn %v: the way back: %v", at, err)
				continue
			}
			if len(s.links) == 5 && elbow(s) < 0.1 {
				continue // the rounding of the travel is too much for the lever's angle
			}
			if d := math.Remainder(got[0].coords[0].Pos-at, 2*math.Pi); math.Abs(d) > 1e-5 {
				t.Errorf("turn %v: the way back gives %v", at, got[0].coords[0].Pos)
			}
		}
	})
}

// elbow returns |sin| of the angle between the arm of a quick-return drive and its
// rod, or its travel if it has none.
func elbow(s sample) float64 {
	arm := r2.Sub(s.links[3].Pose.Origin, s.links[2].Pose.Origin)
	return math.Abs(r2.Cross(arm, s.links[3].Pose.Axis)) / r2.Norm(arm)
}
