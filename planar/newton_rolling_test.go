package planar_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// rollings are groups of higher class with meshes inside: a plate that three driven
// cranks lead, by
//
//	0  a wheel on a crank that rolls on the plate, with a rod to its rim, and a rod
//	1  two rods, of which one is geared to a wheel on the plate, with a rod to its rim
//	2  both of these wheels, the second of them geared to the first
//	3  a rod, and a crank on which the plate rolls
const rollings = 4

func rollingGroup(seed uint64, kind int) *grower {
	g := &grower{random: rand.New(rand.NewPCG(seed, 17)), at: []rigid.Pose{rigid.NewPose(0, 0, 0)}}
	g.Link("")
	g.Links = g.Links[:1]
	for range 3 {
		g.crank()
	}
	rod := func(a, b Link) {
		r := g.body()
		g.hinge(a, r, g.spot())
		g.hinge(r, b, g.spot())
	}
	wheel := func(on, rack Link) Link { // on a link, rolling on another along a slot there
		w, p, angle := g.body(), g.spot(), g.spread(3)
		g.hinge(on, w, p)
		g.slot(g.on(on, p), g.line(rack, p, angle))
		g.rack(w, rack, p, angle, angle > 0)
		return w
	}
	mesh := func(a, b, arm Link) {
		g.Joints = append(g.Joints, GearPair{A: a, B: b, Arm: arm, TeethA: 17 + g.random.IntN(9), TeethB: 20, Internal: g.random.IntN(2) == 0, AsAssembled: true})
	}
	plate := g.body()
	switch kind {
	case 0:
		rod(2, plate)
		rod(3, wheel(1, plate))
	case 1:
		rod(1, plate)
		geared, w := g.body(), g.body()
		g.hinge(2, geared, g.spot())
		g.hinge(geared, plate, g.spot())
		g.hinge(plate, w, g.spot())
		mesh(geared, w, plate)
		rod(3, w)
	case 2:
		rod(2, plate)
		first, w := wheel(1, plate), g.body()
		g.hinge(plate, w, g.spot())
		mesh(first, w, plate)
		rod(3, w)
	case 3:
		p, angle := g.spot(), g.spread(3)
		g.slot(g.on(plate, p), g.line(1, p, angle))
		g.rack(plate, 1, p, angle, angle > 0)
		rod(2, plate)
	}
	return g
}

// meshes returns what every mesh keeps, whole turns included.
func (g *grower) meshes(s *State) (kept []float64) {
	for _, j := range g.Joints {
		switch j := j.(type) {
		case GearPair:
			k := float64(j.TeethA) / float64(j.TeethB)
			if !j.Internal {
				k = -k
			}
			kept = append(kept, s.Turn(j.B, j.Arm).Pos-k*s.Turn(j.A, j.Arm).Pos)
		case RackPair:
			k := j.Radius
			if j.Right {
				k = -k
			}
			kept = append(kept, s.Slide(j.Pinion.Link.Line(j.Pinion.X, j.Pinion.Y, 0), j.Rack).Pos+k*s.Turn(j.Pinion.Link, j.Rack.Link).Pos)
		}
	}
	return kept
}

