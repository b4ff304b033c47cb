package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// Sinks keep results alive, so that no call is compiled away.
var (
	sinkError error
	sinkFloat float64
	sinkAny   struct {
		velocity     rigid.VelocityTerms
		acceleration rigid.AccelerationTerms
		circle       rigid.Circle
		pose         rigid.Pose
		coefficients rigid.Coefficients
		coordinate   rigid.Coordinate
		misfit       rigid.Misfit
	}
)

// What runs in a control loop allocates nothing, with an answer or with an error.
func TestNoAllocation(t *testing.T) {
	rnd := newRandom(90)
	m, other, p, v := rnd.motion(), rnd.motion(), rnd.point(), rnd.vec()
	locals, points, _ := rnd.tracked(8, 1, 0)
	nan := math.NaN()
	sick := rigid.Motion{Omega: nan}
	zero, still := rigid.Motion{}, rigid.Point{}
	for _, c := range []struct {
		name string
		call func()
		want error
	}{
		{"At", func() { sinkPoint = m.At(v) }, nil},
		{"Carry", func() { sinkPoint = m.Carry(p) }, nil},
		{"Observe", func() { sinkPoint = m.Observe(p) }, nil},
		{"VelocityTerms", func() { sinkAny.velocity = m.VelocityTerms(p); sinkVec = sinkAny.velocity.Sum() }, nil},
		{"AccelerationTerms", func() { sinkAny.acceleration = m.AccelerationTerms(p); sinkVec = sinkAny.acceleration.Sum() }, nil},
		{"Compose", func() { sinkMotion = m.Compose(&other) }, nil},
		{"Relative", func() { sinkMotion = m.Relative(&other) }, nil},
		{"Pole", func() { sinkVec, sinkError = m.Pole() }, nil},
		{"Pole at rest", func() { sinkVec, sinkError = zero.Pole() }, rigid.ErrNoPole},
		{"RelativePole", func() { sinkVec, sinkError = rigid.RelativePole(&m, &other) }, nil},
		{"RelativePole NaN", func() { sinkVec, sinkError = rigid.RelativePole(&m, &sick) }, rigid.ErrNotFinite},
		{"AccelerationPole", func() { sinkVec, sinkError = m.AccelerationPole() }, nil},
		{"AccelerationPole at rest", func() { sinkVec, sinkError = zero.AccelerationPole() }, rigid.ErrNoPole},
		{"InflectionCircle", func() { sinkAny.circle, sinkError = m.InflectionCircle() }, nil},
		{"InflectionCircle NaN", func() { sinkAny.circle, sinkError = sick.InflectionCircle() }, rigid.ErrNotFinite},
		{"Path", func() { sinkPath, sinkError = p.Path(); sinkVec, sinkError = sinkPath.Centre() }, nil},
		{"Path at rest", func() { sinkPath, sinkError = still.Path() }, rigid.ErrSingular},
		{"Centre", func() { sinkVec, sinkError = rigid.Path{}.Centre() }, rigid.ErrNoPole},
		{"NewPose", func() { sinkAny.pose = rigid.NewPose(1, 2, v.X); sinkAny.pose = rigid.Placement{X: v.X}.Pose() }, nil},
		{"Pose.Point", func() { sinkVec = m.Pose.Point(v); sinkVec = m.Pose.Local(v) }, nil},
		{"Pose.Compose", func() { sinkAny.pose = m.Pose.Compose(other.Pose); sinkAny.pose = m.Pose.Inverse() }, nil},
		{"Pose.Angle", func() { sinkFloat = m.Pose.Angle() }, nil},
		{"Wrap", func() { sinkFloat = rigid.Wrap(100 * v.X); sinkFloat = rigid.Nearest(v.X, 100*v.Y) }, nil},
		{"Interval", func() { sinkFloat, _ = rigid.Interval{Lo: 0, Hi: 1}.Angle(100 * v.X) }, nil},
		{"After", func() { sinkAny.coordinate = rigid.Coordinate{Vel: v.X}.After(v.Y) }, nil},
		{"Output", func() { sinkAny.coordinate = rigid.Coefficients{First: v.X}.Output(v.X, v.Y) }, nil},
		{"Then", func() { sinkAny.coefficients = rigid.Coefficients{First: v.X}.Then(rigid.Coefficients{First: v.Y}) }, nil},
		{"Inverse", func() { sinkAny.coefficients, sinkError = rigid.Coefficients{First: v.X}.Inverse() }, nil},
		{"Inverse at a dead centre", func() { sinkAny.coefficients, sinkError = rigid.Coefficients{}.Inverse() }, rigid.ErrSingular},
		{"Guided", func() { sinkMotion, sinkAny.coordinate, sinkError = rigid.Guided(p, v, v) }, nil},
		{"Guided, one place", func() { sinkMotion, sinkAny.coordinate, sinkError = rigid.Guided(p, p.Pos, v) }, rigid.ErrSingular},
		{"Guided NaN", func() { sinkMotion, sinkAny.coordinate, sinkError = rigid.Guided(p, r2.Vec{X: nan}, v) }, rigid.ErrNotFinite},
		{"Fit", func() { sinkMotion, sinkAny.misfit, sinkError = rigid.Fit(locals, points) }, nil},
		{"Fit of one", func() { sinkMotion, sinkAny.misfit, sinkError = rigid.Fit(locals[:1], points[:1]) }, rigid.ErrInput},
	} {
		sinkError = nil
		if n := testing.AllocsPerRun(100, c.call); n != 0 {
			t.Errorf("%s: %v allocations", c.name, n)
		}
		if sinkError != c.want {
			t.Errorf("%s: %v, want %v", c.name, sinkError, c.want)
		}
	}
}
