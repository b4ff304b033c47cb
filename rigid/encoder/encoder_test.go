package encoder_test

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rigid/encoder"
)

const (
	least    = math.MinInt64
	greatest = math.MaxInt64
)

func TestAngle(t *testing.T) {
	plain := encoder.Encoder{PerTurn: 4096, Zero: 100}
	back := encoder.Encoder{PerTurn: 4096, Zero: 100, Reverse: true}
	for _, c := range []struct {
		why   string
		e     encoder.Encoder
		count int64
		turns int64
		angle float64
		err   error
	}{
		{"zero", plain, 100, 0, 0, nil},
		{"a quarter on", plain, 100 + 1024, 0, math.Pi / 2, nil},
		{"a quarter back", plain, 100 - 1024, -1, 3 * math.Pi / 2, nil},
		{"one count back", plain, 99, -1, rigid.Revolution * 4095 / 4096, nil},
		{"a turn", plain, 100 + 4096, 1, 0, nil},
		{"a turn back", plain, 100 - 4096, -1, 0, nil},
		{"a quarter on, reversed", back, 100 + 1024, -1, 3 * math.Pi / 2, nil},
		{"a quarter back, reversed", back, 100 - 1024, 0, math.Pi / 2, nil},
		{"1e9 turns and an eighth", plain, 100 + 4096e9 + 512, 1e9, math.Pi / 4, nil},
		{"−1e9 turns and an eighth", plain, 100 - 4096e9 + 512, -1e9, math.Pi / 4, nil},
		{"one count a turn", encoder.Encoder{PerTurn: 1}, -7, -7, 0, nil},
		{"greatest count", encoder.Encoder{PerTurn: 2}, greatest, greatest / 2, math.Pi, nil},
		{"least count", encoder.Encoder{PerTurn: 2}, least, least / 2, 0, nil},
		{"finest, last count", encoder.Encoder{PerTurn: greatest}, greatest - 1, 0, math.Nextafter(2*math.Pi, 0), nil},
		{"the zero Encoder", encoder.Encoder{}, 0, 0, 0, rigid.ErrInput},
		{"negative PerTurn", encoder.Encoder{PerTurn: -4096}, 0, 0, 0, rigid.ErrInput},
		{"overflow above", encoder.Encoder{PerTurn: 4, Zero: -1}, greatest, 0, 0, rigid.ErrInput},
		{"overflow below", encoder.Encoder{PerTurn: 4, Zero: 1}, least, 0, 0, rigid.ErrInput},
		{"overflow above, reversed", encoder.Encoder{PerTurn: 4, Reverse: true}, least, 0, 0, rigid.ErrInput},
		{"next to it, reversed", encoder.Encoder{PerTurn: 4, Reverse: true}, least + 1, greatest / 4, 3 * math.Pi / 2, nil},
		{"overflow of both", encoder.Encoder{PerTurn: 4, Zero: least}, greatest, 0, 0, rigid.ErrInput},
		{"least less least", encoder.Encoder{PerTurn: 4, Zero: least}, least, 0, 0, nil},
	} {
		turns, angle, err := c.e.Angle(c.count)
		if turns != c.turns || math.Abs(angle-c.angle) > 5e-16 || err != c.err {
			t.Errorf("%s: Angle(%d) = %d, %.17g, %v; want %d, %.17g, %v", c.why, c.count, turns, angle, err, c.turns, c.angle, c.err)
		}
		if angle < 0 || angle >= 2*math.Pi {
			t.Errorf("%s: angle %g is outside [0, 2π)", c.why, angle)
		}
		if err != nil {
			continue
		}
		if c.e.PerTurn < 1<<49 {
			if got, err := c.e.Count(turns, angle); got != c.count || err != nil {
				t.Errorf("%s: Count(%d, %g) = %d, %v; want %d", c.why, turns, angle, got, err, c.count)
			}
		}
	}
}

