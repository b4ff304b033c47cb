package slidercrank_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func newCylinder(t *testing.T, d slidercrank.CylinderDimensions) *slidercrank.OscillatingCylinder {
	t.Helper()
	c, err := slidercrank.NewOscillatingCylinder(d)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func TestOscillatingCylinderCloses(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 31))
	for range rounds() {
		d := slidercrank.CylinderDimensions{Crank: 0.1 + rng.Float64(), Centre: 0.1 + rng.Float64()}
		d.Offset = 0.9 * (2*rng.Float64() - 1) * math.Abs(d.Crank-d.Centre)
		c := newCylinder(t, d)
		lengths := c.Lengths()
		slide := rigid.Coordinate{
			Pos: lengths.Lo + (0.02+0.96*rng.Float64())*(lengths.Hi-lengths.Lo),
			Vel: 2*rng.Float64() - 1, Acc: 2*rng.Float64() - 1,
		}
		var st slidercrank.CylinderState
		if err := c.SolveSlide(&st, slide, rigid.Side(rng.IntN(2))); err != nil {
			t.Fatal(err)
		}
		scale := 3 / (st.Margin * st.Margin * st.Margin)
		pin := st.Crank.At(r2.Vec{X: d.Crank})
		joined(t, "pin and rod", pin, st.Rod.At(r2.Vec{}), 2)
		joined(t, "rod in the cylinder", pin, st.Cylinder.Carry(rigid.Point{
			Pos: r2.Vec{X: slide.Pos, Y: d.Offset}, Vel: r2.Vec{X: slide.Vel}, Acc: r2.Vec{X: slide.Acc},
		}), scale)
		joined(t, "cylinder pin", st.Cylinder.At(r2.Vec{}), rigid.Point{Pos: r2.Vec{X: -d.Centre}}, 2)
		// the triangle of the pins, by the law of cosines
		far2 := slide.Pos*slide.Pos + d.Offset*d.Offset
		cos := (far2 - d.Crank*d.Crank - d.Centre*d.Centre) / (2 * d.Crank * d.Centre)
		if math.Abs(math.Cos(st.Turn.Pos)-cos) > 1e-13*far2/(d.Crank*d.Centre) {
			t.Errorf("turn %v, its cosine should be %v", st.Turn.Pos, cos)
		}
		if (st.Knee == rigid.Right) != (st.Turn.Pos > 0) {
			t.Errorf("knee %v at turn %v", st.Knee, st.Turn.Pos)
		}
		if t.Failed() {
			t.Fatalf("%+v at %+v", d, slide)
		}
	}
}

