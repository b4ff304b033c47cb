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

// randomSwayed makes a swayed linkage of any size, rhombic one in three times, and its
// four-bar where the wheel stands at a random angle. The inputs are those of the cell,
// whose wheel has axes of its own; the State is nil where the four-bar is nearly flat.
func randomSwayed(t testing.TB, random *rand.Rand) (w *swayed, cell *Linkage, easy *State, in []rigid.Coordinate) {
	spread := func() float64 { return 2*random.Float64() - 1 }
	w = &swayed{crank: 0.3 + random.Float64(), base: 0.3 + 2*random.Float64(), tilt: 3 * spread(), pin: r2.Vec{X: 2 * spread(), Y: 2 * spread()}, skew: spread()}
	if w.carried = random.IntN(2) == 0; random.IntN(3) == 0 {
		w.base = w.crank
	}
	w.far = r2.Vec{X: 3 * spread(), Y: 3 * spread()}
	w.wheel = 0.2 + 0.5*random.Float64()
	at, crank := 3*spread(), 3*spread()
	tip := r2.Add(w.pin, rigid.NewPose(0, 0, crank).Point(r2.Vec{X: w.crank}))
	end := rigid.NewPose(w.far.X, w.far.Y, at).Point(r2.Vec{X: w.wheel})
	d := r2.Sub(end, tip)
	w.rod = r2.Norm(d)
	cell, plain := w.linkages(t)
	guess := []rigid.Placement{{}, {X: w.pin.X, Y: w.pin.Y, Angle: crank}, {X: tip.X, Y: tip.Y, Angle: math.Atan2(d.Y, d.X)}, {X: w.far.X, Y: w.far.Y, Angle: at}, {}}
	in = []rigid.Coordinate{{Pos: at}, {}}
	if !w.carried {
		guess, in = guess[:4], in[:1]
	}
	easy, err := plain.Assemble(guess, in...)
	if err != nil || easy.Margin() < 0.05 {
		easy = nil
	}
	in[0].Pos -= 4 * w.skew
	return w, cell, easy, in
}

// Random ones, whichever way the cell lies, follow the four-bar as far as that goes.
func TestRandomParallelogramsInGroup(t *testing.T) {
	random := rand.New(rand.NewPCG(35, 5))
	n := 400
	if testing.Short() {
		n = 60
	}
	moved, flat := 0, 0
	for i := range n {
		w, cell, easy, in := randomSwayed(t, random)
		if easy == nil {
			continue
		}
		at := in[0].Pos
		s, err := cell.Assemble(w.guess(easy), in...)
		if err != nil {
			t.Errorf("machine %d: %v", i, err)
			continue
		}
		way, last := 0.05+0.1*random.Float64(), 0.0
		for k := 1; k < 150; k++ {
			for i := range in {
				in[i] = rigid.Coordinate{Pos: way * float64(k) * float64(1-2*i), Vel: random.NormFloat64(), Acc: random.NormFloat64()}
			}
			in[0].Pos += at
			err := s.Move(in...)
			in[0].Pos += 4 * w.skew
			errPlain := easy.Move(in...)
			if errPlain != nil {
				if err == nil {
					t.Errorf("machine %d: went on past %v", i, errPlain)
				}
				break
			}
			if easy.Margin() < 0.02 {
				break
			}
			if err != nil {
				t.Errorf("machine %d, step %d: %v, margin %v", i, k, err, easy.Margin())
				break
			}
			w.same(t, s, easy)
			moved++
			across := r2.Cross(s.Motion(2).Pose.Compose(rigid.NewPose(0, 0, w.skew+w.tilt)).Axis, easy.Motion(1).Pose.Axis)
			if across*last < 0 {
				flat++
			}
			last = across
		}
	}
	t.Logf("%d moves, %d through a flattened position", moved, flat)
	if moved < 20*n || flat < n/2 {
		t.Errorf("%d moves, %d through a flattened position", moved, flat)
	}
}

