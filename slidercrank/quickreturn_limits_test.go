package slidercrank_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// awkwardRam returns random dimensions of any size, many with crank and centre line, or
// arm and rod, nearly equal, or with a crank that can only rock.
func awkwardRam(rng *rand.Rand) slidercrank.QuickReturnDimensions {
	d := slidercrank.QuickReturnDimensions{
		Crank: 0.1 + rng.Float64(), Centre: 0.1 + rng.Float64(), Arm: 0.1 + 2*rng.Float64(), Rod: 0.1 + 2*rng.Float64(),
		Branch: slidercrank.Branch(rng.IntN(2)),
		Guide:  rigid.Placement{X: 2*rng.Float64() - 1, Y: 0.3 * (2*rng.Float64() - 1), Angle: math.Pi / 2},
	}
	switch rng.IntN(7) {
	case 0:
		d.Rod = 0
	case 1:
		d.Centre = d.Crank * (1 + 1e-3*(2*rng.Float64()-1))
	case 2:
		d.Slot = 0.8 * (2*rng.Float64() - 1)
	case 3:
		d.Slot, d.ArmAngle = 0.3*(2*rng.Float64()-1), 6*rng.Float64()
	case 4:
		d.Rod = d.Arm * (1 + 1e-2*rng.Float64())
	}
	if rng.IntN(3) == 0 {
		d.Guide.Angle = 6 * rng.Float64()
	}
	if rng.IntN(2) == 0 {
		d.Guide.X = -d.Centre + 0.01*rng.Float64()
	}
	for scale, f := math.Pow(10, float64(rng.IntN(10)-6)), []*float64{&d.Crank, &d.Centre, &d.Slot, &d.Arm, &d.Rod, &d.Guide.X, &d.Guide.Y}; len(f) > 0; f = f[1:] {
		*f[0] *= scale
	}
	return d
}

// ramGap returns how far the joints of a state are from closing, over the largest length.
func ramGap(d slidercrank.QuickReturnDimensions, st *slidercrank.QuickReturnState) float64 {
	sin, cos := math.Sincos(d.ArmAngle)
	out := st.Lever.At(r2.Vec{X: d.Arm * cos, Y: d.Arm * sin}).Pos
	gap := r2.Norm(r2.Sub(st.Crank.At(r2.Vec{X: d.Crank}).Pos, st.Lever.At(r2.Vec{X: st.Slide.Pos, Y: d.Slot}).Pos))
	gap = max(gap, r2.Norm(r2.Sub(out, st.Rod.Pose.Origin)))
	if d.Rod > 0 {
		gap = max(gap, r2.Norm(r2.Sub(st.Rod.At(r2.Vec{X: d.Rod}).Pos, st.Ram.Pose.Origin)))
	} else {
		gap = max(gap, math.Abs(r2.Dot(r2.Sub(out, st.Ram.Pose.Origin), st.Ram.Pose.Axis)))
	}
	return gap / max(d.Crank, d.Centre, math.Abs(d.Slot), d.Arm, d.Rod, math.Abs(d.Guide.X), math.Abs(d.Guide.Y))
}

// A position that the library itself returned as a limit is one: the place is answered,
// rates are not, and a State's own travel gives the State back.
func TestQuickReturnLimits(t *testing.T) {
	rng, ends, centres := rand.New(rand.NewPCG(11, 41)), 0, 0
	machines := []slidercrank.QuickReturnDimensions{
		// arm and rod nearly in line where the lever turns back
		{Crank: 0.34234154925269794, Centre: 0.4892498245138875, Arm: 1.05617271923884, Rod: 1.5617133963684722, Guide: across(1.3815126407954452)},
		// arm and rod nearly in line where the crank, and where the rod, is at its limit
		{
			Crank: 1.0568644849957842, Centre: 1.06371632604902, Slot: 0.10422026461800561, Arm: 1.7975979884422233, ArmAngle: 0.4429831320635149,
			Rod: 1.8037442915836372, Guide: rigid.Placement{X: -1.06371632604902, Y: 0.1849053619984719, Angle: math.Pi / 2},
		},
		{
			Crank: 0.9513243895378383, Centre: 0.952087308242873, Arm: 1.0991349945528952, Rod: 0.12374252197869243,
			Guide: rigid.Placement{X: -0.01879844751832338, Y: -0.2097633810864273, Angle: math.Pi / 2},
		},
		// a lever whose pin passes its pivot so near that the ram's limits hang on how near
		{
			Crank: 520.8526339717472, Centre: 541.6060109223436, Slot: -20.336839408215003, Arm: 2082.7434566363604, ArmAngle: 4.873610354076923,
			Rod: 841.1061184775389, Branch: slidercrank.Behind, Guide: rigid.Placement{X: 427.13675580840714, Y: -29.785927226878425, Angle: math.Pi / 2},
		},
		// a crank far shorter than the centre distance, and a slot offset by nearly as much
		{
			Crank: 5.36747594492029e-05, Centre: 0.08855726137842593, Slot: -0.08850358662050772, Arm: 0.0685500200094702,
			Guide: across(-0.08855726137842593),
		},
	}
	for range 10 * rounds() {
		machines = append(machines, awkwardRam(rng))
	}
	var st, again slidercrank.QuickReturnState
	for _, d := range machines {
		q, err := slidercrank.NewQuickReturn(d)
		if err != nil {
			continue // the rod reaches the guide nowhere
		}
		back := func(at string) {
			err := q.SolveTravel(&again, rigid.Coordinate{Pos: st.Travel.Pos}, st.Elbow, st.Knee)
			if err != nil {
				t.Fatalf("%s, %v of %+v: its own travel %v: %v", at, st.Turn.Pos, d, st.Travel.Pos, err)
			}
			if a, b := ramGap(d, &st), ramGap(d, &again); !(a < 2e-14 && b < 2e-14) {
				t.Fatalf("%s, %v of %+v: open by %v, by its own travel %v", at, st.Turn.Pos, d, a, b)
			}
		}
		for _, over := range q.Range() {
			if over.Hi-over.Lo >= rigid.Revolution {
				continue
			}
			for _, end := range []float64{over.Lo, over.Hi} {
				ends++
				err0, err1, err2 := q.Solve(&st, rigid.Coordinate{Pos: end}), q.Solve(&again, rigid.Coordinate{Pos: end, Vel: 1}), q.Solve(&again, rigid.Coordinate{Pos: end, Acc: 1})
				if err0 != nil || err1 != rigid.ErrSingular || err2 != rigid.ErrSingular || st.Margin != 0 {
					t.Fatalf("the end %v of %+v: place %v, speed %v, acceleration %v, margin %v", end, d, err0, err1, err2, st.Margin)
				}
				back("end")
			}
		}
		for _, c := range q.DeadCentres() {
			centres++
			if err := q.Solve(&st, rigid.Coordinate{Pos: c.In}); err != nil || st.Travel.Pos != c.Out {
				t.Fatalf("the dead centre %+v of %+v: travel %v, %v", c, d, st.Travel.Pos, err)
			}
			if err := q.SolveTravel(&again, rigid.Coordinate{Pos: c.Out, Vel: 1}, st.Elbow, st.Knee); err != rigid.ErrSingular {
				t.Fatalf("the dead centre %+v of %+v: rates %v", c, d, err)
			}
			if back("dead centre"); again.Margin != 0 {
				t.Fatalf("the dead centre %+v of %+v: margin %v", c, d, again.Margin)
			}
		}
	}
	if ends < 5*rounds() || centres < 5*rounds() {
		t.Errorf("only %d ends and %d dead centres", ends, centres)
	}
}

