package main

import (
	"math"

	"example.com/twopoint/rigid"
)

const (
	parts         = 64  // of a turn, in which the mean difference is taken
	mostStretches = 512 // that are kept; of a longer log each is of more turns
)

// A part is the mean over one part of the turn, of all turns: Σ y and Σ j.
type part struct {
	n, y float64
	j    vector
}

// A stretch is a turn of the log, or several, with a zero of its own, or what is
// left of a turn where the counts jumped: the equation for the zero alone,
//
//	weight·zero + Σ row·others = rest
type stretch struct {
	weight, rest float64
	row          vector
	turned       float64 // turns of the crank, signed
	from, to     float64 // s
	cut          int     // the jump that it begins with; 0: none
}

// fits reports whether the next stretch is of the same zero and near enough to join.
func (s *stretch) fits(next *stretch, span float64) bool {
	return next.cut == 0 && math.Abs(s.turned)+math.Abs(next.turned) <= 1.4*span
}

// join adds the next stretch, of the same zero.
func (s *stretch) join(o *stretch) {
	s.weight += o.weight
	s.rest += o.rest
	for p := range s.row {
		s.row[p] += o.row[p]
	}
	s.turned += o.turned
	s.to = o.to
}

// zero returns the zero that the others leave, and what they count for in it.
func (s *stretch) zero(x *vector) (z float64, h vector) {
	z = s.rest / s.weight
	for p := range s.row {
		h[p] = -s.row[p] / s.weight
		z += h[p] * x[p]
	}
	return z, h
}

// A fitter makes of the points of a log a bounded number of equations.
type fitter struct {
	c     *config
	first []point // until the model is known
	model *model

	sum       sums // of the turn that is going on
	part      [parts]part
	begin, at point
	started   bool
	known     *vector // zero and scale offset of the last whole turn; nil if the counts jumped since

	all       sums // of all quiet turns, each zero eliminated
	parts     [parts]part
	quietest  float64 // least scatter of a turn
	whole     int     // whole turns
	loud      int     // whole turns left out of all
	stretches []stretch
	span      float64 // turns of a stretch
}

func newFitter(c *config) *fitter { return &fitter{c: c, quietest: math.Inf(1), span: 1} }

// take takes the next point.
func (f *fitter) take(p point) error {
	if f.started && p.cut == 0 && math.Abs(p.turn-f.at.turn) < rigid.Revolution/perTurn {
		return nil
	}
	if f.model == nil {
		if !f.started {
			f.begin, f.started = p, true
		}
		f.at = p
		f.first = append(f.first, p)
		if len(f.first) < mostFirst && math.Abs(p.turn-f.begin.turn) < rigid.Revolution {
			return nil
		}
		return f.learn()
	}
	return f.add(p)
}

// learn makes the model and takes the points again that were kept for it.
func (f *fitter) learn() error {
	m, err := find(f.c, f.first)
	if err != nil {
		return err
	}
	f.model, f.started = m, false
	for _, p := range f.first {
		if err := f.add(p); err != nil {
			return err
		}
	}
	f.first = nil
	return nil
}

func (f *fitter) add(p point) error {
	if !f.started || p.cut != 0 {
		f.close()
		f.begin, f.started, f.known = p, true, nil
	}
	turned := (p.turn - f.begin.turn) / rigid.Revolution
	j, y, err := f.model.row(p, turned)
	if err != nil {
		return err
	}
	f.at = p
	f.sum.add(&j, y)
	b := &f.part[int((rigid.Wrap(p.turn+f.model.at[zero])/rigid.Revolution+0.5)*parts)%parts]
	b.n, b.y = b.n+1, b.y+y
	for q := range j {
		b.j[q] += j[q]
	}
	if math.Abs(turned) >= 1 {
		f.close()
		f.begin = p
		f.begin.cut = 0
	}
	return nil
}

// close ends a turn, or what there is of one.
func (f *fitter) close() {
	s, turned := f.sum, (f.at.turn-f.begin.turn)/rigid.Revolution
	if w := s.a[zero][zero]; s.n >= 4 && w > 0 {
		whole := math.Abs(turned) >= 1
		if f.quiet(&s, whole) {
			rest := s.without(zero)
			f.all.plus(&rest)
			f.collect(&s)
		}
		next := stretch{weight: w, rest: s.b[zero], row: s.a[zero], turned: turned, from: f.begin.time, to: f.at.time, cut: f.begin.cut}
		next.row[zero] = 0
		f.keep(next)
		if whole {
			f.whole++
			f.follow(&s)
		}
	}
	f.sum, f.part = sums{}, [parts]part{}
}

// follow takes the zero of a whole turn: with the lengths of the model for the model,
// and with those as drawn, but the crank's, for the motion as drawn.
func (f *fitter) follow(s *sums) {
	if fit, ok := s.solve(f.model.at, f.c.free(zero)...); ok {
		f.model.at[zero] = fit.x[zero]
	}
	if fit, ok := s.solve(vector{}, f.c.free(zero, crank)...); ok {
		f.known = &fit.x
	}
}

// quiet reports whether a turn is like the others: in one with a jerk or a slip no
// press of any dimensions moves so. Where it is far quieter than those before, these
// are forgotten.
func (f *fitter) quiet(s *sums, whole bool) bool {
	fit, ok := s.solve(vector{}, f.c.free(zero, drift, crank, rod, offset)...)
	if !ok {
		return false
	}
	rms := fit.rms()
	if whole && rms*noisier < f.quietest {
		f.loud, f.all, f.parts = f.whole, sums{}, [parts]part{}
	}
	if whole {
		f.quietest = min(f.quietest, rms)
	}
	if rms <= noisier*f.quietest {
		return true
	}
	if whole {
		f.loud++
	}
	return false
}

const noisier = 1.5 // times the quietest turn

// collect adds the turn's parts, its zero eliminated as in the sums.
func (f *fitter) collect(s *sums) {
	w := s.a[zero][zero]
	for i, b := range f.part {
		t := &f.parts[i]
		t.n += b.n
		t.y += b.y - b.j[zero]*s.b[zero]/w
		for p := range t.j {
			t.j[p] += b.j[p] - b.j[zero]*s.a[zero][p]/w
		}
	}
}

// keep adds a stretch to those that have a zero of their own, and makes room.
func (f *fitter) keep(s stretch) {
	if n := len(f.stretches); n > 0 && f.stretches[n-1].fits(&s, f.span) {
		f.stretches[n-1].join(&s)
		return
	}
	f.stretches = append(f.stretches, s)
	for len(f.stretches) >= mostStretches {
		f.span *= 2
		f.shorten()
	}
}

func (f *fitter) shorten() {
	kept := f.stretches[:1]
	for _, s := range f.stretches[1:] {
		if t := &kept[len(kept)-1]; t.fits(&s, f.span) {
			t.join(&s)
		} else {
			kept = append(kept, s)
		}
	}
	f.stretches = kept
}
