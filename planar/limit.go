package planar

import (
	"errors"
	"fmt"
	"math"

	"example.com/twopoint/internal/enum"
	"example.com/twopoint/rigid"
)

// A Limit is where the drive of a linkage comes to, from where the linkage stands.
type Limit struct {
	In    float64   // rad or m: the input there
	Kind  LimitKind // what is there
	Group int       // index into Linkage.Groups of the group concerned, or −1
	Links []Link    // its links
}

// A LimitKind tells what ends the way of a drive.
type LimitKind uint8

const (
	NoLimit     LimitKind = iota // nothing: the drive gets to the end of the interval
	DriveEnd                     // the drive can go no further: a group is stretched or folded
	ChangePoint                  // two motions part: the drive could go on in either
	Blocked                      // a redundant constraint breaks
)

var limitKinds = enum.Names[LimitKind]{Type: "LimitKind", Wrong: rigid.ErrInput,
	Of: []string{"no limit", "end of the drive", "change point", "blocked"}}

// String returns the kind in lower case.
func (k LimitKind) String() string { return limitKinds.String(k) }

// MarshalText returns what String does; rigid.ErrInput for a value that is no kind.
func (k LimitKind) MarshalText() ([]byte, error) { return limitKinds.Text(k) }

// UnmarshalText reads what String returns; any other text is an error that wraps
// rigid.ErrInput and tells the names.
func (k *LimitKind) UnmarshalText(text []byte) error { return limitKinds.Read(k, text) }

// Limits returns how far the one drive can go from where it stands, down and up, to
// the first position in the interval that is singular for it, to 1e-10 of a radian
// or of the largest length. For a crank that turns, an interval of a turn to either
// side tells. Parallelograms pass their flattened positions, which are no limits, but
// for the contrary motion of one inside a group of higher class. The State stays where
// it is.
//
// An error that wraps rigid.ErrInput for a linkage with another number of drives, and
// where the drive does not stand in the interval; rigid.ErrNotFinite for an interval
// that is not finite.
func (s *State) Limits(within rigid.Interval) (lo, hi Limit, err error) {
	if s.l == nil {
		return lo, hi, rigid.ErrInput
	}
	if n := len(s.to); n != 1 {
		return lo, hi, fmt.Errorf("%w: limits are of one drive, the linkage has %d", rigid.ErrInput, n)
	}
	if (within.Hi-within.Lo)*0 != 0 {
		return lo, hi, rigid.ErrNotFinite
	}
	if at := s.now.in[0].Pos; !within.Contains(at) {
		return lo, hi, fmt.Errorf("%w: the drive stands at %g, outside %g to %g", rigid.ErrInput, at, within.Lo, within.Hi)
	}
	return s.limit(within.Lo), s.limit(within.Hi), nil
}

// limit goes towards an input as far as it can.
func (s *State) limit(to float64) Limit {
	st := s.Clone()
	most := mostSteps / 2 / s.l.program.perStep[0] // of one Move
	for at := st.now.in[0].Pos; at != to; at = st.now.in[0].Pos {
		next := to
		if math.Abs(to-at) > most {
			next = at + math.Copysign(most, to-at)
		}
		if err := st.Move(rigid.Coordinate{Pos: next}); err != nil {
			return st.approach(next, err)
		}
	}
	return Limit{In: to, Group: -1}
}

// approach closes in on what stopped a Move to an input.
func (s *State) approach(to float64, err error) Limit {
	stop, _ := s.Stop()
	l := Limit{Kind: DriveEnd, Group: stop.Group, Links: stop.Links}
	switch {
	case errors.Is(err, ErrInconsistent):
		l.Kind = Blocked
	case errors.Is(err, rigid.ErrSingular):
		l.Kind = ChangePoint
	}
	scale := 1 / (s.l.program.perStep[0] * longestTurn) // rad, or the largest length
	ahead := math.Copysign(scale, to-s.now.in[0].Pos)
	for s.near(to, scale, l.Kind == ChangePoint) {
	}
	l.In = s.now.in[0].Pos
	switch m := s.Margin(); {
	case l.Kind == ChangePoint:
		s.extend(&l, math.Max(m, 1e-4)*ahead) // with less the margins would differ by rounding too much
	case l.Kind == DriveEnd && m > 1e-6:
		s.extrapolate(&l, ahead)
	}
	return l
}

// near halves its way towards an input that can't be reached, and reports whether
// it may get nearer by trying again: where a step was too far for Newton's method, a
// shorter one may not be. It stops short of a change point, which still shorter
// steps pass unnoticed.
func (s *State) near(to, scale float64, parts bool) bool {
	start, free := s.now.in[0].Pos, s.now.in[0].Pos
	tooFar := false
	for blocked := to; math.Abs(blocked-free) > 1e-13*scale && !(parts && s.Margin() < 1e-4); {
		mid := (free + blocked) / 2
		if mid == free || mid == blocked {
			break
		}
		if err := s.Move(rigid.Coordinate{Pos: mid}); err == nil {
			free = mid
		} else {
			blocked, tooFar = mid, errors.Is(err, ErrTooFar) || len(s.l.program.newtons) > 0
		}
	}
	return tooFar && math.Abs(free-start) > 1e-12*scale
}

// extend finds a change point h or so ahead: where the margin, with a sign, is 0, by
// the parabola for the input through three places, in the margin.
func (s *State) extend(l *Limit, h float64) {
	var x, y [3]float64
	for i := range x {
		x[i] = l.In - float64(i)*h
		if s.Move(rigid.Coordinate{Pos: x[i]}) != nil {
			return
		}
		y[i] = s.Margin()
	}
	first, second := (x[1]-x[0])/(y[1]-y[0]), (x[2]-x[1])/(y[2]-y[1])
	at := x[0] - y[0]*first + y[0]*y[1]*(second-first)/(y[2]-y[0])
	if math.Abs(at-l.In) <= 3*math.Abs(h) {
		l.In = at
	}
}

// extrapolate finds a limit that Newton's method does not get near to from the
// margin, which goes to 0 there: at the end of the drive as the root of the
// distance, at a change point as the distance. Both are tried on three places of
// which the last is the nearest.
func (s *State) extrapolate(l *Limit, scale float64) {
	for range 8 {
		at, m := s.now.in[0].Pos, s.Margin()
		h := 0.1 * m * m * scale
		var x, y [3]float64
		for i := range x {
			x[i] = at - float64(2-i)*h
			if s.Move(rigid.Coordinate{Pos: x[i]}) != nil {
				return
			}
			y[i] = s.Margin()
		}
		root, miss := zero(x, [3]float64{y[0] * y[0], y[1] * y[1], y[2] * y[2]})
		straight, missStraight := zero(x, y)
		kind := DriveEnd
		if missStraight < miss {
			root, kind = straight, ChangePoint
		}
		if !(math.Abs(root-at) < 0.5*math.Abs(scale)) {
			return
		}
		l.In, l.Kind = root, kind
		if s.Move(rigid.Coordinate{Pos: at + 0.75*(root-at)}) != nil {
			return
		}
	}
}

// zero returns where the line through the outer two of three points is 0, and by
// how much the middle one is off it, relative to the fall.
func zero(x, y [3]float64) (at, off float64) {
	slope := (y[2] - y[0]) / (x[2] - x[0])
	return x[2] - y[2]/slope, math.Abs(y[1]-(y[0]+y[2])/2) / math.Abs(y[2]-y[0])
}
