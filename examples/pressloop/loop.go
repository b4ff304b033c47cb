package main

import (
	"context"
	"math"
	"runtime"
	"time"

	"example.com/twopoint/rigid"
)

// A source commands the ram at a time after the start, and tells the rate of the
// clock along the path.
type source interface {
	next(t float64) (ram rigid.Coordinate, rate float64)
}

// A loop runs a program on an axis, tick by tick, until it gives the stop command
// and the axis has had the time to come to rest. It allocates nothing once made.
type loop struct {
	clock  clock
	source source
	axis   axis
	back   back
	meter  *meter
	guard  guard
	rec    *recorder

	length, end float64 // s: of one cycle, and of all
	cycles      int64
	held        bool // ends at the margin, not with the program
	lost        int64
	follow      float64 // rad

	started   bool
	start     int64            // tick at which the program began
	set       rigid.Coordinate // motor, at setTick
	setTick   int64
	ram       float64 // last commanded, m
	stopped   halt
	last      int64 // tick
	rundown   int64 // ticks from the stop command to the end of the loop
	stats     stats
	requested <-chan struct{}
}

// stats are those of the ticks.
type stats struct {
	ticks, lost  int64
	worst, total time.Duration
	allocs       uint64
	collections  uint32
	atRest       bool
}

// keep is how many ticks the recorder keeps at most.
const keep = 1 << 19

// newLoop makes a loop for a plan; clock and axis are still to be set.
func newLoop(ctx context.Context, c *config, b back, pl *plan, cycles int64) (*loop, error) {
	m, err := newMeter(c)
	if err != nil {
		return nil, err
	}
	rest := int64(math.Ceil(1.5 * c.Limits.Speed / c.Limits.Stop / c.Tick))
	l := &loop{
		source: pl, back: b, meter: m, guard: guard{limits: c.Limits, dt: c.Tick},
		length: pl.length(), cycles: cycles, end: pl.length() * float64(cycles), held: pl.held,
		lost: c.Lost, follow: c.Limits.Follow, requested: ctx.Done(),
		rundown: rest + c.Latency + 2*window,
	}
	ticks := math.Ceil(l.end/c.Tick) + float64(l.rundown) + 100
	l.rec = newRecorder(int64(min(ticks, keep)))
	return l, nil
}

// run ticks until the stop command and the run-down after it are over.
func (l *loop) run() {
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	for l.stopped.why == goOn || l.last < l.stopped.tick+l.rundown {
		tick := l.clock.next()
		began := time.Now()
		l.tick(tick)
		l.stats.add(time.Since(began))
	}
	runtime.ReadMemStats(&after)
	l.stats.allocs = after.Mallocs - before.Mallocs
	l.stats.collections = after.NumGC - before.NumGC
	l.stats.atRest = l.meter.still >= window
}

func (s *stats) add(d time.Duration) {
	s.ticks++
	s.total += d
	s.worst = max(s.worst, d)
}

// tick is one round: read, check, command. Whatever is wrong ends in the stop
// command, which is repeated at every tick after.
func (l *loop) tick(tick int64) {
	r := record{tick: tick}
	gap := tick - l.last - 1
	l.last = tick
	l.stats.lost += gap
	s, err := l.axis.read(tick)
	r.count = s.count
	if err == nil {
		l.meter.watch(s)
	}
	if l.stopped.why == goOn {
		l.stopped = l.control(tick, gap, s, err, &r)
		l.stopped.tick = tick
	}
	if l.stopped.why != goOn {
		l.axis.stop()
		r.stopped = true
	}
	l.rec.add(r)
}

// control does what a tick does until the stop command.
func (l *loop) control(tick, gap int64, s sample, err error, r *record) halt {
	select {
	case <-l.requested:
		return halt{why: interrupted}
	default:
	}
	if err != nil {
		return halt{why: axisFailed, err: err}
	}
	if l.started && gap > l.lost {
		return halt{why: lostTicks, got: float64(gap), limit: float64(l.lost)}
	}
	if h := l.meter.take(tick, s); h.why != goOn {
		return h
	}
	if !l.meter.ready {
		return halt{} // the axis rests; its place is not known well enough yet
	}
	now := l.meter.now(tick)
	r.measured = now.Pos
	if !l.started {
		if h := l.begin(tick, now); h.why != goOn {
			return h
		}
	}
	r.following = now.Pos - l.set.After(float64(tick-l.setTick)*l.guard.dt).Pos
	if f := math.Abs(r.following); !(f <= l.follow) {
		return halt{why: following, got: f, limit: l.follow}
	}
	if t := l.time(tick); t >= l.end+window*l.guard.dt {
		return l.finish()
	}
	return l.command(tick+1, r)
}

// begin takes the axis as it stands for the start of the program.
func (l *loop) begin(tick int64, now rigid.Coordinate) halt {
	ram, _ := l.source.next(0)
	l.back.crank = now.Pos / l.back.gear // the turn that the crank is in
	motor, _, err := l.back.motor(rigid.Coordinate{Pos: ram.Pos})
	if err != nil {
		return halt{why: refused, got: ram.Pos, err: err}
	}
	if d := math.Abs(motor.Pos - now.Pos); !(d <= l.follow) {
		return halt{why: wrongStart, got: d, limit: l.follow}
	}
	l.started, l.start = true, tick
	l.set, l.setTick = motor, tick
	l.guard.start(tick, motor.Pos)
	return halt{}
}

// command sends where the motor is to be at a tick: the ram's place on its path,
// mapped back.
func (l *loop) command(tick int64, r *record) halt {
	t := l.time(tick)
	if t >= l.end {
		t = l.length
	} else {
		t = math.Mod(t, l.length)
	}
	ram, rate := l.source.next(t)
	motor, margin, err := l.back.motor(ram)
	r.rate, r.ram, r.motor, r.margin = rate, ram, motor, margin
	if err != nil {
		return halt{why: refused, got: ram.Pos, err: err}
	}
	if h := l.guard.check(tick, motor, margin); h.why != goOn {
		return h
	}
	if err := l.axis.write(tick, motor); err != nil {
		return halt{why: axisFailed, err: err}
	}
	l.set, l.setTick, l.ram, r.commanded = motor, tick, ram.Pos, true
	return halt{}
}

// time returns the time after the start of the program, from the tick's number: it
// does not drift.
func (l *loop) time(tick int64) float64 { return float64(tick-l.start) * l.guard.dt }

func (l *loop) finish() halt {
	if l.held {
		return halt{why: held, got: l.ram, limit: l.guard.Hold}
	}
	return halt{why: done}
}
