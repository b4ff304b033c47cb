package planar

import (
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A Coordinate is a number with its derivatives by time, and a Point a vector with
// its; products go by Leibniz's rule.

// fixed returns a vector that is fixed in a body, in the frame.
func fixed(m *rigid.Motion, local r2.Vec) rigid.Point {
	r := turned(m.Pose.Axis, local)
	w, al, w2 := m.Omega, m.Alpha, m.Omega*m.Omega
	return rigid.Point{
		Pos: r,
		Vel: r2.Vec{X: -w * r.Y, Y: w * r.X},
		Acc: r2.Vec{X: -al*r.Y - w2*r.X, Y: al*r.X - w2*r.Y},
	}
}

// quarter returns k×p, p turned by a quarter.
func quarter(p rigid.Point) rigid.Point {
	turn := func(v r2.Vec) r2.Vec { return r2.Vec{X: -v.Y, Y: v.X} }
	return rigid.Point{Pos: turn(p.Pos), Vel: turn(p.Vel), Acc: turn(p.Acc)}
}

func less(p, q rigid.Point) rigid.Point {
	return rigid.Point{Pos: r2.Sub(p.Pos, q.Pos), Vel: r2.Sub(p.Vel, q.Vel), Acc: r2.Sub(p.Acc, q.Acc)}
}

func dotted(p, q *rigid.Point) rigid.Coordinate {
	return rigid.Coordinate{
		Pos: r2.Dot(p.Pos, q.Pos),
		Vel: r2.Dot(p.Vel, q.Pos) + r2.Dot(p.Pos, q.Vel),
		Acc: r2.Dot(p.Acc, q.Pos) + 2*r2.Dot(p.Vel, q.Vel) + r2.Dot(p.Pos, q.Acc),
	}
}

func crossed(p, q *rigid.Point) rigid.Coordinate {
	return rigid.Coordinate{
		Pos: cross(p.Pos, q.Pos),
		Vel: cross(p.Vel, q.Pos) + cross(p.Pos, q.Vel),
		Acc: cross(p.Acc, q.Pos) + 2*cross(p.Vel, q.Vel) + cross(p.Pos, q.Acc),
	}
}

func product(c rigid.Coordinate, p rigid.Point) rigid.Point {
	return rigid.Point{
		Pos: r2.Scale(c.Pos, p.Pos),
		Vel: r2.Add(r2.Scale(c.Vel, p.Pos), r2.Scale(c.Pos, p.Vel)),
		Acc: r2.Add(r2.Scale(c.Acc, p.Pos), r2.Add(r2.Scale(2*c.Vel, p.Vel), r2.Scale(c.Pos, p.Acc))),
	}
}

func times(a, b rigid.Coordinate) rigid.Coordinate {
	return rigid.Coordinate{Pos: a.Pos * b.Pos, Vel: a.Vel*b.Pos + a.Pos*b.Vel, Acc: a.Acc*b.Pos + 2*a.Vel*b.Vel + a.Pos*b.Acc}
}

func sumOf(a, b rigid.Coordinate) rigid.Coordinate {
	return rigid.Coordinate{Pos: a.Pos + b.Pos, Vel: a.Vel + b.Vel, Acc: a.Acc + b.Acc}
}

func scaledBy(k float64, a rigid.Coordinate) rigid.Coordinate {
	return rigid.Coordinate{Pos: k * a.Pos, Vel: k * a.Vel, Acc: k * a.Acc}
}

func numeric(all ...r2.Vec) bool {
	sum := 0.0
	for _, v := range all {
		sum += v.X*0 + v.Y*0
	}
	return sum == 0
}

// magnitude is |x|, infinite for NaN.
func magnitude(x float64) float64 {
	if x != x {
		return math.Inf(1)
	}
	return math.Abs(x)
}
