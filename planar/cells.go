package planar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// cell returns the parallelogram cell that a dyad is, or nil.
func (c *compiler) cell(o *rrr, d dyadTies) *cell {
	pa, pc := c.pinAt(d.out.row), c.pinAt(d.in.row)
	for _, i := range c.pins.points[pa] {
		for _, k := range c.pins.points[pc] {
			a, at := c.pins.spot[i], c.pins.spot[k]
			if a.body == at.body || !c.placed(a.body) || !c.placed(at.body) {
				continue
			}
			for _, oa := range c.pins.bodies[a.body] {
				for _, oc := range c.pins.bodies[at.body] {
					pin := c.pins.of(oa)
					if pin != c.pins.of(oc) || pin == pa || pin == pc {
						continue
					}
					l, m := r2.Norm(r2.Sub(a.at, c.pins.spot[oa].at)), r2.Norm(r2.Sub(at.at, c.pins.spot[oc].at))
					enough := even * math.Max(o.k.B, o.k.C)
					if math.Abs(l-o.k.C) > enough || math.Abs(m-o.k.B) > enough {
						continue
					}
					o.a, o.c = a, at
					return &cell{o: c.pins.spot[oa], rhombe: math.Abs(l-m) <= enough}
				}
			}
		}
	}
	return nil
}

func (c *compiler) pinAt(r *row) int { return c.pins.of(r.at) }

// placed reports whether a body has been placed before a dyad.
func (c *compiler) placed(body int) bool {
	return body == 0 || c.done[body]
}
