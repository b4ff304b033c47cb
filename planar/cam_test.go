package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A rise is a law of rising motion from 0 to 1 over 0 to 1.
type rise struct {
	name              string
	law               rigid.Law
	speed, accelerate float64 // greatest, as published
}

// rises are laws of motion of the trade's handbooks: the cycloidal one,
//
//	s = x − sin(2πx)/2π
//
// and the polynomial with the powers 3, 4 and 5, s = 10x³ − 15x⁴ + 6x⁵. Their peaks are
// 2 and 2π = 6.283, and 15/8 = 1.875 and 10/√3 = 5.7735, as in H. A. Rothbart, Cams
// (1956), and Norton, Design of Machinery; from memory.
func rises() []rise {
	return []rise{
		{"cycloidal", func(x float64) (rigid.Coefficients, error) {
			sin, cos := math.Sincos(2 * math.Pi * x)
			return rigid.Coefficients{In: x, Out: x - sin/(2*math.Pi), First: 1 - cos, Second: 2 * math.Pi * sin}, nil
		}, 2, 2 * math.Pi},
		{"3-4-5", func(x float64) (rigid.Coefficients, error) {
			return rigid.Coefficients{In: x, Out: x * x * x * (10 - x*(15-6*x)), First: 30 * x * x * (1 - x) * (1 - x), Second: 60 * x * (1 - x*(3-2*x))}, nil
		}, 1.875, 10 / math.Sqrt(3)},
	}
}

// cycle is a cam's law over a turn: it rises over a third of it, dwells for a sixth,
// falls over a third and dwells.
func (r rise) cycle(low, high float64) rigid.Law {
	return func(in float64) (rigid.Coefficients, error) {
		const part = 2 * math.Pi / 3
		x := math.Mod(in, 2*math.Pi)
		if x < 0 {
			x += 2 * math.Pi
		}
		lift, sign := high-low, 1.0
		switch {
		case x < part:
		case x < 1.5*part:
			return rigid.Coefficients{In: in, Out: high}, nil
		case x < 2.5*part:
			x, sign = 2.5*part-x, -1
		default:
			return rigid.Coefficients{In: in, Out: low}, nil
		}
		k, err := r.law(x / part)
		return rigid.Coefficients{In: in, Out: low + lift*k.Out, First: sign * lift * k.First / part, Second: lift * k.Second / (part * part)}, err
	}
}

// levered is a press feeder's lever that follows a cam by a law.
func levered(t testing.TB, law rigid.Law) *Linkage {
	var p plan
	l := p.links("cam", "lever", "rod", "pusher")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0.2, 0), l[1].At(0, 0))
	p.by(Follower{Of: Turn{l[1], Frame}, Cam: Turn{l[0], Frame}, By: law})
	p.pin(l[1].At(0.15, 0), l[2].At(0, 0))
	p.pin(l[2].At(0.3, 0), l[3].At(0, 0))
	p.guide(Frame.Line(0, 0.15, 0), l[3].Line(0, 0, 0))
	p.turn(l[0], Frame)
	return mustNew(t, p.Design)
}

var leverGuess = []rigid.Placement{{}, {}, {X: 0.2, Angle: 1.2}, {X: 0.25, Y: 0.14}, {X: 0.55, Y: 0.15}}

// leverCam is a lever by a table of so many points of the cycloidal law.
func leverCam(t testing.TB, points int) *Linkage {
	law, err := tabled(rises()[0].cycle(1.2, 1.7), points)
	if err != nil {
		t.Fatal(err)
	}
	return levered(t, law)
}

func tabled(law rigid.Law, points int) (rigid.Law, error) {
	in, out := make([]float64, points), make([]float64, points)
	for i := range in {
		in[i] = 2 * math.Pi * float64(i) / float64(points)
		k, _ := law(in[i])
		out[i] = k.Out
	}
	return TableLaw(in, out, 2*math.Pi)
}

