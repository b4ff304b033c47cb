package planar

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
)

// everyRow has a row of every kind, between links that move. Its numbers are whole,
// its lines along x or y, so that slopes at whole places are whole numbers.
func everyRow() Design {
	const a, b, c Link = 1, 2, 3
	return Design{
		Links: []string{"frame", "a", "b", "c"},
		Joints: []Joint{
			Revolute{A: a.At(3, 1), B: b.At(2, 5)},
			Prismatic{A: b.Line(1, 4, 0), B: c.Line(2, 7, 0)},
			SlidingPin{Pin: c.At(5, 3), Slot: a.Line(2, 6, math.Pi/2)},
			RackPair{Pinion: a.At(1, 1), Rack: c.Line(4, 2, 0), Radius: 6},
			GearPair{A: a, B: b, Arm: c, TeethA: 2, TeethB: 1},
		},
		Drives: []Drive{Slide{Of: a.Line(1, 2, 0), From: b.Line(3, 2, math.Pi/2)}, Reach{A: a.At(4, 4), B: c.At(1, 6)}},
	}
}

// rows returns the joints of a design as equations, before anything is sorted.
func rowsOf(t *testing.T, d Design) *builder {
	t.Helper()
	b := &builder{system: &system{links: len(d.Links), drives: len(d.Drives)}, d: &d}
	if err := b.fuse(); err != nil {
		t.Fatal(err)
	}
	b.hide()
	if err := b.joints(); err != nil {
		t.Fatal(err)
	}
	if err := b.solveAngles(); err != nil {
		t.Fatal(err)
	}
	b.seated = minusOnes(b.bodies())
	return b
}

// The slopes of every row are its derivatives.
func TestSlopesAreDerivatives(t *testing.T) {
	b := rowsOf(t, everyRow())
	random := rand.New(rand.NewPCG(8, 9))
	p := &position{b: b, at: make([]place, b.bodies()), held: make([]float64, len(b.rows)+len(b.used))}
	x := make([]float64, p.unknowns())
	for i := range x {
		x[i] = random.NormFloat64()
	}
	put := func(x []float64) {
		n := b.bodies() - 1
		for i := range n {
			p.at[i+1] = place{x[2*i] * b.length, x[2*i+1] * b.length, x[2*n+i]}
		}
	}
	slopes, other := make([]float64, len(x)), make([]float64, len(x))
	for i := range p.held {
		put(x)
		p.raw(i, slopes)
		want := fd.Gradient(nil, func(x []float64) float64 { put(x); return p.raw(i, other) }, x, &fd.Settings{Formula: fd.Central})
		for k := range slopes {
			if math.Abs(slopes[k]-want[k]) > 1e-7 {
				t.Errorf("row %d, unknown %d: %g, want %g", i, k, slopes[k], want[k])
			}
		}
	}
}

// At whole places the residues of the slopes are those very numbers.
func TestResiduesAreSlopes(t *testing.T) {
	b := rowsOf(t, everyRow())
	random := rand.New(rand.NewPCG(8, 10))
	p := &position{b: b, at: make([]place, b.bodies()), held: make([]float64, len(b.rows)+len(b.used))}
	angles := make([]form, b.bodies())
	for i := range angles[1:] {
		angles[i+1] = newForm(formTerm{i, one})
		p.at[i+1] = place{float64(random.IntN(40)), float64(random.IntN(40)), 0}
	}
	whole := func(x float64) residue { return integer(int64(math.Round(x))) }
	s := b.scatter(angles)
	for i, at := range p.at {
		s.origins[i] = [2]residue{whole(at.x), whole(at.y)}
	}
	s.rates[6] = 6
	for i, r := range b.rows {
		at := p.pose(r.b).Point(r.pb)
		if r.kind == rowY || r.kind == rowX { // where the points do not meet yet, let a come to b
			p.at[r.a].x += at.X - p.pose(r.a).Point(r.pa).X
			p.at[r.a].y += at.Y - p.pose(r.a).Point(r.pa).Y
			s.origins[r.a] = [2]residue{whole(p.at[r.a].x), whole(p.at[r.a].y)}
		}
		s.pins[b.pin(r.bt)], s.pins[b.pin(r.at)] = [2]residue{whole(at.X), whole(at.Y)}, [2]residue{whole(at.X), whole(at.Y)}
		if r.kind != rowX && r.kind != rowY {
			b.lines = []lineForm{{b.angles[r.a].form(), math.Mod(math.Atan2(r.u.Y, r.u.X)+b.angles[r.a].Const, math.Pi), [2]residue{whole(r.u.X), whole(r.u.Y)}}}
		}
		slopes := make([]float64, p.unknowns())
		p.place(&p.b.rows[i], slopes)
		f := b.slopes(s, r)
		for k, v := range slopes {
			if k >= 2*(b.bodies()-1) {
				v *= b.length
			}
			if got, _ := f.of(k); got.exact != whole(v) || math.Abs(v-math.Round(v)) > 1e-9 {
				t.Errorf("row %d of kind %d, unknown %d: residue %d, want %g", i, r.kind, k, got.exact, v)
			}
		}
	}
}

// Residues add, multiply and divide as numbers do.
func TestResidues(t *testing.T) {
	for _, test := range []struct{ got, want residue }{
		{integer(prime - 1).plus(1), 0},
		{integer(-5).plus(7), 2},
		{integer(3).minus(5), integer(-2)},
		{integer(1 << 60).times(2), 1}, // 2⁶¹ = 1
		{integer(1 << 60).times(1 << 60), integer(1 << 59)},
		{integer(7).inverse().times(7), 1},
		{residue(0).inverse(), 0},
		{quotient(6, 4).exact.times(2), 3},
		{rational(0.1 / 0.3).exact, quotient(1, 3).exact},
		{dyadic(0.375).exact.times(8), 3},
		{rational(math.Pi).exact, dyadic(math.Pi).exact},
		{rational(1e-9).exact, dyadic(1e-9).exact},
	} {
		if test.got != test.want {
			t.Errorf("%d, want %d", test.got, test.want)
		}
	}
}
