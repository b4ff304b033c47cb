// Package files reads and writes the files of the examples: JSON with no unknown
// field, and output that comes whole or not at all.
package files

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"path/filepath"
)

// ReadJSON decodes the file at path into v, or the sample where path is empty, and
// returns the name to tell in further errors. An unknown field is refused by its
// name, and so is anything after the first value.
func ReadJSON(path string, sample []byte, sampleName string, v any) (name string, err error) {
	data, name := sample, sampleName
	if path != "" {
		if data, err = os.ReadFile(path); err != nil {
			return path, err
		}
		name = path
	}
	d := json.NewDecoder(bytes.NewReader(data))
	d.DisallowUnknownFields()
	if err := d.Decode(v); err != nil {
		return name, fmt.Errorf("%s: %w", name, err)
	}
	if _, err := d.Token(); err != io.EOF {
		return name, fmt.Errorf("%s: more than one value", name)
	}
	return name, nil
}

// A Whole file comes to be under its name when it is complete, or not at all: it is
// written beside and renamed.
type Whole struct {
	*os.File
	name string
}

// CreateWhole makes the file beside name at once, so that an unwritable folder is
// found before the work and not after it.
func CreateWhole(name string) (*Whole, error) {
	if i, err := os.Stat(name); err == nil && !i.Mode().IsRegular() {
		return nil, fmt.Errorf("can't write %s: not a file", name)
	}
	f, err := os.CreateTemp(filepath.Dir(name), "."+filepath.Base(name)+".part*")
	if err != nil {
		return nil, fmt.Errorf("can't write %s: %w", name, err)
	}
	return &Whole{f, name}, nil
}

// Finish gives the file its name, or removes it where err or its own end is bad; the
// error returned tells which.
func (f *Whole) Finish(err error) error {
	if err == nil {
		err = f.Chmod(0o644)
	}
	if err == nil {
		err = f.Sync()
	}
	if e := f.Close(); err == nil {
		err = e
	}
	if err == nil {
		err = os.Rename(f.Name(), f.name)
	}
	if err != nil {
		os.Remove(f.Name())
		return fmt.Errorf("can't write %s: %w", f.name, err)
	}
	return nil
}

// Discard removes the file before it has its name.
func (f *Whole) Discard() {
	f.Close()
	os.Remove(f.Name())
}
