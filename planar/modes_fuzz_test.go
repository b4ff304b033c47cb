package planar_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// sane takes the first modes of a linkage: each must close and be a place of its own,
// each error one of those that Modes tells of.
func sane(t *testing.T, l *Linkage, in []rigid.Coordinate) (modes []*State, whole bool) {
	t.Helper()
	const most = 40
	whole = true
	large := false // angles that a float64 hardly tells from one another
	for _, c := range in {
		large = large || math.Abs(c.Pos) > 1e6
	}
	for s, err := range l.Modes(in...) {
		switch {
		case err == nil && s == nil || err != nil && s != nil:
			t.Fatalf("%v, %v", s, err)
		case errors.Is(err, ErrIncomplete):
			whole = false
		case err != nil && !errors.Is(err, rigid.ErrSingular) && !errors.Is(err, rigid.ErrInput) && !errors.Is(err, rigid.ErrNotFinite):
			t.Fatal(err)
		case err == nil:
			if o := open(l, s, in); !large && s.Margin() > 1e-6 && !(o.pos < 1e-9) {
				t.Fatalf("%s: %+v, margin %.2g, design %+v", s.Mode(), o, s.Margin(), l.Design())
			}
			if modes = append(modes, s); len(modes) == most {
				return modes, false
			}
		}
	}
	return modes, whole
}

// TestModesOfRandomDesigns holds linkages of few round numbers, in which pins coincide
// and lines are parallel often, to this: what assembling from a guess finds, if the
// drives determine it, is among the modes, or these are not said to be complete.
func TestModesOfRandomDesigns(t *testing.T) {
	random := rand.New(rand.NewPCG(9, 9))
	tries := 500
	if testing.Short() {
		tries = 120
	}
	found, asked, incomplete := 0, 0, 0
	for k := range tries {
		d := counted(random)
		l, err := New(d)
		if err != nil {
			continue
		}
		in := make([]rigid.Coordinate, len(d.Drives))
		for i := range in {
			in[i].Pos = 0.3 + random.Float64()
		}
		modes, whole := sane(t, l, in)
		asked++
		if !whole {
			incomplete++
			continue
		}
		for range 5 {
			s, err := l.Assemble(scattered(random, len(d.Links)), in...)
			if err != nil || s.Margin() < 1e-5 {
				continue
			}
			found++
			if !among(l, s, modes, 1e-9/s.Margin()) {
				t.Errorf("%d: mode %s from a guess alone, margin %.2g, %d modes, %s, design %+v", k, s.Mode(), s.Margin(), len(modes), groups(l), d)
				break
			}
		}
	}
	t.Logf("%d linkages, %d places found, %d incomplete", asked, found, incomplete)
	if found < tries/4 {
		t.Errorf("%d places found", found)
	}
}

func FuzzModes(f *testing.F) {
	for seed := range uint64(12) {
		f.Add(seed, uint8(seed), 0.7, 0.0, 1.0)
	}
	f.Add(uint64(1), uint8(2), 1e300, 1e-300, 1e60)
	f.Add(uint64(2), uint8(1), math.Pi, 0.0, 0.0)
	f.Fuzz(func(t *testing.T, seed uint64, kind uint8, pos, vel, size float64) {
		random := rand.New(rand.NewPCG(seed, 1))
		var d Design
		switch kind % 3 {
		case 0:
			d = counted(random)
		case 1:
			d = grow(seed, int(kind)%growths, random.IntN(growths)).Design
		case 2:
			d, _ = chained(random, 1+int(kind/3)%2)
		}
		if len(d.Joints) > 0 {
			if r, ok := d.Joints[0].(Revolute); ok {
				r.A.X *= size
				d.Joints[0] = r
			}
		}
		l, err := New(d)
		if err != nil {
			return
		}
		in := make([]rigid.Coordinate, len(d.Drives))
		for i := range in {
			in[i] = rigid.Coordinate{Pos: pos, Vel: vel}
		}
		_, _ = sane(t, l, in)
	})
}
