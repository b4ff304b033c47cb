package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// randomRod returns a rod, its mount and a motion of it.
func randomRod(t *testing.T, rng *rand.Rand) (*slidercrank.SliderRod, slidercrank.RodDimensions, slidercrank.RodState) {
	t.Helper()
	d := slidercrank.RodDimensions{
		Length: 0.1 + rng.Float64(), Angle: math.Copysign(0.3+2.5*rng.Float64(), rng.Float64()-0.5),
		Mount: rigid.Placement{X: rng.Float64(), Y: rng.Float64(), Angle: 6 * rng.Float64()},
	}
	s := newRod(t, d)
	var st slidercrank.RodState
	if err := s.Solve(&st, rigid.Coordinate{Pos: 12*rng.Float64() - 6, Vel: 1 + rng.Float64(), Acc: 4*rng.Float64() - 2}); err != nil {
		t.Fatal(err)
	}
	return s, d, st
}

func TestSliderRodCloses(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 41))
	for range rounds() {
		_, d, st := randomRod(t, rng)
		joined(t, "A", st.Rod.At(r2.Vec{}), st.A.At(r2.Vec{}), 5)
		joined(t, "B", st.Rod.At(r2.Vec{X: d.Length}), st.B.At(r2.Vec{}), 5)
		guideA := rigid.NewPose(d.Mount.X, d.Mount.Y, d.Mount.Angle)
		guideB := rigid.NewPose(d.Mount.X, d.Mount.Y, d.Mount.Angle+d.Angle)
		a, b := guideA.Local(st.A.Pose.Origin), guideB.Local(st.B.Pose.Origin)
		if math.Abs(a.Y)+math.Abs(b.Y)+math.Abs(a.X-st.SlideA.Pos)+math.Abs(b.X-st.SlideB.Pos) > 4e-14 {
			t.Errorf("A at %v on its guide, B at %v; slides %v, %v", a, b, st.SlideA.Pos, st.SlideB.Pos)
		}
		if t.Failed() {
			t.Fatalf("%+v", d)
		}
	}
}

// Every point of the rod stays on its ellipse, and reaches its vertices.
func TestSliderRodEllipse(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 42))
	for range rounds() {
		s, d, _ := randomRod(t, rng)
		local := r2.Vec{X: 2*rng.Float64() - 1, Y: 2*rng.Float64() - 1}
		e := s.Ellipse(local)
		frame := rigid.NewPose(e.Centre.X, e.Centre.Y, e.Angle)
		far := 0.0
		for k := range 2000 {
			var st slidercrank.RodState
			if err := s.Solve(&st, rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / 2000}); err != nil {
				t.Fatal(err)
			}
			p := frame.Local(st.Rod.Pose.Point(local))
			// x²·Minor² + y²·Major² = Major²·Minor²
			if r := p.X*p.X*e.Minor*e.Minor + p.Y*p.Y*e.Major*e.Major - e.Major*e.Major*e.Minor*e.Minor; math.Abs(r) > 1e-12*e.Major*e.Major*e.Major*e.Major {
				t.Fatalf("%+v: point %v leaves %+v: %v", d, local, e, p)
			}
			far = max(far, math.Abs(p.X))
		}
		if math.Abs(far-e.Major) > 1e-5*e.Major || e.Minor > e.Major || !(e.Angle > -math.Pi/2 && e.Angle <= math.Pi/2) {
			t.Fatalf("%+v: point %v goes as far as %v on %+v", d, local, far, e)
		}
	}
}

// Special points: of the elliptical trammel the ends run straight and the middle
// round; a point of the rod has its distances from the ends as half axes.
func TestTrammelPoints(t *testing.T) {
	s := newRod(t, slidercrank.RodDimensions{Length: 0.6, Angle: math.Pi / 2, Mount: rigid.Placement{X: 1, Y: 2}})
	for _, row := range []struct {
		x, major, minor, angle float64
	}{
		{0, 0.6, 0, 0},
		{0.6, 0.6, 0, math.Pi / 2},
		{0.3, 0.3, 0.3, math.NaN()},
		{0.2, 0.4, 0.2, 0},
		{0.45, 0.45, 0.15, math.Pi / 2},
		{0.6 + 1e-9, 0.6 + 1e-9, 1e-9, math.Pi / 2},
		{-0.1, 0.7, 0.1, 0},
	} {
		e := s.Ellipse(r2.Vec{X: row.x})
		if math.Abs(e.Major-row.major) > 1e-15*4 || math.Abs(e.Minor-row.minor) > 2e-16 || math.Abs(e.Angle-row.angle) > 1e-15 || e.Centre != (r2.Vec{X: 1, Y: 2}) {
			t.Errorf("point at %v: %+v, want %+v", row.x, e, row)
		}
	}
}

