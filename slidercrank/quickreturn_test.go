package slidercrank_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func TestQuickReturnCloses(t *testing.T) {
	guide := rigid.Placement{X: 0.1, Y: 0.05, Angle: 1.4}
	for _, rod := range []float64{0, 0.7} {
		for _, branch := range []slidercrank.Branch{slidercrank.Ahead, slidercrank.Behind} {
			d := slidercrank.QuickReturnDimensions{
				Crank: 0.12, Centre: 0.3, Slot: 0.03, Arm: 0.5, ArmAngle: 0.2, Rod: rod, Branch: branch,
				Guide: guide, Mount: rigid.Placement{X: 2, Y: 1, Angle: -0.4},
			}
			q := newQuickReturn(t, d)
			mount := rigid.Motion{Pose: d.Mount.Pose()}
			rail := mount.Compose(&rigid.Motion{Pose: guide.Pose()})
			for _, turn := range []float64{-3, -1, 0.2, 1.7, 3} {
				var st slidercrank.QuickReturnState
				if err := q.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 2, Acc: -1}); err != nil {
					t.Fatal(err)
				}
				sin, cos := math.Sincos(d.ArmAngle)
				pin := st.Lever.At(r2.Vec{X: d.Arm * cos, Y: d.Arm * sin})
				joined(t, "output pin and rod", pin, st.Rod.At(r2.Vec{}), 4)
				onRail := rail.Observe(st.Ram.At(r2.Vec{}))
				along := rigid.Point{Pos: r2.Vec{X: st.Travel.Pos}, Vel: r2.Vec{X: st.Travel.Vel}, Acc: r2.Vec{X: st.Travel.Acc}}
				joined(t, "ram on its guide", onRail, along, 4)
				if rod > 0 {
					joined(t, "rod and ram", st.Rod.At(r2.Vec{X: rod}), st.Ram.At(r2.Vec{}), 4)
					ahead := r2.Dot(st.Rod.Pose.Axis, st.Ram.Pose.Axis) > 0
					if ahead != (branch == slidercrank.Ahead) {
						t.Errorf("rod of %v points %v", branch, st.Rod.Pose.Axis)
					}
				} else {
					seen := st.Ram.Observe(pin)
					joined(t, "output pin in the ram's slot", rigid.Point{Pos: r2.Vec{X: seen.Pos.X}, Vel: r2.Vec{X: seen.Vel.X}, Acc: r2.Vec{X: seen.Acc.X}}, rigid.Point{}, 4)
				}
			}
		}
	}
}

// The peaks of each stroke are those that a fine sweep of it finds.
func TestQuickReturnStrokes(t *testing.T) {
	for _, d := range []slidercrank.QuickReturnDimensions{
		{Crank: 0.12, Centre: 0.3, Arm: 0.5, Rod: 0.2, Guide: across(0.15)},
		{Crank: 0.15, Centre: 0.1, Arm: 0.15, Rod: 0.6, Guide: across(-0.1)},
		{Crank: 0.15, Centre: 0.1, Arm: 0.15, ArmAngle: math.Pi, Rod: 0.6, Branch: slidercrank.Behind, Guide: across(-0.1)},
		{Crank: 0.1, Centre: 0.25, Slot: 0.05, Arm: 0.4, Guide: across(0)},
	} {
		q := newQuickReturn(t, d)
		cutting, back, err := q.Strokes()
		if err != nil {
			t.Fatal(err)
		}
		c, b := cutting.Turn.Hi-cutting.Turn.Lo, back.Turn.Hi-back.Turn.Lo
		if math.Abs(c+b-rigid.Revolution) > 1e-14 || c < b {
			t.Errorf("%+v: strokes of %v and %v rad", d, c, b)
		}
		ratio, err1 := q.TimeRatio()
		stroke, err2 := q.Stroke()
		if err1 != nil || err2 != nil || math.Abs(ratio-c/b) > 1e-14 || stroke != math.Abs(cutting.To-cutting.From) {
			t.Errorf("%+v: ratio %v, stroke %v; %v %v", d, ratio, stroke, err1, err2)
		}
		if cutting.From != back.To || cutting.To != back.From {
			t.Errorf("%+v: the strokes do not meet: %+v %+v", d, cutting, back)
		}
		for _, s := range []slidercrank.RamStroke{cutting, back} {
			var speed, acc float64
			for p, err := range rigid.Law(q.Coefficients).Sweep(s.Turn, 20001) {
				if err != nil {
					t.Fatal(err)
				}
				speed, acc = max(speed, math.Abs(p.First)), max(acc, math.Abs(p.Second))
			}
			if got := math.Abs(s.Speed.First); math.Abs(got-speed) > 1e-7*speed || !s.Turn.Contains(s.Speed.In) {
				t.Errorf("%+v: peak speed %v, a sweep has %v", d, got, speed)
			}
			if got := math.Abs(s.Acc.Second); math.Abs(got-acc) > 1e-6*acc || s.Acc.In < s.Turn.Lo-1e-9 || s.Acc.In > s.Turn.Hi+1e-9 {
				t.Errorf("%+v: peak acceleration %v, a sweep has %v", d, got, acc)
			}
		}
	}
}

