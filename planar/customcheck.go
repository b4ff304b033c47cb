package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// custom writes the slopes of a row of a Constraint at a position and returns by
// how much it misses; see place.
func (p *position) custom(r *row, slopes []float64) float64 {
	c := r.custom
	e := c.newEvaluation(make([]float64, c.memory))
	for i, l := range c.links {
		e.put(i, &p.b.seats[l], p.pose(c.bodies[i]), p.at[c.bodies[i]].angle+p.b.seats[l].local.Angle())
	}
	if _, ok := c.read(&e); !ok {
		return math.NaN()
	}
	angles := 2*(p.b.bodies()-1) - 1
	for i, body := range c.bodies {
		if body == 0 {
			continue
		}
		s := e.Rows[r.nth].Slopes[i]
		v := r2.Sub(e.links[i].Pose.Origin, p.pose(body).Origin)
		slopes[p.b.xy(body)] += s.X
		slopes[p.b.xy(body)+1] += s.Y
		slopes[angles+body] += (s.Angle + v.X*s.Y - v.Y*s.X) / p.b.length
	}
	return e.Rows[r.nth].Residual
}

// miscustom returns by how much an equation of a Constraint that is checked
// doesn't hold.
func (p *program) miscustom(i int, sc *scene) float64 {
	r := &p.checks[i].row
	e := &sc.asides[i]
	for k, l := range r.custom.links {
		b := r.custom.bodies[k]
		e.put(k, &p.seats[l], sc.m[b].Pose, p.whole[b].value(sc)+p.offset[l])
	}
	if _, ok := r.custom.read(e); !ok {
		return math.NaN()
	}
	return e.Rows[r.nth].Residual
}

// asides makes the evaluations of the equations of Constraints that are checked.
func (p *program) asides() (all []evaluation) {
	for i := range p.checks {
		if c := p.checks[i].row.custom; c != nil && all == nil {
			all = make([]evaluation, len(p.checks))
		}
		if c := p.checks[i].row.custom; c != nil {
			all[i] = c.newEvaluation(nil)
		}
	}
	return all
}

// faultAt returns the error of an op that failed in a scene: a Constraint's own, if
// it was one that gave no equations.
func (p *program) faultAt(op int, st status, tried *scene) (err, own error) {
	if g, ok := p.ops[op].(*group); ok {
		if err, own = g.n.fault(&tried.desks[g.at]); err != nil {
			return err, own
		}
	}
	return p.fault(op, st), nil
}

// tied refuses Constraints that depend on what they don't say, where the linkage
// has been assembled: on where their links are in the frame, or on unknowns that
// they declare not to depend on.
func (s *State) tied() error {
	const enough = 1e-6
	for i, n := range s.l.program.newtons {
		d := &s.now.desks[i]
		for k := range n.customs {
			u := &n.customs[k]
			e := &d.asked[k]
			for r := range u.riders {
				n.seat(s.now, d, e, &u.riders[r], r)
			}
			if kind, ok := u.read(e); !ok {
				return u.faults[kind]
			}
			for row := range e.Rows {
				who := fmt.Sprintf("the constraint of joint %d (links %s)", u.joint, list(s.l.design.names(u.links)))
				if off := u.loose(e, row, n.length); !(off <= enough) {
					return fmt.Errorf("%w: %s depends on where its links are in the frame, and doesn't tie them to it", rigid.ErrInput, who)
				}
				size := u.natural(e.Rows[row].Slopes, n.length)
				for r, q := range e.Rows[row].Slopes {
					if u.bodies[r] > 0 && q.beyond(u.on[row][r], n.length) > enough*size {
						return fmt.Errorf("%w: %s depends on more of %s than it declares", rigid.ErrInput, who, s.l.design.name(u.links[r]))
					}
				}
			}
		}
	}
	return nil
}

// beyond returns the largest slope by an unknown that is not declared.
func (s Slope) beyond(on Unknowns, length float64) float64 {
	most := 0.0
	for k, v := range [...]float64{s.X * length, s.Y * length, s.Angle} {
		if on>>k&1 == 0 {
			most = math.Max(most, math.Abs(v))
		}
	}
	return most
}
