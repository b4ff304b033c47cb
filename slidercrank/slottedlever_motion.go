package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// finite returns ErrNotFinite if a rate of the links, or the acceleration of the
// pin at the end of the crank r, overflows.
func (m *slotMotion) finite(r float64) error {
	w2, al := m.turn.Vel*m.turn.Vel, math.Abs(m.turn.Acc)
	sum := m.swing.Vel + m.swing.Acc + m.slide.Vel + m.slide.Acc + w2 + r*al + r*w2
	if sum*0 != 0 {
		return rigid.ErrNotFinite
	}
	return nil
}

// write writes the motions of the crank, of the block on its pin and of the link
// with the line, adding Mount's origin last.
func (k *slotForm) write(crank, block, line *rigid.Motion, m *slotMotion) {
	w, al := m.turn.Vel, m.turn.Acc
	o := k.mount.Origin
	set(crank, o, r2.Vec{}, r2.Vec{}, m.crank, w, al)
	setPinned(block, o, r2.Scale(k.r, m.crank), w, al, m.line, m.swing.Vel, m.swing.Acc)
	unsign(block)
	set(line, k.pivot, r2.Vec{}, r2.Vec{}, m.line, m.swing.Vel, m.swing.Acc)
}

// knee returns the side of the perpendicular from the crank pivot on the line,
// taken along the line's left normal: Right where the pin lies farther along the
// line than its foot, which is at c cos ψ, that is where
//
//	σ − c cos ψ = r cos(φ − ψ) > 0
func knee(crank, line r2.Vec) rigid.Side {
	if crank.X*line.X+crank.Y*line.Y < 0 {
		return rigid.Left
	}
	return rigid.Right
}

// set writes a motion number by number: a literal of its size would be made
// elsewhere and copied.
func set(m *rigid.Motion, origin, vel, acc, axis r2.Vec, omega, alpha float64) {
	m.Pose.Origin, m.Pose.Axis = origin, axis
	m.Vel, m.Acc = vel, acc
	m.Omega, m.Alpha = omega, alpha
}
