package rigid_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

const full = rigid.Revolution

func extremes(t *testing.T, l rigid.Law, lo, hi float64) []rigid.Coefficients {
	t.Helper()
	found, err := l.Extremes(rigid.Interval{Lo: lo, Hi: hi})
	if err != nil {
		t.Fatal(err)
	}
	last := math.Inf(-1)
	for _, c := range found {
		at, err := l(c.In)
		if err != nil || at != c || !(lo <= c.In && c.In < hi) || !(c.In > last) {
			t.Errorf("%+v in %v to %v after %v: the law gives %+v, %v", c, lo, hi, last, at, err)
		}
		last = c.In
	}
	return found
}

func places(t *testing.T, what string, got []rigid.Coefficients, tol float64, want ...float64) {
	t.Helper()
	if len(got) != len(want) {
		t.Errorf("%s: %d found, want %d: %+v", what, len(got), len(want), got)
		return
	}
	for i, c := range got {
		near(t, what, c.In, want[i], tol)
	}
}

// A whole turn from anywhere holds each dead centre once: from a dead centre itself,
// off it by rounding, many turns away.
func TestExtremesOncePerTurn(t *testing.T) {
	rnd := newRandom(110)
	for _, l := range []rigid.Law{sineLaw, sliderCrank(0.05, 0.2, 0), sliderCrank(0.03, 0.05, 0.01), fourBar(0.15, 0.04, 0.15, 0.08, 1)} {
		dead := extremes(t, l, -math.Pi, math.Pi)
		if len(dead) != 2 {
			t.Fatal(dead)
		}
		for _, turns := range []float64{0, 1, -3, 1000} {
			for _, d := range []float64{dead[0].In, dead[1].In, math.Pi, 0, rnd.number()} {
				for _, off := range []float64{0, 1, -1, 3, -3} {
					lo := d + turns*full
					lo += off * (math.Nextafter(lo, 1e9) - lo)
					got := extremes(t, l, lo, lo+full)
					if len(got) != 2 {
						t.Errorf("from %v, %v turns on, off %v: %v", d, turns, off, got)
					}
				}
			}
		}
		if got := extremes(t, l, dead[0].In, dead[1].In); len(got) != 1 || got[0].In != dead[0].In {
			t.Errorf("a stroke holds %v", got)
		}
		if got := extremes(t, l, -5*full, 5*full); len(got) != 20 {
			t.Errorf("%d dead centres in ten turns", len(got))
		}
		// and each extreme of speed and acceleration
		speed, acc, err := l.Peaks(turn)
		if err != nil {
			t.Fatal(err)
		}
		for _, from := range append(append([]rigid.Coefficients{}, speed...), acc...) {
			s, a, err := l.Peaks(rigid.Interval{Lo: from.In, Hi: from.In + full})
			if err != nil || len(s) != len(speed) || len(a) != len(acc) {
				t.Errorf("from %v: %d and %d peaks, want %d and %d", from.In, len(s), len(a), len(speed), len(acc))
			}
		}
	}
}

// The same for a law that ends where the turn does, so that nothing can be seen
// beyond: a dead centre next to Lo, on either side, is the one at Lo.
func TestExtremesAtTheEndOfALaw(t *testing.T) {
	for _, turns := range []float64{0, 1, 100, 1000} {
		for off := -3.0; off <= 3; off++ {
			lo := math.Pi/2 + turns*full
			lo += off * (math.Nextafter(lo, 1e9) - lo)
			over := rigid.Interval{Lo: lo, Hi: lo + full}
			places(t, "law with ends", extremes(t, only(sineLaw, over), lo, over.Hi), 4e-12, lo, lo+math.Pi)
		}
	}
}

// Two dead centres nearer to each other than a step, down to where float64 cannot
// tell them apart: First = (x − p)(x − q)(1 + x²/9), and two peaks of speed in one step.
func TestExtremesClosePairs(t *testing.T) {
	over := rigid.Interval{Lo: -1, Hi: 2}
	pair := func(p, q float64) rigid.Law { // ∫(x − p)(x − q)dx
		return polynomial(0, p*q, -(p+q)/2, 1.0/3)
	}
	for d := 1.0; d > 1e-6; d /= 3 {
		for _, p := range []float64{0, 0.3141, 0.5} {
			got := extremes(t, pair(p, p+d), over.Lo, over.Hi)
			places(t, "pair", got, 1e-15/d, p, p+d)
			strokes, err := pair(p, p+d).Strokes(over)
			if err != nil || len(strokes) != 3 {
				t.Errorf("%v: %v, %v", d, strokes, err)
			}
			// one integral more: the same pair as peaks of speed
			q := p + d
			speed, _, err := polynomial(0, 0.5, p*q/2, -(p+q)/6, 1.0/12).Peaks(over)
			if err != nil {
				t.Fatal(err)
			}
			places(t, "pair of speeds", speed, 1e-15/d, p, q)
		}
	}
}

