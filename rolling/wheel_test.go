package rolling_test

import (
	"encoding/json"
	"errors"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// wheel returns a wheel or ends the test.
func wheel(t testing.TB, d rolling.WheelDimensions) *rolling.Wheel {
	t.Helper()
	w, err := rolling.NewWheel(d)
	if err != nil {
		t.Fatal(err)
	}
	return w
}

func near(a, b, tol float64) bool { return math.Abs(a-b) <= tol }

func nearVec(a, b r2.Vec, tol float64) bool { return near(a.X, b.X, tol) && near(a.Y, b.Y, tol) }

func nearPoint(a, b rigid.Point, tol float64) bool {
	return nearVec(a.Pos, b.Pos, tol) && nearVec(a.Vel, b.Vel, tol) && nearVec(a.Acc, b.Acc, tol)
}

func nearMotion(a, b rigid.Motion, tol float64) bool {
	return nearVec(a.Pose.Origin, b.Pose.Origin, tol) && nearVec(a.Pose.Axis, b.Pose.Axis, tol) &&
		nearVec(a.Vel, b.Vel, tol) && nearVec(a.Acc, b.Acc, tol) && near(a.Omega, b.Omega, tol) && near(a.Alpha, b.Alpha, tol)
}

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

// random returns dimensions of every kind of track, with a mount.
func random(rng *rand.Rand) rolling.WheelDimensions {
	r := math.Pow(10, rng.Float64()*4-3)
	ground := [...]float64{0, r * (0.1 + 9*rng.Float64()), -r * (1.1 + 9*rng.Float64()), -r * (0.1 + 0.8*rng.Float64())}
	return rolling.WheelDimensions{
		Radius: r, Ground: ground[rng.IntN(4)],
		Mount: rigid.Placement{X: 4*rng.Float64() - 2, Y: 4*rng.Float64() - 2, Angle: 8*rng.Float64() - 4},
	}
}

func coordinate(rng *rand.Rand, pos float64) rigid.Coordinate {
	return rigid.Coordinate{Pos: pos * (2*rng.Float64() - 1), Vel: 6*rng.Float64() - 3, Acc: 6*rng.Float64() - 3}
}

// TestRolling checks on random wheels what makes rolling: the contact lies on both
// circles, its particle rests, the rolled length is the arc of the rim and of the track,
// the four ways to drive agree, and rates are derivatives of places.
func TestRolling(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 1))
	for i := range runs(2000) {
		d := random(rng)
		w := wheel(t, d)
		turn := coordinate(rng, 20)
		var st, other rolling.WheelState
		if err := w.Solve(&st, turn); err != nil {
			t.Fatal(err)
		}
		size := max(d.Radius, math.Abs(d.Ground), math.Abs(st.Travel.Pos), 4)
		tol := 1e-14 * size
		// the contact on the rim, and on the track
		gap := r2.Norm(r2.Sub(st.Contact.Pos, st.Wheel.Pose.Origin))
		mount := d.Mount.Pose()
		own := mount.Local(st.Contact.Pos)
		off := own.Y
		if d.Ground != 0 {
			off = r2.Norm(r2.Sub(own, r2.Vec{Y: -d.Ground})) - math.Abs(d.Ground)
		}
		if !near(gap, d.Radius, tol) || !near(off, 0, tol) {
			t.Fatalf("%d %+v: contact %v off the rim, %v off the track", i, d, gap-d.Radius, off)
		}
		// at rest, also as a point of the wheel's motion
		if st.Contact.Vel != (r2.Vec{}) {
			t.Fatalf("%d %+v: contact moves %v", i, d, st.Contact.Vel)
		}
		particle := st.Wheel.At(st.Wheel.Pose.Local(st.Contact.Pos))
		rate := 1e-12 * size * (1 + turn.Vel*turn.Vel + math.Abs(turn.Acc)) * (1 + 1/math.Abs(1+d.Ground/d.Radius))
		if !nearPoint(particle, st.Contact, rate) {
			t.Fatalf("%d %+v: particle %+v, want %+v", i, d, particle, st.Contact)
		}
		// travel = −r·turn; rolled length: the rim's arc relative to the line of centres
		if !near(st.Travel.Pos, -d.Radius*turn.Pos, tol) {
			t.Fatalf("%d: travel %v", i, st.Travel.Pos)
		}
		if d.Ground != 0 {
			psi := st.Travel.Pos / (d.Ground + d.Radius) // of the line of centres, clockwise
			if rim := -d.Radius * (turn.Pos + psi); !near(st.Arc.Pos, rim, 20*tol) || !near(st.Arc.Pos, d.Ground*psi, tol) {
				t.Fatalf("%d %+v: arc %v, rim %v, track %v", i, d, st.Arc.Pos, rim, d.Ground*psi)
			}
		}
		for name, err := range map[string]error{
			"travel": w.SolveTravel(&other, st.Travel),
			"arc":    w.SolveArc(&other, st.Arc),
			"ratio":  w.SolveRatio(&other, turn, 0),
			"belt":   w.SolveBelt(&other, st.Travel, rigid.Coordinate{}),
		} {
			if err != nil || !nearMotion(st.Wheel, other.Wheel, 1e-12*size*(1+turn.Vel*turn.Vel)*20) {
				t.Fatalf("%d by %s: %v %+v, want %+v", i, name, err, other.Wheel, st.Wheel)
			}
		}
		checkRates(t, w, turn, size)
	}
}

