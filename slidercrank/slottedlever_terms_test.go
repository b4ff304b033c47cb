package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/num/hyperdual"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// polarPin is the pin of a crank r seen from a pivot at (−c, 0) through a slot offset
// by e, from the triangle's law of cosines and its angles, in hyperdual numbers: what
// an observer on the lever measures along the slot, and the lever's angle. It takes
// cranks with |φ| < π/2, where arg d is an arc tangent.
func polarPin(r, c, e float64, turn rigid.Coordinate) (slide, swing hyperdual.Number) {
	phi := hyperdual.Number{Real: turn.Pos, E1mag: turn.Vel, E2mag: turn.Vel, E1E2mag: turn.Acc}
	x := hyperdual.Add(hyperdual.Number{Real: c}, hyperdual.Scale(r, hyperdual.Cos(phi)))
	y := hyperdual.Scale(r, hyperdual.Sin(phi))
	d2 := hyperdual.Add(hyperdual.Number{Real: r*r + c*c}, hyperdual.Scale(2*r*c, hyperdual.Cos(phi)))
	slide = hyperdual.Sqrt(hyperdual.Add(d2, hyperdual.Number{Real: -e * e}))
	lean := hyperdual.Atan(hyperdual.Scale(e, hyperdual.Inv(slide)))
	swing = hyperdual.Sub(hyperdual.Atan(hyperdual.Mul(y, hyperdual.Inv(x))), lean)
	return slide, swing
}

// TestLeverTermsApart holds each term of the pin's acceleration against second
// derivatives taken in the turning frame: the relative term against those of the
// place along the slot, the others made of the lever's angle and its derivatives.
func TestLeverTermsApart(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 3))
	near := func(what string, got, want r2.Vec, size float64) {
		t.Helper()
		if !(r2.Norm(r2.Sub(got, want)) <= 1e-12*size) {
			t.Errorf("%s = %v, want %v", what, got, want)
		}
	}
	for i := range 500 {
		r, c := 0.2+rng.Float64(), 0.2+rng.Float64()
		e := 0.4 * (2*rng.Float64() - 1) * math.Abs(r-c)
		turn := rigid.Coordinate{Pos: 3*rng.Float64() - 1.5, Vel: 20*rng.Float64() - 10, Acc: 200*rng.Float64() - 100}
		l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: r, Centre: c, Slot: e})
		if err != nil {
			t.Fatal(err)
		}
		var st slidercrank.LeverState
		if err := l.Solve(&st, turn); err != nil {
			t.Fatal(err)
		}
		slide, swing := polarPin(r, c, e, turn)
		sin, cos := math.Sincos(swing.Real)
		u, n := r2.Vec{X: cos, Y: sin}, r2.Vec{X: -sin, Y: cos}
		at := r2.Add(r2.Scale(slide.Real, u), r2.Scale(e, n))
		got := st.Pin()
		size := 1 + math.Abs(turn.Acc) + turn.Vel*turn.Vel/math.Abs(r-c)/math.Abs(r-c)
		near("base", got.Base, r2.Vec{}, 0)
		near("tangential", got.Tangential, r2.Scale(swing.E1E2mag, r2.Vec{X: -at.Y, Y: at.X}), size)
		near("normal", got.Normal, r2.Scale(-swing.E1mag*swing.E1mag, at), size)
		near("relative", got.Relative, r2.Scale(slide.E1E2mag, u), size)
		near("Coriolis", got.Coriolis, r2.Scale(2*swing.E1mag*slide.E1mag, n), size)
		near("sum", got.Sum(), st.Block.Acc, size)
		if t.Failed() {
			t.Fatalf("machine %d: r %v c %v e %v %+v", i, r, c, e, turn)
		}
	}
}

// TestLeverRelativeTermObserved takes the relative term as an observer on the lever
// would: by differencing where he sees the pin.
func TestLeverRelativeTermObserved(t *testing.T) {
	l := newLever(t, slidercrank.LeverDimensions{Crank: 0.09, Centre: 0.21, Slot: 0.03})
	const w, al = 7.0, -12.0
	seen := func(at float64) float64 {
		var st slidercrank.LeverState
		if err := l.Solve(&st, rigid.Coordinate{Pos: 1.1 + w*at + al*at*at/2}); err != nil {
			t.Fatal(err)
		}
		return st.Lever.Observe(rigid.Point{Pos: st.Block.Pose.Origin}).Pos.X
	}
	var st slidercrank.LeverState
	if err := l.Solve(&st, rigid.Coordinate{Pos: 1.1, Vel: w, Acc: al}); err != nil {
		t.Fatal(err)
	}
	v := fd.Derivative(seen, 0, &fd.Settings{Formula: fd.Central, Step: 1e-5})
	a := fd.Derivative(seen, 0, &fd.Settings{Formula: fd.Central2nd, Step: 1e-4})
	if math.Abs(v-st.Slide.Vel) > 1e-8 || math.Abs(a-st.Slide.Acc) > 1e-5 {
		t.Errorf("observer sees %v, %v; State has %+v", v, a, st.Slide)
	}
}
