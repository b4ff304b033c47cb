package rigidtest_test

import (
	"fmt"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
)

// A measured motion of the rod of an invented roof-tile press against the ideal one.
func ExampleTolerance() {
	ideal := rigid.Motion{Pose: rigid.NewPose(0.2, 0, 0.1), Vel: r2.Vec{X: 0.5}, Omega: 3}
	measured := rigid.Motion{Pose: rigid.NewPose(0.20004, 0, 0.1+rigid.Revolution), Vel: r2.Vec{X: 0.502}, Omega: 3.01}
	opts := cmp.Options{
		rigidtest.Lengths(rigidtest.Tolerance{Pos: 0.1 * rigid.Millimetre, Vel: 5e-3}),
		rigidtest.Angles(rigidtest.Tolerance{Pos: 1e-3, Vel: 0.02}),
	}
	fmt.Println(cmp.Equal(ideal, measured, opts))
	measured.Omega = 3.1
	fmt.Println(cmp.Equal(ideal, measured, opts))
	// Output:
	// true
	// false
}
