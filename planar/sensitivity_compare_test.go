package planar_test

import (
	"errors"
	"fmt"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// entries returns every entry of a design, found by asking for the impossible too.
func entries(d Design) (all []Entry) {
	for i := range len(d.Joints) + len(d.Drives) {
		for end := A; end <= Arm; end++ {
			for part := X; part <= Phase; part++ {
				e := Entry{i, end, part}
				_, err := d.With(Dimension{[]Entry{e}}, 0)
				if part > Angle && end > A || errors.Is(err, ErrReference) {
					continue
				}
				all = append(all, e)
			}
		}
	}
	return all
}

// written returns the design with phases as numbers, those that were read.
func written(d Design, st *State) Design {
	l, _ := New(d)
	d = l.Design()
	for i, j := range d.Joints {
		if r, ok := j.(RackPair); ok && r.AsAssembled {
			rolled := r.Radius * st.Turn(r.Pinion.Link, r.Rack.Link).Pos
			if r.Right {
				rolled = -rolled
			}
			r.AsAssembled = false
			r.Phase = st.Slide(r.Pinion.Link.Line(r.Pinion.X, r.Pinion.Y, 0), r.Rack).Pos + rolled
			d.Joints[i] = r
		}
		if g, ok := j.(GearPair); ok && g.AsAssembled {
			k := float64(g.TeethA) / float64(g.TeethB)
			if g.TeethA == 0 {
				k = g.RadiusA / g.RadiusB
			}
			if !g.Internal {
				k = -k
			}
			g.AsAssembled = false
			g.Phase = st.Turn(g.B, g.Arm).Pos - k*st.Turn(g.A, g.Arm).Pos
			d.Joints[i] = g
		}
	}
	return d
}

// other returns the machine with a dimension changed, put together anew where st is.
func other(t testing.TB, d Design, st *State, m Dimension, by float64) *State {
	t.Helper()
	in := st.Inputs()
	fields := Dimension{}
	for _, e := range m.Of {
		if i := e.Joint - len(d.Joints); i >= 0 {
			_, turn := d.Drives[i].(Turn)
			switch {
			case e.Part == Phase:
				in[i].Pos += by
				continue
			case turn && e.End == A:
				in[i].Pos -= by
				continue
			case turn:
				in[i].Pos += by
				continue
			}
		}
		fields.Of = append(fields.Of, e)
	}
	changed, err := d.With(fields, by)
	if err != nil {
		t.Fatal(err)
	}
	l, err := New(changed)
	if err != nil {
		t.Fatal(err)
	}
	s, err := l.Assemble(poses(st, Link(len(d.Links))), in...)
	if err != nil {
		t.Fatalf("%v by %g: %v", m, by, err)
	}
	return s
}

// slope is the difference quotient of sixth order of what of gives for the machine
// with a dimension changed.
func slope(t testing.TB, d Design, st *State, m Dimension, h float64, of func(*State) []float64) []float64 {
	t.Helper()
	var sum []float64
	for i, k := range []float64{0, 45, -9, 1} {
		if i == 0 {
			continue
		}
		up, down := of(other(t, d, st, m, float64(i)*h)), of(other(t, d, st, m, -float64(i)*h))
		if sum == nil {
			sum = make([]float64, len(up))
		}
		for j := range up {
			sum[j] += k * (up[j] - down[j]) / (60 * h)
		}
	}
	return sum
}

func numbers(p rigid.Point) []float64 {
	return []float64{p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y}
}

func coordinate(c rigid.Coordinate) []float64 { return []float64{c.Pos, c.Vel, c.Acc} }

// agree compares derivatives with differences to 1e-7 of the largest.
func agree(t *testing.T, what string, got, want []float64) bool {
	t.Helper()
	size := 1.0
	for _, w := range want {
		size = math.Max(size, math.Abs(w))
	}
	for i := range got {
		if !(math.Abs(got[i]-want[i]) <= 1e-7*size) {
			t.Errorf("%s: %d is %.12g, differences give %.12g", what, i, got[i], want[i])
			return false
		}
	}
	return true
}

// compare checks the sensitivities of points of links and of turns by dimensions
// against differences of machines put together anew.
func compare(t *testing.T, name string, d Design, st *State, by []Dimension, h float64) {
	t.Helper()
	d = written(d, st)
	last := Link(len(d.Links) - 1)
	at := last.At(0.3, -0.2)
	of, from := last.Line(0.1, 0.2, 0), Link(1).Line(-0.1, 0.3, 0.4)
	if last == 1 {
		from = Frame.Line(-0.1, 0.3, 0.4)
	}
	points, turns, slides := make([]rigid.Point, len(by)), make([]rigid.Coordinate, len(by)), make([]rigid.Coordinate, len(by))
	for _, err := range []error{
		st.Sensitivity(points, at, by...),
		st.TurnSensitivity(turns, last, from.Link, by...),
		st.SlideSensitivity(slides, of, from, by...),
	} {
		if err != nil {
			t.Errorf("%s: %v", name, err)
			return
		}
	}
	for i, m := range by {
		if apart(d, m, h) {
			continue // gears or a rack would no longer mesh
		}
		want := slope(t, d, st, m, h, func(s *State) []float64 {
			all := append(numbers(s.Point(at)), coordinate(s.Turn(last, from.Link))...)
			return append(all, coordinate(s.Slide(of, from))...)
		})
		got := append(append(numbers(points[i]), coordinate(turns[i])...), coordinate(slides[i])...)
		if !agree(t, fmt.Sprint(name, " by ", m), got, want) {
			return
		}
	}
}

// apart reports whether New finds joints that contradict each other once the
// dimension is changed.
func apart(d Design, m Dimension, by float64) bool {
	changed, err := d.With(m, by)
	if err != nil {
		return false
	}
	_, err = New(changed)
	return errors.Is(err, ErrInconsistent)
}

func each(d Design) (all []Dimension) {
	for _, e := range entries(d) {
		all = append(all, Dimension{[]Entry{e}})
	}
	return all
}

func size(d Design) float64 {
	most := 0.0
	for _, j := range d.Joints {
		if j, ok := j.(Revolute); ok {
			most = max(most, math.Abs(j.A.X), math.Abs(j.B.X))
		}
	}
	return most
}
