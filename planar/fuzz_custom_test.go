package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// constraint reads a Constraint from bytes: the package's own, and one that gives
// whatever numbers the bytes say.
func (s *source) constraint(links int) Constraint {
	on := Profile{On: s.line(links), Curve: Ellipse(s.number(), s.number()), Over: rigid.Interval{Lo: s.number(), Hi: 4 * s.number()}, Closed: s.next()&1 > 0}
	switch s.next() % 8 {
	case 0, 1:
		return Roller{Centre: s.point(links), Radius: s.number() * float64(s.next()&1), On: on, Left: s.next()&1 > 0}
	case 2:
		return FlatFace{Face: s.line(links), On: on, Left: s.next()&1 > 0}
	case 3, 4:
		return Follower{Of: s.drive(links), Cam: s.drive(links), By: rigid.Linear(s.number(), s.number())}
	case 5:
		k := s.number()
		on.Curve = func(t float64) rigid.Point { return rigid.Point{Pos: r2.Vec{X: k * t}, Vel: r2.Vec{Y: k}} }
		return Roller{Centre: s.point(links), On: on}
	case 6:
		n := s.next()%3 + 1
		var numbers [7]float64
		for i := range numbers {
			numbers[i] = s.number()
		}
		tied := []Link{s.link(links), s.link(links), s.link(links)}[:s.next()%4]
		return odd{links: tied, rows: n, evaluate: func(e *Evaluation) error {
			for i := range e.Rows {
				q := &e.Rows[i]
				q.Residual, q.Bias = numbers[0]+numbers[6]*math.Sin(e.Links[0].Turn), numbers[1]
				for k := range q.Slopes {
					q.Slopes[k] = Slope{numbers[(2+k+i)%7], numbers[(3+k*i)%7], numbers[(4+2*k)%7]}
				}
			}
			return nil
		}}
	}
	return nil
}

// FuzzCustom makes designs with Constraints, assembles and moves them: no panic, no
// number that is not finite with a nil error, and a State that stays where a Move fails.
func FuzzCustom(f *testing.F) {
	f.Add([]byte{})
	f.Fuzz(func(t *testing.T, data []byte) {
		s := source(data)
		links := 2 + s.next()%3
		d := Design{Links: make([]string, links)}
		for range 1 + s.next()%4 {
			d.Joints = append(d.Joints, s.joint(links))
		}
		for range 1 + s.next()%2 {
			d.Joints = append(d.Joints, Custom{By: s.constraint(links)})
		}
		for range s.next() % 3 {
			d.Drives = append(d.Drives, s.drive(links))
		}
		guess := make([]rigid.Placement, links)
		for i := range guess {
			guess[i] = rigid.Placement{X: s.number(), Y: s.number(), Angle: s.number()}
		}
		if s.next()&1 > 0 {
			d.Guess = guess
		}
		_ = d.String()
		l, err := New(d)
		if err != nil {
			if l != nil || err.Error() == "" {
				t.Fatal("a linkage with an error")
			}
			return
		}
		in := make([]rigid.Coordinate, len(d.Drives))
		for i := range in {
			in[i].Pos = s.number()
		}
		st, err := l.Assemble(guess, in...)
		if err != nil {
			return
		}
		for range 4 {
			before := st.Clone()
			for i := range in {
				in[i] = rigid.Coordinate{Pos: in[i].Pos + s.number()/4, Vel: s.number(), Acc: s.number()}
			}
			if err := st.Move(in...); err != nil {
				if far(l, st, before) != 0 {
					t.Fatalf("moved with %v", err)
				}
				in = st.Inputs()
				continue
			}
			for i := range links {
				m := st.Motion(Link(i))
				if m.Pose.Origin.X*0+m.Pose.Origin.Y*0+m.Pose.Axis.X*0+m.Pose.Axis.Y*0+m.Vel.X*0+m.Vel.Y*0+m.Omega*0+m.Acc.X*0+m.Acc.Y*0+m.Alpha*0 != 0 {
					t.Fatalf("link %d: %+v", i, m)
				}
			}
		}
	})
}

// FuzzCam drives a roller in a guide by an elliptic cam of any shape, size and
// place: where it stands, it touches the cam, and nowhere cuts it.
func FuzzCam(f *testing.F) {
	f.Add(0.05, 0.03, 0.01, 0.0, 0.01, 0.3, 0.2, 1.0, false)
	f.Add(5e-5, 3e-5, 0.0, 1e-5, -1e-5, 2.0, -1.7, 1e-3, false)
	f.Add(50.0, 49.0, 30.0, 7.0, 1.0, 4.0, 20.0, 3.0, true)
	f.Fuzz(func(t *testing.T, a, b, radius, x, y, turn, step, speed float64, flat bool) {
		size := math.Max(math.Abs(a), math.Abs(b))
		if !(size > 1e-9 && size < 1e6 && math.Abs(a) > 0.05*size && math.Abs(b) > 0.05*size && math.Abs(radius) < 10*size && math.Hypot(x, y) < 3*size) {
			return
		}
		a, b, radius = math.Abs(a), math.Abs(b), math.Abs(radius)
		var p plan
		l := p.links("cam", "follower")
		cam := Profile{On: l[0].Line(x, y, 0.4), Curve: Ellipse(a, b), Over: round, Closed: true}
		up := math.Pi / 2
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.guide(Frame.Line(0, 0, up), l[1].Line(0, 0, up))
		if flat {
			p.by(FlatFace{Face: l[1].Line(0, 0, 0), On: cam})
		} else {
			p.by(Roller{Centre: l[1].At(0, 0), Radius: radius, On: cam})
		}
		p.turn(l[0], Frame)
		k, err := New(p.Design)
		if err != nil {
			t.Fatal(err)
		}
		s, err := k.Assemble([]rigid.Placement{{}, {Angle: turn}, {Y: 2*size + radius + math.Hypot(x, y)}}, rigid.Coordinate{Pos: turn})
		if err != nil {
			return
		}
		for i := range 6 {
			phi := turn + step*float64(i)
			if err := s.Move(rigid.Coordinate{Pos: phi, Vel: speed}); err != nil {
				return
			}
			c := s.Point(l[1].At(0, 0))
			least, most := math.Inf(1), math.Inf(-1)
			at := s.Motion(l[0]).Pose.Compose(rigid.NewPose(x, y, 0.4))
			const n = 2000
			for j := range n {
				q := at.Point(cam.Curve(2 * math.Pi * float64(j) / n).Pos)
				least, most = math.Min(least, r2.Norm(r2.Sub(q, c.Pos))), math.Max(most, q.Y)
			}
			off := least - radius
			if flat {
				off = c.Pos.Y - most
			}
			// Points lie up to 2π/n·size apart, half of it from the nearest one.
			if !(math.Abs(off) <= size*0.0017) || c.Vel.Y*0+c.Acc.Y*0 != 0 {
				t.Fatalf("off by %v at %v: %v", off, phi, c)
			}
		}
	})
}
