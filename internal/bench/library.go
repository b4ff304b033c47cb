package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"time"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A subject is one case solved by the library. solve solves an input, out gives the
// outputs of a peer from what was solved, and run solves inputs turned on by some
// angle and adds the outputs up, as the peers do: in a loop of its own for each
// case, so that nothing but the call and the sums is timed with it.
type subject struct {
	name string
	sweep
	begin func() error // goes back to the turns near 0, where that makes a difference
	solve func(in rigid.Coordinate) error
	out   func() [8]float64
	run   func(in []rigid.Coordinate, by float64, sum *sums) (failed int)
}

// time times a case for about d, after one sweep that is kept for the check: the
// quickest sweep counts, since noise only adds. As in the peers the inputs are made
// beforehand and do not wait for the last result; unlike theirs the turn counts on,
// since an angle and the same angle a turn later are two inputs for a linkage that
// remembers where it came from.
func (c subject) time(d time.Duration) (result, error) {
	r := result{Peer: library, Case: c.name, Check: map[string][8]float64{}}
	in := make([]rigid.Coordinate, c.Steps)
	if c.begin != nil {
		if err := c.begin(); err != nil {
			return r, fmt.Errorf("%s: %w", c.name, err)
		}
	}
	for k := range in {
		in[k].Pos, in[k].Vel, in[k].Acc = c.input(k)
		if err := c.solve(in[k]); err != nil {
			return r, fmt.Errorf("%s, step %d: %w", c.name, k, err)
		}
		if slices.Contains(c.Check, k) {
			r.Check[strconv.Itoa(k)] = c.out()
		}
	}
	var sum sums
	failed, best := 0, math.Inf(1)
	begin := time.Now()
	for turn, before := 1.0, time.Duration(0); before < d; turn++ {
		failed += c.run(in, turn*rigid.Revolution, &sum)
		now := time.Since(begin)
		best, before = math.Min(best, float64((now-before).Nanoseconds())), now
	}
	r.Ns = best / float64(len(in))
	if failed > 0 || math.IsNaN(sum.pos.X+sum.rot.Y) {
		return r, fmt.Errorf("%s: %d steps failed", c.name, failed)
	}
	return r, nil
}

// sums of the outputs. The loops keep them in variables of two numbers each, which
// stay in registers.
type sums struct{ pos, vel, acc, rot r2.Vec }

func outputs(p rigid.Point, omega, alpha float64) [8]float64 {
	return [8]float64{p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y, omega, alpha}
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
	st := new(slidercrank.State)
	return subject{
		name: "slider_crank", sweep: set.Slider.sweep,
		solve: func(in rigid.Coordinate) error { return l.Solve(st, in) },
		out:   func() [8]float64 { return outputs(st.Slider.At(r2.Vec{}), st.Rod.Omega, st.Rod.Alpha) },
		run: func(in []rigid.Coordinate, by float64, sum *sums) (failed int) {
			var pos, vel, acc, rot r2.Vec
			for _, x := range in {
				x.Pos += by
				if l.Solve(st, x) != nil {
					failed++
				}
				pos, vel, acc = r2.Add(pos, st.Slider.Pose.Origin), r2.Add(vel, st.Slider.Vel), r2.Add(acc, st.Slider.Acc)
				rot = r2.Add(rot, r2.Vec{X: st.Rod.Omega, Y: st.Rod.Alpha})
			}
			*sum = sums{pos, vel, acc, rot}
			return failed
		},
	}, err
}

func ofLever(set *cases) (subject, error) {
	m := set.Lever
	l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: m.R, Centre: m.C, Slot: m.E})
	st := new(slidercrank.LeverState)
	return subject{
		name: "lever", sweep: m.sweep,
		solve: func(in rigid.Coordinate) error { return l.Solve(st, in) },
		out: func() [8]float64 {
			return [8]float64{st.Slide.Pos, m.E, st.Slide.Vel, 0, st.Slide.Acc, 0, st.Lever.Omega, st.Lever.Alpha}
		},
		run: func(in []rigid.Coordinate, by float64, sum *sums) (failed int) {
			var pos, vel, acc, rot r2.Vec
			for _, x := range in {
				x.Pos += by
				if l.Solve(st, x) != nil {
					failed++
				}
				pos, vel, acc = r2.Add(pos, r2.Vec{X: st.Slide.Pos, Y: m.E}), r2.Add(vel, r2.Vec{X: st.Slide.Vel}), r2.Add(acc, r2.Vec{X: st.Slide.Acc})
				rot = r2.Add(rot, r2.Vec{X: st.Lever.Omega, Y: st.Lever.Alpha})
			}
			*sum = sums{pos, vel, acc, rot}
			return failed
		},
	}, err
}

