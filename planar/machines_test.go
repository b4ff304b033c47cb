package planar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A grown linkage is made dyad by dyad from a position that is known: the place of
// every link at the start is where its pins were put.
type grower struct {
	plan
	random *rand.Rand
	at     []rigid.Pose
	in     []rigid.Coordinate
}

func (g *grower) spread(s float64) float64 { return s * (2*g.random.Float64() - 1) }
func (g *grower) spot() r2.Vec             { return r2.Vec{X: g.spread(2), Y: g.spread(2)} }

// body adds a link at random.
func (g *grower) body() Link {
	l := g.Link("")
	p := g.spot()
	g.at = append(g.at, rigid.NewPose(p.X, p.Y, g.spread(3)))
	return l
}

func (g *grower) any() Link { return Link(g.random.IntN(len(g.at))) }

// on returns a place as a point of a link.
func (g *grower) on(l Link, p r2.Vec) Attachment {
	q := g.at[l].Local(p)
	return l.At(q.X, q.Y)
}

// line returns a line through a place, at an angle in the frame, in a link's axes.
func (g *grower) line(l Link, p r2.Vec, angle float64) Line {
	q := g.at[l].Local(p)
	return l.Line(q.X, q.Y, angle-g.at[l].Angle())
}

func (g *grower) hinge(a, b Link, p r2.Vec) { g.pin(g.on(a, p), g.on(b, p)) }

func (g *grower) rail(a, b Link, p r2.Vec, angle float64) {
	q := r2.Add(p, r2.Scale(g.spread(0.5), rigid.NewPose(0, 0, angle).Axis))
	g.guide(g.line(a, p, angle), g.line(b, q, angle))
}

func (g *grower) drive(d Drive, pos float64) {
	g.Drives = append(g.Drives, d)
	g.in = append(g.in, rigid.Coordinate{Pos: pos, Vel: g.spread(3), Acc: g.spread(5)})
}

// crank adds a link pinned to another and driven from it.
func (g *grower) crank() {
	on, l := g.any(), g.body()
	g.hinge(on, l, g.spot())
	g.drive(Turn{Of: l, From: on}, rigid.Wrap(g.at[l].Angle()-g.at[on].Angle()))
}

// grow adds a dyad, or what else is solved by a closed form.
func (g *grower) grow(kind int) {
	a, c := g.any(), g.any()
	one, two := g.body(), g.body()
	angle := g.spread(3)
	switch kind {
	case 0: // RRR
		mid := g.spot()
		g.hinge(a, one, g.spot())
		g.hinge(one, two, mid)
		g.hinge(two, c, g.spot())
	case 1: // RRP
		g.hinge(a, one, g.spot())
		g.hinge(one, two, g.spot())
		g.rail(c, two, g.spot(), angle)
	case 2: // RRP, the line in the slider
		g.hinge(two, one, g.spot())
		g.hinge(a, one, g.spot())
		g.rail(two, c, g.spot(), angle)
	case 3: // RPR
		g.hinge(a, one, g.spot())
		g.rail(one, two, g.spot(), angle)
		g.hinge(two, c, g.spot())
	case 4: // PRP
		g.rail(a, one, g.spot(), angle)
		g.hinge(one, two, g.spot())
		g.rail(c, two, g.spot(), angle+1+g.spread(0.4))
	case 5: // RPP
		g.hinge(a, one, g.spot())
		g.rail(one, two, g.spot(), angle)
		g.rail(c, two, g.spot(), angle+1+g.spread(0.4))
	case 6: // two pins, one in a slot
		p, q := g.spot(), g.spot()
		g.hinge(a, one, p)
		g.slot(g.on(one, q), g.line(c, q, angle))
		g.hinge(a, two, g.spot())
		g.slot(g.on(c, q), g.line(two, q, angle+1))
	case 7: // a cylinder for a link
		rod := g.body()
		p, q := g.spot(), g.spot()
		g.hinge(a, one, p)
		g.rail(one, rod, p, angle)
		g.hinge(rod, two, q)
		g.hinge(two, c, g.spot())
		from, of := g.line(one, p, angle), g.line(rod, q, angle)
		g.drive(Slide{Of: of, From: from}, r2.Dot(rigid.NewPose(0, 0, angle).Axis, r2.Sub(q, p)))
	case 8: // a driven distance, and a link on what it moves
		p, q := g.spot(), g.spot()
		g.hinge(c, one, g.spot())
		g.drive(Reach{A: g.on(a, p), B: g.on(one, q)}, r2.Norm(r2.Sub(q, p)))
		g.hinge(one, two, g.spot())
		g.drive(Turn{Of: two, From: a}, rigid.Wrap(g.at[two].Angle()-g.at[a].Angle()))
	case 9: // driven at the middle pin
		p := g.spot()
		three := g.body()
		g.hinge(a, one, g.spot())
		g.hinge(one, two, p)
		g.drive(Turn{Of: two, From: one}, rigid.Wrap(g.at[two].Angle()-g.at[one].Angle()))
		g.hinge(two, three, g.spot())
		g.hinge(three, c, g.spot())
	case 10: // one link on an arm, another geared to it and on the same arm
		g.hinge(a, one, g.spot())
		g.hinge(a, two, g.spot())
		g.drive(Turn{Of: one, From: a}, rigid.Wrap(g.at[one].Angle()-g.at[a].Angle()))
		g.Joints = append(g.Joints, GearPair{A: one, B: two, Arm: a, TeethA: 20 + g.random.IntN(4), TeethB: 20, Internal: g.random.IntN(2) == 0, AsAssembled: true})
	case 11: // coupler of known angle
		mid := g.body()
		p, q := g.spot(), g.spot()
		g.hinge(a, one, g.spot())
		g.hinge(one, mid, p)
		g.hinge(mid, two, q)
		g.hinge(two, c, g.spot())
		g.drive(Turn{Of: mid, From: a}, rigid.Wrap(g.at[mid].Angle()-g.at[a].Angle()))
	case 12: // rod of changing length on a slider
		rod := g.body()
		p, q := g.spot(), g.spot()
		g.hinge(a, one, p)
		g.rail(one, rod, g.spot(), angle)
		g.hinge(rod, two, q)
		g.rail(c, two, g.spot(), angle+0.7)
		g.drive(Slide{Of: g.line(rod, q, angle), From: g.line(one, p, angle)}, r2.Dot(rigid.NewPose(0, 0, angle).Axis, r2.Sub(q, p)))
	case 13: // driven along a guide, and a link on it
		g.rail(a, one, g.spot(), angle)
		p, q := g.spot(), g.spot()
		g.drive(Slide{Of: g.line(one, q, angle), From: g.line(a, p, angle)}, r2.Dot(rigid.NewPose(0, 0, angle).Axis, r2.Sub(q, p)))
		g.hinge(one, two, g.spot())
		g.drive(Turn{Of: two, From: c}, rigid.Wrap(g.at[two].Angle()-g.at[c].Angle()))
	case 14: // a pinion that is driven, and its rack
		p := g.spot()
		g.hinge(a, one, p)
		g.drive(Turn{Of: one, From: a}, rigid.Wrap(g.at[one].Angle()-g.at[a].Angle()))
		g.rail(a, two, g.spot(), angle)
		g.rack(one, two, p, angle, angle > 0)
	case 15: // a rack that is driven, and its pinion
		p, q := g.spot(), g.spot()
		g.rail(a, one, q, angle)
		g.drive(Slide{Of: g.line(one, q, angle), From: g.line(a, p, angle)}, r2.Dot(rigid.NewPose(0, 0, angle).Axis, r2.Sub(q, p)))
		g.hinge(a, two, p)
		g.rack(two, one, p, angle, angle > 0)
	}
}

