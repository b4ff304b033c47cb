package dyad_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
)

// loop is a dyad whose outer joints run on smooth paths and whose links change
// their lengths, as functions of time.
type loop struct{ a, c, b, l []float64 } // coefficients of t⁰, t¹, t²: a and c of x and then y

func poly(p []float64, t float64) float64 { return p[0] + t*(p[1]+t*p[2]) }

func (m loop) lengths(t float64) (b, c float64) { return poly(m.b, t), poly(m.l, t) }

func (m loop) d(t float64) r2.Vec {
	return r2.Vec{X: poly(m.c[:3], t) - poly(m.a[:3], t), Y: poly(m.c[3:], t) - poly(m.a[3:], t)}
}

// angles are found by the law of cosines, not by the forms of the package.
func (m loop) angles(t, side float64) (ab, cb float64) {
	b, c := m.lengths(t)
	d := m.d(t)
	n := r2.Norm(d)
	at, line := math.Acos((n*n+b*b-c*c)/(2*n*b)), math.Atan2(d.Y, d.X)
	there := math.Acos((n*n + c*c - b*b) / (2 * n * c))
	return line + side*at, line + side*(math.Pi-there)
}

// TestRRRMoving compares the rates of dyads with moving pins and changing lengths
// with differences of the angles.
func TestRRRMoving(t *testing.T) {
	r := rand.New(rand.NewPCG(8, 1))
	six := func() []float64 {
		p := make([]float64, 6)
		for i := range p {
			p[i] = r.NormFloat64()
		}
		return p
	}
	first := &fd.Settings{Formula: fd.Central, Step: 1e-5}
	second := &fd.Settings{Formula: fd.Central2nd, Step: 1e-4}
	tried := 0
	for tried < 300 {
		m := loop{a: six(), c: six(), b: []float64{0.5 + r.Float64(), r.NormFloat64(), r.NormFloat64()}, l: []float64{0.5 + r.Float64(), r.NormFloat64(), r.NormFloat64()}}
		side := float64(1 - 2*r.IntN(2))
		b, c := m.lengths(0)
		k := dyad.NewRRR(b, c)
		var tri dyad.Triangle
		if !k.Place(&tri, m.d(0), side) || k.Margin(&tri) < 0.3 {
			continue
		}
		tried++
		g := dyad.Growth{BVel: m.b[1] / b, BAcc: 2 * m.b[2] / b, CVel: m.l[1] / c, CAcc: 2 * m.l[2] / c}
		w := r2.Vec{X: m.a[1] - m.c[1], Y: m.a[4] - m.c[4]}
		w1, w2 := tri.Rates(r2.Add(w, g.Vel(&tri)))
		z := r2.Vec{X: 2 * (m.a[2] - m.c[2]), Y: 2 * (m.a[5] - m.c[5])}
		a1, a2 := tri.Rates(r2.Add(tri.Bias(z, w1, w2), g.Acc(&tri, w1, w2)))
		ab := func(t float64) float64 { x, _ := m.angles(t, side); return x }
		cb := func(t float64) float64 { _, x := m.angles(t, side); return x }
		size := 1 + w1*w1 + w2*w2 + math.Abs(a1) + math.Abs(a2)
		near(t, "ω of AB", w1, fd.Derivative(ab, 0, first), 1e-6*size*size)
		near(t, "ω of CB", w2, fd.Derivative(cb, 0, first), 1e-6*size*size)
		near(t, "α of AB", a1, fd.Derivative(ab, 0, second), 1e-5*size*size)
		near(t, "α of CB", a2, fd.Derivative(cb, 0, second), 1e-5*size*size)

		one, two := k.Axes(&tri)
		sin, cos := math.Sincos(ab(0))
		near(t, "axis of AB", r2.Norm(r2.Sub(one, r2.Vec{X: cos, Y: sin})), 0, 1e-12)
		sin, cos = math.Sincos(cb(0))
		near(t, "axis of CB", r2.Norm(r2.Sub(two, r2.Vec{X: cos, Y: sin})), 0, 1e-12)
		near(t, "sine at B", k.Margin(&tri), math.Abs(math.Sin(ab(0)-cb(0))), 1e-12)
		near(t, "cosine at B", k.Cos(&tri), math.Cos(ab(0)-cb(0)), 1e-12)

		// of rigid links, all in one
		var p, q dyad.Link
		var same dyad.Triangle
		if !k.Move(&same, &p, &q, m.d(0), w, z, side) {
			t.Error("Move finds no place")
		}
		near(t, "Move: R", r2.Norm(r2.Sub(same.R, tri.R)), 0, 1e-14*b)
		near(t, "Move: Q", r2.Norm(r2.Sub(same.Q, tri.Q)), 0, 1e-14*c)
		near(t, "Move: X", same.X, tri.X, 1e-14*(b*b+c*c))
		near(t, "Move: F", same.F, tri.F, 1e-14*(b*b+c*c)/k.Margin(&tri))
		near(t, "Move: axis of AB", r2.Norm(r2.Sub(p.Axis, one)), 0, 1e-14)
		near(t, "Move: axis of CB", r2.Norm(r2.Sub(q.Axis, two)), 0, 1e-14)
		w1, w2 = tri.Rates(w)
		a1, a2 = tri.Rates(tri.Bias(z, w1, w2))
		size = 1e-13 * (1 + w1*w1 + w2*w2 + math.Abs(a1) + math.Abs(a2)) / k.Margin(&tri)
		near(t, "Move: ω of AB", p.Omega, w1, size)
		near(t, "Move: ω of CB", q.Omega, w2, size)
		near(t, "Move: α of AB", p.Alpha, a1, size/k.Margin(&tri))
		near(t, "Move: α of CB", q.Alpha, a2, size/k.Margin(&tri))
	}
}

