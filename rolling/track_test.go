package rolling_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// bends are those of testdata/track.py: a straight, a transition, an arc, a transition
// through 0 to the other side, and a long spiral of 12 rad.
var bends = []rolling.Bend{
	{Length: 2.5},
	{Length: 4, To: 0.5},
	{Length: 3, From: 0.5, To: 0.5},
	{Length: 2, From: 0.5, To: -1.25},
	{Length: 30, From: -0.1, To: -0.7},
}

func newTrack(t testing.TB, b ...rolling.Bend) rolling.Track {
	t.Helper()
	track, err := rolling.NewTrack(b...)
	if err != nil {
		t.Fatal(err)
	}
	return track
}

// TestTrackTable compares with the 50-digit integrals of testdata/track.py.
func TestTrackTable(t *testing.T) {
	track := newTrack(t, bends...)
	rows := lines(t, "track.txt")
	if len(rows) != 28 {
		t.Fatalf("%d lines", len(rows))
	}
	worst := 0.0
	for _, row := range rows {
		x := numbers(t, row)
		p, err := track(x[0])
		if err != nil {
			t.Fatal(err)
		}
		if !nearVec(p.Pos, r2.Vec{X: x[1], Y: x[2]}, 2e-14) || !near(p.Direction, x[3], 1e-14) {
			t.Errorf("arc %v: %+v, want %v", x[0], p, x[1:])
		}
		worst = max(worst, math.Abs(p.Pos.X-x[1]), math.Abs(p.Pos.Y-x[2]))
	}
	t.Logf("worst place %.2g m of 41.5 m", worst)
}

// TestTrackFits: where bends meet, place and direction go on; beyond the ends is
// nothing.
func TestTrackFits(t *testing.T) {
	track := newTrack(t, bends...)
	for _, arc := range []float64{2.5, 6.5, 9.5, 11.5} {
		before, err := track(math.Nextafter(arc, 0))
		after, err2 := track(arc)
		if errors.Join(err, err2) != nil || !nearVec(before.Pos, after.Pos, 1e-14) || !near(before.Direction, after.Direction, 1e-14) {
			t.Errorf("at %v: %+v, then %+v", arc, before, after)
		}
	}
	for arc, want := range map[float64]error{
		0: nil, 41.5: nil, -1e-13: nil, 41.5 + 4e-13: nil,
		-5e-13: rigid.ErrUnreachable, 41.5 + 5e-13: rigid.ErrUnreachable, math.Inf(1): rigid.ErrNotFinite,
	} {
		if _, err := track(arc); err != want {
			t.Errorf("at %v: %v, want %v", arc, err, want)
		}
	}
	if _, err := track(math.NaN()); err != rigid.ErrNotFinite {
		t.Error(err)
	}
}

// TestTrackIsCircle: on an arc of a circle SolveTrack gives what SolveArc gives on
// that circle, by other formulas.
func TestTrackIsCircle(t *testing.T) {
	for _, ground := range []float64{0, 0.8, -0.8, -0.1} {
		curvature := 0.0
		if ground != 0 {
			curvature = -1 / ground
		}
		mount := rigid.Placement{X: 0.2, Y: -0.4, Angle: 1}
		w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Ground: ground, Mount: mount})
		track := newTrack(t, rolling.Bend{Length: 3, From: curvature, To: curvature})
		for i := range 30 {
			arc := rigid.Coordinate{Pos: 0.1 * float64(i), Vel: 0.7, Acc: -1.3}
			var got, want rolling.WheelState
			if err := errors.Join(w.SolveTrack(&got, track, arc), w.SolveArc(&want, arc)); err != nil {
				t.Fatal(err)
			}
			const tol = 2e-13
			if !nearMotion(got.Wheel, want.Wheel, tol) || !nearPoint(got.Contact, want.Contact, tol) || got.Arc != arc ||
				!near(got.Turn.Pos, want.Turn.Pos, tol) || !near(got.Travel.Pos, want.Travel.Pos, tol) || !near(got.Travel.Acc, want.Travel.Acc, tol) {
				t.Fatalf("ground %v, arc %v: %+v, want %+v", ground, arc.Pos, got, want)
			}
		}
	}
}

// wave is the track y = a·(1 − cos kx) by its arc, found by Newton's method on the length
// integrated with Simpson's rule: a shape that no bend has.
func wave(a, k float64) rolling.Track {
	slope := func(x float64) float64 { return a * k * math.Sin(k*x) }
	speed := func(x float64) float64 { return math.Hypot(1, slope(x)) }
	length := func(x float64) float64 {
		const n = 200
		h, sum := x/n, speed(0)+speed(x)
		for i := 1; i < n; i++ {
			sum += float64(2+2*(i%2)) * speed(h*float64(i))
		}
		return sum * h / 3
	}
	return func(arc float64) (rolling.TrackPoint, error) {
		x := arc
		for range 8 {
			x -= (length(x) - arc) / speed(x)
		}
		d1, d2, d3 := slope(x), a*k*k*math.Cos(k*x), -a*k*k*k*math.Sin(k*x)
		v := speed(x)
		return rolling.TrackPoint{
			Pos:       r2.Vec{X: x, Y: a * (1 - math.Cos(k*x))},
			Direction: math.Atan(d1),
			Curvature: d2 / (v * v * v),
			// derivative of y''/(1 + y'²)^(3/2) by x, over the speed
			CurvatureRate: (d3/(v*v*v) - 3*d1*d2*d2/(v*v*v*v*v)) / v,
		}, nil
	}
}

