package slidercrank_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// turns is one turn of a crank whose speed and acceleration change at every step,
// so that no call waits for the result of the one before.
func turns() []rigid.Coordinate {
	in := make([]rigid.Coordinate, 4096)
	for k := range in {
		in[k] = rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / 4096, Vel: 10 + float64(k%7), Acc: -3 + float64(k%11)}
	}
	return in
}

// benchmarkPress returns an offset slider-crank of the size of a small press.
func benchmarkPress(b *testing.B) *slidercrank.Linkage {
	b.Helper()
	l, err := slidercrank.New(slidercrank.Dimensions{Crank: 0.11, Rod: 0.37, Offset: 0.043})
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	return l
}

func BenchmarkLinkageSolve(b *testing.B) {
	l, in := benchmarkPress(b), turns()
	var st slidercrank.State
	var sum float64
	for n := 0; n < b.N; n += len(in) {
		for _, turn := range in[:min(len(in), b.N-n)] {
			if err := l.Solve(&st, turn); err != nil {
				b.Fatal(err)
			}
			sum += st.Slide.Pos + st.Slide.Vel + st.Slide.Acc + st.Rod.Omega + st.Rod.Alpha
		}
	}
	if math.IsNaN(sum) {
		b.Fatal(sum)
	}
}

func BenchmarkLinkageSolveSlide(b *testing.B) {
	l, in := benchmarkPress(b), turns()
	var st slidercrank.State
	slides := make([]slidercrank.State, len(in))
	for i, turn := range in {
		if err := l.Solve(&slides[i], rigid.Coordinate{Pos: turn.Pos + 1e-3, Vel: turn.Vel, Acc: turn.Acc}); err != nil {
			b.Fatal(err)
		}
	}
	b.ResetTimer()
	var sum float64
	for n := 0; n < b.N; n += len(in) {
		for i := range slides[:min(len(in), b.N-n)] {
			if err := l.SolveSlide(&st, slides[i].Slide, slides[i].Knee); err != nil {
				b.Fatal(err)
			}
			sum += st.Turn.Pos + st.Turn.Vel + st.Turn.Acc + st.Rod.Omega + st.Rod.Alpha
		}
	}
	if math.IsNaN(sum) {
		b.Fatal(sum)
	}
}

func BenchmarkLinkageCoefficients(b *testing.B) {
	l, in := benchmarkPress(b), turns()
	var sum float64
	for n := 0; n < b.N; n += len(in) {
		for _, turn := range in[:min(len(in), b.N-n)] {
			c, err := l.Coefficients(turn.Pos)
			if err != nil {
				b.Fatal(err)
			}
			sum += c.Out + c.First + c.Second
		}
	}
	if math.IsNaN(sum) {
		b.Fatal(sum)
	}
}
