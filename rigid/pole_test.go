package rigid_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// sizes are lengths in m, from micrometres to kilometres and far beyond.
var sizes = []float64{1e-100, 1e-6, 1e-3, 1, 1e3, 1e100}

// sized is a random motion of a machine of the given size, away from ω = 0.
func (r random) sized(size float64) rigid.Motion {
	m := r.motion()
	m.Pose.Origin, m.Vel, m.Acc = r2.Scale(size, m.Pose.Origin), r2.Scale(size, m.Vel), r2.Scale(size, m.Acc)
	m.Omega += math.Copysign(0.5, m.Omega)
	return m
}

func TestPolesRest(t *testing.T) {
	rnd := newRandom(20)
	for _, size := range sizes {
		for range rounds / 5 {
			m := rnd.sized(size)
			p, err := m.Pole()
			if err != nil {
				t.Fatal(err)
			}
			if v := r2.Norm(m.At(m.Pose.Local(p)).Vel); v > 1e-14*size {
				t.Errorf("size %g: the pole moves at %g m/s", size, v)
			}
			p, err = m.AccelerationPole()
			if err != nil {
				t.Fatal(err)
			}
			if a := r2.Norm(m.At(m.Pose.Local(p)).Acc); a > 2e-13*size {
				t.Errorf("size %g: the acceleration pole has %g m/s²", size, a)
			}
		}
	}
}

// Kennedy: the relative poles of three bodies lie on one line; and in the pole two
// bodies have one velocity.
func TestKennedy(t *testing.T) {
	rnd := newRandom(21)
	for _, size := range sizes {
		for range rounds / 5 {
			a, b, c := rnd.sized(size), rnd.sized(size), rnd.sized(size)
			a.Omega, b.Omega, c.Omega = 1+rnd.Float64(), 3+rnd.Float64(), -1-rnd.Float64()
			ab, errAB := rigid.RelativePole(&a, &b)
			bc, errBC := rigid.RelativePole(&b, &c)
			ca, errCA := rigid.RelativePole(&c, &a)
			if err := errors.Join(errAB, errBC, errCA); err != nil {
				t.Fatal(err)
			}
			u, v := r2.Scale(1/size, r2.Sub(bc, ab)), r2.Scale(1/size, r2.Sub(ca, ab))
			if d := r2.Cross(u, v); math.Abs(d) > 1e-12*max(1, r2.Norm(u)*r2.Norm(v)) {
				t.Errorf("size %g: poles %v, %v, %v are off a line by %g", size, ab, bc, ca, d)
			}
			va, vb := a.At(a.Pose.Local(ab)).Vel, b.At(b.Pose.Local(ab)).Vel
			if d := r2.Norm(r2.Sub(va, vb)); d > 1e-13*size {
				t.Errorf("size %g: in their pole the bodies differ by %g m/s", size, d)
			}
		}
	}
}

// Every point of the inflection circle but the pole goes straight on, and no other
// point does: the centre's path bends.
func TestInflectionCircle(t *testing.T) {
	rnd := newRandom(22)
	for _, size := range sizes {
		for range rounds / 5 {
			m := rnd.sized(size)
			circle, err := m.InflectionCircle()
			if err != nil {
				t.Fatal(err)
			}
			pole, _ := m.Pole()
			if d := math.Abs(r2.Norm(r2.Sub(pole, circle.Centre))/circle.Radius - 1); d > 1e-13 {
				t.Errorf("size %g: the circle misses the pole by %g of its radius", size, d)
			}
			out := r2.Sub(circle.Centre, pole)
			for _, angle := range []float64{0, 0.7, -2, 2.5} {
				p := r2.Add(circle.Centre, r2.Rotate(out, angle, r2.Vec{}))
				path, err := m.At(m.Pose.Local(p)).Path()
				if err != nil {
					t.Fatal(err)
				}
				if bend := math.Abs(path.Curvature) * circle.Radius; bend > 1e-11 {
					t.Errorf("size %g: curvature %g/radius on the circle", size, bend)
				}
			}
			path, err := m.At(m.Pose.Local(circle.Centre)).Path()
			if err != nil || math.Abs(path.Curvature)*circle.Radius < 0.5 {
				t.Errorf("size %g: the centre's path is straight: %v, %v", size, path.Curvature, err)
			}
		}
	}
}

