package rolling

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// Planet writes the motion of a planet from the turns of its carrier and its own,
// both in rad and both in the frame, as Train.Solve finds them. The planet's centre,
// its origin, lies at radius, in m, from the train's axis, the frame's origin, and at
// angle, in rad, on the carrier; its x axis is along the frame's at turn 0. Any point
// of a tooth is one At away; Compose sets the train elsewhere.
//
// ErrNotFinite where a given number or a result is not finite; then dst is as before.
// It does not allocate.
func Planet(dst *rigid.Motion, carrier, planet rigid.Coordinate, radius, angle float64) error {
	s, c := double{hi: carrier.Pos}.plus(double{hi: angle}).sincos()
	arm := r2.Vec{X: radius * c, Y: radius * s}
	w, al, w2 := carrier.Vel, carrier.Acc, carrier.Vel*carrier.Vel
	s, c = math.Sincos(planet.Pos)
	m := rigid.Motion{
		Pose:  rigid.Pose{Origin: arm, Axis: r2.Vec{X: c, Y: s}},
		Vel:   r2.Vec{X: -w * arm.Y, Y: w * arm.X},
		Acc:   r2.Vec{X: -al*arm.Y - w2*arm.X, Y: al*arm.X - w2*arm.Y},
		Omega: planet.Vel, Alpha: planet.Acc,
	}
	if !finiteMotion(&m) {
		return rigid.ErrNotFinite
	}
	*dst = m
	return nil
}
