package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

func TestGuidedTable(t *testing.T) {
	var worst float64
	for i, row := range readTable(t, "testdata/guided.json") {
		v := func(k int) r2.Vec { return r2.Vec{X: row.In[k], Y: row.In[k+1]} }
		body, slide, err := rigid.Guided(rigid.Point{Pos: v(2), Vel: v(4), Acc: v(6)}, v(0), v(8))
		if err != nil {
			t.Fatalf("row %d: %v", i, err)
		}
		e, at := row.errorOf([]float64{body.Pose.Axis.X, body.Pose.Axis.Y, body.Omega, body.Alpha, slide.Vel, slide.Acc})
		if worst = max(worst, e); e > 4 {
			t.Errorf("row %d: result %d is off by %.1f units", i, at, e)
		}
	}
	t.Logf("worst error %.2f units", worst)
}

// The guided point moves along its line, and the known point as given.
func TestGuided(t *testing.T) {
	rnd := newRandom(60)
	for range rounds {
		a, b, along := rnd.point(), rnd.vec(), rnd.vec()
		body, slide, err := rigid.Guided(a, b, along)
		if err != nil {
			t.Fatal(err)
		}
		check(t, "known point", a, body.At(r2.Vec{}), 0)
		end := body.At(body.Pose.Local(b))
		u := r2.Unit(along)
		margin := math.Abs(r2.Dot(u, body.Pose.Axis))
		size := max(1, body.Omega*body.Omega, math.Abs(body.Alpha)) / margin
		check(t, "place", b, end.Pos, 1e-14)
		check(t, "velocity", r2.Scale(slide.Vel, u), end.Vel, 1e-14*size)
		check(t, "acceleration", r2.Scale(slide.Acc, u), end.Acc, 1e-13*size)
		near(t, "y of b in the body", body.Pose.Local(b).Y, 0, 1e-15)
		if slide.Pos != 0 {
			t.Errorf("slide.Pos = %g", slide.Pos)
		}
	}
}

func TestGuidedSymmetries(t *testing.T) {
	rnd := newRandom(61)
	for range rounds {
		a, b, along := rnd.point(), rnd.vec(), rnd.vec()
		body, slide, _ := rigid.Guided(a, b, along)
		// the other direction of the same line
		back, slideBack, err := rigid.Guided(a, b, r2.Scale(-4, along))
		if err != nil {
			t.Fatal(err)
		}
		if back != body || slideBack.Vel != -slide.Vel || slideBack.Acc != -slide.Acc {
			t.Errorf("reversed: %v, %v; want %v, %v less", back, slideBack, body, slide)
		}
		// scaled by a power of two
		const k = 0x1p-300
		small := rigid.Point{Pos: r2.Scale(k, a.Pos), Vel: r2.Scale(k, a.Vel), Acc: r2.Scale(k, a.Acc)}
		tiny, slideTiny, err := rigid.Guided(small, r2.Scale(k, b), r2.Scale(1/k, along))
		if err != nil {
			t.Fatal(err)
		}
		if tiny.Omega != body.Omega || tiny.Alpha != body.Alpha || slideTiny.Vel != k*slide.Vel || slideTiny.Acc != k*slide.Acc {
			t.Errorf("scaled: %v, %v; want %v, %v", tiny, slideTiny, body, slide)
		}
	}
}

func TestGuidedErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	x, y := r2.Vec{X: 1}, r2.Vec{Y: 1}
	moving := rigid.Point{Vel: x}
	still := rigid.Point{}
	for _, c := range []struct {
		why      string
		a        rigid.Point
		b, along r2.Vec
		want     error
	}{
		{"along the body", moving, x, x, nil},
		{"square to the body", moving, y, x, rigid.ErrSingular},
		{"square to the body, accelerating", rigid.Point{Acc: x}, y, x, rigid.ErrSingular},
		{"square to the body, place only", still, y, x, nil},
		{"just below the least margin", moving, r2.Vec{X: 0.99e-8, Y: 1}, x, rigid.ErrSingular},
		{"just above the least margin", moving, r2.Vec{X: 1.01e-8, Y: 1}, x, nil},
		{"the same on the other side", moving, r2.Vec{X: -0.99e-8, Y: 1}, x, rigid.ErrSingular},
		{"the same on the other side", moving, r2.Vec{X: -1.01e-8, Y: 1}, x, nil},
		{"one place", moving, r2.Vec{}, x, rigid.ErrSingular},
		{"one place, at rest", still, r2.Vec{}, x, rigid.ErrSingular},
		{"no direction", moving, x, r2.Vec{}, rigid.ErrSingular},
		{"NaN b", still, r2.Vec{Y: nan}, x, rigid.ErrNotFinite},
		{"NaN place", rigid.Point{Pos: r2.Vec{X: nan}}, x, x, rigid.ErrNotFinite},
		{"NaN velocity", rigid.Point{Vel: r2.Vec{Y: nan}}, x, x, rigid.ErrNotFinite},
		{"infinite acceleration", rigid.Point{Acc: r2.Vec{X: inf}}, x, x, rigid.ErrNotFinite},
		{"infinite line", still, x, r2.Vec{X: inf}, rigid.ErrNotFinite},
		{"distance overflows", rigid.Point{Pos: r2.Vec{X: -1e308}}, r2.Vec{X: 1e308}, x, rigid.ErrNotFinite},
		{"length overflows", still, r2.Vec{X: 1.7e308, Y: 1.7e308}, x, nil},
		{"length overflows", moving, r2.Vec{X: 1.7e308, Y: 1.7e308}, x, rigid.ErrNotFinite},
		{"rate overflows", rigid.Point{Vel: r2.Vec{Y: 1e200}}, r2.Vec{X: 1e-200}, x, rigid.ErrNotFinite},
		{"slide's acceleration alone overflows", rigid.Point{Acc: r2.Vec{Y: 1e303}}, r2.Vec{X: 1e-4, Y: 1e3}, x, rigid.ErrNotFinite},
		{"subnormal sizes", rigid.Point{Vel: r2.Vec{X: 5e-324}}, r2.Vec{X: 5e-324}, r2.Vec{X: 5e-324}, nil},
	} {
		body, slide, err := rigid.Guided(c.a, c.b, c.along)
		if err != c.want {
			t.Errorf("%s: %v, want %v", c.why, err, c.want)
		}
		if err != nil && (body != rigid.Motion{} || slide != rigid.Coordinate{}) {
			t.Errorf("%s: %v, %v with an error", c.why, body, slide)
		}
	}
	body, slide, err := rigid.Guided(rigid.Point{Pos: r2.Vec{Y: 1}}, r2.Vec{Y: 3}, x)
	if want := (rigid.Motion{Pose: rigid.Pose{Origin: r2.Vec{Y: 1}, Axis: y}}); err != nil || body != want || slide != (rigid.Coordinate{}) {
		t.Errorf("place only: %v, %v, %v", body, slide, err)
	}
}

func FuzzGuided(f *testing.F) {
	f.Add(0.0, 0.0, 1.0, 0.0, 0.0, 2.0, 3.0, 1.0, 1.0, 0.0)
	f.Add(0.0, 0.0, 1.0, 0.0, 0.0, 2.0, 0.0, 1.0, 1.0, 1e-8)
	f.Add(1e300, 0.0, 1e10, 0.0, 0.0, 2.0, -1e300, 1.0, 5e-324, 0.0)
	f.Fuzz(func(t *testing.T, ax, ay, vx, vy, cx, cy, bx, by, lx, ly float64) {
		a := rigid.Point{Pos: r2.Vec{X: ax, Y: ay}, Vel: r2.Vec{X: vx, Y: vy}, Acc: r2.Vec{X: cx, Y: cy}}
		along := r2.Vec{X: lx, Y: ly}
		body, slide, err := rigid.Guided(a, r2.Vec{X: bx, Y: by}, along)
		if err != nil {
			return
		}
		if !finiteMotion(body) || !finiteNumbers(slide.Vel, slide.Acc) {
			t.Fatalf("not finite with a nil error: %v, %v", body, slide)
		}
		near(t, "axis", math.Hypot(body.Pose.Axis.X, body.Pose.Axis.Y), 1, 1e-15)
		if at := body.At(r2.Vec{}); at != a {
			t.Errorf("the known point moves as %v, not %v", at, a)
		}
	})
}

func finiteNumbers(x ...float64) bool {
	for _, v := range x {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}

func finiteMotion(m rigid.Motion) bool {
	return finiteNumbers(m.Pose.Origin.X, m.Pose.Origin.Y, m.Pose.Axis.X, m.Pose.Axis.Y,
		m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha)
}
