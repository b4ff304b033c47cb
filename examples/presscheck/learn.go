package main

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

var errNoZero = errors.New("no zero of the encoder makes the ram move like this press")

const (
	perTurn   = 4096        // samples of a turn that are used; what is nearer repeats the counts' rounding
	mostFirst = 2 * perTurn // samples kept until the zero is known
	trials    = 720         // zeros tried
)

// A model is the press about which the equations are made linear: its zero is as
// lately found, its lengths as found in the first turn.
type model struct {
	press *slidercrank.Linkage
	at    vector
}

// row returns the derivatives of the ram's place by the unknowns and what the
// unknowns, linear, must make up for.
func (m *model) row(p point, turned float64) (j vector, y float64, err error) {
	turn := p.turn + m.at[zero]
	place, err := m.press.Coefficients(turn)
	if err != nil {
		return j, 0, err
	}
	var by slidercrank.Sensitivity
	if err := m.press.Sensitivity(&by, rigid.Coordinate{Pos: turn}, r2.Vec{}); err != nil {
		return j, 0, err
	}
	j[zero] = place.First
	j[drift] = place.First * turned
	j[ram] = 1
	j[crank], j[rod], j[offset] = by.Crank.Slide.Pos, by.Rod.Slide.Pos, by.Offset.Slide.Pos
	y = p.ram - place.Out
	for q, x := range m.at {
		y += j[q] * x
	}
	return j, y, nil
}

// find makes a model of the first turn: of all zeros the best, then least squares by
// Gauss and Newton.
func find(c *config, first []point) (*model, error) {
	press, err := slidercrank.New(c.Press)
	if err != nil {
		return nil, err
	}
	m := &model{press: press}
	off := math.Inf(1)
	for k := range trials {
		z := rigid.Wrap(float64(k) * rigid.Revolution / trials)
		if s := scatter(press, first, z, c.ScaleZeroed); s < off {
			off, m.at[zero] = s, z
		}
	}
	if off > c.Press.Crank/10 {
		return nil, errNoZero
	}
	for _, free := range [][]int{c.free(zero, crank), c.free(zero, crank, rod, offset)} {
		for range 5 {
			if err := m.improve(c, first, free); err != nil {
				return nil, err
			}
		}
	}
	return m, nil
}

// improve takes one step of Gauss and Newton. Lengths far off, which a slip in the
// first turn may feign, are not followed.
func (m *model) improve(c *config, first []point, free []int) error {
	var s sums
	for _, p := range first {
		j, y, err := m.row(p, 0)
		if err != nil {
			return err
		}
		s.add(&j, y)
	}
	fit, ok := s.solve(vector{}, free...)
	if !ok {
		return errNoZero
	}
	m.at[zero] = fit.x[zero]
	d, far := c.Press, c.Press.Crank/10
	d.Crank, d.Rod, d.Offset = d.Crank+fit.x[crank], d.Rod+fit.x[rod], d.Offset+fit.x[offset]
	if max(math.Abs(fit.x[crank]), math.Abs(fit.x[rod]), math.Abs(fit.x[offset])) > far || !turns(d) {
		return nil
	}
	press, err := slidercrank.New(d)
	if err == nil {
		m.press = press
		m.at[crank], m.at[rod], m.at[offset] = fit.x[crank], fit.x[rod], fit.x[offset]
	}
	return err
}

// turns reports whether the crank turns fully.
func turns(d slidercrank.Dimensions) bool { return d.Rod > d.Crank+math.Abs(d.Offset) }

// scatter is that of the ram about a press with its encoder's zero at z, from some
// 360 samples, the scale's offset taken out where it is unknown.
func scatter(press *slidercrank.Linkage, first []point, z float64, scaleZeroed bool) float64 {
	var n, sum, square float64
	for i := 0; i < len(first); i += 1 + len(first)/360 {
		l, err := press.Coefficients(first[i].turn + z)
		if err != nil {
			return math.Inf(1)
		}
		e := first[i].ram - l.Out
		n, sum, square = n+1, sum+e, square+e*e
	}
	if scaleZeroed {
		return math.Sqrt(square / n)
	}
	return math.Sqrt(max(square-sum*sum/n, 0) / n)
}

// free adds the scale's offset to the unknowns, where it is one.
func (c *config) free(unknowns ...int) []int {
	if c.ScaleZeroed {
		return unknowns
	}
	return append(unknowns, ram)
}
