package planar_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestBadUse gives wrong input to every method: an error or NaN, never a panic, and
// the State as it was.
func TestBadUse(t *testing.T) {
	l := fourBarOf(t, 0.4, 1.2, 0.8, 1)
	s, err := l.AssembleMode(".+", at(1))
	if err != nil {
		t.Fatal(err)
	}
	before := s.Clone()
	guess := placed(l, s)
	nan, inf := math.NaN(), math.Inf(1)
	is := func(what string, err, want error) {
		t.Helper()
		if !errors.Is(err, want) {
			t.Errorf("%s: %v, want %v", what, err, want)
		}
		if err != nil && !strings.HasPrefix(err.Error(), "twopoint: ") {
			t.Errorf("%s: %q", what, err)
		}
	}
	stopped := func(want error) {
		t.Helper()
		if stop, ok := s.Stop(); !ok || stop.Err != want || stop.Group != -1 || stop.Done != 0 {
			t.Errorf("want %v: %+v, %v", want, stop, ok)
		}
	}
	is("no input", s.Move(), rigid.ErrInput)
	stopped(rigid.ErrInput)
	is("two inputs", s.Move(at(1), at(1)), rigid.ErrInput)
	for _, c := range []rigid.Coordinate{{Pos: nan}, {Vel: nan}, {Acc: nan}, {Pos: inf}, {Vel: -inf}, {Acc: inf}} {
		is("not finite", s.Move(c), rigid.ErrNotFinite)
		stopped(rigid.ErrNotFinite)
	}
	is("overflow", s.Move(rigid.Coordinate{Pos: 1, Vel: 1e200}), rigid.ErrNotFinite)
	is("too far", s.Move(at(1e3)), ErrTooFar)
	stopped(ErrTooFar)
	is("another linkage", s.Set(mode(t, l.Design(), ".+", at(1))), rigid.ErrInput)
	if far(l, s, before) != 0 {
		t.Error("moved")
	}
	var zero State
	is("zero State", zero.Move(at(1)), rigid.ErrInput)
	is("zero State", zero.Set(s), rigid.ErrInput)
	is("from a zero State", s.Set(&zero), rigid.ErrInput)
	_, err = zero.Pole(1, 2)
	is("zero State", err, rigid.ErrInput)
	if m := zero.Motion(1); m.Omega == m.Omega || zero.Margin() == zero.Margin() || zero.Mode() != "" || zero.Inputs() != nil {
		t.Error("a zero State tells something")
	}
	if _, ok := zero.Stop(); ok {
		t.Error("a zero State has stopped")
	}
	zero.Clone().Point(Link(1).At(0, 0))
	for range zero.Sweep(rigid.Interval{Hi: 1}, 5) {
	}
	for _, link := range []Link{-1, 4, 1 << 30} {
		p, c := s.Point(link.At(1, 2)), s.Turn(link, 1)
		d := s.Slide(Link(1).Line(0, 0, 0), link.Line(0, 0, 0))
		if p.Pos.X == p.Pos.X || p.Acc.Y == p.Acc.Y || c.Pos == c.Pos || d.Vel == d.Vel || s.Motion(link).Alpha == s.Motion(link).Alpha {
			t.Errorf("link %d tells something", link)
		}
	}

	var none Linkage
	_, err = none.Assemble(guess, at(1))
	is("zero Linkage", err, rigid.ErrInput)
	_, err = none.AssembleMode("", at(1))
	is("zero Linkage", err, rigid.ErrInput)
	_, err = l.Assemble(nil, at(1))
	is("no guess", err, rigid.ErrInput)
	_, err = l.Assemble(guess[:3], at(1))
	is("short guess", err, rigid.ErrInput)
	_, err = l.Assemble(guess)
	is("no inputs", err, rigid.ErrInput)
	_, err = l.Assemble(guess, at(nan))
	is("NaN", err, rigid.ErrNotFinite)
	_, err = l.Assemble([]rigid.Placement{{X: nan}, {}, {X: inf}, {}}, at(1))
	is("infinite guess", err, rigid.ErrNotFinite)
	for _, m := range []string{"", ".", ".++", "++", ".?", ".=", ".x", "..", "\xff+"} {
		_, err = l.AssembleMode(m, at(1))
		is("mode "+m, err, rigid.ErrInput)
	}
	short := fourBarOf(t, 1, 1, 1, 5)
	_, err = short.Assemble(guess, at(1))
	is("never closes", err, rigid.ErrUnreachable)
	if err == nil || !strings.Contains(err.Error(), "coupler, follower") || !strings.Contains(err.Error(), " m apart") {
		t.Errorf("never closes: %v", err)
	}
}

