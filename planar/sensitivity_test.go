package planar_test

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"example.com/twopoint/fourbar"
	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

func TestSensitivityGrown(t *testing.T) {
	seeds := uint64(4)
	if testing.Short() {
		seeds = 1
	}
	for kind := range growths {
		compared := 0
		for seed := range seeds {
			g := grow(seed*100+uint64(kind), kind, int(seed*5)%growths)
			l, err := New(g.Design)
			if err != nil {
				t.Fatal(err)
			}
			st, err := l.Assemble(g.guess(), g.in...)
			if err != nil || st.Margin() < 0.15 {
				continue
			}
			compared++
			all := each(g.Design)
			g.random.Shuffle(len(all), func(i, j int) { all[i], all[j] = all[j], all[i] })
			compare(t, fmt.Sprintf("kind %d, seed %d", kind, seed), g.Design, st, all[:min(12, len(all))], 2e-4)
		}
		if compared == 0 && !testing.Short() {
			t.Errorf("kind %d: none compared", kind)
		}
	}
}

// TestSensitivityFourBar compares with package fourbar, which differentiates its own
// closure.
func TestSensitivityFourBar(t *testing.T) {
	const a, b, c, f = 0.08, 0.26, 0.18, 0.24
	ref, err := fourbar.New(fourbar.Dimensions{Frame: f, Crank: a, Coupler: b, Follower: c})
	if err != nil {
		t.Fatal(err)
	}
	var p plan
	l := p.links("crank", "coupler", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(a, 0), l[1].At(0, 0))
	p.pin(l[1].At(b, 0), l[2].At(c, 0))
	p.pin(Frame.At(f, 0), l[2].At(0, 0))
	p.turn(l[0], Frame)
	by := []Dimension{
		p.Hole(Frame.At(f, 0), X), p.Hole(l[0].At(a, 0), X), p.Hole(l[1].At(b, 0), X), p.Hole(l[2].At(c, 0), X),
	}
	point := r2.Vec{X: 0.1, Y: 0.05}
	for turn := 0.2; turn < 6; turn += 0.7 {
		in := rigid.Coordinate{Pos: turn, Vel: 3, Acc: -2}
		var at fourbar.State
		var want fourbar.Sensitivity
		if err := ref.Solve(&at, in); err != nil {
			t.Fatal(err)
		}
		if err := ref.Sensitivity(&want, in, point); err != nil {
			t.Fatal(err)
		}
		guess := make([]rigid.Placement, 4)
		for i, m := range []rigid.Motion{at.Crank, at.Coupler, at.Follower} {
			guess[i+1] = rigid.Placement{X: m.Pose.Origin.X, Y: m.Pose.Origin.Y, Angle: m.Pose.Angle()}
		}
		_, st := assemble(t, p.Design, guess, in)
		points, swings := make([]rigid.Point, 4), make([]rigid.Coordinate, 4)
		if err := errors.Join(st.Sensitivity(points, l[1].At(point.X, point.Y), by...), st.TurnSensitivity(swings, l[2], Frame, by...)); err != nil {
			t.Fatal(err)
		}
		for i, w := range []fourbar.LengthSensitivity{want.Frame, want.Crank, want.Coupler, want.Follower} {
			got := append(numbers(points[i]), coordinate(swings[i])...)
			for k, w := range append(numbers(w.Point), coordinate(w.Swing)...) {
				if math.Abs(got[k]-w) > 1e-12*(1+math.Abs(w))/st.Margin() {
					t.Errorf("at %g by %d: %d is %.15g, fourbar gives %.15g", turn, i, k, got[k], w)
				}
			}
		}
	}
}

// machine is a design with a place to compare at.
type machine struct {
	name  string
	d     Design
	guess []rigid.Placement
	in    []rigid.Coordinate
	by    []Dimension // or each entry
}

// meshed returns the entries but for those that would part the gears, whose pins are
// at two entries along x; with the radii goes the second.
func meshed(d Design, one, two Entry) (by []Dimension) {
	for _, m := range each(d) {
		e := m.Of[0]
		if e.Part == RadiusA || e.Part == RadiusB {
			m.Of = append(m.Of, two)
		} else if e.Part <= Y && (e.Joint == one.Joint && e.End == one.End || e.Joint == two.Joint && e.End == two.End) {
			continue
		}
		by = append(by, m)
	}
	return by
}

func gearedFiveBar() machine {
	var p plan
	l := p.links("crank", "rod", "far rod", "far crank")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.4, 0), l[1].At(0, 0))
	p.pin(l[1].At(1.5, 0), l[2].At(1.5, 0))
	p.pin(l[2].At(0, 0), l[3].At(0.5, 0))
	p.pin(l[3].At(0, 0), Frame.At(1.7, 0))
	p.Joints = append(p.Joints, GearPair{A: l[0], B: l[3], RadiusA: 1, RadiusB: 0.7, Phase: 0.3})
	p.turn(l[0], Frame)
	by := meshed(p.Design, Entry{0, A, X}, Entry{4, B, X})
	return machine{"geared five-bar", p.Design,
		[]rigid.Placement{{}, {Angle: 0.5}, {X: 0.35, Y: 0.2, Angle: 0.9}, {X: 2.1, Y: -0.1, Angle: 2.2}, {X: 1.7, Angle: -0.4}},
		[]rigid.Coordinate{{Pos: 0.5, Vel: 2, Acc: -1}}, by}
}

