package planar_test

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A swap is a linkage driven in two ways: so that it is solved dyad by dyad, and so
// that a group of higher class is left.
type swap struct {
	name     string
	design   Design
	hard     Drive
	guess    []rigid.Placement
	from, to float64 // of the drive of the design
	groups   string  // by the other
}

func (w *swap) linkages(t testing.TB) (easy, hard *Linkage) {
	if w.from == w.to { // as it was drawn
		first := w.design.Drives[0].(Turn)
		w.from = w.guess[first.Of].Angle - w.guess[first.From].Angle
		w.to = w.from + 0.4
	}
	easy, err := New(w.design)
	if err != nil {
		t.Fatalf("%s: %v", w.name, err)
	}
	d := w.design
	d.Drives = []Drive{w.hard}
	hard, err = New(d)
	if err != nil {
		t.Fatalf("%s: %v", w.name, err)
	}
	return easy, hard
}

// value returns what a drive is in a position.
func value(s *State, d Drive) rigid.Coordinate {
	switch d := d.(type) {
	case Turn:
		return s.Turn(d.Of, d.From)
	case Slide:
		return s.Slide(d.Of, d.From)
	case Reach:
		a, b := s.Point(d.A), s.Point(d.B)
		r, v, c := r2.Sub(b.Pos, a.Pos), r2.Sub(b.Vel, a.Vel), r2.Sub(b.Acc, a.Acc)
		l := r2.Norm(r)
		lv := r2.Dot(r, v) / l
		return rigid.Coordinate{Pos: l, Vel: lv, Acc: (r2.Dot(r, c) + r2.Dot(v, v) - lv*lv) / l}
	}
	return rigid.Coordinate{}
}

