package main

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

// Two faults at a time are both told.
func TestTwoFaults(t *testing.T) {
	m := good(8)
	m.crank += 0.0006
	m.lost = func(t float64) int64 {
		if t > 9 {
			return 50
		}
		return 0
	}
	r := judged(t, sampleConfigFor(t), m)
	if f := r.Verdict.Faults; len(f) != 2 || f[0] != faultCounts || f[1] != "link: crank" {
		t.Errorf("%v", f)
	}
	if j := r.Jumps; len(j) != 1 || j[0].Ram == nil || math.Abs(j[0].Ram.Value+50) > 5*j[0].Ram.Error+0.5 {
		t.Errorf("%+v", j)
	}
}

// Counts that leap because the motor did are no fault: the ram goes along.
func TestJerkIsNoJump(t *testing.T) {
	m := good(9)
	m.lost = func(t float64) int64 { return -int64(60 * btof(t > 7)) }
	m.slip = func(turned float64) float64 { return -60 * 2 * math.Pi / 20480 * btof(turned > m.speed*(7-0.4)) }
	r := judged(t, sampleConfigFor(t), m)
	if !r.Verdict.Pass || len(r.Jumps) != 1 || !r.Jumps[0].Refuted {
		t.Errorf("%+v\n%+v", r.Verdict, r.Jumps)
	}
}

func btof(b bool) float64 {
	if b {
		return 1
	}
	return 0
}

// Single samples that are off are left out; many of them are a fault.
func TestGlitches(t *testing.T) {
	for every, want := range map[int]bool{600: true, 60: false} {
		m := good(10)
		m.spoil = func(k int, ram float64) float64 {
			if k%every == every-1 {
				return ram + 0.02
			}
			return ram
		}
		r := judged(t, sampleConfigFor(t), m)
		if r.Verdict.Pass != want || r.Log.Glitches != m.lines/every {
			t.Errorf("one in %d: %+v, %+v", every, r.Verdict, r.Log)
		}
		if !want && (len(r.Verdict.Faults) != 1 || r.Verdict.Faults[0] != faultGlitches) {
			t.Errorf("one in %d: %v", every, r.Verdict.Faults)
		}
	}
}

// A config with the scale's offset known tells the rod far better.
func TestScaleZeroed(t *testing.T) {
	c := sampleConfigFor(t)
	m := good(11)
	m.rod += 0.0007
	free := judged(t, c, m).Links
	c.ScaleZeroed = true
	m.scale = 0
	known := judged(t, c, m).Links
	if len(free.Wrong) != 1 || len(known.Wrong) != 1 || known.Wrong[0].Name != "rod" {
		t.Fatalf("%+v\n%+v", free, known)
	}
	if known.Wrong[0].Error > free.Wrong[0].Error/10 || math.Abs(known.Wrong[0].Value-0.0007) > 5e-6 {
		t.Errorf("%+v against %+v", known.Wrong, free.Wrong)
	}
}

// An encoder whose counts go down, a gear that turns back, and both.
func TestSenses(t *testing.T) {
	for _, reverse := range []bool{false, true} {
		for _, gear := range []float64{5, -5} {
			c := sampleConfigFor(t)
			c.Encoder.Reverse, c.Gear = reverse, gear
			m := good(12)
			m.reverse = reverse != (gear < 0)
			r := judged(t, c, m)
			want := float64(m.zero)
			if z := r.Calibration.EncoderZero; !r.Verdict.Pass || math.Abs(z.Value-want) > 1+5*z.Error {
				t.Errorf("reverse %v, gear %g: zero %+v, want %g within half a count's rounding; %+v", reverse, gear, z, want, r.Verdict)
			}
		}
	}
}

func TestCouldNotCheck(t *testing.T) {
	c := sampleConfigFor(t)
	for _, k := range []struct {
		why   string
		spoil func(*made)
	}{
		{"too few turns", func(m *made) { m.lines = 700 }},
		{"no line", func(m *made) { m.lines = 0 }},
		{"another machine", func(m *made) { m.spoil = func(k int, _ float64) float64 { return 0.1 * float64(k%7) } }},
		{"a ram that stands", func(m *made) { m.spoil = func(int, float64) float64 { return 0.5 } }},
	} {
		m := good(13)
		k.spoil(&m)
		if r, err := check(c, m.reader(), func(err error) error { return err }); err == nil {
			t.Errorf("%s: %+v", k.why, r.Verdict)
		}
	}
	m := good(13)
	c.Tolerance.Rod = 1e-5
	if r := judged(t, c, m); r.Verdict.status() != 2 {
		t.Errorf("a tolerance finer than the log tells: %+v", r.Verdict)
	}
}

// A motion that is off for no other reason is a fault of its own.
func TestMotion(t *testing.T) {
	c := sampleConfigFor(t)
	c.Tolerance.Motion.Acc = 1e-4
	r := judged(t, c, good(15))
	if f := r.Verdict.Faults; len(f) != 1 || f[0] != faultMotion || r.Motion.Diff == "" {
		t.Errorf("%v, diff %q", f, r.Motion.Diff)
	}
}

// A gap in the log is no jump of the counts, even where the machine speeds up.
func TestGap(t *testing.T) {
	for _, at := range []float64{0.3, 0.5, 7} {
		m := good(16)
		m.gap = rigid.Interval{Lo: at, Hi: at + 0.3}
		r := judged(t, sampleConfigFor(t), m)
		if !r.Verdict.Pass || len(r.Jumps) > 0 || r.Log.Glitches > 0 {
			t.Errorf("gap at %g s: %+v, %+v, %+v", at, r.Verdict, r.Jumps, r.Log)
		}
	}
}

// A rough beginning is left out.
func TestRoughBeginning(t *testing.T) {
	m := good(17)
	m.spoil = func(k int, ram float64) float64 {
		if k < 330 {
			return ram + 2e-4*float64(k%2)
		}
		return ram
	}
	r := judged(t, sampleConfigFor(t), m)
	if !r.Verdict.Pass || r.Log.LeftOut != 1 || r.Calibration.Scatter > 3e-5 {
		t.Errorf("%+v, %+v, %+v", r.Verdict, r.Log, r.Calibration)
	}
}

// However long the press is parked, and however slowly it turns, the zero is found.
func TestParked(t *testing.T) {
	m := good(18)
	m.lines, m.park = 2*mostFirst, 1.5*mostFirst*m.step
	if r := judged(t, sampleConfigFor(t), m); !r.Verdict.Pass || r.Log.Samples != m.lines {
		t.Errorf("%+v, %+v", r.Verdict, r.Log)
	}
}
