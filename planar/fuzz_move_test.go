package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// FuzzMove drives random linkages, grown dyad by dyad, by any motion. A Move either
// leaves the State as it was, or closes every joint and drive with finite numbers,
// on the branch it was on; and going straight back brings every link back.
func FuzzMove(f *testing.F) {
	f.Add(uint64(1), uint8(0), uint8(1), uint8(3), 0.1, 1.0, 0.0, 0.2)
	f.Add(uint64(2), uint8(7), uint8(9), uint8(4), -0.3, 0.0, 2.0, 3.0)
	f.Add(uint64(3), uint8(12), uint8(11), uint8(10), 1e-9, 1e5, -1e9, -0.7)
	f.Add(uint64(4), uint8(5), uint8(2), uint8(6), math.Inf(1), 0.0, 0.0, 80.0)
	f.Fuzz(func(t *testing.T, seed uint64, a, b, c uint8, first, vel, acc, second float64) {
		g := grow(seed, int(a)%growths, int(b)%growths, int(c)%growths)
		l, err := New(g.Design)
		if err != nil {
			t.Fatal(err)
		}
		s, err := l.Assemble(g.guess(), g.in...)
		if err != nil {
			t.Skip() // a position near a singular one
		}
		for _, d := range []float64{first, second, -first, 1e-3 * second} {
			was := s.Clone()
			to := s.Inputs()
			for i := range to {
				to[i] = rigid.Coordinate{Pos: to[i].Pos + d*float64(1+i%2), Vel: vel, Acc: acc}
			}
			if s.Move(to...) != nil {
				if far(l, s, was) != 0 {
					t.Fatal("moved by a Move that failed")
				}
				if stop, ok := s.Stop(); ok && !(stop.Done >= 0 && stop.Done <= 1 && stop.Gap >= 0) {
					t.Fatalf("%+v", stop)
				}
				if far(l, s, was) != 0 {
					t.Fatal("moved by Stop")
				}
				continue
			}
			m := s.Margin()
			if o := open(l, s, to); !(o.pos < 1e-12*(1+math.Abs(d))/m && (m < 1e-4 || o.vel < 1e-10/(m*m) && o.acc < 1e-9/(m*m*m))) {
				t.Fatalf("margin %.3g: %+v", m, o)
			}
			if s.Mode() != was.Mode() {
				t.Fatalf("mode %s after %s", s.Mode(), was.Mode())
			}
			back := s.Clone()
			if err := back.Move(was.Inputs()...); err == nil && m > 1e-4 && was.Margin() > 1e-4 && !(far(l, back, was) < 1e-8) {
				t.Fatalf("%v from where it was", far(l, back, was))
			}
		}
	})
}
