package planar_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// TestBands compares with the bands of the slider-crank by its textbook formula
// (from memory): x = r cos θ + √(l² − r² sin² θ), so
//
//	∂x/∂r = cos θ − r sin² θ/√…   ∂x/∂l = l/√…
//
// and with rams of machines made at random within the tolerances.
func TestBands(t *testing.T) {
	const r, l, turn, tr, tl = 0.05, 0.2, 1.1, 2e-5, 5e-5
	d := tilePress()
	st := pressAt(d, turn)
	dst := make([]rigid.Point, 2)
	if err := st.Sensitivity(dst, Link(3).At(0, 0), d.Hole(Link(1).At(r, 0), X), d.Hole(Link(2).At(l, 0), X)); err != nil {
		t.Fatal(err)
	}
	worst, err := WorstCase(dst, []float64{tr, tl})
	likely, err2 := RootSumSquare(dst, []float64{tr, tl})
	if err = errors.Join(err, err2); err != nil {
		t.Fatal(err)
	}
	sin, cos := math.Sincos(turn)
	root := math.Sqrt(l*l - r*r*sin*sin)
	byR, byL := cos-r*sin*sin/root, l/root
	if want := math.Abs(byR)*tr + math.Abs(byL)*tl; math.Abs(worst.Pos.X-want) > 1e-12*want {
		t.Errorf("worst %g, not %g", worst.Pos.X, want)
	}
	if want := math.Hypot(byR*tr, byL*tl); math.Abs(likely.Pos.X-want) > 1e-12*want {
		t.Errorf("likely %g, not %g", likely.Pos.X, want)
	}
	random := rand.New(rand.NewPCG(1, 2))
	place := func(r, l float64) float64 { return r*cos + math.Sqrt(l*l-r*r*sin*sin) }
	sum, most := 0.0, 0.0
	const n = 20000
	for range n {
		x := place(r+tr*random.NormFloat64(), l+tl*random.NormFloat64()) - place(r, l)
		sum += x * x
		x = place(r+tr*(2*random.Float64()-1), l+tl*(2*random.Float64()-1)) - place(r, l)
		most = max(most, math.Abs(x))
	}
	if rms := math.Sqrt(sum / n); math.Abs(rms/likely.Pos.X-1) > 0.03 {
		t.Errorf("scatter of %g, likely %g", rms, likely.Pos.X)
	}
	if most > worst.Pos.X*(1+1e-3) || most < 0.9*worst.Pos.X {
		t.Errorf("off by %g, worst %g", most, worst.Pos.X)
	}
}

func TestBandErrors(t *testing.T) {
	one := []rigid.Point{{Pos: r2.Vec{X: 1}}}
	for _, c := range []struct {
		name string
		by   []rigid.Point
		tol  []float64
		want error
	}{
		{"too few", one, nil, rigid.ErrInput},
		{"below zero", one, []float64{-1}, rigid.ErrInput},
		{"NaN", one, []float64{math.NaN()}, rigid.ErrNotFinite},
		{"infinite", one, []float64{math.Inf(1)}, rigid.ErrNotFinite},
	} {
		if p, err := WorstCase(c.by, c.tol); !errors.Is(err, c.want) || p != (rigid.Point{}) {
			t.Errorf("%s: %v, %v", c.name, p, err)
		}
		if p, err := RootSumSquare(c.by, c.tol); !errors.Is(err, c.want) || p != (rigid.Point{}) {
			t.Errorf("%s: %v, %v", c.name, p, err)
		}
	}
}
