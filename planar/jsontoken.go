package planar

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"

	"example.com/twopoint/rigid"
)

// members reads an object member by member, in order, and refuses a key twice.
func members(at string, text []byte, read func(key string, text []byte) error) error {
	seen := map[string]bool{}
	return inside(at, text, '{', func(d *json.Decoder) error {
		token, err := d.Token()
		if err != nil {
			return err
		}
		key, _ := token.(string)
		if seen[key] {
			return fmt.Errorf("%w: %s: a key twice", rigid.ErrInput, under(at, key))
		}
		seen[key] = true
		var value json.RawMessage
		if err := d.Decode(&value); err != nil {
			return err
		}
		return read(key, value)
	})
}

// array reads an array.
func array(at string, text []byte, read field) error {
	n := 0
	return inside(at, text, '[', func(d *json.Decoder) error {
		var value json.RawMessage
		if err := d.Decode(&value); err != nil {
			return err
		}
		n++
		return read(fmt.Sprintf("%s[%d]", at, n-1), value)
	})
}

// inside reads what is between the braces of an object or an array.
func inside(at string, text []byte, open json.Delim, read func(*json.Decoder) error) error {
	d := json.NewDecoder(bytes.NewReader(text))
	token, err := d.Token()
	if err == nil && token != open {
		if at == "" {
			at = "a design"
		}
		what := map[json.Delim]string{'{': "an object", '[': "an array"}[open]
		return fmt.Errorf("%w: %s is not %s: %.40s", rigid.ErrInput, at, what, bytes.TrimSpace(text))
	}
	for err == nil && d.More() {
		err = read(d)
	}
	if err == nil {
		_, err = d.Token()
	}
	if err == nil {
		if _, err = d.Token(); err == io.EOF {
			return nil
		}
		err = fmt.Errorf("%w: more than one value", rigid.ErrInput)
	}
	return asInput(err)
}

// asInput makes the errors of encoding/json the package's.
func asInput(err error) error {
	if errors.Is(err, rigid.ErrInput) || errors.Is(err, ErrReference) {
		return err
	}
	return fmt.Errorf("%w: %w", rigid.ErrInput, err)
}
