package planar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
	"example.com/twopoint/slidercrank"
	"gonum.org/v1/gonum/spatial/r2"
)

// TestQuickReturnAgrees compares shaper drives of random dimensions with the package
// that solves them alone, over the turn.
func TestQuickReturnAgrees(t *testing.T) {
	random := rand.New(rand.NewPCG(8, 3))
	compared := 0
	for range 60 {
		centre := 0.2 + 0.2*random.Float64()
		crank := centre * (0.2 + 0.6*random.Float64())
		arm := 0.4 + 0.4*random.Float64()
		rodLength := 0.1 + 0.3*random.Float64()
		slot := 0.05 * random.NormFloat64() * centre
		q, err := slidercrank.NewQuickReturn(slidercrank.QuickReturnDimensions{
			Crank: crank, Centre: centre, Slot: slot, Arm: arm, Rod: rodLength,
			Guide: rigid.Placement{X: arm * 0.9, Angle: math.Pi / 2}, Mount: rigid.Placement{X: centre},
		})
		if err != nil {
			continue
		}
		// its lever pivot is the origin here
		var p plan
		l := p.links("crank", "lever", "rod", "ram")
		p.pin(Frame.At(centre, 0), l[0].At(0, 0))
		p.pin(Frame.At(0, 0), l[1].At(0, 0))
		p.slot(l[0].At(crank, 0), l[1].Line(0, slot, 0))
		p.pin(l[1].At(arm, 0), l[2].At(0, 0))
		p.pin(l[2].At(rodLength, 0), l[3].At(0, 0))
		p.guide(Frame.Line(centre+arm*0.9, 0, math.Pi/2), l[3].Line(0, 0, 0))
		p.turn(l[0], Frame)
		var want slidercrank.QuickReturnState
		var s *State
		for k := range 60 {
			in := rigid.Coordinate{Pos: 0.3 * float64(k), Vel: 3, Acc: -2}
			if err := q.Solve(&want, in); err != nil || want.Margin < 0.05 {
				s = nil
				continue
			}
			if s == nil {
				linkage, err := New(p.Design)
				if err != nil {
					t.Fatal(err)
				}
				guess := []rigid.Placement{{}}
				for _, m := range []*rigid.Motion{&want.Crank, &want.Lever, &want.Rod, &want.Ram} {
					guess = append(guess, rigid.Placement{X: m.Pose.Origin.X, Y: m.Pose.Origin.Y, Angle: m.Pose.Angle()})
				}
				if s, err = linkage.Assemble(guess, in); err != nil {
					t.Fatal(err)
				}
			}
			if err := s.Move(in); err != nil {
				s = nil
				continue
			}
			compared++
			speed := max(3, math.Abs(want.Rod.Omega), math.Abs(want.Lever.Omega), r2.Norm(want.Ram.Vel))
			surge := max(speed*speed, math.Abs(want.Rod.Alpha), math.Abs(want.Lever.Alpha))
			for i, m := range []*rigid.Motion{&want.Crank, &want.Lever, &want.Rod, &want.Ram} {
				if off := differ(s.Motion(Link(i+1)), m, 1, speed, surge); !(off < 1e-13/want.Margin) {
					t.Errorf("at %v: link %d off by %.2g, margin %.2g", in.Pos, i+1, off, want.Margin)
				}
			}
		}
	}
	if compared < 500 {
		t.Errorf("only %d compared", compared)
	}
	t.Logf("%d compared", compared)
}

// TestWheelAgrees rolls a wheel on a straight track as a pinion whose centre is guided
// along it.
func TestWheelAgrees(t *testing.T) {
	for _, mount := range []rigid.Placement{{}, {X: 1, Y: -2, Angle: 0.4}} {
		w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.3, Mount: mount})
		if err != nil {
			t.Fatal(err)
		}
		var p plan
		l := p.links("axle", "wheel")
		track := Frame.Line(mount.X, mount.Y, mount.Angle)
		p.guide(track, l[0].Line(0, -0.3, 0))
		p.pin(l[0].At(0, 0), l[1].At(0, 0))
		p.Joints = append(p.Joints, RackPair{Pinion: l[1].At(0, 0), Rack: track, Radius: 0.3, Phase: 0.3 * mount.Angle})
		p.turn(l[1], l[0])
		s := mode(t, p.Design, ".", rigid.Coordinate{})
		var want rolling.WheelState
		for k := range 500 {
			in := rigid.Coordinate{Pos: 0.2 * float64(k), Vel: 4, Acc: -7}
			if err := s.Move(in); err != nil {
				t.Fatal(err)
			}
			if err := w.Solve(&want, in); err != nil {
				t.Fatal(err)
			}
			if off := differ(s.Motion(2), &want.Wheel, 1+0.06*float64(k), 4, 16); !(off < 1e-13) {
				t.Errorf("at %v: off by %.2g:\n%+v\n%+v", in.Pos, off, *s.Motion(2), want.Wheel)
				break
			}
		}
	}
}

// TestTrainAgrees turns a carrier and a sun, both driven, with planets in series.
func TestTrainAgrees(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 4))
	for n := range 40 {
		teeth := func() int { return 12 + random.IntN(60) }
		a, b, c, e := teeth(), teeth(), teeth(), teeth()
		inside := random.IntN(2) == 0
		var d rolling.TrainDesign
		sun, carrier, one, two, ring := d.Member("sun"), d.Member("carrier"), d.Member("one"), d.Member("two"), d.Member("ring")
		d.Meshes = []rolling.Mesh{
			{A: sun, B: one, Arm: carrier, TeethA: a, TeethB: b},
			{A: one, B: two, Arm: carrier, TeethA: b, TeethB: c},
			{A: two, B: ring, Arm: carrier, TeethA: c, TeethB: e, Internal: inside},
		}
		d.Drives = []rolling.Member{sun, carrier}
		train, err := rolling.NewTrain(d)
		if err != nil {
			t.Fatal(err)
		}
		var p plan
		l := p.links("sun", "carrier", "one", "two", "ring")
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.pin(Frame.At(0, 0), l[1].At(0, 0))
		p.pin(l[1].At(0.3, 0), l[2].At(0, 0))
		p.pin(l[1].At(0.5, 0.2), l[3].At(0, 0))
		p.pin(Frame.At(0, 0), l[4].At(0, 0))
		for _, m := range d.Meshes {
			p.Joints = append(p.Joints, GearPair{A: Link(m.A), B: Link(m.B), Arm: Link(m.Arm), TeethA: m.TeethA, TeethB: m.TeethB, Internal: m.Internal})
		}
		p.turn(l[0], Frame)
		p.turn(l[1], Frame)
		linkage, err := New(p.Design)
		if err != nil {
			t.Fatal(err)
		}
		s, err := linkage.Assemble(make([]rigid.Placement, 6), rigid.Coordinate{}, rigid.Coordinate{})
		if err != nil {
			t.Fatal(err)
		}
		want := make([]rigid.Coordinate, 6)
		for k := range 100 {
			x, y := rigid.Coordinate{Pos: 0.5 * float64(k), Vel: 3, Acc: 1}, rigid.Coordinate{Pos: -0.3 * float64(k), Vel: -2, Acc: 4}
			if err := s.Move(x, y); err != nil {
				t.Fatal(err)
			}
			if err := train.Solve(want, x, y); err != nil {
				t.Fatal(err)
			}
			for i, w := range want {
				near(t, p.Links[i], s.Turn(Link(i), Frame), w, 1e-12)
			}
		}
		if t.Failed() {
			t.Fatalf("train %d: %d %d %d %d %v", n, a, b, c, e, inside)
		}
	}
}