// TestModes assembles both modes of a four-bar and the same from a guess; a Clone is
// on its own, and Set brings whole turns too.
func TestModes(t *testing.T) {
	l := fourBarOf(t, 0.4, 1.2, 0.8, 1)
	if s, err := l.AssembleMode(".−", at(1)); err != nil || s.Mode() != ".-" {
		t.Errorf("a minus sign: %v, %v", s, err)
	}
	for _, m := range []string{".+", ".-"} {
		s, err := l.AssembleMode(m, at(1))
		if err != nil {
			t.Fatal(err)
		}
		for k := range 40 {
			g := placed(l, s)
			for i := range g {
				g[i].X += 0.02 * math.Sin(float64(3*i+k))
				g[i].Angle += 0.1 * math.Cos(float64(5*i+k))
			}
			again, err := l.Assemble(g, s.Inputs()...)
			if err != nil {
				t.Fatal(err)
			}
			if again.Mode() != m || far(l, s, again) > 1e-14 {
				t.Errorf("mode %s at %v: %s from near it", m, s.Inputs()[0].Pos, again.Mode())
			}
			if err := s.Move(at(1 + 0.4*float64(k))); err != nil {
				t.Fatal(err)
			}
		}
		c := s.Clone()
		if err := s.Move(unit(30)); err != nil {
			t.Fatal(err)
		}
		if c.Turn(1, Frame).Pos != 1+0.4*39 || c.Mode() != m {
			t.Error("a Clone has moved")
		}
		if err := c.Set(s); err != nil {
			t.Fatal(err)
		}
		if a, b := c.Turn(3, 1), s.Turn(3, 1); a != b || far(l, c, s) != 0 {
			t.Errorf("Set: %v, %v", a, b)
		}
	}
}

// TestWholeTurns follows a double crank and its links over turns both ways: turns
// are continuous, and those of the follower are the crank's on the mean.
func TestWholeTurns(t *testing.T) {
	l := fourBarOf(t, 60, 50, 55, 20)
	s, err := l.AssembleMode(".+", at(3))
	if err != nil {
		t.Fatal(err)
	}
	pairs := [][2]Link{{3, Frame}, {Frame, 3}, {2, 1}, {3, 2}, {1, 3}}
	first := make([]float64, len(pairs))
	last := make([]float64, len(pairs))
	for i, p := range pairs {
		first[i] = s.Turn(p[0], p[1]).Pos
		last[i] = first[i]
		if !(first[i] > -math.Pi && first[i] <= math.Pi) {
			t.Errorf("turn of %v is %v at first", p, first[i])
		}
	}
	for k := range 2001 {
		x := 3 + 0.05*float64(k)
		if k > 1000 {
			x = 3 + 0.05*float64(2000-k)
		}
		if err := s.Move(unit(x)); err != nil {
			t.Fatal(err)
		}
		for i, p := range pairs {
			if now := s.Turn(p[0], p[1]).Pos; !(math.Abs(now-last[i]) < 0.5) {
				t.Fatalf("step %d: turn of %v from %v to %v", k, p, last[i], now)
			} else {
				last[i] = now
			}
		}
		if k == 1000 && !(math.Abs(last[0]-first[0]-50) < math.Pi) {
			t.Errorf("the follower has turned by %v of 50", last[0]-first[0])
		}
	}
	for i, p := range pairs {
		if !(math.Abs(last[i]-first[i]) < 1e-12) {
			t.Errorf("turn of %v: %v, %v at first", p, last[i], first[i])
		}
	}
}

// TestSweep goes over the range of a rocker and beyond: ends exact, errors yielded
// where it can't follow, unit speed.
func TestSweep(t *testing.T) {
	l := fourBarOf(t, 1, 1, 1, 2.5)
	s, err := l.AssembleMode(".+", at(0))
	if err != nil {
		t.Fatal(err)
	}
	reach := math.Acos((1 + 2.5*2.5 - 4) / 5)
	n, failed := 0, 0
	for in, err := range s.Sweep(rigid.Interval{Lo: -1, Hi: 1}, 41) {
		if want := -1 + float64(n)/20; !(math.Abs(in.Pos-want) < 1e-15) || in.Vel != 1 || in.Acc != 0 {
			t.Errorf("input %v", in)
		}
		if (err != nil) != (math.Abs(in.Pos) > reach) {
			t.Errorf("at %v: %v", in.Pos, err)
		}
		if err != nil {
			failed++
		} else if o := open(l, s, []rigid.Coordinate{in}); !(o.vel < 1e-13) {
			t.Errorf("at %v: %+v", in.Pos, o)
		}
		n++
	}
	if n != 41 || failed == 0 {
		t.Errorf("%d places, %d failed", n, failed)
	}
	for _, err := range s.Sweep(rigid.Interval{Hi: 1}, 1) {
		if err != rigid.ErrInput {
			t.Error(err)
		}
	}
}
