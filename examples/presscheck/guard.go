package main

import (
	"math"
	"slices"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

// A point is a sample whose counts became an angle: that of the crank by its
// encoder, jumps taken out.
type point struct {
	time, turn, ram float64
	fresh           bool // the motion does not go on from the point before: a gap, a jerk or a jump
	cut             int  // the number of the jump that lies before this point; 0: none
}

// A jump is a place where the counts leapt while the machine went on.
type jump struct {
	Time   float64 `json:"time"`   // s
	Counts int64   `json:"counts"` // lost (negative) or gained against what was due, from the counts
	turn   float64 // the same, as an angle of the crank
}

const (
	guardWindow = 9 // samples that foretell the next: short, since a press does not keep its acceleration
	guardDegree = 2
	held        = 3   // samples in a row that make a jump of what would be a glitch
	outliers    = 8   // times the scatter of the forecast
	mostJumps   = 100 // that are followed one by one
)

// A guard foretells each sample of the last ones. One that is off alone is a glitch
// and left out; where the counts stay off by one number, they jumped.
type guard struct {
	turn, ram  forecast
	counts     float64 // rad in a count
	wait       []point
	given      float64 // angle to be added for all jumps so far
	jumps      []jump
	more       int // jumps beyond mostJumps
	fresh      bool
	glitches   int
	last, pace float64 // time of the last sample and the running mean between two, s
	pass       func(point)
}

func newGuard(c *config, pass func(point)) (*guard, error) {
	turn, err := encoder.NewRates(guardWindow, guardDegree)
	if err != nil {
		return nil, err
	}
	ram, err := encoder.NewRates(guardWindow, guardDegree)
	if err != nil {
		return nil, err
	}
	a := c.countAngle()
	return &guard{
		turn:   forecast{rates: turn, threshold: c.Tolerance.Jump * math.Abs(a)},
		ram:    forecast{rates: ram, threshold: 20 * c.Tolerance.Scatter},
		counts: a,
		last:   math.NaN(),
		pass:   pass,
	}, nil
}

// take takes the next sample. It passes samples on with a delay of at most held.
func (g *guard) take(p point) {
	p.turn += g.given
	if p.time-g.last > guardWindow*g.pace { // a gap in the log: nothing can be foretold
		g.decide()
		g.reset()
	}
	turn, ok := g.turn.error(p.time, p.turn)
	ram, _ := g.ram.error(p.time, p.ram)
	if ok && (math.Abs(turn) > g.turn.limit() || math.Abs(ram) > g.ram.limit()) {
		if g.wait = append(g.wait, p); len(g.wait) == held {
			g.decide()
		}
		return
	}
	g.glitches += len(g.wait)
	g.wait = g.wait[:0]
	g.accept(p, turn, ram)
}

// flush passes on what is still held at the end of the log.
func (g *guard) flush() { g.decide() }

func (g *guard) accept(p point, turn, ram float64) {
	g.turn.add(p.time, p.turn, turn)
	g.ram.add(p.time, p.ram, ram)
	switch dt := p.time - g.last; {
	case g.pace > 0:
		g.pace += (min(dt, 4*g.pace) - g.pace) / 64
	case dt > 0:
		g.pace = dt
	}
	g.last = p.time
	p.fresh, g.fresh = g.fresh || p.cut != 0, false
	g.pass(p)
}

// decide tells a jump of the counts, which are off by one number in all samples
// held, from a machine that moves otherwise than was foretold.
func (g *guard) decide() {
	if len(g.wait) == 0 {
		return
	}
	wait := slices.Clone(g.wait)
	g.wait = g.wait[:0]
	mid, spread := g.turn.errors(wait, func(p point) float64 { return p.turn })
	steady := len(wait) == held && math.Abs(mid) > g.turn.limit() && spread < max(math.Abs(mid)/4, g.turn.threshold)
	if !steady {
		other, _ := g.ram.errors(wait, func(p point) float64 { return p.ram })
		g.turn.learn(mid)
		g.ram.learn(other)
		g.reset()
		for _, p := range wait {
			g.accept(p, 0, 0)
		}
		return
	}
	n := math.Round(mid / g.counts)
	g.given -= n * g.counts
	cut := 0
	if len(g.jumps) < mostJumps {
		g.jumps = append(g.jumps, jump{Time: wait[0].time, Counts: int64(n), turn: n * g.counts})
		cut = len(g.jumps)
	} else {
		g.more++
	}
	for i, p := range wait {
		p.turn -= n * g.counts
		if p.cut = 0; i == 0 {
			p.cut = cut
		}
		turn, _ := g.turn.error(p.time, p.turn)
		ram, _ := g.ram.error(p.time, p.ram)
		g.accept(p, turn, ram)
	}
}

func (g *guard) reset() {
	g.fresh = true
	g.turn.reset()
	g.ram.reset()
}

// A forecast looks ahead along the parabola through the last samples.
type forecast struct {
	rates     *encoder.Rates
	motion    rigid.Coordinate
	at        float64
	full      bool
	square    float64 // of the forecast's error, a running mean
	threshold float64 // below which nothing is an outlier
}

// error returns by how much a sample differs from its forecast, if there is one.
func (f *forecast) error(t, x float64) (float64, bool) {
	if !f.full {
		return 0, false
	}
	return x - f.motion.After(t-f.at).Pos, true
}

// errors returns the median of the samples' errors and how far apart they are.
func (f *forecast) errors(wait []point, of func(point) float64) (mid, spread float64) {
	var off []float64
	for _, p := range wait {
		e, _ := f.error(p.time, of(p))
		off = append(off, e)
	}
	slices.Sort(off)
	return off[len(off)/2], off[len(off)-1] - off[0]
}

func (f *forecast) limit() float64 { return max(f.threshold, outliers*math.Sqrt(f.square)) }

func (f *forecast) add(t, x, err float64) {
	f.learn(err)
	f.motion, f.at, f.full = f.rates.Add(t, x)
}

// learn keeps the running mean of the squared error, over some 64 samples.
func (f *forecast) learn(err float64) { f.square += (err*err - f.square) / 64 }

func (f *forecast) reset() {
	f.rates.Reset()
	f.full = false
}
