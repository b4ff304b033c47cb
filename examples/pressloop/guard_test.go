package main

import (
	"testing"

	"example.com/twopoint/rigid"
)

// The guard takes an acceleration just below its limit and refuses one just above,
// at even ticks and after a lost one; of a parabola the divided differences are exact.
func TestGuard(t *testing.T) {
	c := sampleConfig(t)
	for _, tt := range []struct {
		factor float64
		ticks  []int64
		want   reason
	}{
		{0.999, []int64{1, 2, 3, 4, 5}, goOn},
		{0.999, []int64{1, 2, 5, 6, 8, 9}, goOn},
		{1.001, []int64{1, 2}, tooSharp},
		{1.001, []int64{2, 3}, tooSharp},
		{1.001, []int64{1, 4}, tooSharp},
	} {
		g := guard{limits: c.Limits, dt: c.Tick}
		// the guard begins at rest a tick before 0: on the parabola from −½ tick
		g.start(0, rigid.Coordinate{Acc: tt.factor * c.Limits.Acc}.After(c.Tick/2).Pos)
		var got halt
		for _, tick := range tt.ticks {
			on := rigid.Coordinate{Acc: tt.factor * c.Limits.Acc}.After((float64(tick) + 0.5) * c.Tick)
			on.Acc = 0 // only the differences tell
			if got = g.check(tick, on, 1); got.why != goOn {
				break
			}
		}
		if got.why != tt.want {
			t.Errorf("%g of the limit at ticks %v: %v", tt.factor, tt.ticks, got)
		}
	}
}