// checkRates compares rates of the centre and of a rim point with differences of
// places along a motion of constant angular acceleration.
func checkRates(t *testing.T, w *rolling.Wheel, turn rigid.Coordinate, size float64) {
	t.Helper()
	const h = 1e-4
	local := r2.Vec{X: 0.3 * size, Y: 0.2 * size}
	var p [3]rigid.Point
	for k, dt := range [...]float64{-h, 0, h} {
		var st rolling.WheelState
		if err := w.Solve(&st, turn.After(dt)); err != nil {
			t.Fatal(err)
		}
		p[k] = st.Wheel.At(local)
	}
	vel := r2.Scale(1/(2*h), r2.Sub(p[2].Pos, p[0].Pos))
	acc := r2.Scale(1/(2*h), r2.Sub(p[2].Vel, p[0].Vel))
	bend := 1 + 1/math.Abs(1+w.Dimensions().Ground/w.Dimensions().Radius)
	tol := 1e-6 * size * bend * bend * bend * 20
	if !nearVec(vel, p[1].Vel, tol) || !nearVec(acc, p[1].Acc, 10*tol) {
		t.Fatalf("%+v at %+v: velocity %v, differences %v; acceleration %v, differences %v",
			w.Dimensions(), turn, p[1].Vel, vel, p[1].Acc, acc)
	}
}

