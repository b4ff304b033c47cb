package planar

import (
	"math"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// read asks a Constraint for its equations, at motions that are set, and reports
// what is wrong with them. The lists in e are those of laid.
func (c *custom) read(e *evaluation) (kind faultKind, ok bool) {
	e.lay()
	if e.err = c.by.Evaluate(&e.Evaluation); e.err != nil {
		return noValue, false
	}
	if len(e.Rows) != len(c.on) {
		return wrongCount, false
	}
	sum := 0.0
	for i := range e.Rows {
		q := &e.Rows[i]
		if len(q.Slopes) != len(c.links) {
			return wrongCount, false
		}
		sum += q.Residual*0 + q.Bias*0
		for _, s := range q.Slopes {
			sum += s.X*0 + s.Y*0 + s.Angle*0
		}
	}
	return noNumber, sum == 0
}

// An evaluation is an Evaluation with the lists that belong to it, which an author
// may have replaced by others.
type evaluation struct {
	Evaluation
	links  []Moving
	rows   []Equation
	slopes []Slope
	memory []float64
	err    error // the author's
}

func (c *custom) newEvaluation(memory []float64) evaluation {
	n := len(c.links)
	e := evaluation{links: make([]Moving, n), rows: make([]Equation, len(c.on)), slopes: make([]Slope, n*len(c.on)), memory: memory}
	for i := range e.links {
		e.links[i].Pose.Axis.X = 1
	}
	return e
}

// lay puts the evaluation's own lists in place, empty.
func (e *evaluation) lay() {
	clear(e.slopes)
	n := len(e.links)
	for i := range e.rows {
		e.rows[i] = Equation{Slopes: e.slopes[i*n : (i+1)*n : (i+1)*n]}
	}
	e.Links, e.Rows, e.Memory = e.links, e.rows, e.memory
}

// put sets the place of link i, which lies in its body as seat says.
func (e *evaluation) put(i int, seat *seat, body rigid.Pose, turn float64) {
	m := &e.links[i]
	*m = Moving{Turn: turn}
	m.Pose = body.Compose(seat.local)
}

// natural returns the length of a row's slopes, an angle on an arm of the length
// given, over the links that move.
func (c *custom) natural(slopes []Slope, length float64) float64 {
	sum := 0.0
	for i, s := range slopes {
		if c.bodies[i] > 0 {
			sum += (s.X*s.X+s.Y*s.Y)*length*length + s.Angle*s.Angle
		}
	}
	return math.Sqrt(sum)
}

// loose returns by how much the slopes of a row differ from those of an equation
// between its links alone, over their size: nothing changes where all move as one.
func (c *custom) loose(e *evaluation, row int, length float64) float64 {
	var x, y, turn float64
	for i, s := range e.Rows[row].Slopes {
		if c.bodies[i] == 0 {
			return 0
		}
		p := e.Links[i].Pose.Origin
		x, y, turn = x+s.X, y+s.Y, turn+s.Angle+cross(p, r2.Vec{X: s.X, Y: s.Y})
	}
	size := c.natural(e.Rows[row].Slopes, length)
	if size == 0 {
		return 0
	}
	return math.Max(length*math.Hypot(x, y), math.Abs(turn)) / size
}
