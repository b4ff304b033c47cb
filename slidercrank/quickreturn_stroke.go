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
		in[i] = q.inside(in[i])
		if in[i].Lo >= math.Pi {
			in[i] = q.inside(rigid.Interval{Lo: in[i].Lo - rigid.Revolution, Hi: in[i].Hi - rigid.Revolution})
		}
	}
	slices.SortFunc(in, func(a, b rigid.Interval) int { return cmp.Compare(a.Lo, b.Lo) })
	return in
}

// inside returns a piece with both ends where the rod reaches.
func (q *QuickReturn) inside(i rigid.Interval) rigid.Interval {
	return rigid.Interval{Lo: q.inward(i.Lo, i.Hi), Hi: q.inward(i.Hi, i.Lo)}
}

// inward returns an end of a piece, moved on towards the other one where rounding put
// it beyond the rod's reach: a quick lever carries the ram far in one rounding of the
// turn, and near its dead centre the turn is off by more than one.
func (q *QuickReturn) inward(end, other float64) float64 {
	at, step := end, math.Nextafter(end, other)-end
	for range 24 {
		if q.reaches(at) {
			return at
		}
		at, step = at+step, 2*step
	}
	return end
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
	from, to, err := q.ends()
	if err != nil {
		return RamStroke{}, RamStroke{}, err
	}
	if cutting, err = q.stroke(from, to); err != nil {
		return RamStroke{}, RamStroke{}, err
	}
	from.In += rigid.Revolution
	if back, err = q.stroke(to, from); err != nil {
		return RamStroke{}, RamStroke{}, err
	}
	return cutting, back, nil
}

// ends returns the dead centres at the beginning and the end of the cutting stroke,
// the second up to a turn on.
func (q *QuickReturn) ends() (from, to rigid.Coefficients, err error) {
	if q.arm == 0 {
		return from, to, rigid.ErrInput
	}
	c, r := q.DeadCentres(), q.Range()
	if len(c) != 2 || len(r) != 1 || r[0].Hi-r[0].Lo < rigid.Revolution {
		return from, to, rigid.ErrUnreachable
	}
	from, to = c[0], c[1]
	if to.In-from.In < math.Pi {
		from, to = to, from
		to.In += rigid.Revolution
	}
	return from, to, nil
}

// stroke returns the stroke between two dead centres. The acceleration is greatest
// inside, where it has a peak, or at an end.
func (q *QuickReturn) stroke(from, to rigid.Coefficients) (RamStroke, error) {
	s := RamStroke{Turn: rigid.Interval{Lo: from.In, Hi: to.In}, From: from.Out, To: to.Out}
	accs := []rigid.Coefficients{from, to}
	cuts := q.cuts(s.Turn)
	for i, lo := range cuts[:len(cuts)-1] {
		speeds, more, err := rigid.Law(q.Coefficients).Peaks(rigid.Interval{Lo: lo, Hi: cuts[i+1]})
		if err != nil {
			return RamStroke{}, err
		}
		for _, c := range speeds {
			if math.Abs(c.First) > math.Abs(s.Speed.First) {
				s.Speed = c
			}
		}
		accs = append(accs, more...)
	}
	for _, c := range accs {
		if math.Abs(c.Second) > math.Abs(s.Acc.Second) {
			s.Acc = c
		}
	}
	return s, nil
}

// cuts returns the ends of a stroke, and between them where to cut it for Peaks to see
// all of it. Where the pin passes the lever pivot closely the lever turns over within a
// small part of the turn: off π the crank doubles
//
//	σ² = least + 4rc cos²(φ/2)  at about √(least/rc)
//
// and what the ram does that far off it does within as much.
func (q *QuickReturn) cuts(stroke rigid.Interval) []float64 {
	k := &q.form
	at := []float64{stroke.Lo, stroke.Hi}
	for off := 16 * math.Sqrt(k.least/(k.r*k.c)); off < 1; off *= 16 {
		for _, nearest := range [...]float64{-math.Pi, math.Pi, 3 * math.Pi} {
			for _, x := range [...]float64{nearest - off, nearest + off} {
				if stroke.Lo < x && x < stroke.Hi {
					at = append(at, x)
				}
			}
		}
	}
	slices.Sort(at)
	return at
}

// TimeRatio returns the crank's angle of the cutting stroke over that of the return,
// at least 1: the ratio of the times at constant speed. Errors as Strokes.
func (q *QuickReturn) TimeRatio() (float64, error) {
	from, to, err := q.ends()
	if err != nil {
		return 0, err
	}
	cut := to.In - from.In
	return cut / (rigid.Revolution - cut), nil
}

// Stroke returns the ram's travel between its dead centres in m. Errors as Strokes.
func (q *QuickReturn) Stroke() (float64, error) {
	from, to, err := q.ends()
	if err != nil {
		return 0, err
	}
	return math.Abs(to.Out - from.Out), nil
}
