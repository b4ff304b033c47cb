package main

import (
	"fmt"
	"math"
	"strconv"
	"time"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A subject is one case solved by the library: solve fills the outputs of a peer
// for an input, the motions of all links with it.
type subject struct {
	name string
	sweep
	solve func(out *[8]float64, in rigid.Coordinate) error
}

// run times a case for about d, after one sweep that is kept for the check. As in
// the peers the inputs are made beforehand and do not wait for the last result;
// unlike theirs the turn counts on, since an angle and the same angle a turn
// later are two inputs for a linkage that remembers where it came from.
func (c subject) run(d time.Duration) (result, error) {
	r := result{Peer: library, Case: c.name, Check: map[string][8]float64{}}
	in := make([]rigid.Coordinate, c.Steps)
	var out, sink [8]float64
	for k := range in {
		in[k].Pos, in[k].Vel, in[k].Acc = c.input(k)
		if err := c.solve(&out, in[k]); err != nil {
			return r, fmt.Errorf("%s, step %d: %w", c.name, k, err)
		}
		r.Check[strconv.Itoa(k)] = out
	}
	keep := map[string][8]float64{}
	for _, k := range c.Check {
		keep[strconv.Itoa(k)] = r.Check[strconv.Itoa(k)]
	}
	r.Check = keep
	n, failed := 0, 0
	begin := time.Now()
	for turn := 1.0; time.Since(begin) < d; turn++ {
		for _, x := range in {
			x.Pos += turn * rigid.Revolution
			if c.solve(&out, x) != nil {
				failed++
			}
			for j := range out {
				sink[j] += out[j]
			}
		}
		n += len(in)
	}
	r.Ns = float64(time.Since(begin).Nanoseconds()) / float64(n)
	if failed > 0 || math.IsNaN(sink[0]+sink[7]) {
		return r, fmt.Errorf("%s: %d of %d steps failed", c.name, failed, n)
	}
	return r, nil
}

func fill(out *[8]float64, p rigid.Point, omega, alpha float64) {
	*out = [8]float64{p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y, omega, alpha}
}

// subjects makes a solver of every case.
func subjects(set *cases) ([]subject, error) {
	makers := []func(*cases) (subject, error){ofSlider, ofLever, ofFourBar}
	for _, m := range []struct {
		name string
		bar  *bar
	}{{"sixbar_watt", &set.Watt}, {"sixbar_steph", &set.Steph}} {
		makers = append(makers, func(*cases) (subject, error) {
			return ofBody(m.name, m.bar.sweep, m.bar.Pins, m.bar.Q0, m.bar.Out)
		})
	}
	for _, n := range chains {
		makers = append(makers, func(set *cases) (subject, error) {
			c := &set.Chain
			out := [3]float64{float64(2*n + 1), c.Loops[n-1].C / 2}
			return ofBody("chain"+strconv.Itoa(n), c.sweep, c.Pins[:3*n+1], c.Q0[:6*n+3], out)
		})
	}
	var all []subject
	for _, f := range makers {
		s, err := f(set)
		if err != nil {
			return nil, err
		}
		all = append(all, s)
	}
	return all, nil
}

func ofSlider(set *cases) (subject, error) {
	l, err := slidercrank.New(slidercrank.Dimensions{Crank: set.Slider.R, Rod: set.Slider.L, Offset: set.Slider.E})
	var st slidercrank.State
	return subject{"slider_crank", set.Slider.sweep, func(out *[8]float64, in rigid.Coordinate) error {
		err := l.Solve(&st, in)
		m := &st.Slider
		fill(out, rigid.Point{Pos: m.Pose.Origin, Vel: m.Vel, Acc: m.Acc}, st.Rod.Omega, st.Rod.Alpha)
		return err
	}}, err
}

func ofLever(set *cases) (subject, error) {
	m := set.Lever
	l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: m.R, Centre: m.C, Slot: m.E})
	var st slidercrank.LeverState
	return subject{"lever", m.sweep, func(out *[8]float64, in rigid.Coordinate) error {
		err := l.Solve(&st, in)
		*out = [8]float64{st.Slide.Pos, m.E, st.Slide.Vel, 0, st.Slide.Acc, 0, st.Lever.Omega, st.Lever.Alpha}
		return err
	}}, err
}

// ofFourBar places the frame's line along the x axis of the mechanism.
func ofFourBar(set *cases) (subject, error) {
	m := &set.Four
	mount := math.Atan2(m.O4[1], m.O4[0])
	d := fourbar.Dimensions{Frame: math.Hypot(m.O4[0], m.O4[1]), Crank: m.A, Coupler: m.B, Follower: m.C, Mount: rigid.Placement{Angle: mount}}
	if m.Branch > 0 {
		d.Branch = fourbar.Open
	} else {
		d.Branch = fourbar.Crossed
	}
	l, err := fourbar.New(d)
	var st fourbar.State
	p := r2.Vec{X: m.P[0], Y: m.P[1]}
	return subject{"four_bar", m.sweep, func(out *[8]float64, in rigid.Coordinate) error {
		in.Pos -= mount
		err := l.Solve(&st, in)
		fill(out, st.Coupler.At(p), st.Follower.Omega, st.Follower.Alpha)
		return err
	}}, err
}

// ofBody makes a linkage of pins between bodies, driven by the turn of body 1.
func ofBody(name string, s sweep, pins [][6]float64, q0 []float64, out [3]float64) (subject, error) {
	d := planar.Design{Guess: make([]rigid.Placement, len(q0)/3+1)}
	for i := range len(q0) / 3 {
		d.Link("body " + strconv.Itoa(i+1))
		d.Guess[i+1] = rigid.Placement{X: q0[3*i], Y: q0[3*i+1], Angle: q0[3*i+2]}
	}
	for _, p := range pins {
		d.Joints = append(d.Joints, planar.Revolute{A: planar.Link(p[0]).At(p[1], p[2]), B: planar.Link(p[3]).At(p[4], p[5])})
	}
	d.Drives = []planar.Drive{planar.Turn{Of: 1, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		return subject{}, fmt.Errorf("%s: %w", name, err)
	}
	st, err := l.Assemble(nil, rigid.Coordinate{})
	if err != nil {
		return subject{}, fmt.Errorf("%s: %w", name, err)
	}
	tool := planar.Link(out[0])
	point, turn := tool.At(out[1], out[2]), rigid.Coordinate{}
	return subject{name, s, func(out *[8]float64, in rigid.Coordinate) error {
		if in.Pos < turn.Pos { // a new run: go on forwards
			in.Pos = rigid.Nearest(in.Pos, turn.Pos)
		}
		turn = in
		err := st.Move(in)
		m := st.Motion(tool)
		fill(out, st.Point(point), m.Omega, m.Alpha)
		return err
	}}, nil
}
