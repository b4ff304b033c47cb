package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// rounds is how many random machines of each kind a property is held against.
func rounds() int {
	if testing.Short() {
		return 30
	}
	return 300
}

// each runs f for random machines of every kind, at a random turn in their range
// that keeps clear of singular positions.
func each(t *testing.T, seed uint64, f func(t *testing.T, make maker, m machine, turn rigid.Coordinate)) {
	rng := rand.New(rand.NewPCG(5, seed))
	tried := map[string]int{}
	for range rounds() {
		for _, kind := range makers(rng) {
			name := kind.name
			m := kind.make(t, 1, false, rigid.Placement{})
			turn := rigid.Coordinate{Vel: 20*rng.Float64() - 10, Acc: 200*rng.Float64() - 100}
			over := m.over[rng.IntN(len(m.over))]
			turn.Pos = over.Lo + (over.Hi-over.Lo)*rng.Float64()
			if s, err := m.solve(turn); err != nil || s.margin < 0.1 {
				continue
			}
			tried[name]++
			f(t, kind.make, m, turn)
			if t.Failed() {
				t.Fatalf("%s at %+v", name, turn)
			}
		}
	}
	for _, name := range []string{"press", "lever", "cylinder", "yoke", "rod", "quick return"} {
		if tried[name] < rounds()/2 {
			t.Errorf("%s: only %d machines tried", name, tried[name])
		}
	}
}

// numbers lists the places of a sample, or with order 1 or 2 their rates or
// accelerations: x, y and angle of each link, then the Coordinates.
func numbers(s sample, order int) []float64 {
	out := make([]float64, 0, 3*len(s.links)+len(s.coords))
	for i := range s.links {
		m := &s.links[i]
		switch order {
		case 0:
			out = append(out, m.Pose.Origin.X, m.Pose.Origin.Y, m.Pose.Angle())
		case 1:
			out = append(out, m.Vel.X, m.Vel.Y, m.Omega)
		default:
			out = append(out, m.Acc.X, m.Acc.Y, m.Alpha)
		}
	}
	for _, c := range s.coords {
		out = append(out, [...]float64{c.Pos, c.Vel, c.Acc}[order])
	}
	return out
}

func TestInversionsRatesAreDerivatives(t *testing.T) {
	each(t, 11, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		mid, err := m.solve(turn)
		if err != nil {
			t.Fatal(err)
		}
		at := func(order, k int) func(float64) float64 {
			return func(dt float64) float64 {
				s, err := m.solve(turn.After(dt))
				if err != nil {
					t.Fatal(err)
				}
				x, x0 := numbers(s, order)[k], numbers(mid, order)[k]
				if order == 0 && k%3 == 2 && k < 3*len(s.links) {
					return rigid.Nearest(x, x0)
				}
				return x
			}
		}
		by := &fd.Settings{Formula: fd.Central, Step: 1e-7}
		vel, acc := numbers(mid, 1), numbers(mid, 2)
		for k := range vel {
			v, a := fd.Derivative(at(0, k), 0, by), fd.Derivative(at(1, k), 0, by)
			if !(math.Abs(v-vel[k]) <= 1e-6*(1+math.Abs(turn.Vel)+math.Abs(v))) {
				t.Errorf("number %d: rate %v, difference %v", k, vel[k], v)
			}
			if !(math.Abs(a-acc[k]) <= 1e-4*(100+math.Abs(a))) {
				t.Errorf("number %d: acceleration %v, difference %v", k, acc[k], a)
			}
		}
	})
}