// The way back gives the swing that Solve has for the turn it finds, of a turning lever
// too, and the sides that were asked for, also where there is no telling them.
func TestQuickReturnBackIsSolve(t *testing.T) {
	for _, d := range []slidercrank.QuickReturnDimensions{
		{Crank: 0.15, Centre: 0.1, Slot: 0.03, Arm: 0.15, ArmAngle: 2, Rod: 0.6, Guide: across(-0.1)},
		{Crank: 0.12, Centre: 0.3, Arm: 0.5, Rod: 0.2, Guide: across(0.15)},
	} {
		q := newQuickReturn(t, d)
		var st, again, want slidercrank.QuickReturnState
		for turn := -9.0; turn < 9; turn += 0.1 {
			if err := q.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
				t.Fatal(err)
			}
			if err := q.SolveTravel(&again, rigid.Coordinate{Pos: st.Travel.Pos}, st.Elbow, st.Knee); err != nil {
				t.Fatal(err)
			}
			if err := q.Solve(&want, rigid.Coordinate{Pos: again.Turn.Pos}); err != nil || math.Abs(again.Swing.Pos-want.Swing.Pos) > 1e-12 {
				t.Errorf("%+v at %v: the way back has the turn %v with the swing %v, Solve has %v; %v", d, turn, again.Turn.Pos, again.Swing.Pos, want.Swing.Pos, err)
			}
		}
		for _, c := range q.DeadCentres() {
			if err := q.Solve(&st, rigid.Coordinate{Pos: c.In}); err != nil {
				t.Fatal(err)
			}
			for _, knee := range []rigid.Side{rigid.Left, rigid.Right} {
				if err := q.SolveTravel(&again, rigid.Coordinate{Pos: c.Out}, st.Elbow, knee); err == nil && (again.Knee != knee || again.Elbow != st.Elbow) {
					t.Errorf("%+v at the dead centre %v by the knee %v: %v and %v", d, c, knee, again.Knee, again.Elbow)
				}
			}
		}
	}
}

// Limits that fall together: a cut at half a turn begins the range at −π, a rod that
// just reaches at one place cuts nothing, and an arm along the travel where the lever
// turns back is one dead centre.
func TestQuickReturnCoincidences(t *testing.T) {
	half := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: 0.1, Centre: 0.3, Arm: 0.5, Rod: 0.2, Guide: rigid.Placement{Y: -0.2}})
	if got := half.Range(); len(got) != 1 || got[0].Lo != -math.Pi || math.Abs(got[0].Hi) > 1e-14 {
		t.Errorf("a rod that reaches below the line of centres alone: %v", got)
	}
	rng := rand.New(rand.NewPCG(11, 43))
	for range rounds() {
		d := slidercrank.QuickReturnDimensions{Crank: 0.1, Centre: 0.2 + rng.Float64(), Arm: 0.5 + rng.Float64(), Rod: 0.2 + 0.3*rng.Float64()}
		d.Guide = across(d.Arm - d.Centre - d.Rod)
		if got := newQuickReturn(t, d).Range(); len(got) != 1 || got[0] != (rigid.Interval{Lo: -math.Pi, Hi: math.Pi}) {
			t.Fatalf("%+v: %v", d, got)
		}
	}
	q := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: 0.12, Centre: 0.24, Arm: 0.4, Guide: rigid.Placement{Angle: math.Pi / 6}})
	if got := q.DeadCentres(); len(got) != 2 || math.Abs(got[0].In+2*math.Pi/3) > 1e-14 || math.Abs(got[1].In-2*math.Pi/3) > 1e-7 {
		t.Errorf("dead centres %+v", got)
	}
}
