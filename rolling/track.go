package rolling

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A TrackPoint is a point of a track of any shape, in the mechanism's own axes. More
// fields may come: write keyed literals.
type TrackPoint struct {
	Pos           r2.Vec  // m
	Direction     float64 // of the tangent, in rad, continuous along the track; 0 at arc 0
	Curvature     float64 // change of Direction per m, positive where the track bends left, towards the wheel
	CurvatureRate float64 // change of Curvature per m of arc, in 1/m²
}

// A Track is a track of any shape: it gives the point at an arc, in m along the
// track. It returns ErrUnreachable beyond an end. It keeps no state, so that
// goroutines may share it.
type Track func(arc float64) (TrackPoint, error)

// SolveTrack is SolveArc on a track of any shape, on whose left the wheel rolls,
// without slip. Radius and Mount of the wheel's dimensions count, Ground does not:
// the track replaces it. With κ the curvature and s the arc, the centre's speed is
// (1 − rκ)·ds/dt, and since κ is the derivative of Direction, for any track
//
//	Turn = Direction − s/r,  Travel = s − r·Direction
//
// The contact particle has the acceleration (1 − rκ)/r·(ds/dt)² towards the centre.
// Where rκ = 1 the centre rests; where rκ > 1 the wheel must be a ring around the
// track. The error of track is returned as it is; a nil track is ErrInput.
func (w *Wheel) SolveTrack(dst *WheelState, track Track, arc rigid.Coordinate) error {
	r := w.dim.Radius
	if r == 0 || track == nil {
		return rigid.ErrInput
	}
	p, err := track(arc.Pos)
	if err != nil {
		return err
	}
	turn := w.turnOn(p, arc.Pos).Output(arc.Vel, arc.Acc)
	travel := rigid.Coordinate{Pos: math.FMA(-r, p.Direction, arc.Pos), Vel: -r * turn.Vel, Acc: -r * turn.Acc}
	s, c := math.Sincos(p.Direction)
	t := turned(w.axis, r2.Vec{X: c, Y: s})
	n := perp(t)
	contact := r2.Add(w.origin, turned(w.axis, p.Pos))
	s, c = math.Sincos(turn.Pos)
	st := WheelState{
		Wheel: rigid.Motion{
			Pose:  rigid.Pose{Origin: r2.Add(contact, r2.Scale(r, n)), Axis: turned(w.axis, r2.Vec{X: c, Y: s})},
			Vel:   r2.Scale(travel.Vel, t),
			Acc:   r2.Add(r2.Scale(travel.Acc, t), r2.Scale(travel.Vel*p.Curvature*arc.Vel, n)),
			Omega: turn.Vel, Alpha: turn.Acc,
		},
		Contact: rigid.Point{Pos: contact, Acc: r2.Scale(travel.Vel*arc.Vel/r, n)},
		Turn:    turn, Arc: arc, Travel: travel,
	}
	if !finiteMotion(&st.Wheel) || !finitePoint(st.Contact) || !finite(turn.Pos, arc.Pos, arc.Vel, arc.Acc, travel.Pos, travel.Vel, travel.Acc) {
		return rigid.ErrNotFinite
	}
	*dst = st
	return nil
}

// turnOn returns the coefficients of the turn for the arc, at a point of a track.
func (w *Wheel) turnOn(p TrackPoint, arc float64) rigid.Coefficients {
	return rigid.Coefficients{
		In:     arc,
		Out:    w.perTravel.times(arc).plus(double{hi: p.Direction}).float(),
		First:  p.Curvature - 1/w.dim.Radius,
		Second: p.CurvatureRate,
	}
}

// TurnOn returns the law of the wheel's turn, in rad, for the arc along a track, in
// m: the way back, from a given turn to the arc that SolveTrack wants, is that law's
// inverse. The law returns the track's errors, ErrInput for a zero Wheel or a nil
// track, and ErrNotFinite.
func (w *Wheel) TurnOn(track Track) rigid.Law {
	return func(arc float64) (rigid.Coefficients, error) {
		if w.dim.Radius == 0 || track == nil {
			return rigid.Coefficients{}, rigid.ErrInput
		}
		p, err := track(arc)
		if err != nil {
			return rigid.Coefficients{}, err
		}
		c := w.turnOn(p, arc)
		if !finite(c.In, c.Out, c.First, c.Second) {
			return rigid.Coefficients{}, rigid.ErrNotFinite
		}
		return c, nil
	}
}
