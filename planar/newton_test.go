package planar_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
)

// BenchmarkHigherGroup moves a group of four angles by steps of one degree.
func BenchmarkHigherGroup(b *testing.B) {
	w := swaps()[0]
	easy, hard := w.linkages(b)
	truth, err := easy.Assemble(w.guess, rigid.Coordinate{Pos: 1.2, Vel: 1})
	if err != nil {
		b.Fatal(err)
	}
	s, err := hard.Assemble(poses(truth, 6), value(truth, w.hard))
	if err != nil {
		b.Fatal(err)
	}
	start := value(truth, w.hard).Pos
	k, way := 0, 1
	b.ReportAllocs()
	for b.Loop() {
		if err := s.Move(rigid.Coordinate{Pos: start + float64(k)*rigid.Degree, Vel: 1, Acc: 2}); err != nil {
			b.Fatal(err)
		}
		if k += way; k == 20 || k == 0 {
			way = -way
		}
	}
}

// epicyclicFiveBar is a five-bar with gears on its coupler: the wheel of the crank
// drives that of the small arm on which the rocker is. It closes in all positions.
func epicyclicFiveBar(teethA, teethB int, internal bool) plan {
	var p plan
	l := p.links("crank", "coupler", "arm", "rocker")
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(l[0].At(0.4, 0), l[1].At(0, 0))
	p.pin(l[1].At(3, 0), l[2].At(0, 0))
	p.pin(l[2].At(0.5, 0), l[3].At(2.5, 0))
	p.pin(Frame.At(3, 0), l[3].At(0, 0))
	p.Joints = append(p.Joints, GearPair{A: l[0], B: l[2], Arm: l[1], TeethA: teethA, TeethB: teethB, Internal: internal, Phase: 0.3})
	p.turn(l[0], Frame)
	return p
}

// With gears inside a group angles count over whole turns. After so many turns of
// the crank as the gear on the coupler takes to come back, all is as before.
func TestGearsInGroup(t *testing.T) {
	for _, c := range []struct {
		a, b     int
		internal bool
		turns    int
	}{{20, 20, false, 1}, {20, 40, false, 2}, {17, 23, false, 23}, {20, 30, true, 3}, {50, 20, true, 2}} {
		p := epicyclicFiveBar(c.a, c.b, c.internal)
		l, err := New(p.Design)
		if err != nil {
			t.Fatal(err)
		}
		if g := groups(l); g != "crank | coupler+arm+rocker 3" {
			t.Errorf("groups %s", g)
		}
		rocker := math.Acos(-(9 + 2.5*2.5 - 9.) / (2 * 3 * 2.5))
		s, err := l.Assemble([]rigid.Placement{{}, {}, {X: 0.4, Angle: 0.9}, {X: 2, Y: 2, Angle: 0}, {X: 3, Angle: rocker}}, rigid.Coordinate{Vel: 1})
		if err != nil {
			t.Errorf("%d:%d: %v", c.a, c.b, err)
			continue
		}
		first := poses(s, 5)
		firstTurn := s.Turn(3, 2).Pos
		ratio := float64(c.a) / float64(c.b)
		if !c.internal {
			ratio = -ratio
		}
		turns := 2000 / c.turns * c.turns
		if testing.Short() {
			turns = 46
			turns = turns / c.turns * c.turns
		}
		worst, moves := 0.0, 0
		for k := 1; k <= 16*turns; k++ {
			pos := float64(k) / 16 * rigid.Revolution
			if k%16 == 0 {
				pos = float64(k/16) * rigid.Revolution
			}
			in := rigid.Coordinate{Pos: pos, Vel: 2, Acc: 1}
			if err := s.Move(in); err != nil {
				t.Fatalf("%d:%d, turn %v: %v", c.a, c.b, float64(k)/16, err)
			}
			if k > 100 && k < 16*turns-100 {
				continue
			}
			moves++
			mesh := s.Turn(3, 2).Pos - ratio*s.Turn(1, 2).Pos - 0.3
			if off := math.Abs(rigid.Wrap(mesh)); !(off < 1e-15*(10+pos)) {
				t.Fatalf("%d:%d, turn %v: the mesh is off by %v", c.a, c.b, float64(k)/16, off)
			}
			if o := open(l, s, []rigid.Coordinate{in}); !(o.pos < 1e-13+1e-15*pos && o.vel < 1e-13 && o.acc < 1e-12) {
				t.Fatalf("%d:%d, turn %v: %+v", c.a, c.b, float64(k)/16, o)
			}
		}
		for i, p := range poses(s, 5) {
			worst = max(worst, math.Abs(p.X-first[i].X), math.Abs(p.Y-first[i].Y), math.Abs(rigid.Wrap(p.Angle-first[i].Angle)))
		}
		if !(worst < 1e-11) {
			t.Errorf("%d:%d: off by %.2g after %d turns", c.a, c.b, worst, turns)
		}
		grown := s.Turn(3, 2).Pos - firstTurn
		t.Logf("%d:%d: off by %.2g after %d turns of the crank, %.9g of the arm on the coupler", c.a, c.b, worst, turns, grown/rigid.Revolution)
	}
}

