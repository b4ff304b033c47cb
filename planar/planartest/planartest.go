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
	"math/rand/v2"
	"slices"

	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
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
