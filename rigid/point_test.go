package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A path puts the acceleration together again, and its centre of curvature is
// where a point that turns about it moves likewise.
func TestPath(t *testing.T) {
	rnd := newRandom(30)
	for range rounds {
		p := rnd.point()
		path, err := p.Path()
		if err != nil {
			t.Fatal(err)
		}
		check(t, "velocity", p.Vel, r2.Scale(path.Speed, path.Tangent), 1e-14)
		a := r2.Add(r2.Scale(path.SpeedRate, path.Tangent), r2.Scale(path.Speed*path.Speed*path.Curvature, path.Normal))
		check(t, "acceleration", p.Acc, a, 1e-14)
		if d := r2.Cross(path.Tangent, path.Normal) - 1; math.Abs(d) > 1e-15 {
			t.Errorf("the normal is not left of the tangent: %v", path)
		}
		centre, err := path.Centre()
		if err != nil {
			t.Fatal(err)
		}
		// a body that turns about the centre carries its point with the same velocity
		// and normal acceleration
		turning := rigid.Motion{Pose: rigid.Pose{Origin: centre}, Omega: path.Speed * path.Curvature}
		at := turning.At(r2.Scale(-1, centre))
		check(t, "turning", p.Vel, at.Vel, 1e-13)
		near(t, "normal part", r2.Dot(at.Acc, path.Normal), r2.Dot(p.Acc, path.Normal), 1e-13)
	}
}

// A point on a circle of radius R at speed v: curvature 1/R, whatever the scale.
func TestPathScales(t *testing.T) {
	for _, size := range []float64{5e-324, 1e-310, 1e-200, 1e-6, 1, 1e6, 1e200, 1e307} {
		p := rigid.Point{Vel: r2.Vec{X: 3 * size, Y: 4 * size}}
		path, err := p.Path()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "tangent x", path.Tangent.X, 0.6, 2e-16)
		near(t, "tangent y", path.Tangent.Y, 0.8, 2e-16)
		upright, err := rigid.Point{Vel: r2.Vec{Y: -size}}.Path()
		if want := (r2.Vec{Y: -1}); err != nil || upright.Tangent != want {
			t.Errorf("straight down at %g m/s: %v, %v", size, upright.Tangent, err)
		}
	}
	for _, r := range []float64{1e-100, 1e-6, 1, 1e3, 1e100} {
		p := rigid.Point{Vel: r2.Vec{X: 2 * r}, Acc: r2.Vec{X: 5 * r, Y: -4 * r}}
		path, err := p.Path()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "curvature × radius", path.Curvature*r, -1, 1e-15)
		near(t, "speed rate", path.SpeedRate/r, 5, 1e-15)
		centre, err := path.Centre()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "centre", centre.Y/r, -1, 1e-15)
	}
}

func TestPathErrors(t *testing.T) {
	nan, inf, x := math.NaN(), math.Inf(1), r2.Vec{X: 1}
	for _, c := range []struct {
		why  string
		p    rigid.Point
		want error
	}{
		{"at rest", rigid.Point{}, rigid.ErrSingular},
		{"at rest, about to start", rigid.Point{Acc: x}, rigid.ErrSingular},
		{"NaN velocity", rigid.Point{Vel: r2.Vec{Y: nan}}, rigid.ErrNotFinite},
		{"infinite velocity beside NaN", rigid.Point{Vel: r2.Vec{X: inf, Y: nan}}, rigid.ErrNotFinite},
		{"NaN acceleration", rigid.Point{Vel: x, Acc: r2.Vec{Y: nan}}, rigid.ErrNotFinite},
		{"speed overflows", rigid.Point{Vel: r2.Vec{X: math.MaxFloat64, Y: math.MaxFloat64}}, rigid.ErrNotFinite},
		{"curvature overflows", rigid.Point{Vel: r2.Vec{X: 1e-200}, Acc: r2.Vec{Y: 1}}, rigid.ErrNotFinite},
		{"straight", rigid.Point{Vel: x, Acc: x}, nil},
	} {
		if path, err := c.p.Path(); err != c.want || err != nil && path != (rigid.Path{}) {
			t.Errorf("%s: %+v, %v; want %v", c.why, path, err, c.want)
		}
	}
	straight, _ := rigid.Point{Vel: x, Acc: x}.Path()
	for _, c := range []struct {
		why  string
		p    rigid.Path
		want error
	}{
		{"straight", straight, rigid.ErrNoPole},
		{"zero path", rigid.Path{}, rigid.ErrNoPole},
		{"centre beyond the numbers", rigid.Path{Curvature: 5e-324, Normal: x}, rigid.ErrNoPole},
		{"NaN", rigid.Path{Curvature: nan, Normal: x}, rigid.ErrNotFinite},
		{"infinite", rigid.Path{Curvature: inf, Normal: x}, rigid.ErrNotFinite},
	} {
		if v, err := c.p.Centre(); err != c.want || v != (r2.Vec{}) {
			t.Errorf("%s: %v, %v; want %v", c.why, v, err, c.want)
		}
	}
}