// rack adds a rack for a pinion with its centre at p.
func (g *grower) rack(pinion, rack Link, p r2.Vec, angle float64, right bool) {
	const radius = 0.3
	side := -radius
	if right {
		side = radius
	}
	q := rigid.NewPose(p.X, p.Y, angle).Point(r2.Vec{X: g.spread(1), Y: side})
	g.Joints = append(g.Joints, RackPair{Pinion: g.on(pinion, p), Rack: g.line(rack, q, angle), Radius: radius, Right: right, AsAssembled: true})
}

const growths = 16

func grow(seed uint64, kinds ...int) *grower {
	g := &grower{random: rand.New(rand.NewPCG(seed, 3)), at: []rigid.Pose{rigid.NewPose(0, 0, 0)}}
	g.Link("")
	g.Links = g.Links[:1]
	g.crank()
	for _, k := range kinds {
		g.grow(k)
	}
	return g
}

// guess is the position known, as a guess.
func (g *grower) guess() []rigid.Placement {
	out := make([]rigid.Placement, len(g.at))
	for i, p := range g.at {
		out[i] = rigid.Placement{X: p.Origin.X, Y: p.Origin.Y, Angle: p.Angle()}
	}
	return out
}

// TestGrown assembles random linkages of every kind of dyad where they were grown,
// and drives them: every joint and drive must hold, in place, velocity and
// acceleration, and the way there in one Move must end where many small ones do.
func TestGrown(t *testing.T) {
	for kind := range growths {
		assembled := 0
		for seed := range uint64(20) {
			g := grow(seed*100+uint64(kind), kind, int(seed)%growths, kind)
			l, err := New(g.Design)
			if err != nil {
				t.Errorf("kind %d, seed %d: %v", kind, seed, err)
				break
			}
			s, err := l.Assemble(g.guess(), g.in...)
			if err != nil {
				t.Errorf("kind %d, seed %d: %v", kind, seed, err)
				continue
			}
			assembled++
			for i, p := range g.at {
				q := s.Motion(Link(i)).Pose
				if d := r2.Norm(r2.Sub(p.Origin, q.Origin)) + r2.Norm(r2.Sub(p.Axis, q.Axis)); !(d < 1e-9/s.Margin()) {
					t.Errorf("kind %d, seed %d: link %d is %.2g from where it was grown", kind, seed, i, d)
					break
				}
			}
			if o := open(l, s, g.in); !(o.pos < 1e-12 && o.vel < 1e-11 && o.acc < 1e-10) {
				t.Errorf("kind %d, seed %d: %+v, margin %.2g", kind, seed, o, s.Margin())
			}
		}
		if assembled == 0 {
			t.Errorf("kind %d: none assembled", kind)
		}
	}
}

var _ = math.Pi
