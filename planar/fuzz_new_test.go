package planar_test

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A source reads a design from bytes: small numbers, so that points coincide and
// lines are parallel often, now and then one that is of no use.
type source []byte

func (s *source) next() int {
	if len(*s) == 0 {
		return 0
	}
	b := (*s)[0]
	*s = (*s)[1:]
	return int(b)
}

func (s *source) number() float64 {
	switch b := s.next(); {
	case b < 200:
		return float64(b%8-3) / 4
	case b < 250:
		return float64(b) / 97
	default:
		return []float64{math.NaN(), math.Inf(1), 1e61, -1e60, 1e-70, 0}[b-250]
	}
}

func (s *source) link(links int) Link {
	if b := s.next(); b < 250 {
		return Link(b % links)
	}
	return Link(s.next() - 3)
}

func (s *source) point(links int) Attachment { return s.link(links).At(s.number(), s.number()) }
func (s *source) line(links int) Line        { return s.link(links).Line(s.number(), s.number(), s.number()) }

func (s *source) joint(links int) Joint {
	switch s.next() % 12 {
	case 0, 1, 2, 3, 4:
		return Revolute{A: s.point(links), B: s.point(links)}
	case 5, 6:
		return Prismatic{A: s.line(links), B: s.line(links)}
	case 7:
		return SlidingPin{Pin: s.point(links), Slot: s.line(links)}
	case 8:
		return Fixed{A: s.line(links), B: s.line(links)}
	case 9:
		b := s.next()
		return GearPair{A: s.link(links), B: s.link(links), Arm: s.link(links), TeethA: b % 7, TeethB: s.next() % 5, RadiusA: s.number(),
			Internal: b&8 > 0, Phase: s.number() * float64(b>>4&1), AsAssembled: b&32 > 0}
	case 10:
		return RackPair{Pinion: s.point(links), Rack: s.line(links), Radius: s.number(), Right: s.next()&1 > 0, AsAssembled: s.next()&1 > 0}
	}
	return []Joint{nil, &Revolute{}, (*GearPair)(nil), Revolute{}}[s.next()%4]
}

func (s *source) drive(links int) Drive {
	switch s.next() % 8 {
	case 0, 1, 2, 3:
		return Turn{Of: s.link(links), From: s.link(links)}
	case 4, 5:
		return Slide{Of: s.line(links), From: s.line(links)}
	case 6:
		return Reach{A: s.point(links), B: s.point(links)}
	}
	return []Drive{nil, &Turn{}}[s.next()%2]
}

func (s *source) design() Design {
	var d Design
	links := 1 + s.next()%8
	for i := range links {
		d.Links = append(d.Links, fmt.Sprint("l", i))
	}
	for range s.next() % 14 {
		d.Joints = append(d.Joints, s.joint(links))
	}
	for range s.next() % 4 {
		d.Drives = append(d.Drives, s.drive(links))
	}
	if s.next()%2 == 1 {
		for range links {
			d.Guess = append(d.Guess, rigid.Placement{X: s.number(), Y: s.number(), Angle: s.number()})
		}
	}
	return d
}

// sound checks what holds of every answer of New.
func sound(t *testing.T, d Design) *Linkage {
	t.Helper()
	l, err := New(d)
	if err != nil {
		if bad, ok := errors.AsType[*DesignError](err); !ok || l != nil || bad.Err == nil || !strings.HasPrefix(err.Error(), "twopoint: ") {
			t.Fatalf("New: %v, %T %v", l, err, err)
		}
		return nil
	}
	if l.Mobility() != len(d.Drives) {
		t.Fatalf("mobility %d with %d drives", l.Mobility(), len(d.Drives))
	}
	var solved []Link
	for _, g := range l.Groups() {
		if g.Class < 1 || (g.Kind != NoDyad) && g.Class != 2 {
			t.Fatalf("class and kind: %+v", g)
		}
		solved = append(solved, g.Links...)
	}
	slices.Sort(solved)
	if len(slices.Compact(slices.Clone(solved))) != len(solved) || slices.Contains(solved, 0) {
		t.Fatalf("groups %v", l.Groups())
	}
	if err := Once(l); err != nil {
		t.Fatal(err)
	}
	return l
}

func FuzzNew(f *testing.F) {
	random := rand.New(rand.NewPCG(7, 7))
	for range 20 {
		seed := make([]byte, 120)
		for i := range seed {
			seed[i] = byte(random.IntN(250))
		}
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		s := source(data)
		sound(t, s.design())
	})
}

