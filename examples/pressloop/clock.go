package main

import "time"

// A clock waits for the next tick and returns its number, which is greater than
// the last one's by one, or by more where ticks were lost.
type clock interface{ next() int64 }

// simulatedTime ticks without waiting.
type simulatedTime struct{ tick int64 }

func (c *simulatedTime) next() int64 {
	c.tick++
	return c.tick
}

// realTime ticks with a time.Ticker, which drops ticks for a slow receiver: the
// number comes from the time that has passed. A general-purpose operating system
// holds such ticks to a millisecond or so, and promises nothing.
type realTime struct {
	ticker *time.Ticker
	start  time.Time
	dt     time.Duration
	tick   int64
	late   time.Duration // worst
}

func newRealTime(dt time.Duration) *realTime {
	return &realTime{ticker: time.NewTicker(dt), start: time.Now(), dt: dt}
}

func (c *realTime) next() int64 {
	<-c.ticker.C
	passed := time.Since(c.start)
	c.tick = max(int64((passed+c.dt/2)/c.dt), c.tick+1)
	c.late = max(c.late, passed-time.Duration(c.tick)*c.dt)
	return c.tick
}
