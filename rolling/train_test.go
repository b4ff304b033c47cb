package rolling_test

import (
	"errors"
	"math"
	"math/big"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

func train(t testing.TB, d rolling.TrainDesign) *rolling.Train {
	t.Helper()
	tr, err := rolling.NewTrain(d)
	if err != nil {
		t.Fatal(err)
	}
	return tr
}

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

// randomTrain returns a tree of members, each meshing with one before it about an arm
// before both, so that two members more than meshes are driven.
func randomTrain(rng *rand.Rand) rolling.TrainDesign {
	var d rolling.TrainDesign
	carrier, sun := d.Member("carrier"), d.Member("sun")
	d.Drives = []rolling.Member{sun, carrier}
	for range 2 + rng.IntN(8) {
		n := len(d.Members)
		other := rolling.Member(rng.IntN(n))
		arm := rolling.Member(rng.IntN(n))
		if arm == other {
			arm = rolling.Member((int(arm) + 1) % n)
		}
		m := d.Member("gear " + string(rune('a'+n)))
		d.Meshes = append(d.Meshes, rolling.Mesh{A: other, B: m, Arm: arm, TeethA: 12 + rng.IntN(90), TeethB: 12 + rng.IntN(90), Internal: rng.IntN(3) == 0})
	}
	rng.Shuffle(len(d.Meshes), func(i, j int) { d.Meshes[i], d.Meshes[j] = d.Meshes[j], d.Meshes[i] })
	return d
}

// off returns how far x is from the exact value.
func off(x float64, exact *big.Rat) float64 {
	d := new(big.Rat).SetFloat64(x)
	f, _ := d.Sub(d, exact).Float64()
	return math.Abs(f)
}

// TestWillis: in every mesh of a random train Willis' equation holds exactly for the
// exact ratios, and for the turns to their rounding, however many they are; each turn is
// the float64 nearest to the exact one.
func TestWillis(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 7))
	for range runs(500) {
		d := randomTrain(rng)
		tr := train(t, d)
		in := []rigid.Coordinate{coordinate(rng, 1e7), coordinate(rng, 1e7)}
		dst := make([]rigid.Coordinate, len(d.Members))
		if err := tr.Solve(dst, in...); err != nil {
			t.Fatal(err)
		}
		exact := make([]*big.Rat, len(d.Members)) // turn of each member
		for m := range exact {
			exact[m] = new(big.Rat)
			for j, drive := range d.Drives {
				ratio, err := tr.Ratio(rolling.Member(m), drive)
				if err != nil {
					t.Fatal(err)
				}
				exact[m].Add(exact[m], ratio.Mul(ratio, new(big.Rat).SetFloat64(in[j].Pos)))
			}
			want, _ := exact[m].Float64()
			if got := dst[m].Pos; got != want && off(got, exact[m]) > off(want, exact[m])*(1+1e-9) { // equal in a tie
				t.Fatalf("%+v: member %d turns %v, want %v", d, m, dst[m].Pos, want)
			}
		}
		if dst[0] != (rigid.Coordinate{}) || dst[1] != in[1] || dst[2] != in[0] {
			t.Fatalf("frame and drives turn %+v, want %+v", dst[:3], in)
		}
		for _, m := range d.Meshes {
			a, b := new(big.Rat).Sub(exact[m.A], exact[m.Arm]), new(big.Rat).Sub(exact[m.B], exact[m.Arm])
			a.Mul(a, big.NewRat(int64(m.TeethA), 1))
			b.Mul(b, big.NewRat(int64(m.TeethB), 1))
			if !m.Internal {
				b.Neg(b)
			}
			if a.Cmp(b) != 0 {
				t.Fatalf("%+v: %+v: (A − Arm)·TeethA %v, want %v", d, m, a, b)
			}
			vel := (dst[m.A].Vel-dst[m.Arm].Vel)*float64(m.TeethA) + map[bool]float64{true: -1, false: 1}[m.Internal]*(dst[m.B].Vel-dst[m.Arm].Vel)*float64(m.TeethB)
			size := (math.Abs(dst[m.A].Vel) + math.Abs(dst[m.B].Vel) + math.Abs(dst[m.Arm].Vel)) * 101
			if !near(vel, 0, 4*eps*size) {
				t.Fatalf("%+v: %+v: velocities are off by %v", d, m, vel)
			}
		}
	}
}

