package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

func TestPose(t *testing.T) {
	rnd := newRandom(40)
	for range rounds {
		x, y, angle, local := rnd.number(), rnd.number(), 1.5*rnd.number(), rnd.vec()
		p := rigid.Placement{X: x, Y: y, Angle: angle}.Pose()
		check(t, "NewPose", rigid.NewPose(x, y, angle), p, 0)
		near(t, "Angle", p.Angle(), angle, 1e-15)
		point := r2.Add(r2.Vec{X: x, Y: y}, r2.Rotate(local, angle, r2.Vec{}))
		check(t, "Point", point, p.Point(local), 1e-14)
		check(t, "Local", local, p.Local(point), 1e-14)

		q := rigid.NewPose(rnd.number(), rnd.number(), rnd.number())
		check(t, "Compose", p.Point(q.Point(local)), p.Compose(q).Point(local), 1e-14)
		check(t, "Inverse", rigid.Pose{}, p.Compose(p.Inverse()), 1e-14)
		check(t, "Inverse", p.Local(point), p.Inverse().Point(point), 1e-14)
	}
}

func TestZeroPose(t *testing.T) {
	var p rigid.Pose
	v := r2.Vec{X: 2, Y: -3}
	q := rigid.NewPose(1, 2, 3)
	if p.Point(v) != v || p.Local(v) != v || p.Angle() != 0 {
		t.Errorf("the zero pose moves %v to %v, %v", v, p.Point(v), p.Local(v))
	}
	check(t, "left", q, p.Compose(q), 1e-16)
	check(t, "right", q, q.Compose(p), 1e-16)
	check(t, "inverse", p, p.Inverse(), 0)
	if (rigid.Placement{}).Pose() != rigid.NewPose(0, 0, 0) {
		t.Error("the zero placement moves")
	}
}

// Angles lie in (−π, π], also for axes that round to it from below.
func TestPoseAngle(t *testing.T) {
	negative := math.Copysign(0, -1)
	for _, c := range []struct {
		axis r2.Vec
		want float64
	}{
		{r2.Vec{X: 1}, 0},
		{r2.Vec{Y: 1}, math.Pi / 2},
		{r2.Vec{Y: -1}, -math.Pi / 2},
		{r2.Vec{X: -1}, math.Pi},
		{r2.Vec{X: -1, Y: negative}, math.Pi},
		{r2.Vec{X: -1, Y: -1e-17}, math.Pi},
		{r2.Vec{X: -1, Y: -1e-15}, -math.Pi + 1e-15},
		{r2.Vec{X: negative, Y: negative}, 0},
	} {
		if got := (rigid.Pose{Axis: c.axis}).Angle(); got != c.want {
			t.Errorf("axis %v: angle %.17g, want %.17g", c.axis, got, c.want)
		}
	}
	if got := rigid.NewPose(0, 0, -math.Pi).Angle(); got != math.Pi {
		t.Errorf("half a turn back: %.17g, want π", got)
	}
	if got := rigid.NewPose(0, 0, math.NaN()).Angle(); !math.IsNaN(got) {
		t.Errorf("NaN: %v", got)
	}
}

// An axis given with few digits comes back as a unit vector.
func TestComposeMakesUnitAxes(t *testing.T) {
	rough := rigid.Pose{Axis: r2.Vec{X: 0.8, Y: 0.59}}
	for _, p := range []rigid.Pose{rough.Compose(rigid.Pose{}), rigid.Pose{}.Compose(rough), rough.Inverse()} {
		near(t, "length", r2.Norm(p.Axis), 1, 2e-16)
	}
	almost := rigid.Pose{Axis: r2.Vec{X: 1 + 4e-9}}
	near(t, "length by Newton's step", r2.Norm(almost.Compose(rigid.Pose{}).Axis), 1, 2e-16)
}
