package planar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"
)

// pace returns at which part a step that was too long is best cut: in the middle, but
// next to a limit where a step may go. There every motion is as √δ of the distance δ,
// with v/a = ∓2δ of its path rates: away from the limit a step may go on to 2δ, and
// towards it must leave some of δ.
func (w *walk) pace() float64 {
	w.from.rest()
	if w.l.program.rate(w.from) < len(w.l.program.ops) {
		return 0.5
	}
	v, a, both := 0.0, 0.0, 0.0
	arm := w.l.program.length * w.l.program.length
	for i := range w.from.m {
		m := &w.from.m[i]
		v += r2.Norm2(m.Vel) + arm*m.Omega*m.Omega
		a += r2.Norm2(m.Acc) + arm*m.Alpha*m.Alpha
		both += r2.Dot(m.Vel, m.Acc) + arm*m.Omega*m.Alpha
	}
	cut, most := 0.5*math.Sqrt(v/a), 0.5
	if both > 0 {
		if cut *= 0.8; !w.failed {
			most = 0.9 // the end of the step may be next to the limit
		}
	}
	if w.close = cut < most; !w.close {
		return 0.5
	}
	return math.Max(cut, 1./64)
}