// Where First touches 0 the output stands still for an instant: a dead centre, and a
// cut between strokes, though the output goes on the same way.
func TestExtremesTouch(t *testing.T) {
	for _, at := range []float64{0, 1e-8, 0.5, 0.123456, math.Pi / 10} { // 1e-8: beside a step's end
		l := shifted(polynomial(1, 0, 0, 2), -at) // 1 + 2(x − at)³
		places(t, "touch", extremes(t, l, -1, 1), 1e-15, at)
		strokes, err := l.Strokes(rigid.Interval{Lo: -1, Hi: 1})
		if err != nil || len(strokes) != 2 {
			t.Errorf("%v, %v", strokes, err)
		}
		places(t, "touch at Lo", extremes(t, l, at, 1), 0, at)
		places(t, "touch at Hi", extremes(t, l, -1, at), 0)
		miss := shifted(polynomial(1, 1e-9, 0, 2), -at) // First is 1e-9 at least
		places(t, "no touch", extremes(t, miss, -1, 1), 0)
	}
	// from a change of sign as flat as can be
	places(t, "x⁴", extremes(t, polynomial(0, 0, 0, 0, 1), -1, 1.3), 1e-5, 0)
	// a corner: the output turns without slowing down
	corner := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		return rigid.Coefficients{In: x, Out: math.Abs(x - 0.3), First: math.Copysign(1, x-0.3)}, nil
	})
	places(t, "corner", extremes(t, corner, -1, 1), 1e-16, 0.3)
	// First changes sign by growing without bound, between two float64
	pole := lawOf(func(x jet) jet {
		d := x.v - 0.3 + 1e-18
		return x.through(math.Log(math.Abs(d)), 1/d, -1/(d*d))
	})
	places(t, "pole", extremes(t, pole, -1, 1), 0)
}

// A cam with dwells: both ends of each count, wherever the turn begins, and the
// strokes are rise, dwell, fall, dwell.
func TestExtremesDwell(t *testing.T) {
	cam := camRise(cycloid)
	const quarter = math.Pi / 2
	for k, lo := range []float64{0, quarter, 2 * quarter, -quarter} {
		// First = 1 − cos leaves the places of the ends uncertain to 1e-7
		places(t, "dwells", extremes(t, cam, lo, lo+full), 1e-7, lo, lo+quarter, lo+2*quarter, lo+3*quarter)
		strokes, err := cam.Strokes(rigid.Interval{Lo: lo, Hi: lo + full})
		if err != nil || len(strokes) != 4 {
			t.Fatalf("from quarter %d: %v, %v", k, strokes, err)
		}
	}
	places(t, "from within a dwell", extremes(t, cam, 2, 2+full), 1e-7, 2*quarter, 3*quarter, 4*quarter, 5*quarter)
	for _, l := range []rigid.Law{rigid.Linear(0, 1), rigid.Linear(3, 1)} {
		places(t, "no motion, or even motion", extremes(t, l, 0, 1), 0)
		speed, acc, err := l.Peaks(rigid.Interval{Lo: 0, Hi: 1})
		if speed != nil || acc != nil || err != nil {
			t.Errorf("%v, %v, %v", speed, acc, err)
		}
	}
	// constant but for rounding, as of a parallelogram
	rough := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		n := math.Sin(1e6 * x)
		return rigid.Coefficients{In: x, Out: x + 1e-16*n, First: 1 + 2e-16*n, Second: 3e-16 * n}, nil
	})
	speed, acc, err := rough.Peaks(turn)
	if len(speed) != 0 || len(acc) != 0 || err != nil {
		t.Errorf("peaks of noise: %v, %v, %v", speed, acc, err)
	}
}

