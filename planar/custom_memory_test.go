package planar_test

import (
	"errors"
	"math"
	"sync"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestShared moves States of one Linkage in several goroutines.
func TestShared(t *testing.T) {
	slot, _, guess := slotted(t)
	var all sync.WaitGroup
	for k := range 4 {
		all.Go(func() {
			s, err := slot.Assemble(guess[:3], at(0))
			for i := range 200 {
				if err == nil {
					err = s.Move(at(0.1 * float64(i) * float64(1-2*(k%2))))
				}
			}
			if err != nil {
				t.Error(err)
			}
		})
	}
	all.Wait()
}

// TestCustomAllocations: Move with Constraints whose authors allocate nothing.
func TestCustomAllocations(t *testing.T) {
	slot, _, guess := slotted(t)
	for name, s := range map[string]*State{
		"slot":  mustAssemble(t, slot, guess[:3], at(0)),
		"spool": mustAssemble(t, mustNew(t, wound(nil)), []rigid.Placement{{}, {Y: 0.3}, {X: 0.1}}, at(0)),
		"cam":   mustAssemble(t, leverCam(t, 36), leverGuess, at(0)),
	} {
		phi := 0.0
		if n := testing.AllocsPerRun(200, func() {
			phi += 0.07
			if err := s.Move(rigid.Coordinate{Pos: phi, Vel: 1}); err != nil {
				t.Fatal(err)
			}
		}); n != 0 {
			t.Errorf("%s: %v allocations", name, n)
		}
	}
}

// A recall is a spool that remembers its turn, and refuses one that is not near it.
type recall struct{ spool }

func (r recall) Memory() int { return 2 }
func (r recall) Evaluate(e *Evaluation) error {
	turn := e.Links[0].Turn
	if e.Memory[0] != 0 && math.Abs(turn-e.Memory[1]) > 0.3 {
		return errors.New("what is remembered is from elsewhere")
	}
	e.Memory[0], e.Memory[1] = 1, turn
	return r.spool.Evaluate(e)
}

// TestMemoryOfConstraints: what a Constraint keeps is of the place before, after Moves
// that fail, in Clones and after Set too.
func TestMemoryOfConstraints(t *testing.T) {
	s := mustAssemble(t, mustNew(t, wound(recall{spool{1, 2, 0.1, 0.002}})), []rigid.Placement{{}, {Y: 0.3}, {X: 0.1}}, at(0))
	start := s.Clone()
	for k := range 40 {
		if err := s.Move(at(0.25 * float64(k))); err != nil {
			t.Fatal(k, err)
		}
		if err := s.Clone().Move(at(0.25*float64(k) + 2)); err != nil {
			t.Fatal(k, err)
		}
		if err := s.Move(at(1e6)); err != ErrTooFar {
			t.Fatal(err)
		}
	}
	if err := errors.Join(s.Set(start), s.Move(at(-0.2))); err != nil {
		t.Error(err)
	}
}