// sixBar is a six-bar of Stephenson's third kind, driven by its crank.
func sixBar() Design {
	var p plan
	l := p.links("crank", "plate", "rocker", "rod", "far rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(1.1, 0), l[1].At(0, 0))
	p.pin(l[1].At(3.5, 0), l[2].At(2.7, 0))
	p.pin(Frame.At(4, 0.3), l[2].At(0, 0))
	p.pin(l[1].At(1.9, 1.2), l[3].At(0, 0))
	p.pin(l[3].At(4.2, 0), l[4].At(2.6, 0))
	p.pin(Frame.At(5.6, 3), l[4].At(0, 0))
	p.turn(l[0], Frame)
	return p.Design
}

func swaps() []swap {
	deg := rigid.Degree
	steph := sixBar()
	stephGuess := []rigid.Placement{{}, {Angle: 1}, {X: 0.59, Y: 0.93, Angle: 0.5}, {X: 4, Y: 0.3, Angle: 1.7}, {X: 1.7, Y: 2.9, Angle: 0.3}, {X: 5.6, Y: 3, Angle: 1.5}}

	lift := scissor(3)
	liftGuess := scissorGuess(3, 0.6)

	line := peaucellier("QB")
	var lineGuess []rigid.Placement
	{
		// O = (0, 0), Q = (1.2, 0); A and C mirror each other in the line O–B
		th := 0.9
		b := r2.Vec{X: 1.2 + 1.2*math.Cos(th), Y: 1.2 * math.Sin(th)}
		ob, dir := r2.Norm(b), math.Atan2(b.Y, b.X)
		foot := (25 - 9 + ob*ob) / 2 / ob
		half := math.Acos(foot / 5)
		at := func(angle float64) r2.Vec { return r2.Vec{X: 5 * math.Cos(angle), Y: 5 * math.Sin(angle)} }
		pa, pc := at(dir+half), at(dir-half)
		d := r2.Scale(16/ob/ob, b)
		bar := func(p, q r2.Vec) rigid.Placement {
			return rigid.Placement{X: p.X, Y: p.Y, Angle: math.Atan2(q.Y-p.Y, q.X-p.X)}
		}
		o := r2.Vec{}
		lineGuess = []rigid.Placement{{}, {X: 1.2, Angle: th}, bar(o, pa), bar(pa, b), bar(o, pc), bar(b, pc), bar(pc, d), bar(d, pa)}
	}

	// rolled is a lever on which the end of a rod rolls: gear on the rod's end, rack
	// on the lever, its centre held by a slot.
	var rolled plan
	{
		l := rolled.links("crank", "rod", "lever")
		rolled.pin(Frame.At(0, 0), l[0].At(0, 0))
		rolled.pin(l[0].At(0.3, 0), l[1].At(0, 0))
		rolled.pin(Frame.At(1.5, -0.4), l[2].At(0, 0))
		rolled.slot(l[1].At(1.2, 0), l[2].Line(0, 0.2, 0))
		rolled.Joints = append(rolled.Joints, RackPair{Pinion: l[1].At(1.2, 0), Rack: l[2].Line(0, 0, 0), Radius: 0.2, AsAssembled: true})
		rolled.turn(l[1], l[2])
	}
	rolledGuess := []rigid.Placement{{}, {Angle: 0.7}, {X: 0.23, Y: 0.19, Angle: 0.2}, {X: 1.5, Y: -0.4, Angle: 1.8}}

	// double has the crank of one six-bar as the far rocker of another.
	double := Design{Links: append([]string{}, steph.Links...), Joints: append([]Joint{}, steph.Joints...), Drives: nil}
	doubleGuess := append([]rigid.Placement{}, stephGuess...)
	{
		p := plan{double}
		l := p.links("crank'", "plate'", "rocker'", "rod'")
		// its pivots lie so that it stands as the first one does, turned and moved
		put := rigid.NewPose(0, 0, 1-1.4876).Compose(rigid.NewPose(5.6, 3, 0).Inverse())
		at := func(x, y float64) Attachment {
			q := put.Point(r2.Vec{X: x, Y: y})
			return Frame.At(q.X, q.Y)
		}
		p.pin(at(0, 0), l[0].At(0, 0))
		p.pin(l[0].At(1.1, 0), l[1].At(0, 0))
		p.pin(l[1].At(3.5, 0), l[2].At(2.7, 0))
		p.pin(at(4, 0.3), l[2].At(0, 0))
		p.pin(l[1].At(1.9, 1.2), l[3].At(0, 0))
		p.pin(l[3].At(4.2, 0), Link(1).At(2.6, 0))
		for _, g := range stephGuess[1:5] {
			q := put.Compose(g.Pose())
			doubleGuess = append(doubleGuess, rigid.Placement{X: q.Origin.X, Y: q.Origin.Y, Angle: q.Angle()})
		}
		p.turn(l[0], Frame)
		double = p.Design
	}

	return []swap{
		{"Stephenson III driven at its far rocker", steph, Turn{Of: 5, From: Frame}, stephGuess, 1, 2.1, "far rocker | crank+plate+rocker+rod 3"},
		{"Stephenson III driven between rod and plate", steph, Turn{Of: 4, From: 2}, stephGuess, 1, 1.5, ""},
		{"scissor lift on a cylinder", lift, Reach{A: Link(1).At(-0.3, 0), B: Link(6).At(0.2, 0)}, liftGuess, 0.6, 1.1, ""},
		{"scissor lift on a slanting cylinder", lift, Reach{A: Link(1).At(0.1, -0.05), B: Link(5).At(0.2, 0.03)}, liftGuess, 0.6, 0.9, ""},
		{"Peaucellier driven at the output", line, Slide{Of: Link(6).Line(3, 0, 0), From: Frame.Line(0, 0, math.Pi/2)}, lineGuess, 0.9, 40 * deg, ""},
		{"rod that rolls on a lever", rolled.Design, Turn{Of: 1, From: Frame}, rolledGuess, 0, 0, ""},
		{"six-bar on a six-bar", double, Turn{Of: 5, From: Frame}, doubleGuess, 1, 1.3, ""},
	}
}

// TestSwaps moves linkages dyad by dyad, and at each step as groups of higher class:
// they must be in one place with the same velocities and accelerations.
func TestSwaps(t *testing.T) {
	random := rand.New(rand.NewPCG(2, 9))
	for _, w := range swaps() {
		easy, hard := w.linkages(t)
		if !higher(hard) {
			t.Errorf("%s: no group of higher class", w.name)
		}
		if g := groups(hard); w.groups != "" && g != w.groups {
			t.Errorf("%s: groups %s", w.name, g)
		}
		truth, err := easy.Assemble(w.guess, rigid.Coordinate{Pos: w.from})
		if err != nil {
			t.Errorf("%s: %v", w.name, err)
			continue
		}
		rough := poses(truth, Link(len(w.guess)))
		for i := range rough {
			rough[i].X += 0.03 * random.NormFloat64()
			rough[i].Y += 0.03 * random.NormFloat64()
			rough[i].Angle += 0.03 * random.NormFloat64()
		}
		if strings.Contains(w.name, "rolls") {
			rough = poses(truth, Link(len(w.guess))) // which reads the phase
		}
		s, err := hard.Assemble(rough, value(truth, w.hard))
		if err != nil {
			t.Errorf("%s: %v", w.name, err)
			continue
		}
		worst, least := 0.0, 1.0
		const steps = 60
		for k := range 2 * steps { // there and back
			in := rigid.Coordinate{Pos: w.from + (w.to-w.from)*float64(min(k, 2*steps-k))/steps, Vel: 3, Acc: -5}
			if err := truth.Move(in); err != nil {
				t.Fatalf("%s, %v: %v", w.name, in.Pos, err)
			}
			if err := s.Move(value(truth, w.hard)); err != nil {
				t.Fatalf("%s, %v: %v", w.name, in.Pos, err)
			}
			_, speed, surge := scales(easy, truth, []rigid.Coordinate{in})
			least = math.Min(least, s.Margin())
			for l := range Link(len(w.guess)) {
				a, b := truth.Motion(l), s.Motion(l)
				for _, off := range []float64{
					r2.Norm(r2.Sub(a.Pose.Origin, b.Pose.Origin)), r2.Norm(r2.Sub(a.Pose.Axis, b.Pose.Axis)),
					r2.Norm(r2.Sub(a.Vel, b.Vel)) / speed, (a.Omega - b.Omega) / speed,
					r2.Norm(r2.Sub(a.Acc, b.Acc)) / surge, (a.Alpha - b.Alpha) / surge,
				} {
					worst = math.Max(worst, math.Abs(off)*s.Margin())
					if !(math.Abs(off)*s.Margin() < 2e-12) {
						t.Fatalf("%s, %v: link %d off by %v at margin %.2g:\n%+v\n%+v", w.name, in.Pos, l, off, s.Margin(), *a, *b)
					}
				}
			}
		}
		t.Logf("%s: %s: worst %.2g/margin, least margin %.2g", w.name, groups(hard), worst, least)
	}
}

func poses(st *State, n Link) []rigid.Placement {
	p := make([]rigid.Placement, n)
	for i := range p {
		m := st.Motion(Link(i))
		p[i] = rigid.Placement{X: m.Pose.Origin.X, Y: m.Pose.Origin.Y, Angle: m.Pose.Angle()}
	}
	return p
}

func higher(l *Linkage) bool {
	for _, g := range l.Groups() {
		if g.Class > 2 {
			return true
		}
	}
	return false
}
