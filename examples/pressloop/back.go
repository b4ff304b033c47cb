package main

import (
	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A back is the way from the ram back to the motor, on one stroke of the press.
// A mechanism without a solve back of its own goes back by rigid.Law's Inverse.
type back struct {
	press *slidercrank.Linkage
	knee  rigid.Side // picks the stroke
	gear  float64    // motor turns in a turn of the crank
	st    slidercrank.State
	crank float64 // last angle, over any number of turns
}

// motor returns the motor's motion for one of the ram, and the margin: the sine of
// the angle between crank and rod, 0 at the dead centres.
func (b *back) motor(ram rigid.Coordinate) (rigid.Coordinate, float64, error) {
	if err := b.press.SolveSlide(&b.st, ram, b.knee); err != nil {
		return rigid.Coordinate{}, 0, err
	}
	turn := b.st.Turn
	b.crank = rigid.Nearest(turn.Pos, b.crank)
	return rigid.Coordinate{Pos: b.gear * b.crank, Vel: b.gear * turn.Vel, Acc: b.gear * turn.Acc}, b.st.Margin, nil
}