// Two parallelograms carry a plate like the arms of a lamp, and two rods lead it from
// two wheels: one group of eight angles. The plate does not turn, so that its place is
// that of two rods between wheels which are moved by what the pins are off, and the
// cranks are the arms of two dyads.
func TestTwoParallelogramsInGroup(t *testing.T) {
	pins, pivots := [2]r2.Vec{{X: 0.2, Y: 0.3}, {X: 0.6, Y: 0.1}}, [2]r2.Vec{{X: 2.6, Y: -0.3}, {X: 1.9, Y: -1.9}}
	base, offset := r2.Vec{X: -0.1, Y: -0.59}, r2.Vec{X: 0.1, Y: 0.4} // of the second pair of cranks on the first plate
	arms, rods, wheels := [2]float64{1, 0.9}, [2]float64{1.5, 1.4}, [2]float64{0.35, 0.3}
	var p, q plan
	l := p.links("crank1", "rocker1", "plate1", "crank2", "rocker2", "plate2", "rod1", "rod2", "wheel1", "wheel2")
	k := q.links("arm1", "arm2", "rod1", "rod2", "wheel1", "wheel2")
	at := func(link Link, v r2.Vec) Attachment { return link.At(v.X, v.Y) }
	p.pin(Frame.At(0, 0), l[0].At(0, 0))
	p.pin(Frame.At(0.7, 0), l[1].At(0, 0))
	p.pin(l[0].At(arms[0], 0), l[2].At(0, 0))
	p.pin(l[1].At(arms[0], 0), l[2].At(0.7, 0))
	p.pin(at(l[2], offset), l[3].At(0, 0))
	p.pin(at(l[2], r2.Add(offset, base)), l[4].At(0, 0))
	p.pin(l[3].At(arms[1], 0), l[5].At(0, 0))
	p.pin(l[4].At(arms[1], 0), at(l[5], base))
	q.pin(at(Frame, offset), k[0].At(0, 0))
	q.pin(k[0].At(arms[0], 0), k[1].At(0, 0))
	q.pin(k[1].At(arms[1], 0), k[2].At(0, 0))
	q.pin(k[2].At(0, 0), k[3].At(0, 0))
	for i := range 2 {
		p.pin(at(l[5], pins[i]), l[6+i].At(0, 0))
		p.pin(l[6+i].At(rods[i], 0), l[8+i].At(wheels[i], 0))
		p.pin(at(Frame, pivots[i]), l[8+i].At(0, 0))
		p.turn(l[8+i], Frame)
		q.pin(k[2+i].At(rods[i], 0), k[4+i].At(wheels[i], 0))
		q.pin(at(Frame, r2.Sub(pivots[i], pins[i])), k[4+i].At(0, 0))
		q.turn(k[4+i], Frame)
	}
	hard, err := New(p.Design)
	if err != nil {
		t.Fatal(err)
	}
	plain, err := New(q.Design)
	if err != nil {
		t.Fatal(err)
	}
	var easy *State
	for s, err := range plain.Modes(rigid.Coordinate{}, rigid.Coordinate{}) {
		if err == nil && (easy == nil || s.Margin() > easy.Margin()) {
			easy = s
		}
	}
	if easy == nil {
		t.Fatal("the dyads do not close")
	}
	arm := func(i int) float64 { return easy.Motion(Link(1 + i)).Pose.Angle() }
	tip := rigid.NewPose(0, 0, arm(0)).Point(r2.Vec{X: arms[0]})
	end := r2.Add(r2.Add(tip, offset), rigid.NewPose(0, 0, arm(1)).Point(r2.Vec{X: arms[1]}))
	guess := []rigid.Placement{{}, {Angle: arm(0)}, {X: 0.7, Angle: arm(0)}, {X: tip.X, Y: tip.Y},
		{X: tip.X + offset.X, Y: tip.Y + offset.Y, Angle: arm(1)}, {X: tip.X + offset.X + base.X, Y: tip.Y + offset.Y + base.Y, Angle: arm(1)}, {X: end.X, Y: end.Y}}
	for i := range 2 {
		guess = append(guess, rigid.Placement{X: end.X + pins[i].X, Y: end.Y + pins[i].Y, Angle: easy.Motion(Link(3 + i)).Pose.Angle()})
	}
	for i := range 2 {
		guess = append(guess, rigid.Placement{X: pivots[i].X, Y: pivots[i].Y})
	}
	s, err := hard.Assemble(guess, rigid.Coordinate{}, rigid.Coordinate{})
	if err != nil {
		t.Fatal(err)
	}
	last, flat := [2]float64{}, [2]int{}
	for n := range 3000 {
		in := []rigid.Coordinate{{Pos: 0.05 * float64(n), Vel: 1, Acc: 2}, {Pos: -0.083 * float64(n), Vel: -2, Acc: 1}}
		if err := errors.Join(easy.Move(in...), s.Move(in...)); err != nil {
			t.Fatalf("step %d: %v", n, err)
		}
		for i := range 2 {
			want, a, b, plate := easy.Motion(Link(1+i)), s.Motion(l[3*i]), s.Motion(l[3*i+1]), s.Motion(l[3*i+2])
			scale := 1e-12 / math.Pow(easy.Margin(), 3)
			off := math.Abs(a.Omega-want.Omega) + math.Abs(b.Omega-want.Omega) + math.Abs(plate.Omega) +
				(math.Abs(a.Alpha-want.Alpha)+math.Abs(b.Alpha-want.Alpha)+math.Abs(plate.Alpha))/10 +
				r2.Norm(r2.Sub(a.Pose.Axis, want.Pose.Axis)) + r2.Norm(r2.Sub(b.Pose.Axis, want.Pose.Axis)) + math.Abs(plate.Pose.Axis.Y)
			if !(off < scale) {
				t.Fatalf("step %d, cell %d: off by %v at margin %v", n, i, off, easy.Margin())
			}
			across := r2.Cross([]r2.Vec{{X: 0.7}, base}[i], a.Pose.Axis)
			if across*last[i] < 0 {
				flat[i]++
			}
			last[i] = across
		}
	}
	t.Logf("%s: %d and %d times flat", groups(hard), flat[0], flat[1])
	if flat[0] < 10 || flat[1] < 10 {
		t.Errorf("%d and %d times flat", flat[0], flat[1])
	}
}

// From a guess with links at any angle a cell is put together, or not at all: its sides
// may not lie p = q for p = −q.
func TestParallelogramsFromAnyGuess(t *testing.T) {
	random := rand.New(rand.NewPCG(30, 31))
	n, closed := 600, 0
	if testing.Short() {
		n = 100
	}
	for i := range n {
		w, cell, easy, in := randomSwayed(t, random)
		if easy == nil {
			continue
		}
		guess := w.guess(easy)
		for k := range guess[1:] {
			guess[k+1].Angle = math.Pi * (2*random.Float64() - 1)
		}
		s, err := cell.Assemble(guess, in...)
		if err != nil {
			continue
		}
		closed++
		if o := open(cell, s, in); !(o.pos < 1e-14) {
			t.Errorf("machine %d: %+v", i, o)
		}
	}
	if closed < n/2 {
		t.Errorf("%d of %d put together", closed, n)
	}
}
