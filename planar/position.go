package planar

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r2"
)

// A position is a place of every body at which the equations are written out as
// numbers: lengths over the largest one, every row of slopes to unit norm. The
// unknowns are x and y of the bodies and then their angles, as in full.
type position struct {
	b    *builder
	at   []place
	held []float64 // of every equation: what is held of a drive, or of a phase that is read
	open bool      // drives and phases are not held yet
}

// A place is where a body is, its angle over any number of revolutions.
type place struct{ x, y, angle float64 }

// guessed returns the position that the design's Guess gives.
func (b *builder) guessed() *position {
	p := &position{b: b, at: make([]place, b.bodies()), held: make([]float64, len(b.rows)+len(b.used)), open: true}
	for l := b.links - 1; l > 0; l-- {
		g := b.d.Guess[l].Pose().Compose(b.seats[l].local.Inverse())
		if s := b.seats[l]; s.body > 0 {
			p.at[s.body] = place{g.Origin.X, g.Origin.Y, g.Angle()}
		}
	}
	for i, h := range b.hidden {
		p.at[b.seats[b.links+i].body] = p.hidden(h)
	}
	return p
}

// hidden returns where a hidden body is when the others are where they are.
func (p *position) hidden(h hidden) place {
	point := func(a Attachment) r2.Vec {
		s := p.b.seats[a.Link]
		return p.pose(s.body).Point(s.local.Point(r2.Vec{X: a.X, Y: a.Y}))
	}
	if h.part == slotBlock {
		j := p.b.d.Joints[h.joint].(SlidingPin)
		at := point(j.Pin)
		return place{at.X, at.Y, p.at[p.b.seats[j.Slot.Link].body].angle + p.b.angle(j.Slot)}
	}
	m := p.b.d.Drives[h.joint-len(p.b.d.Joints)].(Reach)
	a, c := point(m.A), point(m.B)
	turn := math.Atan2(c.Y-a.Y, c.X-a.X)
	if h.part == rod {
		a = c
	}
	return place{a.X, a.Y, turn}
}

func (p *position) pose(body int) rigid.Pose {
	at := p.at[body]
	return rigid.NewPose(at.x, at.y, at.angle)
}

// driven reports whether equation i holds a drive, and which.
func (p *position) driven(i int) (drive int, ok bool) {
	drive = -1
	if i < len(p.b.rows) {
		drive = p.b.rows[i].drive
	} else {
		drive = p.b.used[i-len(p.b.rows)].drive
	}
	return drive, drive >= 0
}

// read reports whether equation i has a phase: what it is here is held from then
// on. A phase that is given counts modulo the teeth, so it is read as well.
func (p *position) read(i int) bool {
	if i < len(p.b.rows) {
		return p.b.rows[i].kind == rowRack
	}
	j := p.b.used[i-len(p.b.rows)].joint
	if j >= len(p.b.d.Joints) {
		return false
	}
	_, gear := p.b.d.Joints[j].(GearPair)
	return gear
}

// hold reads what drives and phases are here, and holds it.
func (p *position) hold() {
	p.open = false
	slopes := make([]float64, p.unknowns())
	for i := range p.held {
		if _, ok := p.driven(i); ok || p.read(i) {
			p.held[i] = 0
			p.held[i] = p.raw(i, slopes)
		}
	}
}

func (p *position) unknowns() int { return 3 * (p.b.bodies() - 1) }

// raw writes the slopes of equation i and returns by how much it misses, in units
// of the largest length or in rad.
func (p *position) raw(i int, slopes []float64) float64 {
	clear(slopes)
	if i < len(p.b.rows) {
		return p.place(&p.b.rows[i], slopes)/p.b.length - p.held[i]
	}
	r := p.b.used[i-len(p.b.rows)]
	miss := -r.value
	for _, t := range r.of.terms {
		miss += t.by.value * p.at[t.index].angle
		if t.index > 0 {
			slopes[2*(p.b.bodies()-1)+t.index-1] = t.by.value
		}
	}
	if _, ok := p.driven(i); !ok && !p.read(i) {
		return rigid.Wrap(miss)
	}
	return miss - p.held[i]
}

