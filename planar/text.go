package planar

import (
	"fmt"
	"slices"

	"example.com/twopoint/rigid"
)

// called, textOf and readText are String, MarshalText and UnmarshalText of
// enumerations whose values have names.
func called(kind string, names []string, i uint8) string {
	if int(i) < len(names) {
		return names[i]
	}
	return fmt.Sprintf("%s(%d)", kind, i)
}

func textOf(names []string, i uint8) ([]byte, error) {
	if int(i) >= len(names) {
		return nil, rigid.ErrInput
	}
	return []byte(names[i]), nil
}

func readText(to *uint8, names []string, text []byte) error {
	i := slices.Index(names, string(text))
	if i < 0 {
		return rigid.ErrInput
	}
	*to = uint8(i)
	return nil
}
