package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A known value: a published figure's machine, recomputed with 60 digits from the
// closure equations. Stated is what the source prints, 0 where it prints none; digits
// is how finely.
type known struct {
	what           string
	got, want      float64
	stated, within float64
}

func check(t *testing.T, source string, values ...known) {
	t.Helper()
	for _, v := range values {
		if !(math.Abs(v.got-v.want) < 1e-13*(1+math.Abs(v.want))) {
			t.Errorf("%s: %s is %.17g, want %.17g", source, v.what, v.got, v.want)
		}
		if v.stated != 0 && !(math.Abs(v.got-v.stated) <= v.within) {
			t.Errorf("%s: %s is %v, %v is stated", source, v.what, v.got, v.stated)
		}
	}
}

func (p *plan) four(a, b, c float64, o4 r2.Vec) {
	l := p.links("crank", "coupler", "follower")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(a, 0), l[1].At(0, 0))
	p.pin(l[1].At(b, 0), l[2].At(c, 0))
	p.pin(Frame.At(o4.X, o4.Y), l[2].At(0, 0))
	p.turn(l[0], Frame)
}

func mode(t *testing.T, d Design, mode string, in ...rigid.Coordinate) *State {
	t.Helper()
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.AssembleMode(mode, in...)
	if err != nil {
		t.Fatal(err)
	}
	if s.Mode() != mode {
		t.Fatalf("assembled %s, not %s", s.Mode(), mode)
	}
	return s
}

// TestPublished holds planar linkages against published figures, those of the
// sources printed to few digits. Norton, Design of Machinery, examples 4-1, 6-7 and
// 7-1; Williams, mechanism notes; both from memory.
func TestPublished(t *testing.T) {
	var norton plan
	norton.four(0.040, 0.120, 0.080, r2.Vec{X: 0.100})
	in := rigid.Coordinate{Pos: 40 * rigid.Degree, Vel: 25, Acc: 15}
	s := mode(t, norton.Design, ".+", in)
	check(t, "Norton, open",
		known{"θ3, deg", s.Motion(2).Pose.Angle() / rigid.Degree, 20.2978827881964747, 20.298, 5e-4},
		known{"θ4, deg", s.Motion(3).Pose.Angle() / rigid.Degree, 57.324880070360794216, 57.325, 5e-4},
		known{"ω3", s.Motion(2).Omega, -4.1209144153476989463, -4.121, 5e-4},
		known{"ω4", s.Motion(3).Omega, 6.9979852421767748602, 6.998, 5e-4},
		known{"α3", s.Motion(2).Alpha, 296.08919317431022113, 296.089, 5e-4},
		known{"α4", s.Motion(3).Alpha, 470.1335302610225283, 470.134, 5e-4})
	s = mode(t, norton.Design, ".-", in)
	check(t, "Norton, crossed",
		known{"θ3, deg", s.Motion(2).Pose.Angle() / rigid.Degree, -60.977966795864430686, -60.98, 5e-3},
		known{"θ4, deg", s.Motion(3).Pose.Angle() / rigid.Degree, -98.004964078028750203, 0, 0},
		known{"ω3", s.Motion(2).Omega, -9.2587722995397417841, 0, 0},
		known{"ω4", s.Motion(3).Omega, -20.377671957064215591, 0, 0},
		known{"α3", s.Motion(2).Alpha, 597.62240007628099192, 0, 0},
		known{"α4", s.Motion(3).Alpha, 423.57806298956868474, 0, 0})

	var williams plan
	at := rigid.NewPose(0, 0, 10.3*rigid.Degree).Point(r2.Vec{X: 0.284})
	williams.four(0.076, 0.203, 0.178, at)
	s = mode(t, williams.Design, ".+", rigid.Coordinate{Pos: 30 * rigid.Degree, Vel: 20})
	p := rigid.NewPose(0, 0, 10*rigid.Degree).Point(r2.Vec{X: 0.127})
	c := s.Point(Link(2).At(p.X, p.Y))
	check(t, "Williams",
		known{"ω3", s.Motion(2).Omega, -8.0729875338567581674, -8.073, 5e-4},
		known{"ω4", s.Motion(3).Omega, -3.7287640625721245935, -3.729, 5e-4},
		known{"α3", s.Motion(2).Alpha, 7.9942149982543667587, 0, 0},
		known{"α4", s.Motion(3).Alpha, 243.01829219880464509, 0, 0},
		known{"x of P", c.Pos.X, 0.12173429848777287045, 0, 0},
		known{"y of P", c.Pos.Y, 0.15202789050069166936, 0, 0},
		known{"vx of P", c.Vel.X, 0.16054573852406730111, 0, 0},
		known{"vy of P", c.Vel.Y, 0.86494647356314168248, 0, 0},
		known{"ax of P", c.Acc.X, -30.882980327885922592, 0, 0},
		known{"ay of P", c.Acc.Y, -22.184546805333847326, 0, 0})
}