// ofFourBar places the frame's line along the x axis of the mechanism.
func ofFourBar(set *cases) (subject, error) {
	m := &set.Four
	mount := math.Atan2(m.O4[1], m.O4[0])
	d := fourbar.Dimensions{Frame: math.Hypot(m.O4[0], m.O4[1]), Crank: m.A, Coupler: m.B, Follower: m.C, Mount: rigid.Placement{Angle: mount}}
	if m.Branch < 0 {
		d.Branch = fourbar.Crossed
	}
	l, err := fourbar.New(d)
	st, at := new(fourbar.State), r2.Vec{X: m.P[0], Y: m.P[1]}
	return subject{
		name: "four_bar", sweep: m.sweep,
		solve: func(in rigid.Coordinate) error { in.Pos -= mount; return l.Solve(st, in) },
		out:   func() [8]float64 { return outputs(st.Coupler.At(at), st.Follower.Omega, st.Follower.Alpha) },
		run: func(in []rigid.Coordinate, by float64, sum *sums) (failed int) {
			var pos, vel, acc, rot r2.Vec
			by -= mount
			for _, x := range in {
				x.Pos += by
				if l.Solve(st, x) != nil {
					failed++
				}
				p := st.Coupler.At(at)
				pos, vel, acc = r2.Add(pos, p.Pos), r2.Add(vel, p.Vel), r2.Add(acc, p.Acc)
				rot = r2.Add(rot, r2.Vec{X: st.Follower.Omega, Y: st.Follower.Alpha})
			}
			*sum = sums{pos, vel, acc, rot}
			return failed
		},
	}, err
}

// bodies is a linkage of pins between bodies, not driven.
func bodies(pins [][6]float64, q0 []float64) planar.Design {
	d := planar.Design{Guess: make([]rigid.Placement, len(q0)/3+1)}
	for i := range len(q0) / 3 {
		d.Link("body " + strconv.Itoa(i+1))
		d.Guess[i+1] = rigid.Placement{X: q0[3*i], Y: q0[3*i+1], Angle: q0[3*i+2]}
	}
	for _, p := range pins {
		d.Joints = append(d.Joints, planar.Revolute{A: planar.Link(p[0]).At(p[1], p[2]), B: planar.Link(p[3]).At(p[4], p[5])})
	}
	return d
}

// ofBody makes a linkage of pins between bodies, driven by the turn of body 1.
func ofBody(name string, s sweep, pins [][6]float64, q0 []float64, out [3]float64) (subject, error) {
	d := bodies(pins, q0)
	d.Drives = []planar.Drive{planar.Turn{Of: 1, From: planar.Frame}}
	l, err := planar.New(d)
	if err != nil {
		return subject{}, fmt.Errorf("%s: %w", name, err)
	}
	st, err := l.Assemble(nil, rigid.Coordinate{})
	if err != nil {
		return subject{}, fmt.Errorf("%s: %w", name, err)
	}
	home := st.Clone()
	tool := planar.Link(out[0])
	at := tool.At(out[1], out[2])
	return subject{
		name: name, sweep: s,
		begin: func() error { return st.Set(home) },
		solve: func(in rigid.Coordinate) error {
			in.Pos = rigid.Nearest(in.Pos, st.Turn(1, planar.Frame).Pos)
			return st.Move(in)
		},
		out: func() [8]float64 {
			m := st.Motion(tool)
			return outputs(st.Point(at), m.Omega, m.Alpha)
		},
		run: func(in []rigid.Coordinate, _ float64, sum *sums) (failed int) {
			var pos, vel, acc, rot r2.Vec
			by := rigid.Revolution * math.Round((st.Turn(1, planar.Frame).Pos-in[0].Pos)/rigid.Revolution)
			for _, x := range in {
				x.Pos += by
				if st.Move(x) != nil {
					failed++
				}
				p, m := st.Point(at), st.Motion(tool)
				pos, vel, acc = r2.Add(pos, p.Pos), r2.Add(vel, p.Vel), r2.Add(acc, p.Acc)
				rot = r2.Add(rot, r2.Vec{X: m.Omega, Y: m.Alpha})
			}
			*sum = sums{pos, vel, acc, rot}
			return failed
		},
	}, nil
}
