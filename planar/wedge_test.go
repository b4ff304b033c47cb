package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// near compares coordinates to a share of the size of each.
func near(t *testing.T, what string, got, want rigid.Coordinate, within float64) {
	t.Helper()
	for i, v := range [3][2]float64{{got.Pos, want.Pos}, {got.Vel, want.Vel}, {got.Acc, want.Acc}} {
		if !(math.Abs(v[0]-v[1]) <= within*(1+math.Abs(v[1]))) {
			t.Errorf("%s: %s is %v, want %v", what, [3]string{"place", "speed", "acceleration"}[i], v[0], v[1])
		}
	}
}

// axes returns the two coordinates of a point.
func axes(p rigid.Point) (x, y rigid.Coordinate) {
	return rigid.Coordinate{Pos: p.Pos.X, Vel: p.Vel.X, Acc: p.Acc.X}, rigid.Coordinate{Pos: p.Pos.Y, Vel: p.Vel.Y, Acc: p.Acc.Y}
}

// TestWedge: a wedge of slope β lifts by −tan β for every metre that it is drawn; on
// a carrier it does so in the carrier, whose turning adds the rest.
func TestWedge(t *testing.T) {
	slope := math.Tan(0.2)
	s := mode(t, wedge(false), "..", rigid.Coordinate{})
	for k := -40; k <= 40; k++ {
		in := rigid.Coordinate{Pos: float64(k) / 20, Vel: 3, Acc: -7}
		if err := s.Move(in); err != nil {
			t.Fatal(err)
		}
		x, y := axes(s.Point(Link(2).At(0, 0)))
		near(t, "lifter", y, rigid.Coordinate{Pos: (0.3 - in.Pos) * slope, Vel: -3 * slope, Acc: 7 * slope}, 1e-15)
		near(t, "lifter across", x, rigid.Coordinate{Pos: 0.3}, 1e-15)
		if m := s.Motion(2); m.Omega != 0 || m.Alpha != 0 || m.Pose.Axis != (r2.Vec{X: 1}) {
			t.Errorf("the lifter turns: %+v", *m)
		}
	}

	c := mode(t, wedgeOnCarrier(), "...", rigid.Coordinate{}, rigid.Coordinate{})
	for k := range 100 {
		turn, slide := rigid.Coordinate{Pos: 0.2 * float64(k), Vel: 2, Acc: 1}, rigid.Coordinate{Pos: 0.01 * float64(k), Vel: 3, Acc: -7}
		if err := c.Move(turn, slide); err != nil {
			t.Fatal(err)
		}
		carrier := rigid.Motion{Pose: rigid.NewPose(0, 0, turn.Pos), Omega: 2, Alpha: 1}
		want := carrier.Carry(rigid.Point{
			Pos: r2.Vec{X: 0.3, Y: (0.3 - slide.Pos) * slope}, Vel: r2.Vec{Y: -3 * slope}, Acc: r2.Vec{Y: 7 * slope},
		})
		got := c.Point(Link(3).At(0, 0))
		gx, gy := axes(got)
		wx, wy := axes(want)
		near(t, "lifter on the carrier", gx, wx, 1e-13)
		near(t, "lifter on the carrier", gy, wy, 1e-13)
	}
}

// cosines returns the angle between two sides of a triangle, p and q, whose third
// side has the length l.
func cosines(p, q float64, l rigid.Coordinate) rigid.Coordinate {
	c := (p*p + q*q - l.Pos*l.Pos) / (2 * p * q)
	s := math.Sqrt((1 - c) * (1 + c))
	w := l.Pos * l.Vel / (p * q * s)
	return rigid.Coordinate{Pos: math.Acos(c), Vel: w, Acc: (l.Vel*l.Vel+l.Pos*l.Acc)/(p*q*s) - w*w*c/s}
}

