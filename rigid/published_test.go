package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// near fails where got is not want to a relative or absolute tol.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*max(1, math.Abs(want))) {
		t.Errorf("%s: %.17g, want %.17g", what, got, want)
	}
}

// Motion along a turning radius. T. Bevan, The Theory of Machines, chapter 3,
// example 6, as given in the FOSSEE textbook companion: 22.4 ft/s². J. L. Meriam and
// L. G. Kraige, Dynamics, slotted disk (from memory): 25 in/s². A quiz item,
// bissoy.com/mcq/376713: Coriolis 60 m/s² at 20 rad/s and 1.5 m/s.
func TestPublishedCoriolis(t *testing.T) {
	arm := rigid.Motion{Omega: 2, Alpha: 5}
	a := arm.Carry(rigid.Point{Pos: r2.Vec{X: 2}, Vel: r2.Vec{X: 3}, Acc: r2.Vec{X: 4}}).Acc
	near(t, "stated 22.4", r2.Norm(a), math.Sqrt(500), 1e-15)
	near(t, "stated 22.4, as printed", math.Round(r2.Norm(a)*10)/10, 22.4, 1e-15)

	disk := rigid.Motion{Omega: 4, Alpha: -10}
	a = disk.Carry(rigid.Point{Pos: r2.Vec{X: 6}, Vel: r2.Vec{X: 5}, Acc: r2.Vec{X: 81}}).Acc
	near(t, "stated 25", r2.Norm(a), 25, 1e-15)

	rod := rigid.Motion{Omega: 20}
	c := rod.AccelerationTerms(rigid.Point{Vel: r2.Vec{X: 1.5}}).Coriolis
	near(t, "stated 60", r2.Norm(c), 60, 1e-15)
}

// An engine whose cylinders turn about a crank that is fixed: crank 3 in, rod 9 in,
// 1200 rpm, crank at 55° from the cylinder line. Bevan, chapter 3, example 8, has 30.9
// ft/s, 7764 ft/s², 1698 ft/s², 150 rad/s and 4369 rad/s², scaled off a drawing; the
// figures here are worked out with 60 digits from the closure equations.
func TestPublishedTurningCylinder(t *testing.T) {
	const w = 40 * math.Pi
	cylinder := rigid.Motion{Omega: w}
	// the crank pin, as seen from the cylinder
	s, c := math.Sincos(55 * rigid.Degree)
	pin := cylinder.Observe(rigid.Point{Pos: r2.Vec{X: 3 * c, Y: 3 * s}})
	piston := r2.Vec{X: 3*c + math.Sqrt(81-9*s*s)}
	rod, slide, err := rigid.Guided(pin, piston, r2.Vec{X: 1})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "sliding speed, ft/s", slide.Vel/12, 30.848995133462479684, 1e-14)
	near(t, "sliding acceleration, ft/s²", math.Abs(slide.Acc)/12, 1832.7859722718887872, 1e-14)
	coriolis := cylinder.AccelerationTerms(rigid.Point{Pos: piston, Vel: r2.Vec{X: slide.Vel}}).Coriolis
	near(t, "Coriolis, ft/s²", r2.Norm(coriolis)/12, 7753.1981185530407496, 1e-14)
	whole := cylinder.Compose(&rod)
	near(t, "rod, rad/s", math.Abs(whole.Omega), 150.63867739102727278, 1e-14)
	near(t, "rod, rad/s²", math.Abs(whole.Alpha), 4305.1246361251290297, 1e-14)
}

