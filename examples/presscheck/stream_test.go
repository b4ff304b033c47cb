package main

import (
	"io"
	"math"
	"runtime"
	"testing"
)

// A meter reads through and looks at the heap every so many bytes.
type meter struct {
	io.Reader
	n, next, step int
	heap          []uint64 // live, at each look
}

func (m *meter) Read(p []byte) (int, error) {
	n, err := m.Reader.Read(p)
	if m.n += n; m.n >= m.next {
		m.next += m.step
		runtime.GC()
		var s runtime.MemStats
		runtime.ReadMemStats(&s)
		m.heap = append(m.heap, s.HeapAlloc)
	}
	return n, err
}

// A long log needs no more memory than a short one, and is judged as well.
func TestConstantMemory(t *testing.T) {
	m := good(5)
	m.lines, m.step = 200_000, 0.02 // 126 lines a turn: more turns than are kept
	if testing.Short() {
		m.lines = 150_000
	}
	r := &meter{Reader: m.reader(), step: 500_000}
	c := sampleConfigFor(t)
	got, err := check(c, r, func(err error) error { return err })
	if err != nil {
		t.Fatal(err)
	}
	if !got.Verdict.Pass || got.Log.Turns < 1000 {
		t.Errorf("%+v", got)
	}
	if len(r.heap) < 5 {
		t.Fatalf("%d looks at the heap", len(r.heap))
	}
	first, last := r.heap[0], r.heap[len(r.heap)-1]
	if last > first+300_000 {
		t.Errorf("the heap grew from %d to %d bytes", first, last)
	}
}

// What making the equations linear might lose would show in a long log.
func TestLongLinks(t *testing.T) {
	n := 30_000
	if testing.Short() {
		n = 20_000
	}
	for _, l := range []struct {
		verdict            string
		crank, rod, offset float64
	}{
		{"link: crank", 0.004, 0, 0}, {"link: crank", -0.0002, 0, 0}, {"link: rod", 0, 0.006, 0}, {"link: offset", 0, 0, -0.004},
	} {
		m := good(14)
		m.lines, m.step = n, 0.02
		m.crank, m.rod, m.offset = m.crank+l.crank, m.rod+l.rod, m.offset+l.offset
		r := judged(t, sampleConfigFor(t), m)
		if f := r.Verdict.Faults; len(f) != 1 || f[0] != l.verdict || r.Links.Joint || math.Abs(r.Links.Wrong[0].Value-l.crank-l.rod-l.offset) > 5*r.Links.Wrong[0].Error {
			t.Errorf("%+v: %v, %+v", l, f, r.Links)
		}
	}
}

// Over thousands of turns a belt that creeps by a thousandth of a count a turn is
// found, and its sum is right although only some hundreds of stretches are kept.
func TestLongSlip(t *testing.T) {
	m := good(6)
	m.lines, m.step = 60_000, 0.02
	m.slip = func(turned float64) float64 { return 5e-6 * turned / (2 * math.Pi) }
	r := judged(t, sampleConfigFor(t), m)
	want := -5e-6 * float64(r.Log.Turns)
	if e := r.Slip.Total; len(r.Verdict.Faults) != 1 || r.Verdict.Faults[0] != faultSlip || math.Abs(e.Value-want) > 0.01*math.Abs(want)+5*e.Error {
		t.Errorf("slip %+v of %g, verdict %+v", e, want, r.Verdict)
	}
}

// The standard errors are what they say: over many logs the estimates scatter by them.
func TestStandardErrors(t *testing.T) {
	n := 40
	if testing.Short() {
		n = 12
	}
	c := sampleConfigFor(t)
	var square [3]float64
	for k := range n {
		r := judged(t, c, good(uint64(7000+k)))
		for i, l := range r.Links.All { // all true lengths are as drawn
			z := l.Value / l.Error
			square[i] += z * z / float64(n)
			if math.Abs(z) > 5 {
				t.Errorf("log %d: %s is off by %g standard errors", k, l.Name, z)
			}
		}
	}
	for i, s := range square { // mean of z²: 1 ± √(2/n)
		if tol := 4 * math.Sqrt(2/float64(n)); s > 1+tol || s < max(1-tol, 0.1) {
			t.Errorf("%s: mean square of error over standard error is %.2f", lengths[i].name, s)
		}
	}
}

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
