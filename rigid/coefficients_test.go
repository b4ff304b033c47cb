package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/diff/fd"

	"example.com/twopoint/rigid"
)

// sine and square are outputs whose derivatives are known.
func sine(x float64) rigid.Coefficients {
	s, c := math.Sincos(x)
	return rigid.Coefficients{In: x, Out: s, First: c, Second: -s}
}

func square(x float64) rigid.Coefficients {
	return rigid.Coefficients{In: x, Out: x * x, First: 2 * x, Second: 2}
}

// The output's rates are the derivatives by time of the output along a motion.
func TestCoefficientsOutput(t *testing.T) {
	rnd := newRandom(80)
	for range rounds {
		in := rigid.Coordinate{Pos: rnd.number(), Vel: rnd.number(), Acc: rnd.number()}
		got := sine(in.Pos).Output(in.Vel, in.Acc)
		out := func(dt float64) float64 { return math.Sin(in.After(dt).Pos) }
		near(t, "Pos", got.Pos, out(0), 0)
		near(t, "Vel", got.Vel, fd.Derivative(out, 0, &fd.Settings{Formula: fd.Central, Step: 1e-6}), 1e-8)
		near(t, "Acc", got.Acc, fd.Derivative(out, 0, &fd.Settings{Formula: fd.Central2nd, Step: 1e-4}), 1e-5)
	}
}

func TestCoefficientsThen(t *testing.T) {
	rnd := newRandom(81)
	for range rounds {
		x := rnd.number()
		got := sine(x).Then(square(math.Sin(x)))
		near(t, "In", got.In, x, 0)
		near(t, "Out", got.Out, math.Sin(x)*math.Sin(x), 1e-15)
		near(t, "First", got.First, math.Sin(2*x), 1e-15)
		near(t, "Second", got.Second, 2*math.Cos(2*x), 1e-15)
	}
}

// The way there and back is no way at all; and the inverse of the sine is the
// textbook's arc sine.
func TestCoefficientsInverse(t *testing.T) {
	rnd := newRandom(82)
	for range rounds {
		x := 0.7 * rnd.number() // within ±1.4
		inv, err := sine(x).Inverse()
		if err != nil {
			t.Fatal(err)
		}
		y := math.Sin(x)
		root := math.Sqrt(1 - y*y)
		near(t, "In", inv.In, y, 0)
		near(t, "Out", inv.Out, x, 0)
		near(t, "First", inv.First, 1/root, 1e-13)
		near(t, "Second", inv.Second, y/(root*root*root), 1e-12)
		same := sine(x).Then(inv)
		near(t, "First of both", same.First, 1, 1e-14)
		near(t, "Second of both", same.Second, 0, 1e-12)
		back, err := inv.Inverse()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "First of twice", back.First, math.Cos(x), 1e-14)
		near(t, "Second of twice", back.Second, -y, 1e-13)
	}
}

func TestCoefficientsErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		why  string
		c    rigid.Coefficients
		want error
	}{
		{"zero", rigid.Coefficients{}, rigid.ErrSingular},
		{"dead centre", rigid.Coefficients{Out: 1, Second: -1}, rigid.ErrSingular},
		{"dead centre from below", rigid.Coefficients{First: math.Copysign(0, -1)}, rigid.ErrSingular},
		{"First too small to invert", rigid.Coefficients{First: 1e-309}, rigid.ErrSingular},
		{"Second overflows", rigid.Coefficients{First: 1e-110, Second: 1}, rigid.ErrSingular},
		{"next to a dead centre", rigid.Coefficients{First: 1e-100, Second: 1}, nil},
		{"NaN In", rigid.Coefficients{In: nan, First: 1}, rigid.ErrNotFinite},
		{"NaN Out", rigid.Coefficients{Out: nan, First: 1}, rigid.ErrNotFinite},
		{"infinite First", rigid.Coefficients{First: inf}, rigid.ErrNotFinite},
		{"infinite Second", rigid.Coefficients{First: 1, Second: -inf}, rigid.ErrNotFinite},
	} {
		got, err := c.c.Inverse()
		if err != c.want || err != nil && got != (rigid.Coefficients{}) {
			t.Errorf("%s: %v, %v; want %v", c.why, got, err, c.want)
		}
		if err == nil && !finiteNumbers(got.In, got.Out, got.First, got.Second) {
			t.Errorf("%s: %v with a nil error", c.why, got)
		}
	}
}
