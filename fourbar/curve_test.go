package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// Watt's curve: the middle of the coupler of the linkage with half frame a = 1.2,
// arms b = 1 and half coupler c = 0.5 lies on the sextic that in polar form is
//
//	r² = b² − (a sin θ ± √(c² − a² cos² θ))²
//
// (https://everything.explained.today/Watt%27s_curve).
func TestCurveOnWattsSextic(t *testing.T) {
	l := mustNew(t, fourbar.Dimensions{Frame: 2.4, Crank: 1, Coupler: 1, Follower: 1, Mount: rigid.Placement{X: -1.2}})
	r := l.Range()[0]
	n := 0
	for p, err := range l.Curve(r2.Vec{X: 0.5}, r, 257) {
		if err != nil && err != rigid.ErrSingular {
			t.Fatal(err)
		}
		x, y := p.Point.Pos.X, p.Point.Pos.Y
		rr := x*x + y*y
		// with sin θ = y/r: (b² − r² − c² + a² − 2a² sin²θ)² = 4 a² sin²θ (c² − a² cos²θ),
		// times r⁴, since the curve passes through the origin
		const a2, b2, c2 = 1.44, 1, 0.25
		yy := y * y
		left := (b2-rr-c2+a2)*rr - 2*a2*yy
		if off := left*left - 4*a2*yy*(c2*rr-a2*x*x); math.Abs(off) > 2e-15 {
			t.Errorf("turn %v: off the sextic by %v", p.Turn, off)
		}
		n++
	}
	if n != 257 {
		t.Errorf("%d points", n)
	}
}

// Curvature from three neighbouring points of the curve, and the centre from it.
func TestCurvePath(t *testing.T) {
	for _, l := range randomLinkages(t, 60) {
		p := r2.Vec{X: 0.3, Y: 0.4}
		turn := inRange(l, 0.4)
		at := func(x float64) r2.Vec {
			var st fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: x}); err != nil {
				t.Fatal(err)
			}
			return st.Coupler.At(p).Pos
		}
		for c, err := range l.Curve(p, rigid.Interval{Lo: turn, Hi: turn}, 2) {
			if err != nil {
				t.Fatal(err)
			}
			const h = 1e-3
			f, g := fd.Settings{Formula: fd.Central, Step: h}, fd.Settings{Formula: fd.Central2nd, Step: h}
			vx := fd.Derivative(func(x float64) float64 { return at(x).X }, turn, &f)
			vy := fd.Derivative(func(x float64) float64 { return at(x).Y }, turn, &f)
			ax := fd.Derivative(func(x float64) float64 { return at(x).X }, turn, &g)
			ay := fd.Derivative(func(x float64) float64 { return at(x).Y }, turn, &g)
			speed := math.Hypot(vx, vy)
			want := (vx*ay - vy*ax) / (speed * speed * speed)
			if math.Abs(c.Path.Curvature-want) > 1e-3*(1+math.Abs(want)) {
				t.Errorf("%+v: curvature %v, want %v", l.Dimensions(), c.Path.Curvature, want)
			}
		}
	}
}

func TestCurveRefuses(t *testing.T) {
	l := randomLinkages(t, 1)[0]
	for _, c := range []struct {
		over rigid.Interval
		n    int
		want error
	}{
		{rigid.Interval{Lo: 0, Hi: 1}, 1, rigid.ErrInput},
		{rigid.Interval{Lo: 1, Hi: 0}, 5, rigid.ErrInput},
		{rigid.Interval{Lo: math.NaN(), Hi: 0}, 5, rigid.ErrNotFinite},
		{rigid.Interval{Lo: 0, Hi: math.Inf(1)}, 5, rigid.ErrNotFinite},
	} {
		n := 0
		for _, err := range l.Curve(r2.Vec{}, c.over, c.n) {
			if n++; err != c.want {
				t.Errorf("%+v: %v, want %v", c, err, c.want)
			}
		}
		if n != 1 {
			t.Errorf("%+v: %d results", c, n)
		}
	}
	// a crank that passes its limits: the curve goes on after the gap
	l = mustNew(t, fourbar.Dimensions{Frame: 7, Crank: 5, Coupler: 6, Follower: 5})
	good, bad := 0, 0
	for _, err := range l.Curve(r2.Vec{X: 1}, rigid.Interval{Lo: -rigid.Revolution, Hi: rigid.Revolution}, 101) {
		if err == nil {
			good++
		} else if err == rigid.ErrUnreachable {
			bad++
		}
	}
	if good == 0 || bad == 0 || good+bad != 101 {
		t.Errorf("%d points, %d outside", good, bad)
	}
}

// A point of the coupler in its pole is at rest: its curve has a cusp there, and on
// both sides of it nearly opposite tangents.
func TestCurveCusp(t *testing.T) {
	l := mustNew(t, crankRocker)
	for k := range 200 {
		turn := 0.3 + float64(k)*0.01
		var st fourbar.State
		if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); err != nil {
			t.Fatal(err)
		}
		pole, err := st.Coupler.Pole()
		p := st.Coupler.Pose.Local(pole)
		if err != nil || r2.Norm(p) > 10*crankRocker.Frame {
			continue
		}
		for c, err := range l.Curve(p, rigid.Interval{Lo: turn, Hi: turn}, 2) {
			if err != nil || !c.Cusp || c.Path != (rigid.Path{}) {
				t.Errorf("at %v: %+v, %v", turn, c, err)
			}
		}
		var beside []rigid.Path
		for c, err := range l.Curve(p, rigid.Interval{Lo: turn - 1e-6, Hi: turn + 1e-6}, 2) {
			if err != nil || c.Cusp {
				t.Errorf("beside %v: %+v, %v", turn, c, err)
			}
			beside = append(beside, c.Path)
		}
		near(t, "cosine across the cusp", r2.Dot(beside[0].Tangent, beside[1].Tangent), -1, 1e-6)
	}
}
