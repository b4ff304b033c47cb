package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// sweep is one turn of a crank whose speed and acceleration change at every step,
// so that no call waits for the result of the one before.
func sweep() []rigid.Coordinate {
	in := make([]rigid.Coordinate, 4096)
	for k := range in {
		in[k] = rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / 4096, Vel: 10 + float64(k%7), Acc: -3 + float64(k%11)}
	}
	return in
}

// BenchmarkSolve is one solve and the motion of one point of the coupler.
func BenchmarkSolve(b *testing.B) {
	l, err := fourbar.New(fourbar.Dimensions{
		Frame: math.Hypot(4, 0.3), Crank: 1.1, Coupler: 3.5, Follower: 2.7,
		Mount: rigid.Placement{Angle: math.Atan2(0.3, 4)},
	})
	if err != nil {
		b.Fatal(err)
	}
	in := sweep()
	var st fourbar.State
	var sum rigid.Point
	var w, al float64
	b.ReportAllocs()
	for n := 0; n < b.N; {
		for _, c := range in[:min(len(in), b.N-n)] {
			if err := l.Solve(&st, c); err != nil {
				b.Fatal(err)
			}
			p := st.Coupler.At(r2.Vec{X: 1.9, Y: 1.2})
			sum.Pos.X += p.Pos.X
			sum.Pos.Y += p.Pos.Y
			sum.Vel.X += p.Vel.X
			sum.Vel.Y += p.Vel.Y
			sum.Acc.X += p.Acc.X
			sum.Acc.Y += p.Acc.Y
			w += st.Follower.Omega
			al += st.Follower.Alpha
			n++
		}
	}
	if math.IsNaN(sum.Pos.X + sum.Pos.Y + sum.Vel.X + sum.Acc.X + w + al) {
		b.Fatal(sum)
	}
}