// A slider-crank, crank 150 mm, rod 600 mm, 300 rpm clockwise. R. S. Khurmi and J. K.
// Gupta, Theory of Machines, example 8.1, read at mechdiploma.com: the middle of the
// rod has 117 m/s²; the other figures are worked out with 60 digits.
func TestPublishedRod(t *testing.T) {
	crank := rigid.Motion{Pose: rigid.NewPose(0, 0, -45*rigid.Degree), Omega: -300 * rigid.RPM}
	pin := crank.At(r2.Vec{X: 0.15})
	slider := r2.Vec{X: pin.Pos.X + math.Sqrt(0.36-pin.Pos.Y*pin.Pos.Y)}
	rod, slide, err := rigid.Guided(pin, slider, r2.Vec{X: 1})
	if err != nil {
		t.Fatal(err)
	}
	middle := rod.At(r2.Vec{X: 0.3})
	near(t, "stated 117", math.Round(r2.Norm(middle.Acc)), 117, 0)
	near(t, "middle, m/s²", r2.Norm(middle.Acc), 117.31042577013006153, 1e-14)
	near(t, "middle, m/s", r2.Norm(middle.Vel), 3.995358107874296511, 1e-14)
	near(t, "rod, rad/s", rod.Omega, 5.6424669739309203009, 1e-14)
	near(t, "rod, rad/s²", rod.Alpha, -171.54515606539752209, 1e-14)
	near(t, "slider, m/s", slide.Vel, -3.9306362026019285176, 1e-14)
	near(t, "slider, m/s²", slide.Acc, -105.28946671025092897, 1e-14)
	end := rod.At(r2.Vec{X: 0.6})
	near(t, "slider across the guide, m/s", end.Vel.Y, 0, 1e-14)
	near(t, "slider across the guide, m/s²", end.Acc.Y, 0, 1e-13)
}

// Rolling without slip: the particle in contact is accelerated towards the centre
// by ω²r on a line (University of Illinois dynamics reference,
// dynref.engr.illinois.edu/rko.html), by ω²rR/(R ± r) on a circle of radius R
// (Euler–Savary, from memory), whatever α is.
func TestPublishedRolling(t *testing.T) {
	const r, w, al = 0.3, 4, -7
	for _, c := range []struct {
		ground     string
		bend, want float64 // curvature of the centre's path, 1/m, upward positive
	}{
		{"line", 0, 4.8},
		{"outside a circle of 0.5 m", -1 / (0.5 + r), 3},
		{"inside a circle of 0.5 m", 1 / (0.5 - r), 12},
	} {
		wheel := rigid.Motion{
			Pose: rigid.NewPose(0, r, 0.8), Vel: r2.Vec{X: -w * r}, Acc: r2.Vec{X: -al * r, Y: c.bend * w * r * w * r},
			Omega: w, Alpha: al,
		}
		contact := wheel.At(wheel.Pose.Local(r2.Vec{}))
		near(t, c.ground+": speed", r2.Norm(contact.Vel), 0, 1e-15)
		near(t, c.ground+": along", contact.Acc.X, 0, 1e-15)
		near(t, c.ground+": stated", contact.Acc.Y, c.want, 1e-15)
		pole, err := wheel.Pole()
		if err != nil || r2.Norm(pole) > 1e-16 {
			t.Errorf("%s: pole %v, %v; want the contact point", c.ground, pole, err)
		}
	}
}

// A circle that rolls inside one of twice its size: its rim moves along straight
// lines. mathworld.wolfram.com/TusiCouple.html; the rates are worked out with 60
// digits. So the inflection circle is the rolling circle itself.
func TestPublishedCardanCircles(t *testing.T) {
	arm := rigid.Motion{Pose: rigid.NewPose(0, 0, 0.7), Omega: 3}
	onArm := rigid.Motion{Pose: rigid.NewPose(0.5, 0, -2*0.7), Omega: -2 * 3}
	circle := arm.Compose(&onArm)
	p := circle.At(r2.Vec{X: 0.5})
	near(t, "stated: y stays 0", p.Pos.Y, 0, 1e-15)
	near(t, "x", p.Pos.X, 0.76484218728448842626, 1e-15)
	near(t, "x, m/s", p.Vel.X, -1.932653061713073161, 1e-15)
	near(t, "x, m/s²", p.Acc.X, -6.8835796855603958363, 1e-14)
	near(t, "y, m/s", p.Vel.Y, 0, 1e-15)
	near(t, "y, m/s²", p.Acc.Y, 0, 1e-14)

	s, c := math.Sincos(0.7)
	got, err := circle.InflectionCircle()
	if err != nil {
		t.Fatal(err)
	}
	check(t, "inflection circle", rigid.Circle{Centre: r2.Vec{X: 0.5 * c, Y: 0.5 * s}, Radius: 0.5}, got, 1e-15)
	pole, err := circle.Pole()
	if err != nil {
		t.Fatal(err)
	}
	check(t, "pole", r2.Vec{X: c, Y: s}, pole, 1e-15)
}

