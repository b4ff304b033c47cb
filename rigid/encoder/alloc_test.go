package encoder_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

var (
	sinkCoordinate rigid.Coordinate
	sinkFloat      float64
	sinkInt        int64
	sinkOK         bool
	sinkError      error
)

func TestNoAllocation(t *testing.T) {
	e, none := encoder.Encoder{PerTurn: 4096}, encoder.Encoder{}
	r := newRates(t, 25, 4)
	now := 0.0
	for _, c := range []struct {
		name string
		call func()
	}{
		{"Angle", func() { sinkInt, sinkFloat, sinkError = e.Angle(12345) }},
		{"Angle refused", func() { sinkInt, sinkFloat, sinkError = none.Angle(12345) }},
		{"Count", func() { sinkInt, sinkError = e.Count(3, 1) }},
		{"Count refused", func() { sinkInt, sinkError = e.Count(3, math.NaN()) }},
		{"Add", func() { now++; sinkCoordinate, sinkFloat, sinkOK = r.Add(now, now*now) }},
		{"Add refused", func() { sinkCoordinate, sinkFloat, sinkOK = r.Add(now, now*now) }},
		{"Reset", r.Reset},
	} {
		if n := testing.AllocsPerRun(100, c.call); n != 0 {
			t.Errorf("%s: %v allocations", c.name, n)
		}
	}
}

func BenchmarkAngle(b *testing.B) {
	b.ReportAllocs()
	e := encoder.Encoder{PerTurn: 4096, Zero: 17}
	for i := int64(0); b.Loop(); i += 7919 {
		sinkInt, sinkFloat, sinkError = e.Angle(i)
	}
}

func BenchmarkAdd(b *testing.B) {
	b.ReportAllocs()
	r := newRates(b, 25, 2)
	for i := 0; b.Loop(); i++ {
		sinkCoordinate, sinkFloat, sinkOK = r.Add(float64(i), float64(i&15))
	}
}
