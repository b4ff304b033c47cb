package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// rockingLever returns a lever whose crank can only rock, of any size, often with the
// lengths far apart or next to a change point.
func rockingLever(rng *rand.Rand) slidercrank.LeverDimensions {
	r, c := 1.0, math.Pow(10, 4*rng.Float64()-2)
	gap, sum := math.Abs(r-c), r+c
	e := gap + (sum-gap)*rng.Float64()
	if rng.IntN(2) == 0 {
		e = gap + max(r, c)*math.Pow(10, -13.5+12*rng.Float64())
	}
	f := math.Pow(10, 100*rng.Float64()-50)
	if rng.IntN(2) == 0 {
		f = math.Pow(10, float64(rng.IntN(10)-6))
	}
	return slidercrank.LeverDimensions{Crank: f * r, Centre: f * c, Slot: math.Copysign(f*e, rng.Float64()-0.5)}
}

// Where the crank of a slotted lever can only rock, the ends of its range are limits,
// and the swing there gives the crank back.
func TestSlottedLeverEnds(t *testing.T) {
	levers := []slidercrank.LeverDimensions{{Crank: 1.4825706e43, Centre: 5.2956988e41, Slot: -1.4312065e43}}
	for rng := rand.New(rand.NewPCG(5, 21)); len(levers) < 20*rounds(); {
		levers = append(levers, rockingLever(rng))
	}
	made := 0
	for _, d := range levers {
		l, err := slidercrank.NewSlottedLever(d)
		if err != nil {
			continue // a change point after all, or too long a slot
		}
		made++
		size := max(d.Crank, d.Centre, math.Abs(d.Slot))
		closes := func(what string, st *slidercrank.LeverState) {
			pin, seen := st.Crank.At(r2.Vec{X: d.Crank}).Pos, st.Lever.At(r2.Vec{X: st.Slide.Pos, Y: d.Slot}).Pos
			if gap := r2.Norm(r2.Sub(pin, seen)); !(gap <= 1e-14*size) {
				t.Fatalf("%+v %s: the pin is off by %v", d, what, gap/size)
			}
		}
		for _, end := range []float64{l.Range()[0].Lo, l.Range()[0].Hi} {
			var st, again slidercrank.LeverState
			err0, err1, err2 := l.Solve(&st, rigid.Coordinate{Pos: end}), l.Solve(&again, rigid.Coordinate{Pos: end, Vel: 1}), l.Solve(&again, rigid.Coordinate{Pos: end, Acc: 1})
			if err0 != nil || err1 != rigid.ErrSingular || err2 != rigid.ErrSingular || st.Margin != 0 || st.Slide.Pos != 0 {
				t.Fatalf("%+v at the end %v: place %v, speed %v, acceleration %v, margin %v", d, end, err0, err1, err2, st.Margin)
			}
			closes("at the end", &st)
			if err := l.SolveSwing(&again, st.Swing, st.Knee); err != nil || math.Abs(rigid.Wrap(again.Turn.Pos-end)) > 1e-7 {
				t.Fatalf("%+v by the swing of its end %v: turn %v, %v", d, end, again.Turn.Pos, err)
			}
			closes("by its swing", &again)
		}
	}
	if made < 15*rounds() {
		t.Errorf("only %d levers", made)
	}
}
