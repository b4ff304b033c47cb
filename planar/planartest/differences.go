package planartest

import (
	"fmt"
	"math"
	"slices"

	"example.com/twopoint/planar"
)

// difference returns the derivative by t at 0 of what of gives for the bodies that at gives: central
// differences by two steps, extrapolated.
func (k *checker) difference(at func(t float64) []body, of func(*planar.Evaluation) float64) (float64, error) {
	const h = 2e-4
	var d [2]float64
	for i, step := range []float64{h, h / 2} {
		hi, err := k.evaluate(at(step))
		if err != nil {
			return 0, err
		}
		lo, err := k.evaluate(at(-step))
		if err != nil {
			return 0, err
		}
		d[i] = (of(hi) - of(lo)) / (2 * step)
	}
	return (4*d[1] - d[0]) / 3, nil
}

func residual(row int) func(*planar.Evaluation) float64 {
	return func(e *planar.Evaluation) float64 { return e.Rows[row].Residual }
}

// slopes compares those of an equation with differences, and with what is declared.
func (k *checker) slopes(row int, q planar.Equation, all []body) error {
	declared, _ := k.c.(planar.Declarer)
	most := k.s.Tolerance * k.size(q)
	for i, l := range k.links {
		if l == planar.Frame {
			continue
		}
		on := planar.OfAll
		if declared != nil {
			on = declared.Depends(row, i)
		}
		s := q.Slopes[i]
		for _, part := range []struct {
			name        string
			by          planar.Unknowns
			given, unit float64
			move        func(b *body, d float64)
		}{
			{"x", planar.OfX, s.X, k.s.Length, func(b *body, d float64) { b.x += d }},
			{"y", planar.OfY, s.Y, k.s.Length, func(b *body, d float64) { b.y += d }},
			{"angle", planar.OfAngle, s.Angle, 1, func(b *body, d float64) { b.angle += d }},
		} {
			found, err := k.difference(func(t float64) []body {
				moved := slices.Clone(all)
				part.move(&moved[i], t*part.unit)
				return moved
			}, residual(row))
			if err != nil {
				return err
			}
			if !(math.Abs(found-part.given*part.unit) <= most) {
				return fmt.Errorf("slope by %s of link %d is %.9g, by differences %.9g, at %v", part.name, l, part.given, found/part.unit, all)
			}
			if on&part.by == 0 && !(math.Abs(found) <= most) {
				return fmt.Errorf("declared not to depend on %s of link %d, and does, by %.9g, at %v", part.name, l, found/part.unit, all)
			}
		}
	}
	return nil
}

// bias compares that of an equation with the difference of its rate.
func (k *checker) bias(row int, q planar.Equation, all []body) error {
	found, err := k.difference(func(t float64) []body { return after(all, t) }, func(e *planar.Evaluation) float64 {
		rate := 0.0
		for i, s := range e.Rows[row].Slopes {
			if k.links[i] != planar.Frame {
				rate += s.X*all[i].vx + s.Y*all[i].vy + s.Angle*all[i].omega
			}
		}
		return rate
	})
	if err != nil {
		return err
	}
	if most := k.s.Tolerance * math.Max(k.size(q), math.Abs(found)); !(math.Abs(found-q.Bias) <= most) {
		return fmt.Errorf("bias is %.9g, by differences %.9g, at %v", q.Bias, found, all)
	}
	return nil
}
