package rolling_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

func pair(t testing.TB, d rolling.PairDimensions) *rolling.Pair {
	t.Helper()
	p, err := rolling.NewPair(d)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// randomPair returns friction wheels or gears, external or internal.
func randomPair(rng *rand.Rand) rolling.PairDimensions {
	d := rolling.PairDimensions{
		Internal: rng.IntN(2) == 0,
		Mount:    rigid.Placement{X: rng.Float64(), Y: rng.Float64(), Angle: 8*rng.Float64() - 4},
	}
	if rng.IntN(2) == 0 {
		d.RadiusA, d.RadiusB = 0.05+rng.Float64(), 0.05+rng.Float64()
		return d
	}
	d.TeethA, d.TeethB = 10+rng.IntN(90), 100+rng.IntN(90)
	if rng.IntN(2) == 0 {
		d.TeethA, d.TeethB = d.TeethB, d.TeethA
	}
	d.Centres = 0.1 + rng.Float64()
	return d
}

// TestPairRolls checks on random pairs what makes two wheels a pair: at the pitch point
// both move alike, it is their relative centre, and with the centres it lies on one line
// (Aronhold–Kennedy); one way and back agree; an arm carries all of it.
func TestPairRolls(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 4))
	for range runs(2000) {
		d := randomPair(rng)
		p := pair(t, d)
		turn := coordinate(rng, 9)
		var st, back rolling.PairState
		if err := errors.Join(p.Solve(&st, turn), p.SolveB(&back, st.TurnB)); err != nil {
			t.Fatal(err)
		}
		const tol = 1e-11
		arm := rigid.Motion{Pose: rigid.NewPose(1, 2, 3), Vel: r2.Vec{X: 1}, Acc: r2.Vec{Y: -2}, Omega: 0.7, Alpha: -0.4}
		for _, on := range []bool{false, true} {
			if on {
				if err := errors.Join(st.On(&arm), back.On(&arm)); err != nil {
					t.Fatal(err)
				}
			}
			a := st.A.At(st.A.Pose.Local(st.PitchA.Pos))
			b := st.B.At(st.B.Pose.Local(st.PitchB.Pos))
			if !nearPoint(a, st.PitchA, tol) || !nearPoint(b, st.PitchB, tol) || !nearVec(a.Vel, b.Vel, tol) || st.PitchA.Pos != st.PitchB.Pos {
				t.Fatalf("%+v: pitch %+v and %+v, particles %+v and %+v", d, st.PitchA, st.PitchB, a, b)
			}
			if pole, err := rigid.RelativePole(&st.A, &st.B); err != nil || !nearVec(pole, st.PitchA.Pos, 1e-9) {
				t.Fatalf("%+v: relative centre %v %v, want %v", d, pole, err, st.PitchA.Pos)
			}
			ab := r2.Sub(st.B.Pose.Origin, st.A.Pose.Origin)
			if ap := r2.Sub(st.PitchA.Pos, st.A.Pose.Origin); !near(r2.Cross(ab, ap), 0, tol) {
				t.Fatalf("%+v: pitch point off the line of centres", d)
			}
			if !nearMotion(st.A, back.A, tol) || !nearMotion(st.B, back.B, tol) || !nearPoint(st.PitchA, back.PitchA, tol) {
				t.Fatalf("%+v: back from B: %+v, want %+v", d, back, st)
			}
		}
		if turn != st.TurnA || back.TurnB != st.TurnB {
			t.Fatalf("a given turn changed: %+v %+v", st, back)
		}
		c, err := p.Coefficients(turn.Pos)
		if got := c.Output(turn.Vel, turn.Acc); err != nil || got != st.TurnB {
			t.Fatalf("coefficients give %+v %v, want %+v", got, err, st.TurnB)
		}
	}
}

// TestPairRatios: sense and size of the ratio by kind, and the place of the centres.
func TestPairRatios(t *testing.T) {
	for _, row := range []struct {
		name          string
		d             rolling.PairDimensions
		ratio, centre float64
		pitch         float64
	}{
		{"external by radii", rolling.PairDimensions{RadiusA: 0.1, RadiusB: 0.25}, -0.4, 0.35, 0.1},
		{"internal by radii, B the ring", rolling.PairDimensions{RadiusA: 0.1, RadiusB: 0.25, Internal: true}, 0.4, -0.15, 0.1},
		{"internal by radii, A the ring", rolling.PairDimensions{RadiusA: 0.25, RadiusB: 0.1, Internal: true}, 2.5, 0.15, 0.25},
		{"external by teeth", rolling.PairDimensions{TeethA: 20, TeethB: 50, Centres: 0.35}, -0.4, 0.35, 0.1},
		{"internal by teeth", rolling.PairDimensions{TeethA: 20, TeethB: 50, Centres: 0.15, Internal: true}, 0.4, -0.15, 0.1},
		{"all given", rolling.PairDimensions{TeethA: 20, TeethB: 50, RadiusA: 0.1, RadiusB: 0.25, Centres: 0.35}, -0.4, 0.35, 0.1},
	} {
		p := pair(t, row.d)
		var st rolling.PairState
		if err := p.Solve(&st, rigid.Coordinate{Pos: 1, Vel: 1}); err != nil {
			t.Fatal(err)
		}
		if !near(st.TurnB.Vel, row.ratio, 1e-15) || !near(st.B.Pose.Origin.X, row.centre, 1e-15) || !near(st.PitchA.Pos.X, row.pitch, 1e-15) {
			t.Errorf("%s: %+v", row.name, st)
		}
		if p.Dimensions() != row.d || len(p.Range()) != 1 {
			t.Errorf("%s: %+v %v", row.name, p.Dimensions(), p.Range())
		}
	}
}

