package main

import (
	"math"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

// An axis is the motor with its drive and encoder, as the loop sees it. For a real
// one write these three methods for its fieldbus; none may block or allocate.
type axis interface {
	read(tick int64) (sample, error)                // the newest encoder sample at a tick
	write(tick int64, motor rigid.Coordinate) error // where the motor is to be at a tick to come
	stop()                                          // the drive brakes by itself and stays; told at every tick from then on
}

// A sample is a count of the encoder and the tick at which it was taken.
type sample struct {
	tick, count int64
}

// stiffness of the simulated drive's position loop, 1/s
const stiffness = 200

// simulated is an axis whose drive follows the setpoint with feedforward and a
// critically damped position loop, and whose samples come late. Between setpoints
// it goes on with the last one's acceleration; without one for some ticks it stops
// by itself, as drives do.
type simulated struct {
	enc      encoder.Encoder
	dt       float64
	brake    float64 // deceleration of a stop, rad/s²
	lost     int64   // ticks without a setpoint before it stops
	tick     int64   // now
	motor    rigid.Coordinate
	set      rigid.Coordinate
	setTick  int64
	enabled  bool // has a setpoint
	stopping bool
	jammed   bool
	runaway  bool
	counts   []int64 // of the last ticks, by tick modulo length
}

func newSimulated(c *config, motor float64) *simulated {
	a := &simulated{enc: c.Encoder, dt: c.Tick, brake: c.Limits.Stop, lost: c.Lost + 2,
		motor: rigid.Coordinate{Pos: motor}, counts: make([]int64, c.Latency+1)}
	for i := range a.counts {
		a.counts[i], _ = a.enc.Count(0, motor)
	}
	return a
}

func (a *simulated) read(tick int64) (sample, error) {
	for ; a.tick < tick; a.tick++ {
		a.move()
		count, err := a.enc.Count(0, a.motor.Pos)
		if err != nil {
			return sample{}, err
		}
		a.counts[(a.tick+1)%int64(len(a.counts))] = count
	}
	old := int64(len(a.counts)) - 1
	return sample{tick - old, a.counts[(tick+1)%int64(len(a.counts))]}, nil
}

func (a *simulated) write(tick int64, motor rigid.Coordinate) error {
	a.set, a.setTick, a.enabled = motor, tick, true
	return nil
}

func (a *simulated) stop() { a.stopping = true }

// move moves the motor over one tick, at constant acceleration.
func (a *simulated) move() {
	a.stopping = a.stopping || a.enabled && a.tick > a.setTick+a.lost
	switch {
	case a.jammed:
		a.motor.Vel, a.motor.Acc = 0, 0
	case a.stopping && math.Abs(a.motor.Vel) <= a.brake*a.dt:
		a.motor = rigid.Coordinate{Pos: a.motor.Pos + a.motor.Vel*a.dt/2}
	case a.stopping:
		a.motor.Acc = -math.Copysign(a.brake, a.motor.Vel)
	case a.runaway:
		a.motor.Acc = a.brake
	case a.enabled:
		ref := a.set.After(float64(a.tick-a.setTick) * a.dt)
		a.motor.Acc = ref.Acc + 2*stiffness*(ref.Vel-a.motor.Vel) + stiffness*stiffness*(ref.Pos-a.motor.Pos)
	}
	a.motor = a.motor.After(a.dt)
}
