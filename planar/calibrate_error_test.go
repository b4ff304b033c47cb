package planar_test

import (
	"errors"
	"iter"
	"math"
	"slices"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

func TestCalibrateSays(t *testing.T) {
	d := pressFeeder()
	_, st := assemble(t, d, feederGuess(), at(0.3))
	rocker := []Drive{Turn{Of: 3, From: Frame}}
	by := lengths(&d)
	constant := slices.Repeat([]Sample{{In: []float64{0.3}, Out: []float64{st.Turn(3, Frame).Pos + 1e-5}}}, 50)
	c, err := st.Calibrate(played(constant), Calibration{Outputs: rocker, By: by})
	if err != nil || !slices.Equal(c.Constant, []int{0}) || len(c.Alike) != 2 {
		t.Errorf("constant: %+v, %v", c, err)
	}
	beyond := errors.New("end of tape")
	torn := func(yield func(Sample, error) bool) { yield(Sample{}, beyond) }
	once := slices.Values(constant) // read again it is shorter
	n := 0
	shrinking := func(yield func(Sample, error) bool) {
		n++
		for s := range once {
			if !yield(s, nil) || n > 1 {
				return
			}
		}
	}
	first := len(d.Joints) + len(d.Drives)
	for _, x := range []struct {
		name string
		log  iter.Seq2[Sample, error]
		c    Calibration
		want error
	}{
		{"no log", nil, Calibration{Outputs: rocker, By: by}, rigid.ErrInput},
		{"empty log", played(nil), Calibration{Outputs: rocker, By: by}, ErrTooFew},
		{"three samples", played(constant[:3]), Calibration{Outputs: rocker, By: by}, ErrTooFew},
		{"nothing to find", played(constant), Calibration{Outputs: rocker}, rigid.ErrInput},
		{"no outputs", played(constant), Calibration{By: by}, rigid.ErrInput},
		{"a nil output", played(constant), Calibration{Outputs: []Drive{nil}, By: by}, ErrReference},
		{"an output of no link", played(constant), Calibration{Outputs: []Drive{Turn{Of: 9}}, By: by}, ErrReference},
		{"no such entry", played(constant), Calibration{Outputs: rocker, By: []Dimension{{[]Entry{{first + 1, A, Phase}}}}}, ErrReference},
		{"no entry", played(constant), Calibration{Outputs: rocker, By: []Dimension{{}}}, rigid.ErrInput},
		{"negative noise", played(constant), Calibration{Outputs: rocker, By: by, Noise: []float64{-1}}, rigid.ErrInput},
		{"noise of another number", played(constant), Calibration{Outputs: rocker, By: by, Noise: []float64{1, 1}}, rigid.ErrInput},
		{"all outliers", played(constant), Calibration{Outputs: rocker, By: by, Outliers: 0.6}, rigid.ErrInput},
		{"a log that ends in an error", torn, Calibration{Outputs: rocker, By: by}, beyond},
		{"a log that shrinks", shrinking, Calibration{Outputs: rocker, By: by}, rigid.ErrInput},
		{"a reading too many", played([]Sample{{In: []float64{1, 2}, Out: []float64{1}}}), Calibration{Outputs: rocker, By: by}, rigid.ErrInput},
		{"NaN in a drive", played([]Sample{{In: []float64{math.NaN()}, Out: []float64{1}}}), Calibration{Outputs: rocker, By: by}, rigid.ErrNotFinite},
		{"infinity in an output", played([]Sample{{In: []float64{1}, Out: []float64{math.Inf(1)}}}), Calibration{Outputs: rocker, By: by}, rigid.ErrNotFinite},
	} {
		if c, err := st.Calibrate(x.log, x.c); !errors.Is(err, x.want) || c != nil {
			t.Errorf("%s: %+v, %v", x.name, c, err)
		}
	}
	if _, err := st.Calibrate(played(constant), Calibration{Outputs: []Drive{rocker[0], nil}, By: by}); err == nil || !strings.Contains(err.Error(), "Outputs[1]") {
		t.Errorf("of a second output that is nil: %v", err)
	}
	if c, err := new(State).Calibrate(played(constant), Calibration{Outputs: rocker, By: by}); !errors.Is(err, rigid.ErrInput) || c != nil {
		t.Errorf("a zero State: %v, %v", c, err)
	}
	var none Calibrated
	if !math.IsNaN(none.Deviation(0)) || !math.IsNaN(none.Correlation(0, 1)) {
		t.Error("a zero result has deviations")
	}
}
