package rigid

import "strconv"

// A Side is a side of a directed line. A knee is the side, of the line from the
// crank pivot to the follower or slider pin, on which the crank pin lies.
type Side int8

// The sides, seen looking along the line. Left is the zero value.
const (
	Left  Side = iota // counter-clockwise of the line's direction
	Right             // clockwise of it
)

// String returns "left" or "right".
func (s Side) String() string {
	switch s {
	case Left:
		return "left"
	case Right:
		return "right"
	}
	return "Side(" + strconv.Itoa(int(s)) + ")"
}

// MarshalText returns "left" or "right"; ErrInput for any other value.
func (s Side) MarshalText() ([]byte, error) {
	if s != Left && s != Right {
		return nil, ErrInput
	}
	return []byte(s.String()), nil
}

// UnmarshalText reads "left" or "right"; anything else is ErrInput.
func (s *Side) UnmarshalText(text []byte) error {
	switch string(text) {
	case "left":
		*s = Left
	case "right":
		*s = Right
	default:
		return ErrInput
	}
	return nil
}