// TestRollingGroups drives random groups of higher class with gears and racks inside:
// joints, drives and meshes must hold, in place, velocity and acceleration, and the
// way back must end where it began.
func TestRollingGroups(t *testing.T) {
	n, moved, stopped := 400, 0, 0
	if testing.Short() {
		n = 60
	}
	for seed := range n {
		kind := seed % rollings
		g := rollingGroup(uint64(seed), kind)
		l, err := New(g.Design)
		if err != nil {
			t.Fatalf("kind %d, seed %d: %v", kind, seed, err)
		}
		if !higher(l) {
			t.Fatalf("kind %d: groups %s", kind, groups(l))
		}
		s, err := l.Assemble(g.guess(), g.in...)
		if err != nil {
			t.Errorf("kind %d, seed %d: %v", kind, seed, err)
			continue
		}
		start, kept, in := poses(s, Link(len(g.at))), g.meshes(s), append([]rigid.Coordinate{}, g.in...)
		least, path := s.Margin(), [][]rigid.Coordinate{}
		for range 30 {
			for i := range in {
				in[i] = rigid.Coordinate{Pos: in[i].Pos + g.spread(0.1) + 0.03, Vel: g.spread(3), Acc: g.spread(5)}
			}
			before := poses(s, Link(len(g.at)))
			if err := s.Move(in...); err != nil {
				stopped++
				for i, p := range poses(s, Link(len(g.at))) {
					if p != before[i] {
						t.Errorf("kind %d, seed %d: %v, and link %d has moved", kind, seed, err, i)
					}
				}
				break
			}
			moved++
			path = append(path, append([]rigid.Coordinate{}, in...))
			margin := s.Margin()
			least = math.Min(least, margin)
			if o := open(l, s, in); !(o.pos < 2e-14 && o.vel < 1e-13/margin && o.acc < 1e-13/margin/margin) {
				t.Fatalf("kind %d, seed %d: %+v, margin %.2g", kind, seed, o, margin)
			}
			for i, k := range g.meshes(s) {
				if !(math.Abs(k-kept[i]) < 1e-13) {
					t.Fatalf("kind %d, seed %d: mesh %d slips by %v", kind, seed, i, k-kept[i])
				}
			}
		}
		path = append([][]rigid.Coordinate{g.in}, path...)
		for k := len(path) - 2; k >= 0; k-- {
			if err := s.Move(path[k]...); err != nil {
				t.Fatalf("kind %d, seed %d, on the way back: %v", kind, seed, err)
			}
		}
		for i, p := range poses(s, Link(len(g.at))) {
			q := start[i]
			if off := math.Abs(p.X-q.X) + math.Abs(p.Y-q.Y) + math.Abs(rigid.Wrap(p.Angle-q.Angle)); !(off < 1e-13/least) {
				t.Errorf("kind %d, seed %d: link %d is back %.2g from where it began, margin down to %.2g", kind, seed, i, off, least)
			}
		}
	}
	t.Logf("%d moves, %d machines stopped", moved, stopped)
	if moved < 10*n {
		t.Errorf("%d moves, %d machines stopped", moved, stopped)
	}
}

// TestFarGuesses assembles dyads, triads, rolling groups and parallelograms from guesses that are up
// to 30° and 30 % of their size off: what is assembled closes to 1e-14 of the size,
// and what is not is told, by an error that names links.
func TestFarGuesses(t *testing.T) {
	n, closed, failed := 1000, [4]int{}, [4]int{}
	if testing.Short() {
		n = 200
	}
	random := rand.New(rand.NewPCG(30, 30))
	for i := range n {
		var d Design
		var guess []rigid.Placement
		var in []rigid.Coordinate
		switch i % 4 {
		case 0:
			g := grow(uint64(i), i/4%10, random.IntN(growths))
			d, guess, in = g.Design, g.guess(), g.in
		case 1:
			p := newPlatform(random, []string{"ccc", "ccl", "ccm", "cll", "clm", "cmm", "llm", "lmm"}[i/4%8])
			d, guess = p.Design, p.guess()
			for _, x := range p.in {
				in = append(in, rigid.Coordinate{Pos: x, Vel: 1, Acc: 2})
			}
		case 2:
			g := rollingGroup(uint64(i), i/4%rollings)
			d, guess, in = g.Design, g.guess(), g.in
		case 3:
			w, cell, easy, at := randomSwayed(t, random)
			if easy == nil {
				continue
			}
			d, guess, in = cell.Design(), w.guess(easy), at
		}
		l, err := New(d)
		if err != nil {
			t.Fatalf("machine %d: %v", i, err)
		}
		size := 0.0
		for _, p := range guess {
			size = math.Max(size, math.Hypot(p.X, p.Y))
		}
		off := func() float64 { return 0.3 * size * (2*random.Float64() - 1) }
		for k := range guess[1:] {
			p := &guess[k+1]
			p.X, p.Y, p.Angle = p.X+off(), p.Y+off(), p.Angle+30*rigid.Degree*(2*random.Float64()-1)
		}
		s, err := l.Assemble(guess, in...)
		if err != nil {
			failed[i%4]++
			known := errors.Is(err, rigid.ErrUnreachable) || errors.Is(err, rigid.ErrSingular) || errors.Is(err, ErrTooFar)
			if !known || !strings.Contains(err.Error(), "links ") {
				t.Errorf("machine %d: %v", i, err)
			}
			continue
		}
		closed[i%4]++
		if o := open(l, s, in); !(o.pos < 1e-14 && o.vel < 1e-13/s.Margin() && o.acc < 1e-13/s.Margin()/s.Margin()) {
			t.Errorf("machine %d: %+v, margin %.2g", i, o, s.Margin())
		}
	}
	t.Logf("%v closed, %v told", closed, failed)
	for i := range closed {
		if closed[i] < 2*failed[i] {
			t.Errorf("%v closed, %v told", closed, failed)
		}
	}
}
