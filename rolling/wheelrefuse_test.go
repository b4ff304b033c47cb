package rolling_test

import (
	"encoding/json"
	"errors"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

func TestNewWheelErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	sum := 0.1 // a variable, for constants are added exactly
	sum += 0.2
	for _, row := range []struct {
		d     rolling.WheelDimensions
		name  string
		cause error
	}{
		{rolling.WheelDimensions{}, "Radius", rigid.ErrNotPositive},
		{rolling.WheelDimensions{Radius: -1}, "Radius", rigid.ErrNotPositive},
		{rolling.WheelDimensions{Radius: nan}, "Radius", rigid.ErrNotFinite},
		{rolling.WheelDimensions{Radius: 1e61}, "Radius", rigid.ErrInput},
		{rolling.WheelDimensions{Radius: 1, Ground: inf}, "Ground", rigid.ErrNotFinite},
		{rolling.WheelDimensions{Radius: 1, Ground: -1e-61}, "Ground", rigid.ErrInput},
		{rolling.WheelDimensions{Radius: 0.3, Ground: -0.3}, "Ground", rigid.ErrSingular},
		{rolling.WheelDimensions{Radius: 0.3, Ground: -sum}, "Ground", rigid.ErrSingular},
		{rolling.WheelDimensions{Radius: 1, Mount: rigid.Placement{X: nan}}, "Mount.X", rigid.ErrNotFinite},
		{rolling.WheelDimensions{Radius: 1, Mount: rigid.Placement{Y: inf}}, "Mount.Y", rigid.ErrNotFinite},
		{rolling.WheelDimensions{Radius: 1, Mount: rigid.Placement{Angle: nan}}, "Mount.Angle", rigid.ErrNotFinite},
	} {
		w, err := rolling.NewWheel(row.d)
		checkRefused(t, w == nil, err, row.name, row.cause)
	}
	_, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.3, Ground: -0.3})
	if !strings.Contains(err.Error(), "fills the circle") {
		t.Errorf("no reason in %q", err)
	}
	_, err = rolling.NewWheel(rolling.WheelDimensions{Radius: -1, Ground: nan})
	if !errors.Is(err, rigid.ErrNotPositive) || !errors.Is(err, rigid.ErrNotFinite) {
		t.Errorf("not both causes: %v", err)
	}
	wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: -0.3 * (1 + 1e-14)})
}

// checkRefused checks that a constructor returned nothing but an error for the field.
func checkRefused(t *testing.T, none bool, err error, name string, cause error) {
	t.Helper()
	bad, ok := errors.AsType[*rigid.DimensionError](err)
	if !none || !ok || bad.Name != name || !errors.Is(bad, cause) {
		t.Errorf("%v, want %s: %v", err, name, cause)
		return
	}
	if !strings.HasPrefix(err.Error(), "twopoint: ") || !strings.Contains(err.Error(), name) {
		t.Errorf("message %q", err)
	}
}

// TestWheelRefuses: every solver refuses numbers that are not finite, results that
// overflow and a zero Wheel, and leaves the state as it was.
func TestWheelRefuses(t *testing.T) {
	track, err := rolling.NewTrack(rolling.Bend{Length: 10})
	if err != nil {
		t.Fatal(err)
	}
	still := rigid.Coordinate{}
	solvers := map[string]func(*rolling.Wheel, *rolling.WheelState, rigid.Coordinate) error{
		"turn":   func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error { return w.Solve(s, c) },
		"travel": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error { return w.SolveTravel(s, c) },
		"arc":    func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error { return w.SolveArc(s, c) },
		"slip": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveSlip(s, c, still)
		},
		"slips": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveSlip(s, still, c)
		},
		"ratio": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveRatio(s, c, 0.1)
		},
		"belt": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveBelt(s, c, still)
		},
		"belts": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveBelt(s, still, c)
		},
		"track": func(w *rolling.Wheel, s *rolling.WheelState, c rigid.Coordinate) error {
			return w.SolveTrack(s, track, c)
		},
	}
	nan, inf := math.NaN(), math.Inf(1)
	bad := []rigid.Coordinate{{Pos: nan}, {Pos: inf}, {Vel: nan}, {Vel: -inf}, {Acc: nan}, {Acc: inf}, {Vel: 1e200}}
	var zero rolling.Wheel
	before := rolling.WheelState{Turn: rigid.Coordinate{Pos: 42}}
	for name, solve := range solvers {
		for _, ground := range []float64{0, 2, -2, -0.1} {
			w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: ground})
			for _, c := range bad {
				st := before
				if err := solve(w, &st, c); err != rigid.ErrNotFinite || st != before {
					t.Errorf("%s on %v of %+v: %v", name, ground, c, err)
				}
			}
		}
		st := before
		if err := solve(&zero, &st, still); err != rigid.ErrInput || st != before {
			t.Errorf("%s of a zero Wheel: %v", name, err)
		}
	}
	if _, err := zero.Coefficients(1); err != rigid.ErrInput || zero.Range() != nil || zero.Dimensions() != (rolling.WheelDimensions{}) {
		t.Error("a zero Wheel gives answers")
	}
	if _, err := zero.Slip(still, still); err != rigid.ErrInput {
		t.Error("a zero Wheel gives a slip")
	}
	if _, err := zero.TurnOn(track)(1); err != rigid.ErrInput {
		t.Error("a zero Wheel has a law")
	}
}

func TestWheelAsks(t *testing.T) {
	d := rolling.WheelDimensions{Radius: 0.25, Ground: 2}
	w := wheel(t, d)
	c, err := w.Coefficients(3)
	if want := (rigid.Coefficients{In: 3, Out: -0.75, First: -0.25}); err != nil || c != want {
		t.Errorf("coefficients %+v, want %+v", c, want)
	}
	if _, err := w.Coefficients(math.NaN()); err != rigid.ErrNotFinite {
		t.Error(err)
	}
	if diff := cmp.Diff([]rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}, w.Range()); diff != "" {
		t.Error(diff)
	}
	if w.Dimensions() != d {
		t.Error(w.Dimensions())
	}
}

func TestJSON(t *testing.T) {
	text, err := json.Marshal(rolling.WheelDimensions{Radius: 0.4, Ground: -2})
	if want := `{"radius":0.4,"ground":-2,"mount":{"x":0,"y":0,"angle":0}}`; err != nil || string(text) != want {
		t.Errorf("%s, want %s", text, want)
	}
	design := rolling.TrainDesign{Members: []string{"frame", "sun", "planet"}, Drives: []rolling.Member{1},
		Meshes: []rolling.Mesh{{A: 1, B: 2, TeethA: 20, TeethB: 40, Internal: true}}}
	text, err = json.Marshal(design)
	if want := `{"members":["frame","sun","planet"],"meshes":[{"a":1,"b":2,"arm":0,"teethA":20,"teethB":40,"internal":true}],"drives":[1]}`; err != nil || string(text) != want {
		t.Errorf("%s, want %s", text, want)
	}
	var back rolling.TrainDesign
	if err := json.Unmarshal(text, &back); err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff(design, back); diff != "" {
		t.Error(diff)
	}
}
