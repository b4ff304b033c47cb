package planar

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r2"
)

// A linear is an angle as a linear form: of free angles that are not known, angles
// of bodies, inputs, phases.
type linear struct {
	psi, body, in, phase map[int]float64
	c                    float64
	pivot                int
}

// linear returns the angle of a body in free angles.
func (c *compiler) linear(body int) linear { return c.reduce(form0(&c.angles[body])) }

func form0(a *angle) linear {
	l := linear{psi: map[int]float64{}, body: map[int]float64{}, in: map[int]float64{}, phase: map[int]float64{}, c: a.Const}
	for _, t := range a.psi {
		l.psi[t.Index] += t.Coef
	}
	for _, t := range a.in {
		l.in[t.Index] += t.Coef
	}
	for _, t := range a.phase {
		l.phase[t.Index] += t.Coef
	}
	return l
}

// add returns l + k·o.
func (l linear) add(k float64, o *linear) linear {
	sum := linear{c: l.c + k*o.c}
	both := func(a, b map[int]float64) map[int]float64 {
		s := map[int]float64{}
		for i, v := range a {
			s[i] = v
		}
		for i, v := range b {
			w := s[i] + k*v
			if math.Abs(w) < 1e-12*(math.Abs(s[i])+math.Abs(k*v)) || w == 0 {
				delete(s, i)
			} else {
				s[i] = w
			}
		}
		return s
	}
	sum.psi, sum.body, sum.in, sum.phase = both(l.psi, o.psi), both(l.body, o.body), both(l.in, o.in), both(l.phase, o.phase)
	return sum
}

// reduce puts what is known in place of free angles.
func (c *compiler) reduce(l linear) linear {
	for i := range c.basis {
		b := &c.basis[i]
		if k := l.psi[b.pivot]; k != 0 {
			l = l.add(-k, b)
			delete(l.psi, b.pivot)
		}
	}
	return l
}

// source notes that the angle of a body has been solved: its form less itself is 0.
func (c *compiler) source(body int) {
	c.counted[body], c.turned[body] = true, true
	l := c.linear(body)
	if len(l.psi) == 0 {
		return
	}
	l = l.add(-1, &linear{body: map[int]float64{body: 1}})
	l.pivot = -1
	for i := range l.psi {
		if l.pivot < 0 || math.Abs(l.psi[i]) > math.Abs(l.psi[l.pivot]) || math.Abs(l.psi[i]) == math.Abs(l.psi[l.pivot]) && i < l.pivot {
			l.pivot = i
		}
	}
	k := l.psi[l.pivot]
	c.basis = append(c.basis, linear{}.add(1/k, &l))
	c.basis[len(c.basis)-1].pivot = l.pivot
}

// known reports whether the angle of a body is known.
func (c *compiler) known(body int) bool { return len(c.linear(body).psi) == 0 }

// sum returns a known angle.
func (l *linear) sum() angleSum {
	s := angleSum{c: l.c}
	s.u = r2.Vec{X: math.Cos(l.c), Y: math.Sin(l.c)}
	if l.c == 0 {
		s.u = r2.Vec{X: 1}
	}
	list := func(m map[int]float64) (t []term) {
		for i, k := range m {
			t = append(t, term{i, k})
		}
		slices.SortFunc(t, func(a, b term) int { return a.Index - b.Index })
		return t
	}
	s.bodies, s.in, s.phase = list(l.body), list(l.in), list(l.phase)
	return s
}

// fixedTurn returns the angle of a body less that of another, and whether it is
// constant.
func (c *compiler) fixedTurn(of, from int) (float64, bool) {
	a, b := form0(&c.angles[of]), form0(&c.angles[from])
	turn := a.add(-1, &b)
	return turn.c, len(turn.psi)+len(turn.in)+len(turn.phase) == 0
}

// total returns the angle of a body with its whole turns.
func (c *compiler) total(body int) angleSum {
	if c.counted[body] {
		return angleSum{bodies: []term{{body, 1}}, u: r2.Vec{X: 1}}
	}
	l := c.linear(body)
	return l.sum()
}

// turn sets the angle of a body, if it is known and not set.
func (c *compiler) turn(body int) {
	if c.turned[body] {
		return
	}
	l := c.linear(body)
	if len(l.psi) > 0 {
		return
	}
	c.turned[body] = true
	if s := l.sum(); s.follows() {
		c.emit(-1, &follow{body, s.bodies[0].Index, s.u})
	} else {
		c.emit(-1, &spin{body, s})
	}
}
