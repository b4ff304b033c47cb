package planar

import (
	"example.com/twopoint/internal/enum"
	"example.com/twopoint/rigid"
)

var (
	endNames  = enum.Names[End]{Type: "End", Wrong: rigid.ErrInput, Of: []string{"a", "b", "arm"}}
	partNames = enum.Names[Part]{Type: "Part", Wrong: rigid.ErrInput, Of: []string{"x", "y", "angle", "radiusA", "radiusB", "phase"}}
)

// String returns "a", "b" or "arm".
func (e End) String() string { return endNames.String(e) }

// MarshalText returns what String does; rigid.ErrInput for a value that is no End.
func (e End) MarshalText() ([]byte, error) { return endNames.Text(e) }

// UnmarshalText reads "a", "b" or "arm"; any other text is an error that wraps
// rigid.ErrInput and tells the names.
func (e *End) UnmarshalText(text []byte) error { return endNames.Read(e, text) }

// String returns "x", "y", "angle", "radiusA", "radiusB" or "phase".
func (p Part) String() string { return partNames.String(p) }

// MarshalText returns what String does; rigid.ErrInput for a value that is no Part.
func (p Part) MarshalText() ([]byte, error) { return partNames.Text(p) }

// UnmarshalText reads what String returns; any other text is an error that wraps
// rigid.ErrInput and tells the names.
func (p *Part) UnmarshalText(text []byte) error { return partNames.Read(p, text) }