// TestPairMillionTurns: teeth are whole fractions, so a turn that is a whole number
// gives the float64 nearest to the exact turn.
func TestPairMillionTurns(t *testing.T) {
	p := pair(t, rolling.PairDimensions{TeethA: 17, TeethB: 53, Centres: 0.35})
	var st rolling.PairState
	if err := p.Solve(&st, rigid.Coordinate{Pos: 53 * 123457}); err != nil || st.TurnB.Pos != -17*123457 {
		t.Errorf("%v %v, want %v exactly", st.TurnB.Pos, err, -17*123457)
	}
	if err := p.SolveB(&st, rigid.Coordinate{Pos: 17 * 123457}); err != nil || st.TurnA.Pos != -53*123457 {
		t.Errorf("%v %v, want %v exactly", st.TurnA.Pos, err, -53*123457)
	}
}

// TestAngleBeyondFloat: the turn of B, 10¹⁶/3, is no float64, and the nearest lies up to
// 1 rad away; its axis is still right. Figures: 20 digits by mpmath.
func TestAngleBeyondFloat(t *testing.T) {
	p := pair(t, rolling.PairDimensions{TeethA: 20, TeethB: 60, Centres: 0.4})
	var st rolling.PairState
	if err := p.Solve(&st, rigid.Coordinate{Pos: 1e16}); err != nil {
		t.Fatal(err)
	}
	want := r2.Vec{X: -0.95590923317190489426, Y: -0.29366228551977994801}
	if got := st.B.Pose.Axis; !nearVec(got, want, 4*eps) {
		t.Errorf("axis %v, want %v", got, want)
	}
}

func TestNewPairErrors(t *testing.T) {
	nan, sum := math.NaN(), 0.1 // a variable, for constants are added exactly
	sum += 0.2
	for _, row := range []struct {
		d     rolling.PairDimensions
		name  string
		cause error
	}{
		{rolling.PairDimensions{}, "RadiusA", rigid.ErrNotPositive},
		{rolling.PairDimensions{RadiusA: 1}, "RadiusB", rigid.ErrNotPositive},
		{rolling.PairDimensions{RadiusA: -1, RadiusB: 1}, "RadiusA", rigid.ErrNotPositive},
		{rolling.PairDimensions{RadiusA: nan, RadiusB: 1}, "RadiusA", rigid.ErrNotFinite},
		{rolling.PairDimensions{RadiusA: 1, RadiusB: 1e61}, "RadiusB", rigid.ErrInput},
		{rolling.PairDimensions{TeethA: 20, TeethB: 30}, "Centres", rigid.ErrNotPositive},
		{rolling.PairDimensions{TeethA: 20, TeethB: 30, Centres: math.Inf(1)}, "Centres", rigid.ErrNotFinite},
		{rolling.PairDimensions{TeethA: 20, Centres: 1}, "TeethB", rigid.ErrNotPositive},
		{rolling.PairDimensions{TeethA: -20, TeethB: 30, Centres: 1}, "TeethA", rigid.ErrNotPositive},
		{rolling.PairDimensions{TeethA: 20, TeethB: 20, Centres: 1, Internal: true}, "TeethB", rigid.ErrSingular},
		{rolling.PairDimensions{RadiusA: 0.3, RadiusB: sum, Internal: true}, "RadiusB", rigid.ErrSingular},
		{rolling.PairDimensions{TeethA: 20, TeethB: 30, RadiusA: 0.2, RadiusB: 0.3001}, "RadiusB", rigid.ErrInput},
		{rolling.PairDimensions{RadiusA: 0.2, RadiusB: 0.3, Centres: 0.5001}, "Centres", rigid.ErrInput},
		{rolling.PairDimensions{RadiusA: 1, RadiusB: 1, Mount: rigid.Placement{Y: nan}}, "Mount.Y", rigid.ErrNotFinite},
	} {
		p, err := rolling.NewPair(row.d)
		checkRefused(t, p == nil, err, row.name, row.cause)
		if bad, _ := errors.AsType[*rigid.DimensionError](err); row.name == "RadiusA" && bad.Value == bad.Value && bad.Value != row.d.RadiusA {
			t.Errorf("%v does not give %v", err, row.d.RadiusA)
		}
	}
}

