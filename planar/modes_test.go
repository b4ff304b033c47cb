package planar_test

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// all collects the modes, and the errors beside them.
func all(l *Linkage, in ...rigid.Coordinate) (states []*State, errs []error) {
	for s, err := range l.Modes(in...) {
		if err != nil {
			errs = append(errs, err)
			continue
		}
		states = append(states, s)
	}
	return states, errs
}

// distance is how far the links are apart in two States, angles as they are on an arm
// of 1 m.
func distance(l *Linkage, a, b *State) float64 {
	most := 0.0
	for i := range l.Design().Links {
		p, q := a.Motion(Link(i)).Pose, b.Motion(Link(i)).Pose
		most = max(most, r2.Norm(r2.Sub(p.Origin, q.Origin)), r2.Norm(r2.Sub(p.Axis, q.Axis)))
	}
	return most
}

// among reports whether a State is in the place of one of others, within a distance.
func among(l *Linkage, s *State, others []*State, within float64) bool {
	for _, o := range others {
		if distance(l, s, o) < within {
			return true
		}
	}
	return false
}

func resting(in []rigid.Coordinate) []rigid.Coordinate {
	out := make([]rigid.Coordinate, len(in))
	for i, c := range in {
		out[i].Pos = c.Pos
	}
	return out
}

// scattered returns a guess for n links at random.
func scattered(random *rand.Rand, n int) []rigid.Placement {
	guess := make([]rigid.Placement, n)
	for i := range guess {
		guess[i] = rigid.Placement{X: 2 * random.NormFloat64(), Y: 2 * random.NormFloat64(), Angle: 6 * random.Float64()}
	}
	return guess
}

// products returns all modes that differ from one in the sides of dyads.
func products(mode string) []string {
	out := []string{""}
	for _, r := range mode {
		with := func(r rune) (more []string) {
			for _, m := range out {
				more = append(more, m+string(r))
			}
			return more
		}
		if r == '+' || r == '-' {
			out = append(with('+'), with('-')...)
		} else {
			out = with(r)
		}
	}
	return out
}

// TestModesOfDyads compares the modes of random chains of dyads with all products of
// sides, each tried by AssembleMode, and with what assembling from places at random
// finds. Each must close, with its rates, and that in which the linkage was grown must
// be among them.
func TestModesOfDyads(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 8))
	total, most := 0, 0
	seeds := 60
	if testing.Short() {
		seeds = 15
	}
	for seed := range uint64(seeds) {
		kinds := []int{random.IntN(growths), random.IntN(growths), random.IntN(growths)}
		g := grow(seed, kinds...)
		g.Guess = g.guess()
		name := fmt.Sprintf("kinds %v, seed %d", kinds, seed)
		l, err := New(g.Design)
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		modes, errs := all(l, g.in...)
		if len(errs) > 0 {
			t.Errorf("%s: %v", name, errs)
		}
		grown, err := l.Assemble(nil, g.in...)
		if err != nil || !among(l, grown, modes, 1e-9/grown.Margin()) {
			t.Errorf("%s: not as it was grown, %v", name, err)
			continue
		}
		names := map[string]*State{}
		for i, s := range modes {
			if o := open(l, s, g.in); !(o.pos < 1e-12 && o.vel < 1e-11/s.Margin() && o.acc < 1e-10/s.Margin()) {
				t.Errorf("%s, mode %s: %+v, margin %.2g", name, s.Mode(), o, s.Margin())
			}
			if among(l, s, modes[:i], 1e-7) || names[s.Mode()] != nil {
				t.Errorf("%s: mode %s twice", name, s.Mode())
			}
			names[s.Mode()] = s
		}
		closing := 0
		for _, m := range products(grown.Mode()) {
			s, err := l.AssembleMode(m, g.in...)
			if err != nil {
				if !errors.Is(err, rigid.ErrUnreachable) || names[m] != nil {
					t.Errorf("%s, mode %s: %v", name, m, err)
				}
				continue
			}
			closing++
			if names[m] == nil || !(distance(l, s, names[m]) < 1e-12/s.Margin()) {
				t.Errorf("%s, mode %s: in another place", name, m)
			}
		}
		if closing != len(modes) {
			t.Errorf("%s: %d modes, %d products close", name, len(modes), closing)
		}
		total, most = total+len(modes), max(most, len(modes))
		if geared(kinds) {
			continue
		}
		for range 20 {
			if s, err := l.Assemble(scattered(random, len(g.at)), g.in...); err == nil && !among(l, s, modes, 1e-9/s.Margin()) {
				t.Errorf("%s: mode %s found from a guess alone", name, s.Mode())
			}
		}
	}
	if most < 8 {
		t.Errorf("at most %d modes", most)
	}
	t.Logf("%d modes of %d linkages, at most %d", total, seeds, most)
}