func TestOscillatingCylinderRefuses(t *testing.T) {
	c := newCylinder(t, slidercrank.CylinderDimensions{Crank: 0.3, Centre: 0.5})
	rocking := newCylinder(t, slidercrank.CylinderDimensions{Crank: 0.3, Centre: 0.5, Offset: 0.4})
	large := newCylinder(t, slidercrank.CylinderDimensions{Crank: 1, Centre: 1e32})
	wide := newCylinder(t, slidercrank.CylinderDimensions{Crank: 1e10, Centre: 3e10})
	near, nearLarge := newCylinder(t, slidercrank.CylinderDimensions{Crank: 1, Centre: 1 + 1e-6}), newCylinder(t, slidercrank.CylinderDimensions{Crank: 1e5, Centre: 1e5 + 10})
	zero := new(slidercrank.OscillatingCylinder)
	slide := func(c *slidercrank.OscillatingCylinder, pos, vel, acc float64, knee rigid.Side) func(*slidercrank.CylinderState) error {
		return func(st *slidercrank.CylinderState) error {
			return c.SolveSlide(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, knee)
		}
	}
	turn := func(c *slidercrank.OscillatingCylinder, pos, vel, acc float64) func(*slidercrank.CylinderState) error {
		return func(st *slidercrank.CylinderState) error {
			return c.Solve(st, rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc})
		}
	}
	for _, row := range []struct {
		name string
		run  func(*slidercrank.CylinderState) error
		want error
	}{
		{"length not a number", slide(c, math.NaN(), 0, 0, 0), rigid.ErrNotFinite},
		{"rate infinite", slide(c, 0.5, math.Inf(-1), 0, 0), rigid.ErrNotFinite},
		{"rate would overflow", slide(c, 0.5, 1e200, 0, 0), rigid.ErrNotFinite},
		{"too short", slide(c, 0.2-1e-9, 0, 0, 0), rigid.ErrUnreachable},
		{"too long", slide(c, 0.8+1e-9, 0, 0, 0), rigid.ErrUnreachable},
		{"so long that its square overflows", slide(large, 1e300, 0, 0, 0), rigid.ErrUnreachable},
		{"negative", slide(c, -0.5, 0, 0, 0), rigid.ErrUnreachable},
		{"shortest", slide(c, 0.2, 0, 0, rigid.Left), nil},
		{"longest", slide(c, 0.8, 0, 0, rigid.Right), nil},
		{"longest by a rounding more", slide(c, 0.8+1e-15, 0, 0, rigid.Right), nil},
		{"driven at its shortest", slide(c, 0.2, 1e-3, 0, rigid.Left), rigid.ErrSingular},
		{"driven at its longest", slide(c, 0.8, 0, 1e-3, rigid.Right), rigid.ErrSingular},
		{"length 0", slide(rocking, 0, 0, 0, rigid.Right), nil},
		{"driven at length 0", slide(rocking, 0, 1, 0, rigid.Right), rigid.ErrSingular},
		{"unknown knee", slide(c, 0.5, 0, 0, -1), rigid.ErrInput},
		{"zero cylinder", slide(zero, 0.5, 0, 0, 0), rigid.ErrInput},
		{"turn not a number", turn(c, math.NaN(), 0, 0), rigid.ErrNotFinite},
		{"beyond the range", turn(rocking, rocking.Range()[0].Hi+1e-9, 0, 0), rigid.ErrUnreachable},
		{"turn of a zero cylinder", turn(zero, 1, 0, 0), rigid.ErrInput},
		{"the cylinder's acceleration would overflow", turn(near, math.Pi-1e-6, 1e150, 0), rigid.ErrNotFinite},
		{"that of its length would", turn(nearLarge, math.Pi, 1e151, 0), rigid.ErrNotFinite},
		{"that of the pin would", turn(wide, 0, 0, 1e300), rigid.ErrNotFinite},
	} {
		st := outcome(t, row.name, slidercrank.CylinderState{Margin: 7}, row.run, row.want)
		if row.want == nil && (st.Turn.Pos*0+st.Swing.Pos*0+st.Crank.Pose.Axis.X*0+st.Cylinder.Pose.Axis.X*0 != 0) {
			t.Errorf("%s: %+v", row.name, st)
		}
	}
	if zero.Range() != nil || zero.DeadCentres() != nil || zero.Lengths() != (rigid.Interval{}) {
		t.Error("a range of no mechanism")
	}
	if _, err := zero.Coefficients(0); err != rigid.ErrInput {
		t.Errorf("Coefficients: %v", err)
	}
}

func TestOscillatingCylinderDimensions(t *testing.T) {
	_, err := slidercrank.NewOscillatingCylinder(slidercrank.CylinderDimensions{Crank: 1, Centre: 2, Offset: math.NaN()})
	if bad, ok := errors.AsType[*rigid.DimensionError](err); !ok || bad.Name != "Offset" || bad.Err != rigid.ErrNotFinite {
		t.Errorf("%v", err)
	}
	d := slidercrank.CylinderDimensions{Crank: 0.3, Centre: 0.5, Offset: 0.1, Mount: rigid.Placement{X: 1, Angle: 2}}
	c := newCylinder(t, d)
	if c.Dimensions() != d {
		t.Errorf("Dimensions() = %+v", c.Dimensions())
	}
	if got := c.Lengths(); math.Abs(got.Lo-math.Sqrt(0.03)) > 1e-15 || math.Abs(got.Hi-math.Sqrt(0.63)) > 1e-15 {
		t.Errorf("lengths %v", got)
	}
}

// A crank much shorter than the centre distance hardly changes the length, whose
// rounding is then all there is between it and a dead centre for some way.
func TestOscillatingCylinderShortCrank(t *testing.T) {
	for _, row := range []struct {
		crank, off float64 // from the dead centre, rad
		want       error
	}{
		{1e-6, 1e-5, rigid.ErrSingular},
		{1e-6, 1e-3, nil},
		{1e-10, 1e-3, rigid.ErrSingular},
		{1e-10, 0.1, nil},
		{1e-16, 1.5, rigid.ErrSingular},
	} {
		c := newCylinder(t, slidercrank.CylinderDimensions{Crank: row.crank, Centre: 1})
		for _, turn := range []float64{row.off, math.Pi - row.off} {
			var st, again slidercrank.CylinderState
			if err := c.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); err != nil {
				t.Fatal(err)
			}
			if err := c.SolveSlide(&again, st.Slide, st.Knee); err != row.want {
				t.Errorf("crank %v at %v: %v, want %v", row.crank, turn, err, row.want)
			}
			if err := c.SolveSlide(&again, rigid.Coordinate{Pos: st.Slide.Pos}, st.Knee); err != nil || (again.Margin == 0) != (row.want != nil) {
				t.Errorf("crank %v at %v: margin %v, %v", row.crank, turn, again.Margin, err)
			}
		}
	}
}
