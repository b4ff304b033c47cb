package slidercrank

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// Range returns the crank's angles that have a position: those of the slotted
// lever, less those where the rod does not reach the guide.
func (q *QuickReturn) Range() []rigid.Interval {
	if q.arm == 0 {
		return nil
	}
	whole := q.form.turns()[0]
	if q.byArm.L == 0 {
		return []rigid.Interval{whole}
	}
	var cuts []float64
	for _, y := range [...]float64{-q.foot.Y - q.byArm.L, -q.foot.Y + q.byArm.L} {
		if x, ok := leg(q.arm, y, 0); ok && x > 0 {
			cuts = append(cuts, q.turnsAt(r2.Vec{X: x, Y: y})...)
			cuts = append(cuts, q.turnsAt(r2.Vec{X: -x, Y: y})...)
		}
	}
	slices.Sort(cuts)
	return q.reached(whole, cuts)
}

// turnsAt returns the crank's angles where the lever's arm lies along the vector a,
// in Guide's axes: up to two.
func (q *QuickReturn) turnsAt(a r2.Vec) []float64 {
	var turns []float64
	swing := rigid.Coordinate{Pos: q.swingAt(a)}
	for _, knee := range [...]rigid.Side{rigid.Left, rigid.Right} {
		var m slotMotion
		if q.form.solveSwing(&m, swing, knee) == nil {
			turns = append(turns, m.turn.Pos)
		}
	}
	return turns
}

// reached returns the pieces into which the sorted cuts divide the whole range and
// in which the rod reaches the guide. A piece over the seam of a full turn comes
// as one, with Lo as it is and Hi a turn later.
func (q *QuickReturn) reached(whole rigid.Interval, cuts []float64) []rigid.Interval {
	full := whole.Lo == -math.Pi && whole.Hi == math.Pi
	ends := append(append([]float64{whole.Lo}, cuts...), whole.Hi)
	if full && len(cuts) > 0 {
		ends = append(cuts, cuts[0]+rigid.Revolution)
	}
	var in []rigid.Interval
	for i := range len(ends) - 1 {
		piece := rigid.Interval{Lo: ends[i], Hi: ends[i+1]}
		if piece.Hi <= piece.Lo || !q.reaches((piece.Lo+piece.Hi)/2) {
			continue
		}
		if n := len(in); n > 0 && in[n-1].Hi == piece.Lo { // a cut where the rod only touches
			in[n-1].Hi = piece.Hi
			continue
		}
		in = append(in, piece)
	}
	if len(in) == 1 && in[0].Hi-in[0].Lo >= rigid.Revolution {
		return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	}
	for i := range in {
		if in[i].Lo >= math.Pi {
			in[i].Lo, in[i].Hi = in[i].Lo-rigid.Revolution, in[i].Hi-rigid.Revolution
		}
	}
	slices.SortFunc(in, func(a, b rigid.Interval) int { return cmp.Compare(a.Lo, b.Lo) })
	return in
}

// reaches reports whether the crank's angle has a position.
func (q *QuickReturn) reaches(turn float64) bool {
	var m slotMotion
	var r ramMotion
	return q.solve(&m, &r, rigid.Coordinate{Pos: turn}) == nil
}

// DeadCentres returns the crank's angles, in (−π, π] and rising, where the ram comes
// to rest, with the travel as Out and First = 0: where the lever's swing does, and
// where the arm is in line with the rod, or with the travel if there is no rod.
func (q *QuickReturn) DeadCentres() []rigid.Coefficients {
	if q.arm == 0 {
		return nil
	}
	var turns []float64
	for _, c := range q.form.deadCentres() {
		turns = append(turns, c.In)
	}
	for _, a := range q.inLine() {
		turns = append(turns, q.turnsAt(a)...)
	}
	slices.Sort(turns)
	var found []rigid.Coefficients
	for _, turn := range turns {
		c, err := q.Coefficients(turn)
		if n := len(found); err == nil && (n == 0 || turn-found[n-1].In > 1e-9) {
			c.First = 0
			found = append(found, c)
		}
	}
	return found
}

// inLine returns the directions of the arm, in Guide's axes, where it lies along the
// rod or, without one, along the travel. With w the unit vector along the rod the
// ram pin is at (l ± a)w from the lever pivot and at −foot.Y from the line through
// it along the travel.
func (q *QuickReturn) inLine() []r2.Vec {
	if q.byArm.L == 0 {
		return []r2.Vec{{X: 1}, {X: -1}}
	}
	var arms []r2.Vec
	for _, s := range [...]float64{1, -1} {
		y := -q.foot.Y / (q.byArm.L + s*q.arm)
		if x, ok := leg(1, y, 0); ok {
			arms = append(arms, r2.Vec{X: s * q.side * x, Y: s * y})
		}
	}
	return arms
}

// A RamStroke is one stroke of a QuickReturn, at its crank turning positive.
type RamStroke struct {
	Turn     rigid.Interval     // the crank's angle from the beginning to the end; Hi may be beyond π
	From, To float64            // travel at the beginning and at the end, m
	Speed    rigid.Coefficients // where the ram's speed is greatest: First is it over the crank's
	Acc      rigid.Coefficients // where the ram's acceleration is greatest at constant speed of the crank: Second is it over the speed's square
}

// Strokes returns the two strokes of the ram with the crank turning positive: cutting
// is the longer in crank angle, back the return. With the crank turning negative
// both are run from Hi to Lo. ErrUnreachable where the crank does not turn fully or
// the ram has not just two dead centres; ErrInput for a zero QuickReturn.
func (q *QuickReturn) Strokes() (cutting, back RamStroke, err error) {
	if q.arm == 0 {
		return cutting, back, rigid.ErrInput
	}
	c, r := q.DeadCentres(), q.Range()
	if len(c) != 2 || len(r) != 1 || r[0].Hi-r[0].Lo < rigid.Revolution {
		return cutting, back, rigid.ErrUnreachable
	}
	cutting = RamStroke{Turn: rigid.Interval{Lo: c[0].In, Hi: c[1].In}, From: c[0].Out, To: c[1].Out}
	back = RamStroke{Turn: rigid.Interval{Lo: c[1].In, Hi: c[0].In + rigid.Revolution}, From: c[1].Out, To: c[0].Out}
	if span(cutting.Turn) < span(back.Turn) {
		cutting, back = back, cutting
	}
	return cutting, back, nil
}

func span(i rigid.Interval) float64 { return i.Hi - i.Lo }

// TimeRatio returns the crank's angle of the cutting stroke over that of the return,
// at least 1: the ratio of the times at constant speed. Errors as Strokes.
func (q *QuickReturn) TimeRatio() (float64, error) {
	cutting, back, err := q.Strokes()
	if err != nil {
		return 0, err
	}
	return span(cutting.Turn) / span(back.Turn), nil
}

// Stroke returns the ram's travel between its dead centres in m. Errors as Strokes.
func (q *QuickReturn) Stroke() (float64, error) {
	cutting, _, err := q.Strokes()
	if err != nil {
		return 0, err
	}
	return math.Abs(cutting.To - cutting.From), nil
}
