package main

import (
	_ "embed"
	"errors"
	"fmt"

	"example.com/twopoint/examples/internal/files"
	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/rigid/rigidtest"
	"example.com/twopoint/slidercrank"
)

//go:embed presscheck.json
var sampleConfig []byte

// A config is what the JSON file says, in SI units and rad.
type config struct {
	Press       slidercrank.Dimensions `json:"press"`       // as drawn; the mount does not matter
	Gear        float64                `json:"gear"`        // turns of the encoder's shaft in a turn of the crank; negative: turns the other way
	Encoder     encoder.Encoder        `json:"encoder"`     // perTurn of its own shaft; zero as far as it is known
	ScaleZeroed bool                   `json:"scaleZeroed"` // the ram scale reads 0 at the crank pivot: its offset is not fitted
	Turns       int                    `json:"turns"`       // whole turns of the crank that a log must have, at least 2
	Window      int                    `json:"window"`      // samples from which rates are taken
	Tolerance   tolerance              `json:"tolerance"`
}

// A tolerance says what an accepted press may be off by.
type tolerance struct {
	Crank    float64             `json:"crank"`    // m
	Rod      float64             `json:"rod"`      // m
	Offset   float64             `json:"offset"`   // m
	Slip     float64             `json:"slip"`     // of the crank against its encoder over the log, rad
	Jump     float64             `json:"jump"`     // counts: what is less at a time is not taken for a jump
	Glitches float64             `json:"glitches"` // share of samples that are off alone
	Scatter  float64             `json:"scatter"`  // of the ram scale about the fit, root mean square, m
	Pattern  float64             `json:"pattern"`  // what a part of the turn may be off by on the mean, m
	Motion   rigidtest.Tolerance `json:"motion"`   // of the ram's place, speed and acceleration
}

// readConfig reads a file, or the sample; an unknown field and a wrong number are
// refused by name.
func readConfig(path string) (*config, error) {
	var c config
	name, err := files.ReadJSON(path, sampleConfig, "presscheck.json", &c)
	if err != nil {
		return nil, err
	}
	c.Press.Mount = rigid.Placement{}
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
	if _, err := slidercrank.New(c.Press); err != nil {
		errs = append(errs, fmt.Errorf("press: %w", err))
	} else {
		refuse(turns(c.Press), "press.rod", c.Press.Rod, "longer than crank and offset, so that the crank turns")
	}
	refuse(c.Gear != 0, "gear", c.Gear, "other than 0")
	refuse(c.Encoder.PerTurn >= 1, "encoder.perTurn", c.Encoder.PerTurn, "at least 1")
	refuse(c.Turns >= 2, "turns", c.Turns, "at least 2")
	refuse(c.Window > rateDegree && c.Window <= 1000, "window", c.Window, "from 4 to 1000")
	t := &c.Tolerance
	refuse(t.Jump >= 1, "tolerance.jump", t.Jump, "at least 1")
	for _, f := range []struct {
		name  string
		value float64
	}{
		{"crank", t.Crank}, {"rod", t.Rod}, {"offset", t.Offset}, {"slip", t.Slip}, {"glitches", t.Glitches},
		{"scatter", t.Scatter}, {"pattern", t.Pattern},
		{"motion.pos", t.Motion.Pos}, {"motion.vel", t.Motion.Vel}, {"motion.acc", t.Motion.Acc},
	} {
		refuse(f.value > 0, "tolerance."+f.name, f.value, "positive")
	}
	return errors.Join(errs...)
}

// countAngle is what the crank turns by in a count, in rad, with its sign.
func (c *config) countAngle() float64 {
	a := rigid.Revolution / float64(c.Encoder.PerTurn) / c.Gear
	if c.Encoder.Reverse {
		return -a
	}
	return a
}

// crank returns the crank's angle at a count, whole turns included.
func (c *config) crank(counts int64) (float64, error) {
	turns, angle, err := c.Encoder.Angle(counts)
	if err != nil {
		return 0, fmt.Errorf("motor_counts %d: %w", counts, err)
	}
	return (float64(turns)*rigid.Revolution + angle) / c.Gear, nil
}
