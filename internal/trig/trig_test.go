package trig_test

import (
	"encoding/csv"
	"math"
	"math/big"
	"math/rand/v2"
	"os"
	"strconv"
	"testing"

	"example.com/twopoint/internal/trig"
)

const eps = 0x1p-52

// off returns |x − y| for a decimal y of more digits than a float64 has.
func off(t *testing.T, x float64, y string) (diff, size float64) {
	t.Helper()
	b, _, err := big.ParseFloat(y, 10, 120, big.ToNearestEven)
	if err != nil {
		t.Fatal(err)
	}
	size, _ = new(big.Float).Abs(b).Float64()
	diff, _ = b.Sub(b, big.NewFloat(x)).Float64()
	return math.Abs(diff), size
}

func TestSincos(t *testing.T) {
	file, err := os.Open("testdata/cases.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	if err != nil || len(rows) < 300 {
		t.Fatal(len(rows), err)
	}
	for _, row := range rows {
		x, err := strconv.ParseFloat(row[0], 64)
		if err != nil {
			t.Fatal(err)
		}
		sin, cos := trig.Sincos(x)
		rounding := 2e-24 * math.Abs(x) / eps // of the angle's reduction
		if diff, size := off(t, sin, row[1]); diff > eps*(size+rounding) {
			t.Errorf("sin(%v) = %v, off by %.2g", x, sin, diff)
		}
		if diff, size := off(t, cos, row[2]); diff > eps*(size+rounding) {
			t.Errorf("cos(%v) = %v, off by %.2g", x, cos, diff)
		}
	}
}

func TestSincosNotFinite(t *testing.T) {
	for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if sin, cos := trig.Sincos(x); !math.IsNaN(sin) || !math.IsNaN(cos) {
			t.Errorf("Sincos(%v) = %v, %v", x, sin, cos)
		}
	}
}

// TestAngle compares with package math, all round the turn and close to the axes.
func TestAngle(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	check := func(a float64) {
		sin, cos := math.Sincos(a)
		want := math.Atan2(sin, cos)
		if got := trig.Angle(cos, sin); math.Abs(got-want) > 3*eps*math.Abs(want) {
			t.Errorf("Angle(%v, %v) = %v, want %v", cos, sin, got, want)
		}
	}
	for range 100_000 {
		check(math.Pi * (2*r.Float64() - 1))
	}
	for k := -4; k < 4; k++ {
		for e := -300.0; e < 0; e++ {
			check(float64(k)*math.Pi/4 + math.Pow(10, e))
		}
	}
	if got := trig.Angle(-1, 0); got != math.Pi {
		t.Errorf("of (-1, 0): %v", got)
	}
	if got := trig.Angle(-1, math.Copysign(0, -1)); math.Abs(got) != math.Pi {
		t.Errorf("of (-1, -0): %v", got)
	}
	if got := trig.Angle(math.NaN(), math.NaN()); !math.IsNaN(got) {
		t.Errorf("of NaN: %v", got)
	}
}

var sink float64

func BenchmarkSincos(b *testing.B) {
	sum := 0.0
	for i := 0; b.Loop(); i++ {
		sin, cos := trig.Sincos(float64(i & 4095))
		sum += sin * cos
	}
	sink = sum
}

func BenchmarkAngle(b *testing.B) {
	sum := 0.0
	for i := 0; b.Loop(); i++ {
		x := float64(i&1023) * 0x1p-10
		sum += trig.Angle(x, 1-x*x/2)
	}
	sink = sum
}
