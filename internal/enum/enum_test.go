package enum_test

import (
	"errors"
	"strings"
	"testing"

	"example.com/twopoint/internal/enum"
)

type finish int8

var (
	errWrong = errors.New("wrong")
	finishes = enum.Names[finish]{Type: "Finish", Wrong: errWrong, Of: []string{"raw", "glazed, matt"}}
)

func TestNames(t *testing.T) {
	for _, row := range []struct {
		value finish
		text  string
		named bool
	}{
		{0, "raw", true}, {1, "glazed, matt", true}, {2, "Finish(2)", false}, {-1, "Finish(-1)", false}, {-128, "Finish(-128)", false},
	} {
		if got := finishes.String(row.value); got != row.text || finishes.Has(row.value) != row.named {
			t.Errorf("%d: %q, has %v", row.value, got, finishes.Has(row.value))
		}
		text, err := finishes.Text(row.value)
		if !row.named {
			if text != nil || !errors.Is(err, errWrong) || !strings.Contains(err.Error(), row.text) {
				t.Errorf("%d as text: %q, %v", row.value, text, err)
			}
			continue
		}
		back := finish(7)
		if err != nil || string(text) != row.text || finishes.Read(&back, text) != nil || back != row.value {
			t.Errorf("%d as text: %q, %v, back %d", row.value, text, err, back)
		}
	}
}

// TestReadUnknown: the error tells what was given and which names there are.
func TestReadUnknown(t *testing.T) {
	for given, want := range map[string]string{
		"Raw":                   `wrong: "Raw" is no Finish: the names are "raw", "glazed, matt"`,
		"":                      `wrong: "" is no Finish: the names are "raw", "glazed, matt"`,
		"Finish(2)":             `wrong: "Finish(2)" is no Finish: the names are "raw", "glazed, matt"`,
		"raw\n":                 `wrong: "raw\n" is no Finish: the names are "raw", "glazed, matt"`,
		strings.Repeat("x", 99): `wrong: "` + strings.Repeat("x", 40) + `" is no Finish: the names are "raw", "glazed, matt"`,
	} {
		value := finish(1)
		err := finishes.Read(&value, []byte(given))
		if err == nil || err.Error() != want || !errors.Is(err, errWrong) || value != 1 {
			t.Errorf("%q: value %d, %v\nwant %s", given, value, err, want)
		}
	}
}