// The slopes of groups are those of what their loops miss, and the margin the least
// sine between their columns.
func TestSlopesAndMargin(t *testing.T) {
	for _, w := range swaps() {
		easy, hard := w.linkages(t)
		if w.from == w.to {
			w.from = w.guess[2].Angle - w.guess[3].Angle
		}
		truth, err := easy.Assemble(w.guess, rigid.Coordinate{Pos: w.from})
		if err != nil {
			t.Fatal(err)
		}
		s, err := hard.Assemble(poses(truth, Link(len(w.guess))), value(truth, w.hard))
		if err != nil {
			t.Fatal(err)
		}
		margin := 1.0
		for _, c := range Higher(s) {
			var off mat.Dense
			off.Sub(c.Slopes, c.Differences)
			if e := mat.Norm(&off, math.Inf(1)) / mat.Norm(c.Slopes, math.Inf(1)); !(e < 1e-8) {
				t.Errorf("%s: slopes off by %.2g", w.name, e)
			}
			margin = math.Min(margin, leastSine(c.Slopes))
		}
		if off := math.Abs(s.Margin()/margin - 1); !(off < 1e-10) {
			t.Errorf("%s: margin %v, by singular values %v", w.name, s.Margin(), margin)
		}
	}
}

// leastSine returns the least sine between a column and the span of the others, by
// the singular values of the others.
func leastSine(j *mat.Dense) float64 {
	n, _ := j.Dims()
	least := 1.0
	for k := range n {
		rest := mat.NewDense(n, n-1, nil)
		for i, c := 0, 0; i < n; i++ {
			if i != k {
				rest.SetCol(c, mat.Col(nil, i, j))
				c++
			}
		}
		var svd mat.SVD
		if !svd.Factorize(rest, mat.SVDFull) {
			return math.NaN()
		}
		var u mat.Dense
		svd.UTo(&u)
		col := mat.NewVecDense(n, mat.Col(nil, k, j))
		least = math.Min(least, math.Abs(mat.Dot(col, u.ColView(n-1)))/mat.Norm(col, 2))
	}
	return least
}

// TestLargeGroups lifts scissors by a cylinder from the lowest bar to the highest,
// which leaves one group of two angles a stage and one of the platform's slot; the
// height is known from the spread of the feet.
func TestLargeGroups(t *testing.T) {
	for _, stages := range []int{2, 8, 20, 63, 64} {
		d := scissor(stages)
		d.Drives = []Drive{Reach{A: Link(1).At(-0.3, 0), B: Link(2*stages).At(0.2, 0)}}
		l, err := New(d)
		if stages > 63 {
			var bad *DesignError
			if !errors.As(err, &bad) || !strings.Contains(err.Error(), "128") {
				t.Errorf("%d stages: %v", stages, err)
			}
			continue
		}
		if err != nil {
			t.Errorf("%d stages: %v", stages, err)
			continue
		}
		a := 0.6
		guess := scissorGuess(stages, a)
		s, err := l.Assemble(guess, scissorReach(stages, a, 0))
		if err != nil {
			t.Errorf("%d stages: %v", stages, err)
			continue
		}
		top := Link(2*stages + 1)
		for k := range 10 {
			a := a + 0.01*float64(k)
			in := scissorReach(stages, a, 2)
			if err := s.Move(in); err != nil {
				t.Errorf("%d stages: %v", stages, err)
				break
			}
			n := float64(stages)
			want := rigid.Coordinate{Pos: n * math.Sin(a), Vel: 2 * n * math.Cos(a), Acc: -4 * n * math.Sin(a)}
			got := s.Point(top.At(0, 0))
			for _, off := range []float64{got.Pos.Y - want.Pos, got.Vel.Y - want.Vel, got.Acc.Y - want.Acc} {
				if !(math.Abs(off) < 1e-12*n*n/s.Margin()) {
					t.Fatalf("%d stages: at %+v, want %+v, margin %.2g", stages, got, want, s.Margin())
				}
			}
		}
		t.Logf("%d stages: %d links in the group, margin %.2g", stages, len(l.Groups()[0].Links), s.Margin())
	}
}

// scissorGuess is a lift with its bars at an angle.
func scissorGuess(stages int, a float64) []rigid.Placement {
	guess := []rigid.Placement{{}}
	for i := range stages {
		x, y := 0.5*math.Cos(a), (0.5+float64(i))*math.Sin(a)
		guess = append(guess, rigid.Placement{X: x, Y: y, Angle: a}, rigid.Placement{X: x, Y: y, Angle: math.Pi - a})
	}
	return append(guess, rigid.Placement{Y: float64(stages) * math.Sin(a)})
}

// scissorReach is the length of the cylinder for bars that turn at a speed.
func scissorReach(stages int, a, speed float64) rigid.Coordinate {
	n := float64(stages)
	// from (0.2 cos a, 0.2 sin a) on the lowest bar to (0.3 cos a, (n−0.3) sin a)
	x, y := 0.1*math.Cos(a), (n-0.5)*math.Sin(a)
	vx, vy := -0.1*math.Sin(a)*speed, (n-0.5)*math.Cos(a)*speed
	ax, ay := -x*speed*speed, -y*speed*speed
	r := math.Hypot(x, y)
	v := (x*vx + y*vy) / r
	return rigid.Coordinate{Pos: r, Vel: v, Acc: (vx*vx + vy*vy + x*ax + y*ay - v*v) / r}
}