func TestInversionsThereAndBack(t *testing.T) {
	each(t, 13, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		want, err := m.solve(turn)
		if err != nil {
			t.Fatal(err)
		}
		got, err := m.back(turn)
		if err != nil {
			t.Fatal(err)
		}
		for _, g := range got {
			if g.margin < 0.03 {
				continue // the way back is near a dead centre
			}
			for order, tol := range []float64{1e-12, 1e-9, 1e-7} {
				a, b := numbers(want, order), numbers(g, order)
				for k := range a {
					d := a[k] - b[k]
					if order == 0 {
						d = math.Min(math.Abs(d), math.Abs(math.Remainder(d, 2*math.Pi)))
					}
					if !(math.Abs(d) <= tol*(10+math.Abs(a[k]))) {
						t.Errorf("order %d, number %d: forth %v, back %v", order, k, a[k], b[k])
					}
				}
			}
			if p := g.coords[0].Pos; !(p > -math.Pi && p <= math.Pi) {
				t.Errorf("turn on the way back is %v", p)
			}
		}
	})
}

// TestInversionsScale: a power of two changes no digit.
func TestInversionsScale(t *testing.T) {
	each(t, 14, func(t *testing.T, make maker, m machine, turn rigid.Coordinate) {
		const scale = 1 << 10
		a, err1 := m.solve(turn)
		b, err2 := make(t, scale, false, rigid.Placement{}).solve(turn)
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		for i := range a.links {
			l := &a.links[i]
			l.Pose.Origin, l.Vel, l.Acc = r2.Scale(scale, l.Pose.Origin), r2.Scale(scale, l.Vel), r2.Scale(scale, l.Acc)
		}
		if diff := cmp.Diff(a.links, b.links); diff != "" {
			t.Errorf("larger machine (-want +got):\n%s", diff)
		}
		if a.margin != b.margin {
			t.Errorf("margin %v, larger %v", a.margin, b.margin)
		}
	})
}

func TestInversionsMirror(t *testing.T) {
	each(t, 15, func(t *testing.T, make maker, m machine, turn rigid.Coordinate) {
		a, err1 := m.solve(turn)
		b, err2 := make(t, 1, true, rigid.Placement{}).solve(rigid.Coordinate{Pos: -turn.Pos, Vel: -turn.Vel, Acc: -turn.Acc})
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		for i := range b.links {
			l := &b.links[i]
			for _, v := range []*r2.Vec{&l.Pose.Origin, &l.Pose.Axis, &l.Vel, &l.Acc} {
				v.Y = -v.Y
			}
			l.Omega, l.Alpha = -l.Omega, -l.Alpha
		}
		alike(t, "mirrored", a.links, b.links)
	})
}

func TestInversionsMount(t *testing.T) {
	mount := rigid.Placement{X: 3, Y: -2, Angle: 2.2}
	each(t, 16, func(t *testing.T, make maker, m machine, turn rigid.Coordinate) {
		a, err1 := m.solve(turn)
		b, err2 := make(t, 1, false, mount).solve(turn)
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		base := rigid.Motion{Pose: mount.Pose()}
		for i := range a.links {
			a.links[i] = base.Compose(&a.links[i])
		}
		alike(t, "mounted", a.links, b.links)
		for i, c := range a.coords {
			d := b.coords[i]
			if !(math.Abs(c.Pos-d.Pos) <= 1e-14 && math.Abs(c.Vel-d.Vel) <= 1e-12*(1+math.Abs(c.Vel)) && math.Abs(c.Acc-d.Acc) <= 1e-11*(10+math.Abs(c.Acc))) {
				t.Errorf("mounted, coordinate %d: %+v, want %+v", i, d, c)
			}
		}
	})
}

func TestInversionsTimeReversal(t *testing.T) {
	each(t, 17, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		a, err1 := m.solve(turn)
		b, err2 := m.solve(rigid.Coordinate{Pos: turn.Pos, Vel: -turn.Vel, Acc: turn.Acc})
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		for i := range b.links {
			l := &b.links[i]
			l.Vel, l.Omega = r2.Scale(-1, l.Vel), -l.Omega
		}
		alike(t, "run backwards", a.links, b.links)
	})
}

