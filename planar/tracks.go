package planar

import "gonum.org/v1/gonum/spatial/r2"

// meeting emits the lines that two ties keep two points of one pin on.
func (c *compiler) meeting(p *puzzle, one, two tie, first, second spot) bool {
	k1, ok1 := c.track(one.row, first)
	k2, ok2 := c.track(two.row, second)
	if !ok1 || !ok2 {
		return false
	}
	o := &meet{at: c.meets, one: k1, two: k2, of: []spot{first}}
	if second.body != first.body {
		o.of = append(o.of, second)
	}
	c.meets++
	c.emit(p.group, o)
	return true
}

// track returns the line on which a row keeps a point P of a body of known angle,
// the other body of the row being known. A row whose line is fixed in the other
// body puts
//
//	n·(P − pa) = value + n·(P − pb)        (guide)
//	u·(P − pa) = value + in + u·(P − pb)   (slide)
//
// which is a line there if the angle between the bodies is constant or P is pb. One
// whose line is fixed in the body itself puts
//
//	n·(P − pb) = n·(P − pa) − value
//	u·(P − pb) = u·(P − pa) − value − in
func (c *compiler) track(r *row, p spot) (k track, ok bool) {
	if r.kind == rowSlide || r.kind == rowRack {
		if k.by = c.displacement(r); k.by == nil {
			return k, false
		}
	}
	var beside r2.Vec
	if k.with = r.a; r.b == p.body {
		k.on = spot{r.a, r.pa}
		if beside, ok = c.besideOf(r, p); !ok {
			return k, false
		}
	} else {
		k.on, beside = spot{r.b, r.pb}, r2.Sub(p.at, r.pa)
	}
	u, n, sign := r.u, r2.Vec{X: -r.u.Y, Y: r.u.X}, 1.0
	if r.a == p.body {
		sign = -1
	}
	if r.kind == rowGuide {
		k.u, k.e = u, sign*r.value+r2.Dot(n, beside)
	} else { // the line is square to u, so that its right is u, or −u
		k.u, k.e = r2.Scale(sign, n), -r.value-sign*r2.Dot(u, beside)
	}
	return k, true
}

// besideOf returns the vector from the row's point of its body b to another in the
// axes of a, if it is fixed there.
func (c *compiler) besideOf(r *row, p spot) (r2.Vec, bool) {
	v := r2.Sub(p.at, r.pb)
	if v == (r2.Vec{}) {
		return v, true
	}
	turn, ok := c.fixedTurn(r.b, r.a)
	return rotate(v, turn), ok
}

// displacement returns the part of a row's displacement along its line that
// changes: an input, or the turn of a pinion that is known.
func (c *compiler) displacement(r *row) *angleSum {
	if r.kind == rowSlide && r.drive < 0 {
		return &angleSum{}
	}
	if r.kind == rowSlide {
		return &angleSum{in: []term{{r.drive, 1}}}
	}
	a, b := c.linear(r.a), c.linear(r.b)
	if len(a.psi)+len(b.psi) > 0 {
		return nil
	}
	turn := b.add(-1, &a)
	turn = linear{}.add(-r.rate, &turn)
	if r.phased {
		turn.phase[r.joint]++
	}
	s := turn.sum()
	return &s
}
