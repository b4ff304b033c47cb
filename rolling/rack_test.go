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

// TestRack: the pinion rolls on the rack, driven from either side, and carried.
func TestRack(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 5))
	for i := range runs(500) {
		d := rolling.RackDimensions{Radius: 0.02 + rng.Float64(), Mount: rigid.Placement{X: 1, Angle: 8*rng.Float64() - 4}}
		if i%2 == 0 {
			d = rolling.RackDimensions{Teeth: 10 + rng.IntN(50), Pitch: 0.01 * (1 + rng.Float64()), Mount: d.Mount}
		}
		p, err := rolling.NewRack(d)
		if err != nil {
			t.Fatal(err)
		}
		radius := d.Radius + float64(d.Teeth)*d.Pitch/(2*math.Pi)
		turn := coordinate(rng, 9)
		var st, back rolling.RackState
		if err := errors.Join(p.Solve(&st, turn), p.SolveSlide(&back, st.Slide)); err != nil {
			t.Fatal(err)
		}
		const tol = 1e-12
		if st.Turn != turn || !near(st.Slide.Pos, radius*turn.Pos, tol) || !near(st.Slide.Acc, radius*turn.Acc, tol) || !near(back.Turn.Pos, turn.Pos, tol) {
			t.Fatalf("%+v: %+v, back %+v", d, st, back)
		}
		carriage := rigid.Motion{Pose: rigid.NewPose(1, 2, 3), Vel: r2.Vec{X: 1}, Omega: 0.7, Alpha: -0.4}
		for _, on := range []bool{false, true} {
			if on {
				if err := errors.Join(st.On(&carriage), back.On(&carriage)); err != nil {
					t.Fatal(err)
				}
			}
			a := st.Pinion.At(st.Pinion.Pose.Local(st.PitchPinion.Pos))
			b := st.Rack.At(st.Rack.Pose.Local(st.PitchRack.Pos))
			if !nearPoint(a, st.PitchPinion, 1e-10) || !nearPoint(b, st.PitchRack, 1e-10) || !nearVec(a.Vel, b.Vel, 1e-10) {
				t.Fatalf("%+v: %+v: particles %+v, %+v", d, st, a, b)
			}
			if gap := r2.Norm(r2.Sub(st.PitchRack.Pos, st.Pinion.Pose.Origin)); !near(gap, radius, tol) {
				t.Fatalf("%+v: pitch point at %v from the centre", d, gap)
			}
			if !nearMotion(st.Pinion, back.Pinion, 1e-10) || !nearMotion(st.Rack, back.Rack, 1e-10) {
				t.Fatalf("%+v: back %+v, want %+v", d, back, st)
			}
		}
		c, err := p.Coefficients(turn.Pos)
		if got := c.Output(turn.Vel, turn.Acc); err != nil || got != st.Slide || p.Dimensions() != d || len(p.Range()) != 1 {
			t.Fatalf("coefficients give %+v %v, want %+v", got, err, st.Slide)
		}
	}
}

// TestRackTeeth: a million turns, rounded to a float64, move the rack by the float64
// nearest to teeth·pitch/2π times that (mpmath, 60 digits).
func TestRackTeeth(t *testing.T) {
	p, err := rolling.NewRack(rolling.RackDimensions{Teeth: 19, Pitch: 0.0125})
	if err != nil {
		t.Fatal(err)
	}
	for _, row := range []struct{ turn, want float64 }{
		{6283185.307179586, 237500.0},
		{-6815648.1, -257626.7203038476},
		{-381512.8, -14420.916393547042},
		{2897303.5, 109516.0412448317},
		{-2492476.2, -94213.85309511461},
		{484918.6, 18329.583144460372},
	} {
		var st rolling.RackState
		if err := p.Solve(&st, rigid.Coordinate{Pos: row.turn}); err != nil || st.Slide.Pos != row.want {
			t.Errorf("turn %v: %v %v, want %v", row.turn, st.Slide.Pos, err, row.want)
		}
	}
}

func TestNewRackErrors(t *testing.T) {
	for _, row := range []struct {
		d     rolling.RackDimensions
		name  string
		cause error
	}{
		{rolling.RackDimensions{}, "Radius", rigid.ErrNotPositive},
		{rolling.RackDimensions{Radius: math.NaN()}, "Radius", rigid.ErrNotFinite},
		{rolling.RackDimensions{Teeth: -1, Pitch: 0.01}, "Teeth", rigid.ErrNotPositive},
		{rolling.RackDimensions{Teeth: 20}, "Pitch", rigid.ErrNotPositive},
		{rolling.RackDimensions{Teeth: 20, Pitch: 0.01, Radius: 0.03}, "Radius", rigid.ErrInput},
		{rolling.RackDimensions{Radius: 1, Mount: rigid.Placement{X: math.Inf(1)}}, "Mount.X", rigid.ErrNotFinite},
	} {
		p, err := rolling.NewRack(row.d)
		checkRefused(t, p == nil, err, row.name, row.cause)
	}
}
