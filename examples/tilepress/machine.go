package main

import (
	"fmt"

	"example.com/twopoint/examples/internal/files"
	"example.com/twopoint/rigid/encoder"
	"example.com/twopoint/slidercrank"
)

// A machine is a press with the encoder on its crank.
type machine struct {
	press   *slidercrank.Linkage
	encoder encoder.Encoder
}

// readMachine reads the dimensions from a file, or the sample's; an unknown field
// is refused by its name.
func readMachine(path string) (*machine, error) {
	var file struct {
		Press   slidercrank.Dimensions `json:"press"`
		Encoder encoder.Encoder        `json:"encoder"`
	}
	name, err := files.ReadJSON(path, sampleMachine, "machine.json", &file)
	if err != nil {
		return nil, err
	}
	press, err := slidercrank.New(file.Press)
	if err != nil {
		return nil, fmt.Errorf("%s: press: %w", name, err)
	}
	m := &machine{press: press, encoder: file.Encoder}
	if n := m.encoder.PerTurn; n < 1 {
		return nil, fmt.Errorf("%s: encoder.perTurn: %d: must be at least 1", name, n)
	}
	if _, _, err := press.DeadCentres(); err != nil {
		return nil, fmt.Errorf("%s: press: the ram must have two dead centres: %w", name, err)
	}
	return m, nil
}
