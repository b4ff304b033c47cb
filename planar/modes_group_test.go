package planar_test

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

//go:embed testdata/modes.json
var modesTable []byte

// A platformCase is a platform on three legs with all places in which it closes, by
// polynomials with 60 digits: testdata/modes.py.
type platformCase struct {
	Legs []struct {
		Kind     string
		P, G     [2]float64
		R, Angle float64
	}
	Roots  int          // degree of the polynomial: complex solutions
	Places [][3]float64 // x, y and angle of the platform
}

func platformCases(t testing.TB) (cases []platformCase) {
	t.Helper()
	if err := json.Unmarshal(modesTable, &cases); err != nil {
		t.Fatal(err)
	}
	return cases
}

func (c *platformCase) kinds() (kinds string) {
	for _, l := range c.Legs {
		kinds += l.Kind
	}
	return kinds
}

// linkage is the platform as link 1, everything in units of size.
func (c *platformCase) linkage(t testing.TB, size float64, at rigid.Pose) *Linkage {
	t.Helper()
	var p plan
	platform := p.links("platform")[0]
	fixed := func(g [2]float64, angle float64) Line {
		q := at.Point(r2.Vec{X: size * g[0], Y: size * g[1]})
		return Frame.Line(q.X, q.Y, angle+at.Angle())
	}
	for i, l := range c.Legs {
		g, own := fixed(l.G, l.Angle), platform.Line(size*l.P[0], size*l.P[1], l.Angle)
		switch l.Kind {
		case "c":
			leg := p.links(fmt.Sprintf("leg %d", i+1))[0]
			p.pin(Frame.At(g.X, g.Y), leg.At(0, 0))
			p.pin(leg.At(size*l.R, 0), platform.At(own.X, own.Y))
		case "l":
			p.slot(platform.At(own.X, own.Y), g)
		case "m":
			p.slot(Frame.At(g.X, g.Y), own)
		}
	}
	l, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// TestModesOfPlatforms finds the modes of platforms on three legs of all ten
// combinations: as many as the table has, and in the same places, at any size and
// wherever the machine stands. The number of complex solutions, regular ends of paths,
// is the degree of the polynomial: 6 at most (Gosselin, Sefrioui and Richard 1992, from
// memory).
func TestModesOfPlatforms(t *testing.T) {
	reals := map[int]int{}
	for i, c := range platformCases(t) {
		if testing.Short() && i%4 > 0 {
			continue
		}
		size := []float64{1, 1e-6, 1e3}[i%3]
		at := rigid.NewPose(0, 0, 0)
		if i%2 == 1 {
			at = rigid.NewPose(20*size, -50*size, 2)
		}
		l := c.linkage(t, size, at)
		name := fmt.Sprintf("%d, %s", i, c.kinds())
		modes, errs := all(l)
		if len(errs) > 0 || len(modes) != len(c.Places) {
			t.Errorf("%s: %d modes of %d, %v", name, len(modes), len(c.Places), errs)
			continue
		}
		reals[len(modes)]++
		if simple := Ends(l); simple != c.Roots {
			t.Errorf("%s: %d complex solutions, the polynomial has %d", name, simple, c.Roots)
		}
		for _, p := range c.Places {
			want := at.Compose(rigid.NewPose(size*p[0], size*p[1], p[2]))
			off, margin := math.Inf(1), 1.0
			for _, s := range modes {
				got := s.Motion(1).Pose
				d := max(r2.Norm(r2.Sub(got.Origin, want.Origin))/(size*max(1, math.Hypot(p[0], p[1]))), r2.Norm(r2.Sub(got.Axis, want.Axis)))
				if d < off {
					off, margin = d, s.Margin()
				}
			}
			if !(off < 1e-12/margin) {
				t.Errorf("%s: %v is off by %.2g, margin %.2g", name, p, off, margin)
			}
		}
		for k, s := range modes {
			if o := open(l, s, nil); !(o.pos < 1e-13) {
				t.Errorf("%s: %+v", name, o)
			}
			if among(l, s, modes[:k], 1e-6*size) {
				t.Errorf("%s: one place twice", name)
			}
		}
	}
	if reals[2] == 0 || reals[4] == 0 || reals[6] == 0 {
		t.Errorf("numbers of modes %v", reals)
	}
}

// TestModesBySwaps counts the places in which a linkage, moved dyad by dyad through a
// whole turn of its crank in every mode, passes a value of another drive: so many modes
// it has when driven there, as a group of higher class.
func TestModesBySwaps(t *testing.T) {
	cases, _ := peers(t)
	for _, name := range []string{"sixbar_watt", "sixbar_steph"} {
		p := cases[name]
		l, guess := p.linkage(t)
		start, err := l.Assemble(guess, at(0.8))
		if err != nil {
			t.Fatal(err)
		}
		for _, driven := range []Link{2, 3, 4, 5} {
			d := l.Design()
			d.Drives = []Drive{Turn{Of: driven, From: Frame}}
			other, err := New(d)
			if err != nil {
				t.Fatal(err)
			}
			value := start.Turn(driven, Frame).Pos
			modes, errs := all(other, at(value))
			if want := passes(t, l, start.Mode(), driven, value); len(modes) != want || len(errs) > 0 {
				t.Errorf("%s by %d: %d modes, passed %d times, %v", name, driven, len(modes), want, errs)
			} else {
				t.Logf("%s by %d, %s: %d modes", name, driven, groups(other), len(modes))
			}
			if !among(l, start, modes, 1e-9) {
				t.Errorf("%s by %d: not as it was", name, driven)
			}
		}
	}
}

// passes counts how often a link passes an angle while the crank turns once, in all
// modes.
func passes(t *testing.T, l *Linkage, mode string, link Link, angle float64) (n int) {
	t.Helper()
	const steps = 1500
	for _, m := range products(mode) {
		var last float64
		had := false
		for k := range steps + 1 {
			s, err := l.AssembleMode(m, at(0.8e-3+2*math.Pi*float64(k)/steps))
			if err != nil {
				had = false
				continue
			}
			off := rigid.Wrap(s.Turn(link, Frame).Pos - angle)
			if had && off*last < 0 && math.Abs(off)+math.Abs(last) < 1 {
				n++
			}
			last, had = off, true
		}
	}
	return n
}
