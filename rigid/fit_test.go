package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

func TestFitTable(t *testing.T) {
	var worst float64
	for i, row := range readTable(t, "testdata/fit.json") {
		var locals []r2.Vec
		var points []rigid.Point
		for v := row.In; len(v) > 0; v = v[8:] {
			locals = append(locals, r2.Vec{X: v[0], Y: v[1]})
			points = append(points, rigid.Point{
				Pos: r2.Vec{X: v[2], Y: v[3]}, Vel: r2.Vec{X: v[4], Y: v[5]}, Acc: r2.Vec{X: v[6], Y: v[7]},
			})
		}
		m, miss, err := rigid.Fit(locals, points)
		if err != nil {
			t.Fatalf("row %d: %v", i, err)
		}
		e, at := row.errorOf([]float64{m.Pose.Origin.X, m.Pose.Origin.Y, m.Pose.Axis.X, m.Pose.Axis.Y,
			m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha, miss.Pos, miss.Vel, miss.Acc})
		if worst = max(worst, e); e > 4 {
			t.Errorf("row %d, %d points: result %d is off by %.1f units", i, len(locals), at, e)
		}
	}
	t.Logf("worst error %.2f units", worst)
}

// tracked returns points of a body and their motions in the frame, far from the
// origin by far lengths.
func (r random) tracked(n int, size, far float64) (locals []r2.Vec, points []rigid.Point, m rigid.Motion) {
	m = r.sized(size)
	m.Pose.Origin = r2.Add(m.Pose.Origin, r2.Vec{X: far * size, Y: -far * size})
	for range n {
		l := r2.Scale(size, r.vec())
		locals, points = append(locals, l), append(points, m.At(l))
	}
	return locals, points, m
}

// Points of a rigid body give its motion back, at any size and place.
func TestFitRigid(t *testing.T) {
	rnd := newRandom(70)
	for _, size := range []float64{1e-100, 1e-6, 1, 1e3, 1e100} {
		for _, far := range []float64{0, 1e6} {
			for range rounds / 10 {
				locals, points, m := rnd.tracked(3+rnd.IntN(10), size, far)
				got, miss, err := rigid.Fit(locals, points)
				if err != nil {
					t.Fatal(err)
				}
				tol := 1e-14 * (1 + far) * 1e2 // what rounding the places makes
				one := func(m rigid.Motion) rigid.Motion {
					m.Pose.Origin, m.Vel, m.Acc = r2.Scale(1/size, m.Pose.Origin), r2.Scale(1/size, m.Vel), r2.Scale(1/size, m.Acc)
					return m
				}
				check(t, "motion", one(m), one(got), tol)
				if worst := max(miss.Pos, miss.Vel, miss.Acc) / size; worst > tol {
					t.Errorf("size %g, %g away: misfit %g of it", size, far, worst)
				}
			}
		}
	}
}

// No other motion near the fitted one fits better: the residuals are least.
func TestFitIsLeast(t *testing.T) {
	rnd := newRandom(71)
	for range rounds {
		locals, points, _ := rnd.tracked(2+rnd.IntN(6), 1, 0)
		for i := range points {
			points[i].Pos = r2.Add(points[i].Pos, r2.Scale(0.05, rnd.vec()))
			points[i].Vel = r2.Add(points[i].Vel, r2.Scale(0.05, rnd.vec()))
			points[i].Acc = r2.Add(points[i].Acc, r2.Scale(0.05, rnd.vec()))
		}
		m, miss, err := rigid.Fit(locals, points)
		if err != nil {
			t.Fatal(err)
		}
		got := misfit(&m, locals, points)
		check(t, "misfit", got, miss, 1e-13)
		const d = 1e-4
		for _, sign := range []float64{d, -d} {
			for _, way := range []r2.Vec{{X: sign}, {Y: sign}} {
				o := m
				o.Pose.Origin = r2.Add(m.Pose.Origin, way)
				better(t, "origin", misfit(&o, locals, points).Pos, miss.Pos)
				o = m
				o.Vel = r2.Add(m.Vel, way)
				better(t, "velocity", misfit(&o, locals, points).Vel, miss.Vel)
				o = m
				o.Acc = r2.Add(m.Acc, way)
				better(t, "acceleration", misfit(&o, locals, points).Acc, miss.Acc)
			}
			o := m
			o.Pose = m.Pose.Compose(rigid.NewPose(0, 0, sign))
			better(t, "angle", misfit(&o, locals, points).Pos, miss.Pos)
			o = m
			o.Omega += sign
			better(t, "omega", misfit(&o, locals, points).Vel, miss.Vel)
			o = m
			o.Alpha += sign
			better(t, "alpha", misfit(&o, locals, points).Acc, miss.Acc)
		}
	}
}

func better(t *testing.T, what string, other, fitted float64) {
	t.Helper()
	if other <= fitted {
		t.Errorf("another %s fits better: %g, fitted %g", what, other, fitted)
	}
}

func misfit(m *rigid.Motion, locals []r2.Vec, points []rigid.Point) rigid.Misfit {
	var s rigid.Misfit
	for i, p := range points {
		q := m.At(locals[i])
		s.Pos += r2.Norm2(r2.Sub(p.Pos, q.Pos))
		s.Vel += r2.Norm2(r2.Sub(p.Vel, q.Vel))
		s.Acc += r2.Norm2(r2.Sub(p.Acc, q.Acc))
	}
	n := float64(len(points))
	return rigid.Misfit{Pos: math.Sqrt(s.Pos / n), Vel: math.Sqrt(s.Vel / n), Acc: math.Sqrt(s.Acc / n)}
}