// TestRRRReach: at the limits, beyond them, and where the outer joints meet.
func TestRRRReach(t *testing.T) {
	for _, row := range []struct {
		why     string
		b, c, d float64
		ok      bool
		gap     float64
	}{
		{"inside", 3, 4, 5, true, 0},
		{"stretched", 3, 4, 7, true, 0},
		{"folded", 3, 4, 1, true, 0},
		{"too far", 3, 4, 7.5, false, 0.5},
		{"too near", 3, 4, 0.25, false, 0.75},
		{"one point, unequal", 3, 4, 0, false, 1},
		{"one point, equal", 2, 2, 0, false, 0},
		{"one point within rounding", 2, 2, 1e-16, false, 0},
		{"near it", 2, 2, 1e-12, true, 0},
	} {
		k := dyad.NewRRR(row.b, row.c)
		kept := dyad.Triangle{F: 7}
		tri, link := kept, dyad.Link{Omega: 7}
		d := r2.Vec{X: row.d}
		if ok := k.Place(&tri, d, 1); ok != row.ok || !ok && tri != kept {
			t.Errorf("%s: place %v, %+v", row.why, ok, tri)
		}
		if ok := k.Move(&kept, &link, &link, d, d, d, 1); ok != row.ok || !ok && (kept.F != 7 || link.Omega != 7) {
			t.Errorf("%s: move %v", row.why, ok)
		}
		near(t, row.why+": gap", k.Gap(row.d), row.gap, 1e-11)
	}
}

// TestRRRFlatten: both links along the line, a little out of reach.
func TestRRRFlatten(t *testing.T) {
	for _, row := range []struct{ b, c, d, r, q, cos float64 }{
		{3, 4, 7 + 1e-13, 3, -4, -1}, {3, 4, 1 - 1e-13, -3, -4, 1}, {4, 3, 1 - 1e-13, 4, 3, 1},
	} {
		k := dyad.NewRRR(row.b, row.c)
		var tri dyad.Triangle
		k.Flatten(&tri, r2.Vec{Y: row.d})
		near(t, "along AB", tri.R.Y, row.r, 0)
		near(t, "along CB", tri.Q.Y, row.q, 0)
		near(t, "across", tri.R.X, 0, 0)
		near(t, "cosine at B", k.Cos(&tri), row.cos, 1e-15)
		near(t, "margin", k.Margin(&tri), 0, 0)
	}
}

// TestRRRShort: the axes are unit vectors also where a link is shorter than the
// rounding of the others.
func TestRRRShort(t *testing.T) {
	for _, ratio := range []float64{1e-4, 1e-9, 1e-16, 1e-30} {
		k := dyad.NewRRR(ratio, 1)
		var tri dyad.Triangle
		k.Flatten(&tri, r2.Vec{X: 0.6, Y: 0.8})
		k.Place(&tri, r2.Vec{X: 0.6, Y: 0.8}, 1)
		one, two := k.Axes(&tri)
		near(t, "length of AB", r2.Norm(one), 1, 4e-16)
		near(t, "length of CB", r2.Norm(two), 1, 4e-16)
	}
}
