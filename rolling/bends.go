package rolling

import (
	"math"
	"strconv"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A Bend is a piece of a track given by its curvature, which goes evenly from From to
// To: a straight where both are 0, an arc of a circle where they are equal, else a
// transition curve (clothoid). More fields may come: write keyed literals.
type Bend struct {
	Length float64 `json:"length"` // m
	From   float64 `json:"from"`   // 1/m, positive where the track bends left, towards the wheel
	To     float64 `json:"to"`     // 1/m
}

// mostBend is how far a track may bend, in rad, so that its table stays small.
const mostBend = 1e4

// NewTrack returns the track that starts at the origin along x and consists of the
// bends one after another. Its places are good to 1e-15 of its length; arcs up to
// 1e-14 of the length beyond an end count as the end, any other is ErrUnreachable.
//
// NewTrack returns a *rigid.DimensionError, or several joined by errors.Join, with
// the path of the field as Name: a Length must be positive, finite and from 1e-60 to
// 1e60 m (ErrNotPositive, ErrNotFinite, ErrInput), curvatures finite, Length × the
// greater curvature not over 1e4 rad (ErrInput), and there must be a bend (ErrInput).
func NewTrack(bends ...Bend) (Track, error) {
	var r report
	if len(bends) == 0 {
		r.Add("bends", 0, errBends)
	}
	for i, b := range bends {
		path := "bends[" + strconv.Itoa(i) + "]."
		r.Length(path+"Length", b.Length)
		r.Number(path+"From", b.From)
		r.Number(path+"To", b.To)
		if r.OK() && b.turning() > mostBend {
			r.Add(path+"Length", b.Length, errBent)
		}
	}
	if !r.OK() {
		return nil, r.Err()
	}
	return course(bends).at, nil
}

// turning returns a bound for the change of direction along the bend.
func (b Bend) turning() float64 { return b.Length * max(math.Abs(b.From), math.Abs(b.To)) }

// A span is a piece of a track that turns by 1 rad at most: the arc and the point
// where it starts, and its length.
type span struct {
	arc, length float64
	start       TrackPoint
}

// A table is a track as its spans in order.
type table []span

// course returns the bends cut into spans.
func course(bends []Bend) table {
	var t table
	next := span{}
	for _, b := range bends {
		n := max(1, math.Ceil(b.turning()))
		begin := next.arc
		next.length = b.Length / n
		next.start.CurvatureRate = (b.To - b.From) / b.Length
		for k := range int(n) {
			next.arc = begin + float64(k)*next.length
			next.start.Curvature = b.From + (b.To-b.From)*(float64(k)/n)
			t = append(t, next)
			end := next.after(next.length)
			next.start.Pos, next.start.Direction = end.Pos, end.Direction
		}
		next.arc = begin + b.Length
	}
	return t
}

// at is the table's Track.
func (t table) at(arc float64) (TrackPoint, error) {
	last := &t[len(t)-1]
	end := last.arc + last.length
	switch tol := 1e-14 * end; {
	case !finite(arc):
		return TrackPoint{}, rigid.ErrNotFinite
	case arc < -tol || arc > end+tol:
		return TrackPoint{}, rigid.ErrUnreachable
	}
	lo, hi := 0, len(t) // the span that starts last, not after arc
	for hi-lo > 1 {
		if mid := lo + (hi-lo)/2; t[mid].arc <= arc {
			lo = mid
		} else {
			hi = mid
		}
	}
	return t[lo].after(arc - t[lo].arc), nil
}

// after returns the point x along the span. The direction is a quadratic function of
// x; the place is the integral of the tangent, by Gauss's rule of 8 points, which for
// 1 rad has an error below 1e-20.
func (s *span) after(x float64) TrackPoint {
	p := s.start
	var sum r2.Vec
	for _, g := range gauss {
		for _, node := range [...]float64{1 - g.node, 1 + g.node} {
			sin, cos := math.Sincos(p.direction(x * node / 2))
			sum.X += g.weight * cos
			sum.Y += g.weight * sin
		}
	}
	return TrackPoint{
		Pos:           r2.Add(p.Pos, r2.Scale(x/2, sum)),
		Direction:     p.direction(x),
		Curvature:     p.Curvature + x*p.CurvatureRate,
		CurvatureRate: p.CurvatureRate,
	}
}

// direction returns the direction x further on if CurvatureRate stays.
func (p *TrackPoint) direction(x float64) float64 {
	return p.Direction + x*(p.Curvature+x*p.CurvatureRate/2)
}

// gauss holds nodes and weights of Gauss's rule of 8 points on [−1, 1], by pairs.
var gauss = [...]struct{ node, weight float64 }{
	{0.18343464249564980494, 0.3626837833783619829},
	{0.52553240991632898582, 0.31370664587788728734},
	{0.79666647741362673959, 0.22238103445337447054},
	{0.96028985649753623168, 0.10122853629037625915},
}
