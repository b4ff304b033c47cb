package planar

import (
	"math"
	"math/rand/v2"
)

// A scatter is a place of every pin, origin and direction at random, as residues:
// the position at which the rank of the equations is taken.
type scatter struct {
	pins    map[int][2]residue // by the pin's first point
	origins [][2]residue       // of bodies
	angles  []form             // of bodies, in the unknown angles
	rates   map[float64]residue
	random  *rand.Rand
}

// A lineForm is a direction in the plane: the angle of its body and the rest.
type lineForm struct {
	angle form // in free angles, inputs and phases
	at    float64
	u     [2]residue
}

func (b *builder) scatter(angles []form) *scatter {
	s := &scatter{angles: angles, pins: map[int][2]residue{}, rates: map[float64]residue{}, random: rand.New(rand.NewPCG(1, 61))}
	for range b.bodies() {
		s.origins = append(s.origins, s.place())
	}
	for body, p := range b.seated {
		if p >= 0 {
			s.pins[b.pin(p)] = s.origins[body]
		}
	}
	return s
}

func (s *scatter) number() residue   { return residue(s.random.Uint64N(prime)) }
func (s *scatter) place() [2]residue { return [2]residue{s.number(), s.number()} }

// pin returns the place of a pin, the same whenever it is asked for.
func (s *scatter) pin(first int) [2]residue {
	p, ok := s.pins[first]
	if !ok {
		p = s.place()
		s.pins[first] = p
	}
	return p
}

// rate returns a signed radius: equal ones are one number.
func (s *scatter) rate(r float64) residue {
	k, ok := s.rates[math.Abs(r)]
	if !ok {
		k = s.number()
		s.rates[math.Abs(r)] = k
	}
	if r < 0 {
		return k.negative()
	}
	return k
}

// direction returns the direction of a row's line: parallel ones are one.
func (b *builder) direction(s *scatter, r row) [2]residue {
	turning := b.angles[r.a].form()
	at := math.Mod(math.Atan2(r.u.Y, r.u.X)+b.angles[r.a].Const, math.Pi)
	for _, l := range b.lines {
		if l.angle.key() == turning.key() && math.Abs(math.Remainder(l.at-at, math.Pi)) <= lined {
			return l.u
		}
	}
	u := s.place()
	b.lines = append(b.lines, lineForm{turning, at, u})
	return u
}

// slopes returns the derivatives of a row by the unknowns, at the random place. With
// v = p − O from a body's origin to a point, and the angle θ,
//
//	dx = dOx − v.y·dθ,   dy = dOy + v.x·dθ
//
// and for a line that turns with a, with n = u⊥ and w = pb − Oa,
//
//	n·: dn = n·(dOb − dOa) + u·v·dθb − u·w·dθa
//	u·: du = u·(dOb − dOa) − n·v·dθb + n·w·dθa
func (b *builder) slopes(s *scatter, r row) form {
	pa, pb := s.pin(b.pin(r.at)), s.pin(b.pin(r.bt))
	oa, ob := s.origins[r.a], s.origins[r.b]
	v, w := minus(pb, ob), minus(pb, oa)
	switch r.kind {
	case rowX:
		return b.slope(s, r, [2]residue{1, 0}, v[1].negative(), oa[1].minus(pa[1]))
	case rowY:
		return b.slope(s, r, [2]residue{0, 1}, v[0], pa[0].minus(oa[0]))
	case rowCustom:
		return b.customSlopes(s, r, false)
	}
	u := b.direction(s, r)
	n := [2]residue{u[1].negative(), u[0]}
	switch r.kind {
	case rowGuide:
		return b.slope(s, r, n, dot(u, v), dot(u, w))
	case rowSlide:
		return b.slope(s, r, u, dot(n, v).negative(), dot(n, w).negative())
	default: // rowRack
		k := s.rate(r.rate)
		return b.slope(s, r, u, dot(n, v).negative().plus(k), dot(n, w).negative().plus(k))
	}
}

// slope returns  along·(dOb − dOa) + byB·dθb − byA·dθa.
func (b *builder) slope(s *scatter, r row, along [2]residue, byB, byA residue) form {
	var f form
	side := func(body int, sign, by residue) {
		if body > 0 {
			for axis, k := range along {
				f = f.plus(coefficient{exact: k.times(sign)}, form{terms: []formTerm{{b.xy(body) + axis, one}}})
			}
		}
		for _, t := range s.angles[body].terms {
			k := t.by.exact.times(by).times(sign)
			f = f.plus(coefficient{exact: k}, form{terms: []formTerm{{b.system.psi(t.index), one}}})
		}
	}
	side(r.b, 1, byB)
	side(r.a, prime-1, byA)
	return f
}

func minus(a, b [2]residue) [2]residue { return [2]residue{a[0].minus(b[0]), a[1].minus(b[1])} }

func dot(a, b [2]residue) residue { return a[0].times(b[0]).plus(a[1].times(b[1])) }

// form returns the angle without its constant as one form, to tell equal ones.
func (a *angle) form() form {
	var f form
	for i, terms := range [][]term{a.psi, a.in, a.phase} {
		for _, t := range terms {
			f.terms = append(f.terms, formTerm{3*t.Index + i, dyadic(t.Coef)})
		}
	}
	return f
}
