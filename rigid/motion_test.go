package rigid_test

import (
	"math"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/rigidtest"
)

// within compares motions of a size near 1 with one tolerance for all numbers.
func within(tol float64) cmp.Options {
	t := rigidtest.Tolerance{Pos: tol, Vel: tol, Acc: tol}
	return cmp.Options{rigidtest.Lengths(t), rigidtest.Angles(t)}
}

func check(t *testing.T, what string, want, got any, tol float64) {
	t.Helper()
	if diff := cmp.Diff(want, got, within(tol)); diff != "" {
		t.Errorf("%s (-want +got):\n%s", what, diff)
	}
}

const rounds = 500

func TestCarryIsTheDerivative(t *testing.T) {
	rnd := newRandom(10)
	for range rounds {
		p, x, y := rnd.jetPose(), rnd.jet(), rnd.jet()
		m, local := p.motion(), jetPoint(x, y)
		check(t, "Carry", jetPoint(p.point(x, y)), m.Carry(local), 1e-13)
		check(t, "At", jetPoint(p.point(jet{v: x.v}, jet{v: y.v})), m.At(local.Pos), 1e-13)
		check(t, "Observe", local, m.Observe(jetPoint(p.point(x, y))), 1e-12)
	}
}

func TestComposeIsTheDerivative(t *testing.T) {
	rnd := newRandom(11)
	for range rounds {
		p, q := rnd.jetPose(), rnd.jetPose()
		m, child := p.motion(), q.motion()
		both := p.compose(q).motion()
		check(t, "Compose", both, m.Compose(&child), 1e-13)
		check(t, "Relative", child, both.Relative(&m), 1e-12)
		back := both.Relative(&m)
		check(t, "Compose of Relative", both, m.Compose(&back), 1e-12)
	}
}

// The velocity of a point of the last of three bodies is the derivative of its
// place, the acceleration that of its velocity: by differences over the chain.
func TestDifferences(t *testing.T) {
	rnd := newRandom(12)
	for range 50 {
		var chain [3]jetPose
		var third [3][3]float64
		for i := range chain {
			chain[i] = rnd.jetPose()
			third[i] = [3]float64{rnd.number(), rnd.number(), rnd.number()}
		}
		local := rnd.vec()
		place := func(time float64) r2.Vec {
			var p rigid.Pose
			for i, c := range chain {
				p = p.Compose(rigid.NewPose(c.x.cubic(third[i][0], time), c.y.cubic(third[i][1], time), c.angle.cubic(third[i][2], time)))
			}
			return p.Point(local)
		}
		var m rigid.Motion
		for _, c := range chain {
			link := c.motion()
			m = m.Compose(&link)
		}
		got := m.At(local)
		slow, fast := &fd.Settings{Formula: fd.Central, Step: 1e-6}, &fd.Settings{Formula: fd.Central2nd, Step: 1e-4}
		x, y := func(s float64) float64 { return place(s).X }, func(s float64) float64 { return place(s).Y }
		want := rigid.Point{
			Pos: place(0),
			Vel: r2.Vec{X: fd.Derivative(x, 0, slow), Y: fd.Derivative(y, 0, slow)},
			Acc: r2.Vec{X: fd.Derivative(x, 0, fast), Y: fd.Derivative(y, 0, fast)},
		}
		tol := rigidtest.Tolerance{Pos: 1e-13, Vel: 1e-8, Acc: 1e-5, Relative: 1e-6}
		if diff := cmp.Diff(want, got, rigidtest.Lengths(tol)); diff != "" {
			t.Errorf("chain (-differences +got):\n%s", diff)
		}
	}
}

func TestTermsSum(t *testing.T) {
	rnd := newRandom(13)
	for range rounds {
		m, local := rnd.motion(), rnd.point()
		got := m.Carry(local)
		v, a := m.VelocityTerms(local), m.AccelerationTerms(local)
		check(t, "velocity", got.Vel, v.Sum(), 1e-13)
		check(t, "acceleration", got.Acc, a.Sum(), 1e-13)
		fixed := rigid.Point{Pos: local.Pos}
		check(t, "fixed point", m.At(local.Pos), m.Carry(fixed), 1e-14)
		zero := r2.Vec{}
		if a := m.AccelerationTerms(fixed); a.Relative != zero || a.Coriolis != zero {
			t.Errorf("a fixed point has relative terms: %+v", a)
		}
		// each term by itself, from its definition
		r := r2.Sub(got.Pos, m.Pose.Origin)
		check(t, "terms", rigid.AccelerationTerms{
			Base:       m.Acc,
			Tangential: r2.Vec{X: -m.Alpha * r.Y, Y: m.Alpha * r.X},
			Normal:     r2.Scale(-m.Omega*m.Omega, r),
			Relative:   r2.Rotate(local.Acc, m.Pose.Angle(), zero),
			Coriolis:   r2.Scale(2*m.Omega, r2.Rotate(local.Vel, m.Pose.Angle()+math.Pi/2, zero)),
		}, a, 1e-13)
	}
}

