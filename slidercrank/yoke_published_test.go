package slidercrank_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func newRod(t *testing.T, d slidercrank.RodDimensions) *slidercrank.SliderRod {
	t.Helper()
	s, err := slidercrank.NewSliderRod(d)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// The yoke's travel is simple harmonic motion (wikisum, Piston motion equations);
// worked out for a crank of 50 mm at 300 rpm.
func TestPublishedScotchYoke(t *testing.T) {
	y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 0.05})
	if err != nil {
		t.Fatal(err)
	}
	var st slidercrank.YokeState
	if err := y.Solve(&st, rigid.Coordinate{Pos: math.Pi / 3, Vel: 300 * rigid.RPM, Acc: 30}); err != nil {
		t.Fatal(err)
	}
	published{"place", st.Slide.Pos, none, 0, 0.025}.check(t)
	published{"speed", st.Slide.Vel, none, 0, -1.3603495231756633879}.check(t)
	published{"acceleration", st.Slide.Acc, none, 0, -25.973049108400054517}.check(t)
}

// Oldham's coupling is the rod on two square guides with the rod, the distance of
// the shafts, held and the guides turning: its blocks slide as the rod's ends do.
// Peak sliding speed of shafts 18 mm apart at 160 rpm, Khurmi & Gupta, answer from
// memory; 20 mm at 180 rpm has no row stated, since its source prints 0.376, cut off.
func TestPublishedOldham(t *testing.T) {
	for _, row := range []struct{ apart, rpm, stated, digit, recalc float64 }{
		{0.018, 160, 0.302, 0.001, 0.30159289474462015089},
		{0.020, 180, none, 0, 0.37699111843077518862},
	} {
		s := newRod(t, slidercrank.RodDimensions{Length: row.apart, Angle: math.Pi / 2})
		var st slidercrank.RodState
		if err := s.Solve(&st, rigid.Coordinate{Vel: row.rpm * rigid.RPM}); err != nil {
			t.Fatal(err)
		}
		published{"peak sliding speed", st.SlideB.Vel, row.stated, row.digit, row.recalc}.check(t)
	}
}

// The circle that rolls in one twice as large (MathWorld, Tusi couple): the rim
// point stays on a diameter. Arm at 0.7 rad and 3 rad/s.
func TestPublishedCardanCircles(t *testing.T) {
	s := newRod(t, slidercrank.RodDimensions{Length: 1, Angle: math.Pi / 2})
	fixed, moving := s.Cardan()
	published{"fixed circle", fixed.Radius, 1, 1, 1}.check(t)
	published{"moving circle", moving.Radius, 0.5, 0.1, 0.5}.check(t)
	var st slidercrank.RodState
	if err := s.Solve(&st, rigid.Coordinate{Pos: math.Pi - 0.7, Vel: -3}); err != nil {
		t.Fatal(err)
	}
	rim, arm := st.Rod.At(r2.Vec{}), st.Rod.At(moving.Centre)
	published{"arm", math.Atan2(arm.Pos.Y, arm.Pos.X), none, 0, 0.7}.check(t)
	published{"rim point y", rim.Pos.Y, 0, 1e-15, 0}.check(t)
	published{"rim point x", rim.Pos.X, none, 0, 0.76484218728448842626}.check(t)
	published{"rim point speed", rim.Vel.X, none, 0, -1.932653061713073161}.check(t)
	published{"rim point acceleration", rim.Acc.X, none, 0, -6.8835796855603958363}.check(t)
}

// The elliptical trammel with half axes 0.5 and 0.2 m, rod at 35° and 2 rad/s
// (equation from memory).
func TestPublishedTrammel(t *testing.T) {
	s := newRod(t, slidercrank.RodDimensions{Length: 0.7, Angle: math.Pi / 2})
	var st slidercrank.RodState
	if err := s.Solve(&st, rigid.Coordinate{Pos: math.Pi - 35*rigid.Degree, Vel: -2}); err != nil {
		t.Fatal(err)
	}
	p, e := st.Rod.At(r2.Vec{X: 0.2}), s.Ellipse(r2.Vec{X: 0.2})
	for _, row := range []published{
		{"half axis", e.Major, 0.5, 0.1, 0.5},
		{"half axis", e.Minor, 0.2, 0.1, 0.2},
		{"on the ellipse", math.Pow(p.Pos.X/e.Major, 2) + math.Pow(p.Pos.Y/e.Minor, 2), 1, 1, 1},
		{"x", p.Pos.X, none, 0, 0.40957602214449589484},
		{"y", p.Pos.Y, none, 0, 0.11471528727020921922},
		{"velocity x", p.Vel.X, none, 0, -0.57357643635104609611},
		{"velocity y", p.Vel.Y, none, 0, 0.32766081771559671587},
		{"acceleration x", p.Acc.X, none, 0, -1.6383040885779835794},
		{"acceleration y", p.Acc.Y, none, 0, -0.45886114908083687689},
	} {
		row.check(t)
	}
}
