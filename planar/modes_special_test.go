package planar_test

import (
	"errors"
	"fmt"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestModesOfCells takes a parallelogram through its modes: parallel and contrary, of a
// rhombus parallel and with the far pin on the crank's; and a kite of it.
func TestModesOfCells(t *testing.T) {
	cell := func(frame, crank float64) *Linkage {
		var p plan
		l := p.links("crank", "coupler", "rocker")
		p.pin(Frame.At(0, 0), l[0].At(0, 0))
		p.pin(l[0].At(crank, 0), l[1].At(0, 0))
		p.pin(l[1].At(frame, 0), l[2].At(crank, 0))
		p.pin(Frame.At(frame, 0), l[2].At(0, 0))
		p.turn(l[0], Frame)
		linkage, err := New(p.Design)
		if err != nil {
			t.Fatal(err)
		}
		return linkage
	}
	for _, c := range []struct {
		frame, crank, in float64
		want             []string
	}{
		{3, 1, 1, []string{".=", ".x"}},
		{3, 1, 0, []string{".=", ".x"}}, // flat: they part from here
		{3, 1, math.Pi, []string{".=", ".x"}},
		{1, 1, 1, []string{".=", ".-"}}, // the other side is the parallel motion
		{1, 1, -1, []string{".=", ".+"}},
		{1, 1, math.Pi, []string{".="}},
	} {
		l := cell(c.frame, c.crank)
		modes, errs := all(l, rigid.Coordinate{Pos: c.in})
		var got []string
		for _, s := range modes {
			got = append(got, s.Mode())
			if o := open(l, s, []rigid.Coordinate{at(c.in)}); !(o.pos < 1e-14) {
				t.Errorf("%+v: %s: %+v", c, s.Mode(), o)
			}
		}
		if fmt.Sprint(got) != fmt.Sprint(c.want) || len(errs) > 0 {
			t.Errorf("%+v: modes %v, %v", c, got, errs)
		}
	}
}

// TestModesOfFlatDyad holds a crank and rocker at a limit of the rocker's drive: the
// two sides of crank and coupler are one place there, and none beyond.
func TestModesOfFlatDyad(t *testing.T) {
	const frame, crank, coupler, rocker = 4, 1, 3.5, 2.7
	var p plan
	l := p.links("crank", "coupler", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(crank, 0), l[1].At(0, 0))
	p.pin(l[1].At(coupler, 0), l[2].At(rocker, 0))
	p.pin(Frame.At(frame, 0), l[2].At(0, 0))
	p.turn(l[2], Frame)
	linkage, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	// by the law of cosines, crank and coupler in line
	reach := crank + coupler
	limit := math.Pi - math.Acos((frame*frame+rocker*rocker-reach*reach)/(2*frame*rocker))
	for _, c := range []struct {
		in    rigid.Coordinate
		modes int
		err   error
	}{
		{rigid.Coordinate{Pos: limit}, 1, nil},
		{rigid.Coordinate{Pos: limit, Vel: 1}, 0, rigid.ErrSingular},
		{rigid.Coordinate{Pos: limit - 1e-9}, 0, nil},
		{rigid.Coordinate{Pos: limit + 1e-9, Vel: 1}, 2, nil},
	} {
		modes, errs := all(linkage, c.in)
		if len(modes) != c.modes || (c.err == nil) != (len(errs) == 0) || len(errs) > 0 && !errors.Is(errs[0], c.err) {
			t.Errorf("%+v: %d modes, %v", c, len(modes), errs)
		}
	}
}

// TestModesOfRedundant leaves the third crank of a double parallelogram to be checked:
// it holds in the parallel motions only.
func TestModesOfRedundant(t *testing.T) {
	var p plan
	l := p.links("crank", "beam", "second", "third")
	for i, x := range []float64{0, 2, 5} {
		c := []Link{l[0], l[2], l[3]}[i]
		p.pin(Frame.At(x, 0), c.At(0, 0))
		p.pin(c.At(1, 0), l[1].At(x, 0))
	}
	p.turn(l[0], Frame)
	p.Guess = []rigid.Placement{{}, {Angle: 1}, {X: math.Cos(1), Y: math.Sin(1)}, {X: 2, Angle: 1}, {X: 5, Angle: 1}}
	linkage, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	modes, errs := all(linkage, rigid.Coordinate{Pos: 1, Vel: 2, Acc: 3})
	if len(modes) != 1 || len(errs) > 0 {
		t.Errorf("%d modes, %v", len(modes), errs)
	}
	for _, s := range modes {
		if o := open(linkage, s, []rigid.Coordinate{{Pos: 1, Vel: 2, Acc: 3}}); !(o.pos < 1e-14 && o.vel < 1e-14 && o.acc < 1e-14) {
			t.Errorf("%s: %+v", s.Mode(), o)
		}
	}
}
