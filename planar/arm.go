package planar

import "gonum.org/v1/gonum/spatial/r2"

// An arm is the vector between two pins of a link in the link's axes. Several bodies
// whose poses relative to the first are known are one link too, of changing length:
// a cylinder with its piston, or a link that is driven from its neighbour. There
// the far pin is on a motion relative to the first body; where the arm is rigid it
// is on the frame's.
type arm struct {
	from r2.Vec
	to   spot
}

func rigidArm(from, to r2.Vec) arm { return arm{from, spot{0, to}} }

// rigid reports whether the arm doesn't change.
func (a *arm) rigid() bool { return a.to.body == 0 }

// vector returns the arm ℓ.
func (a *arm) vector(sc *scene) r2.Vec { return r2.Sub(sc.place(&a.to), a.from) }

// A growth is how an arm changes: its length b, ḃ/b and b̈/b, and how it turns in
// the link's axes.
type growth struct{ length, vel, acc, turn, turnAcc float64 }

// grow returns the change of the arm, with ℓ̇ and ℓ̈ those of the far pin:
//
//	ḃ = ℓ·ℓ̇/b             b̈ = (ℓ·ℓ̈ + |ℓ̇|² − ḃ²)/b
//	turn = ℓ×ℓ̇/b²          turn' = ℓ×ℓ̈/b² − 2 (ḃ/b) turn
func (a *arm) grow(sc *scene) growth {
	if a.rigid() {
		return growth{length: r2.Norm(r2.Sub(a.to.at, a.from))}
	}
	p := sc.m[a.to.body].At(a.to.at)
	l := r2.Sub(p.Pos, a.from)
	b := r2.Norm(l)
	i := 1 / (b * b)
	g := growth{length: b, vel: r2.Dot(l, p.Vel) * i, turn: cross(l, p.Vel) * i}
	g.acc = (r2.Dot(l, p.Acc)+r2.Dot(p.Vel, p.Vel))*i - g.vel*g.vel
	g.turnAcc = cross(l, p.Acc)*i - 2*g.vel*g.turn
	return g
}
