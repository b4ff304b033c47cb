package slidercrank_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// leverTurn is one turn of a crank whose speed and acceleration change at every
// step, so that no call waits for the result of the one before.
func leverTurn() []rigid.Coordinate {
	in := make([]rigid.Coordinate, 4096)
	for k := range in {
		in[k] = rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / 4096, Vel: 10 + float64(k%7), Acc: -3 + float64(k%11)}
	}
	return in
}

// BenchmarkSlottedLever is one solve of all links and the motion of one point of
// the lever.
func BenchmarkSlottedLever(b *testing.B) {
	l, err := slidercrank.NewSlottedLever(slidercrank.LeverDimensions{Crank: 0.11, Centre: 0.26, Slot: 0.02})
	if err != nil {
		b.Fatal(err)
	}
	in := leverTurn()
	var st slidercrank.LeverState
	var sum r2.Vec
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		if err := l.Solve(&st, in[i&4095]); err != nil {
			b.Fatal(err)
		}
		p := st.Lever.At(r2.Vec{X: 0.55, Y: 0.04})
		sum.X += p.Acc.X + st.Lever.Alpha
	}
	if math.IsNaN(sum.X) {
		b.Fatal(sum)
	}
}