// Two points of a bar whose distance is measured 2 mm too long: each is 1 mm off.
func TestFitMisfit(t *testing.T) {
	locals := []r2.Vec{{X: -0.1}, {X: 0.1}}
	points := []rigid.Point{{Pos: r2.Vec{Y: -0.101}}, {Pos: r2.Vec{Y: 0.101}}}
	m, miss, err := rigid.Fit(locals, points)
	if err != nil {
		t.Fatal(err)
	}
	check(t, "pose", rigid.NewPose(0, 0, math.Pi/2), m.Pose, 1e-16)
	near(t, "misfit", miss.Pos, 0.001, 1e-15)
}

func TestFitErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	v := func(xy ...float64) (vs []r2.Vec) {
		for ; len(xy) > 0; xy = xy[2:] {
			vs = append(vs, r2.Vec{X: xy[0], Y: xy[1]})
		}
		return vs
	}
	at := func(xy ...float64) (ps []rigid.Point) {
		for _, p := range v(xy...) {
			ps = append(ps, rigid.Point{Pos: p})
		}
		return ps
	}
	fast := at(0, 0, 1, 0)
	fast[1].Vel.Y = 1e300
	bad := at(0, 0, 1, 0)
	bad[1].Acc.Y = nan
	apart := at(-1, 0, 1, 0)
	apart[0].Vel.X, apart[1].Vel.X = -1e200, 1e200
	for _, c := range []struct {
		why    string
		locals []r2.Vec
		points []rigid.Point
		want   error
	}{
		{"nothing", nil, nil, rigid.ErrInput},
		{"one point", v(0, 0), at(0, 0), rigid.ErrInput},
		{"lists of two lengths", v(0, 0, 1, 0), at(0, 0), rigid.ErrInput},
		{"two points", v(0, 0, 1, 0), at(0, 0, 1, 0), nil},
		{"locals in one place", v(0.1, 0.7, 0.1, 0.7, 0.1, 0.7), at(0, 0, 1, 0, 2, 1), rigid.ErrSingular},
		{"points in one place", v(0, 0, 1, 0, 2, 1), at(0.1, 0.7, 0.1, 0.7, 0.1, 0.7), rigid.ErrSingular},
		{"a mirrored square has no best turn", v(1, 1, -1, 1, -1, -1, 1, -1), at(1, -1, -1, -1, -1, 1, 1, 1), rigid.ErrSingular},
		{"smaller than squares can tell", v(0, 0, 1e-160, 0), at(0, 0, 1, 0), rigid.ErrSingular},
		{"greater than squares can tell", v(0, 0, 1e160, 0), at(0, 0, 1, 0), rigid.ErrNotFinite},
		{"NaN local", v(0, 0, nan, 0), at(0, 0, 1, 0), rigid.ErrNotFinite},
		{"infinite place", v(0, 0, 1, 0), at(0, 0, inf, 0), rigid.ErrNotFinite},
		{"NaN acceleration", v(0, 0, 1, 0), bad, rigid.ErrNotFinite},
		{"ω² overflows", v(0, 0, 1, 0), fast, rigid.ErrNotFinite},
		{"the square of a misfit overflows", v(-1, 0, 1, 0), apart, rigid.ErrNotFinite},
		{"differences overflow", v(0, 0, 1, 0), at(-1e308, 0, 1e308, 0), rigid.ErrNotFinite},
	} {
		m, miss, err := rigid.Fit(c.locals, c.points)
		if err != c.want {
			t.Errorf("%s: %v, want %v", c.why, err, c.want)
		}
		if err != nil && (m != rigid.Motion{} || miss != rigid.Misfit{}) {
			t.Errorf("%s: %v, %v with an error", c.why, m, miss)
		}
	}
}

func FuzzFit(f *testing.F) {
	f.Add(0.0, 0.0, 1.0, 0.0, 0.0, 1.0, 5.0, 5.0, 5.0, 6.0, 4.0, 5.0, 1.0, 2.0)
	f.Add(1e150, 0.0, 1.0, 0.0, 0.0, 1.0, 1e-160, 5.0, 5.0, 6.0, 4.0, 5.0, 1e200, 2.0)
	f.Fuzz(func(t *testing.T, ax, ay, bx, by, cx, cy, px, py, qx, qy, sx, sy, vx, ay2 float64) {
		locals := []r2.Vec{{X: ax, Y: ay}, {X: bx, Y: by}, {X: cx, Y: cy}}
		points := []rigid.Point{{Pos: r2.Vec{X: px, Y: py}}, {Pos: r2.Vec{X: qx, Y: qy}}, {Pos: r2.Vec{X: sx, Y: sy}}}
		points[1].Vel.X, points[2].Acc.Y = vx, ay2
		m, miss, err := rigid.Fit(locals, points)
		if err != nil {
			return
		}
		if !finiteMotion(m) || !finiteNumbers(miss.Pos, miss.Vel, miss.Acc) {
			t.Fatalf("not finite with a nil error: %v, %v", m, miss)
		}
		near(t, "axis", math.Hypot(m.Pose.Axis.X, m.Pose.Axis.Y), 1, 1e-15)
	})
}
