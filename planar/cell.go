package planar

import (
	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A cell is a parallelogram O A B C of which A and C are known: |OA| = |CB| and
// |OC| = |AB|, O a pin of the bodies of A and C. It is solved by exact forms that
// pass the flattened position without a root or a division by the sine between the
// links. In the parallel motion
//
//	AB = C − O,  CB = A − O
//
// and in the contrary one both are mirrored in the line through A and C: in complex
// numbers, with d = C − A, AB = d²·conj(C − O)/|d|².
type cell struct {
	o      spot // O on the body of A
	rhombe bool // equal sides: in the contrary motion B would stay on O
}

// even says how nearly equal lengths must be, over the longer, to make a cell.
const even = 1e-12

// branches returns how the cell may move.
func (c *cell) branches() []branch {
	if c.rhombe {
		return []branch{parallel, left, right}
	}
	return []branch{parallel, contrary}
}

func (c *cell) place(sc *scene, t *dyad.Triangle, by branch, a, at r2.Vec) {
	o := sc.place(&c.o)
	t.R = r2.Vec{X: at.X - o.X, Y: at.Y - o.Y}
	t.Q = r2.Vec{X: a.X - o.X, Y: a.Y - o.Y}
	if by == contrary {
		d := r2.Vec{X: at.X - a.X, Y: at.Y - a.Y}
		t.R, t.Q = mirror(t.R, d), mirror(t.Q, d)
	}
	t.F = 2 * cross(t.R, t.Q)
}

// mirror returns v mirrored in the direction of d.
func mirror(v, d r2.Vec) r2.Vec {
	u := turned(d, d)
	i := 1 / (d.X*d.X + d.Y*d.Y)
	return r2.Scale(i, r2.Vec{X: u.X*v.X + u.Y*v.Y, Y: u.Y*v.X - u.X*v.Y})
}

// rates gives the links' angular rates. In the parallel motion AB turns with the
// body of C and CB with that of A; in the contrary one as their mirror images, with
// ωd = d×ḋ/|d|² of the line A–C,
//
//	ω1 = 2ωd − ωC,  ω2 = 2ωd − ωA
func (c *cell) rates(sc *scene, o *rrr, by branch, a, at *rigid.Point) {
	m1, m2, on, onC := &sc.m[o.one.body], &sc.m[o.two.body], &sc.m[o.a.body], &sc.m[o.c.body]
	if by == parallel {
		m1.Omega, m1.Alpha, m2.Omega, m2.Alpha = onC.Omega, onC.Alpha, on.Omega, on.Alpha
		return
	}
	d := sc.guard[o.i].d
	i := 1 / r2.Dot(d, d)
	v, w := r2.Sub(at.Vel, a.Vel), r2.Sub(at.Acc, a.Acc)
	turn := cross(d, v) * i
	grow := (cross(d, w) - 2*r2.Dot(d, v)*turn) * i
	m1.Omega, m2.Omega = 2*turn-onC.Omega, 2*turn-on.Omega
	m1.Alpha, m2.Alpha = 2*grow-onC.Alpha, 2*grow-on.Alpha
}
