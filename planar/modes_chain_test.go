package planar_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// chained is a group of n closed loops in the place in which it was drawn, with no
// drive: n platforms, each pinned to the next, the first and the last on the frame by a
// bar more.
func chained(random *rand.Rand, n int) (Design, []rigid.Placement) {
	var p plan
	at := []rigid.Pose{rigid.NewPose(0, 0, 0)}
	spot := func() r2.Vec { return r2.Vec{X: 2 * random.NormFloat64(), Y: 2 * random.NormFloat64()} }
	link := func() Link {
		q := spot()
		at = append(at, rigid.NewPose(q.X, q.Y, 6*random.Float64()))
		return p.links(fmt.Sprint(len(at)))[0]
	}
	pin := func(a, b Link, q r2.Vec) {
		u, v := at[a].Local(q), at[b].Local(q)
		p.pin(a.At(u.X, u.Y), b.At(v.X, v.Y))
	}
	bar := func(a Link) {
		l := link()
		pin(a, l, spot())
		pin(l, Frame, spot())
	}
	last := Frame
	for i := range n {
		l := link()
		if i > 0 {
			pin(last, l, spot())
		} else {
			bar(l)
		}
		bar(l)
		if i == n-1 {
			bar(l)
		}
		last = l
	}
	guess := make([]rigid.Placement, len(at))
	for i, q := range at {
		guess[i] = rigid.Placement{X: q.Origin.X, Y: q.Origin.Y, Angle: q.Angle()}
	}
	return p.Design, guess
}

// TestModesOfGroups holds the modes of groups of two to four closed loops, with pins,
// guides and slots, against what assembling from many places at random finds: none of
// that may be missing, and the place in which the group was drawn must be there.
func TestModesOfGroups(t *testing.T) {
	random := rand.New(rand.NewPCG(6, 2))
	for _, c := range []struct{ platforms, groups, starts int }{{1, 12, 30}, {2, 6, 40}, {3, 2, 60}} {
		if testing.Short() {
			c.groups = 2
		}
		found, total, worst := 0, 0, 0
		for k := range c.groups {
			d, guess := chained(random, c.platforms)
			l, err := New(d)
			if err != nil {
				t.Fatal(err)
			}
			drawn, err := l.Assemble(guess)
			if err != nil {
				t.Fatal(err)
			}
			modes, errs := all(l)
			if len(errs) > 0 || !among(l, drawn, modes, 1e-9/drawn.Margin()) {
				t.Errorf("%d platforms, %d: not as drawn among %d, %v", c.platforms, k, len(modes), errs)
			}
			for _, s := range modes {
				if o := open(l, s, nil); !(o.pos < 1e-12) {
					t.Errorf("%d platforms, %d: %+v", c.platforms, k, o)
				}
			}
			var seen []*State
			for range c.starts {
				s, err := l.Assemble(scattered(random, len(guess)))
				if err != nil || s.Margin() < 1e-6 {
					continue
				}
				if !among(l, s, modes, 1e-8/s.Margin()) {
					t.Errorf("%d platforms, %d: a mode from a guess alone, margin %.2g", c.platforms, k, s.Margin())
				}
				if !among(l, s, seen, 1e-6) {
					seen = append(seen, s)
				}
			}
			found, total, worst = found+len(seen), total+len(modes), max(worst, len(modes))
		}
		t.Logf("%d platforms: %d modes, of which starts at random find %d; at most %d", c.platforms, total, found, worst)
	}
}

// BenchmarkModes finds the modes of a platform on three legs, and of two and three
// platforms pinned to each other.
func BenchmarkModes(b *testing.B) {
	cases := platformCases(b)
	b.Run("2 loops", func(b *testing.B) {
		b.ReportAllocs()
		k := 0
		var linkages []*Linkage
		for _, c := range cases {
			linkages = append(linkages, c.linkage(b, 1, rigid.NewPose(0, 0, 0)))
		}
		for b.Loop() {
			all(linkages[k%len(linkages)])
			k++
		}
	})
	for _, n := range []int{2, 3, 4, 5} {
		b.Run(fmt.Sprintf("%d loops", n+1), func(b *testing.B) {
			random := rand.New(rand.NewPCG(6, 2))
			b.ReportAllocs()
			for b.Loop() {
				d, _ := chained(random, n)
				l, err := New(d)
				if err != nil {
					b.Fatal(err)
				}
				if _, errs := all(l); len(errs) > 0 {
					b.Fatal(errs)
				}
			}
		})
	}
}
