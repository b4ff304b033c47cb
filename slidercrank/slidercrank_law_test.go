package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
)

// TestLawOfTheSlide: Coefficients serves as a rigid.Law. Its extremes are the dead
// centres, the places of its greatest speed have no acceleration, and on every stroke
// it is inverted as SolveSlide inverts it.
func TestLawOfTheSlide(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 1))
	rounds := 60
	if testing.Short() {
		rounds = 10
	}
	for tried := 0; tried < rounds; {
		d := randomPress(rng)
		if d.Rod < 1.1*(d.Crank+math.Abs(d.Offset)) {
			continue
		}
		tried++
		l := newPress(t, d)
		law, over := rigid.Law(l.Coefficients), rigid.Interval{Lo: -1, Hi: 2*math.Pi - 1}
		outer, inner, err := l.DeadCentres()
		if err != nil {
			t.Fatal(err)
		}
		found, err := law.Extremes(over)
		if err != nil || len(found) != 2 {
			t.Fatalf("%+v: extremes %v, %v", d, found, err)
		}
		for _, c := range found {
			if min(math.Abs(math.Remainder(c.In-outer.Turn, 2*math.Pi)), math.Abs(math.Remainder(c.In-inner.Turn, 2*math.Pi))) > 1e-12 {
				t.Errorf("%+v: extreme %+v, dead centres %+v %+v", d, c, outer, inner)
			}
		}
		speed, acc, err := law.Peaks(over)
		if err != nil || len(speed) != 2 || len(acc) < 2 {
			t.Fatalf("%+v: peaks of speed %v, of acceleration %v, %v", d, speed, acc, err)
		}
		for _, c := range speed {
			if st := solved(t, l, rigid.Coordinate{Pos: c.In, Vel: 1}); math.Abs(st.Slide.Acc) > 1e-11 {
				t.Errorf("%+v: acceleration %v at the peak of speed", d, st.Slide.Acc)
			}
		}
		strokes, err := law.Strokes(over)
		if err != nil || len(strokes) != 3 {
			t.Fatalf("%+v: strokes %v, %v", d, strokes, err)
		}
		for _, stroke := range strokes {
			turn := stroke.Lo + (stroke.Hi-stroke.Lo)*(0.02+0.96*rng.Float64())
			st := solved(t, l, rigid.Coordinate{Pos: turn, Vel: 3, Acc: -20})
			back, err := law.Solve(st.Slide, stroke)
			if err != nil || math.Abs(back.Pos-turn) > 1e-11 || math.Abs(back.Vel-3) > 1e-8 || math.Abs(back.Acc+20) > 1e-6 {
				t.Errorf("%+v: law gives %+v back for %+v: %v", d, back, st.Turn, err)
			}
			if err := l.SolveSlide(st, st.Slide, st.Knee); err != nil || math.Abs(math.Remainder(st.Turn.Pos-back.Pos, 2*math.Pi)) > 1e-11 {
				t.Errorf("%+v: slide gives %+v, law %+v: %v", d, st.Turn, back, err)
			}
			for _, end := range []float64{stroke.Lo, stroke.Hi} { // through a dead centre too
				c, err := law(end)
				if err != nil {
					t.Fatal(err)
				}
				if back, err := law.Solve(rigid.Coordinate{Pos: c.Out}, stroke); err != nil || math.Abs(back.Pos-end) > 1e-6 {
					t.Errorf("%+v: at the end %v of %+v: %+v, %v", d, end, stroke, back, err)
				}
			}
		}
	}
}