// TestTrainCancels: two drives that nearly cancel leave the exact small rest.
func TestTrainCancels(t *testing.T) {
	// a differential: 2·cage = left + right
	tr := train(t, rolling.TrainDesign{
		Members: []string{"frame", "left", "right", "cage", "pinion"}, Drives: []rolling.Member{1, 2},
		Meshes: []rolling.Mesh{mesh(1, 4, 3, 30, 15), inside(4, 2, 3, 15, 30)},
	})
	dst := make([]rigid.Coordinate, 5)
	if err := tr.Solve(dst, rigid.Coordinate{Pos: 1e7 + 0x1p-20, Vel: 3}, rigid.Coordinate{Pos: -1e7, Vel: -3}); err != nil {
		t.Fatal(err)
	}
	if dst[3].Pos != 0x1p-21 || dst[3].Vel != 0 {
		t.Errorf("cage %+v", dst[3])
	}
}

func TestRatio(t *testing.T) {
	one := train(t, publishedTrains()[1].design)
	const annulus, sun, planet, arm = 0, 1, 2, 3
	for _, row := range []struct {
		out, in rolling.Member
		want    string
	}{
		{sun, arm, "13/4"}, {planet, arm, "-13/5"}, {arm, sun, "4/13"}, {planet, sun, "-4/5"}, {sun, sun, "1/1"}, {annulus, sun, "0/1"},
	} {
		got, err := one.Ratio(row.out, row.in)
		if err != nil || got.String() != row.want {
			t.Errorf("%v over %v: %v %v, want %v", row.out, row.in, got, err, row.want)
		}
	}
	got, _ := one.Ratio(sun, arm)
	got.SetInt64(7) // the caller's own
	if again, _ := one.Ratio(sun, arm); again.String() != "13/4" {
		t.Errorf("the train's ratio became %v", again)
	}
	two := train(t, coupledAnnuli())
	if got, err := two.Ratio(2, 1); err != nil || got.String() != "208/217" {
		t.Errorf("B over A with the arm at rest: %v %v", got, err)
	}
	paradox := train(t, publishedTrains()[8].design)
	for name, row := range map[string]struct {
		tr      *rolling.Train
		out, in rolling.Member
		want    error
	}{
		"two drives, in none of them":  {two, 1, 2, rigid.ErrInput},
		"in is the frame":              {one, 1, 0, rigid.ErrInput},
		"in is no member":              {one, 1, 9, rigid.ErrInput},
		"out is no member":             {one, -1, 3, rigid.ErrInput},
		"in rests whatever the drives": {paradox, 1, 3, rigid.ErrSingular},
		"zero Train":                   {&rolling.Train{}, 0, 0, rigid.ErrInput},
	} {
		if got, err := row.tr.Ratio(row.out, row.in); err != row.want || got != nil {
			t.Errorf("%s: %v %v, want %v", name, got, err, row.want)
		}
	}
}

// TestNewTrainErrors: each error names the member.
func TestNewTrainErrors(t *testing.T) {
	members := []string{"frame", "sun", "planet", "ring", "carrier"}
	stage := rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}.Meshes(1, 2, 3, 4)
	drives := func(m ...rolling.Member) []rolling.Member { return m }
	for _, row := range []struct {
		name   string
		d      rolling.TrainDesign
		member string
		cause  error
		says   string
	}{
		{"one drive missing", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1)}, "carrier", rigid.ErrInput, "missing"},
		{"one drive too many", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 3, 4)}, "carrier", rigid.ErrInput, "too many"},
		{"both of a pair driven", rolling.TrainDesign{Members: []string{"frame", "a", "b"}, Drives: drives(1, 2), Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 30)}}, "b", rigid.ErrInput, "too many"},
		{"a member in no mesh", rolling.TrainDesign{Members: append(members[:5:5], "idler"), Meshes: stage, Drives: drives(1, 4)}, "idler", rigid.ErrInput, "missing"},
		{"locked: sun and ring fixed", rolling.TrainDesign{Members: []string{"frame", "planet", "carrier"}, Drives: drives(2),
			Meshes: rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}.Meshes(0, 1, 0, 2)}, "carrier", rigid.ErrInput, "locked"},
		{"locked: three wheels in a ring", rolling.TrainDesign{Members: []string{"frame", "a", "b", "c"}, Drives: drives(1),
			Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 20), mesh(2, 3, 0, 20, 20), mesh(3, 1, 0, 20, 20)}}, "a", rigid.ErrInput, "locked"},
		{"locked beside the drive", rolling.TrainDesign{Members: []string{"frame", "a", "b", "c", "motor"}, Drives: drives(4),
			Meshes: []rolling.Mesh{mesh(1, 2, 0, 20, 20), mesh(2, 3, 0, 20, 20), mesh(3, 1, 0, 20, 20)}}, "b", rigid.ErrInput, "locked"},
		{"no teeth", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 4, 0, 18)}}, "sun", rigid.ErrNotPositive, ""},
		{"negative teeth", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 4, 20, -18)}}, "planet", rigid.ErrNotPositive, ""},
		{"meshes with itself", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(2, 2, 4, 20, 18)}}, "planet", rigid.ErrInput, "itself"},
		{"its own arm", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 4, 4, 20, 18)}}, "carrier", rigid.ErrInput, "itself"},
		{"driven twice", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 1)}, "sun", rigid.ErrInput, "twice"},
		{"one name twice", rolling.TrainDesign{Members: []string{"frame", "sun", "sun"}}, "sun", rigid.ErrInput, "twice"},
		{"frame driven", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(1, 0)}, "Drives[1]", rigid.ErrInput, ""},
		{"drive of no member", rolling.TrainDesign{Members: members, Meshes: stage, Drives: drives(7)}, "Drives[0]", rigid.ErrInput, ""},
		{"mesh of no member", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, -1, 4, 20, 18)}}, "Meshes[0].B", rigid.ErrInput, ""},
		{"arm of no member", rolling.TrainDesign{Members: members, Meshes: []rolling.Mesh{mesh(1, 2, 5, 20, 18)}}, "Meshes[0].Arm", rigid.ErrInput, ""},
		{"no name", rolling.TrainDesign{Members: []string{"", ""}}, "Members[1]", rigid.ErrInput, "missing"},
		{"nothing", rolling.TrainDesign{}, "Members", rigid.ErrInput, ""},
		{"overflow", tower(40), "gear 34", rigid.ErrNotFinite, ""},
	} {
		tr, err := rolling.NewTrain(row.d)
		if err == nil {
			t.Errorf("%s: no error", row.name)
			continue
		}
		checkRefused(t, tr == nil, err, row.member, row.cause)
		if !strings.Contains(err.Error(), row.says) {
			t.Errorf("%s: message %q does not say %q", row.name, err, row.says)
		}
	}
}

