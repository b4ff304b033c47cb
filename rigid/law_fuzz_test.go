package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

// series is a law that a fuzzer can bend: a gear, two harmonics and a power.
func series(gear, a, b, n float64) rigid.Law {
	n = math.Mod(math.Abs(n), 20)
	return lawOf(func(x jet) jet {
		s, _ := x.sincos()
		_, c := x.mul(constant(n)).sincos()
		return x.mul(constant(gear)).add(s.mul(constant(a))).add(c.mul(constant(b)))
	})
}

func moderate(x ...float64) bool {
	for _, v := range x {
		if !(math.Abs(v) < 1e6) || v != 0 && math.Abs(v) < 1e-6 {
			return false
		}
	}
	return true
}

// Whatever is asked, Solve says no or gives a place in the stroke where the law is
// at out, and finite rates that bring out's back.
func FuzzSolve(f *testing.F) {
	f.Add(0.0, 1.0, 0.0, 1.0, -1.5, 1.5, 0.3, 1.0, 0.0)
	f.Add(0.0, 1.0, 0.0, 1.0, -math.Pi/2, math.Pi/2, 1.0, 0.0, 0.0)
	f.Add(1.0, 1.0, 0.0, 1.0, -math.Pi, math.Pi, 3.1, 1.0, 2.0)
	f.Add(0.0, 0.0, 1.0, 3.0, 0.0, 9.0, 0.5, 1.0, 1.0)
	f.Add(1e-5, 1e5, 0.3, 2.5, 1e5, 1e5+1, 0.0, 1e300, 0.0)
	f.Add(math.Inf(1), math.NaN(), 1.0, 1.0, 0.0, 1.0, 0.5, 0.0, 0.0)
	f.Fuzz(func(t *testing.T, gear, a, b, n, lo, hi, pos, vel, acc float64) {
		calls := 0
		law, over := counting(series(gear, a, b, n), &calls), rigid.Interval{Lo: lo, Hi: hi}
		in, err := law.Solve(rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, over)
		if calls > 129+2*66 {
			t.Errorf("%d calls", calls)
		}
		if err != nil {
			if in != (rigid.Coordinate{}) {
				t.Errorf("%+v with %v", in, err)
			}
			return
		}
		if !finiteNumbers(in.Pos, in.Vel, in.Acc) || !over.Contains(in.Pos) {
			t.Fatalf("%+v with a nil error", in)
		}
		if !moderate(gear, a, b, lo, hi, pos) {
			return
		}
		c, err := law(in.Pos)
		if err != nil {
			t.Fatal(err)
		}
		scale := math.Abs(gear*lo) + math.Abs(gear*hi) + math.Abs(a) + math.Abs(b) + math.Abs(pos)
		if !(math.Abs(c.Out-pos) <= 0x1p-44*(scale+math.Abs(c.First*in.Pos))) {
			t.Errorf("at %v Out is %v, want %v", in.Pos, c.Out, pos)
		}
		if math.Abs(vel) < 1e6 && !(math.Abs(c.First*in.Vel-vel) <= 1e-14*math.Abs(vel)) {
			t.Errorf("Vel %v gives %v, want %v", in.Vel, c.First*in.Vel, vel)
		}
	})
}

// The dead centres of a law that a fuzzer bends: between two of them, as between them
// and the ends, First keeps its sign wherever a finer sweep looks.
func FuzzExtremes(f *testing.F) {
	f.Add(0.0, 1.0, 0.0, 1.0, 0.0, 6.3)
	f.Add(1.0, 1.0, 0.0, 1.0, -4.0, 4.0)
	f.Add(0.3, 1.0, 0.2, 7.0, -3.0, 5.0)
	f.Add(0.0, 0.0, 0.0, 0.0, 0.0, 1.0)
	f.Add(1e-6, 1e5, 1e-5, 20.0, 1e5, 1e5+1)
	f.Add(math.NaN(), 0.0, 0.0, 0.0, math.Inf(-1), 1.0)
	f.Fuzz(func(t *testing.T, gear, a, b, n, lo, hi float64) {
		law, over := series(gear, a, b, n), rigid.Interval{Lo: lo, Hi: hi}
		strokes, err := law.Strokes(over)
		dead, err2 := law.Extremes(over)
		speed, acc, err3 := law.Peaks(over)
		if err != err2 || err != err3 {
			t.Fatal(err, err2, err3)
		}
		if err != nil {
			if strokes != nil || dead != nil || speed != nil || acc != nil {
				t.Errorf("something with %v", err)
			}
			return
		}
		for _, list := range [][]rigid.Coefficients{dead, speed, acc} {
			for i, c := range list {
				if !over.Contains(c.In) || !finiteNumbers(c.Out, c.First, c.Second) || i > 0 && !(c.In >= list[i-1].In) {
					t.Fatalf("%+v, number %d of %d, in %v", c, i, len(list), over)
				}
			}
		}
		if !moderate(gear, a, b, lo, hi) || hi-lo > 50 || hi-lo < 1e-3 {
			return // steps too coarse for the harmonics, or too fine for rounding
		}
		scale := math.Abs(gear) + math.Abs(a) + 20*math.Abs(b)
		for i, s := range strokes {
			if !(s.Lo < s.Hi) || i > 0 && strokes[i-1].Hi != s.Lo {
				t.Fatalf("stroke %d: %v after %v", i, s, strokes[max(i-1, 0)])
			}
			sign := 0.0
			for c := range law.Sweep(s, 50) {
				if math.Abs(c.First) < 1e-9*scale*(1+math.Abs(c.In)) {
					continue
				}
				if sign*c.First < 0 {
					t.Errorf("First changes sign in stroke %v", s)
				}
				sign = c.First
			}
		}
		if len(strokes) == 0 || strokes[0].Lo != lo || strokes[len(strokes)-1].Hi != hi {
			t.Errorf("%d strokes do not cover %v", len(strokes), over)
		}
	})
}
