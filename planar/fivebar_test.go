package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// apex returns the point at distances l from two moving points, on the left of the
// way from a to b: (p − a)·(v − va) = 0, (p − a)·(w − wa) = −|v − va|² for both.
func apex(a, b rigid.Point, l float64) rigid.Point {
	d := r2.Sub(b.Pos, a.Pos)
	half := r2.Norm(d) / 2
	up := math.Sqrt((l - half) * (l + half))
	p := rigid.Point{Pos: r2.Add(r2.Add(a.Pos, r2.Scale(0.5, d)), r2.Scale(up/2/half, r2.Vec{X: -d.Y, Y: d.X}))}
	ra, rb := r2.Sub(p.Pos, a.Pos), r2.Sub(p.Pos, b.Pos)
	meet := func(u, v float64) r2.Vec { // ra·x = u, rb·x = v
		return r2.Scale(1/r2.Cross(ra, rb), r2.Vec{X: u*rb.Y - v*ra.Y, Y: ra.X*v - rb.X*u})
	}
	p.Vel = meet(r2.Dot(ra, a.Vel), r2.Dot(rb, b.Vel))
	p.Acc = meet(r2.Dot(ra, a.Acc)-r2.Norm2(r2.Sub(p.Vel, a.Vel)), r2.Dot(rb, b.Acc)-r2.Norm2(r2.Sub(p.Vel, b.Vel)))
	return p
}

// tip returns the tip of a crank of 0.1 m.
func tip(x float64, turn rigid.Coordinate) rigid.Point {
	m := rigid.Motion{Pose: rigid.NewPose(x, 0, turn.Pos), Omega: turn.Vel, Alpha: turn.Acc}
	return m.At(r2.Vec{X: 0.1})
}

// TestFiveBar: where the rods of a five-bar meet is the apex over its cranks' tips,
// with both cranks driven and with the second geared to the first; geared, it comes
// back after each of a thousand turns.
func TestFiveBar(t *testing.T) {
	pinOf := Link(3).At(0.3, 0)
	see := func(how string, s *State, left, right rigid.Coordinate) {
		t.Helper()
		want := apex(tip(0, left), tip(0.2, right), 0.3)
		gx, gy := axes(s.Point(pinOf))
		wx, wy := axes(want)
		near(t, how, gx, wx, 1e-12*(1+math.Abs(left.Pos)))
		near(t, how, gy, wy, 1e-12*(1+math.Abs(left.Pos)))
	}
	for _, m := range []string{"..+", "..-"} {
		s := mode(t, fiveBar("driven"), m, rigid.Coordinate{Pos: 1}, rigid.Coordinate{Pos: 2})
		if s.Point(pinOf).Pos.Y < 0 {
			continue
		}
		for k := range 400 {
			left := rigid.Coordinate{Pos: 1 + 0.07*float64(k), Vel: 2, Acc: -3}
			right := rigid.Coordinate{Pos: 2 - 0.03*float64(k), Vel: -1, Acc: 5}
			if err := s.Move(left, right); err != nil {
				t.Fatal(err)
			}
			see("driven", s, left, right)
		}
	}
	turns := 1000
	if testing.Short() {
		turns = 30
	}
	found := false
	for _, m := range []string{"..+", "..-"} {
		s := mode(t, fiveBar("geared"), m, rigid.Coordinate{})
		if s.Point(pinOf).Pos.Y < 0 {
			continue
		}
		found = true
		for k := range 16 * turns {
			left := rigid.Coordinate{Pos: float64(k) / 16 * rigid.Revolution, Vel: 2, Acc: -3}
			if err := s.Move(left); err != nil {
				t.Fatal(err)
			}
			right := rigid.Coordinate{Pos: -2 * left.Pos, Vel: -4, Acc: 6}
			see("geared", s, left, right)
			near(t, "right crank", s.Turn(2, Frame), right, 1e-14)
		}
	}
	if !found {
		t.Error("no mode of the geared five-bar has its pin above")
	}
}