// TestSymmetry: mirrored in the y axis, turned with its mount, made larger, and run
// backwards in time, a wheel does the same.
func TestSymmetry(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 2))
	for range runs(500) {
		d := random(rng)
		d.Mount = rigid.Placement{}
		turn := coordinate(rng, 9)
		var st, mirrored, reversed, mounted, larger rolling.WheelState
		w := wheel(t, d)
		placed, scaled := d, d
		placed.Mount = rigid.Placement{X: 1.5, Y: -0.5, Angle: 2}
		scaled.Radius, scaled.Ground = d.Radius*1024, d.Ground*1024
		if err := errors.Join(
			w.Solve(&st, turn),
			w.Solve(&mirrored, rigid.Coordinate{Pos: -turn.Pos, Vel: -turn.Vel, Acc: -turn.Acc}),
			w.Solve(&reversed, rigid.Coordinate{Pos: turn.Pos, Vel: -turn.Vel, Acc: turn.Acc}),
			wheel(t, placed).Solve(&mounted, turn),
			wheel(t, scaled).Solve(&larger, turn),
		); err != nil {
			t.Fatal(err)
		}
		m, c := st.Wheel, st.Contact
		flip := func(v r2.Vec) r2.Vec { return r2.Vec{X: -v.X, Y: v.Y} }
		if got := mirrored.Wheel; flip(got.Pose.Origin) != m.Pose.Origin || flip(got.Vel) != m.Vel || flip(got.Acc) != m.Acc || got.Omega != -m.Omega {
			t.Fatalf("%+v mirrored: %+v, want the mirror image of %+v", d, got, m)
		}
		if got := reversed; got.Wheel.Vel != r2.Scale(-1, m.Vel) || got.Wheel.Acc != m.Acc || got.Contact.Acc != c.Acc {
			t.Fatalf("%+v reversed: %+v, want %+v", d, got, st)
		}
		frame := rigid.Motion{Pose: placed.Mount.Pose()}
		if err := st.On(&frame); err != nil {
			t.Fatal(err)
		}
		tol := 1e-13 * (1 + max(d.Radius, math.Abs(d.Ground), math.Abs(st.Travel.Pos))*(1+9*math.Abs(1/(1+d.Ground/d.Radius)))) * 10
		if !nearMotion(mounted.Wheel, st.Wheel, tol) || !nearPoint(mounted.Contact, st.Contact, tol) {
			t.Fatalf("%+v mounted: %+v, want %+v", d, mounted, st)
		}
		if got := larger.Wheel; got.Pose.Origin != r2.Scale(1024, m.Pose.Origin) || got.Acc != r2.Scale(1024, m.Acc) || got.Pose.Axis != m.Pose.Axis {
			t.Fatalf("%+v larger: %+v, want 1024 × %+v", d, got, m)
		}
	}
}

// TestTurningGround: a wheel on a held axle against a turning circle is a gear pair.
func TestTurningGround(t *testing.T) {
	for _, ground := range []float64{0.8, -0.8, -0.1} {
		const r = 0.3
		w := wheel(t, rolling.WheelDimensions{Radius: r, Ground: ground})
		// the circle turns about its centre by b, so that as it sees the wheel's
		// centre goes round the other way
		b := rigid.Coordinate{Pos: 0.7, Vel: 2, Acc: -3}
		way := r + ground
		var st rolling.WheelState
		if err := w.SolveTravel(&st, rigid.Coordinate{Pos: way * b.Pos, Vel: way * b.Vel, Acc: way * b.Acc}); err != nil {
			t.Fatal(err)
		}
		turntable := rigid.Motion{Pose: rigid.NewPose(0, -ground, b.Pos), Omega: b.Vel, Alpha: b.Acc}
		// the track's frame has its origin a radius above the circle's centre
		track := rigid.Motion{Pose: rigid.Pose{Origin: r2.Vec{Y: ground}}}
		carried := turntable.Compose(&track)
		if err := st.On(&carried); err != nil {
			t.Fatal(err)
		}
		want := rigid.Motion{
			Pose:  rigid.NewPose(0, r, -ground/r*b.Pos),
			Omega: -ground / r * b.Vel, Alpha: -ground / r * b.Acc,
		}
		if !nearMotion(st.Wheel, want, 1e-14) {
			t.Errorf("ground %v: %+v, want %+v", ground, st.Wheel, want)
		}
		// the contact particle goes with the circle's rim
		if want := turntable.At(r2.Vec{X: ground * math.Sin(b.Pos), Y: ground * math.Cos(b.Pos)}); !nearVec(st.Contact.Vel, want.Vel, 1e-14) {
			t.Errorf("ground %v: contact %v, want %v", ground, st.Contact.Vel, want.Vel)
		}
		before := st
		bad := rigid.Motion{Omega: math.Inf(1)}
		if err := st.On(&bad); err != rigid.ErrNotFinite || st != before {
			t.Errorf("On an infinite motion: %v", err)
		}
	}
}

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
