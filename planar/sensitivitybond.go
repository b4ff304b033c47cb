package planar

import (
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A bond is a scalar equation of a joint or drive between links, in their own axes:
// all equations, also those that repeat others. With e the vector from a's point to
// b's, and u along a's line,
//
//	bondX, bondY   e = 0
//	bondGuide     u×e = 0
//	bondSlide     u·e = input
//	bondRack      u·e + rate·(θb − θa) = Phase
//	bondReach     |e| = input
//	bondAngle     θb − θa = constant or input
//	bondGear      θb − ρ θa + (ρ − 1) θarm = Phase
type bond struct {
	kind   bondKind
	joint  int
	link   [3]Link // a, b and the arm of gears; Frame where there is none
	pa, pb r2.Vec
	u      r2.Vec // in a's axes
	swap   bool   // the joint's end A is b
	rate   float64
	gear   GearPair

	// at a place of the State, lengths in units of the design's
	coef [3][3]rigid.Coordinate // by x, y and angle of each link
	w    rigid.Point            // by e
	line rigid.Coordinate       // by the angle of a's line
}

type bondKind uint8

const (
	bondX bondKind = iota
	bondY
	bondGuide
	bondSlide
	bondRack
	bondReach
	bondAngle
	bondGear
)

func (k bondKind) angular() bool { return k >= bondAngle }

// columns returns the first column of each link, in the order of solution.
func (s *system) columns() []int {
	solvedIn := make([]int, s.unknowns())
	for i, b := range s.blocks {
		for _, u := range b.unknowns {
			solvedIn[u] = i
		}
	}
	place := func(l int) int {
		body := s.seats[l].body
		if body == 0 {
			return -1
		}
		last := max(solvedIn[s.xy(body)], solvedIn[s.xy(body)+1])
		for _, t := range s.angles[body].psi {
			last = max(last, solvedIn[s.psi(t.Index)])
		}
		return last
	}
	var order []int
	for l := 1; l < s.links; l++ {
		order = append(order, l)
	}
	slices.SortStableFunc(order, func(l, m int) int { return place(l) - place(m) })
	column := make([]int, s.links)
	column[Frame] = -1
	for i, l := range order {
		column[l] = 3 * i
	}
	return column
}

// bonds returns the equations of all joints and drives, those first of which all
// links come first in the order of columns; and whether a joint is of no known kind.
func (d *Design) bonds(column []int) (all []bond, unknown bool) {
	for i := range len(d.Joints) + len(d.Drives) {
		bonds := d.bondsOf(i)
		unknown = unknown || len(bonds) == 0
		all = append(all, bonds...)
	}
	last := func(t bond) int { return max(column[t.link[0]], column[t.link[1]], column[t.link[2]]) }
	slices.SortStableFunc(all, func(s, t bond) int { return last(s) - last(t) })
	return all, unknown
}

func (d *Design) bondsOf(i int) []bond {
	between := func(a, b Line, kinds ...bondKind) (bonds []bond) {
		for _, k := range kinds {
			bonds = append(bonds, bond{
				kind: k, joint: i, link: [3]Link{a.Link, b.Link},
				pa: r2.Vec{X: a.X, Y: a.Y}, pb: r2.Vec{X: b.X, Y: b.Y}, u: rigid.NewPose(0, 0, a.Angle).Axis,
			})
		}
		return bonds
	}
	swapped := func(a, b Line, kind bondKind) []bond {
		t := between(a, b, kind)
		t[0].swap = true
		return t
	}
	a, b, _ := ends(d.at(i))
	switch j := d.at(i).(type) {
	case Revolute:
		return between(a, b, bondX, bondY)
	case Prismatic:
		return between(a, b, bondAngle, bondGuide)
	case Fixed:
		return between(a, b, bondX, bondY, bondAngle)
	case SlidingPin:
		return swapped(b, a, bondGuide)
	case RackPair:
		t := swapped(b, a, bondRack)
		t[0].rate = j.Radius
		if j.Right {
			t[0].rate = -j.Radius
		}
		return t
	case GearPair:
		return []bond{{kind: bondGear, joint: i, link: [3]Link{j.A, j.B, j.Arm}, gear: j}}
	case Turn:
		return swapped(Line{Link: j.From}, Line{Link: j.Of}, bondAngle)
	case Slide:
		return swapped(b, a, bondSlide)
	case Reach:
		return between(a, b, bondReach)
	}
	return nil
}

// refresh finds the coefficients at the place of a State. A bond of places is
//
//	w·δe + line δθa + rate (δθb − δθa)      δe = δOb + δθb k×rb − δOa − δθa k×ra
//
// where w·(k×r) = r×w.
func (t *bond) refresh(s *State, length float64) {
	unit := rigid.Coordinate{Pos: 1}
	switch t.kind {
	case bondAngle:
		t.coef[0][2], t.coef[1][2] = rigid.Coordinate{Pos: -1}, unit
		return
	case bondGear:
		for i, k := range t.gear.marks() {
			t.coef[i][2] = rigid.Coordinate{Pos: k}
		}
		return
	}
	a, b := s.Motion(t.link[0]), s.Motion(t.link[1])
	e := less(b.At(t.pb), a.At(t.pa))
	u := fixed(a, t.u)
	t.w, t.line = rigid.Point{}, rigid.Coordinate{}
	switch t.kind {
	case bondX:
		t.w.Pos.X = 1
	case bondY:
		t.w.Pos.Y = 1
	case bondGuide:
		t.w, t.line = quarter(u), scaledBy(-1/length, dotted(&u, &e))
	case bondSlide, bondRack:
		t.w, t.line = u, scaledBy(1/length, crossed(&u, &e))
	case bondReach:
		k := 1 / r2.Norm(e.Pos)
		t.w = rigid.Point{Pos: r2.Scale(k, e.Pos), Vel: r2.Scale(k, e.Vel), Acc: r2.Scale(k, e.Acc)}
	}
	ra, rb := fixed(a, t.pa), fixed(b, t.pb)
	rate := rigid.Coordinate{Pos: t.rate / length}
	x := rigid.Coordinate{Pos: t.w.Pos.X, Vel: t.w.Vel.X, Acc: t.w.Acc.X}
	y := rigid.Coordinate{Pos: t.w.Pos.Y, Vel: t.w.Vel.Y, Acc: t.w.Acc.Y}
	t.coef[1] = [3]rigid.Coordinate{x, y, sumOf(scaledBy(1/length, crossed(&rb, &t.w)), rate)}
	t.coef[0] = [3]rigid.Coordinate{scaledBy(-1, x), scaledBy(-1, y),
		sumOf(sumOf(scaledBy(-1/length, crossed(&ra, &t.w)), t.line), scaledBy(-1, rate))}
}

// force returns what an entry of the bond's joint adds to the bond while the links
// stay where they are.
func (t *bond) force(s *State, e Entry, length float64) rigid.Coordinate {
	side := int(e.End)
	if t.swap {
		side = 1 - side
	}
	switch e.Part {
	case X, Y:
		return t.shift(s, side, e.Part, length)
	case Angle:
		if t.kind.angular() {
			return t.coef[side][2]
		}
		if side == 0 {
			return t.line
		}
	case Phase:
		if t.kind.angular() {
			return rigid.Coordinate{Pos: -1}
		}
		return t.zero(length)
	case RadiusA, RadiusB:
		return t.radius(s, e.Part, length)
	}
	return rigid.Coordinate{}
}

// shift is that of a point's x or y.
func (t *bond) shift(s *State, side int, p Part, length float64) rigid.Coordinate {
	if t.kind.angular() {
		return rigid.Coordinate{}
	}
	along := r2.Vec{X: 1}
	if p == Y {
		along = r2.Vec{Y: 1}
	}
	v := fixed(s.Motion(t.link[side]), along)
	return scaledBy(float64(2*side-1)/length, dotted(&t.w, &v))
}

// zero is that of a phase of a place: of a reach, whose bond is e·δe/b with b held,
// b its length,
//
//	−|e|/b
func (t *bond) zero(length float64) rigid.Coordinate {
	if t.kind != bondReach {
		return rigid.Coordinate{Pos: -1 / length}
	}
	one := dotted(&t.w, &t.w) // |e|²/b²
	vel := one.Vel / 2
	return scaledBy(-1/length, rigid.Coordinate{Pos: 1, Vel: vel, Acc: one.Acc/2 - vel*vel})
}

// radius is that of a radius: of gears, with ρ = ∓A/B, and of a pinion
//
//	−ρ′ (θA − θarm),   ±(θb − θa)
func (t *bond) radius(s *State, p Part, length float64) rigid.Coordinate {
	turn := func(of, from Link) rigid.Coordinate {
		m, k := s.Motion(of), s.Motion(from)
		return rigid.Coordinate{Pos: s.whole(of, s.now) - s.whole(from, s.now), Vel: m.Omega - k.Omega, Acc: m.Alpha - k.Alpha}
	}
	switch {
	case t.kind == bondRack && t.rate > 0:
		return scaledBy(1/length, turn(t.link[1], t.link[0]))
	case t.kind == bondRack:
		return scaledBy(-1/length, turn(t.link[1], t.link[0]))
	}
	k := -t.gear.ratio().value / t.gear.RadiusA
	if p == RadiusB {
		k = t.gear.ratio().value / t.gear.RadiusB
	}
	return scaledBy(k, turn(t.link[0], t.link[2]))
}