// TestCylinders lifts a boom and its bucket, each a triangle with its cylinder, as
// driven distances and as cylinders with pistons; the bucket's is between two moving
// links.
func TestCylinders(t *testing.T) {
	for _, cylinders := range []bool{false, true} {
		l, err := New(digger(cylinders))
		if err != nil {
			t.Fatal(err)
		}
		guess := make([]rigid.Placement, len(l.Design().Links))
		guess[1], guess[2] = rigid.Placement{Angle: 0.5}, rigid.Placement{X: 1.8, Y: 1, Angle: -0.5}
		if cylinders {
			guess[3], guess[4] = rigid.Placement{X: 0.5, Y: -0.5, Angle: 1}, rigid.Placement{X: 0.9, Y: 0.4, Angle: 1}
			guess[5], guess[6] = rigid.Placement{X: 0.8, Y: 0.7, Angle: 0}, rigid.Placement{X: 2, Y: 1.2, Angle: 0}
		}
		s, err := l.Assemble(guess, rigid.Coordinate{Pos: 0.9}, rigid.Coordinate{Pos: 1.0})
		if err != nil {
			t.Fatal(err)
		}
		for k := range 80 {
			one := rigid.Coordinate{Pos: 0.9 + 0.003*float64(k), Vel: 0.4, Acc: 2}
			two := rigid.Coordinate{Pos: 1.0 + 0.001*float64(k), Vel: -0.3, Acc: 1}
			if err := s.Move(one, two); err != nil {
				t.Fatal(err)
			}
			// the boom's pin to the cylinder's ends: (0.5, −0.5) on the frame, (1, −0.1) on the boom
			a := cosines(math.Hypot(0.5, 0.5), math.Hypot(1, 0.1), one)
			a.Pos += math.Atan2(-0.5, 0.5) - math.Atan2(-0.1, 1)
			near(t, "boom", s.Turn(1, Frame), a, 1e-13)
			// the bucket's pin: (−1, 0.2) on the boom, (0.1, 0.3) on the bucket
			b := cosines(math.Hypot(1, 0.2), math.Hypot(0.1, 0.3), two)
			want := rigid.Coordinate{Pos: math.Atan2(0.2, -1) - b.Pos - math.Atan2(0.3, 0.1), Vel: -b.Vel, Acc: -b.Acc}
			near(t, "bucket", s.Turn(2, 1), want, 1e-13)
		}
	}
}

// TestScissor lifts 40 stages: the platform is level at 40·sin a with the bars at a,
// whether the lowest bar's angle drives or the foot that slides.
func TestScissor(t *testing.T) {
	const stages = 40
	top := Link(2*stages + 1)
	byAngle := scissor(stages)
	byFoot := scissor(stages)
	byFoot.Drives = []Drive{Slide{Of: Link(2).Line(-0.5, 0, 0), From: Frame.Line(0, 0, 0)}}
	for name, d := range map[string]Design{"angle": byAngle, "foot": byFoot} {
		l, err := New(d)
		if err != nil {
			t.Fatal(err)
		}
		input := func(a, w float64) rigid.Coordinate {
			if name == "angle" {
				return rigid.Coordinate{Pos: a, Vel: w}
			}
			return rigid.Coordinate{Pos: math.Cos(a), Vel: -w * math.Sin(a), Acc: -w * w * math.Cos(a)}
		}
		s, err := l.Assemble(scissorGuess(stages, 0.7), input(0.7, 0))
		if err != nil {
			t.Fatal(err)
		}
		for k := range 120 { // up and down
			a := 0.3 + 0.01*float64(min(k, 120-k))
			if err := s.Move(input(a, 2)); err != nil {
				t.Fatalf("by %s, %v: %v", name, a, err)
			}
			h := rigid.Coordinate{Pos: stages * math.Sin(a), Vel: 2 * stages * math.Cos(a), Acc: -4 * stages * math.Sin(a)}
			for _, x := range []float64{0, 1} {
				_, y := axes(s.Point(top.At(x, 0)))
				near(t, "platform by "+name, y, h, 1e-11)
			}
		}
	}
}