// An ellipse trammel, half axes 0.5 and 0.2 m, rod at 35° and 2 rad/s: its pen draws
// (a cos φ, b sin φ), the textbook equation from memory; rates with 60 digits. The
// rod's end on the y axis is known, that on the x axis guided.
func TestPublishedTrammel(t *testing.T) {
	const a, b, w = 0.5, 0.2, 2
	s, c := math.Sincos(35 * rigid.Degree)
	end := rigid.Point{
		Pos: r2.Vec{Y: -(a - b) * s}, Vel: r2.Vec{Y: -(a - b) * c * w}, Acc: r2.Vec{Y: (a - b) * s * w * w},
	}
	rod, slide, err := rigid.Guided(end, r2.Vec{X: (a - b) * c}, r2.Vec{X: 1})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "rod, rad/s", rod.Omega, w, 1e-15)
	near(t, "rod, rad/s²", rod.Alpha, 0, 1e-14)
	near(t, "slide, m/s", slide.Vel, -(a-b)*s*w, 1e-15)
	near(t, "slide, m/s²", slide.Acc, -(a-b)*c*w*w, 1e-15)
	pen := rod.At(r2.Vec{X: a})
	near(t, "on the ellipse", pen.Pos.X*pen.Pos.X/a/a+pen.Pos.Y*pen.Pos.Y/b/b, 1, 1e-15)
	check(t, "pen", rigid.Point{
		Pos: r2.Vec{X: 0.40957602214449589484, Y: 0.11471528727020921922},
		Vel: r2.Vec{X: -0.57357643635104609611, Y: 0.32766081771559671587},
		Acc: r2.Vec{X: -1.6383040885779835794, Y: -0.45886114908083687689},
	}, pen, 1e-14)
}

// Instant centres of a four-bar, Aronhold–Kennedy: frame and crank 1, coupler and
// follower √2, crank at 90°. GATE ME 2019 (data quoted at me.gateoverflow.in, the key
// 0.79 from memory); exactly ω4/ω2 = (1+√3)/(2√3), with the centre of crank and
// follower at −(2+√3) on the frame line.
func TestPublishedInstantCentres(t *testing.T) {
	root3 := math.Sqrt(3)
	ratio := (1 + root3) / (2 * root3)
	crank := rigid.Motion{Omega: 1}
	follower := rigid.Motion{Pose: rigid.NewPose(1, 0, 0), Omega: ratio}
	near(t, "stated 0.79", math.Round(ratio*100)/100, 0.79, 1e-15)
	i24, err := rigid.RelativePole(&crank, &follower)
	if err != nil {
		t.Fatal(err)
	}
	check(t, "I24", r2.Vec{X: -(2 + root3)}, i24, 1e-14)
	// the coupler: origin at the crank pin, one more point at the follower pin
	const a, half = 1, math.Sqrt2 / 2 // the pins' line is square to AO4 at its middle
	pinA := r2.Vec{Y: a}
	height := math.Sqrt(2 - half*half)
	pinB := r2.Vec{X: 0.5 + height*half, Y: 0.5 + height*half}
	vB := r2.Sub(follower.At(follower.Pose.Local(pinB)).Vel, r2.Vec{X: -a})
	arm := r2.Sub(pinB, pinA)
	coupler := rigid.Motion{
		Pose: rigid.NewPose(pinA.X, pinA.Y, 0), Vel: r2.Vec{X: -a}, Omega: r2.Cross(arm, vB) / r2.Norm2(arm),
	}
	near(t, "ω3/ω2", coupler.Omega, 0.21132486540518711775, 1e-14)
	i13, err := coupler.Pole()
	if err != nil {
		t.Fatal(err)
	}
	check(t, "I13", r2.Vec{Y: -(2 + root3)}, i13, 1e-13)
}
