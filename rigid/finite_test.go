package rigid_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// Every single number that is NaN or infinite is refused, by whatever takes it.
func TestNotFinite(t *testing.T) {
	var m, other rigid.Motion
	var p rigid.Point
	var b, along r2.Vec
	var locals []r2.Vec
	var points []rigid.Point
	var path rigid.Path
	fresh := func() {
		rnd := newRandom(95)
		m, other, p, b, along = rnd.motion(), rnd.motion(), rnd.point(), rnd.vec(), rnd.vec()
		locals, points, _ = rnd.tracked(3, 1, 0)
		path, _ = p.Path()
	}
	of := func(vs ...*r2.Vec) (xs []*float64) {
		for _, v := range vs {
			xs = append(xs, &v.X, &v.Y)
		}
		return xs
	}
	ofPoint := func(p *rigid.Point) []*float64 { return of(&p.Pos, &p.Vel, &p.Acc) }
	ofMotion := func(m *rigid.Motion) []*float64 {
		return append(of(&m.Pose.Origin, &m.Pose.Axis, &m.Vel, &m.Acc), &m.Omega, &m.Alpha)
	}
	for _, c := range []struct {
		name    string
		numbers func() []*float64
		call    func() error
	}{
		{"Pole", func() []*float64 { return ofMotion(&m) }, func() error { _, err := m.Pole(); return err }},
		{"AccelerationPole", func() []*float64 { return ofMotion(&m) }, func() error { _, err := m.AccelerationPole(); return err }},
		{"InflectionCircle", func() []*float64 { return ofMotion(&m) }, func() error { _, err := m.InflectionCircle(); return err }},
		{"RelativePole", func() []*float64 { return append(ofMotion(&m), ofMotion(&other)...) },
			func() error { _, err := rigid.RelativePole(&m, &other); return err }},
		{"Path", func() []*float64 { return of(&p.Vel, &p.Acc) }, func() error { _, err := p.Path(); return err }},
		{"Centre", func() []*float64 { return append(of(&path.Normal), &path.Curvature) }, func() error { _, err := path.Centre(); return err }},
		{"Guided", func() []*float64 { return append(ofPoint(&p), of(&b, &along)...) },
			func() error { _, _, err := rigid.Guided(p, b, along); return err }},
		{"Fit", func() []*float64 {
			return append(ofPoint(&points[0]), append(ofPoint(&points[2]), of(&locals[0], &locals[2])...)...)
		},
			func() error { _, _, err := rigid.Fit(locals, points); return err }},
	} {
		fresh()
		if err := c.call(); err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
		for i := range c.numbers() {
			for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
				fresh()
				*c.numbers()[i] = bad
				if err := c.call(); err != rigid.ErrNotFinite {
					t.Errorf("%s: number %d of %v gives %v", c.name, i, bad, err)
				}
			}
		}
	}
}