// Symmetries of the plane and of time hold to the last bit: the same products with
// other signs, or other exponents.
func TestSymmetries(t *testing.T) {
	flip := func(v r2.Vec) r2.Vec { return r2.Vec{X: v.X, Y: -v.Y} }
	rnd := newRandom(14)
	for range rounds {
		m, l := rnd.motion(), rnd.point()
		got := m.Carry(l)

		mirrored := rigid.Motion{
			Pose: rigid.Pose{Origin: flip(m.Pose.Origin), Axis: flip(m.Pose.Axis)},
			Vel:  flip(m.Vel), Acc: flip(m.Acc), Omega: -m.Omega, Alpha: -m.Alpha,
		}
		image := func(p rigid.Point) rigid.Point {
			return rigid.Point{Pos: flip(p.Pos), Vel: flip(p.Vel), Acc: flip(p.Acc)}
		}
		check(t, "mirror", image(got), mirrored.Carry(image(l)), 0)

		reversed := m
		reversed.Vel, reversed.Omega = r2.Scale(-1, m.Vel), -m.Omega
		check(t, "time reversal", rigid.Point{Pos: got.Pos, Vel: r2.Scale(-1, got.Vel), Acc: got.Acc},
			reversed.Carry(rigid.Point{Pos: l.Pos, Vel: r2.Scale(-1, l.Vel), Acc: l.Acc}), 0)

		const k = 0x1p-40
		scaled := m
		scaled.Pose.Origin, scaled.Vel, scaled.Acc = r2.Scale(k, m.Pose.Origin), r2.Scale(k, m.Vel), r2.Scale(k, m.Acc)
		small := func(p rigid.Point) rigid.Point {
			return rigid.Point{Pos: r2.Scale(k, p.Pos), Vel: r2.Scale(k, p.Vel), Acc: r2.Scale(k, p.Acc)}
		}
		check(t, "scale", small(got), scaled.Carry(small(l)), 0)

		turned := rigid.Motion{Pose: rigid.NewPose(0, 0, 4*rnd.number())}
		whole := turned.Compose(&m)
		check(t, "rotation", turned.At(got.Pos).Pos, whole.Carry(l).Pos, 1e-13)
		check(t, "rotation", turned.Carry(got), whole.Carry(l), 1e-13)
	}
}

func TestZeroMotion(t *testing.T) {
	var m rigid.Motion
	p := newRandom(15).point()
	if got := m.At(p.Pos); got != (rigid.Point{Pos: p.Pos}) {
		t.Errorf("At: %v", got)
	}
	if got := m.Carry(p); got != p {
		t.Errorf("Carry: %v", got)
	}
	if got := m.Observe(p); got != p {
		t.Errorf("Observe: %v", got)
	}
	other := newRandom(16).motion()
	check(t, "Compose", other, m.Compose(&other), 1e-15)
	check(t, "Compose on the right", other, other.Compose(&m), 1e-15)
	check(t, "Relative", other, other.Relative(&m), 1e-15)
	check(t, "itself", m, other.Relative(&other), 1e-15)
}

// A million links, each turned by an odd angle: the axis stays a unit vector.
func TestLongChain(t *testing.T) {
	n := 1_000_000
	if testing.Short() {
		n = 50_000
	}
	var m rigid.Motion
	link := rigid.Motion{Pose: rigid.NewPose(0, 0, 0.1)}
	for range n {
		m = m.Compose(&link)
	}
	if d := math.Abs(r2.Norm(m.Pose.Axis) - 1); d > 1e-15 {
		t.Errorf("axis is off a unit vector by %g", d)
	}
	if d := math.Abs(rigid.Wrap(m.Pose.Angle() - 0.1*float64(n))); d > 1e-10 {
		t.Errorf("angle is off by %g", d)
	}
}

// With exact numbers the results are exact, whatever their size: powers of two.
func TestScales(t *testing.T) {
	for _, k := range []float64{0x1p-400, 0x1p-20, 1, 0x1p10, 0x1p400} {
		m := rigid.Motion{Pose: rigid.Pose{Origin: r2.Vec{X: k}, Axis: r2.Vec{Y: 1}}, Vel: r2.Vec{Y: k}, Omega: 2, Alpha: 3}
		want := rigid.Point{
			Pos: r2.Vec{X: k, Y: k}, Vel: r2.Vec{X: -2 * k, Y: k}, Acc: r2.Vec{X: -3 * k, Y: -4 * k},
		}
		if got := m.At(r2.Vec{X: k}); got != want {
			t.Errorf("%g: %v, want %v", k, got, want)
		}
	}
}
