package planar

import (
	"errors"
	"fmt"
	"math"

	"example.com/twopoint/rigid"
)

// A sampler takes up samples in one pass.
type sampler struct {
	f       *fitter
	st      *State
	zero    []float64 // of the drives, then of the outputs
	outputs []Drive
	bonds   []bond // of the outputs
	in      []rigid.Coordinate
	slopes  []float64 // of each output by each dimension
	row     []float64
	pass    *pass
}

// sample moves the linkage to a sample and takes up its readings.
func (w *sampler) sample(s *Sample) error {
	if err := w.check(s); err != nil {
		return err
	}
	for i, d := range w.st.l.design.Drives {
		pos := s.In[i] + w.zero[i]
		if _, ok := d.(Turn); ok {
			pos = rigid.Nearest(pos, w.st.now.in[i].Pos)
		}
		w.in[i] = rigid.Coordinate{Pos: pos}
		span := &w.f.span[i]
		span.Lo, span.Hi = math.Min(span.Lo, s.In[i]), math.Max(span.Hi, s.In[i])
	}
	if w.st.Move(w.in...) != nil {
		w.lose(s)
		return nil
	}
	switch err := w.differentiate(); {
	case errors.Is(err, rigid.ErrSingular), errors.Is(err, rigid.ErrNotFinite):
		w.lose(s)
		return nil
	case err != nil:
		return err
	}
	for i, out := range s.Out {
		if !math.IsNaN(out) {
			w.take(i, out)
		}
	}
	return nil
}

func (w *sampler) check(s *Sample) error {
	if len(s.In) != len(w.in) || len(s.Out) != len(w.outputs) {
		return fmt.Errorf("%w: sample %d has %d and %d readings for %d drives and %d outputs",
			rigid.ErrInput, w.pass.samples-1, len(s.In), len(s.Out), len(w.in), len(w.outputs))
	}
	for _, x := range s.In {
		if x*0 != 0 {
			return fmt.Errorf("%w: sample %d", rigid.ErrNotFinite, w.pass.samples-1)
		}
	}
	for _, x := range s.Out {
		if math.IsInf(x, 0) {
			return fmt.Errorf("%w: sample %d", rigid.ErrNotFinite, w.pass.samples-1)
		}
	}
	return nil
}

// lose counts the readings of a sample that cannot be used.
func (w *sampler) lose(s *Sample) {
	for _, x := range s.Out {
		if !math.IsNaN(x) {
			w.pass.lost++
		}
	}
}

// differentiate finds the derivatives of all outputs by all dimensions.
func (w *sampler) differentiate() error {
	v, err := w.st.vary(0, nil, Frame, Frame)
	if err != nil {
		return err
	}
	v.orders = 1
	for i := range w.bonds {
		w.bonds[i].refresh(w.st, v.length)
	}
	n := len(w.f.inner)
	for j := range w.f.inner {
		inner := len(w.f.inner[j].Of) > 0
		if inner {
			if err := v.by(&w.f.inner[j]); errors.Is(err, ErrInconsistent) {
				return fmt.Errorf("%w by dimension %d", err, j)
			} else if err != nil {
				return err
			}
		}
		for i, o := range w.outputs {
			w.slopes[i*n+j] = 0
			if inner {
				w.slopes[i*n+j] = v.measured(o).Pos
			}
		}
		for _, e := range w.f.outer[j] {
			b := &w.bonds[e.output]
			k := v.length
			if b.kind.angular() {
				k = 1
			}
			w.slopes[e.output*n+j] += k * b.force(w.st, e.entry, v.length).Pos
		}
	}
	return nil
}

// take takes up a reading: as a row of the slopes and the residual, over the noise.
func (w *sampler) take(i int, out float64) {
	now, n := 0.0, len(w.f.inner)
	switch o := w.outputs[i].(type) {
	case Turn:
		now = w.st.Turn(o.Of, o.From).Pos
	case Slide:
		now = w.st.Slide(o.Of, o.From).Pos
	case Reach:
		a, b := w.st.Point(o.A).Pos, w.st.Point(o.B).Pos
		now = math.Hypot(b.X-a.X, b.Y-a.Y)
	}
	off := out + w.zero[len(w.in)+i] - now
	if _, ok := w.outputs[i].(Turn); ok {
		off = rigid.Wrap(off)
	}
	k := 1.0
	if w.f.c.Noise != nil {
		k = 1 / w.f.c.Noise[i]
	}
	w.pass.spread.add(k * off)
	if math.Abs(k*off) > w.f.cut {
		w.pass.out++
		return
	}
	w.pass.used++
	for j := range n {
		w.row[j] = k * w.slopes[i*n+j]
	}
	w.row[n] = k * off
	w.pass.r.add(w.row)
}
