package planar_test

import (
	"math"
	"runtime"
	"testing"

	. "example.com/twopoint/planar"
)

// turning yields so many samples of a press with a crank of 50.2 mm, made as they
// are asked for, and notes how much of the heap is in use on the way.
func turning(n int, most *uint64) func(yield func(Sample, error) bool) {
	return func(yield func(Sample, error) bool) {
		const crank, rod = 0.0502, 0.2
		in, out := make([]float64, 1), make([]float64, 1)
		for i := range n {
			in[0] = 0.37 * float64(i)
			sin, cos := math.Sincos(in[0])
			out[0] = crank*cos + math.Sqrt(rod*rod-crank*crank*sin*sin)
			if i%(n/4) == n/8 {
				var m runtime.MemStats
				runtime.GC()
				runtime.ReadMemStats(&m)
				*most = max(*most, m.HeapAlloc)
			}
			if !yield(Sample{In: in, Out: out}, nil) {
				return
			}
		}
	}
}

// TestCalibrateMemory: a log a hundred times as long takes no more memory, and
// nothing is allocated for a sample.
func TestCalibrateMemory(t *testing.T) {
	d := tilePress()
	st := pressAt(d, 0)
	c := Calibration{
		Outputs: []Drive{Slide{Of: Link(3).Line(0, 0, 0), From: Frame.Line(0, 0, 0)}},
		By:      []Dimension{d.Hole(Link(1).At(0.05, 0), X), d.Hole(Link(2).At(0.2, 0), X)},
	}
	short, long := 500, 20_000
	if testing.Short() {
		long = 5000
	}
	use := func(n int) (heap uint64, allocations float64) {
		allocations = testing.AllocsPerRun(1, func() {
			found, err := st.Calibrate(turning(n, &heap), c)
			if err != nil || math.Abs(found.Change[0]-2e-4) > 1e-12 || found.Readings != n {
				t.Fatalf("%+v, %v", found, err)
			}
		})
		return heap, allocations
	}
	heap, allocations := use(short)
	heapLong, allocationsLong := use(long)
	if heapLong > heap+1<<18 {
		t.Errorf("%d samples take %d bytes, %d take %d", short, heap, long, heapLong)
	}
	if allocationsLong > 3*allocations+100 {
		t.Errorf("%d samples take %g allocations, %d take %g", short, allocations, long, allocationsLong)
	}
}

func BenchmarkCalibrate(b *testing.B) {
	d := tilePress()
	st := pressAt(d, 0)
	c := Calibration{
		Outputs: []Drive{Slide{Of: Link(3).Line(0, 0, 0), From: Frame.Line(0, 0, 0)}},
		By:      []Dimension{d.Hole(Link(1).At(0.05, 0), X), d.Hole(Link(2).At(0.2, 0), X)},
	}
	b.ReportAllocs()
	passes := 0
	for b.Loop() {
		var heap uint64
		found, err := st.Calibrate(turning(10_000, &heap), c)
		if err != nil {
			b.Fatal(err)
		}
		passes += found.Passes
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(10_000*passes), "ns/sample")
}
