package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"os"

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
	data, name := sampleMachine, "machine.json"
	if path != "" {
		var err error
		if data, err = os.ReadFile(path); err != nil {
			return nil, err
		}
		name = path
	}
	var file struct {
		Press   slidercrank.Dimensions `json:"press"`
		Encoder struct {
			PerTurn int64 `json:"perTurn"`
			Zero    int64 `json:"zero"`
			Reverse bool  `json:"reverse"`
		} `json:"encoder"`
	}
	d := json.NewDecoder(bytes.NewReader(data))
	d.DisallowUnknownFields()
	if err := d.Decode(&file); err != nil {
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	if _, err := d.Token(); err != io.EOF {
		return nil, fmt.Errorf("%s: more than one value", name)
	}
	press, err := slidercrank.New(file.Press)
	if err != nil {
		return nil, fmt.Errorf("%s: press: %w", name, err)
	}
	m := &machine{press: press, encoder: encoder.Encoder(file.Encoder)}
	if _, _, err := m.encoder.Angle(0); err != nil {
		return nil, fmt.Errorf("%s: encoder: %w", name, err)
	}
	return m, nil
}
