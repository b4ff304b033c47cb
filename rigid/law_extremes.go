package rigid

import (
	"cmp"
	"math"
	"slices"
)

// Extremes returns the dead centres of the output, where First is 0, in order. Where
// Second is positive the output is least, where it is negative greatest; where
// Second is 0 too, the output may stand still and go on the same way, and that
// counts as well. First is as the law gives it there: 0 but for rounding. Of a dwell,
// a stretch where the output stands still, both ends are given.
//
// Over is half open: a dead centre at Lo counts, one at Hi does not, and being off
// by rounding does not matter, so that over a whole turn each counts once. Lo equal
// to Hi holds nothing.
//
// The law is looked at in 1 024 steps of over, and one step beyond at either end.
// Inside a step, two dead centres are found by the cubic that fits First and Second
// at its ends; more, or what such a cubic does not show, can be missed. Stretches
// of over in which the law has no value are passed over, and the search goes up to
// their edges.
//
// Errors: ErrNotFinite for an over that is not finite, ErrInput for one whose Lo is
// above its Hi, and the law's own error where it has no value anywhere in over.
func (l Law) Extremes(over Interval) ([]Coefficients, error) {
	s, err := newScan(l, over)
	if err != nil {
		return nil, err
	}
	return s.extremes(), nil
}

// Peaks returns the extremes of First, which is the output's speed for an input of
// unit speed, and those of Second, its acceleration: least and greatest ones in
// order of the input. Of a stretch in which the value stays the same, one position.
//
//	speed   where Second changes sign: as exact as Second is
//	acc     value to the law's rounding; place to about 1e-8, found without a derivative
//
// An end of over, or a position where the law ends, is no extreme, unless it is one
// when looked at from both sides: where First grows without bound, that end is left
// out. What over holds, steps and errors are as for Extremes; of the extremes of Second,
// two that lie within one step can be missed.
func (l Law) Peaks(over Interval) (speed, acc []Coefficients, err error) {
	s, err := newScan(l, over)
	if err != nil {
		return nil, nil, err
	}
	for _, part := range s.parts {
		speed = append(speed, s.inside(s.speedPeaks(part), s.coarse(), 0)...)
		acc = append(acc, s.inside(s.accPeaks(part), s.coarse(), 0)...)
	}
	sortByIn(acc) // where steps are too coarse one may be found in another's step
	return speed, acc, nil
}

// Strokes returns the pieces into which the dead centres cut over, in order, both
// end pieces included. On each the output rises all the way, or falls, or stands
// still, so that Solve and Inverse have one answer there. Stretches in which the law
// has no value are left out, their edges taken to the next float64; a piece that is
// nothing but rounding is left out too. Of a law that goes on over whole turns, a
// whole turn that starts at a dead centre has no end pieces: all are whole strokes.
//
// Dead centres, steps and errors are as for Extremes.
func (l Law) Strokes(over Interval) ([]Interval, error) {
	s, err := newScan(l, over)
	if err != nil {
		return nil, err
	}
	dead := s.extremes()
	var strokes []Interval
	for _, part := range s.parts {
		piece := s.bounds(part)
		for _, d := range dead {
			if piece.Lo < d.In && d.In < piece.Hi {
				strokes = append(strokes, Interval{Lo: piece.Lo, Hi: d.In})
				piece.Lo = d.In
			}
		}
		if piece.Lo < piece.Hi {
			strokes = append(strokes, piece)
		}
	}
	return strokes, nil
}

// extremes returns the dead centres of all parts.
func (s *scan) extremes() []Coefficients {
	var found []Coefficients
	for _, part := range s.parts {
		// between its peaks First rises or falls, and passes through 0 once at most
		part = slices.Concat(part, s.speedPeaks(part))
		sortByIn(part)
		part = slices.CompactFunc(part, func(a, b Coefficients) bool { return a.In == b.In })
		exact, rough := s.deadCentres(part)
		found = append(found, s.inside(exact, s.fine(), s.fine())...)
		found = append(found, s.inside(rough, s.coarse(), s.coarse())...)
	}
	sortByIn(found)
	return found
}

func sortByIn(c []Coefficients) {
	slices.SortFunc(c, func(a, b Coefficients) int { return cmp.Compare(a.In, b.In) })
}

// bounds returns what of a part lies in over. An end that is nothing but rounding
// away from one of over is that one.
func (s *scan) bounds(part []Coefficients) Interval {
	i := Interval{Lo: part[0].In, Hi: part[len(part)-1].In}
	if i.Lo <= s.over.Lo+s.fine() {
		i.Lo = s.over.Lo
	}
	if i.Hi >= s.over.Hi-s.fine() {
		i.Hi = s.over.Hi
	}
	return i
}

// inside returns those of found that lie in over, when both its ends are moved down
// by slack: what lies at either end but for rounding counts at Lo alone. What is below
// Lo, or above it by snap or less, is taken to be at Lo.
func (s *scan) inside(found []Coefficients, slack, snap float64) []Coefficients {
	var kept []Coefficients
	for _, c := range found {
		if !(s.over.Lo-slack <= c.In && c.In < s.over.Hi-slack) {
			continue
		}
		if c.In <= s.over.Lo+snap {
			if at, err := s.law.at(s.over.Lo); err == nil {
				c = at
			}
		}
		if c.In >= s.over.Lo {
			kept = append(kept, c)
		}
	}
	return kept
}

// fine is what rounding makes of a position in over.
func (s *scan) fine() float64 {
	return rounding * math.Max(math.Abs(s.over.Lo), math.Abs(s.over.Hi))
}

// coarse is what rounding makes of the place of an extreme that is found by its
// values: in the order of the root of float64's precision.
func (s *scan) coarse() float64 { return 1e-7*(s.over.Hi-s.over.Lo) + s.fine() }
