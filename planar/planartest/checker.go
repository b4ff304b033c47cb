package planartest

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"
)

type checker struct {
	c      planar.Constraint
	s      Settings
	links  []planar.Link
	rows   int
	random *rand.Rand
	memory []float64 // after an evaluation near by
	closed bool      // the equations have been seen to hold somewhere
}

func (k *checker) counts() error {
	switch {
	case len(k.links) < 2:
		return fmt.Errorf("%d links: two are the least", len(k.links))
	case k.rows < 1:
		return fmt.Errorf("%d equations", k.rows)
	case k.s.Near != nil && len(k.s.Near) != len(k.links):
		return fmt.Errorf("%d placements in Near for %d links", len(k.s.Near), len(k.links))
	case !slices.Equal(k.links, k.c.Links()) || k.rows != k.c.Rows():
		return errors.New("not the same Links or Rows when asked again")
	}
	for i, l := range k.links {
		if slices.Contains(k.links[:i], l) {
			return fmt.Errorf("link %d twice", l)
		}
	}
	return nil
}

// A body is a link with its velocities.
type body struct{ x, y, angle, vx, vy, omega float64 }

func (k *checker) motions() []body {
	any := func(size float64) float64 { return size * (2*k.random.Float64() - 1) }
	all := make([]body, len(k.links))
	for i, l := range k.links {
		b := &all[i]
		if l == planar.Frame {
			continue
		}
		place, size, angle := rigid.Placement{}, k.s.Length, math.Pi
		if k.s.Near != nil {
			place, size, angle = k.s.Near[i], k.s.Spread*k.s.Length, k.s.Spread
		}
		b.x, b.y, b.angle = place.X+any(size), place.Y+any(size), place.Angle+any(angle)
		b.vx, b.vy, b.omega = any(k.s.Length), any(k.s.Length), any(1)
	}
	return all
}

// after returns the bodies a time later, at constant velocities.
func after(all []body, t float64) []body {
	out := slices.Clone(all)
	for i := range out {
		b := &out[i]
		b.x, b.y, b.angle = b.x+t*b.vx, b.y+t*b.vy, b.angle+t*b.omega
	}
	return out
}

// evaluate asks for the equations; for a memory that is not there, a new one.
func (k *checker) evaluate(all []body) (*planar.Evaluation, error) {
	e := &planar.Evaluation{Links: make([]planar.Moving, len(all)), Rows: make([]planar.Equation, k.rows)}
	for i, b := range all {
		e.Links[i] = planar.Moving{
			Motion: rigid.Motion{Pose: rigid.NewPose(b.x, b.y, b.angle), Vel: r2.Vec{X: b.vx, Y: b.vy}, Omega: b.omega},
			Turn:   b.angle,
		}
	}
	for i := range e.Rows {
		e.Rows[i].Slopes = make([]planar.Slope, len(all))
	}
	if m, ok := k.c.(planar.Rememberer); ok {
		e.Memory = make([]float64, m.Memory())
		copy(e.Memory, k.memory)
	}
	if err := k.c.Evaluate(e); err != nil {
		return nil, fmt.Errorf("no value at %v: %w", all, err)
	}
	if len(e.Rows) != k.rows {
		return nil, fmt.Errorf("%d equations, not %d", len(e.Rows), k.rows)
	}
	for i, q := range e.Rows {
		if len(q.Slopes) != len(all) {
			return nil, fmt.Errorf("equation %d: %d slopes for %d links", i, len(q.Slopes), len(all))
		}
		sum := q.Residual*0 + q.Bias*0
		for _, s := range q.Slopes {
			sum += s.X*0 + s.Y*0 + s.Angle*0
		}
		if sum != 0 {
			return nil, fmt.Errorf("equation %d: not finite at %v: %+v", i, all, q)
		}
	}
	return e, nil
}

func (k *checker) trial(all []body) error {
	k.memory = nil
	e, err := k.evaluate(all)
	if err != nil {
		return err
	}
	k.memory = slices.Clone(e.Memory)
	again, err := k.evaluate(all)
	if err != nil {
		return err
	}
	for row, q := range e.Rows {
		if off := math.Abs(q.Residual - again.Rows[row].Residual); off > 1e-9*k.size(q) {
			return fmt.Errorf("equation %d: another residual when asked again, off by %.3g", row, off)
		}
		for _, part := range []func(int, planar.Equation, []body) error{k.slopes, k.bias, k.frame} {
			if err := part(row, q, all); err != nil {
				return fmt.Errorf("equation %d: %w", row, err)
			}
		}
	}
	return nil
}

// size returns the length of the slopes of the links that move, with lengths in
// units of Length.
func (k *checker) size(q planar.Equation) float64 {
	sum := 0.0
	for i, s := range q.Slopes {
		if k.links[i] != planar.Frame {
			sum += (s.X*s.X+s.Y*s.Y)*k.s.Length*k.s.Length + s.Angle*s.Angle
		}
	}
	return math.Sqrt(sum)
}

// close moves the links to where all equations hold, by the shortest of Newton's
// corrections, and reports whether they do.
func (k *checker) close(all []body) ([]body, bool) {
	const turns, enough = 40, 1e-12
	all = slices.Clone(all)
	n := 3 * len(all)
	for range turns {
		e, err := k.evaluate(all)
		if err != nil {
			return nil, false // out of range on the way
		}
		slopes, miss := mat.NewDense(k.rows, n, nil), mat.NewVecDense(k.rows, nil)
		left := 0.0
		for row, q := range e.Rows {
			size := k.size(q)
			if size == 0 {
				return nil, false
			}
			miss.SetVec(row, q.Residual/size)
			left = math.Max(left, math.Abs(q.Residual/size))
			for i, s := range q.Slopes {
				slopes.Set(row, 3*i, s.X*k.s.Length/size)
				slopes.Set(row, 3*i+1, s.Y*k.s.Length/size)
				slopes.Set(row, 3*i+2, s.Angle/size)
			}
		}
		if left <= enough {
			return all, true
		}
		var step mat.VecDense
		if err := step.SolveVec(slopes, miss); err != nil {
			return nil, false
		}
		for i := range all {
			b := &all[i]
			b.x, b.y, b.angle = b.x-k.s.Length*step.AtVec(3*i), b.y-k.s.Length*step.AtVec(3*i+1), b.angle-step.AtVec(3*i+2)
		}
	}
	return nil, false
}

// frame moves all links as one, from where the equations hold.
func (k *checker) frame(row int, q planar.Equation, all []body) error {
	if slices.Contains(k.links, planar.Frame) {
		return nil
	}
	all, ok := k.close(all)
	if !ok {
		return nil
	}
	k.closed = true
	centre := r2.Vec{X: all[0].x, Y: all[0].y}
	for _, way := range []r2.Vec{{X: k.s.Length}, {Y: k.s.Length}, {}} {
		found, err := k.difference(func(t float64) []body {
			moved := slices.Clone(all)
			for i := range moved {
				b := &moved[i]
				if way == (r2.Vec{}) {
					p := rigid.NewPose(0, 0, t).Point(r2.Sub(r2.Vec{X: b.x, Y: b.y}, centre))
					b.x, b.y, b.angle = centre.X+p.X, centre.Y+p.Y, b.angle+t
				} else {
					b.x, b.y = b.x+t*way.X, b.y+t*way.Y
				}
			}
			return moved
		}, residual(row))
		if err != nil {
			return err
		}
		if !(math.Abs(found) <= k.s.Tolerance*k.size(q)) {
			return fmt.Errorf("depends on where its links are in the frame, and doesn't tie them to planar.Frame, at %v", all)
		}
	}
	return nil
}
