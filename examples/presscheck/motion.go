package main

import (
	"math"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/rigid/rigidtest"
	"example.com/twopoint/slidercrank"
)

const rateDegree = 3

// A motion is what is compared, as measured or as the press has it.
type motion struct {
	Crank rigid.Coordinate `json:"crank"`
	Ram   rigid.Coordinate `json:"ram"`
}

// A comparer holds the measured motion of the ram against that of the press, once in
// each window.
type comparer struct {
	press     *slidercrank.Linkage
	turn, ram *encoder.Rates
	same      cmp.Option
	every, n  int
	st        slidercrank.State

	motions
	worst float64 // times the tolerance
}

func newComparer(c *config) (*comparer, error) {
	m := &comparer{every: c.Window, same: compared(c.Tolerance.Motion)}
	var err error
	if m.press, err = slidercrank.New(c.Press); err != nil {
		return nil, err
	}
	if m.turn, err = encoder.NewRates(c.Window, rateDegree); err != nil {
		return nil, err
	}
	m.ram, err = encoder.NewRates(c.Window, rateDegree)
	return m, err
}

// compared returns the options under which two motions are equal: of the crank,
// which is the input, nothing is asked.
func compared(t rigidtest.Tolerance) cmp.Option {
	any := math.Inf(1)
	crank := rigidtest.Tolerance{Pos: any, Vel: any, Acc: any}
	return cmp.Options{rigidtest.Lengths(t, "Crank"), rigidtest.Angles(crank, "Crank")}
}

// take takes the next point; known tells the corrections found so far, if any are.
func (m *comparer) take(p point, known *vector, tol rigidtest.Tolerance) error {
	if p.fresh {
		m.turn.Reset()
		m.ram.Reset()
	}
	turn, at, ok := m.turn.Add(p.time, p.turn)
	slide, _, ok2 := m.ram.Add(p.time, p.ram)
	if m.n++; !ok || !ok2 || known == nil || m.n < m.every {
		return nil
	}
	m.n = 0
	turn.Pos += known[zero]
	slide.Pos -= known[ram]
	if err := m.press.Solve(&m.st, turn); err != nil {
		return err
	}
	measured, ideal := motion{turn, slide}, motion{turn, m.st.Slide}
	m.Windows++
	if !cmp.Equal(ideal, measured, m.same) {
		m.Differ++
	}
	off := max(math.Abs(slide.Pos-ideal.Ram.Pos)/tol.Pos, math.Abs(slide.Vel-ideal.Ram.Vel)/tol.Vel, math.Abs(slide.Acc-ideal.Ram.Acc)/tol.Acc)
	if off > m.worst || m.Windows == 1 {
		m.worst, m.Time, m.Measured, m.Ideal = off, at, measured, ideal
	}
	return nil
}
