package main

import (
	"math"

	"example.com/twopoint/rigid"
)

// A guard is the last gate before the axis. It trusts nothing upstream: speed and
// acceleration of the setpoints it takes from their differences too, since a
// jump does not show in their rates.
type guard struct {
	limits
	dt   float64
	tick int64   // of the last setpoint
	pos  float64 // of it
	vel  float64 // mean speed before it
	gap  float64 // time before it
}

// check compares a setpoint with the limits. Comparisons are such that NaN fails.
func (g *guard) check(tick int64, motor rigid.Coordinate, margin float64) halt {
	if !(margin >= g.Margin) {
		return halt{why: nearDeadCentre, got: margin, limit: g.Margin}
	}
	gap := float64(tick-g.tick) * g.dt
	vel := (motor.Pos - g.pos) / gap
	acc := (vel - g.vel) / ((gap + g.gap) / 2)
	if v := math.Max(math.Abs(vel), math.Abs(motor.Vel)); !(v <= g.Speed) {
		return halt{why: tooFast, got: v, limit: g.Speed}
	}
	if a := math.Max(math.Abs(acc), math.Abs(motor.Acc)); !(a <= g.Acc) {
		return halt{why: tooSharp, got: a, limit: g.Acc}
	}
	g.tick, g.pos, g.vel, g.gap = tick, motor.Pos, vel, gap
	return halt{}
}

// start begins at rest.
func (g *guard) start(tick int64, pos float64) {
	g.tick, g.pos, g.vel, g.gap = tick, pos, 0, g.dt
}
