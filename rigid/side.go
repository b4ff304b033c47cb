package rigid

import "example.com/twopoint/internal/enum"

// A Side is a side of a directed line. A knee is the side, of the line from the
// crank pivot to the follower or slider pin, on which the crank pin lies.
type Side int8

// The sides, seen looking along the line. Left is the zero value.
const (
	Left  Side = iota // counter-clockwise of the line's direction
	Right             // clockwise of it
)

var sides = enum.Names[Side]{Type: "Side", Wrong: ErrInput, Of: []string{"left", "right"}}

// String returns "left" or "right".
func (s Side) String() string { return sides.String(s) }

// MarshalText returns "left" or "right"; ErrInput for any other value.
func (s Side) MarshalText() ([]byte, error) { return sides.Text(s) }

// UnmarshalText reads "left" or "right"; any other text is an error that wraps
// ErrInput and tells the names.
func (s *Side) UnmarshalText(text []byte) error { return sides.Read(s, text) }
