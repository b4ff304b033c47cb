package main

import (
	"math"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

const (
	window = 9   // samples from which the motor's motion is taken
	slack  = 1.2 // of the speed limit, that a step of the count may have
)

// A meter makes the motor's motion of encoder samples that come late.
type meter struct {
	enc     encoder.Encoder
	rates   *encoder.Rates
	dt      float64
	oldest  int64   // age that a sample may have, ticks
	step    float64 // counts possible in a tick
	last    sample
	any     bool
	still   int    // fresh samples since watched, its count or one off
	watched sample // its count is that of the first that stood still

	motion rigid.Coordinate // as of at
	at     float64          // s
	ready  bool
}

func newMeter(c *config) (*meter, error) {
	rates, err := encoder.NewRates(window, 2)
	if err != nil {
		return nil, err
	}
	return &meter{enc: c.Encoder, rates: rates, dt: c.Tick, oldest: c.Latency + c.Lost,
		step: slack * c.Limits.Speed * c.Tick * float64(c.Encoder.PerTurn) / rigid.Revolution}, nil
}

// take takes the newest sample at a tick; one seen before says nothing new.
func (m *meter) take(tick int64, s sample) halt {
	if age := tick - s.tick; age > m.oldest {
		return halt{why: staleSample, got: float64(age), limit: float64(m.oldest)}
	}
	if m.any && s.tick <= m.last.tick {
		return halt{}
	}
	if m.any {
		step := math.Abs(float64(s.count) - float64(m.last.count))
		if limit := m.step*float64(s.tick-m.last.tick) + 2; step > limit {
			return halt{why: wildCount, got: step, limit: limit}
		}
	}
	turns, angle, err := m.enc.Angle(s.count)
	if err != nil {
		return halt{why: axisFailed, err: err}
	}
	m.last, m.any = s, true
	c, at, ok := m.rates.Add(float64(s.tick)*m.dt, float64(turns)*rigid.Revolution+angle)
	if ok {
		m.motion, m.at, m.ready = c, at, true
	}
	return halt{}
}

// now returns the motor's motion at a tick, looked ahead from the samples: over
// their latency and half the window.
func (m *meter) now(tick int64) rigid.Coordinate {
	return m.motion.After(float64(tick)*m.dt - m.at)
}

// watch counts the fresh samples that have stood still, but for one count to and fro.
func (m *meter) watch(s sample) {
	if s.tick <= m.watched.tick {
		return
	}
	if d := s.count - m.watched.count; d < -1 || d > 1 {
		m.still, m.watched.count = 0, s.count
	}
	m.still++
	m.watched.tick = s.tick
}