// TestSayOnce: what is missing is named once, and nothing that follows from it.
func TestSayOnce(t *testing.T) {
	_, pair := rolling.NewPair(rolling.PairDimensions{TeethA: 20, TeethB: 40})
	_, belt := rolling.NewBelt(rolling.BeltDimensions{TeethA: 20, TeethB: 40, Centres: 1})
	_, teeth := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.1, TeethB: -4, RadiusB: 0.1, Pitch: 0.01, Centres: 1})
	_, rack := rolling.NewRack(rolling.RackDimensions{Teeth: 20})
	for _, row := range []struct {
		err  error
		want string
	}{
		{pair, "twopoint: dimension Centres = 0: teeth without radii need the distance of the centres"},
		{belt, "twopoint: dimension Pitch = 0: must be positive"},
		{teeth, "twopoint: dimension TeethA = 0: a gear must have a tooth at least\n" +
			"twopoint: dimension TeethB = -4: a gear must have a tooth at least"},
		{rack, "twopoint: dimension Pitch = 0: must be positive"},
	} {
		if row.err == nil || row.err.Error() != row.want {
			t.Errorf("%v\nwant %s", row.err, row.want)
		}
	}
}

// TestPairsRefuse: every solver of pair, rack and belt refuses numbers that are not
// finite, results that overflow and a zero value, and leaves the state as it was.
func TestPairsRefuse(t *testing.T) {
	p := pair(t, rolling.PairDimensions{TeethA: 20, TeethB: 50, Centres: 0.35})
	r, err := rolling.NewRack(rolling.RackDimensions{Radius: 0.1})
	q, err2 := rolling.NewBelt(rolling.BeltDimensions{RadiusA: 0.1, RadiusB: 0.2, Centres: 1})
	if err := errors.Join(err, err2); err != nil {
		t.Fatal(err)
	}
	nan, inf := math.NaN(), math.Inf(1)
	arm := rigid.Motion{Omega: 1e200}
	for _, c := range []rigid.Coordinate{{Pos: nan}, {Pos: inf}, {Vel: nan}, {Vel: -inf}, {Acc: nan}, {Acc: inf}, {}} {
		// the empty one goes to zero values
		want := rigid.ErrNotFinite
		if c == (rigid.Coordinate{}) {
			want, p, r, q = rigid.ErrInput, &rolling.Pair{}, &rolling.Rack{}, &rolling.Belt{}
		}
		ps := rolling.PairState{TurnA: rigid.Coordinate{Pos: 42}}
		rs := rolling.RackState{Turn: rigid.Coordinate{Pos: 42}}
		bs := rolling.BeltState{TurnA: rigid.Coordinate{Pos: 42}}
		ps0, rs0, bs0 := ps, rs, bs
		for name, err := range map[string]error{
			"Pair.Solve": p.Solve(&ps, c), "Pair.SolveB": p.SolveB(&ps, c),
			"Rack.Solve": r.Solve(&rs, c), "Rack.SolveSlide": r.SolveSlide(&rs, c),
			"Belt.Solve": q.Solve(&bs, c), "Belt.SolveB": q.SolveB(&bs, c), "Belt.SolveSlide": q.SolveSlide(&bs, c),
		} {
			if err != want {
				t.Errorf("%s of %+v: %v, want %v", name, c, err, want)
			}
		}
		ps.A.Pose.Origin, rs.Rack.Pose.Origin, bs.B.Pose.Origin = r2.Vec{X: 1}, r2.Vec{X: 1}, r2.Vec{X: 1}
		ps0.A.Pose.Origin, rs0.Rack.Pose.Origin, bs0.B.Pose.Origin = r2.Vec{X: 1}, r2.Vec{X: 1}, r2.Vec{X: 1}
		for name, err := range map[string]error{"PairState.On": ps.On(&arm), "RackState.On": rs.On(&arm), "BeltState.On": bs.On(&arm)} {
			if err != rigid.ErrNotFinite {
				t.Errorf("%s: %v", name, err)
			}
		}
		if ps != ps0 || rs != rs0 || bs != bs0 {
			t.Errorf("%+v: a state changed", c)
		}
	}
	_, err1 := p.Coefficients(1)
	_, err2 = r.Coefficients(1)
	_, err3 := q.Coefficients(1)
	if err1 != rigid.ErrInput || err2 != rigid.ErrInput || err3 != rigid.ErrInput || p.Range() != nil || r.Range() != nil || q.Range() != nil {
		t.Error("zero values give answers")
	}
	if a, b := q.Wrap(); a == a || b == b || q.Length() == q.Length() {
		t.Error("a zero Belt has a length")
	}
}
