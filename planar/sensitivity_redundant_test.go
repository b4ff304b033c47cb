package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// The beam on three cranks stays on them when all three become longer by as much,
// or when the holes of one pivot move; not when one crank does.
func TestSensitivityRedundant(t *testing.T) {
	d := thirdCrank(0.05)
	guess := []rigid.Placement{{}, {Angle: 1}, {X: 0.027, Y: 0.042}, {X: 0.2, Angle: 1}, {X: 0.4, Angle: 1}}
	d.Guess = guess
	_, st := assemble(t, d, guess, rigid.Coordinate{Pos: 1, Vel: 2, Acc: 3})
	one := d.Hole(Link(4).At(0.05, 0), X)
	var all Dimension
	for _, l := range []Link{1, 3, 4} {
		all.Of = append(all.Of, d.Hole(l.At(0.05, 0), X).Of...)
	}
	if len(all.Of) != 3 {
		t.Fatal(all)
	}
	was := rigid.Point{Pos: rigid.NewPose(7, 7, 7).Origin}
	dst := []rigid.Point{was}
	if err := st.Sensitivity(dst, Link(2).At(0.1, 0), one); !errors.Is(err, ErrInconsistent) || dst[0] != was {
		t.Errorf("one crank: %v, %v", err, dst)
	}
	if err := st.Sensitivity(dst, Link(2).At(0.1, 0), all); err != nil {
		t.Fatal(err)
	}
	// every point of the beam is at a (cos θ, sin θ) from where it would be for a = 0
	sin, cos := math.Sincos(1)
	agree(t, "three cranks", numbers(dst[0]), []float64{cos, sin, -2 * sin, 2 * cos, -3*sin - 4*cos, 3*cos - 4*sin})
}