// counted returns a random design whose count is right: as many drives as
// 3(n − 1) − 2·(pins and guides) − (slots, meshes) says.
func counted(random *rand.Rand) Design {
	var p plan
	links := 2 + random.IntN(6)
	for i := range links {
		p.Links = append(p.Links, fmt.Sprint("l", i))
	}
	free := 3 * (links - 1)
	coordinate := func() float64 { return float64(random.IntN(9)-4) / 4 }
	for free > 2 || free > 0 && random.IntN(3) > 0 {
		a := Link(random.IntN(links - 1))
		b := a + 1 + Link(random.IntN(links-1-int(a)))
		c := Link(random.IntN(links))
		at, to := a.At(coordinate(), coordinate()), b.At(coordinate(), coordinate())
		lineA, lineB := a.Line(coordinate(), coordinate(), coordinate()), b.Line(coordinate(), coordinate(), coordinate())
		switch k := random.IntN(12); {
		case k < 7 && free >= 2:
			p.pin(at, to)
			free--
		case k < 9 && free >= 2:
			p.guide(lineA, lineB)
			free--
		case k == 9:
			p.slot(at, lineB)
		case k == 10 && c != a && c != b:
			p.Joints = append(p.Joints, GearPair{A: a, B: b, Arm: c, TeethA: 10 + random.IntN(9), TeethB: 20, Internal: random.IntN(2) > 0})
		case k == 11:
			p.Joints = append(p.Joints, RackPair{Pinion: at, Rack: lineB, Radius: 0.5 + random.Float64(), Right: random.IntN(2) > 0})
		default:
			continue
		}
		free--
	}
	for range free {
		a := Link(random.IntN(links - 1))
		b := a + 1 + Link(random.IntN(links-1-int(a)))
		switch random.IntN(4) {
		case 0:
			p.slide(b.Line(coordinate(), 0, 0), a.Line(0, coordinate(), 1))
		case 1:
			p.reach(a.At(coordinate(), 0), b.At(0, coordinate()))
		default:
			p.turn(b, a)
		}
	}
	return p.Design
}

// Random designs are refused or sound, and the order of their joints does not decide
// which.
func TestRandomDesigns(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 4))
	tries, good := 1200, 0
	if testing.Short() {
		tries = 300
	}
	for range tries {
		d := counted(random)
		l := sound(t, d)
		if l != nil {
			good++
		}
		random.Shuffle(len(d.Joints), func(i, j int) { d.Joints[i], d.Joints[j] = d.Joints[j], d.Joints[i] })
		if again := sound(t, d); (again == nil) != (l == nil) {
			t.Fatalf("the order of joints decides: %+v", d)
		}
		d.Guess = make([]rigid.Placement, len(d.Links))
		for i := range d.Guess {
			d.Guess[i] = rigid.Placement{X: random.NormFloat64(), Y: random.NormFloat64(), Angle: random.NormFloat64()}
		}
		sound(t, d)
	}
	if good < tries/20 || good > tries*19/20 {
		t.Errorf("%d of %d designs are right", good, tries)
	}
}

// grown returns a linkage that is grown from driven cranks dyad by dyad, with its
// groups in the order of growth.
func grown(random *rand.Rand, dyads int) (Design, []string) {
	var p plan
	var want []string
	point := func(l Link) Attachment { return l.At(random.NormFloat64(), random.NormFloat64()) }
	line := func(l Link) Line { return l.Line(random.NormFloat64(), random.NormFloat64(), random.NormFloat64()) }
	join := func(kind byte, a, b Link) {
		if kind == 'R' {
			p.pin(point(a), point(b))
		} else {
			p.guide(line(a), line(b))
		}
	}
	crank := p.Link("crank")
	p.pin(point(Frame), point(crank))
	p.turn(crank, Frame)
	want = append(want, "crank")
	kinds := []string{"RRR", "RRP", "RPR", "PRP", "RPP"}
	for i := range dyads {
		kind := kinds[random.IntN(len(kinds))]
		from, to := Link(random.IntN(len(p.Links))), Link(random.IntN(len(p.Links)))
		l := p.links(fmt.Sprint("a", i), fmt.Sprint("b", i))
		join(kind[0], from, l[0])
		join(kind[1], l[0], l[1])
		join(kind[2], l[1], to)
		want = append(want, fmt.Sprintf("a%d+b%d %s", i, i, kind))
	}
	return p.Design, want
}

// Growth gives the groups: each dyad is one, of the kind it was grown as.
func TestGrownGroups(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 6))
	for range 200 {
		d, want := grown(random, 1+random.IntN(12))
		random.Shuffle(len(d.Joints), func(i, j int) { d.Joints[i], d.Joints[j] = d.Joints[j], d.Joints[i] })
		l := sound(t, d)
		if l == nil {
			_, err := New(d)
			t.Fatalf("%v: %v", want, err)
		}
		got := strings.Split(groups(l), " | ")
		slices.Sort(got)
		slices.Sort(want)
		if !slices.Equal(got, want) {
			t.Fatalf("groups\n got %v\nwant %v", got, want)
		}
	}
}
