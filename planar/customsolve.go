package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A ruled is a Custom joint in a group: its links, and which of its equations the
// group solves.
type ruled struct {
	*custom
	nth    []int
	riders []rider
	row    int // its first row among those of the customs of the group
	memory int // its first number in desk.memory
	slope  int // and in desk.slopes
}

// A rider is a link of a Constraint: on a member, as seat says. Its place in the
// frame is that of a loop of chords, the arm.
type rider struct {
	member, arm int
	seat        seat
	angle       float64 // in its body
	hangs       bool    // its place is moved by the group
	first       int     // of its slopes in desk.arms, those of y after those of x
}

// customary reports whether a unit has equations of Constraints.
func (c *compiler) customary(u *stage) bool {
	return slices.ContainsFunc(u.rows, func(i int) bool { return c.rows[i].custom != nil })
}

// together makes one unit of the blocks that have equations of one Constraint.
func (c *compiler) together(root []int, find func(int) int) {
	first := map[*custom]int{}
	for i, b := range c.blocks {
		for _, k := range b.rows {
			if by := c.rows[k].custom; by != nil {
				if _, ok := first[by]; !ok {
					first[by] = i
				}
				root[find(i)] = find(first[by])
			}
		}
	}
}

// rule enters the Constraints of a group, with the arms of their links.
func (n *newton) rule(s *system, rows []int) {
	for _, i := range rows {
		r := &s.rows[i]
		if r.custom == nil {
			continue
		}
		if k := len(n.customs) - 1; k >= 0 && n.customs[k].custom == r.custom {
			n.customs[k].nth = append(n.customs[k].nth, r.nth)
			continue
		}
		u := ruled{custom: r.custom, nth: []int{r.nth}}
		for i, l := range u.links {
			seat := s.seats[l]
			m := n.member(s, u.bodies[i], nil)
			g := rider{member: m, arm: len(n.loops), seat: seat, angle: seat.local.Angle()}
			n.connect(s, loop{kind: rowX, a: n.member(s, 0, nil), b: m, drive: -1, phase: -1}, r2.Vec{}, seat.local.Origin)
			g.hangs = n.loops[g.arm].moved < n.loops[g.arm].end
			u.riders = append(u.riders, g)
		}
		n.customs = append(n.customs, u)
	}
	n.parts = n.allot()
}

// customParts are the sizes of the parts of a desk that customs need.
type customParts struct{ memory, rows, slopes, arms int }

// allot gives the customs their places in these parts.
func (n *newton) allot() (size customParts) {
	for i := range n.customs {
		u := &n.customs[i]
		u.memory, u.row, u.slope = size.memory, size.rows, size.slopes
		for k := range u.riders {
			u.riders[k].first = size.arms
			size.arms += 2 * (n.free + n.slides)
		}
		size.memory += u.custom.memory
		size.rows += len(u.nth)
		size.slopes += 3 * len(u.nth) * len(u.riders)
	}
	return size
}

// ask makes the evaluations of a desk.
func (n *newton) ask(d *desk) {
	for i := range d.weight {
		d.weight[i] = 1
	}
	for i := range n.customs {
		u := &n.customs[i]
		d.asked = append(d.asked, u.newEvaluation(d.memory[u.memory:u.memory+u.custom.memory]))
	}
}

// remember takes over what Constraints keep from the place before.
func (n *newton) remember(p, d *desk) {
	d.last[broken] = 0
	if len(n.customs) == 0 && len(n.cells) == 0 {
		return
	}
	copy(d.memory, p.memory)
	copy(d.weight, p.weight)
	copy(d.cells, p.cells)
}

// weigh chooses by what the equations of Constraints are multiplied: so that they
// miss lengths, whatever their unit, and weigh about as much as those of loops.
func (n *newton) weigh(sc *scene, d *desk) {
	d.last[broken] = 0
	for i := range d.weight {
		d.weight[i] = 1
	}
	if len(n.customs) == 0 {
		return
	}
	n.lay(sc, d)
	for i, size := range d.natural {
		if k := n.length / size; k > 0 && k < math.Inf(1) {
			d.weight[i] = k
		}
	}
}

// breaks notes that a Constraint gives no equations, in all of its rows.
func (n *newton) breaks(d *desk, i int, kind faultKind, row int) {
	d.last[broken] = float64((i+1)*int(faultKinds) + int(kind))
	for k := range n.customs[i].nth {
		d.miss[row+k] = math.NaN()
		for c := range n.n {
			d.j[(row+k)*n.n+c] = math.NaN()
		}
	}
}

// fault returns the error of the Constraint that gave no equations, or nil, with
// what its author says.
func (n *newton) fault(d *desk) (err, own error) {
	code := int(d.last[broken])
	if code == 0 {
		return nil, nil
	}
	i, kind := code/int(faultKinds)-1, faultKind(code%int(faultKinds))
	if kind == noValue {
		own = d.asked[i].err
	}
	return n.customs[i].faults[kind], own
}

