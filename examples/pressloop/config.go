package main

import (
	_ "embed"
	"errors"
	"fmt"
	"math"

	"example.com/twopoint/examples/internal/files"
	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/slidercrank"
)

//go:embed press.json
var samplePress []byte

// A config is what the JSON file says, in SI units and rad.
type config struct {
	Press   slidercrank.Dimensions `json:"press"`
	Knee    rigid.Side             `json:"knee"`    // picks the stroke that the press works on
	Gear    float64                `json:"gear"`    // motor turns in a turn of the crank; negative: turns the other way
	Encoder encoder.Encoder        `json:"encoder"` // on the motor; zero where crank and motor are at 0
	Tick    float64                `json:"tick"`    // s
	Latency int64                  `json:"latency"` // ticks from an encoder sample to the loop
	Lost    int64                  `json:"lost"`    // ticks that may be lost in a row
	Limits  limits                 `json:"limits"`
	Start   float64                `json:"start"` // of the ram, m
	Moves   []move                 `json:"moves"`
}

// limits are those of the motor, in rad, and the margins.
type limits struct {
	Speed  float64 `json:"speed"`  // rad/s
	Acc    float64 `json:"acc"`    // rad/s²
	Stop   float64 `json:"stop"`   // deceleration of the drive's own stop, rad/s²
	Follow float64 `json:"follow"` // greatest difference of commanded and measured angle, rad
	Hold   float64 `json:"hold"`   // margin at which the plan comes to rest
	Margin float64 `json:"margin"` // margin below which a command is refused; below Hold
}

// readConfig reads a file, or the sample; an unknown field and a wrong number are
// refused by name.
func readConfig(path string) (*config, error) {
	var c config
	name, err := files.ReadJSON(path, samplePress, "press.json", &c)
	if err != nil {
		return nil, err
	}
	if err := c.check(); err != nil {
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	return &c, nil
}

// check names every field that is wrong.
func (c *config) check() error {
	var errs []error
	refuse := func(ok bool, name string, value any, must string) {
		if !ok {
			errs = append(errs, fmt.Errorf("%s: %v: must be %s", name, value, must))
		}
	}
	positive := func(name string, x float64) { refuse(x > 0, name, x, "positive") }
	press, err := slidercrank.New(c.Press)
	if err != nil {
		errs = append(errs, fmt.Errorf("press: %w", err))
	}
	refuse(c.Gear != 0, "gear", c.Gear, "other than 0")
	refuse(c.Encoder.PerTurn >= 1, "encoder.perTurn", c.Encoder.PerTurn, "at least 1")
	refuse(c.Tick >= 1e-5 && c.Tick <= 0.1, "tick", c.Tick, "from 1e-5 to 0.1 s")
	refuse(c.Latency >= 0 && c.Latency <= 1000, "latency", c.Latency, "from 0 to 1000 ticks")
	refuse(c.Lost >= 0 && c.Lost <= 1000, "lost", c.Lost, "from 0 to 1000 ticks")
	positive("limits.speed", c.Limits.Speed)
	positive("limits.acc", c.Limits.Acc)
	positive("limits.stop", c.Limits.Stop)
	positive("limits.follow", c.Limits.Follow)
	refuse(c.Limits.Hold <= 1, "limits.hold", c.Limits.Hold, "at most 1")
	refuse(c.Limits.Margin >= rigid.LeastMargin, "limits.margin", c.Limits.Margin, "at least 1e-8")
	refuse(c.Limits.Margin < c.Limits.Hold, "limits.margin", c.Limits.Margin, "below limits.hold")
	refuse(len(c.Moves) > 0, "moves", len(c.Moves), "at least one")
	place := c.places(press)
	refuse(place(c.Start), "start", c.Start, "within the ram's stroke")
	for i, m := range c.Moves {
		name := fmt.Sprintf("moves[%d].", i)
		refuse(place(m.To), name+"to", m.To, "within the ram's stroke")
		positive(name+"speed", m.Speed)
		positive(name+"acc", m.Acc)
		positive(name+"jerk", m.Jerk)
		refuse(m.Dwell >= 0 && m.Dwell <= 3600, name+"dwell", m.Dwell, "from 0 to 3600 s")
	}
	if len(errs) == 0 {
		end := newProfile(c.Start, c.Moves).end
		refuse(end > 0 && end <= longest, "moves", end, "done within 600 s, and take some time")
	}
	return errors.Join(errs...)
}

const longest = 600 // s of the profile's time, for which a plan is made

// places returns whether the press, driven by its ram, reaches a place. What no
// press was made for is not judged.
func (c *config) places(press *slidercrank.Linkage) func(ram float64) bool {
	return func(ram float64) bool {
		var st slidercrank.State
		return press == nil || press.SolveSlide(&st, rigid.Coordinate{Pos: ram}, c.Knee) == nil
	}
}

// closed reports whether the moves end where they start, so that they can be repeated.
func (c *config) closed() bool {
	return math.Abs(c.Moves[len(c.Moves)-1].To-c.Start) < 1e-9
}
