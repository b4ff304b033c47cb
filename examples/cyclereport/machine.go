package main

import (
	"fmt"
	"slices"

	"example.com/twopoint/examples/internal/files"
	"example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A machine is what the configuration says, looked up and put together.
type machine struct {
	config
	linkage    *planar.Linkage
	start      *planar.State
	tool       planar.Attachment
	curve      planar.Attachment
	of         planar.Attachment // whose acceleration is taken apart
	in         planar.Link       // as seen from which link
	rolling    planar.Link       // whose poles are followed
	dimensions []planar.Dimension
	tolerances []float64
}

type config struct {
	Design    planar.Design `json:"design"`
	Speed     float64       `json:"speed"` // of the drive: rad/s or m/s
	From      float64       `json:"from"`
	To        float64       `json:"to"`
	Tool      place         `json:"tool"`
	Direction float64       `json:"direction"` // rad: the tool's way is taken along it
	Terms     struct {
		Of place  `json:"of"`
		In string `json:"in"`
	} `json:"terms"`
	Curve      place       `json:"curve"`
	Poles      string      `json:"poles"`
	Poses      int         `json:"poses"`
	Tolerances []tolerance `json:"tolerances"`
}

type place struct {
	Link string  `json:"link"`
	X    float64 `json:"x"`
	Y    float64 `json:"y"`
}

type tolerance struct {
	Hole place       `json:"hole"`
	Part planar.Part `json:"part"`
	By   float64     `json:"by"` // plus and minus, m or rad
}

// readMachine reads a configuration; an unknown field or link is refused by name.
func readMachine(path string) (*machine, error) {
	m := new(machine)
	name, err := files.ReadJSON(path, sample, "config.json", &m.config)
	if err != nil {
		return nil, err
	}
	if err := m.build(); err != nil {
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	return m, nil
}

func (m *machine) build() (err error) {
	if len(m.Design.Drives) != 1 {
		return fmt.Errorf("a linkage with one drive is asked for, this one has %d", len(m.Design.Drives))
	}
	if !(m.To > m.From) || m.Speed == 0 {
		return fmt.Errorf("from %v to %v at speed %v is no cycle", m.From, m.To, m.Speed)
	}
	if m.Poses < 1 || m.Poses > 100 {
		return fmt.Errorf("poses: %d, must be from 1 to 100", m.Poses)
	}
	for _, x := range []struct {
		what string
		at   place
		to   *planar.Attachment
	}{{"tool", m.Tool, &m.tool}, {"curve", m.Curve, &m.curve}, {"terms.of", m.Terms.Of, &m.of}} {
		l, err := m.link(x.at.Link)
		if err != nil {
			return fmt.Errorf("%s: %w", x.what, err)
		}
		*x.to = l.At(x.at.X, x.at.Y)
	}
	if m.in, err = m.link(m.Terms.In); err != nil {
		return fmt.Errorf("terms.in: %w", err)
	}
	if m.rolling, err = m.link(m.Poles); err != nil {
		return fmt.Errorf("poles: %w", err)
	}
	for i, t := range m.Tolerances {
		l, err := m.link(t.Hole.Link)
		if err != nil {
			return fmt.Errorf("tolerances[%d]: %w", i, err)
		}
		hole := m.Design.Hole(l.At(t.Hole.X, t.Hole.Y), t.Part)
		if len(hole.Of) == 0 {
			return fmt.Errorf("tolerances[%d]: no joint at (%v, %v) of %s", i, t.Hole.X, t.Hole.Y, t.Hole.Link)
		}
		if t.By < 0 {
			return fmt.Errorf("tolerances[%d].by: %v, must not be negative", i, t.By)
		}
		m.dimensions, m.tolerances = append(m.dimensions, hole), append(m.tolerances, t.By)
	}
	if m.linkage, err = planar.New(m.Design); err != nil {
		return err
	}
	m.start, err = m.linkage.Assemble(nil, rigid.Coordinate{Pos: m.From})
	return err
}

func (m *machine) link(name string) (planar.Link, error) {
	i := slices.Index(m.Design.Links, name)
	if i < 0 {
		return 0, fmt.Errorf("no link %q", name)
	}
	return planar.Link(i), nil
}
