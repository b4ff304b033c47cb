package slidercrank

import (
	"math"

	"example.com/twopoint/rigid"
)

// A DeadCentre is a position where the slide turns back while the crank goes on:
// crank and rod lie in one line there.
type DeadCentre struct {
	Turn  float64 // of the crank, in (−π, π]
	Slide float64 // place of the slider pin, m
}

// DeadCentres returns the dead centres of the slide on the linkage's Branch, all
// there are: outer with crank and rod stretched into one line, inner with one
// folded on the other. From sin θ = Offset/(Rod ± Crank), θ the rod's angle,
//
//	outer  Turn = θ,      Slide = (Rod + Crank) cos θ
//	inner  Turn = θ + π,  Slide = (Rod − Crank) cos θ
//
// Where |Rod − Crank| < |Offset| there is no inner one: outer then comes with
// ErrUnreachable. Where Crank > Rod + |Offset| they lie in different intervals of
// Range. With Rod = Crank in line the slider rests on the crank pivot for half the
// turn, and inner is the middle of that. ErrInput for a zero Linkage.
func (l *Linkage) DeadCentres() (outer, inner DeadCentre, err error) {
	if l.crank == 0 {
		return DeadCentre{}, DeadCentre{}, rigid.ErrInput
	}
	outer = deadCentre(l.side*l.outer, l.guide, l.side*l.outer)
	if !l.folds {
		return outer, DeadCentre{}, rigid.ErrUnreachable
	}
	x, y := -l.side*l.inner, l.guide
	switch d := l.rod - l.crank; {
	case d > 0:
		inner = deadCentre(x, 0-y, -x)
	case d < 0:
		inner = deadCentre(x, y, x)
	default:
		inner = deadCentre(-l.side, 0, 0)
	}
	return outer, inner, nil
}

// deadCentre returns the dead centre with the crank along (x, y).
func deadCentre(x, y, slide float64) DeadCentre {
	return DeadCentre{Turn: rigid.Wrap(math.Atan2(y, x)), Slide: slide}
}

// Stroke returns the travel of the slide between its dead centres in m,
//
//	√((l + r)² − e²) − √((l − r)² − e²) = 4lr/(the sum of the roots)
//
// ErrUnreachable where the crank does not turn fully; ErrInput for a zero Linkage.
func (l *Linkage) Stroke() (float64, error) {
	if err := l.turning(); err != nil {
		return 0, err
	}
	return 4 * (l.crank / (l.outer + l.inner)) * l.rod, nil
}

// TimeRatio returns the crank's angle, turning positive, from the inner dead centre
// to the outer over that from the outer to the inner, which is the ratio of the
// times at constant speed: with β = asin(Offset/(Rod − Crank)) −
// asin(Offset/(Rod + Crank)), Ahead,
//
//	(π − β)/(π + β)
//
// and Behind its inverse. ErrUnreachable where the crank does not turn fully;
// ErrInput for a zero Linkage.
func (l *Linkage) TimeRatio() (float64, error) {
	if err := l.turning(); err != nil {
		return 0, err
	}
	b := l.side * (math.Atan2(l.guide, l.inner) - math.Atan2(l.guide, l.outer))
	return (math.Pi - b) / (math.Pi + b), nil
}

// turning returns the error of what is asked only of a crank that turns fully.
func (l *Linkage) turning() error {
	switch {
	case l.crank == 0:
		return rigid.ErrInput
	case !l.full:
		return rigid.ErrUnreachable
	}
	return nil
}
