package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func TestRangeByHand(t *testing.T) {
	pi, whole := math.Pi, []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
	type d = slidercrank.Dimensions
	a := math.Asin
	for _, row := range []struct {
		name string
		d    d
		want []rigid.Interval
	}{
		{"in line", d{Crank: 1, Rod: 3}, whole},
		{"offset", d{Crank: 1, Rod: 3, Offset: -1.9}, whole},
		{"change point, in line", d{Crank: 1, Rod: 1}, whole},
		{"change point, offset", d{Crank: 0.1, Rod: 0.3, Offset: 0.2}, whole},
		{"change point, whose sum rounds down", d{Crank: 0.1, Rod: 0.8, Offset: 0.7}, whole},
		{"change point, offset down", d{Crank: 0.1, Rod: 0.3, Offset: -0.2, Branch: slidercrank.Behind}, whole},
		{"offset up", d{Crank: 1, Rod: 3, Offset: 2.5}, []rigid.Interval{{Lo: a(-0.5), Hi: pi - a(-0.5)}}},
		{"offset down", d{Crank: 1, Rod: 3, Offset: -2.5}, []rigid.Interval{{Lo: pi - a(0.5), Hi: 2*pi + a(0.5)}}},
		{"offset beyond the crank", d{Crank: 1, Rod: 3, Offset: 3.5}, []rigid.Interval{{Lo: a(0.5), Hi: pi - a(0.5)}}},
		{"offset beyond the crank, down", d{Crank: 1, Rod: 3, Offset: -3.5}, []rigid.Interval{{Lo: -pi + a(0.5), Hi: -a(0.5)}}},
		{"short rod, in line", d{Crank: 2, Rod: 1}, []rigid.Interval{{Lo: -a(0.5), Hi: a(0.5)}, {Lo: pi - a(0.5), Hi: pi + a(0.5)}}},
		{"short rod above", d{Crank: 4, Rod: 1, Offset: 2}, []rigid.Interval{{Lo: a(0.25), Hi: a(0.75)}, {Lo: pi - a(0.75), Hi: pi - a(0.25)}}},
		{"short rod below", d{Crank: 4, Rod: 1, Offset: -2}, []rigid.Interval{{Lo: -pi + a(0.25), Hi: -pi + a(0.75)}, {Lo: -a(0.75), Hi: -a(0.25)}}},
		{"short rod, change point above", d{Crank: 2, Rod: 1, Offset: 1}, []rigid.Interval{{Lo: 0, Hi: pi}}},
		{"short rod, change point below", d{Crank: 2, Rod: 1, Offset: -1}, []rigid.Interval{{Lo: -pi, Hi: 0}}},
	} {
		got := newPress(t, row.d).Range()
		if len(got) != len(row.want) {
			t.Errorf("%s: %v, want %v", row.name, got, row.want)
			continue
		}
		for i, w := range row.want {
			if !(math.Abs(got[i].Lo-w.Lo) <= 1e-15*8 && math.Abs(got[i].Hi-w.Hi) <= 1e-15*8 && got[i].Lo >= -pi && got[i].Lo < pi) {
				t.Errorf("%s: %v, want %v", row.name, got, row.want)
			}
		}
	}
}

// TestRangeByReach holds Range against the reach of the rod at random angles.
func TestRangeByReach(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 1))
	for range 2000 {
		d := randomPress(rng)
		l := newPress(t, d)
		over := l.Range()
		if len(over) == 2 && over[0].Hi >= over[1].Lo {
			t.Fatalf("%+v: overlapping ranges %v", d, over)
		}
		for range 20 {
			turn := 20*rng.Float64() - 10
			eta := math.Abs(d.Offset - d.Crank*math.Sin(turn))
			if math.Abs(eta-d.Rod) < 1e-9 {
				continue
			}
			in := false
			for _, o := range over {
				_, ok := o.Angle(turn)
				in = in || ok
			}
			var st slidercrank.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); in != (eta < d.Rod) || in != (err == nil) {
				t.Fatalf("%+v at %v: in range %v, reached %v, error %v", d, turn, in, eta < d.Rod, err)
			}
		}
	}
}

// TestPressureAngles holds the closed forms against a sweep.
func TestPressureAngles(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 2))
	for range 100 {
		l := newPress(t, randomPress(rng))
		least, greatest := l.PressureAngles()
		lo, hi := math.Inf(1), 0.0
		const steps = 500
		for _, over := range l.Range() {
			for k := range steps + 1 {
				st := solved(t, l, rigid.Coordinate{Pos: over.Lo + (over.Hi-over.Lo)*float64(k)/steps})
				p := st.PressureAngle()
				if math.Abs(math.Cos(p)-st.Margin) > 1e-15 {
					t.Fatalf("pressure angle %v, margin %v", p, st.Margin)
				}
				lo, hi = min(lo, p), max(hi, p)
			}
		}
		if lo < least-1e-12 || lo > least+0.05 || hi > greatest+1e-12 || hi < greatest-0.05 {
			t.Errorf("%+v: swept %v to %v, closed form %v to %v", l.Dimensions(), lo, hi, least, greatest)
		}
	}
}