// A whole turn from a dead centre, off by its rounding, is the two whole strokes.
func TestStrokesWhole(t *testing.T) {
	for phase := -3.0; phase < 3; phase += 0.01 {
		law := rigid.Linear(1, phase).Then(sineLaw)
		dead, err := law.Extremes(turn)
		if err != nil || len(dead) != 2 {
			t.Fatalf("phase %v: %v, %v", phase, dead, err)
		}
		for i, d := range dead {
			strokes, err := law.Strokes(rigid.Interval{Lo: d.In, Hi: d.In + rigid.Revolution})
			if err != nil || len(strokes) != 2 {
				t.Fatalf("phase %v: %v, %v", phase, strokes, err)
			}
			if between := dead[1-i].In + float64(i)*rigid.Revolution; math.Abs(strokes[0].Hi-between) > 1e-12 {
				t.Errorf("phase %v: %v, want a dead centre at %v", phase, strokes, between)
			}
		}
	}
}

// Laws with gaps: what lies between them is found, up to the last float64.
func TestStrokesGaps(t *testing.T) {
	limits := []rigid.Interval{{Lo: -2.5, Hi: -1}, {Lo: 0.2, Hi: 1.6}, {Lo: 2, Hi: 2.0625}}
	law := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		for _, i := range limits {
			if i.Lo < x && x < i.Hi {
				return sineLaw(x)
			}
		}
		return rigid.Coefficients{}, rigid.ErrUnreachable
	})
	places(t, "gaps", extremes(t, law, -3, 3), 1e-15, -math.Pi/2, math.Pi/2)
	strokes, err := law.Strokes(rigid.Interval{Lo: -3, Hi: 2})
	if err != nil {
		t.Fatal(err)
	}
	up := func(x float64) float64 { return math.Nextafter(x, 9) }
	down := func(x float64) float64 { return math.Nextafter(x, -9) }
	want := []rigid.Interval{{Lo: up(-2.5), Hi: -math.Pi / 2}, {Lo: -math.Pi / 2, Hi: down(-1)},
		{Lo: up(0.2), Hi: math.Pi / 2}, {Lo: math.Pi / 2, Hi: down(1.6)}}
	if len(strokes) != len(want) {
		t.Fatalf("%v, want %v", strokes, want)
	}
	for i, s := range strokes {
		if math.Abs(s.Lo-want[i].Lo) > 3e-16 || math.Abs(s.Hi-want[i].Hi) > 3e-16 {
			t.Errorf("stroke %d: %v, want %v", i, s, want[i])
		}
	}
	// ends of over at which the law has no value, next to where it has
	strokes, err = law.Strokes(rigid.Interval{Lo: 0.2, Hi: 1.6})
	if err != nil || len(strokes) != 2 || strokes[0].Lo != 0.2 || strokes[1].Hi != 1.6 {
		t.Errorf("%v, %v", strokes, err)
	}
}

func TestExtremesErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	part := only(sineLaw, rigid.Interval{Lo: 5, Hi: 6})
	sick := rigid.Law(func(x float64) (rigid.Coefficients, error) { return rigid.Coefficients{Out: nan}, nil })
	for _, c := range []struct {
		why  string
		law  rigid.Law
		over rigid.Interval
		want error
	}{
		{"NaN", sineLaw, rigid.Interval{Lo: nan, Hi: 1}, rigid.ErrNotFinite},
		{"infinite", sineLaw, rigid.Interval{Lo: 0, Hi: inf}, rigid.ErrNotFinite},
		{"too long", sineLaw, rigid.Interval{Lo: -1.5e308, Hi: 1.5e308}, rigid.ErrNotFinite},
		{"upside down", sineLaw, rigid.Interval{Lo: 1, Hi: 0}, rigid.ErrInput},
		{"no value anywhere", part, rigid.Interval{Lo: 0, Hi: 1}, rigid.ErrUnreachable},
		{"a value just beyond", part, rigid.Interval{Lo: 4, Hi: 4.9999}, rigid.ErrUnreachable},
		{"a law of NaN", sick, turn, rigid.ErrNotFinite},
		{"nil", nil, turn, rigid.ErrInput},
		{"law of nil", rigid.LawOf(nil), turn, rigid.ErrInput},
		{"no length", sineLaw, rigid.Interval{Lo: 1, Hi: 1}, nil},
		{"next to none", sineLaw, rigid.Interval{Lo: 1, Hi: math.Nextafter(1, 2)}, nil},
	} {
		e, err := c.law.Extremes(c.over)
		s, err2 := c.law.Strokes(c.over)
		v, a, err3 := c.law.Peaks(c.over)
		if err != c.want || err2 != c.want || err3 != c.want || e != nil || v != nil || a != nil || err != nil && s != nil {
			t.Errorf("%s: %v, %v; %v, %v; %v, %v, %v", c.why, e, err, s, err2, v, a, err3)
		}
	}
}
