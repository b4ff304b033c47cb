package rigid_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/rigid"
)

var sentinels = []error{
	rigid.ErrUnreachable, rigid.ErrSingular, rigid.ErrNoPole, rigid.ErrNotFinite, rigid.ErrInput,
	rigid.ErrNotPositive, rigid.ErrChangePoint,
}

func TestMessagesBeginAlike(t *testing.T) {
	seen := map[string]bool{}
	for _, err := range sentinels {
		if !strings.HasPrefix(err.Error(), "twopoint: ") || seen[err.Error()] {
			t.Errorf("message %q", err)
		}
		seen[err.Error()] = true
	}
}

func TestDimensionError(t *testing.T) {
	for _, c := range []struct {
		err  rigid.DimensionError
		want string
	}{
		{rigid.DimensionError{Name: "Rod", Value: -0.2, Err: rigid.ErrNotPositive}, "twopoint: dimension Rod = -0.2: must be positive"},
		{rigid.DimensionError{Name: "Mount.X", Value: math.NaN(), Err: rigid.ErrNotFinite}, "twopoint: dimension Mount.X = NaN: number not finite"},
		{rigid.DimensionError{Name: "ring", Value: math.NaN(), Err: rigid.ErrInput}, "twopoint: ring: wrong input"},
		{rigid.DimensionError{Err: rigid.ErrUnreachable}, "twopoint: dimensions: out of reach of the links"},
		{rigid.DimensionError{}, "twopoint: dimensions: unknown cause"},
		{rigid.DimensionError{Name: "Rod", Err: errors.New("twopoint: ")}, "twopoint: dimension Rod = 0: "},
	} {
		if got := c.err.Error(); got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
}

// A constructor's error, alone or joined, tells the dimension and the cause.
func TestDimensionErrorIsFound(t *testing.T) {
	for _, cause := range sentinels {
		first := &rigid.DimensionError{Name: "Crank", Value: -1, Err: cause}
		joined := errors.Join(first, &rigid.DimensionError{Name: "Rod", Err: rigid.ErrNotPositive})
		if got, ok := errors.AsType[*rigid.DimensionError](joined); !ok || got != first {
			t.Errorf("found %v, %v", got, ok)
		}
		if !errors.Is(joined, cause) || !errors.Is(first, cause) {
			t.Errorf("%v is not %v", joined, cause)
		}
	}
	if errors.Is(&rigid.DimensionError{Name: "Rod", Err: rigid.ErrNotPositive}, rigid.ErrNotFinite) {
		t.Error("one cause is another")
	}
}

func FuzzDimensionError(f *testing.F) {
	f.Add("Rod", -1.0, uint8(5))
	f.Add("", math.Inf(1), uint8(200))
	f.Fuzz(func(t *testing.T, name string, value float64, cause uint8) {
		e := &rigid.DimensionError{Name: name, Value: value}
		if int(cause) < len(sentinels) {
			e.Err = sentinels[cause]
		}
		text := e.Error()
		if !strings.HasPrefix(text, "twopoint: ") || !strings.Contains(text, name) || strings.Count(text, "twopoint: ") != 1+strings.Count(name, "twopoint: ") {
			t.Errorf("message %q", text)
		}
		if e.Unwrap() != e.Err {
			t.Error("the cause is lost")
		}
	})
}