// With crank and centre line nearly equal the ram is fastest, and sharpest, in a part of
// the stroke that is far shorter than a step of it.
func TestQuickReturnQuickLever(t *testing.T) {
	rng, made := rand.New(rand.NewPCG(11, 42)), 0
	for range rounds() / 3 {
		d := slidercrank.QuickReturnDimensions{Crank: 0.2, Arm: 0.1 + 0.5*rng.Float64(), ArmAngle: 6 * rng.Float64(), Guide: across(0.1)}
		gap := 0.2 * math.Pow(10, -6*rng.Float64()) * (1 - 2*float64(rng.IntN(2)))
		if d.Centre = d.Crank + gap; d.Centre < 0.01 { // no lever
			continue
		}
		d.Slot = 0.9 * gap * (2*rng.Float64() - 1)
		if rng.IntN(2) == 0 {
			d.Rod = 2 + rng.Float64()
		}
		q := newQuickReturn(t, d)
		cutting, back, err := q.Strokes()
		if err != nil {
			continue // more than two dead centres
		}
		made++
		for _, s := range []slidercrank.RamStroke{cutting, back} {
			var speed, acc float64
			for _, nearest := range []float64{-math.Pi, math.Pi, 3 * math.Pi} {
				for off := 1e-8; off < 3; off *= 1.01 {
					for _, x := range []float64{nearest - off, nearest + off} {
						if c, err := q.Coefficients(x); err == nil && s.Turn.Contains(x) {
							speed, acc = max(speed, math.Abs(c.First)), max(acc, math.Abs(c.Second))
						}
					}
				}
			}
			if got := math.Abs(s.Speed.First); !(got > (1-1e-6)*speed) || !s.Turn.Contains(s.Speed.In) {
				t.Errorf("%+v: peak speed %v at %v, a sweep has %v", d, got, s.Speed.In, speed)
			}
			if got := math.Abs(s.Acc.Second); !(got > (1-1e-6)*acc) {
				t.Errorf("%+v: peak acceleration %v at %v, a sweep has %v", d, got, s.Acc.In, acc)
			}
		}
	}
	if made < rounds()/10 {
		t.Errorf("only %d drives", made)
	}
}

// With crank and centre line nearly equal the lever turns over within a small part of
// the crank's turn, so that a rounding of the turn shows in the rod's reach.
func TestQuickReturnRangeIsReached(t *testing.T) {
	rng, made := rand.New(rand.NewPCG(11, 40)), 0
	for range 10 * rounds() {
		d := slidercrank.QuickReturnDimensions{Crank: 0.1 + rng.Float64(), Arm: 0.5 + 2*rng.Float64(), Rod: 0.3 + 2*rng.Float64()}
		d.Centre = d.Crank * (1 + 1e-3*(2*rng.Float64()-1))
		d.Guide.Angle = math.Pi / 2
		q, err := slidercrank.NewQuickReturn(d)
		if err != nil {
			continue // the rod reaches the guide nowhere
		}
		for _, r := range q.Range() {
			made++
			for _, turn := range [...]float64{r.Lo, r.Hi} {
				var st slidercrank.QuickReturnState
				if err := q.Solve(&st, rigid.Coordinate{Pos: turn}); err != nil {
					t.Errorf("%+v: at %v of %v: %v", d, turn, r, err)
				}
			}
		}
	}
	if made < 5*rounds() {
		t.Errorf("only %d intervals", made)
	}
}

