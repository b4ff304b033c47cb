package main

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
)

// A judge turns equations into findings.
type judge struct {
	c     *config
	f     *fitter
	base  solution // scale offset alone
	full  solution // and all lengths
	best  solution // what explains the log
	sigma float64  // scatter
}

// solve fits scale and lengths. The drift within a turn is set to the median of
// what the zeros of the turns say, which one burst of slip does not move.
func (j *judge) solve() (slip, bool) {
	all := &j.f.all
	free := j.c.free(drift, crank, rod, offset)
	var ok bool
	if j.full, ok = all.solve(vector{}, free...); !ok {
		return slip{}, false
	}
	s := j.slip()
	given := vector{drift: s.PerTurn}
	if j.full, ok = all.solve(given, free[1:]...); !ok {
		return slip{}, false
	}
	j.base, ok = all.solve(given, j.c.free()...)
	j.best, j.sigma = j.base, j.scatter()
	return j.slip(), ok
}

// step returns by how much the zero changes from one stretch to a later one, rad.
func (j *judge) step(from, to *stretch) estimate {
	a, ha := from.zero(&j.full.x)
	b, hb := to.zero(&j.full.x)
	for p := range ha {
		hb[p] -= ha[p]
	}
	v := 1/from.weight + 1/to.weight + j.full.variance(&hb)
	return estimate{b - a, j.sigma * math.Sqrt(v)}
}

// slip sums up the steps of the zero but those at a jump.
func (j *judge) slip() slip {
	var r slip
	var steps []float64
	var square float64
	s := j.f.stretches
	for start := 0; start < len(s); {
		end := start + 1
		for ; end < len(s) && s[end].cut == 0; end++ {
			e := j.step(&s[end-1], &s[end])
			steps = append(steps, 2*e.Value/(s[end-1].turned+s[end].turned))
		}
		if end-start > 1 {
			e := j.step(&s[start], &s[end-1])
			r.Total.Value += e.Value * sign(s[start].turned)
			square += e.Error * e.Error
		}
		start = end
	}
	r.Total.Error = math.Sqrt(square)
	if len(steps) > 0 {
		slices.Sort(steps)
		r.PerTurn = steps[len(steps)/2]
	}
	return r
}

func sign(x float64) float64 { return math.Copysign(1, x) }

// jumps asks the ram about each jump. The counts are made whole already, so the zero
// goes on where they did jump, and steps where the machine did.
func (j *judge) jumps(all []jump) []jumped {
	a := j.c.countAngle()
	r := make([]jumped, len(all))
	for i, k := range all {
		r[i].jump = k
	}
	s := j.f.stretches
	for i := 1; i < len(s); i++ {
		k := s[i].cut
		if k == 0 {
			continue
		}
		n := r[k-1].turn / a
		e := j.step(&s[i-1], &s[i])
		seen := estimate{n - e.Value/a, math.Abs(e.Error / a)}
		if sigmas*seen.Error > math.Abs(n)/2 {
			continue // too short a stretch beside it
		}
		r[k-1].Ram = &seen
		r[k-1].Refuted = math.Abs(seen.Value) < math.Abs(n)/2
	}
	return r
}

// lengths are the unknowns that are lengths of the press.
var lengths = []struct {
	at   int
	name string
}{{crank, "crank"}, {rod, "rod"}, {offset, "offset"}}

func (t *tolerance) of(length int) float64 {
	switch length {
	case crank:
		return t.Crank
	case rod:
		return t.Rod
	}
	return t.Offset
}

// doubt is by how much Σ of squares, over the variance, may rise by chance where one
// to three unknowns are left out: 21 for three with the chance of 1e-4 (table of χ²),
// half as much again since the rounding of counts is not quite at random.
const doubt = 30

// worse reports whether a solution is worse than the full one beyond doubt, and by
// more than what is lost in making the equations linear: a fiftieth of the pattern
// allowed, which shows in a log of many turns.
func (j *judge) worse(s *solution) bool {
	lost := j.c.Tolerance.Pattern / 50
	return s.sse-j.full.sse > doubt*j.sigma*j.sigma+j.f.all.n*lost*lost
}

// links looks for the one length that explains the pattern over the turn which zero
// and scale leave.
func (j *judge) links() links {
	r := links{Judged: true}
	given := vector{drift: j.base.x[drift]}
	least, needed, small := math.Inf(1), j.worse(&j.base), false
	for _, l := range lengths {
		t := j.c.Tolerance.of(l.at)
		all := link{l.name, j.estimate(&j.full, l.at)}
		r.All = append(r.All, all)
		s, ok := j.f.all.solve(given, j.c.free(l.at)...)
		if !ok {
			continue
		}
		alone := link{l.name, j.estimate(&s, l.at)}
		if sigmas*alone.Error > t {
			r.Untold = append(r.Untold, l.name)
		}
		if !needed || j.worse(&s) {
			continue
		}
		small = small || !alone.beyond(t)
		if s.sse < least {
			j.best, least = s, s.sse
			r.Wrong = append([]link{alone}, r.Wrong...)
		} else {
			r.Wrong = append(r.Wrong, alone)
		}
	}
	switch {
	case j.pattern(&j.full).Worst.beyond(j.c.Tolerance.Pattern): // whatever the lengths
		j.best, r.Wrong = j.full, nil
	case small: // an error within tolerance explains the pattern too
		r.Wrong = nil
	case needed && len(r.Wrong) == 0:
		j.best, r.Joint = j.full, true
		for i, l := range r.All {
			if l.beyond(j.c.Tolerance.of(lengths[i].at)) {
				r.Wrong = append(r.Wrong, l)
			}
		}
	}
	return r
}

func (j *judge) estimate(s *solution, p int) estimate {
	return estimate{s.x[p], j.sigma * math.Sqrt(s.cov[p][p])}
}

// left returns the mean difference that a solution leaves in a part of the turn.
func (p *part) left(x *vector) float64 {
	e := p.y
	for q := range p.j {
		e -= p.j[q] * x[q]
	}
	return e / p.n
}

// scatter is what is left about the means of the parts: what repeats with the turn,
// explained or not, has no share in it.
func (j *judge) scatter() float64 {
	sse, dof := j.full.sse, j.full.dof
	for i := range j.f.parts {
		if p := &j.f.parts[i]; p.n > 0 {
			e := p.left(&j.full.x)
			sse, dof = sse-p.n*e*e, dof-1
		}
	}
	return math.Sqrt(max(sse, 0) / max(dof, 1))
}

// pattern returns the worst mean difference over the turn that a solution leaves.
func (j *judge) pattern(s *solution) (r pattern) {
	for i := range j.f.parts {
		p := &j.f.parts[i]
		if p.n < 10 {
			continue
		}
		if e := p.left(&s.x); math.Abs(e) > math.Abs(r.Worst.Value) {
			r.Worst = estimate{e, j.sigma / math.Sqrt(p.n)}
			r.Crank = ((float64(i)+0.5)/parts - 0.5) * rigid.Revolution
		}
	}
	return r
}

// calibration returns what the press must be set by: the zero that the first
// stretch has.
func (j *judge) calibration() calibration {
	z, h := j.f.stretches[0].zero(&j.best.x)
	err := j.sigma * math.Sqrt(1/j.f.stretches[0].weight+j.best.variance(&h))
	a := j.c.countAngle()
	return calibration{
		EncoderZero: estimate{float64(j.c.Encoder.Zero) - rigid.Wrap(z)/a, math.Abs(err / a)},
		ScaleOffset: j.estimate(&j.best, ram),
		Scatter:     j.sigma,
	}
}
