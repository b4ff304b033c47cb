package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestTableLaw holds splines against what they go through, and refuses bad tables.
func TestTableLaw(t *testing.T) {
	in := []float64{0, 0.5, 1.5, 2, 3.2}
	cubic := func(x float64) float64 { return 1 + x - 2*x*x + 0.5*x*x*x }
	out := make([]float64, len(in))
	for i, x := range in {
		out[i] = cubic(x)
	}
	law, err := TableLaw(in, out, 0)
	if err != nil {
		t.Fatal(err)
	}
	for x := 0.0; x <= 3.2; x += 0.05 {
		k, err := law(x)
		if err != nil || math.Abs(k.Out-cubic(x)) > 1e-14 || math.Abs(k.First-(1-4*x+1.5*x*x)) > 1e-13 || math.Abs(k.Second-(3*x-4)) > 1e-12 {
			t.Errorf("%v: %v, %v", x, k, err)
		}
	}
	for _, x := range []float64{-1e-9, 3.21} {
		if _, err := law(x); err != rigid.ErrUnreachable {
			t.Error(x, err)
		}
	}
	if _, err := law(math.NaN()); err != rigid.ErrNotFinite {
		t.Error(err)
	}
	sine, err := TableLaw([]float64{0, 1, 2, 3, 4, 5}, []float64{0, math.Sqrt(0.75), math.Sqrt(0.75), 0, -math.Sqrt(0.75), -math.Sqrt(0.75)}, 6)
	if err != nil {
		t.Fatal(err)
	}
	for x := -20.0; x < 20; x += 0.13 {
		a, _ := sine(x)
		b, _ := sine(x + 12)
		m, _ := sine(-x)
		if math.Abs(a.Out-b.Out) > 1e-13 || math.Abs(a.Second-b.Second) > 1e-12 || math.Abs(a.Out+m.Out) > 1e-13 || math.Abs(a.First-m.First) > 1e-13 {
			t.Errorf("%v: %v, %v, %v", x, a, b, m)
		}
	}
	for k := range 6 { // second derivatives meet
		a, _ := sine(float64(k) - 1e-12)
		b, _ := sine(float64(k) + 1e-12)
		if math.Abs(a.Second-b.Second) > 1e-9 || math.Abs(a.First-b.First) > 1e-9 {
			t.Errorf("%v: %v, %v", k, a, b)
		}
	}
	// A cam's lift every 30°, and the periodic spline through it by SciPy's CubicSpline
	// (a reference library for such splines) at 90° and 77°.
	var degrees, lift []float64
	for i, v := range []float64{20, 20, 21.5, 27, 33, 38.5, 40, 40, 37, 30, 23, 20.3} {
		degrees, lift = append(degrees, float64(30*i)), append(lift, v)
	}
	cam, err := TableLaw(degrees, lift, 360)
	if err != nil {
		t.Fatal(err)
	}
	a, _ := cam(90)
	b, _ := cam(77 - 720)
	if math.Abs(a.First-0.20547435897435892) > 1e-15 || math.Abs(b.Second*180/math.Pi-0.12971862423265262) > 1e-14 {
		t.Errorf("%v, %v", a, b)
	}
	nan := math.NaN()
	for name, bad := range map[string]struct {
		in, out []float64
		period  float64
		is      error
	}{
		"short":     {in[:3], out[:3], 0, rigid.ErrInput},
		"lengths":   {in, out[:4], 0, rigid.ErrInput},
		"falls":     {[]float64{0, 1, 1, 2}, out[:4], 0, rigid.ErrInput},
		"NaN":       {[]float64{0, 1, nan, 2}, out[:4], 0, rigid.ErrNotFinite},
		"out NaN":   {in[:4], []float64{0, 1, nan, 2}, 0, rigid.ErrNotFinite},
		"period":    {in, out, 3.2, rigid.ErrInput},
		"no period": {in, out, nan, rigid.ErrInput},
	} {
		if _, err := TableLaw(bad.in, bad.out, bad.period); !errors.Is(err, bad.is) {
			t.Errorf("%s: %v", name, err)
		}
	}
}
