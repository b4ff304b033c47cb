package rolling_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// TestContactAcceleration: University of Illinois dynamics reference, "rolling
// contact", for the flat track (http://dynref.engr.illinois.edu/rko.html); on circles
// ω²rR/(R ± r), Euler–Savary, from memory.
func TestContactAcceleration(t *testing.T) {
	for _, row := range []struct {
		name         string
		ground, want float64
	}{{"flat", 0, 4.8}, {"outside", 0.5, 3}, {"inside", -0.5, 12}} {
		w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: row.ground})
		var st rolling.WheelState
		if err := w.Solve(&st, rigid.Coordinate{Vel: 4, Acc: -7}); err != nil {
			t.Fatal(err)
		}
		if a := st.Contact.Acc; !near(a.Y, row.want, 1e-14) || a.X != 0 || st.Contact.Vel != (r2.Vec{}) {
			t.Errorf("%s: contact %+v, want acceleration (0, %v) at rest", row.name, st.Contact, row.want)
		}
	}
}

// TestCardanCircles: a circle of half the radius rolling inside another moves every
// point of its rim along a diameter, <https://mathworld.wolfram.com/TusiCouple.html>;
// the figures are the 20-digit values of the closure equations.
func TestCardanCircles(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.5, Ground: -1, Mount: rigid.Placement{X: 1, Angle: math.Pi / 2}})
	var st rolling.WheelState
	if err := w.SolveTravel(&st, rigid.Coordinate{Pos: 0.5 * 0.7, Vel: 0.5 * 3}); err != nil {
		t.Fatal(err)
	}
	got := st.Wheel.At(r2.Vec{Y: -0.5})
	want := rigid.Point{
		Pos: r2.Vec{X: 0.76484218728448842626},
		Vel: r2.Vec{X: -1.932653061713073161},
		Acc: r2.Vec{X: -6.8835796855603958363},
	}
	if !nearPoint(got, want, 1e-14) {
		t.Errorf("got %+v, want %+v", got, want)
	}
}

// TestTrammel: the same wheel's point off the rim describes the ellipse of a trammel
// with semiaxes 0.5 and 0.2 (equation from memory); figures as in the last test.
func TestTrammel(t *testing.T) {
	// P = 0.35 e^{iφ} + 0.15 e^{−iφ}: the planet of radius 0.35 in a ring of 0.7.
	w := wheel(t, rolling.WheelDimensions{Radius: 0.35, Ground: -0.7, Mount: rigid.Placement{X: 0.7, Angle: math.Pi / 2}})
	var st rolling.WheelState
	if err := w.SolveTravel(&st, rigid.Coordinate{Pos: 0.35 * 35 * rigid.Degree, Vel: 0.35 * 2}); err != nil {
		t.Fatal(err)
	}
	got := st.Wheel.At(r2.Vec{Y: -0.15})
	want := rigid.Point{
		Pos: r2.Vec{X: 0.40957602214449589484, Y: 0.11471528727020921922},
		Vel: r2.Vec{X: -0.57357643635104609611, Y: 0.32766081771559671587},
		Acc: r2.Vec{X: -1.6383040885779835794, Y: -0.45886114908083687689},
	}
	if !nearPoint(got, want, 1e-14) {
		t.Errorf("got %+v, want %+v", got, want)
	}
}

// TestCycloid: x = r(φ − sin φ), y = r(1 − cos φ), and a cusp with the acceleration
// v²/r where the rim point touches (textbook, from memory).
func TestCycloid(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.25})
	var st rolling.WheelState
	for i := range 200 {
		phi := 0.1 * float64(i)
		if err := w.Solve(&st, rigid.Coordinate{Pos: -phi, Vel: -2}); err != nil {
			t.Fatal(err)
		}
		s, c := math.Sincos(phi)
		want := rigid.Point{
			Pos: r2.Vec{X: 0.25 * (phi - s), Y: 0.25 * (1 - c)},
			Vel: r2.Vec{X: 0.5 * (1 - c), Y: 0.5 * s},
			Acc: r2.Vec{X: s, Y: c},
		}
		if got := st.Wheel.At(r2.Vec{Y: -0.25}); !nearPoint(got, want, 1e-14) {
			t.Fatalf("φ %v: %+v, want %+v", phi, got, want)
		}
	}
}
