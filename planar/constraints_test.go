package planar_test

import (
	"math"

	. "example.com/twopoint/planar"
	"gonum.org/v1/gonum/spatial/r2"
)

// A spool winds a belt: the end of the belt, on a slider, comes nearer along a line
// as the spool turns, by more a turn as the roll grows: Φ = x − Σ, with thickness h,
//
//	length wound = radius·θ + h·θ²/4π
type spool struct {
	spool, slider     Link
	radius, thickness float64
}

func (s spool) Links() []Link { return []Link{s.spool, s.slider, Frame} }
func (s spool) Rows() int     { return 1 }
func (s spool) Depends(_, i int) Unknowns {
	return [...]Unknowns{OfAngle, OfX, 0}[i]
}
func (s spool) Evaluate(e *Evaluation) error {
	turn, x := e.Links[0].Turn, e.Links[1].Pose.Origin.X
	k := s.thickness / (4 * math.Pi)
	q := &e.Rows[0]
	q.Residual = x + s.radius*turn + k*turn*turn
	q.Slopes[0].Angle = s.radius + 2*k*turn
	q.Slopes[1].X = 1
	q.Bias = 2 * k * e.Links[0].Omega * e.Links[0].Omega
	return nil
}

// A bar is two equations between two links and a third: the middle of points of the
// outer two is a point of the one between. As a test of several equations.
type balance struct{ links [3]Link }

func (b *balance) Links() []Link { return b.links[:] }
func (b *balance) Rows() int     { return 2 }
func (b *balance) Evaluate(e *Evaluation) error {
	var sum, bias r2.Vec
	for i, k := range [3]float64{0.5, -1, 0.5} {
		p := e.Links[i].At(r2.Vec{X: 1})
		sum, bias = r2.Add(sum, r2.Scale(k, p.Pos)), r2.Add(bias, r2.Scale(k, p.Acc))
		r := r2.Sub(p.Pos, e.Links[i].Pose.Origin)
		e.Rows[0].Slopes[i] = Slope{X: k, Angle: -k * r.Y}
		e.Rows[1].Slopes[i] = Slope{Y: k, Angle: k * r.X}
	}
	e.Rows[0].Residual, e.Rows[1].Residual = sum.X, sum.Y
	e.Rows[0].Bias, e.Rows[1].Bias = bias.X, bias.Y
	return nil
}

// An odd is a Constraint that does whatever is asked of it.
type odd struct {
	links    []Link
	rows     int
	evaluate func(e *Evaluation) error
	depends  func(row, i int) Unknowns
}

func (o odd) Links() []Link { return o.links }
func (o odd) Rows() int     { return o.rows }
func (o odd) Evaluate(e *Evaluation) error {
	if o.evaluate == nil {
		return nil
	}
	return o.evaluate(e)
}
func (o odd) Depends(row, i int) Unknowns {
	if o.depends == nil {
		return OfAll
	}
	return o.depends(row, i)
}

// wound is a crank with a spool's belt to a slider.
func wound(c Constraint) Design {
	var p plan
	l := p.links("spool", "slider")
	p.pin(Frame.At(0, 0.3), l[0].At(0, 0))
	p.guide(Frame.Line(0, 0, 0), l[1].Line(0, 0, 0))
	if c == nil {
		c = spool{l[0], l[1], 0.1, 0.002}
	}
	p.by(c)
	p.turn(l[0], Frame)
	return p.Design
}
