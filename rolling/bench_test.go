package rolling_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// inputs are independent, so that no call waits for the result of the one before.
func inputs() []rigid.Coordinate {
	in := make([]rigid.Coordinate, 4096)
	for k := range in {
		in[k] = rigid.Coordinate{Pos: 2 * math.Pi * float64(k) / 4096, Vel: 10 + float64(k%7), Acc: -3 + float64(k%11)}
	}
	return in
}

// BenchmarkSincos is the yardstick of the next one.
func BenchmarkSincos(b *testing.B) {
	in, sum := inputs(), 0.0
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		s, c := math.Sincos(in[i&4095].Pos)
		sum += s + c
	}
	if math.IsNaN(sum) {
		b.Fatal(sum)
	}
}

func BenchmarkWheel(b *testing.B) {
	for name, ground := range map[string]float64{"Line": 0, "Outside": 2, "Inside": -2} {
		b.Run(name, func(b *testing.B) {
			w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: 0.3, Ground: ground, Mount: rigid.Placement{X: 1, Angle: 0.2}})
			if err != nil {
				b.Fatal(err)
			}
			in, sum := inputs(), 0.0
			var st rolling.WheelState
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				if err := w.Solve(&st, in[i&4095]); err != nil {
					b.Fatal(err)
				}
				sum += st.Contact.Acc.X + st.Wheel.Pose.Axis.X
			}
			if math.IsNaN(sum) {
				b.Fatal(sum)
			}
		})
	}
}

func BenchmarkPair(b *testing.B) {
	p := pair(b, rolling.PairDimensions{TeethA: 23, TeethB: 81, Centres: 0.26})
	in := inputs()
	var st rolling.PairState
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		if err := p.Solve(&st, in[i&4095]); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkTrain is a train of seven members and two drives.
func BenchmarkTrain(b *testing.B) {
	tr := train(b, coupledAnnuli())
	in, dst := inputs(), make([]rigid.Coordinate, 7)
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		if err := tr.Solve(dst, in[i&4095], in[(i+7)&4095]); err != nil {
			b.Fatal(err)
		}
	}
}
