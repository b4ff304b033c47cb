package planar

import (
	"math"
	"math/cmplx"

	"example.com/twopoint/internal/bilinear"
	"gonum.org/v1/gonum/spatial/r2"
)

// A closure has the equations of a group in isotropic coordinates (Wampler 2001, from
// memory). Vectors are complex numbers; a free angle is z = e^{iθ}, with w = e^{−iθ}
// as an unknown of its own. A slide s on a line of known direction is z = w = s; one
// on a line that turns with an angle k is z = s·zₖ, w = s·wₖ. Then every loop is one
// linear equation in z and its conjugate is the same in w, and what ties z to w is
//
//	zₖ·wₖ = 1      z = w      z·wₖ = zₖ·w
//
// A guide with n·C = value closes as C = u·(s + i·value), a driven displacement as
// C = u·(value + in + i·s), u being the line's direction and s one more slide. All
// lengths are in units of scale.
type closure struct {
	bilinear.System
	scale float64
	flip  []bool // of every free angle: z = e^{−iθ}, as of gears that turn against it
	hosts []int  // of every slide: the angle that its line turns with, or −1
}

// equations returns the equations of the group, or false where a part of it has no
// such form.
func (n *newton) equations(sc *scene, d *desk) (*closure, bool) {
	clear(d.slide)
	e := &closure{scale: n.extent(d), flip: make([]bool, n.free), hosts: make([]int, n.slides)}
	if len(n.customs) > 0 || !n.senses(e) {
		return e, false
	}
	size, rows := n.free+n.slides+1, 0
	for i := range n.loops {
		if rows++; n.loops[i].kind == rowX {
			rows++
		} else {
			size++
		}
	}
	if rows != n.n {
		return e, false
	}
	for i := range n.loops {
		n.closing(e, sc, d, i, make([]complex128, size))
	}
	for k := range n.free {
		e.Forms = append(e.Forms, []bilinear.Term{{I: k, J: k, Coef: 1}, {I: size - 1, J: size - 1, Coef: -1}})
	}
	for s, k := range e.hosts {
		if k < 0 {
			k = size - 1
		}
		e.Forms = append(e.Forms, []bilinear.Term{{I: n.free + s, J: k, Coef: 1}, {I: k, J: n.free + s, Coef: -1}})
	}
	for _, z := range e.Z {
		w := make([]complex128, len(z))
		for i, v := range z {
			w[i] = cmplx.Conj(v)
		}
		e.W = append(e.W, w)
	}
	return e, true
}

// senses finds in which sense the members turn with each angle, and which angle each
// slide turns with. It reports false where a member turns in another way.
func (n *newton) senses(e *closure) bool {
	seen := make([]bool, n.free)
	for i := range n.members {
		m := &n.members[i]
		if len(m.own) == 0 {
			continue
		}
		if !m.plain() {
			return false
		}
		k, flip := m.own[0].Index, m.own[0].Coef < 0
		if seen[k] && e.flip[k] != flip {
			return false
		}
		seen[k], e.flip[k] = true, flip
	}
	for _, a := range n.chords {
		if a.slide >= 0 {
			e.hosts[a.slide] = n.host(a.member)
		}
	}
	for i := range n.loops {
		if k := n.loops[i].kind; k != rowX && k != rowGuide && k != rowSlide {
			return false
		}
	}
	return true
}

// host returns the angle that turns a member, or −1.
func (n *newton) host(member int) int {
	if own := n.members[member].own; len(own) > 0 {
		return own[0].Index
	}
	return -1
}

// axis returns a direction of a member as a factor of what its column stands for:
// that of its angle, or the last.
func (n *newton) axis(d *desk, member int, v r2.Vec, columns int) (complex128, int) {
	if k := n.host(member); k >= 0 {
		return complex(d.rest[3*member], d.rest[3*member+1]) * complex(v.X, v.Y), k
	}
	return complex(d.axis[2*member], d.axis[2*member+1]) * complex(v.X, v.Y), columns - 1
}

// closing adds the linear equation of a loop.
func (n *newton) closing(e *closure, sc *scene, d *desk, i int, z []complex128) {
	l := &n.loops[i]
	unit := complex(1/e.scale, 0)
	z[len(z)-1] = unit * complex(d.fixed[2*i], d.fixed[2*i+1])
	for _, a := range n.chords[l.moved:l.end] {
		v, col := n.axis(d, a.member, a.v, len(z))
		if a.slide >= 0 {
			z[n.free+a.slide] += v
		} else {
			z[col] += unit * v
		}
	}
	e.Z = append(e.Z, z)
	if l.kind == rowX {
		return
	}
	u, col := n.axis(d, l.a, l.u, len(z))
	own := n.free + len(e.hosts)
	e.hosts = append(e.hosts, n.host(l.a))
	if l.kind == rowGuide {
		z[own] -= u
		z[col] -= u * complex(0, l.value/e.scale)
		return
	}
	value := l.value
	if l.drive >= 0 {
		value += sc.in[l.drive].Pos
	}
	z[own] -= u * 1i
	z[col] -= u * complex(value/e.scale, 0)
}

// take sets the unknowns to those of an end, if that is a real solution: w the
// conjugate of z.
func (e *closure) take(n *newton, d *desk, end *bilinear.End) bool {
	const near = 1e-5
	if end.Infinite {
		return false
	}
	last := len(end.Z) - 1
	z0, w0 := end.Z[last], end.W[last]
	for k := range n.free {
		z, w := end.Z[k]/z0, end.W[k]/w0
		size := cmplx.Abs(z)
		if !(math.Abs(size-1) <= near && cmplx.Abs(cmplx.Conj(w)-z) <= near) {
			return false
		}
		if e.flip[k] {
			z = cmplx.Conj(z)
		}
		z /= complex(size, 0)
		d.dir[2*k], d.dir[2*k+1] = real(z), imag(z)
		d.angle[k] = cmplx.Phase(z)
	}
	for i := range n.slides {
		base := z0
		if k := e.hosts[i]; k >= 0 {
			base = end.Z[k]
		}
		s := end.Z[n.free+i] / base
		if !(math.Abs(imag(s)) <= near*math.Max(1, cmplx.Abs(s))) {
			return false
		}
		d.slide[i] = real(s) * e.scale
	}
	return true
}