// TestPublishedPoles finds instantaneous centres of a four-bar with O4 = (1, 0), a =
// 1, b = c = √2 at 90° (GATE ME 2019, data at me.gateoverflow.in, key 0.79 from
// memory; Kennedy's theorem).
func TestPublishedPoles(t *testing.T) {
	var p plan
	p.four(1, math.Sqrt2, math.Sqrt2, r2.Vec{X: 1})
	s := mode(t, p.Design, ".+", unit(math.Pi/2))
	i24, err := s.Pole(1, 3)
	if err != nil {
		t.Fatal(err)
	}
	i13, err := s.Pole(2, Frame)
	if err != nil {
		t.Fatal(err)
	}
	check(t, "Kennedy",
		known{"ω4/ω2", s.Motion(3).Omega, 0.78867513459481288225, 0.79, 5e-3},
		known{"ω3/ω2", s.Motion(2).Omega, 0.21132486540518711775, 0, 0},
		known{"x of I24", i24.X, -3.7320508075688772935, 0, 0},
		known{"y of I24", i24.Y, 0, 0, 0},
		known{"y of I13", i13.Y, -3.7320508075688772935, 0, 0},
		known{"x of I13", i13.X, 0, 0, 0})
	if _, err := s.Pole(1, 9); err != rigid.ErrInput {
		t.Errorf("pole of a link that doesn't exist: %v", err)
	}
}

// TestPublishedSliders: a slider-crank at 300 rpm (Khurmi and Gupta, example 8.1, at
// mechdiploma.com), and an offset one (GATE ME 2025 Q60 at examprev.com).
func TestPublishedSliders(t *testing.T) {
	slider := func(r, l, e float64) Design {
		var p plan
		k := p.links("crank", "rod", "ram")
		p.pin(Frame.At(0, 0), k[0].At(0, 0))
		p.pin(k[0].At(r, 0), k[1].At(0, 0))
		p.pin(k[1].At(l, 0), k[2].At(0, 0))
		p.guide(Frame.Line(0, e, 0), k[2].Line(0, 0, 0))
		p.turn(k[0], Frame)
		return p.Design
	}
	s := mode(t, slider(0.15, 0.6, 0), ".+", rigid.Coordinate{Pos: -math.Pi / 4, Vel: -10 * math.Pi})
	mid := s.Point(Link(2).At(0.3, 0))
	check(t, "Khurmi and Gupta 8.1",
		known{"|a| of the middle", r2.Norm(mid.Acc), 117.31042577013006153, 117, 0.5},
		known{"|v| of the middle", r2.Norm(mid.Vel), 3.995358107874296511, 0, 0},
		known{"ẋ", s.Motion(3).Vel.X, -3.9306362026019285176, 0, 0},
		known{"ẍ", s.Motion(3).Acc.X, -105.28946671025092897, 0, 0},
		known{"ω3", s.Motion(2).Omega, 5.6424669739309203009, 0, 0},
		known{"α3", s.Motion(2).Alpha, -171.54515606539752209, 0, 0})
	s = mode(t, slider(30, 50, 10), ".+", rigid.Coordinate{Pos: math.Pi / 3, Vel: 10})
	check(t, "offset",
		known{"x", s.Motion(3).Pose.Origin.X, 62.377370571515080527, 0, 0},
		known{"ẋ", s.Motion(3).Vel.X, -310.40380847357957676, 0, 0},
		known{"ẍ", s.Motion(3).Acc.X, -1152.5922921692147328, 0, 0},
		known{"ω3", s.Motion(2).Omega, -3.1660684877726246361, 0, 0},
		known{"α3", s.Motion(2).Alpha, 51.45674374943023819, 0, 0})
	for turn, x := range map[float64]float64{0.12532783116806539687: 79.37, 3.6651914291880921115: 17.32} {
		if err := s.Move(at(turn)); err != nil {
			t.Fatal(err)
		}
		if got := s.Motion(3).Pose.Origin.X; math.Abs(got-x) > 5e-3 {
			t.Errorf("offset: limit %v, %v is stated", got, x)
		}
	}
}