// tower returns n pairs of gears in a row, each a billion to one.
func tower(n int) rolling.TrainDesign {
	var d rolling.TrainDesign
	last := d.Member("motor")
	d.Drives = []rolling.Member{last}
	for i := range n {
		next := d.Member("gear " + string(rune('0'+i/10)) + string(rune('0'+i%10)))
		d.Meshes = append(d.Meshes, mesh(last, next, 0, 1e9, 1))
		last = next
	}
	return d
}

// TestTrainDesign: a design's Member appends, the frame first; a Train keeps a copy and
// gives copies.
func TestTrainDesign(t *testing.T) {
	var d rolling.TrainDesign
	sun, planet := d.Member("sun"), d.Member("planet")
	if diff := cmp.Diff([]string{"frame", "sun", "planet"}, d.Members); diff != "" || sun != 1 || planet != 2 {
		t.Errorf("%v %v %s", sun, planet, diff)
	}
	d.Meshes = []rolling.Mesh{mesh(sun, planet, 0, 20, 40)}
	d.Drives = []rolling.Member{sun}
	tr := train(t, d)
	want := tr.Design()
	d.Members[1], d.Meshes[0].TeethA, d.Drives[0] = "x", 7, 2
	given := tr.Design()
	given.Members[1], given.Meshes[0].TeethA, given.Drives[0] = "y", 8, 2
	if diff := cmp.Diff(want, tr.Design()); diff != "" {
		t.Error(diff)
	}
}

// TestRedundantPlanets: planets as members of their own repeat each other's equations,
// and locked up, sun and ring on one shaft, all turn as one.
func TestRedundantPlanets(t *testing.T) {
	p := rolling.Planetary{Sun: 24, Planet: 18, Ring: 60}
	var d rolling.TrainDesign
	sun, ring, carrier := d.Member("sun"), d.Member("ring"), d.Member("carrier")
	for _, name := range []string{"first", "second", "third"} {
		d.Meshes = append(d.Meshes, p.Meshes(sun, d.Member(name), ring, carrier)...)
	}
	d.Drives = []rolling.Member{sun, carrier}
	dst := make([]rigid.Coordinate, len(d.Members))
	if err := train(t, d).Solve(dst, rigid.Coordinate{Pos: 2}, rigid.Coordinate{Pos: 3}); err != nil {
		t.Fatal(err)
	}
	if dst[4] != dst[5] || dst[5] != dst[6] || !near(dst[ring].Pos, 3.4, 1e-15) {
		t.Errorf("%+v", dst)
	}
	up := rolling.TrainDesign{Members: []string{"frame", "shaft", "planet", "carrier"}, Drives: []rolling.Member{1}, Meshes: p.Meshes(1, 2, 1, 3)}
	dst = dst[:4]
	if err := train(t, up).Solve(dst, rigid.Coordinate{Pos: 2, Vel: 5}); err != nil || dst[2] != dst[1] || dst[3] != dst[1] {
		t.Errorf("%+v %v", dst, err)
	}
}

