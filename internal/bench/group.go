package main

import (
	"errors"
	"fmt"
	"io"
	"math"
	"time"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A swing moves the one drive of a linkage from a place by twenty degrees, degree by
// degree, and back.
type swing struct {
	st   *planar.State
	from float64
	best float64 // least time of a Move so far, in ns
}

const swingMoves = 40

func (s *swing) input(k int) rigid.Coordinate {
	return rigid.Coordinate{Pos: s.from + float64(min(k, swingMoves-k))*rigid.Degree, Vel: 1, Acc: 2}
}

func (s *swing) time() (err error) {
	begin := time.Now()
	for k := range swingMoves {
		err = errors.Join(err, s.st.Move(s.input(k)))
	}
	s.best = math.Min(s.best, float64(time.Since(begin).Nanoseconds())/swingMoves)
	return err
}

// newSwing moves a linkage that is driven by a turn of a body to the middle of what
// the drive can do, up to a revolution.
func newSwing(d planar.Design, of planar.Link, at float64) (s swing, err error) {
	d.Drives = []planar.Drive{planar.Turn{Of: of, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		return s, err
	}
	st, err := l.Assemble(nil, rigid.Coordinate{Pos: at})
	if err != nil {
		return s, err
	}
	lo, hi, err := st.Limits(rigid.Interval{Lo: at - math.Pi, Hi: at + math.Pi})
	s = swing{st, (lo.In+hi.In)/2 - swingMoves/4*rigid.Degree, math.Inf(1)}
	return s, errors.Join(err, st.Move(s.input(0)))
}

// A groupTime compares a group of higher class with dyads: a Stephenson six-bar
// driven at its last link, which leaves a group of four angles in two loops, and the
// same linkage driven at its crank, which leaves two dyads.
type groupTime struct{ group, dyads swing }

func newGroupTime(set *cases) (*groupTime, error) {
	design, turns := bodies(set.Steph.Pins, set.Steph.Q0), set.Steph.Q0
	group, err := newSwing(design, 5, turns[3*4+2])
	dyads, err2 := newSwing(design, 1, turns[2])
	if err := errors.Join(err, err2); err != nil {
		return nil, err
	}
	g := &groupTime{group, dyads}
	return g, g.check()
}

// check holds the group against the dyads, moved to where its crank is.
func (g *groupTime) check() error {
	tool := planar.Link(4).At(2.1, 0)
	crank := g.dyads.st.Clone()
	for k := range swingMoves {
		if err := g.group.st.Move(g.group.input(k)); err != nil {
			return err
		}
		in := g.group.st.Turn(1, planar.Frame)
		in.Pos = rigid.Nearest(in.Pos, crank.Turn(1, planar.Frame).Pos)
		if err := crank.Move(in); err != nil {
			return err
		}
		a, b := g.group.st.Point(tool), crank.Point(tool)
		off := r2.Norm(r2.Sub(a.Pos, b.Pos)) + r2.Norm(r2.Sub(a.Vel, b.Vel)) + r2.Norm(r2.Sub(a.Acc, b.Acc))/(1+r2.Norm(b.Acc))
		if !(off <= 1e-9) {
			return fmt.Errorf("group of four angles: step %d is off by %v from the dyads", k, off)
		}
	}
	return nil
}

// time times both in turns for about d.
func (g *groupTime) time(d time.Duration) error {
	for begin := time.Now(); time.Since(begin) < d; {
		if err := errors.Join(g.group.time(), g.dyads.time()); err != nil {
			return err
		}
	}
	return nil
}

func (g *groupTime) report(w io.Writer) {
	group, two := g.group.best, 2*g.dyads.best
	fmt.Fprintf(w, "class III group of four angles: %.0f ns a Move of 1°, two Moves of the six-bar as dyads: %.0f ns, ratio %.2f\n", group, two, group/two)
}
