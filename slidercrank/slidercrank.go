package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
)

// A Linkage is a slider-crank. It never changes, so that any number of goroutines
// may share one. The zero Linkage is no mechanism: its methods return ErrInput, or
// NaN or nothing where they return no error.
type Linkage struct {
	given        Dimensions
	crank, guide float64 // Crank, Offset
	rod          float64 // Rod, to the last digit that of a change point where it is one
	side         float64 // of the slider pin from the crank pin along the guide: 1 Ahead, −1 Behind
	size         float64 // the greatest length
	perRod       float64 // 1/rod
	full         bool    // whether the crank turns fully
	folds        bool    // whether the crank can lie on the rod
	outer, inner float64 // |Slide.Pos| with crank and rod stretched, and with one folded on the other
	byCrank      dyad.RRP
	bySlide      dyad.RRR

	// What takes the mechanism's own axes to the frame.
	origin, axis r2.Vec // of Mount
	rodAxis      r2.Vec // axis over the rod's length
	offset       r2.Vec // of the guide
}

// New returns the slider-crank with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: Crank and Rod must be
// positive, all must be finite (ErrNotPositive, ErrNotFinite) and lengths from
// 1e-60 to 1e60 m (ErrInput), Branch must be Ahead or Behind (ErrInput), and, with
// an empty Name, crank and rod together longer than |Offset| (ErrUnreachable):
// shorter they don't reach the guide, as long they can't move.
func New(d Dimensions) (*Linkage, error) {
	if err := d.check(); err != nil {
		return nil, err
	}
	m, e := d.Mount.Pose(), math.Abs(d.Offset)
	rod, changes := d.settle()
	size := max(d.Crank, d.Rod, e)
	l := &Linkage{
		given: d,
		crank: d.Crank, rod: rod, guide: d.Offset, side: 1,
		size:    size,
		perRod:  1 / rod,
		full:    rod >= d.Crank+e,
		folds:   changes || math.Abs(rod-d.Crank) >= e,
		byCrank: dyad.RRP{L: rod}, bySlide: dyad.NewRRR(d.Crank, rod),
		origin: m.Origin, axis: m.Axis,
		rodAxis: r2.Scale(1/rod, m.Axis),
		offset:  r2.Vec{X: -m.Axis.Y * d.Offset, Y: m.Axis.X * d.Offset},
	}
	if d.Branch == Behind {
		l.side = -1
	}
	l.outer, _ = leg(d.Crank+rod, e, size)
	if !changes {
		l.inner, _ = leg(math.Abs(rod-d.Crank), e, size)
	}
	return l, nil
}

// Dimensions returns what New was given.
func (l *Linkage) Dimensions() Dimensions { return l.given }

// Coefficients returns the slide and its derivatives by the crank's angle, turn in
// rad: Out in m, First in m/rad, Second in m/rad². The method is a rigid.Law.
// Errors as Solve asked for rates.
func (l *Linkage) Coefficients(turn float64) (rigid.Coefficients, error) {
	var s State
	if err := l.Solve(&s, rigid.Coordinate{Pos: turn, Vel: 1}); err != nil {
		return rigid.Coefficients{}, err
	}
	return rigid.Coefficients{In: turn, Out: s.Slide.Pos, First: s.Slide.Vel, Second: s.Slide.Acc}, nil
}