// TestCamLever drives a lever by a cam's law and by tables of it, over three turns
// both ways: by the law exactly so, by tables to the spline's order, and the peaks of speed and
// acceleration are those published.
func TestCamLever(t *testing.T) {
	const low, high, part = 1.2, 1.7, 2 * math.Pi / 3
	for _, r := range rises() {
		law := r.cycle(low, high)
		exact := mustAssemble(t, levered(t, law), leverGuess, at(0))
		var tables [2]*State
		for i, points := range [2]int{180, 720} {
			table, err := tabled(law, points)
			if err != nil {
				t.Fatal(err)
			}
			tables[i] = mustAssemble(t, levered(t, table), leverGuess, at(0))
		}
		speed, accelerate, off := 0.0, 0.0, [2][3]float64{}
		for k := range 1200 {
			phi := 6 * math.Pi * math.Sin(float64(k)*0.01)
			in := rigid.Coordinate{Pos: phi, Vel: 1}
			if err := exact.Move(in); err != nil {
				t.Fatal(phi, err)
			}
			want, _ := law(phi)
			got := exact.Turn(2, Frame)
			follows(t, r.name, got, rigid.Coordinate{Pos: want.Out, Vel: want.First, Acc: want.Second}, 1e-14, 1e-14, 1e-13)
			speed, accelerate = max(speed, math.Abs(got.Vel)), max(accelerate, math.Abs(got.Acc))
			for i, s := range tables {
				if err := s.Move(in); err != nil {
					t.Fatal(phi, err)
				}
				c := s.Turn(2, Frame)
				off[i][0] = max(off[i][0], math.Abs(c.Pos-got.Pos))
				off[i][1] = max(off[i][1], math.Abs(c.Vel-got.Vel))
				off[i][2] = max(off[i][2], math.Abs(c.Acc-got.Acc))
			}
		}
		lift := high - low
		if got := speed * part / lift; math.Abs(got-r.speed) > 1e-3 {
			t.Errorf("%s: peak of speed %v, published %v", r.name, got, r.speed)
		}
		if got := accelerate * part * part / lift; math.Abs(got-r.accelerate) > 5e-3 {
			t.Errorf("%s: peak of acceleration %v, published %v", r.name, got, r.accelerate)
		}
		t.Logf("%s: tables of 180 and 720 points are off by %.2g", r.name, off)
		for i, most := range [2][3]float64{{2e-6, 2e-4, 2e-2}, {3e-8, 1e-5, 5e-3}} {
			for n := range most {
				if off[i][n] > most[n] {
					t.Errorf("%s: table %d is off by %.2g", r.name, i, off[i])
				}
			}
		}
	}
}

