package slidercrank_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func newQuickReturn(t *testing.T, d slidercrank.QuickReturnDimensions) *slidercrank.QuickReturn {
	t.Helper()
	q, err := slidercrank.NewQuickReturn(d)
	if err != nil {
		t.Fatal(err)
	}
	return q
}

// across is a guide square to the line of centres at x.
func across(x float64) rigid.Placement { return rigid.Placement{X: x, Angle: math.Pi / 2} }

// Khurmi & Gupta, Theory of Machines, examples 5.2 and 5.3, printed answers: the
// stroke of the ram is the chord of the lever's end.
func TestPublishedStrokes(t *testing.T) {
	for _, row := range []struct {
		crank, centre, arm    float64
		stated, digit, recalc float64
	}{
		{0.120, 0.240, 0.450, 0.450, 0.001, 0.450},
		{0.030, 0.075742319028319591987, 0.15148463805663918397, 0.120, 0.001, 0.120},
	} {
		q := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: row.crank, Centre: row.centre, Arm: row.arm, Guide: across(0)})
		stroke, err := q.Stroke()
		if err != nil {
			t.Fatal(err)
		}
		published{"stroke", stroke, row.stated, row.digit, row.recalc}.check(t)
	}
}

// A turning lever whose ram runs through the lever pivot, square to the line of
// centres: Khurmi & Gupta, example 5.4, and an answered exercise on the web, 2.735
// for crank 150 with centres 100 and for 75 with 50.
func TestPublishedWhitworthTimeRatio(t *testing.T) {
	for _, row := range []struct{ crank, centre float64 }{{0.150, 0.100}, {0.075, 0.050}} {
		q := newQuickReturn(t, slidercrank.QuickReturnDimensions{
			Crank: row.crank, Centre: row.centre, Arm: row.crank, Rod: 4 * row.crank, Guide: across(-row.centre),
		})
		ratio, err := q.TimeRatio()
		if err != nil {
			t.Fatal(err)
		}
		published{"time ratio", ratio, 2.735, 0.001, 2.7352391826323026562}.check(t)
	}
}

// A linked pair of questions of GATE ME 2007, from memory: lever pivot 500 mm from the crank pivot, return in half the time of the
// cut, crank at 2 rev/s. The crank is 250 mm, and where the ram is fastest on the
// slower stroke the lever makes 2/3 rev/s.
func TestPublishedLeverSpeed(t *testing.T) {
	q := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: 0.250, Centre: 0.500, Arm: 0.8, Guide: across(0)})
	ratio, err := q.TimeRatio()
	if err != nil {
		t.Fatal(err)
	}
	cutting, _, err := q.Strokes()
	if err != nil {
		t.Fatal(err)
	}
	var st slidercrank.QuickReturnState
	if err := q.Solve(&st, rigid.Coordinate{Pos: cutting.Turn.Lo/2 + cutting.Turn.Hi/2, Vel: 2 * rigid.Revolution}); err != nil {
		t.Fatal(err)
	}
	published{"time ratio", ratio, 2, 1, 2}.check(t)
	published{"lever speed", st.Swing.Vel / rigid.Revolution, 0.667, 0.001, 2. / 3}.check(t)
}
