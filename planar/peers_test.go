package planar_test

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"strconv"
	"testing"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A peer is a linkage of revolutes as its pins, solved elsewhere with 50 digits.
type peer struct {
	Steps int
	Check []int
	Pins  [][6]float64 // link, x, y of both sides
	Out   [3]float64   // link, x, y
	Q0    []float64    // x, y, angle of every link, roughly, at input 0
	Loops []struct{ C float64 }
}

// peers reads the linkages and their outputs: x, y, vx, vy, ax, ay of a point, ω, α
// of its link.
func peers(t testing.TB) (cases map[string]peer, ref map[string]map[string][8]float64) {
	read := func(name string, to any) {
		text, err := os.ReadFile("../internal/bench/peers/" + name)
		if err == nil {
			err = json.Unmarshal(text, to)
		}
		if err != nil {
			t.Fatal(err)
		}
	}
	var all map[string]json.RawMessage
	read("cases.json", &all)
	read("ref.json", &ref)
	cases = map[string]peer{}
	for _, name := range []string{"sixbar_watt", "sixbar_steph", "chain"} {
		var p peer
		if err := json.Unmarshal(all[name], &p); err != nil {
			t.Fatal(err)
		}
		cases[name] = p
	}
	chain := cases["chain"]
	for _, n := range []int{1, 3, 10, 30, 100, 330} {
		p := chain
		p.Pins, p.Q0 = chain.Pins[:3*n+1], chain.Q0[:6*n+3]
		p.Out = [3]float64{float64(2*n + 1), chain.Loops[n-1].C / 2, 0}
		cases["chain"+strconv.Itoa(n)] = p
	}
	delete(cases, "chain")
	return cases, ref
}

// linkage returns a peer as a Linkage with its rough position.
func (p peer) linkage(t testing.TB) (*planar.Linkage, []rigid.Placement) {
	d := planar.Design{Links: []string{"frame"}}
	guess := []rigid.Placement{{}}
	for i := 0; i < len(p.Q0); i += 3 {
		d.Link(fmt.Sprint("link", i/3+1))
		guess = append(guess, rigid.Placement{X: p.Q0[i], Y: p.Q0[i+1], Angle: p.Q0[i+2]})
	}
	for _, v := range p.Pins {
		d.Joints = append(d.Joints, planar.Revolute{
			A: planar.Link(v[0]).At(v[1], v[2]), B: planar.Link(v[3]).At(v[4], v[5]),
		})
	}
	d.Drives = []planar.Drive{planar.Turn{Of: 1, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	return l, guess
}

func (p peer) input(k int) rigid.Coordinate {
	return rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / float64(p.Steps), Vel: float64(10 + k%7), Acc: float64(-3 + k%11)}
}

func (p peer) output(s *planar.State) [8]float64 {
	l := planar.Link(p.Out[0])
	m, o := s.Motion(l), s.Point(l.At(p.Out[1], p.Out[2]))
	return [8]float64{o.Pos.X, o.Pos.Y, o.Vel.X, o.Vel.Y, o.Acc.X, o.Acc.Y, m.Omega, m.Alpha}
}

// TestPeers compares six-bars and chains of four-bars with a 50-digit solution,
// made by intersecting circles and differentiating in time. Errors multiply along a
// chain.
func TestPeers(t *testing.T) {
	cases, ref := peers(t)
	for name, p := range cases {
		within := 1e-14 * float64(len(p.Q0)/6)
		l, guess := p.linkage(t)
		s, err := l.Assemble(guess, p.input(0))
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		worst := 0.0
		for k := range p.Steps {
			if err := s.Move(p.input(k)); err != nil {
				t.Fatalf("%s, step %d: %v", name, k, err)
			}
			want, ok := ref[name][strconv.Itoa(k)]
			if !ok {
				continue
			}
			for i, got := range p.output(s) {
				size := math.Abs(want[i])
				switch {
				case i < 6: // of a vector
					size = math.Hypot(want[i&^1], want[i|1])
				case i == 7: // α beside ω²
					size = max(size, want[6]*want[6])
				}
				worst = max(worst, math.Abs(got-want[i])/max(1, size))
			}
		}
		if !(worst < within) {
			t.Errorf("%s: off by %.2g, over %.2g", name, worst, within)
		}
		t.Logf("%s: %.2g", name, worst)
	}
}

func BenchmarkPeers(b *testing.B) {
	cases, _ := peers(b)
	for _, name := range []string{"sixbar_watt", "sixbar_steph", "chain1", "chain3", "chain10", "chain30", "chain100", "chain330"} {
		b.Run(name, func(b *testing.B) {
			p := cases[name]
			l, guess := p.linkage(b)
			s, err := l.Assemble(guess, p.input(0))
			if err != nil {
				b.Fatal(err)
			}
			in := make([]rigid.Coordinate, p.Steps)
			for k := range in {
				in[k] = p.input(k)
			}
			turn, k := 0.0, 0
			b.ReportAllocs()
			for b.Loop() {
				c := in[k]
				c.Pos += turn
				if err := s.Move(c); err != nil {
					b.Fatal(err)
				}
				if k++; k == len(in) {
					k, turn = 0, turn+2*math.Pi
				}
			}
		})
	}
}