// TestTrackRates compares the rates on two tracks with differences of places, and the
// contact's with the wheel's own particle.
func TestTrackRates(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.3, Mount: rigid.Placement{X: 1, Angle: 0.4}})
	for name, track := range map[string]rolling.Track{"wave": wave(0.2, 1.5), "bends": newTrack(t, bends...)} {
		for _, at := range []float64{0.4, 1.1, 2, 3.3, 4.2, 10.7} {
			arc := rigid.Coordinate{Pos: at, Vel: 0.9, Acc: -0.6}
			var st rolling.WheelState
			if err := w.SolveTrack(&st, track, arc); err != nil {
				t.Fatal(err)
			}
			local := st.Wheel.Pose.Local(st.Contact.Pos)
			particle := func(dt float64) rigid.Point {
				var s rolling.WheelState
				if err := w.SolveTrack(&s, track, arc.After(dt)); err != nil {
					t.Fatal(err)
				}
				return s.Wheel.At(local)
			}
			central := &fd.Settings{Formula: fd.Central}
			rate := func(f func(dt float64) float64) float64 { return fd.Derivative(f, 0, central) }
			vel := r2.Vec{X: rate(func(dt float64) float64 { return particle(dt).Pos.X }), Y: rate(func(dt float64) float64 { return particle(dt).Pos.Y })}
			acc := r2.Vec{X: rate(func(dt float64) float64 { return particle(dt).Vel.X }), Y: rate(func(dt float64) float64 { return particle(dt).Vel.Y })}
			if st.Contact.Vel != (r2.Vec{}) || !nearVec(vel, r2.Vec{}, 1e-7) || !nearVec(acc, st.Contact.Acc, 1e-7) {
				t.Errorf("%s at %v: contact %+v; differences %v, %v", name, at, st.Contact, vel, acc)
			}
			if !nearPoint(particle(0), st.Contact, 1e-13) {
				t.Errorf("%s at %v: contact %+v; particle %+v", name, at, st.Contact, particle(0))
			}
			alpha := rate(func(dt float64) float64 {
				var s rolling.WheelState
				_ = w.SolveTrack(&s, track, arc.After(dt))
				return s.Turn.Vel
			})
			if !near(alpha, st.Wheel.Alpha, 1e-7) || !near(st.Travel.Acc, -0.3*alpha, 1e-7) {
				t.Errorf("%s at %v: alpha %v, differences %v", name, at, st.Wheel.Alpha, alpha)
			}
		}
	}
}

// TestTurnOn: the law's coefficients are those of SolveTrack, and its errors the
// track's.
func TestTurnOn(t *testing.T) {
	w := wheel(t, rolling.WheelDimensions{Radius: 0.3})
	track := newTrack(t, bends...)
	law := w.TurnOn(track)
	c, err := law(5)
	if err != nil {
		t.Fatal(err)
	}
	var st rolling.WheelState
	if err := w.SolveTrack(&st, track, rigid.Coordinate{Pos: 5, Vel: 2, Acc: 3}); err != nil {
		t.Fatal(err)
	}
	if got := c.Output(2, 3); got.Pos != st.Turn.Pos || !near(got.Vel, st.Turn.Vel, 1e-14) || !near(got.Acc, st.Turn.Acc, 1e-14) || c.In != 5 {
		t.Errorf("%+v, want %+v", got, st.Turn)
	}
	if _, err := law(50); err != rigid.ErrUnreachable {
		t.Error(err)
	}
	before := st
	if err := w.SolveTrack(&st, track, rigid.Coordinate{Pos: 50}); err != rigid.ErrUnreachable || st != before {
		t.Error(err)
	}
	if _, err := w.TurnOn(nil)(1); err != rigid.ErrInput {
		t.Error(err)
	}
	if err := w.SolveTrack(&st, nil, rigid.Coordinate{}); err != rigid.ErrInput || st != before {
		t.Error(err)
	}
	broken := func(float64) (rolling.TrackPoint, error) { return rolling.TrackPoint{Curvature: math.NaN()}, nil }
	if _, err := w.TurnOn(broken)(1); err != rigid.ErrNotFinite {
		t.Error(err)
	}
	if err := w.SolveTrack(&st, broken, rigid.Coordinate{}); err != rigid.ErrNotFinite || st != before {
		t.Error(err)
	}
}

func TestNewTrackErrors(t *testing.T) {
	nan := math.NaN()
	for _, row := range []struct {
		b     rolling.Bend
		name  string
		cause error
	}{
		{rolling.Bend{}, "bends[1].Length", rigid.ErrNotPositive},
		{rolling.Bend{Length: nan}, "bends[1].Length", rigid.ErrNotFinite},
		{rolling.Bend{Length: 1e61}, "bends[1].Length", rigid.ErrInput},
		{rolling.Bend{Length: 1, From: nan}, "bends[1].From", rigid.ErrNotFinite},
		{rolling.Bend{Length: 1, To: math.Inf(1)}, "bends[1].To", rigid.ErrNotFinite},
		{rolling.Bend{Length: 1, To: -1.1e4}, "bends[1].Length", rigid.ErrInput},
	} {
		track, err := rolling.NewTrack(rolling.Bend{Length: 1}, row.b)
		checkRefused(t, track == nil, err, row.name, row.cause)
	}
	track, err := rolling.NewTrack()
	checkRefused(t, track == nil, err, "bends", rigid.ErrInput)
}
