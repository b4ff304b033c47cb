package main

import (
	"fmt"

	"example.com/twopoint/rigid"
)

// A reason is why the loop gave the stop command. The zero reason: it goes on.
type reason int

const (
	goOn reason = iota
	done
	held
	interrupted
	lostTicks
	staleSample
	wildCount
	following
	refused
	tooFast
	tooSharp
	nearDeadCentre
	axisFailed
	wrongStart
)

// A halt is a stop command with what led to it. It is a plain value, so that
// stopping allocates nothing; String makes the words after the loop.
type halt struct {
	why        reason
	tick       int64
	got, limit float64
	err        error
}

func (h halt) String() string {
	switch h.why {
	case goOn:
		return "no stop"
	case done:
		return "program done"
	case held:
		return fmt.Sprintf("held before a dead centre: ram at %.2f mm, margin %g", h.got/rigid.Millimetre, h.limit)
	case interrupted:
		return "stop requested"
	case lostTicks:
		return fmt.Sprintf("lost ticks: %g in a row, allowed %g", h.got, h.limit)
	case staleSample:
		return fmt.Sprintf("encoder: newest sample is %g ticks old, allowed %g", h.got, h.limit)
	case wildCount:
		return fmt.Sprintf("encoder: step of %g counts, possible %.0f", h.got, h.limit)
	case following:
		return fmt.Sprintf("following error: %.4f rad of the motor, allowed %g", h.got, h.limit)
	case refused:
		return fmt.Sprintf("command refused: ram to %.4f m: %v", h.got, h.err)
	case tooFast:
		return fmt.Sprintf("command refused: motor speed %.1f rad/s, limit %g", h.got, h.limit)
	case tooSharp:
		return fmt.Sprintf("command refused: motor acceleration %.0f rad/s², limit %g", h.got, h.limit)
	case nearDeadCentre:
		return fmt.Sprintf("command refused: margin %.4f to a dead centre, least %g", h.got, h.limit)
	case axisFailed:
		return fmt.Sprintf("axis: %v", h.err)
	case wrongStart:
		return fmt.Sprintf("wrong start: motor is %.4f rad away, allowed %g", h.got, h.limit)
	}
	return fmt.Sprintf("reason %d", int(h.why))
}
