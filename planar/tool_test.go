package planar_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// picker is a two-degree five-bar: two driven arms, two rods that meet in a gripper.
func picker(t testing.TB) *planar.State {
	t.Helper()
	l, err := planar.New(planar.Design{
		Links: []string{"frame", "left arm", "right arm", "left rod", "right rod"},
		Joints: []planar.Joint{
			planar.Revolute{A: planar.Frame.At(-0.1, 0), B: planar.Link(1).At(0, 0)},
			planar.Revolute{A: planar.Frame.At(0.1, 0), B: planar.Link(2).At(0, 0)},
			planar.Revolute{A: planar.Link(1).At(0.25, 0), B: planar.Link(3).At(0, 0)},
			planar.Revolute{A: planar.Link(2).At(0.25, 0), B: planar.Link(4).At(0, 0)},
			planar.Revolute{A: planar.Link(3).At(0.35, 0), B: planar.Link(4).At(0.35, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: 1, From: planar.Frame}, planar.Turn{Of: 2, From: planar.Frame}},
	})
	if err != nil {
		t.Fatal(err)
	}
	guess := []rigid.Placement{{}, {X: -0.1, Angle: 2}, {X: 0.1, Angle: 1}, {X: -0.2, Y: 0.2, Angle: 1}, {X: 0.2, Y: 0.2, Angle: 2}}
	st, err := l.Assemble(guess, rigid.Coordinate{Pos: 2.1}, rigid.Coordinate{Pos: 0.9})
	if err != nil {
		t.Fatal(err)
	}
	return st
}

var gripper = planar.Link(3).At(0.35, 0)

// The influences are the derivatives of the place by each drive: differences of
// moved linkages, and at the known pins of the five-bar by hand.
func TestInfluences(t *testing.T) {
	st := picker(t)
	by := make([]planar.Influence, 2)
	if err := st.Influences(by, gripper); err != nil {
		t.Fatal(err)
	}
	for k := range by {
		const h = 1e-5
		at := func(x float64) (r2.Vec, float64) {
			c := st.Clone()
			in := c.Inputs()
			in[k].Pos += x
			if err := c.Move(in...); err != nil {
				t.Fatal(err)
			}
			return c.Point(gripper).Pos, c.Turn(3, 0).Pos
		}
		p, a := at(h)
		q, b := at(-h)
		want := planar.Influence{Point: r2.Scale(1/(2*h), r2.Sub(p, q)), Turn: (a - b) / (2 * h)}
		if r2.Norm(r2.Sub(by[k].Point, want.Point)) > 1e-9 || math.Abs(by[k].Turn-want.Turn) > 1e-9 {
			t.Errorf("drive %d: %+v, want %+v", k, by[k], want)
		}
	}
	// gonum's condition number of the same matrix
	j := mat.NewDense(2, 2, []float64{by[0].Point.X, by[1].Point.X, by[0].Point.Y, by[1].Point.Y})
	if got, want := planar.Condition(by), mat.Cond(j, 2); math.Abs(got-want) > 1e-12*want {
		t.Errorf("condition %v, want %v", got, want)
	}
	three := append(by, planar.Influence{Point: r2.Vec{X: 0.3, Y: -0.2}})
	j = mat.NewDense(2, 3, []float64{three[0].Point.X, three[1].Point.X, three[2].Point.X, three[0].Point.Y, three[1].Point.Y, three[2].Point.Y})
	if got, want := planar.Condition(three), mat.Cond(j, 2); math.Abs(got-want) > 1e-12*want {
		t.Errorf("condition of three %v, want %v", got, want)
	}
	if c := planar.Condition(by[:1]); !math.IsInf(c, 1) {
		t.Errorf("condition of one drive %v", c)
	}
}

// The drives that Drive finds give the tool its motion.
func TestDriveTool(t *testing.T) {
	st := picker(t)
	want := planar.Tool{At: gripper, Vel: r2.Vec{X: 0.4, Y: -0.3}, Acc: r2.Vec{X: -2, Y: 5}}
	in := make([]rigid.Coordinate, 2)
	if err := st.Drive(in, want); err != nil {
		t.Fatal(err)
	}
	if err := st.Move(in...); err != nil {
		t.Fatal(err)
	}
	got := st.Point(gripper)
	if r2.Norm(r2.Sub(got.Vel, want.Vel)) > 1e-14 || r2.Norm(r2.Sub(got.Acc, want.Acc)) > 1e-13 {
		t.Errorf("%+v, want %+v", got, want)
	}
}

// Three drives: a platform on three cylinders keeps place and turn.
func TestDrivePlatform(t *testing.T) {
	l, err := planar.New(planar.Design{
		Links: []string{"frame", "table"},
		Drives: []planar.Drive{
			planar.Reach{A: planar.Frame.At(0, 0), B: planar.Link(1).At(0, 0)},
			planar.Reach{A: planar.Frame.At(1, 0), B: planar.Link(1).At(1, 0)},
			planar.Reach{A: planar.Frame.At(0, 0), B: planar.Link(1).At(1, 0)},
		},
	})
	if err != nil {
		t.Fatal(err)
	}
	st, err := l.Assemble([]rigid.Placement{{}, {X: 0.1, Y: 0.8, Angle: 0.1}}, rigid.Coordinate{Pos: 0.8}, rigid.Coordinate{Pos: 0.9}, rigid.Coordinate{Pos: 1.35})
	if err != nil {
		t.Fatal(err)
	}
	want := planar.Tool{At: planar.Link(1).At(0.5, 0.1), Vel: r2.Vec{X: 0.2, Y: 0.1}, Acc: r2.Vec{X: 1, Y: -2}, Omega: 0.3, Alpha: -0.7}
	in := make([]rigid.Coordinate, 3)
	if err := st.Drive(in, want); err != nil {
		t.Fatal(err)
	}
	if err := st.Move(in...); err != nil {
		t.Fatal(err)
	}
	got, m := st.Point(want.At), st.Motion(1)
	if r2.Norm(r2.Sub(got.Vel, want.Vel)) > 1e-13 || r2.Norm(r2.Sub(got.Acc, want.Acc)) > 1e-12 || math.Abs(m.Omega-want.Omega) > 1e-13 || math.Abs(m.Alpha-want.Alpha) > 1e-12 {
		t.Errorf("%+v, %v, %v, want %+v", got, m.Omega, m.Alpha, want)
	}
}

func TestToolRefuses(t *testing.T) {
	st := picker(t)
	in := []rigid.Coordinate{{Pos: 7}, {Pos: 8}}
	by := make([]planar.Influence, 2)
	for _, c := range []struct {
		why       string
		got, want error
	}{
		{"one place too few", st.Drive(in[:1], planar.Tool{At: gripper}), rigid.ErrInput},
		{"unknown link", st.Drive(in, planar.Tool{At: planar.Link(9).At(0, 0)}), rigid.ErrInput},
		{"a pin of an arm, which one drive moves alone", st.Drive(in, planar.Tool{At: planar.Link(1).At(0.25, 0), Vel: r2.Vec{X: 1}}), rigid.ErrSingular},
		{"NaN", st.Drive(in, planar.Tool{At: gripper, Vel: r2.Vec{X: math.NaN()}}), rigid.ErrNotFinite},
		{"infinite", st.Drive(in, planar.Tool{At: gripper, Acc: r2.Vec{X: math.Inf(1)}}), rigid.ErrNotFinite},
		{"influences: too few", st.Influences(by[:1], gripper), rigid.ErrInput},
		{"influences: unknown link", st.Influences(by, planar.Link(-1).At(0, 0)), rigid.ErrInput},
		{"zero State", new(planar.State).Drive(nil, planar.Tool{}), rigid.ErrInput},
		{"zero State", new(planar.State).Influences(nil, gripper), rigid.ErrInput},
	} {
		if !errors.Is(c.got, c.want) {
			t.Errorf("%s: %v, want %v", c.why, c.got, c.want)
		}
	}
	if in[0].Pos != 7 || in[1].Pos != 8 || by[0] != (planar.Influence{}) {
		t.Errorf("destinations written: %v, %v", in, by)
	}
	tool := planar.Tool{At: gripper, Vel: r2.Vec{X: 1}}
	var err error
	if n := testing.AllocsPerRun(100, func() { err = st.Drive(in, tool) }); n != 0 || err != nil {
		t.Errorf("%v allocations, %v", n, err)
	}
}