func TestTrainSolveRefuses(t *testing.T) {
	tr := train(t, coupledAnnuli())
	in := rigid.Coordinate{Pos: 1}
	full := make([]rigid.Coordinate, 7)
	full[3].Pos = 42
	nan, inf := math.NaN(), math.Inf(1)
	for name, row := range map[string]struct {
		tr   *rolling.Train
		dst  []rigid.Coordinate
		in   []rigid.Coordinate
		want error
	}{
		"short dst":    {tr, full[:6], []rigid.Coordinate{in, in}, rigid.ErrInput},
		"no dst":       {tr, nil, []rigid.Coordinate{in, in}, rigid.ErrInput},
		"one input":    {tr, full, []rigid.Coordinate{in}, rigid.ErrInput},
		"three inputs": {tr, full, []rigid.Coordinate{in, in, in}, rigid.ErrInput},
		"zero Train":   {&rolling.Train{}, nil, nil, rigid.ErrInput},
		"NaN place":    {tr, full, []rigid.Coordinate{in, {Pos: nan}}, rigid.ErrNotFinite},
		"infinite":     {tr, full, []rigid.Coordinate{{Vel: inf}, in}, rigid.ErrNotFinite},
		"NaN rate":     {tr, full, []rigid.Coordinate{{Acc: nan}, in}, rigid.ErrNotFinite},
		"overflow":     {tr, full, []rigid.Coordinate{{Acc: 1.7e308}, {Acc: 1.7e308}}, rigid.ErrNotFinite},
	} {
		if err := row.tr.Solve(row.dst, row.in...); err != row.want || full[3].Pos != 42 || full[4].Pos != 0 {
			t.Errorf("%s: %v, want %v; %+v", name, err, row.want, full)
		}
	}
	if d := (&rolling.Train{}).Design(); d.Members != nil || d.Meshes != nil || d.Drives != nil {
		t.Errorf("a zero Train has a design: %+v", d)
	}
}

// TestPlanet: a planet rolls on a fixed sun: its point at the pitch point rests, and
// its motion is that of a wheel outside a circle.
func TestPlanet(t *testing.T) {
	const sunRadius, radius = 0.12, 0.09 // 24 and 18 teeth of 10 mm module
	tr := train(t, rolling.TrainDesign{
		Members: []string{"sun", "planet", "carrier"}, Drives: []rolling.Member{2},
		Meshes: []rolling.Mesh{mesh(0, 1, 2, 24, 18)},
	})
	w := wheel(t, rolling.WheelDimensions{Radius: radius, Ground: sunRadius, Mount: rigid.Placement{Y: sunRadius}})
	rng := rand.New(rand.NewPCG(6, 8))
	turns := make([]rigid.Coordinate, 3)
	for range runs(500) {
		in := coordinate(rng, 20)
		if err := tr.Solve(turns, in); err != nil {
			t.Fatal(err)
		}
		var got rigid.Motion
		if err := rolling.Planet(&got, turns[2], turns[1], sunRadius+radius, math.Pi/2); err != nil {
			t.Fatal(err)
		}
		var want rolling.WheelState
		if err := w.Solve(&want, turns[1]); err != nil {
			t.Fatal(err)
		}
		if !nearMotion(got, want.Wheel, 1e-13) {
			t.Fatalf("%+v, want %+v", got, want.Wheel)
		}
		pitch := r2.Scale(sunRadius/(sunRadius+radius), got.Pose.Origin)
		if p := got.At(got.Pose.Local(pitch)); !nearVec(p.Vel, r2.Vec{}, 1e-14) {
			t.Fatalf("pitch point moves %v", p.Vel)
		}
	}
	var m rigid.Motion
	before := m
	bad := rigid.Coordinate{Vel: math.NaN()}
	for name, err := range map[string]error{
		"carrier": rolling.Planet(&m, bad, rigid.Coordinate{}, 1, 0), "planet": rolling.Planet(&m, rigid.Coordinate{}, bad, 1, 0),
		"radius": rolling.Planet(&m, rigid.Coordinate{}, rigid.Coordinate{}, math.Inf(1), 0),
		"angle":  rolling.Planet(&m, rigid.Coordinate{}, rigid.Coordinate{}, 1, math.NaN()),
		"over":   rolling.Planet(&m, rigid.Coordinate{Vel: 1e200}, rigid.Coordinate{}, 1, 0),
	} {
		if !errors.Is(err, rigid.ErrNotFinite) || m != before {
			t.Errorf("%s: %v", name, err)
		}
	}
}