func TestCount(t *testing.T) {
	e := encoder.Encoder{PerTurn: 1000, Zero: 7}
	back := encoder.Encoder{PerTurn: 1000, Zero: 7, Reverse: true}
	third := encoder.Encoder{PerTurn: 3}
	const turn = rigid.Revolution
	for _, c := range []struct {
		why   string
		e     encoder.Encoder
		turns int64
		angle float64
		want  int64
		err   error
	}{
		{"nearest, down", e, 2, 0.0124 * turn, 2019, nil},
		{"nearest, up", e, 2, 0.0126 * turn, 2020, nil},
		{"a half away from zero", encoder.Encoder{PerTurn: 2}, 0, turn / 4, 1, nil},
		{"a half away from zero", encoder.Encoder{PerTurn: 2}, 0, -turn / 4, -1, nil},
		{"negative angle", e, 0, -turn / 4, -243, nil},
		{"an angle of many turns", e, -3, 5.25 * turn, 2257, nil},
		{"rounds up to a whole turn", e, 0, 0.9999 * turn, 1007, nil},
		{"reversed", back, 1, turn / 4, 7 - 1250, nil},
		{"product beyond, sum within", third, least/3 - 1, turn / 3, least, nil},
		{"greatest", third, greatest / 3, turn / 3, greatest, nil},
		{"one more", third, greatest / 3, 2 * turn / 3, 0, rigid.ErrInput},
		{"one less", third, least/3 - 1, 0, 0, rigid.ErrInput},
		{"with Zero beyond", encoder.Encoder{PerTurn: 3, Zero: 1}, greatest / 3, turn / 3, 0, rigid.ErrInput},
		{"from Zero beyond, count within", encoder.Encoder{PerTurn: 1, Zero: least}, greatest, turn, 0, rigid.ErrInput},
		{"far beyond", e, greatest, 0, 0, rigid.ErrInput},
		{"far below", e, least, 0, 0, rigid.ErrInput},
		{"angle just beyond", encoder.Encoder{PerTurn: 1 << 62}, 0, 2 * turn, 0, rigid.ErrInput},
		{"angle just within", encoder.Encoder{PerTurn: 1 << 62}, 0, -turn, -1 << 62, nil},
		{"angle beyond", e, 0, 1e300, 0, rigid.ErrInput},
		{"quotient overflows", e, 0, -math.MaxFloat64, 0, rigid.ErrInput},
		{"NaN", e, 0, math.NaN(), 0, rigid.ErrNotFinite},
		{"infinite", e, 0, math.Inf(-1), 0, rigid.ErrNotFinite},
		{"the zero Encoder", encoder.Encoder{}, 0, 0, 0, rigid.ErrInput},
	} {
		if got, err := c.e.Count(c.turns, c.angle); got != c.want || err != c.err {
			t.Errorf("%s: Count(%d, %g) = %d, %v; want %d, %v", c.why, c.turns, c.angle, got, err, c.want, c.err)
		}
	}
}

// checkEncoder compares with whole numbers of any size.
func checkEncoder(t *testing.T, e encoder.Encoder, count int64) {
	t.Helper()
	n := new(big.Int).Sub(big.NewInt(count), big.NewInt(e.Zero))
	if e.Reverse {
		n.Neg(n)
	}
	turns, angle, err := e.Angle(count)
	if e.PerTurn < 1 || !n.IsInt64() {
		if err != rigid.ErrInput {
			t.Fatalf("%+v of %d: %v, want ErrInput", e, count, err)
		}
		return
	}
	part := new(big.Int)
	whole, part := new(big.Int).DivMod(n, big.NewInt(e.PerTurn), part) // Euclidean
	if err != nil || whole.Int64() != turns {
		t.Fatalf("%+v of %d: %d turns, %v; want %d", e, count, turns, err, whole)
	}
	f, _ := new(big.Rat).SetFrac(part, big.NewInt(e.PerTurn)).Float64()
	if want := f * rigid.Revolution; math.Abs(angle-want) > 4e-16*want || angle < 0 || angle >= 2*math.Pi {
		t.Fatalf("%+v of %d: angle %.17g, want %.17g", e, count, angle, want)
	}
	if e.PerTurn < 1<<49 {
		if back, err := e.Count(turns, angle); back != count || err != nil {
			t.Fatalf("%+v: Count(%d, %g) = %d, %v; want %d", e, turns, angle, back, err, count)
		}
	}
}

func TestEncoderRandom(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 1))
	any64 := func() int64 { return int64(rnd.Uint64()) >> rnd.IntN(64) }
	for range 20000 {
		checkEncoder(t, encoder.Encoder{PerTurn: any64(), Zero: any64(), Reverse: rnd.IntN(2) == 0}, any64())
	}
}

func FuzzEncoder(f *testing.F) {
	f.Add(int64(4096), int64(100), false, int64(-1), int64(3), 1.5)
	f.Add(int64(3), int64(0), true, int64(least), int64(least), 1e300)
	f.Add(int64(greatest), int64(-5), false, int64(greatest), int64(-1), math.Inf(1))
	f.Fuzz(func(t *testing.T, perTurn, zero int64, reverse bool, count, turns int64, angle float64) {
		e := encoder.Encoder{PerTurn: perTurn, Zero: zero, Reverse: reverse}
		checkEncoder(t, e, count)
		got, err := e.Count(turns, angle)
		if err != nil {
			if got != 0 {
				t.Errorf("%+v: %d with %v", e, got, err)
			}
			return
		}
		if _, _, err := e.Angle(got); err != nil {
			t.Errorf("%+v: Count(%d, %g) = %d, which Angle refuses", e, turns, angle, got)
		}
	})
}
