package planar

import (
	"fmt"
	"iter"
	"math"

	"example.com/twopoint/rigid"
)

// A fitter is a calibration at work.
type fitter struct {
	s     *State
	log   iter.Seq2[Sample, error]
	c     Calibration
	all   Design         // the design, phases given; its drives go on through the outputs
	joint int            // of the first output
	inner []Dimension    // of each dimension what the linkage has
	outer [][]outerEntry // and what the outputs have
	cut   float64        // residuals beyond it are left out

	change  []float64
	now     *pass
	why     error
	passes  int
	samples int // −1 before the first pass
	done    bool
	span    []rigid.Interval // of each drive's readings
}

type outerEntry struct {
	output int
	entry  Entry
}

// A pass is one reading of the log.
type pass struct {
	r                        triangle
	spread                   spread
	samples, lost, used, out int
}

// machine lays out the design with the outputs.
func (f *fitter) machine() {
	f.all = f.s.l.Design()
	for i, j := range f.all.Joints {
		switch j := j.(type) {
		case GearPair:
			if j.AsAssembled {
				j.AsAssembled, j.Phase = false, f.s.now.phase[i]
				f.all.Joints[i] = j
			}
		case RackPair:
			if j.AsAssembled {
				j.AsAssembled, j.Phase = false, f.s.now.phase[i]
				f.all.Joints[i] = j
			}
		}
	}
	f.joint = len(f.all.Joints) + len(f.all.Drives)
	f.all.Drives = append(f.all.Drives, f.c.Outputs...)
	f.all.Guess = make([]rigid.Placement, len(f.all.Links))
	for l := range f.all.Links {
		p := f.s.Motion(Link(l)).Pose
		f.all.Guess[l] = rigid.Placement{X: p.Origin.X, Y: p.Origin.Y, Angle: p.Angle()}
	}
	f.change, f.samples = make([]float64, len(f.c.By)), -1
	f.span = make([]rigid.Interval, len(f.s.now.in))
	for i := range f.span {
		f.span[i] = rigid.Interval{Lo: math.Inf(1), Hi: math.Inf(-1)}
	}
}

// split parts the entries of the linkage from those of the outputs.
func (f *fitter) split() {
	for _, m := range f.c.By {
		var inner Dimension
		var outer []outerEntry
		for _, e := range m.Of {
			if e.Joint < f.joint {
				inner.Of = append(inner.Of, e)
			} else {
				outer = append(outer, outerEntry{e.Joint - f.joint, e})
			}
		}
		f.inner, f.outer = append(f.inner, inner), append(f.outer, outer)
	}
}

// changed returns the machine with changes made: its design with the outputs, and
// what is added to the readings of drives and outputs: for a Turn's marks a and b
//
//	(θof + a) − (θfrom + b) = reading + Phase
func (f *fitter) changed(by []float64) (Design, []float64) {
	d, zero := f.all.clone(), make([]float64, len(f.all.Drives))
	for i, m := range f.c.By {
		for _, e := range m.Of {
			if d.add(e, by[i]) == nil {
				continue
			}
			switch k := e.Joint - len(d.Joints); {
			case e.Part == Phase || e.End == B:
				zero[k] += by[i]
			default:
				zero[k] -= by[i]
			}
		}
	}
	return d, zero
}

// put makes the linkage with changes made, where the State is.
func (f *fitter) put(d Design, zero []float64) (*State, error) {
	drives := len(f.s.now.in)
	d.Drives = d.Drives[:drives]
	l, err := New(d)
	if err != nil {
		return nil, err
	}
	in := f.s.Inputs()
	for i := range in {
		in[i] = rigid.Coordinate{Pos: in[i].Pos + zero[i]}
	}
	return l.Assemble(d.Guess, in...)
}

// run reads the log once, with changes made. The pass is nil, and why says it, where
// there is no such machine.
func (f *fitter) run(by []float64) (*pass, error) {
	f.passes++
	d, zero := f.changed(by)
	st, err := f.put(d, zero)
	if err != nil {
		f.why = err
		return nil, nil
	}
	w := &sampler{f: f, st: st, zero: zero, pass: &pass{r: newTriangle(len(by))}}
	w.in = st.Inputs()
	w.row, w.slopes = make([]float64, len(by)+1), make([]float64, len(by)*len(f.c.Outputs))
	w.outputs = d.Drives[len(w.in):]
	for i := range w.outputs {
		b := d.bondsOf(f.joint + i)
		w.bonds = append(w.bonds, b[0])
	}
	for sample, err := range f.log {
		if err != nil {
			return nil, err
		}
		w.pass.samples++
		if err := w.sample(&sample); err != nil {
			return nil, err
		}
	}
	if f.samples >= 0 && w.pass.samples != f.samples {
		return nil, fmt.Errorf("%w: a log of %d samples, then of %d", rigid.ErrInput, f.samples, w.pass.samples)
	}
	f.samples = w.pass.samples
	return w.pass, nil
}
