package planar

import (
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// An Influence is how a point and its link move with one drive, the others at
// rest: influence coefficients of the first order.
type Influence struct {
	Point r2.Vec  // m/rad for a driven turn, m/m for a driven displacement
	Turn  float64 // of the link: rad/rad or rad/m
}

// Influences writes into dst the influence of each drive on a point and its link:
// the columns of the Jacobian from the drives to a tool. dst has an element for
// each drive, else rigid.ErrInput, which also stands for an unknown link. At a
// position singular for the drives it returns the error of the group concerned,
// which wraps rigid.ErrSingular. It doesn't allocate; on an error dst is as it was.
func (s *State) Influences(dst []Influence, of Attachment) error {
	i, ok := s.slot(of.Link)
	if !ok || len(dst) != len(s.to) {
		return rigid.ErrInput
	}
	for k := range dst {
		if err := s.virtual(k); err != nil {
			return err // at the first drive: it depends on the place alone
		}
		m := &s.spare.m[i]
		dst[k] = Influence{Point: m.At(r2.Vec{X: of.X, Y: of.Y}).Vel, Turn: m.Omega}
	}
	return nil
}

// virtual solves the rates at the State's place for drive k at unit speed, the
// others at rest, in the spare scene.
func (s *State) virtual(k int) error {
	s.spare.set(s.now)
	for i := range s.spare.in {
		s.spare.in[i].Vel, s.spare.in[i].Acc = 0, 0
	}
	s.spare.in[k].Vel = 1
	return s.rates()
}

// rates solves the rates of the spare scene.
func (s *State) rates() error {
	p := s.l.program
	if op := p.rate(s.spare); op < len(p.ops) {
		return p.fault(op, singular)
	}
	return nil
}

// Condition returns the condition of the influences on a point: the greatest over
// the least length to which drives of one unit, in all mixtures, move it. It is 1
// where the point answers alike in all directions and grows without bound towards
// a singular position; +Inf in it, and with fewer than two drives. With c1 … cn the
// columns and d² = Σ (ci×cj)², it is
//
//	(f + √(f² − 4d²))/(2d),  f = Σ ci·ci
func Condition(by []Influence) float64 {
	f, d2 := 0.0, 0.0
	for i, a := range by {
		f += r2.Norm2(a.Point)
		for _, b := range by[:i] {
			c := r2.Cross(a.Point, b.Point)
			d2 += c * c
		}
	}
	d := math.Sqrt(d2)
	if d == 0 {
		return math.Inf(1)
	}
	return (f + math.Sqrt(math.Max((f-2*d)*(f+2*d), 0))) / (2 * d)
}

// A Tool is a motion asked of a point of a link.
type Tool struct {
	At           Attachment
	Vel, Acc     r2.Vec  // of the point, in the frame's axes
	Omega, Alpha float64 // of the link; read where there are three drives
}

// Drive writes into dst the motions of the drives, at their places, that give the
// tool its velocity and acceleration: the way back. A linkage with two drives gives
// a point its motion, one with three the link its turn as well; any other number is
// rigid.ErrInput, as are a dst of another length and an unknown link.
//
// It returns rigid.ErrSingular where the influences of the drives don't determine
// their motions (their determinant below rigid.LeastMargin of its columns' sizes,
// turns times the largest length), the error of a group whose position is singular
// for the drives, and rigid.ErrNotFinite for a number that is not finite or where a
// result would overflow. It doesn't allocate; on an error dst is as it was.
func (s *State) Drive(dst []rigid.Coordinate, tool Tool) error {
	i, ok := s.slot(tool.At.Link)
	n := len(s.to)
	if !ok || len(dst) != n || n < 2 || n > 3 {
		return rigid.ErrInput
	}
	var by [3]Influence
	if err := s.Influences(by[:n], tool.At); err != nil {
		return err
	}
	size := s.l.program.length
	vel, ok := solveTool(by[:n], Influence{tool.Vel, tool.Omega}, size)
	if !ok {
		return rigid.ErrSingular
	}
	s.spare.set(s.now)
	for k := range n {
		s.spare.in[k].Vel, s.spare.in[k].Acc = vel[k], 0
	}
	if err := s.rates(); err != nil {
		return err
	}
	m := &s.spare.m[i]
	rest := Influence{r2.Sub(tool.Acc, m.At(r2.Vec{X: tool.At.X, Y: tool.At.Y}).Acc), tool.Alpha - m.Alpha}
	acc, _ := solveTool(by[:n], rest, size)
	sum := 0.0
	for k := range n {
		sum += vel[k]*0 + acc[k]*0
	}
	if sum != 0 {
		return rigid.ErrNotFinite
	}
	for k := range dst {
		dst[k] = rigid.Coordinate{Pos: s.now.in[k].Pos, Vel: vel[k], Acc: acc[k]}
	}
	return nil
}

// solveTool solves Σ x·by = want for two or three x by Cramer's rule, and reports
// whether they are determined.
func solveTool(by []Influence, want Influence, size float64) (x [3]float64, ok bool) {
	if len(by) == 2 {
		a, b := by[0].Point, by[1].Point
		det := r2.Cross(a, b)
		x[0], x[1] = r2.Cross(want.Point, b)/det, r2.Cross(a, want.Point)/det
		return x, math.Abs(det) >= rigid.LeastMargin*r2.Norm(a)*r2.Norm(b) && det != 0
	}
	det := func(a, b, c Influence) float64 {
		return a.Turn*r2.Cross(b.Point, c.Point) + b.Turn*r2.Cross(c.Point, a.Point) + c.Turn*r2.Cross(a.Point, b.Point)
	}
	a, b, c := by[0], by[1], by[2]
	d := det(a, b, c)
	x[0], x[1], x[2] = det(want, b, c)/d, det(a, want, c)/d, det(a, b, want)/d
	norms := 1.0
	for _, v := range by {
		norms *= math.Hypot(r2.Norm(v.Point), size*v.Turn)
	}
	return x, math.Abs(d)*size >= rigid.LeastMargin*norms && d != 0
}
