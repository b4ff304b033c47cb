package rolling_test

import (
	"errors"
	"math"
	"math/big"
	"math/rand/v2"
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