// TestTranslatingFollower lifts a slider by a law, a radial roller on the pitch curve
// of that law, and a roller on the profile that the pitch curve leaves: all the same.
func TestTranslatingFollower(t *testing.T) {
	const base, radius = 0.06, 0.012
	law := rises()[1].cycle(base, base+0.02)
	pitch := Polar(law)
	// The profile lies a roller's radius inside the pitch curve. Its derivatives are by
	// the pitch curve's: c = p − R·n, n′ = κ·p′ (Frenet), and so on; by differences here
	// of what is smooth, so that this is no copy of the code.
	normal := func(t float64) (p, n [2]float64) {
		c := pitch(t)
		l := math.Hypot(c.Vel.X, c.Vel.Y)
		return [2]float64{c.Pos.X, c.Pos.Y}, [2]float64{c.Vel.Y / l, -c.Vel.X / l}
	}
	profile := Curve(func(t float64) (out rigid.Point) {
		const h = 1e-3
		var at [5][2]float64
		for i := range at {
			p, n := normal(t + h*float64(i-2))
			at[i] = [2]float64{p[0] - radius*n[0], p[1] - radius*n[1]}
		}
		d := func(k int) (v, a float64) {
			return (at[0][k] - 8*at[1][k] + 8*at[3][k] - at[4][k]) / (12 * h), (-at[0][k] + 16*at[1][k] - 30*at[2][k] + 16*at[3][k] - at[4][k]) / (12 * h * h)
		}
		out.Pos.X, out.Pos.Y = at[2][0], at[2][1]
		out.Vel.X, out.Acc.X = d(0)
		out.Vel.Y, out.Acc.Y = d(1)
		return out
	})
	up := math.Pi / 2
	var p plan
	l := p.links("cam", "by law", "on pitch", "on profile")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	for _, f := range l[1:] {
		p.guide(Frame.Line(0, 0, up), f.Line(0, 0, up))
	}
	// The cam's angle under the follower is π/2 − φ.
	p.by(Follower{Of: Slide{l[1].Line(0, 0, 0), Frame.Line(0, 0, up)}, Cam: Turn{Frame, l[0]}, By: rigid.Linear(1, up).Then(law)})
	on := Profile{On: l[0].Line(0, 0, 0), Curve: pitch, Over: round, Closed: true}
	p.by(Roller{Centre: l[2].At(0, 0), On: on})
	on.Curve = profile
	p.by(Roller{Centre: l[3].At(0, 0), Radius: radius, On: on})
	p.turn(l[0], Frame)
	s := mustAssemble(t, mustNew(t, p.Design), []rigid.Placement{{}, {}, {Y: base}, {Y: base}, {Y: base}}, at(0))
	for k := range 500 {
		phi := 9 * math.Sin(float64(k)*0.02)
		if err := s.Move(rigid.Coordinate{Pos: phi, Vel: 1}); err != nil {
			t.Fatal(phi, err)
		}
		lift := func(f Link) rigid.Coordinate { return s.Slide(f.Line(0, 0, 0), Frame.Line(0, 0, up)) }
		want, _ := law(up - phi)
		follows(t, "law", lift(l[1]), rigid.Coordinate{Pos: want.Out, Vel: -want.First, Acc: want.Second}, 1e-15, 1e-15, 1e-14)
		follows(t, "pitch curve", lift(l[2]), lift(l[1]), 1e-14, 1e-14, 1e-13)
		// At the ends of a dwell the third derivative jumps, and differences are off.
		follows(t, "profile", lift(l[3]), lift(l[1]), 1e-12, 1e-7, 3e-3)
	}
}

// TestSlotEnd stops at the end of an open slot and comes back.
func TestSlotEnd(t *testing.T) {
	var p plan
	l := p.links("crank", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0.4, 0.05), l[1].At(0, 0))
	p.by(Roller{Centre: l[1].At(0.25, 0.02), On: Profile{On: l[0].Line(0.1, 0.01, 0), Curve: Circle(0.3), Over: rigid.Interval{Lo: -1, Hi: 1.2}}})
	p.turn(l[0], Frame)
	k := mustNew(t, p.Design)
	s := mustAssemble(t, k, []rigid.Placement{{}, {}, {X: 0.4, Y: 0.05, Angle: 1.9}}, at(0))
	before := s.Clone()
	for _, way := range []float64{1, -1} {
		if err := s.Set(before); err != nil {
			t.Fatal(err)
		}
		err := s.Move(at(6 * way))
		if !errors.Is(err, rigid.ErrUnreachable) {
			t.Fatal(err)
		}
		stop, ok := s.Stop()
		if !ok || stop.Group != 1 {
			t.Fatalf("%+v", stop)
		}
		if err := s.Move(at(6 * way * stop.Done)); err != nil {
			t.Fatal(err)
		}
		q := s.Motion(1).Pose.Local(s.Point(l[1].At(0.25, 0.02)).Pos)
		end := math.Atan2(q.Y-0.01, q.X-0.1)
		if math.Abs(end+1) > 1e-6 && math.Abs(end-1.2) > 1e-6 {
			t.Errorf("stopped at %v of the slot, %v of the way", end, stop.Done)
		}
		if err := s.Move(at(0)); err != nil || far(k, s, before) > 1e-13 {
			t.Errorf("way back: %v", err)
		}
	}
}
