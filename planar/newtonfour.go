package planar

import "math"

// Four unknowns are what most groups of higher class have. Their factors and
// solution, written out, take half the time of the loops.

// A quad is a row of four slopes or factors.
type quad struct{ a, b, c, d float64 }

// factorFour is factor for four unknowns, in the same order of operations.
func (d *desk) factorFour() bool {
	j, square, perm := (*[16]float64)(d.j), (*[4]float64)(d.square), (*[4]float64)(d.perm)
	p, q := quad{j[0], j[1], j[2], j[3]}, quad{j[4], j[5], j[6], j[7]}
	r, s := quad{j[8], j[9], j[10], j[11]}, quad{j[12], j[13], j[14], j[15]}
	square[0] = p.a*p.a + q.a*q.a + r.a*r.a + s.a*s.a
	square[1] = p.b*p.b + q.b*q.b + r.b*r.b + s.b*s.b
	square[2] = p.c*p.c + q.c*q.c + r.c*r.c + s.c*s.c
	square[3] = p.d*p.d + q.d*q.d + r.d*r.d + s.d*s.d
	sign := 1.0

	switch best := largest(p.a, q.a, r.a, s.a); best {
	case 0:
		perm[0] = 0
	case 1:
		perm[0], sign, p, q = 1, -sign, q, p
	case 2:
		perm[0], sign, p, r = 2, -sign, r, p
	case 3:
		perm[0], sign, p, s = 3, -sign, s, p
	}
	inverse := 1 / p.a
	q.a, r.a, s.a = q.a*inverse, r.a*inverse, s.a*inverse
	q.b, q.c, q.d = q.b-q.a*p.b, q.c-q.a*p.c, q.d-q.a*p.d
	r.b, r.c, r.d = r.b-r.a*p.b, r.c-r.a*p.c, r.d-r.a*p.d
	s.b, s.c, s.d = s.b-s.a*p.b, s.c-s.a*p.c, s.d-s.a*p.d

	switch best := largest(q.b, r.b, s.b, 0); best {
	case 0:
		perm[1] = 1
	case 1:
		perm[1], sign, q, r = 2, -sign, r, q
	case 2:
		perm[1], sign, q, s = 3, -sign, s, q
	}
	inverse2 := 1 / q.b
	r.b, s.b = r.b*inverse2, s.b*inverse2
	r.c, r.d = r.c-r.b*q.c, r.d-r.b*q.d
	s.c, s.d = s.c-s.b*q.c, s.d-s.b*q.d

	perm[2] = 2
	if math.Abs(s.c) > math.Abs(r.c) {
		perm[2], sign, r, s = 3, -sign, s, r
	}
	inverse3 := 1 / r.c
	s.c *= inverse3
	s.d -= s.c * r.d
	perm[3] = 3

	det := p.a * q.b * r.c * s.d
	if !(math.Abs(det) > 0) {
		d.last[detSign], d.last[detSquare] = 0, 0
		return false
	}
	d.last[detSign] = math.Copysign(sign, sign*det)
	d.last[detSquare] = p.a * p.a / square[0] * (q.b * q.b / square[1]) * (r.c * r.c / square[2]) * (s.d * s.d / square[3])
	*(*[16]float64)(d.lu) = [16]float64{
		inverse, p.b, p.c, p.d,
		q.a, inverse2, q.c, q.d,
		r.a, r.b, inverse3, r.d,
		s.a, s.b, s.c, 1 / s.d,
	}
	return true
}

// largest returns which of four numbers is the first of largest size.
func largest(a, b, c, d float64) int {
	best, most := 0, math.Abs(a)
	if v := math.Abs(b); v > most {
		best, most = 1, v
	}
	if v := math.Abs(c); v > most {
		best, most = 2, v
	}
	if math.Abs(d) > most {
		best = 3
	}
	return best
}

// solveFour is solve for four unknowns.
func (d *desk) solveFour(x *[4]float64) {
	lu, perm := (*[16]float64)(d.lu), (*[4]float64)(d.perm)
	for k, p := range perm[:3] {
		if p := int(p) & 3; p != k {
			x[k], x[p] = x[p], x[k]
		}
	}
	a := x[0]
	b := x[1] - lu[4]*a
	c := x[2] - lu[8]*a - lu[9]*b
	e := x[3] - lu[12]*a - lu[13]*b - lu[14]*c
	e *= lu[15]
	c = (c - lu[11]*e) * lu[10]
	b = (b - lu[6]*c - lu[7]*e) * lu[5]
	a = (a - lu[1]*b - lu[2]*c - lu[3]*e) * lu[0]
	x[0], x[1], x[2], x[3] = a, b, c, e
}
