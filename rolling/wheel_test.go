package rolling_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

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
