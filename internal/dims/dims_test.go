package dims_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// TestNumbers: each kind of number is refused for its cause, and the text of a size
// out of range tells the range.
func TestNumbers(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, row := range []struct {
		x                        float64
		length, distance, number error
		says                     string
	}{
		{1, nil, nil, nil, ""},
		{1e-60, nil, nil, nil, ""},
		{1e60, nil, nil, nil, ""},
		{0, rigid.ErrNotPositive, nil, nil, "must be positive"},
		{-1, rigid.ErrNotPositive, nil, nil, "must be positive"},
		{0.9e-60, rigid.ErrInput, nil, nil, "1e-60 and 1e60 m"},
		{1.1e60, rigid.ErrInput, rigid.ErrInput, nil, "1e60 m"},
		{-1.1e60, rigid.ErrNotPositive, rigid.ErrInput, nil, ""},
		{nan, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite, "= NaN: number not finite"},
		{inf, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite, "= +Inf: number not finite"},
		{-inf, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite, "= -Inf: number not finite"},
	} {
		for kind, check := range map[string]struct {
			by   func(*dims.Faults)
			want error
		}{
			"length":   {func(f *dims.Faults) { f.Length("Rod", row.x) }, row.length},
			"distance": {func(f *dims.Faults) { f.Distance("Rod", row.x) }, row.distance},
			"number":   {func(f *dims.Faults) { f.Number("Rod", row.x) }, row.number},
		} {
			var f dims.Faults
			check.by(&f)
			err := f.Err()
			if check.want == nil {
				if err != nil || !f.OK() {
					t.Errorf("%g as %s: %v", row.x, kind, err)
				}
				continue
			}
			bad, ok := errors.AsType[*rigid.DimensionError](err)
			if !ok || f.OK() || bad.Name != "Rod" || !errors.Is(err, check.want) || !strings.Contains(err.Error(), row.says) {
				t.Errorf("%g as %s: %v, want %v", row.x, kind, err, check.want)
			}
		}
	}
}

// TestAllAtOnce: every fault is reported, each by its name.
func TestAllAtOnce(t *testing.T) {
	var f dims.Faults
	f.Length("Crank", 0)
	f.Length("Rod", 0.48)
	f.Mount(rigid.Placement{X: math.Inf(-1), Y: 1, Angle: math.NaN()})
	f.Add("", 0, dims.Because(rigid.ErrUnreachable, "the rod is too short"))
	f.Add("Offset", 3, nil)
	const want = `twopoint: dimension Crank = 0: must be positive
twopoint: dimension Mount.X = -Inf: number not finite
twopoint: dimension Mount.Angle = NaN: number not finite
twopoint: dimensions: the rod is too short`
	if err := f.Err(); err.Error() != want || !errors.Is(err, rigid.ErrUnreachable) || errors.Is(err, rigid.ErrInput) {
		t.Errorf("%v\nwant %s", err, want)
	}
}
