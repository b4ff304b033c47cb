package rigidtest_test

import (
	"fmt"
	"math"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
	"example.com/twopoint/slidercrank"
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

// A roof-tile press, an invented machine, driven by its crank and driven back by its
// ram: the same motion, but for the Margin, which is another joint's. Accelerations
// are left out by an infinite tolerance.
func ExampleLengths() {
	press, err := slidercrank.New(slidercrank.Dimensions{Crank: 0.120, Rod: 0.480})
	if err != nil {
		fmt.Println(err)
		return
	}
	var forth, back slidercrank.State
	if err := press.Solve(&forth, rigid.Coordinate{Pos: 1, Vel: 2.5}); err != nil {
		fmt.Println(err)
		return
	}
	if err := press.SolveSlide(&back, forth.Slide, forth.Knee); err != nil {
		fmt.Println(err)
		return
	}
	tight := rigidtest.Tolerance{Pos: 1e-12, Vel: 1e-11, Acc: math.Inf(1), Relative: 1e-12}
	opts := cmp.Options{rigidtest.Lengths(tight), rigidtest.Angles(tight)}
	fmt.Println(cmp.Equal(forth, back, opts))
	fmt.Println(cmp.Equal(forth, back, opts, cmpopts.IgnoreFields(slidercrank.State{}, "Margin")))
	// Output:
	// false
	// true
}