// TestInversionsSlowCrank: a crank at rest is placed as one that moves, with margin,
// and one so slow that the square of its speed underflows has its velocities.
func TestInversionsSlowCrank(t *testing.T) {
	each(t, 19, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		const slow = 1e-200
		a, err1 := m.solve(turn)
		rest, err2 := m.solve(rigid.Coordinate{Pos: turn.Pos})
		b, err3 := m.solve(rigid.Coordinate{Pos: turn.Pos, Vel: slow * turn.Vel})
		if err1 != nil || err2 != nil || err3 != nil {
			t.Fatal(err1, err2, err3)
		}
		if math.Abs(a.margin-rest.margin)+math.Abs(a.margin-b.margin) > 1e-15 {
			t.Errorf("margin %v at rest, %v slow, %v in motion", rest.margin, b.margin, a.margin)
		}
		va, vb := numbers(a, 1), numbers(b, 1)
		for k := range va {
			if !(math.Abs(vb[k]/slow-va[k]) <= 1e-12*(10+math.Abs(va[k]))) {
				t.Errorf("velocity %d of a slow crank: %v, want %v", k, vb[k]/slow, va[k])
			}
		}
		moving := append(numbers(rest, 1), append(numbers(rest, 2), numbers(b, 2)...)...)
		for k, v := range moving {
			if v != 0 {
				t.Errorf("number %d of a crank at rest: %v", k, v)
			}
		}
		for i := range a.links {
			for _, s := range []sample{rest, b} {
				if d := r2.Norm(r2.Sub(a.links[i].Pose.Axis, s.links[i].Pose.Axis)) + r2.Norm(r2.Sub(a.links[i].Pose.Origin, s.links[i].Pose.Origin)); d > 1e-14 {
					t.Errorf("link %d is off by %v", i, d)
				}
			}
		}
	})
}

// alike compares motions within rounding.
func alike(t *testing.T, what string, want, got []rigid.Motion) {
	t.Helper()
	for order, tol := range []float64{1e-14, 1e-12, 1e-11} {
		a, b := numbers(sample{links: want}, order), numbers(sample{links: got}, order)
		for k := range a {
			d := a[k] - b[k]
			if order == 0 && k%3 == 2 {
				d = math.Remainder(d, 2*math.Pi)
			}
			if !(math.Abs(d) <= tol*(10+math.Abs(a[k]))) {
				t.Errorf("%s, order %d, number %d: %v, want %v", what, order, k, b[k], a[k])
			}
		}
	}
}

// TestInversionsLaw: Coefficients are the motion for unit speed, continuous over a
// turn, and their First is 0 at the dead centres, between which it keeps its sign.
func TestInversionsLaw(t *testing.T) {
	each(t, 18, func(t *testing.T, _ maker, m machine, turn rigid.Coordinate) {
		c, err := m.law(turn.Pos)
		if err != nil {
			t.Fatal(err)
		}
		s, err := m.solve(turn)
		if err != nil {
			t.Fatal(err)
		}
		want := c.Output(turn.Vel, turn.Acc)
		if d := math.Abs(want.Acc - s.coords[1].Acc); !(d <= 1e-11*(100+math.Abs(want.Acc))) || math.Abs(want.Pos-s.coords[1].Pos) > 1e-15 {
			t.Errorf("coefficients give %+v, State has %+v", want, s.coords[1])
		}
		for _, x := range m.dead {
			c, err := m.law(x.In)
			if err != nil {
				t.Fatalf("dead centre %+v: %v", x, err)
			}
			tol := 1e-12 * (1 + math.Abs(x.Second))
			if x.First != 0 || math.Abs(c.First) > tol || math.Abs(c.Out-x.Out) > 1e-13 || math.Abs(c.Second-x.Second) > 1e-9*(1+math.Abs(c.Second)) {
				t.Errorf("dead centre %+v: the law has %+v", x, c)
			}
		}
	})
}
