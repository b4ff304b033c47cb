package planar_test

import (
	"encoding/json"
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"github.com/google/go-cmp/cmp"
)

func TestSensitivityErrors(t *testing.T) {
	d := sixBar()
	guess := swaps()[0].guess
	_, st := assemble(t, d, guess, rigid.Coordinate{Pos: 1, Vel: 1})
	good := d.Hole(Link(1).At(1.1, 0), X)
	was := rigid.Point{Pos: rigid.NewPose(7, 7, 7).Origin}
	dst, turns := []rigid.Point{was}, []rigid.Coordinate{{Pos: 7}}
	flat := parallelogram(0.1, 0.3)
	_, folded := assemble(t, flat, []rigid.Placement{{}, {Angle: 0.4}, {X: 0.09, Y: 0.04}, {X: 0.3, Angle: 0.4}}, rigid.Coordinate{Pos: 0})
	for _, c := range []struct {
		name string
		st   *State
		of   Attachment
		by   []Dimension
		want error
	}{
		{"a zero State", new(State), Frame.At(0, 0), []Dimension{good}, rigid.ErrInput},
		{"too few places", st, Frame.At(0, 0), []Dimension{good, good}, rigid.ErrInput},
		{"no entries", st, Frame.At(0, 0), []Dimension{{}}, rigid.ErrInput},
		{"no such link", st, Link(9).At(0, 0), []Dimension{good}, ErrReference},
		{"no such joint", st, Frame.At(0, 0), []Dimension{{[]Entry{{Joint: 99}}}}, ErrReference},
		{"a joint before the first", st, Frame.At(0, 0), []Dimension{{[]Entry{{Joint: -1}}}}, ErrReference},
		{"no such end", st, Frame.At(0, 0), []Dimension{{[]Entry{{End: Arm}}}}, ErrReference},
		{"no such part", st, Frame.At(0, 0), []Dimension{{[]Entry{{Part: RadiusA}}}}, ErrReference},
		{"a point that is no number", st, Link(1).At(math.NaN(), 0), []Dimension{good}, rigid.ErrNotFinite},
		{"a parallelogram that lies flat", folded, Link(2).At(0, 0), []Dimension{flat.Hole(Link(1).At(0.1, 0), X)}, rigid.ErrSingular},
	} {
		if err := c.st.Sensitivity(dst, c.of, c.by...); !errors.Is(err, c.want) || dst[0] != was {
			t.Errorf("%s: %v, %v", c.name, err, dst)
		}
		if c.want == rigid.ErrNotFinite {
			continue
		}
		err := c.st.TurnSensitivity(turns, c.of.Link, Frame, c.by...)
		if !errors.Is(err, c.want) || turns[0] != (rigid.Coordinate{Pos: 7}) {
			t.Errorf("%s: turn: %v, %v", c.name, err, turns)
		}
	}
}

// TestHole finds both joints at a pin of three links, and lines that start at a point.
func TestHole(t *testing.T) {
	var p plan
	l := p.links("lever", "rod", "stay", "ram")
	p.pin(l[0].At(0.5, 0.1), l[1].At(0, 0))
	p.pin(l[2].At(0, 0), l[0].At(0.5, 0.1))
	p.slot(l[0].At(0.5, 0), l[3].Line(0.1, 0.2, 0.3))
	p.Joints = append(p.Joints, RackPair{Pinion: l[0].At(0.5, 0.1), Rack: l[3].Line(0.1, 0.2, 0), Radius: 1})
	p.slide(l[3].Line(0.1, 0.2, 1), Frame.Line(0, 0, 0))
	p.reach(Frame.At(0, 0), l[0].At(0.5, 0.1))
	for _, c := range []struct {
		a    Attachment
		p    Part
		want []Entry
	}{
		{l[0].At(0.5, 0.1), Y, []Entry{{0, A, Y}, {1, B, Y}, {3, A, Y}, {5, B, Y}}},
		{l[3].At(0.1, 0.2), Angle, []Entry{{2, B, Angle}, {3, B, Angle}, {4, A, Angle}}},
		{Frame.At(0, 0), X, []Entry{{4, B, X}, {5, A, X}}},
		{l[0].At(0.5, 0.1), Phase, nil},
		{l[0].At(0.4, 0.1), X, nil},
	} {
		if diff := cmp.Diff(c.want, p.Hole(c.a, c.p).Of); diff != "" {
			t.Errorf("%v, %v: %s", c.a, c.p, diff)
		}
	}
}

