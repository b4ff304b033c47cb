package planar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/mat"
)

// The factors of a group's slopes against gonum's: four unknowns are a case of their
// own. Zeros and rows in any order ask for every exchange of rows; sizes are those
// of the shortest and longest links that there may be.
func TestFactors(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 4))
	for _, size := range []float64{1, 1e-60, 1e60} {
		for k := range 2000 {
			n := 2 + k%6
			j := mat.NewDense(n, n, nil)
			for i := range n {
				for c := range n {
					if random.IntN(3) > 0 {
						j.Set(i, c, size*random.NormFloat64())
					}
				}
			}
			var lu mat.LU
			lu.Factorize(j)
			det, unit := lu.LogDet()
			square := 2 * det
			for c := range n {
				square -= 2 * math.Log(mat.Norm(j.ColView(c), 2))
			}
			sign, got, solve := Factors(j)
			if lu.Cond() > 1e10 {
				if got > 1e-12 {
					t.Errorf("singular %v: square %v", mat.Formatted(j), got)
				}
				continue
			}
			if sign != unit || !(math.Abs(math.Log(got)-square) < 1e-13*lu.Cond()) {
				t.Fatalf("%v: sign %v, square %v, want %v, %v", mat.Formatted(j), sign, got, unit, math.Exp(square))
			}
			want := mat.NewVecDense(n, nil)
			for i := range n {
				want.SetVec(i, random.NormFloat64())
			}
			var right mat.VecDense
			right.MulVec(j, want)
			x := mat.VecDenseCopyOf(&right)
			solve(x.RawVector().Data)
			x.SubVec(x, want)
			if off := mat.Norm(x, math.Inf(1)); !(off < 1e-14*lu.Cond()) {
				t.Fatalf("%v: off by %v", mat.Formatted(j), off)
			}
		}
	}
	for n := 2; n < 8; n++ { // two bars in line, and one of no length
		j := mat.NewDense(n, n, nil)
		for i := range n {
			j.Set(i, i, 1)
		}
		j.Set(n-1, n-1, 0)
		if sign, square, solve := Factors(j); sign != 0 || square != 0 || solve != nil {
			t.Errorf("%d unknowns, singular: %v, %v", n, sign, square)
		}
	}
}

// The path is drawn on by a quintic, so that half a step misses by a 64th.
func TestForesight(t *testing.T) {
	for i, h := range []float64{0.005, 0.005, 0.08, 0.08, 0.08} {
		w := swaps()[i]
		easy, hard := w.linkages(t)
		truth, err := easy.Assemble(w.guess, rigid.Coordinate{Pos: (w.from + w.to) / 2})
		if err != nil {
			t.Fatal(err)
		}
		s, err := hard.Assemble(poses(truth, Link(len(w.guess))), value(truth, w.hard))
		if err != nil {
			t.Fatal(err)
		}
		start, off := value(truth, w.hard).Pos, [2]float64{}
		for k, step := range []float64{h, h / 2} {
			for _, at := range []float64{start - step, start} { // where both steps before end
				if err := s.Move(rigid.Coordinate{Pos: at}); err != nil {
					t.Fatal(err)
				}
			}
			if off[k], err = Foresight(s, start+step); err != nil {
				t.Fatal(err)
			}
		}
		if ratio := off[0] / off[1]; !(off[0] < 1e-4 && 32 < ratio && ratio < 128) {
			t.Errorf("%s: %.2g, half a step %.2g", w.name, off[0], off[1])
		}
	}
}