// layCustoms writes what Constraints miss with its slopes, as lay does. Of a link
// with its origin at C, moved by the unknowns q,
//
//	∂Φ/∂q = sx·∂C.x/∂q + sy·∂C.y/∂q + sθ·∂θ/∂q
func (n *newton) layCustoms(sc *scene, d *desk, row int) {
	for i := range n.customs {
		u := &n.customs[i]
		e := &d.asked[i]
		for k := range u.riders {
			g := &u.riders[k]
			n.sum(d, g.arm, d.arms[g.first:g.first+n.n], d.arms[g.first+n.n:g.first+2*n.n])
			n.seat(sc, d, e, g, k)
		}
		if kind, ok := u.read(e); !ok {
			n.breaks(d, i, kind, row)
		} else {
			n.layRows(d, u, e, row)
		}
		row += len(u.nth)
	}
}

// seat puts a link of a Constraint where it is.
func (n *newton) seat(sc *scene, d *desk, e *evaluation, g *rider, k int) {
	m := &e.links[k]
	u := turned(r2.Vec{X: d.axis[2*g.member], Y: d.axis[2*g.member+1]}, g.seat.local.Axis)
	*m = Moving{Turn: n.total(sc, d, g.member) + g.angle}
	m.Pose.Origin = r2.Vec{X: d.gap[2*g.arm], Y: d.gap[2*g.arm+1]}
	m.Pose.Axis = u
}

func (n *newton) layRows(d *desk, u *ruled, e *evaluation, row int) {
	for k, nth := range u.nth {
		q := &e.Rows[nth]
		w := d.weight[u.row+k]
		j := d.j[(row+k)*n.n:][:n.n]
		clear(j)
		d.miss[row+k] = w * q.Residual
		size := 0.0
		for i := range u.riders {
			g, s := &u.riders[i], &q.Slopes[i]
			kept := d.slope(u, k, i)
			kept[0], kept[1], kept[2] = w*s.X, w*s.Y, w*s.Angle
			own := n.members[g.member].own
			if g.hangs || len(own) > 0 {
				size += (s.X*s.X + s.Y*s.Y) * n.length * n.length
			}
			if g.hangs {
				x, y := d.arms[g.first:][:n.n], d.arms[g.first+n.n:][:n.n]
				for c := range j {
					j[c] += kept[0]*x[c] + kept[1]*y[c]
				}
			}
			if len(own) > 0 {
				size += s.Angle * s.Angle
			}
			for _, t := range own {
				j[t.Index] += kept[2] * t.Coef
			}
		}
		d.natural[u.row+k] = math.Sqrt(size)
	}
}

// slope returns the weighted slopes of a row by link i of its Constraint.
func (d *desk) slope(u *ruled, k, i int) []float64 {
	return d.slopes[u.slope+3*(k*len(u.riders)+i):][:3]
}

// customVel writes the negative of the velocities that the equations of Constraints
// have without the unknown ones.
func (n *newton) customVel(sc *scene, d *desk, row int) {
	for i := range n.customs {
		u := &n.customs[i]
		clear(d.vel[row : row+len(u.nth)])
		for k := range u.riders {
			g := &u.riders[k]
			v, w := n.loopVel(sc, d, &n.loops[g.arm]), d.turn[3*g.member]
			for r := range u.nth {
				s := d.slope(u, r, k)
				d.vel[row+r] -= s[0]*v.X + s[1]*v.Y + s[2]*w
			}
		}
		row += len(u.nth)
	}
}

// customAcc writes the negative of the accelerations that the equations of
// Constraints have without the unknown ones: that of their links, by the slopes, and
// the bias.
func (n *newton) customAcc(sc *scene, d *desk, row int) {
	for i := range n.customs {
		u := &n.customs[i]
		e := &d.asked[i]
		clear(d.acc[row : row+len(u.nth)])
		for k := range u.riders {
			g := &u.riders[k]
			n.seat(sc, d, e, g, k)
			v, a := n.loopAcc(sc, d, &n.loops[g.arm])
			e.links[k].Vel, e.links[k].Omega = v, d.turn[3*g.member+2]
			for r := range u.nth {
				s := d.slope(u, r, k)
				d.acc[row+r] -= s[0]*a.X + s[1]*a.Y + s[2]*d.turn[3*g.member+1]
			}
		}
		kind, ok := u.read(e)
		for r, nth := range u.nth {
			if !ok {
				d.last[broken] = float64((i+1)*int(faultKinds) + int(kind))
				return
			}
			d.acc[row+r] -= d.weight[u.row+r] * e.Rows[nth].Bias
		}
		row += len(u.nth)
	}
}