// geared reports whether phases, and so the modes, depend on the guess.
func geared(kinds []int) bool {
	for _, k := range kinds {
		if k == 10 || k >= 14 {
			return true
		}
	}
	return false
}

// TestModesAsked tests what is refused, and that the iteration ends where the consumer
// does.
func TestModesAsked(t *testing.T) {
	g := grow(4, 0, 0)
	l, err := New(g.Design)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		l    *Linkage
		in   []rigid.Coordinate
		want error
	}{
		{&Linkage{}, nil, rigid.ErrInput},
		{l, nil, rigid.ErrInput},
		{l, make([]rigid.Coordinate, 2), rigid.ErrInput},
		{l, []rigid.Coordinate{{Pos: math.NaN()}}, rigid.ErrNotFinite},
		{l, []rigid.Coordinate{{Acc: math.Inf(1)}}, rigid.ErrNotFinite},
	} {
		n := 0
		for s, err := range c.l.Modes(c.in...) {
			if n++; s != nil || !errors.Is(err, c.want) {
				t.Errorf("%+v: %v", c.in, err)
			}
		}
		if n != 1 {
			t.Errorf("%+v: %d times", c.in, n)
		}
	}
	if modes, errs := all(mustNew(t, scissorOn(2)), at(-1)); len(modes)+len(errs) > 0 {
		t.Errorf("%d modes of a cylinder of negative length, %v", len(modes), errs)
	}
	in := append([]rigid.Coordinate(nil), g.in...)
	modes := l.Modes(in...)
	in[0].Pos = math.NaN() // it is ours by now
	first := ""
	for range 2 {
		for s, err := range modes {
			if err != nil {
				t.Fatal(err)
			}
			if first == "" {
				first = s.Mode()
			}
			if s.Mode() != first {
				t.Errorf("begins with %s and then with %s", first, s.Mode())
			}
			break
		}
	}
}

// TestModesAreOwn moves each mode on by itself.
func TestModesAreOwn(t *testing.T) {
	g := grow(4, 0, 0)
	l, err := New(g.Design)
	if err != nil {
		t.Fatal(err)
	}
	modes, _ := all(l, resting(g.in)...)
	if len(modes) < 2 {
		t.Fatalf("%d modes", len(modes))
	}
	before := modes[1].Clone()
	if err := modes[0].Move(rigid.Coordinate{Pos: g.in[0].Pos + 1e-3}); err != nil {
		t.Fatal(err)
	}
	if distance(l, modes[1], before) != 0 || distance(l, modes[0], before) < 1e-3 {
		t.Error("one mode moves another")
	}
}

// TestModesWithoutEnd gives up a search that would take 2⁶⁰ branches: sixty dyads on
// one crank, and one that never closes.
func TestModesWithoutEnd(t *testing.T) {
	if testing.Short() {
		t.Skip("a million branches")
	}
	var p plan
	crank := p.links("crank")[0]
	p.pin(Frame.At(0, 0), crank.At(0, 0))
	p.turn(crank, Frame)
	dyad := func(long float64) {
		l := p.links("", "")
		p.pin(crank.At(1, 0), l[0].At(0, 0))
		p.pin(l[0].At(long, 0), l[1].At(long, 0))
		p.pin(Frame.At(4, 0), l[1].At(0, 0))
	}
	for range 60 {
		dyad(3)
	}
	dyad(1)
	for i := range p.Links {
		p.Links[i] = fmt.Sprint(i)
	}
	l, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	modes, errs := all(l, rigid.Coordinate{Pos: 1})
	if len(modes) > 0 || len(errs) != 1 || !errors.Is(errs[0], ErrIncomplete) {
		t.Errorf("%d modes, %v", len(modes), errs)
	}
}
