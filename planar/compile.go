package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A program says how a system is solved: ops in the order of solution. It is
// immutable.
type program struct {
	system   // rows and angles in the axes of the scenes' motions: those of the links
	ops      []op
	groupOf  []int      // of every op, or −1
	link     []int      // the motion of every link of the Design
	offset   []float64  // of every link: its angle in its body's axes
	counted  []bool     // bodies whose whole turns are counted
	whole    []angleSum // the angle of every body
	geared   bool       // whether an angle is a broken multiple of one that is counted
	newtons  []*newton  // groups of higher class: Move needs path rates where there are any
	perStep  []float64  // of each drive: steps per rad or m
	faults   []faults
	breaches []error // of every check

	bodies, motions, psis, dyads, tris, rods, slots, meets int
}

// tolerance is what counts as the limit of a reach, over the largest length.
const tolerance = 1e-14

// A compiler turns a system into a program.
type compiler struct {
	*program
	stages  []stage
	basis   []linear // what is known of the free angles
	turned  []bool   // bodies whose angle is set
	done    []bool   // bodies that are placed
	visible []bool   // bodies that a guess tells of
	pins    pinned
}

// compile turns the blocks of a system into ops.
func compile(s *system, names []string) (*program, error) {
	c := &compiler{program: &program{system: *s, bodies: len(s.angles), motions: len(s.angles), psis: len(s.free)}}
	c.seat()
	c.pins = findPins(c.rows)
	c.unite()
	c.turned, c.counted, c.done = make([]bool, c.bodies), make([]bool, c.bodies), make([]bool, c.bodies)
	c.turned[0] = true
	for i := range c.stages {
		if err := c.stage(&c.stages[i]); err != nil {
			return nil, &DesignError{Err: err, Links: c.namesOf(c.stages[i].group, names)}
		}
	}
	for b := range c.bodies {
		c.turn(b)
		c.whole = append(c.whole, c.total(b))
	}
	c.links()
	c.name(names)
	c.unsolved()
	c.steps()
	return c.program, nil
}

// seat chooses the axes of each body: those of its first link.
func (c *compiler) seat() {
	first := make([]r2.Vec, c.bodies)
	c.visible = make([]bool, c.bodies)
	seen := make([]bool, c.bodies)
	for l, s := range c.seats {
		if !seen[s.body] {
			seen[s.body], first[s.body] = true, s.local.Origin
			c.visible[s.body] = l < c.system.links
		}
	}
	first[0] = r2.Vec{}
	c.rows = slices.Clone(c.rows)
	move := func(r *row) {
		r.pa, r.pb = r2.Sub(r.pa, first[r.a]), r2.Sub(r.pb, first[r.b])
	}
	for i := range c.rows {
		move(&c.rows[i])
	}
	c.checks = slices.Clone(c.checks)
	for i := range c.checks {
		move(&c.checks[i].row)
	}
	c.seats = slices.Clone(c.seats)
	for i := range c.seats {
		s := &c.seats[i]
		s.local.Origin = r2.Sub(s.local.Origin, first[s.body])
	}
}

// steps sets how far each drive goes in one step.
func (c *compiler) steps() {
	c.perStep = make([]float64, c.drives)
	for i := range c.perStep {
		c.perStep[i] = 1 / longestTurn
	}
	for _, r := range c.rows {
		if r.kind == rowSlide && r.drive >= 0 {
			c.perStep[r.drive] = 1 / (longestSlide * c.length)
		}
	}
}

// links gives every link of the Design a motion: its body's, or one of its own.
func (c *compiler) links() {
	for _, s := range c.seats[:c.system.links] {
		c.offset = append(c.offset, s.local.Angle())
		if s.local.Origin == (r2.Vec{}) && s.local.Axis == (r2.Vec{X: 1}) {
			c.link = append(c.link, s.body)
			continue
		}
		c.link = append(c.link, c.motions)
		c.emit(-1, &seated{c.motions, s.body, s.local})
		c.motions++
	}
}

func (c *compiler) emit(group int, o op) {
	if s, ok := o.(*spin); ok {
		c.geared = c.geared || slices.ContainsFunc(s.by.bodies, func(t term) bool { return t.Coef != math.Trunc(t.Coef) })
	}
	c.ops = append(c.ops, o)
	c.groupOf = append(c.groupOf, group)
}
