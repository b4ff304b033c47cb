package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/planar/planartest"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

func (p *plan) by(c Constraint) { p.Joints = append(p.Joints, Custom{By: c}) }

func mustNew(t testing.TB, d Design) *Linkage {
	t.Helper()
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func mustAssemble(t testing.TB, l *Linkage, guess []rigid.Placement, in ...rigid.Coordinate) *State {
	t.Helper()
	s, err := l.Assemble(guess, in...)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

var round = rigid.Interval{Hi: 2 * math.Pi}

// slotted is a crank whose coupler carries a curved slot, in which runs the pin of a
// rocker; straight is the same with a bar between slot centre and pin.
func slotted(t testing.TB) (slot, bar *Linkage, guess []rigid.Placement) {
	const crank, coupler, rocker, radius = 0.1, 0.3, 0.25, 0.12
	make := func(curved bool) Design {
		var p plan
		l := p.links("crank", "rocker", "coupler")
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.pin(Frame.At(0.4, 0.05), l[1].At(0, 0))
		if curved {
			// The slot is in the crank, about its end.
			p.Design = Design{}
			l = p.links("crank", "rocker")
			p.pin(Frame.At(0, 0), l[0].At(0, 0))
			p.pin(Frame.At(0.4, 0.05), l[1].At(0, 0))
			p.by(Roller{Centre: l[1].At(rocker, 0.02), On: Profile{On: l[0].Line(crank, 0.01, 0.7), Curve: Circle(coupler), Over: round, Closed: true}})
		} else {
			p.pin(l[0].At(crank, 0.01), l[2].At(0, 0))
			p.pin(l[1].At(rocker, 0.02), l[2].At(coupler, 0))
		}
		p.turn(l[0], Frame)
		return p.Design
	}
	guess = []rigid.Placement{{}, {}, {X: 0.4, Y: 0.05, Angle: 1.9}, {X: 0.1, Y: 0.01, Angle: 1}}
	return mustNew(t, make(true)), mustNew(t, make(false)), guess
}

// TestCircularSlot runs a pin in a circular slot beside the four-bar with a bar of
// the slot's radius in its place, over three turns both ways.
func TestCircularSlot(t *testing.T) {
	slot, bar, guess := slotted(t)
	a := mustAssemble(t, slot, guess[:3], at(0))
	b := mustAssemble(t, bar, guess, at(0))
	worst, turns := [3]float64{}, 0.0
	for k := range 600 {
		phi := 6 * math.Pi * math.Sin(float64(k)/100)
		in := rigid.Coordinate{Pos: phi, Vel: 2, Acc: -3}
		if err := errors.Join(a.Move(in), b.Move(in)); err != nil {
			t.Fatal(phi, err)
		}
		c, d := a.Turn(2, Frame), b.Turn(2, Frame)
		for i, off := range [3]float64{c.Pos - d.Pos, c.Vel - d.Vel, c.Acc - d.Acc} {
			worst[i] = max(worst[i], math.Abs(off))
		}
		turns = max(turns, math.Abs(phi))
	}
	t.Logf("worst %.2g over %.1f rad", worst, turns)
	if worst[0] > 1e-14 || worst[1] > 1e-13 || worst[2] > 1e-12 {
		t.Errorf("off by %.2g", worst)
	}
}

// TestEllipticSlot runs a pin in an elliptic slot, driven by a rod, beside the trammel that
// draws the ellipse: of a rod whose two pins slide on the axes, the point at a and b
// from them goes along x = a cos φ, y = b sin φ.
func TestEllipticSlot(t *testing.T) {
	const a, b = 0.5, 0.2
	var p plan
	rod := p.links("rod")[0]
	p.slot(rod.At(a-b, 0), Frame.Line(0, 0, 0))
	p.by(Roller{Centre: rod.At(a, 0), On: Profile{On: Frame.Line(0, 0, 0), Curve: Ellipse(a, b), Over: round, Closed: true}})
	p.turn(rod, Frame)
	s := mustAssemble(t, mustNew(t, p.Design), []rigid.Placement{{}, {X: 0.01, Y: -0.11, Angle: 0.6}}, at(35*rigid.Degree))
	for k := range 400 {
		// Where the rod is upright, the pin goes along both slots, and two motions part.
		phi := 35*rigid.Degree + 0.9*math.Sin(0.02*float64(k))
		if err := s.Move(rigid.Coordinate{Pos: phi, Vel: 2}); err != nil {
			t.Fatal(phi, err)
		}
		end := s.Point(rod.At(a, 0))
		sin, cos := math.Sincos(phi)
		want := rigid.Point{Pos: r2.Vec{X: a * cos, Y: b * sin}, Vel: r2.Vec{X: -2 * a * sin, Y: 2 * b * cos}, Acc: r2.Vec{X: -4 * a * cos, Y: -4 * b * sin}}
		tol := 1e-13 / min(1, s.Margin())
		if r2.Norm(r2.Sub(end.Pos, want.Pos)) > tol || r2.Norm(r2.Sub(end.Vel, want.Vel)) > 10*tol || r2.Norm(r2.Sub(end.Acc, want.Acc)) > 100*tol/s.Margin() {
			t.Fatalf("at %v: %v, want %v, margin %v", phi, end, want, s.Margin())
		}
	}
}

// TestEccentric runs followers on a round cam beside what the trade takes for them:
// with a flat face, harmonic motion; with a roller, a slider-crank whose rod is as
// long as both radii.
func TestEccentric(t *testing.T) {
	const e, radius, roller = 0.02, 0.05, 0.015
	for _, left := range []bool{false, true} {
		var p plan
		l := p.links("cam", "flat", "arm", "rod", "slider")
		cam := Profile{On: l[0].Line(e, 0, 0.3), Curve: Circle(radius), Over: round, Closed: true}
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		up := math.Pi / 2
		p.guide(Frame.Line(0, 0, up), l[1].Line(0, 0, up))
		face := l[1].Line(0.01, 0, 0)
		if left {
			face = l[1].Line(0.01, 0, math.Pi)
		}
		p.by(FlatFace{Face: face, On: cam, Left: left})
		p.guide(Frame.Line(0.01, 0, up), l[2].Line(0, 0, up))
		p.by(Roller{Centre: l[2].At(0, 0), Radius: roller, On: cam})
		p.pin(l[0].At(e, 0), l[3].At(0, 0))
		p.pin(l[3].At(radius+roller, 0), l[4].At(0, 0))
		p.guide(Frame.Line(0.01, 0, up), l[4].Line(0, 0, up))
		p.turn(l[0], Frame)
		link := mustNew(t, p.Design)
		s := mustAssemble(t, link, []rigid.Placement{{}, {}, {Y: 0.05}, {X: 0.01, Y: 0.06}, {X: 0.02, Angle: up}, {X: 0.01, Y: 0.06}}, at(0))
		for k := range 300 {
			phi := float64(k) * 0.1
			in := rigid.Coordinate{Pos: phi, Vel: 3, Acc: 5}
			if err := s.Move(in); err != nil {
				t.Fatal(err)
			}
			sin, cos := math.Sincos(phi)
			want := rigid.Coordinate{Pos: e*sin + radius, Vel: 3 * e * cos, Acc: e * (5*cos - 9*sin)}
			got := s.Slide(l[1].Line(0, 0, 0), Frame.Line(0, 0, up))
			follows(t, "flat", got, want, 1e-15, 1e-14, 1e-13)
			follows(t, "roller", s.Slide(l[2].Line(0, 0, 0), Frame.Line(0, 0, up)), s.Slide(l[4].Line(0, 0, 0), Frame.Line(0, 0, up)), 1e-15, 1e-14, 1e-13)
		}
	}
}

func follows(t *testing.T, what string, got, want rigid.Coordinate, pos, vel, acc float64) {
	t.Helper()
	if !(math.Abs(got.Pos-want.Pos) <= pos) || !(math.Abs(got.Vel-want.Vel) <= vel) || !(math.Abs(got.Acc-want.Acc) <= acc) {
		t.Errorf("%s: %v, want %v, off by %.2g %.2g %.2g", what, got, want, got.Pos-want.Pos, got.Vel-want.Vel, got.Acc-want.Acc)
	}
}

// TestOwnConstraints checks the package's own Constraints as their authors should.
func TestOwnConstraints(t *testing.T) {
	egg := Polar(func(in float64) (rigid.Coefficients, error) {
		sin, cos := math.Sincos(in)
		return rigid.Coefficients{In: in, Out: 0.1 + 0.01*cos + 0.004*math.Sin(2*in), First: -0.01*sin + 0.008*math.Cos(2*in), Second: -0.01*cos - 0.016*math.Sin(2*in)}, nil
	})
	cam := Profile{On: Link(3).Line(0.02, -0.01, 0.4), Curve: egg, Over: round, Closed: true}
	wavy := rigid.Law(func(in float64) (rigid.Coefficients, error) {
		return rigid.Coefficients{In: in, Out: math.Sin(in) + in*in, First: math.Cos(in) + 2*in, Second: 2 - math.Sin(in)}, nil
	})
	near := []rigid.Placement{{X: 0.3, Y: 0.1, Angle: 1}, {X: 0.5, Y: 0.1, Angle: -1}}
	for name, k := range map[string]struct {
		c Constraint
		s planartest.Settings
	}{
		"pin":          {Roller{Centre: Link(2).At(0.03, 0.04), On: cam}, planartest.Settings{Near: []rigid.Placement{near[0], {X: 0.4, Y: 0.14, Angle: 2}}, Length: 0.1, Spread: 0.1}},
		"roller":       {Roller{Centre: Link(2).At(0.03, 0.04), Radius: 0.02, On: cam}, planartest.Settings{Near: near, Length: 0.1}},
		"roller, left": {Roller{Centre: Link(2).At(0.03, 0.04), Radius: 0.02, On: cam, Left: true}, planartest.Settings{Near: []rigid.Placement{near[0], {X: 0.35, Y: 0.15}}, Length: 0.1, Spread: 0.02}},
		"flat":         {FlatFace{Face: Link(1).Line(0.03, 0.04, 0.8), On: cam}, planartest.Settings{Near: near, Length: 0.1}},
		"flat, left":   {FlatFace{Face: Link(1).Line(0.03, 0.04, 0.8), On: cam, Left: true}, planartest.Settings{Near: near, Length: 0.1}},
		"turns":        {Follower{Of: Turn{1, 2}, Cam: Turn{3, 2}, By: wavy}, planartest.Settings{Near: make([]rigid.Placement, 3), Spread: 0.4}},
		"slide":        {Follower{Of: Slide{Link(1).Line(0.1, 0.2, 0.3), Link(4).Line(-0.1, 0, 2)}, Cam: Turn{3, 4}, By: wavy}, planartest.Settings{}},
		"reach":        {Follower{Of: Turn{1, 2}, Cam: Reach{Link(3).At(1, 0), Link(1).At(0, 2)}, By: wavy}, planartest.Settings{Near: []rigid.Placement{{}, {}, {X: 3}}}},
		"frame":        {Follower{Of: Slide{Link(1).Line(0.1, 0.2, 0.3), Frame.Line(-0.1, 0, 2)}, Cam: Turn{3, Frame}, By: wavy}, planartest.Settings{}},
	} {
		if err := planartest.Check(k.c, k.s); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// TestCrossing runs a pin through the crossing of a slot in the shape of an eight,
// by steps of all sizes both ways: it stays on its strand.
func TestCrossing(t *testing.T) {
	const a, b = 0.3, 0.1
	eight := Curve(func(t float64) rigid.Point {
		sin, cos := math.Sincos(t)
		sin2, cos2 := math.Sincos(2 * t)
		return rigid.Point{
			Pos: r2.Vec{X: a * sin, Y: b * sin2},
			Vel: r2.Vec{X: a * cos, Y: 2 * b * cos2},
			Acc: r2.Vec{X: -a * sin, Y: -4 * b * sin2},
		}
	})
	var p plan
	l := p.links("carriage", "block")
	p.guide(Frame.Line(0, 0, 0), l[0].Line(0, 0, 0))
	p.guide(l[0].Line(0, 0, math.Pi/2), l[1].Line(0, 0, math.Pi/2))
	p.by(Roller{Centre: l[1].At(0, 0), On: Profile{On: Frame.Line(0, 0, 0), Curve: eight, Over: round, Closed: true}})
	p.slide(l[0].Line(0, 0, 0), Frame.Line(0, 0, 0))
	k := mustNew(t, p.Design)
	for _, strand := range []float64{1, -1} {
		s := mustAssemble(t, k, []rigid.Placement{{}, {X: -0.2}, {X: -0.2, Y: -strand * b}}, at(-0.2))
		for i := range 400 {
			// sin φ = x/a, and y = b sin 2φ on one strand, −b sin 2φ on the other
			phi := 1.2 * math.Sin(float64(i*i)*0.37)
			sin, cos := math.Sincos(phi)
			if err := s.Move(rigid.Coordinate{Pos: a * sin, Vel: 1}); err != nil {
				t.Fatal(phi, err)
			}
			y := s.Point(l[1].At(0, 0))
			if want := strand * b * math.Sin(2*phi); math.Abs(y.Pos.Y-want) > 1e-14 {
				t.Fatalf("strand %v at %v: %v, want %v", strand, phi, y.Pos.Y, want)
			}
			if want := strand * 2 * b * math.Cos(2*phi) / (a * cos); math.Abs(y.Vel.Y-want) > 1e-12 {
				t.Fatalf("strand %v at %v: speed %v, want %v", strand, phi, y.Vel.Y, want)
			}
		}
	}
}

// TestSizes runs one machine, a lever with a roller on an oval cam, in sizes from
// micrometres to kilometres, and far from the origin: the angles are the same.
func TestSizes(t *testing.T) {
	var first []rigid.Coordinate
	var margins []float64
	for _, size := range []float64{1, 1e-6, 1e-3, 1e3, 1e6} {
		var p plan
		l := p.links("cam", "lever", "rod", "rocker")
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.pin(Frame.At(0.2*size, 0.03*size), l[1].At(0, 0))
		p.by(Roller{Centre: l[1].At(0.17*size, 0), Radius: 0.02 * size, On: Profile{On: l[0].Line(0.01*size, 0, 0), Curve: Ellipse(0.06*size, 0.04*size), Over: round, Closed: true}})
		p.by(Follower{Of: Turn{l[3], Frame}, Cam: Turn{l[2], Frame}, By: rigid.Linear(-0.5, -0.13)})
		p.pin(l[1].At(0.1*size, 0.1*size), l[2].At(0, 0))
		p.pin(Frame.At(0.5*size, 0), l[3].At(0, 0))
		p.turn(l[0], Frame)
		p.slot(l[2].At(0.7*size, 0), l[3].Line(0, 0, 0))
		s := mustAssemble(t, mustNew(t, p.Design), []rigid.Placement{{}, {}, {X: 0.2 * size, Y: 0.03 * size, Angle: 2.6}, {X: 0.05 * size, Y: 0.05 * size, Angle: -0.1}, {X: 0.5 * size, Angle: -0.08}}, at(0))
		for i := range 60 {
			if err := s.Move(rigid.Coordinate{Pos: float64(i) * 0.2, Vel: 1, Acc: 1}); err != nil {
				t.Fatal(size, i, err)
			}
			if size == 1 {
				margins = append(margins, s.Margin())
			} else if m := s.Margin(); math.Abs(m-margins[i]) > 1e-9 {
				t.Fatalf("size %v, step %d: margin %v, want %v", size, i, m, margins[i])
			}
			for n, link := range []Link{l[1], l[2], l[3]} {
				c := s.Turn(link, Frame)
				if size == 1 {
					first = append(first, c)
					continue
				}
				w := first[3*i+n]
				if math.Abs(c.Pos-w.Pos) > 1e-13 || math.Abs(c.Vel-w.Vel) > 1e-12 || math.Abs(c.Acc-w.Acc) > 1e-10 {
					t.Fatalf("size %v, step %d, link %d: %v, want %v", size, i, link, c, w)
				}
			}
		}
	}
}