func TestQuickReturnRefuses(t *testing.T) {
	ok := slidercrank.QuickReturnDimensions{Crank: 0.12, Centre: 0.3, Arm: 0.5, Rod: 0.2, Guide: across(0.15)}
	for _, row := range []struct {
		name, field string
		cause       error
		set         func(*slidercrank.QuickReturnDimensions)
	}{
		{"no crank", "Crank", rigid.ErrNotPositive, func(d *slidercrank.QuickReturnDimensions) { d.Crank = 0 }},
		{"change point", "", rigid.ErrChangePoint, func(d *slidercrank.QuickReturnDimensions) { d.Centre = d.Crank }},
		{"no arm", "Arm", rigid.ErrNotPositive, func(d *slidercrank.QuickReturnDimensions) { d.Arm = 0 }},
		{"arm's angle not a number", "ArmAngle", rigid.ErrNotFinite, func(d *slidercrank.QuickReturnDimensions) { d.ArmAngle = math.NaN() }},
		{"negative rod", "Rod", rigid.ErrNotPositive, func(d *slidercrank.QuickReturnDimensions) { d.Rod = -1 }},
		{"guide infinitely far", "Guide.Y", rigid.ErrNotFinite, func(d *slidercrank.QuickReturnDimensions) { d.Guide.Y = math.Inf(1) }},
		{"guide's angle not a number", "Guide.Angle", rigid.ErrNotFinite, func(d *slidercrank.QuickReturnDimensions) { d.Guide.Angle = math.NaN() }},
		{"unknown branch", "Branch", rigid.ErrInput, func(d *slidercrank.QuickReturnDimensions) { d.Branch = 2 }},
		{"guide out of reach", "", rigid.ErrUnreachable, func(d *slidercrank.QuickReturnDimensions) { d.Guide.X = 0.6 }},
	} {
		d := ok
		row.set(&d)
		q, err := slidercrank.NewQuickReturn(d)
		bad, found := errors.AsType[*rigid.DimensionError](err)
		if q != nil || !found || bad.Name != row.field || !errors.Is(err, row.cause) {
			t.Errorf("%s: %v, %v", row.name, q, err)
		}
	}
	q, zero := newQuickReturn(t, ok), new(slidercrank.QuickReturn)
	if q.Dimensions() != ok {
		t.Errorf("Dimensions() = %+v", q.Dimensions())
	}
	short := ok
	short.Rod = 0.02
	part := newQuickReturn(t, short)
	long := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: 1, Centre: 3, Arm: 1e10})
	over := part.Range()
	if len(over) != 2 {
		t.Errorf("a rod that only reaches now and then: %v", over)
	}
	if _, err := part.TimeRatio(); err != rigid.ErrUnreachable {
		t.Errorf("time ratio of a crank that cannot turn: %v", err)
	}
	travel := func(q *slidercrank.QuickReturn, pos, vel float64, elbow, knee rigid.Side) func(*slidercrank.QuickReturnState) error {
		return func(st *slidercrank.QuickReturnState) error {
			return q.SolveTravel(st, rigid.Coordinate{Pos: pos, Vel: vel}, elbow, knee)
		}
	}
	turn := func(q *slidercrank.QuickReturn, pos, vel float64) func(*slidercrank.QuickReturnState) error {
		return func(st *slidercrank.QuickReturnState) error { return q.Solve(st, rigid.Coordinate{Pos: pos, Vel: vel}) }
	}
	for _, row := range []struct {
		name string
		run  func(*slidercrank.QuickReturnState) error
		want error
	}{
		{"turn not a number", turn(q, math.NaN(), 0), rigid.ErrNotFinite},
		{"speed would overflow", turn(q, 1, 1e160), rigid.ErrNotFinite},
		{"acceleration of the output pin would overflow", func(st *slidercrank.QuickReturnState) error {
			return long.Solve(st, rigid.Coordinate{Acc: 1e300})
		}, rigid.ErrNotFinite},
		{"rod does not reach", turn(part, (over[0].Hi+over[1].Lo)/2, 0), rigid.ErrUnreachable},
		{"rates where the rod is square to the guide", turn(part, over[1].Lo, 1), rigid.ErrSingular},
		{"zero drive", turn(zero, 0, 1), rigid.ErrInput},
		{"travel not a number", travel(q, math.NaN(), 0, 0, 0), rigid.ErrNotFinite},
		{"travel beyond the arm", travel(q, 1, 0, 0, 0), rigid.ErrUnreachable},
		{"travel beyond the lever's swing", travel(q, 0.42, 0, rigid.Right, 0), rigid.ErrUnreachable},
		{"a travel of the slow stroke", travel(q, 0.2, 1, rigid.Right, rigid.Right), nil},
		{"unknown elbow", travel(q, 0.2, 0, 3, 0), rigid.ErrInput},
		{"unknown knee", travel(q, 0.2, 0, rigid.Right, 3), rigid.ErrInput},
		{"travel of a zero drive", travel(zero, 0, 0, 0, 0), rigid.ErrInput},
	} {
		outcome(t, row.name, slidercrank.QuickReturnState{Travel: rigid.Coordinate{Pos: 7}}, row.run, row.want)
	}
	if _, _, err := zero.Strokes(); err != rigid.ErrInput || zero.Range() != nil || zero.DeadCentres() != nil {
		t.Errorf("strokes or range of no mechanism: %v", err)
	}
}

// Coefficients allocate nothing either.
func TestInversionsLawsAllocateNothing(t *testing.T) {
	q := newQuickReturn(t, slidercrank.QuickReturnDimensions{Crank: 0.12, Centre: 0.3, Arm: 0.5, Rod: 0.2, Guide: across(0.15)})
	l := newLever(t, slidercrank.LeverDimensions{Crank: 0.12, Centre: 0.3})
	c := newCylinder(t, slidercrank.CylinderDimensions{Crank: 0.12, Centre: 0.3})
	r := newRod(t, slidercrank.RodDimensions{Length: 1, Angle: 1})
	y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: 1})
	if err != nil {
		t.Fatal(err)
	}
	for i, law := range []rigid.Law{q.Coefficients, l.Coefficients, c.Coefficients, r.Coefficients, y.Coefficients} {
		for _, at := range []float64{0.3, math.NaN()} {
			if n := testing.AllocsPerRun(50, func() { _, _ = law(at) }); n != 0 {
				t.Errorf("law %d at %v: %v allocations", i, at, n)
			}
		}
	}
}