// place writes the slopes of a row and returns by how much it misses, in m. The
// slopes are those of builder.slopes.
func (p *position) place(r *row, slopes []float64) float64 {
	if r.custom != nil {
		return p.custom(r, slopes)
	}
	a, b := p.pose(r.a), p.pose(r.b)
	pa, pb := a.Point(r.pa), b.Point(r.pb)
	d, v, w := r2.Sub(pb, pa), r2.Sub(pb, b.Origin), r2.Sub(pb, a.Origin)
	u := rigid.Pose{Axis: a.Axis}.Point(r.u)
	n := r2.Vec{X: -u.Y, Y: u.X}
	set := func(along r2.Vec, byB, byA float64) {
		angles := 2*(p.b.bodies()-1) - 1
		if r.b > 0 {
			slopes[p.b.xy(r.b)] += along.X
			slopes[p.b.xy(r.b)+1] += along.Y
			slopes[angles+r.b] += byB / p.b.length
		}
		if r.a > 0 {
			slopes[p.b.xy(r.a)] -= along.X
			slopes[p.b.xy(r.a)+1] -= along.Y
			slopes[angles+r.a] -= byA / p.b.length
		}
	}
	switch r.kind {
	case rowX:
		set(r2.Vec{X: 1}, -v.Y, a.Origin.Y-pa.Y)
		return d.X
	case rowY:
		set(r2.Vec{Y: 1}, v.X, pa.X-a.Origin.X)
		return d.Y
	case rowGuide:
		set(n, r2.Dot(u, v), r2.Dot(u, w))
		return r2.Dot(n, d) - r.value
	case rowSlide:
		set(u, -r2.Dot(n, v), -r2.Dot(n, w))
		return r2.Dot(u, d) - r.value
	default: // rowRack
		set(u, r.rate-r2.Dot(n, v), r.rate-r2.Dot(n, w))
		return r2.Dot(u, d) + r.rate*(p.at[r.b].angle-p.at[r.a].angle) - r.value
	}
}

// matrix returns the slopes and misses of all equations; those of drives and
// phases are empty as long as they are open.
func (p *position) matrix() (slopes *mat.Dense, miss *mat.VecDense) {
	m, n := len(p.held), p.unknowns()
	slopes, miss = mat.NewDense(m, n, nil), mat.NewVecDense(m, nil)
	for i := range m {
		row := slopes.RawRowView(i)
		at := p.raw(i, row)
		if _, ok := p.driven(i); p.open && (ok || p.read(i)) {
			clear(row)
			continue
		}
		size := mat.Norm(mat.NewVecDense(n, row), 2)
		if size > 0 {
			for k := range row {
				row[k] /= size
			}
			at /= size
		}
		miss.SetVec(i, at)
	}
	return slopes, miss
}

// close brings the bodies to where all equations hold, by the method of Gauss and
// Newton, and returns the largest miss that is left. Where a step does not bring
// them nearer, directions that hardly count are left out of it.
func (p *position) close() float64 {
	const steps = 60
	least := 1e-8 // singular values up to it, over the largest, count as 0
	best, at := math.Inf(1), slices.Clone(p.at)
	for range steps {
		gap := p.gap()
		if gap < 0.9*best {
			best = gap
			copy(at, p.at)
		} else {
			copy(p.at, at)
			least *= 100
		}
		if best < 1e-15 || least > 0.1 {
			break
		}
		step, ok := p.step(least)
		if !ok {
			break
		}
		p.move(step)
	}
	copy(p.at, at)
	return best
}

// gap returns the largest miss of all equations, over the largest length or in rad.
func (p *position) gap() float64 {
	slopes, gap := make([]float64, p.unknowns()), 0.0
	for i := range p.held {
		if _, ok := p.driven(i); !p.open || !ok && !p.read(i) {
			gap = math.Max(gap, math.Abs(p.raw(i, slopes)))
		}
	}
	return gap
}

// step returns the least step that misses least.
func (p *position) step(least float64) (*mat.VecDense, bool) {
	slopes, miss := p.matrix()
	var step mat.VecDense
	if m, n := slopes.Dims(); !p.open && m >= n {
		var qr mat.QR
		qr.Factorize(slopes)
		if qr.Cond() < 1/least && qr.SolveVecTo(&step, false, miss) == nil {
			return &step, true
		}
	}
	var svd mat.SVD
	if !svd.Factorize(slopes, mat.SVDThin) {
		return nil, false
	}
	rank := svd.Rank(least)
	if rank == 0 {
		return nil, false
	}
	svd.SolveVecTo(&step, miss, rank)
	return &step, true
}

// move takes a step off, cut so that no body turns far.
func (p *position) move(step *mat.VecDense) {
	const most = 0.5
	k := 1.0
	if size := mat.Norm(step, math.Inf(1)); size > most {
		k = most / size
	}
	n := p.b.bodies() - 1
	for i := range n {
		at := &p.at[i+1]
		at.x -= k * step.AtVec(2*i) * p.b.length
		at.y -= k * step.AtVec(2*i+1) * p.b.length
		at.angle -= k * step.AtVec(2*n+i)
	}
}

// turned returns the position with every drive moved on by about so much, a
// little differently each, in rad or of the largest length.
func (p *position) turned(by float64) *position {
	q := *p
	q.at, q.held = slices.Clone(p.at), slices.Clone(p.held)
	for i := range q.held {
		if drive, ok := q.driven(i); ok {
			q.held[i] += by / (1 + 0.37*float64(drive))
		}
	}
	return &q
}