// TestWith changes every entry that a field holds by an amount, and back.
func TestWith(t *testing.T) {
	for _, m := range machines() {
		for _, by := range each(m.d) {
			d, err := m.d.With(by, 0.25)
			if err != nil {
				if !errors.Is(err, rigid.ErrInput) || by.Of[0].Joint < len(m.d.Joints) {
					t.Errorf("%s, %v: %v", m.name, by, err)
				}
				continue
			}
			back, err := d.With(by, -0.25)
			if err != nil || cmp.Equal(d, m.d) {
				t.Errorf("%s, %v: unchanged, %v", m.name, by, err)
			}
			near := cmp.Comparer(func(a, b float64) bool { return math.Abs(a-b) < 1e-12 })
			if diff := cmp.Diff(m.d, back, near); diff != "" {
				t.Errorf("%s, %v: %s", m.name, by, diff)
			}
		}
	}
}

func TestEndsAsText(t *testing.T) {
	want := Entry{2, Arm, RadiusB}
	text, err := json.Marshal(want)
	if err != nil || string(text) != `{"Joint":2,"End":"arm","Part":"radiusB"}` {
		t.Errorf("%s, %v", text, err)
	}
	var got Entry
	if err := json.Unmarshal(text, &got); err != nil || got != want {
		t.Errorf("%v, %v", got, err)
	}
	if s := want.String(); s != "joint 2, arm, radiusB" {
		t.Error(s)
	}
	for e := End(0); e <= Arm+1; e++ {
		text, err := e.MarshalText()
		if (err != nil) != (e > Arm) || err == nil && string(text) != e.String() {
			t.Errorf("%v: %q, %v", e, text, err)
		}
	}
	for p := Part(0); p <= Phase+1; p++ {
		var back Part
		text, err := p.MarshalText()
		if (err != nil) != (p > Phase) || err == nil && (back.UnmarshalText(text) != nil || back != p) {
			t.Errorf("%v: %q, %v", p, text, err)
		}
	}
	var e End
	if err := e.UnmarshalText([]byte("c")); !errors.Is(err, rigid.ErrInput) {
		t.Error(err)
	}
}

var sinkSensitivity error

// TestSensitivityAllocations asks for nothing after the first call, errors included.
func TestSensitivityAllocations(t *testing.T) {
	d := sixBar()
	_, st := assemble(t, d, swaps()[0].guess, rigid.Coordinate{Pos: 1, Vel: 1})
	by := each(d)
	dst, turns := make([]rigid.Point, len(by)), make([]rigid.Coordinate, len(by))
	bad := []Dimension{{[]Entry{{Joint: 99}}}}
	for name, f := range map[string]func(){
		"points": func() { sinkSensitivity = st.Sensitivity(dst, Link(5).At(1, 0), by...) },
		"turns":  func() { sinkSensitivity = st.TurnSensitivity(turns, 5, 2, by...) },
		"slides": func() {
			sinkSensitivity = st.SlideSensitivity(turns, Link(5).Line(1, 0, 0), Frame.Line(0, 0, 1), by...)
		},
		"errors": func() { sinkSensitivity = st.Sensitivity(dst[:1], Link(5).At(1, 0), bad...) },
	} {
		f()
		if n := testing.AllocsPerRun(100, f); n != 0 || (sinkSensitivity != nil) != (name == "errors") {
			t.Errorf("%s: %g allocations, %v", name, n, sinkSensitivity)
		}
	}
}

func BenchmarkSensitivity(b *testing.B) {
	for name, d := range map[string]Design{"four-bar": chain(1), "chain of 10": chain(10), "chain of 50": chain(50)} {
		l, err := New(d)
		if err != nil {
			b.Fatal(err)
		}
		guess := make([]rigid.Placement, len(d.Links))
		for i := range guess {
			guess[i] = rigid.Placement{X: 0.5 * float64(i/2), Y: float64(i % 2), Angle: float64(1 - i%2)}
		}
		st, err := l.Assemble(guess, rigid.Coordinate{Pos: 1.2, Vel: 1})
		if err != nil {
			b.Skip(err)
		}
		by := []Dimension{d.Hole(Link(1).At(0, 0), X), d.Hole(Link(2).At(1.3, 0), X)}
		dst := make([]rigid.Point, 2)
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if err := st.Sensitivity(dst, Link(len(d.Links)-1).At(1, 0), by...); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
