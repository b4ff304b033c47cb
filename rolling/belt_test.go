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

// TestBelt: both rims move with the belt; sense of rotation by kind; way and back.
func TestBelt(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 6))
	for i := range runs(500) {
		d := rolling.BeltDimensions{
			RadiusA: 0.05 + rng.Float64(), RadiusB: 0.05 + rng.Float64(), Centres: 2.2 + rng.Float64(),
			Crossed: i%2 == 0, Mount: rigid.Placement{X: 1, Y: -1, Angle: 8*rng.Float64() - 4},
		}
		if i%3 == 0 {
			d.RadiusA, d.RadiusB, d.TeethA, d.TeethB, d.Pitch = 0, 0, 20+rng.IntN(50), 20+rng.IntN(50), 0.05
		}
		p, err := rolling.NewBelt(d)
		if err != nil {
			t.Fatal(err)
		}
		turn := coordinate(rng, 9)
		var st, fromB, fromBelt rolling.BeltState
		if err := errors.Join(p.Solve(&st, turn), p.SolveB(&fromB, st.TurnB), p.SolveSlide(&fromBelt, st.Slide)); err != nil {
			t.Fatal(err)
		}
		radiusA, radiusB := d.RadiusA, d.RadiusB
		if d.TeethA != 0 {
			radiusA, radiusB = float64(d.TeethA)*d.Pitch/(2*math.Pi), float64(d.TeethB)*d.Pitch/(2*math.Pi)
		}
		way := 1.0
		if d.Crossed {
			way = -1
		}
		const tol = 1e-10
		if !near(st.Slide.Vel, radiusA*st.A.Omega, tol) || !near(st.Slide.Vel, way*radiusB*st.B.Omega, tol) || !near(st.Slide.Pos, radiusA*turn.Pos, tol) || st.TurnA != turn {
			t.Fatalf("%+v: %+v", d, st)
		}
		if gap := r2.Norm(r2.Sub(st.B.Pose.Origin, st.A.Pose.Origin)); !near(gap, d.Centres, tol) {
			t.Fatalf("%+v: centres %v", d, gap)
		}
		arm := rigid.Motion{Pose: rigid.NewPose(1, 2, 3), Vel: r2.Vec{X: 1}, Omega: 0.7, Alpha: -0.4}
		wantA, wantB := arm.Compose(&st.A), arm.Compose(&st.B)
		for _, s := range []*rolling.BeltState{&st, &fromB, &fromBelt} {
			if err := s.On(&arm); err != nil {
				t.Fatal(err)
			}
			if !nearMotion(s.A, wantA, tol) || !nearMotion(s.B, wantB, tol) {
				t.Fatalf("%+v: %+v, want %+v", d, s, st)
			}
		}
		c, err := p.Coefficients(turn.Pos)
		if got := c.Output(turn.Vel, turn.Acc); err != nil || got != st.TurnB || p.Dimensions() != d || len(p.Range()) != 1 {
			t.Fatalf("coefficients give %+v %v, want %+v", got, err, st.TurnB)
		}
	}
}

// TestBeltLength: R. S. Khurmi & J. K. Gupta, Theory of Machines, crossed belt on
// pulleys of 450 and 200 mm, 1.95 m apart: 4.975 m and 199.2°, from memory; for an open
// belt Cauchy's formula: a convex line is as long as the integral of its support
// function over all directions.
func TestBeltLength(t *testing.T) {
	crossed, err := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.225, RadiusB: 0.1, Centres: 1.95, Crossed: true})
	if err != nil {
		t.Fatal(err)
	}
	a, b := crossed.Wrap()
	if l := crossed.Length(); !near(l, 4.975, 5e-4) || a != b || !near(a, 199.2*rigid.Degree, 0.05*rigid.Degree) {
		t.Errorf("length %v, wrap %v and %v", l, a, b)
	}
	for _, radii := range [][2]float64{{0.225, 0.1}, {0.1, 0.225}, {0.15, 0.15}, {1.8, 0.05}} {
		open, err := rolling.NewBelt(rolling.BeltDimensions{RadiusA: radii[0], RadiusB: radii[1], Centres: 1.95})
		if err != nil {
			t.Fatal(err)
		}
		const n = 1 << 16
		sum := 0.0
		for i := range n {
			phi := (float64(i) + 0.5) * rigid.Revolution / n
			sum += max(radii[0], 1.95*math.Cos(phi)+radii[1]) * rigid.Revolution / n
		}
		a, b := open.Wrap()
		if l := open.Length(); !near(l, sum, 1e-8) || !near(a+b, rigid.Revolution, 1e-15) || (a > b) != (radii[0] > radii[1]) {
			t.Errorf("radii %v: length %v, want %v; wrap %v and %v", radii, l, sum, a, b)
		}
	}
}

func TestNewBeltErrors(t *testing.T) {
	for _, row := range []struct {
		d     rolling.BeltDimensions
		name  string
		cause error
	}{
		{rolling.BeltDimensions{Centres: 1}, "RadiusA", rigid.ErrNotPositive},
		{rolling.BeltDimensions{RadiusA: 1, RadiusB: 1}, "Centres", rigid.ErrNotPositive},
		{rolling.BeltDimensions{RadiusA: 1, RadiusB: 1, Centres: 2}, "Centres", rigid.ErrUnreachable},
		{rolling.BeltDimensions{RadiusA: math.Inf(1), RadiusB: 1, Centres: 2}, "RadiusA", rigid.ErrNotFinite},
		{rolling.BeltDimensions{TeethA: 20, TeethB: 20, Centres: 2}, "Pitch", rigid.ErrNotPositive},
		{rolling.BeltDimensions{TeethA: 20, Pitch: 0.01, RadiusB: 0.1, Centres: 2}, "TeethB", rigid.ErrNotPositive},
		{rolling.BeltDimensions{TeethA: 20, TeethB: -3, Pitch: 0.01, Centres: 2}, "TeethB", rigid.ErrNotPositive},
		{rolling.BeltDimensions{TeethA: 20, TeethB: 20, Pitch: 0.01, RadiusB: 0.5, Centres: 2}, "RadiusB", rigid.ErrInput},
		{rolling.BeltDimensions{RadiusA: 1, RadiusB: 1, Centres: 3, Mount: rigid.Placement{Angle: math.NaN()}}, "Mount.Angle", rigid.ErrNotFinite},
	} {
		p, err := rolling.NewBelt(row.d)
		checkRefused(t, p == nil, err, row.name, row.cause)
	}
}
