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
		m.lines = 60_000
	}
	r := &meter{Reader: m.reader(), step: 250_000}
	c := sampleConfigFor(t)
	got, err := check(c, r, func(err error) error { return err })
	if err != nil {
		t.Fatal(err)
	}
	if !got.Verdict.Pass || got.Log.Turns < m.lines/200 {
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
		n = 8_000
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
	if testing.Short() {
		m.lines = 30_000
	}
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
		n = 8
	}
	c := sampleConfigFor(t)
	var square [4]float64
	for k := range n {
		r := judged(t, c, good(uint64(7000+k)))
		for i, l := range append(r.Links.All, link{"slip", r.Slip.Total}) { // all are 0 in truth
			z := l.Value / l.Error
			square[i] += z * z / float64(n)
			if math.Abs(z) > 5 {
				t.Errorf("log %d: %s is off by %g standard errors", k, l.Name, z)
			}
		}
	}
	for i, s := range square { // mean of z²: 1 ± √(2/n)
		if tol := 4 * math.Sqrt(2/float64(n)); s > 1+tol || s < max(1-tol, 0.1) {
			t.Errorf("%s: mean square of error over standard error is %.2f", []string{"crank", "rod", "offset", "slip"}[i], s)
		}
	}
}
