package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// FuzzSensitivity asks machines for any dimension, at any place: an error leaves dst
// as it was, and without one every number is finite and the joints move together.
func FuzzSensitivity(f *testing.F) {
	f.Add(uint8(0), 0.1, 1.0, 2.0, int8(1), uint8(0), uint8(1))
	f.Add(uint8(1), -0.3, 0.0, 0.0, int8(5), uint8(2), uint8(2))
	f.Add(uint8(2), 0.2, 1e3, -1e5, int8(6), uint8(0), uint8(3))
	f.Add(uint8(3), 0.01, 1e-200, 0.0, int8(6), uint8(1), uint8(5))
	f.Add(uint8(4), -0.9, 1.0, 0.0, int8(2), uint8(1), uint8(0))
	all := machines()
	f.Fuzz(func(t *testing.T, which uint8, by, vel, acc float64, joint int8, end, part uint8) {
		m := all[int(which)%len(all)]
		_, st := assemble(t, m.d, m.guess, m.in...)
		in := st.Inputs()
		in[0] = rigid.Coordinate{Pos: in[0].Pos + by, Vel: vel, Acc: acc}
		_ = st.Move(in...) // wherever it is
		last := Link(len(m.d.Links) - 1)
		was := rigid.Point{Pos: rigid.NewPose(7, 7, 0).Origin}
		dst := []rigid.Point{was, was}
		entry := Entry{int(joint), End(end), Part(part)}
		dims := []Dimension{{[]Entry{entry}}, {[]Entry{entry, entry}}}
		if err := st.Sensitivity(dst, last.At(0.3, 0.1), dims...); err != nil {
			if dst[0] != was || dst[1] != was {
				t.Errorf("%v, and %v", err, dst)
			}
			return
		}
		for i, one := range numbers(dst[0]) {
			two := numbers(dst[1])[i]
			if one*0 != 0 || math.Abs(two-2*one) > 1e-9*math.Abs(two)+1e-300 {
				t.Errorf("%d: once %g, twice %g", i, one, two)
			}
		}
		_, _ = m.d.With(dims[0], by)
	})
}

// FuzzCalibrate gives readings of any kind: never a panic, and no number that is not
// one without an error.
func FuzzCalibrate(f *testing.F) {
	f.Add(0.3, 0.1, 1.5, 0.01, 0.0, uint8(12), int8(1), uint8(0), uint8(0))
	f.Add(0.3, 0.0, 1e9, 1e300, 0.2, uint8(30), int8(2), uint8(1), uint8(1))
	f.Add(-9.0, 7.0, math.NaN(), 0.0, 0.4, uint8(9), int8(5), uint8(0), uint8(5))
	f.Add(1e-300, 1e300, 0.0, 0.0, 0.1, uint8(3), int8(4), uint8(1), uint8(2))
	d := pressFeeder()
	l, err := New(d)
	if err != nil {
		f.Fatal(err)
	}
	st, err := l.Assemble(feederGuess(), at(0.3))
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, in, by, out, more, share float64, n uint8, joint int8, end, part uint8) {
		log := make([]Sample, n%40)
		for i := range log {
			x := float64(i)
			log[i] = Sample{In: []float64{in + by*x}, Out: []float64{out + more*x*x, out * x}}
		}
		c, err := st.Calibrate(played(log), Calibration{
			Outputs: []Drive{Turn{Of: 3, From: Frame}, Slide{Of: Link(2).Line(0.1, 0, 0), From: Frame.Line(0, 0, 0)}},
			By:      []Dimension{{[]Entry{{int(joint), End(end), Part(part)}}}, d.Hole(Link(1).At(0.08, 0), X)}, Outliers: share,
		})
		if (err == nil) != (c != nil) {
			t.Fatal(c, err)
		}
		if err != nil {
			return
		}
		for i, x := range c.Change {
			if x*0 != 0 || c.RMS*0 != 0 || math.IsNaN(c.Deviation(i)) {
				t.Errorf("%+v", c)
			}
		}
	})
}