func TestPoleErrors(t *testing.T) {
	const huge = math.MaxFloat64
	x := r2.Vec{X: 1}
	for _, c := range []struct {
		why                       string
		m                         rigid.Motion
		pole, acceleration, bends error
	}{
		{"at rest", rigid.Motion{}, rigid.ErrNoPole, rigid.ErrNoPole, rigid.ErrNoPole},
		{"translation", rigid.Motion{Vel: x, Acc: x}, rigid.ErrNoPole, rigid.ErrNoPole, rigid.ErrNoPole},
		{"starting to turn", rigid.Motion{Acc: x, Alpha: 2}, rigid.ErrNoPole, nil, rigid.ErrNoPole},
		{"turning about its origin", rigid.Motion{Omega: 2}, nil, nil, nil},
		{"pole beyond the numbers", rigid.Motion{Vel: r2.Vec{X: 1e300}, Acc: r2.Vec{X: huge}, Omega: 1e-200}, rigid.ErrNoPole, rigid.ErrNoPole, rigid.ErrNoPole},
		{"circle beyond the numbers", rigid.Motion{Acc: r2.Vec{X: 1e300}, Omega: 1e-100}, nil, rigid.ErrNoPole, rigid.ErrNoPole},
		{"NaN place", rigid.Motion{Pose: rigid.NewPose(math.NaN(), 0, 0), Omega: 1}, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"NaN angle", rigid.Motion{Pose: rigid.NewPose(0, 0, math.NaN()), Omega: 1}, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"infinite speed", rigid.Motion{Omega: math.Inf(1)}, rigid.ErrNotFinite, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"ω² overflows", rigid.Motion{Vel: x, Omega: 1e160}, nil, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"√(ω⁴+α²) overflows", rigid.Motion{Acc: x, Omega: 1e154, Alpha: huge}, nil, rigid.ErrNotFinite, nil},
	} {
		p, err := c.m.Pole()
		if err != c.pole || err != nil && p != (r2.Vec{}) {
			t.Errorf("%s: pole %v, %v; want %v", c.why, p, err, c.pole)
		}
		p, err = c.m.AccelerationPole()
		if err != c.acceleration || err != nil && p != (r2.Vec{}) {
			t.Errorf("%s: acceleration pole %v, %v; want %v", c.why, p, err, c.acceleration)
		}
		circle, err := c.m.InflectionCircle()
		if err != c.bends || err != nil && circle != (rigid.Circle{}) {
			t.Errorf("%s: inflection circle %v, %v; want %v", c.why, circle, err, c.bends)
		}
	}
	fast, back := rigid.Motion{Omega: huge}, rigid.Motion{Omega: -huge}
	if _, err := rigid.RelativePole(&fast, &back); err != rigid.ErrNotFinite {
		t.Errorf("difference that overflows: %v", err)
	}
	up, down := rigid.Motion{Vel: r2.Vec{Y: huge}, Omega: 1}, rigid.Motion{Vel: r2.Vec{Y: -huge}}
	if _, err := rigid.RelativePole(&up, &down); err != rigid.ErrNotFinite {
		t.Errorf("difference of velocities that overflows: %v", err)
	}
	a := rigid.Motion{Vel: x, Omega: 3}
	b := rigid.Motion{Omega: 3}
	if _, err := rigid.RelativePole(&a, &b); err != rigid.ErrNoPole {
		t.Errorf("equal angular velocities: %v", err)
	}
}