// The velocity pole runs on the fixed Cardan circle and on the moving one, which
// touch in it.
func TestCardanCirclesCarryThePole(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 43))
	for range rounds() {
		s, d, st := randomRod(t, rng)
		fixed, moving := s.Cardan()
		pole, err := st.Rod.Pole()
		if err != nil {
			t.Fatal(err)
		}
		if r := r2.Norm(r2.Sub(pole, fixed.Centre)); math.Abs(r-fixed.Radius) > 1e-13*fixed.Radius {
			t.Errorf("%+v: pole at %v from the crossing, fixed circle of %v", d, r, fixed.Radius)
		}
		if r := r2.Norm(r2.Sub(st.Rod.Pose.Local(pole), moving.Centre)); math.Abs(r-moving.Radius) > 1e-13*fixed.Radius {
			t.Errorf("%+v: pole at %v from the moving centre, circle of %v", d, r, moving.Radius)
		}
		if fixed.Radius != 2*moving.Radius {
			t.Errorf("%+v: radii %v and %v", d, fixed.Radius, moving.Radius)
		}
		// a point of the moving circle runs straight through the crossing
		at := r2.Add(moving.Centre, r2.Scale(moving.Radius, rigid.NewPose(0, 0, 6*rng.Float64()).Axis))
		p := st.Rod.At(at)
		if c := r2.Cross(r2.Sub(p.Pos, fixed.Centre), p.Vel); math.Abs(c) > 1e-13*fixed.Radius*(1+r2.Norm(p.Vel)) {
			t.Errorf("%+v: %v moves across the line to the crossing: %v", d, at, c)
		}
		if t.Failed() {
			return
		}
	}
}

func TestSliderRodRefuses(t *testing.T) {
	s := newRod(t, slidercrank.RodDimensions{Length: 0.5, Angle: math.Pi / 6})
	zero := new(slidercrank.SliderRod)
	end := func(f func(*slidercrank.RodState, rigid.Coordinate, rigid.Side) error, pos, vel, acc float64, knee rigid.Side) func(*slidercrank.RodState) error {
		return func(st *slidercrank.RodState) error {
			return f(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, knee)
		}
	}
	turn := func(s *slidercrank.SliderRod, c rigid.Coordinate) func(*slidercrank.RodState) error {
		return func(st *slidercrank.RodState) error { return s.Solve(st, c) }
	}
	for _, row := range []struct {
		name string
		run  func(*slidercrank.RodState) error
		want error
	}{
		{"turn infinite", turn(s, rigid.Coordinate{Pos: math.Inf(1)}), rigid.ErrNotFinite},
		{"speed would overflow", turn(s, rigid.Coordinate{Vel: 1e160}), rigid.ErrNotFinite},
		{"zero rod", turn(zero, rigid.Coordinate{}), rigid.ErrInput},
		{"A beyond reach", end(s.SolveA, 1+1e-12, 0, 0, 0), rigid.ErrUnreachable},
		{"A at the end of its reach", end(s.SolveA, 1, 0, 0, 0), nil},
		{"A driven at the end of its reach", end(s.SolveA, -1, 1, 0, 0), rigid.ErrSingular},
		{"A not a number", end(s.SolveA, 0, 0, math.NaN(), 0), rigid.ErrNotFinite},
		{"A on an unknown side", end(s.SolveA, 0, 0, 0, 5), rigid.ErrInput},
		{"B beyond reach", end(s.SolveB, -1-1e-12, 0, 0, 1), rigid.ErrUnreachable},
		{"B accelerated at the end of its reach", end(s.SolveB, 1, 0, 1, 1), rigid.ErrSingular},
		{"B of a zero rod", end(zero.SolveB, 0, 0, 0, 1), rigid.ErrInput},
	} {
		outcome(t, row.name, slidercrank.RodState{Margin: 7}, row.run, row.want)
	}
	if _, err := zero.Coefficients(0); err != rigid.ErrInput || zero.Range() != nil || zero.DeadCentres() != nil {
		t.Errorf("a law or range of no mechanism: %v", err)
	}
	fixed, moving := zero.Cardan()
	if fixed != (rigid.Circle{}) || moving != (rigid.Circle{}) || zero.Ellipse(r2.Vec{X: 1}) != (slidercrank.Ellipse{}) {
		t.Error("circles of no mechanism")
	}
}