// TestPublishedCoriolis: the crank-shaper of Bevan, The Theory of Machines, chapter 3
// example 7 (data in FOSSEE's textbook companions), in inches. The pin runs in the
// lever's slot; its acceleration is taken apart in the lever.
func TestPublishedCoriolis(t *testing.T) {
	var p plan
	l := p.links("crank", "lever")
	p.pin(Frame.At(8, 0), l[0].At(0, 0))
	p.pin(Frame.At(0, 0), l[1].At(0, 0))
	p.slot(l[0].At(4, 0), l[1].Line(0, 0, 0))
	p.turn(l[0], Frame)
	s := mode(t, p.Design, ".+", rigid.Coordinate{Pos: math.Pi / 3, Vel: 2 * math.Pi})
	slide := s.Slide(l[0].Line(4, 0, 0), l[1].Line(0, 0, 0))
	terms, end := s.AccelerationTerms(l[0].At(4, 0), l[1]), s.Point(l[1].At(15, 0))
	check(t, "Bevan",
		known{"ρ", slide.Pos, 10.583005244258362362, 10.6, 0.05},
		known{"ω4", s.Motion(2).Omega, 1.795195802051310422, 0, 0},
		known{"α4", s.Motion(2).Alpha, -4.1864464342756332526, 0, 0},
		known{"ρ̇", slide.Vel, -16.453241300334180896, 0, 0},
		known{"ρ̈", slide.Acc, -85.265367457538037454, 0, 0},
		known{"Coriolis x", terms.Coriolis.X, 19.336367806215886274, 0, 0},
		known{"Coriolis y", terms.Coriolis.Y, -55.819285790341776701, 0, 0},
		known{"relative", r2.Norm(terms.Relative), 85.265367457538037454, 0, 0},
		known{"vx of the end", end.Vel.X, -8.8142364108933111941, 0, 0},
		known{"vy of the end", end.Vel.Y, 25.444508822651270331, 0, 0},
		known{"ax of the end", end.Acc.X, -25.122831483024600321, 0, 0},
		known{"ay of the end", end.Acc.Y, -75.160580964836537198, 0, 0})
	if sum, a := terms.Sum(), s.Point(l[0].At(4, 0)).Acc; !(r2.Norm(r2.Sub(sum, a)) < 1e-12) {
		t.Errorf("the terms make %v of %v", sum, a)
	}
	v := s.VelocityTerms(l[0].At(4, 0), l[1])
	if sum, a := v.Sum(), s.Point(l[0].At(4, 0)).Vel; !(r2.Norm(r2.Sub(sum, a)) < 1e-12) || !(math.Abs(r2.Norm(v.Relative)-16.453241300334180896) < 1e-12) {
		t.Errorf("the terms %+v make %v of %v", v, sum, a)
	}
}

// TestPublishedSlides: Scotch yoke (simple harmonic motion), Oldham coupling (Khurmi
// and Gupta, from memory: shafts 18 mm apart at 160 rpm slide at 0.302 m/s), ellipse
// trammel (closed form, from memory).
func TestPublishedSlides(t *testing.T) {
	s := mode(t, scotchYoke(), "..", rigid.Coordinate{Pos: math.Pi / 3, Vel: 300 * rigid.RPM, Acc: 30})
	check(t, "yoke",
		known{"x", s.Motion(3).Pose.Origin.X, 0.025, 0, 0},
		known{"ẋ", s.Motion(3).Vel.X, -1.3603495231756633879, 0, 0},
		known{"ẍ", s.Motion(3).Acc.X, -25.973049108400054517, 0, 0})
	o := mode(t, oldham(), "..", rigid.Coordinate{Vel: 160 * rigid.RPM})
	peak := 0.0
	for k := range 361 {
		if err := o.Move(rigid.Coordinate{Pos: float64(k) * rigid.Degree, Vel: 160 * rigid.RPM}); err != nil {
			t.Fatal(err)
		}
		peak = max(peak, math.Abs(o.Slide(Link(2).Line(0, 0, 0), Link(1).Line(0, 0, 0)).Vel))
	}
	check(t, "Oldham", known{"peak sliding", peak, 0.30159289474462015089, 0.302, 5e-4})

	var p plan
	rod := p.Link("rod")
	p.slot(rod.At(0, 0), Frame.Line(0, 0, math.Pi/2)) // on the y axis
	p.slot(rod.At(0.3, 0), Frame.Line(0, 0, 0))       // on the x axis, a − b away
	p.turn(rod, Frame)
	s = mode(t, p.Design, ".", rigid.Coordinate{Pos: -35 * rigid.Degree, Vel: -2})
	q := s.Point(rod.At(0.5, 0))
	check(t, "trammel",
		known{"x", q.Pos.X, 0.40957602214449589484, 0, 0},
		known{"y", -q.Pos.Y, 0.11471528727020921922, 0, 0},
		known{"vx", q.Vel.X, -0.57357643635104609611, 0, 0},
		known{"vy", -q.Vel.Y, 0.32766081771559671587, 0, 0},
		known{"ax", q.Acc.X, -1.6383040885779835794, 0, 0},
		known{"ay", -q.Acc.Y, -0.45886114908083687689, 0, 0})
}

// TestPublishedTrain: annulus 72 fixed, planets 20, sun 32, arm at 18 rpm (Khurmi and
// Gupta, example 13.6, at studylib.net): the sun at 58.5, the planets at −46.8 rpm.
func TestPublishedTrain(t *testing.T) {
	_, s := assemble(t, epicyclic(3, true), make([]rigid.Placement, 6), rigid.Coordinate{Pos: 0.4, Vel: 18 * rigid.RPM})
	check(t, "epicyclic",
		known{"sun", s.Motion(1).Omega / rigid.RPM, 58.5, 58.5, 1e-12},
		known{"planet", s.Motion(4).Omega / rigid.RPM, -46.8, -46.8, 1e-12})
	for k := range 200 {
		if err := s.Move(at(0.4 + float64(k)*0.2)); err != nil {
			t.Fatal(err)
		}
	}
	if got, want := s.Turn(1, Frame).Pos, 3.25*(0.4+0.2*199); !(math.Abs(got-want) < 1e-11) {
		t.Errorf("sun turned by %v, want %v", got, want)
	}
}
