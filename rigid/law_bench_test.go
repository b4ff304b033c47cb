package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

// The way back against the law itself: what a control loop pays for a ram that leads.
func BenchmarkLaw(b *testing.B) {
	press := sliderCrank(0.05, 0.2, 0.01)
	over := rigid.Interval{Lo: 0.2, Hi: 3}
	back, err := press.Inverse(over)
	if err != nil {
		b.Fatal(err)
	}
	var in, out [1024]float64
	for i := range in {
		in[i] = 1.6 + 1.4*math.Sin(float64(i))
		c, err := press(in[i])
		if err != nil {
			b.Fatal(err)
		}
		out[i] = c.Out
	}
	b.Run("forth", func(b *testing.B) {
		b.ReportAllocs()
		for i := 0; b.Loop(); i++ {
			sinkAny.coefficients, sinkError = press(in[i%len(in)])
		}
	})
	b.Run("Inverse", func(b *testing.B) {
		b.ReportAllocs()
		for i := 0; b.Loop(); i++ {
			sinkAny.coefficients, sinkError = back(out[i%len(out)])
		}
	})
	b.Run("Solve", func(b *testing.B) {
		b.ReportAllocs()
		for i := 0; b.Loop(); i++ {
			sinkAny.coordinate, sinkError = press.Solve(rigid.Coordinate{Pos: out[i%len(out)], Vel: 1}, over)
		}
	})
	b.Run("Extremes", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			if _, sinkError = press.Extremes(turn); sinkError != nil {
				b.Fatal(sinkError)
			}
		}
	})
}
