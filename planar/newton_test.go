package planar_test

import (
	"math"
	"testing"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// stephenson is a six-bar of Stephenson's third kind, driven at link drive: by its
// crank 1 a chain of dyads, by its far rocker 5 a group of higher class of the
// links 1 to 4.
func stephenson(t testing.TB, drive planar.Link) *planar.Linkage {
	t.Helper()
	d := planar.Design{
		Links: []string{"frame", "crank", "plate", "rocker", "rod", "far rocker"},
		Joints: []planar.Joint{
			planar.Revolute{A: planar.Frame.At(0, 0), B: planar.Link(1).At(0, 0)},
			planar.Revolute{A: planar.Link(1).At(1.1, 0), B: planar.Link(2).At(0, 0)},
			planar.Revolute{A: planar.Link(2).At(3.5, 0), B: planar.Link(3).At(2.7, 0)},
			planar.Revolute{A: planar.Frame.At(4, 0.3), B: planar.Link(3).At(0, 0)},
			planar.Revolute{A: planar.Link(2).At(1.9, 1.2), B: planar.Link(4).At(0, 0)},
			planar.Revolute{A: planar.Link(4).At(4.2, 0), B: planar.Link(5).At(2.6, 0)},
			planar.Revolute{A: planar.Frame.At(5.6, 3), B: planar.Link(5).At(0, 0)},
		},
		Drives: []planar.Drive{planar.Turn{Of: drive, From: planar.Frame}},
	}
	l, err := planar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func poses(st *planar.State, n planar.Link) []rigid.Placement {
	p := make([]rigid.Placement, n)
	for i := range p {
		m := st.Motion(planar.Link(i))
		p[i] = rigid.Placement{X: m.Pose.Origin.X, Y: m.Pose.Origin.Y, Angle: m.Pose.Angle()}
	}
	return p
}

// The group of higher class moves as the chain of dyads with the same links does.
func TestHigherGroupAgreesWithDyads(t *testing.T) {
	byCrank, byRocker := stephenson(t, 1), stephenson(t, 5)
	truth, err := byCrank.AssembleMode(".++", rigid.Coordinate{Pos: 1, Vel: 1})
	if err != nil {
		t.Fatal(err)
	}
	st, err := byRocker.Assemble(poses(truth, 6), truth.Turn(5, 0))
	if err != nil {
		t.Fatal(err)
	}
	worst := 0.0
	for k := range 120 {
		in := rigid.Coordinate{Pos: 1 + 0.01*float64(k), Vel: 10, Acc: -3}
		if err := truth.Move(in); err != nil {
			t.Fatal(err)
		}
		if err := st.Move(truth.Turn(5, 0)); err != nil {
			t.Fatalf("crank at %v: %v", in.Pos, err)
		}
		for l := range planar.Link(6) {
			a, b := truth.Motion(l), st.Motion(l)
			for _, off := range []float64{
				a.Pose.Origin.X - b.Pose.Origin.X, a.Pose.Origin.Y - b.Pose.Origin.Y, a.Pose.Axis.X - b.Pose.Axis.X, a.Pose.Axis.Y - b.Pose.Axis.Y,
				(a.Omega - b.Omega) / 10, (a.Alpha - b.Alpha) / 100, (a.Acc.X - b.Acc.X) / 100, (a.Vel.Y - b.Vel.Y) / 10,
			} {
				worst = math.Max(worst, math.Abs(off)*st.Margin())
				if !(math.Abs(off)*st.Margin() < 1e-12) {
					t.Fatalf("crank at %v: link %d off by %v:\n%+v\n%+v", in.Pos, l, off, *a, *b)
				}
			}
		}
	}
	t.Logf("worst %.2g/margin", worst)
}

func BenchmarkHigherGroup(b *testing.B) {
	byCrank, byRocker := stephenson(b, 1), stephenson(b, 5)
	truth, err := byCrank.AssembleMode(".++", rigid.Coordinate{Pos: 1, Vel: 1})
	if err != nil {
		b.Fatal(err)
	}
	st, err := byRocker.Assemble(poses(truth, 6), truth.Turn(5, 0))
	if err != nil {
		b.Fatal(err)
	}
	start := truth.Turn(5, 0).Pos
	b.ReportAllocs()
	n := 0
	for b.Loop() {
		n++
		k := n % 20
		if n/20%2 == 1 {
			k = 20 - k
		}
		if err := st.Move(rigid.Coordinate{Pos: start + float64(k)*rigid.Degree*0.5, Vel: 1, Acc: 2}); err != nil {
			b.Fatal(err)
		}
	}
}
