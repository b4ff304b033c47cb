// Package planartest tells whether a planar.Constraint is right: its derivatives
// against differences of its residual, and what it declares against what it does.
//
// In the tests of the package that has the constraint:
//
//	func TestSpool(t *testing.T) {
//		if err := planartest.Check(spool, planartest.Settings{Length: 0.2}); err != nil {
//			t.Error(err)
//		}
//	}
//
// A wrong slope mostly shows as an Assemble that fails or takes long, a wrong bias as
// accelerations that are plausible and false. So every constraint should be checked
// before a linkage is trusted with it.
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

// Settings say where a Constraint is checked. The zero Settings are good for one
// that has values everywhere and whose lengths are about 1 m.
type Settings struct {
	// Near is where its links are, in the order of Constraint.Links: motions near it
	// are tried. That of planar.Frame is not read. Nil stands for anywhere within Length of
	// the frame's origin.
	Near []rigid.Placement
	// Length is the size of what the Constraint ties, in m; 0 stands for 1.
	Length float64
	// Spread is how far from Near the links are tried, in rad and over Length; 0
	// stands for 0.05.
	Spread float64
	// Trials is the number of motions; 0 stands for 50.
	Trials int
	// Tolerance is by how much derivatives may be off, over the size of all of their
	// equation; 0 stands for 1e-6.
	Tolerance float64
	// Seed chooses the motions.
	Seed uint64
}

func (s Settings) filled() Settings {
	set := func(v *float64, to float64) {
		if *v == 0 {
			*v = to
		}
	}
	set(&s.Length, 1)
	set(&s.Spread, 0.05)
	set(&s.Tolerance, 1e-6)
	if s.Trials == 0 {
		s.Trials = 50
	}
	return s
}

// Check evaluates a Constraint at random motions of its links and returns what is
// wrong with it, nil if nothing is, with where:
//
//	Links, Rows    the same at any time; links that differ, equations to solve
//	Evaluate       finite numbers, as many as it has, the same for the same motions
//	Slopes         the derivatives of Residual, by central differences
//	Bias           the derivative of Σ Slopes·velocity, for links at constant velocity
//	Depends        no derivative by what an equation is declared not to depend on
//	Frame          where a Constraint that doesn't tie its links to the frame holds, it
//	               holds on as all of them are moved as one
//
// Only the first trial that fails is reported. An error of Evaluate counts as wrong:
// choose Near and Spread so that the motions are within its range.
func Check(c planar.Constraint, s Settings) error {
	s = s.filled()
	k := checker{c: c, s: s, links: c.Links(), rows: c.Rows(), random: rand.New(rand.NewPCG(s.Seed, 8))}
	if err := k.counts(); err != nil {
		return err
	}
	for trial := range s.Trials {
		if err := k.trial(k.motions()); err != nil {
			return fmt.Errorf("trial %d: %w", trial, err)
		}
	}
	if !k.closed && !slices.Contains(k.links, planar.Frame) {
		return errors.New("from none of the motions tried the links come to where the equations hold: choose Near and Spread")
	}
	return nil
}

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

// difference returns the derivative by t at 0 of what of gives for the bodies that at gives: central
// differences by two steps, extrapolated.
func (k *checker) difference(at func(t float64) []body, of func(*planar.Evaluation) float64) (float64, error) {
	const h = 2e-4
	var d [2]float64
	for i, step := range []float64{h, h / 2} {
		hi, err := k.evaluate(at(step))
		if err != nil {
			return 0, err
		}
		lo, err := k.evaluate(at(-step))
		if err != nil {
			return 0, err
		}
		d[i] = (of(hi) - of(lo)) / (2 * step)
	}
	return (4*d[1] - d[0]) / 3, nil
}

func residual(row int) func(*planar.Evaluation) float64 {
	return func(e *planar.Evaluation) float64 { return e.Rows[row].Residual }
}

// slopes compares those of an equation with differences, and with what is declared.
func (k *checker) slopes(row int, q planar.Equation, all []body) error {
	declared, _ := k.c.(planar.Declarer)
	most := k.s.Tolerance * k.size(q)
	for i, l := range k.links {
		if l == planar.Frame {
			continue
		}
		on := planar.OfAll
		if declared != nil {
			on = declared.Depends(row, i)
		}
		s := q.Slopes[i]
		for _, part := range []struct {
			name        string
			by          planar.Unknowns
			given, unit float64
			move        func(b *body, d float64)
		}{
			{"x", planar.OfX, s.X, k.s.Length, func(b *body, d float64) { b.x += d }},
			{"y", planar.OfY, s.Y, k.s.Length, func(b *body, d float64) { b.y += d }},
			{"angle", planar.OfAngle, s.Angle, 1, func(b *body, d float64) { b.angle += d }},
		} {
			found, err := k.difference(func(t float64) []body {
				moved := slices.Clone(all)
				part.move(&moved[i], t*part.unit)
				return moved
			}, residual(row))
			if err != nil {
				return err
			}
			if !(math.Abs(found-part.given*part.unit) <= most) {
				return fmt.Errorf("slope by %s of link %d is %.9g, by differences %.9g, at %v", part.name, l, part.given, found/part.unit, all)
			}
			if on&part.by == 0 && !(math.Abs(found) <= most) {
				return fmt.Errorf("declared not to depend on %s of link %d, and does, by %.9g, at %v", part.name, l, found/part.unit, all)
			}
		}
	}
	return nil
}

// bias compares that of an equation with the difference of its rate.
func (k *checker) bias(row int, q planar.Equation, all []body) error {
	found, err := k.difference(func(t float64) []body { return after(all, t) }, func(e *planar.Evaluation) float64 {
		rate := 0.0
		for i, s := range e.Rows[row].Slopes {
			if k.links[i] != planar.Frame {
				rate += s.X*all[i].vx + s.Y*all[i].vy + s.Angle*all[i].omega
			}
		}
		return rate
	})
	if err != nil {
		return err
	}
	if most := k.s.Tolerance * math.Max(k.size(q), math.Abs(found)); !(math.Abs(found-q.Bias) <= most) {
		return fmt.Errorf("bias is %.9g, by differences %.9g, at %v", q.Bias, found, all)
	}
	return nil
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