func machines() []machine {
	five := epicyclicFiveBar(20, 13, false)
	five.Joints[5] = GearPair{A: 1, B: 3, Arm: 2, RadiusA: 1.9, RadiusB: 1.1, Phase: 0.3}

	// A pinion on a fixed bracket rolls a rack that two pins in slots guide.
	var rack plan
	l := rack.links("bracket", "pinion", "rack", "lever")
	rack.Joints = append(rack.Joints,
		Fixed{A: Frame.Line(0.2, 0.1, 0.4), B: l[0].Line(0, 0.1, -0.1)},
		Revolute{A: l[0].At(0.3, 0.2), B: l[1].At(0, 0)},
		Fixed{A: l[1].Line(0.1, 0, 0), B: l[3].Line(0.2, 0, 0.3)},
		SlidingPin{Pin: l[2].At(0, 0.1), Slot: Frame.Line(0, 0, 0.3)},
		SlidingPin{Pin: l[2].At(0.5, 0.2), Slot: Frame.Line(0.1, 0, 0.4)},
		RackPair{Pinion: l[1].At(0, 0), Rack: l[2].Line(0.1, 0, 0.1), Radius: 0.2, Right: true, Phase: 0.1},
	)
	rack.turn(l[1], Frame)

	// A lever on a cylinder, with a pin of three links.
	var lift plan
	k := lift.links("lever", "rod", "slider", "stay")
	lift.pin(Frame.At(0, 0), k[0].At(0, 0))
	lift.pin(k[0].At(0.5, 0.1), k[1].At(0, 0))
	lift.pin(k[1].At(0.7, 0), k[2].At(0, 0))
	lift.guide(Frame.Line(0, -0.2, 0), k[2].Line(0, 0, 0))
	lift.pin(k[1].At(0, 0), k[3].At(0, 0))
	lift.slot(k[3].At(0.4, 0), Frame.Line(0.2, 0.5, 0.3))
	lift.reach(Frame.At(0.4, -0.3), k[0].At(0.45, 0))
	return []machine{
		gearedFiveBar(),
		{"gears on the coupler", five.Design,
			[]rigid.Placement{{}, {Angle: 0.6}, {X: 0.33, Y: 0.2, Angle: 0.5}, {X: 2.9, Y: 1.7, Angle: 0.9}, {X: 3, Angle: 1.5}},
			[]rigid.Coordinate{{Pos: 0.6, Vel: 2, Acc: -1}}, meshed(five.Design, Entry{1, B, X}, Entry{2, A, X})},
		{"rack", rack.Design, []rigid.Placement{{}, {X: 0.2, Y: 0.1, Angle: 0.5}, {X: 0.4, Y: 0.4, Angle: 0.7}, {Angle: 0.2}, {}},
			[]rigid.Coordinate{{Pos: 0.7, Vel: 2, Acc: -1}}, nil},
		{"lift", lift.Design, []rigid.Placement{{}, {Angle: 0.5}, {X: 0.4, Y: 0.3, Angle: -0.8}, {X: 0.9, Y: -0.2}, {X: 0.4, Y: 0.3, Angle: 1}},
			[]rigid.Coordinate{{Pos: 0.52, Vel: 0.2, Acc: -0.1}}, nil},
		{"parallelogram", parallelogram(0.1, 0.3), []rigid.Placement{{}, {Angle: 0.9}, {X: 0.06, Y: 0.08}, {X: 0.3, Angle: 0.9}},
			[]rigid.Coordinate{{Pos: 0.9, Vel: 2, Acc: 1}}, nil},
	}
}

func TestSensitivityMachines(t *testing.T) {
	for _, m := range machines() {
		_, st := assemble(t, m.d, m.guess, m.in...)
		if m.by == nil {
			m.by = each(m.d)
		}
		compare(t, m.name, m.d, st, m.by, 1e-4*size(m.d))
		if m.name == "geared five-bar" { // radii act over all turns made
			m.in[0].Pos += 6 * math.Pi
			if err := st.Move(m.in...); err != nil {
				t.Fatal(err)
			}
			compare(t, m.name+", three turns on", m.d, st, m.by, 1e-5*size(m.d))
		}
	}
	for _, w := range swaps() {
		easy, hard := w.linkages(t)
		guess := w.guess
		if w.from == w.to { // as it was drawn
			drive := easy.Design().Drives[0].(Turn)
			w.from = guess[drive.Of].Angle - guess[drive.From].Angle
			w.to = w.from + 0.4
		}
		st, err := easy.Assemble(guess, rigid.Coordinate{Pos: w.from + 0.3*(w.to-w.from), Vel: 1, Acc: 0.5})
		if err != nil {
			t.Fatal(err)
		}
		d := hard.Design()
		st, err = hard.Assemble(poses(st, Link(len(d.Links))), value(st, w.hard))
		if err != nil {
			t.Fatal(w.name, err)
		}
		all := each(d)
		if testing.Short() {
			all = all[:8]
		}
		compare(t, w.name, d, st, all, 1e-4)
	}
}
