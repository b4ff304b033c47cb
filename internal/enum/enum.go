// Package enum has the text of enumerations: types whose values 0, 1, 2 and so on
// have names.
package enum

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// Names are those of an enumeration's values.
type Names[T ~int8 | ~uint8] struct {
	Type  string   // of the values, as messages call it
	Wrong error    // what the errors wrap
	Of    []string // the names, by value
}

// Has reports whether a value has a name.
func (n *Names[T]) Has(value T) bool { return value >= 0 && int(value) < len(n.Of) }

// String returns a value's name, or the type with the number of one that has none.
func (n *Names[T]) String(value T) string {
	if n.Has(value) {
		return n.Of[value]
	}
	return n.Type + "(" + strconv.Itoa(int(value)) + ")"
}

// Text returns a value's name, an error for one that has none.
func (n *Names[T]) Text(value T) ([]byte, error) {
	if !n.Has(value) {
		return nil, fmt.Errorf("%w: %s has no name", n.Wrong, n.String(value))
	}
	return []byte(n.Of[value]), nil
}

// Read sets a value by its name. For any other text it leaves the value as it is,
// and the error tells the text and all names.
func (n *Names[T]) Read(value *T, text []byte) error {
	i := slices.Index(n.Of, string(text))
	if i < 0 {
		return fmt.Errorf("%w: %.40q is no %s: the names are %s", n.Wrong, text, n.Type, n.all())
	}
	*value = T(i)
	return nil
}

// all returns the names in quotes, since there are commas in some.
func (n *Names[T]) all() string {
	quoted := make([]string, len(n.Of))
	for i, name := range n.Of {
		quoted[i] = strconv.Quote(name)
	}
	return strings.Join(quoted, ", ")
}
