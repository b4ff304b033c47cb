package main

import (
	"bufio"
	"fmt"
	"io"
	"math"
	"time"

	"example.com/twopoint/rigid"
)

const layout = "%8s %6s %9s %9s %9s %11s %11s %9s %7s\n"

// report prints what a run did.
func report(w io.Writer, o options, c *config, r *rig, late time.Duration) error {
	p := &printer{bufio.NewWriter(w), o, c, r.plan, r.loop}
	p.program()
	p.table()
	p.end()
	p.extremes()
	p.ticks(late)
	return p.Flush()
}

// A printer keeps the first error until Flush.
type printer struct {
	*bufio.Writer
	options
	*config
	plan *plan
	loop *loop
}

func (p *printer) program() {
	fmt.Fprintln(p, "Roof-tile press, an invented machine, on a simulated axis. Ideal kinematics, not a safety")
	fmt.Fprintln(p, "function: stopping and guarding follow local codes and licensed practice.")
	fmt.Fprintf(p, "\nprogram   %d moves, %.3f s by the ram's profile, %.3f s within the motor's limits\n",
		len(p.Moves), p.plan.profile.end, p.plan.length())
	if rate, ram := p.plan.slowest(); !p.plan.held {
		fmt.Fprintf(p, "          slowest clock %.3f of full rate, with the ram at %.1f mm\n", rate, ram/rigid.Millimetre)
	} else {
		fmt.Fprintf(p, "          it goes on beyond margin %g of a dead centre, and is to be held there\n", p.Limits.Hold)
	}
}

func (p *printer) table() {
	fmt.Fprintln(p)
	fmt.Fprintf(p, layout, "time", "clock", "ram", "ram speed", "motor", "motor speed", "motor acc.", "following", "margin")
	fmt.Fprintf(p, layout, "s", "", "mm", "m/s", "rev", "rad/s", "rad/s²", "mrad", "")
	for r := range p.loop.rec.all() {
		if r.commanded && (r.tick+1-p.loop.start)%int64(p.every) == 0 {
			fmt.Fprintf(p, layout, num(p.time(r.tick+1), 3), num(r.rate, 3), num(r.ram.Pos/rigid.Millimetre, 2), num(r.ram.Vel, 3),
				num(r.motor.Pos/rigid.Revolution, 3), num(r.motor.Vel, 2), num(r.motor.Acc, 1), num(r.following*1000, 2), num(r.margin, 3))
		}
	}
}

// end prints the stop command and its reason.
func (p *printer) end() {
	rest := "the encoder does not show rest"
	if p.loop.stats.atRest {
		rest = "the encoder shows rest"
	}
	fmt.Fprintf(p, "\n%8s  stop command: %v\n", num(p.time(p.loop.stopped.tick), 3), p.loop.stopped)
	fmt.Fprintf(p, "%8s  end of the loop: %s\n", num(p.time(p.loop.last), 3), rest)
}

// extremes prints the greatest and least of what was commanded and measured, as far
// as the recorder goes back.
func (p *printer) extremes() {
	var speed, acc, follow float64
	margin := 1.0
	for r := range p.loop.rec.all() {
		if r.commanded {
			speed, acc = max(speed, math.Abs(r.motor.Vel)), max(acc, math.Abs(r.motor.Acc))
			follow, margin = max(follow, math.Abs(r.following)), min(margin, r.margin)
		}
	}
	fmt.Fprintln(p)
	if n := len(p.loop.rec.ring); p.loop.rec.n > int64(n) {
		fmt.Fprintf(p, "of the last %d ticks:\n", n)
	}
	fmt.Fprintf(p, "motor     speed to %.1f of %g rad/s, acceleration to %.0f of %g rad/s²\n", speed, p.Limits.Speed, acc, p.Limits.Acc)
	fmt.Fprintf(p, "          following error to %.2f of %g mrad; margin down to %.3f, least %g\n", follow*1000, p.Limits.Follow*1000, margin, p.Limits.Margin)
}

func (p *printer) ticks(late time.Duration) {
	s := p.loop.stats
	fmt.Fprintf(p, "ticks     %d, lost %d; time in one %.1f µs at worst, %.2f µs on average, of %.0f µs\n",
		s.ticks, s.lost, micros(s.worst), micros(s.total)/float64(s.ticks), p.Tick*1e6)
	if p.real {
		fmt.Fprintf(p, "          the ticker was late by %.0f µs at worst\n", micros(late))
	}
	fmt.Fprintf(p, "memory    %d allocations and %d garbage collections while the loop ran\n", s.allocs, s.collections)
}

// time returns the time of a tick from the start of the program, or of the loop.
func (p *printer) time(tick int64) float64 { return float64(tick-p.loop.start) * p.Tick }

func micros(d time.Duration) float64 { return float64(d) / 1000 }

func num(x float64, digits int) string { return fmt.Sprintf("%.*f", digits, x) }
