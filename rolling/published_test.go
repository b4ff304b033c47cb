package rolling_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// A published train: turns of the drives, and what the source gives for a member.
type published struct {
	name   string
	design rolling.TrainDesign
	in     []float64
	want   map[string]float64
}

func mesh(a, b, arm rolling.Member, teethA, teethB int) rolling.Mesh {
	return rolling.Mesh{A: a, B: b, Arm: arm, TeethA: teethA, TeethB: teethB}
}

func inside(a, b, arm rolling.Member, teethA, teethB int) rolling.Mesh {
	return rolling.Mesh{A: a, B: b, Arm: arm, TeethA: teethA, TeethB: teethB, Internal: true}
}

// publishedTrains are worked examples from books and examinations. The numbers of
// teeth and the results are theirs; where a source is from memory the row says so.
func publishedTrains() []published {
	return []published{
		{
			"Khurmi & Gupta, Theory of Machines, Ex. 13.1 p. 432: three stages, 975 rpm to 52",
			rolling.TrainDesign{
				Members: []string{"frame", "motor", "second", "third", "output"}, Drives: []rolling.Member{1},
				Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 50), mesh(2, 3, 0, 25, 75), mesh(3, 4, 0, 26, 65)},
			},
			[]float64{975}, map[string]float64{"output": -52},
		},
		{
			"Khurmi & Gupta, Ex. 13.6: annulus 72 fixed, planet 20, sun 32, arm at 18 rpm",
			rolling.TrainDesign{
				Members: []string{"annulus", "sun", "planet", "arm"}, Drives: []rolling.Member{3},
				Meshes: []rolling.Mesh{mesh(1, 2, 3, 32, 20), inside(2, 0, 3, 20, 72)},
			},
			[]float64{18}, map[string]float64{"sun": 58.5, "planet": -46.8},
		},
		{
			"GATE ME 2009: sun 20 at 60 rpm, planet 40, annulus 100 fixed",
			rolling.TrainDesign{
				Members: []string{"annulus", "sun", "planet", "arm"}, Drives: []rolling.Member{1},
				Meshes: []rolling.Mesh{mesh(1, 2, 3, 20, 40), inside(2, 0, 3, 40, 100)},
			},
			[]float64{60}, map[string]float64{"arm": 10},
		},
		{
			// the printed answer, −4.2 from memory, is cut short: exact −100·(1 − 208/217)
			"Khurmi & Gupta, Ex. 13.8 (data; answers recomputed): annuli 64 fixed and 62",
			coupledAnnuli(), []float64{0, -100}, map[string]float64{"B": -4.1474654377880184332},
		},
		{
			// the printed answer, from memory, is 5.4
			"the same with annulus A at 10 rpm",
			coupledAnnuli(), []float64{10, -100}, map[string]float64{"B": 5.4377880184331797235},
		},
		{
			"Khurmi & Gupta, arm with gears 36 and 45, A fixed, arm 150 rpm: B 270 (from memory)",
			rolling.TrainDesign{
				Members: []string{"frame", "A", "B", "arm"}, Drives: []rolling.Member{1, 3},
				Meshes: []rolling.Mesh{mesh(1, 2, 3, 36, 45)},
			},
			[]float64{0, 150}, map[string]float64{"B": 270},
		},
		{
			"the same with A at −300 rpm: B 510 (from memory)",
			rolling.TrainDesign{
				Members: []string{"frame", "A", "B", "arm"}, Drives: []rolling.Member{1, 3},
				Meshes: []rolling.Mesh{mesh(1, 2, 3, 36, 45)},
			},
			[]float64{-300, 150}, map[string]float64{"B": 510},
		},
		{
			"Khurmi & Gupta, reverted epicyclic train 75, 30, 90 (and 45), B fixed, arm −100 rpm: C 400 (from memory)",
			rolling.TrainDesign{
				Members: []string{"B", "C", "DE", "arm"}, Drives: []rolling.Member{3},
				Meshes: []rolling.Mesh{mesh(0, 2, 3, 75, 45), mesh(2, 1, 3, 90, 30)},
			},
			[]float64{-100}, map[string]float64{"C": 400},
		},
		{
			"Ferguson's paradox, 1764: one planet on a fixed 100 moves 101, 100 and 99 by 1/101, 0 and −1/99 (from memory)",
			rolling.TrainDesign{
				Members: []string{"sun", "planet", "101", "100", "99", "arm"}, Drives: []rolling.Member{5},
				Meshes: []rolling.Mesh{mesh(0, 1, 5, 100, 20), mesh(1, 2, 5, 20, 101), mesh(1, 3, 5, 20, 100), mesh(1, 4, 5, 20, 99)},
			},
			[]float64{9999}, map[string]float64{"101": 99, "100": 0, "99": -101},
		},
		{
			"Watt's sun and planet, 1781: equal wheels, the planet on a rod that does not turn, two turns a stroke (from memory)",
			rolling.TrainDesign{
				Members: []string{"frame", "shaft", "rod", "arm"}, Drives: []rolling.Member{2, 3},
				Meshes: []rolling.Mesh{mesh(1, 2, 3, 50, 50)},
			},
			[]float64{0, 1}, map[string]float64{"shaft": 2},
		},
	}
}

// coupledAnnuli is the train of Khurmi & Gupta's Ex. 13.8: a pair of suns in one piece.
func coupledAnnuli() rolling.TrainDesign {
	return rolling.TrainDesign{
		Members: []string{"frame", "A", "B", "suns", "E", "F", "arm"}, Drives: []rolling.Member{1, 6},
		Meshes: []rolling.Mesh{
			inside(4, 1, 6, 18, 64), mesh(3, 4, 6, 28, 18),
			inside(5, 2, 6, 18, 62), mesh(3, 5, 6, 26, 18),
		},
	}
}

func TestPublishedTrains(t *testing.T) {
	for _, row := range publishedTrains() {
		tr := train(t, row.design)
		in := make([]rigid.Coordinate, len(row.in))
		for i, x := range row.in {
			in[i] = rigid.Coordinate{Pos: x * rigid.Degree, Vel: x * rigid.RPM, Acc: x}
		}
		dst := make([]rigid.Coordinate, len(row.design.Members))
		if err := tr.Solve(dst, in...); err != nil {
			t.Fatalf("%s: %v", row.name, err)
		}
		for m, name := range row.design.Members {
			want, ok := row.want[name]
			if ok && !near(dst[m].Vel/rigid.RPM, want, 1e-13*max(1, math.Abs(want))) {
				t.Errorf("%s: %s %v rpm, want %v", row.name, name, dst[m].Vel/rigid.RPM, want)
			}
		}
	}
}
