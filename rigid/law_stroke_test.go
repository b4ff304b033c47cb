package rigid_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/twopoint/rigid"
)

func TestInverseErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	jump := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		return rigid.Coefficients{In: x, Out: x + math.Floor(x), First: 1}, nil
	})
	half := rigid.Interval{Lo: 0, Hi: 1}
	part := only(sineLaw, half)
	hole := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		if 0.4 < x && x < 0.5 {
			return rigid.Coefficients{}, rigid.ErrSingular
		}
		return sineLaw(x)
	})
	for _, c := range []struct {
		why            string
		law            rigid.Law
		over           rigid.Interval
		out            rigid.Coordinate
		inverse, solve error
	}{
		{"good", sineLaw, half, rigid.Coordinate{Pos: 0.5}, nil, nil},
		{"NaN", sineLaw, rigid.Interval{Lo: nan, Hi: 1}, rigid.Coordinate{}, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"infinite", sineLaw, rigid.Interval{Lo: 0, Hi: inf}, rigid.Coordinate{}, rigid.ErrNotFinite, rigid.ErrNotFinite},
		{"upside down", sineLaw, rigid.Interval{Lo: 1, Hi: 0}, rigid.Coordinate{}, rigid.ErrInput, rigid.ErrInput},
		{"no length", sineLaw, rigid.Interval{Lo: 1, Hi: 1}, rigid.Coordinate{}, rigid.ErrInput, rigid.ErrInput},
		{"no motion", rigid.Linear(0, 1), half, rigid.Coordinate{Pos: 1}, rigid.ErrInput, rigid.ErrInput},
		{"turns between the ends", sineLaw, rigid.Interval{Lo: 0, Hi: 3}, rigid.Coordinate{Pos: 0.1}, rigid.ErrInput, rigid.ErrInput},
		{"turns twice: the ends do not tell", sineLaw, rigid.Interval{Lo: 0, Hi: 7}, rigid.Coordinate{Pos: 0.1}, rigid.ErrInput, nil},
		{"ends beyond the law", part, rigid.Interval{Lo: 0, Hi: 1.1}, rigid.Coordinate{}, rigid.ErrUnreachable, rigid.ErrUnreachable},
		{"begins beyond the law", part, rigid.Interval{Lo: -1, Hi: 1}, rigid.Coordinate{}, rigid.ErrUnreachable, rigid.ErrUnreachable},
		{"hole, not met", hole, half, rigid.Coordinate{}, rigid.ErrSingular, nil},
		{"hole", hole, half, rigid.Coordinate{Pos: math.Sin(0.45)}, rigid.ErrSingular, rigid.ErrSingular},
		{"law of nil", rigid.LawOf(nil), half, rigid.Coordinate{}, rigid.ErrInput, rigid.ErrInput},
		{"nil", nil, half, rigid.Coordinate{}, rigid.ErrInput, rigid.ErrInput},
		{"NaN Pos", sineLaw, half, rigid.Coordinate{Pos: nan}, nil, rigid.ErrNotFinite},
		{"NaN Vel", sineLaw, half, rigid.Coordinate{Vel: nan}, nil, rigid.ErrNotFinite},
		{"infinite Acc", sineLaw, half, rigid.Coordinate{Acc: inf}, nil, rigid.ErrNotFinite},
		{"rates overflow", sineLaw, half, rigid.Coordinate{Pos: 0.5, Vel: 1e200}, nil, rigid.ErrNotFinite},
		{"below", sineLaw, half, rigid.Coordinate{Pos: -0.01}, nil, rigid.ErrUnreachable},
		{"above", sineLaw, half, rigid.Coordinate{Pos: 0.9}, nil, rigid.ErrUnreachable},
		{"far above", sineLaw, half, rigid.Coordinate{Pos: math.MaxFloat64}, nil, rigid.ErrUnreachable},
		{"jump", jump, rigid.Interval{Lo: 0.5, Hi: 1.5}, rigid.Coordinate{Pos: 1.5}, nil, rigid.ErrUnreachable},
		{"below the jump", jump, rigid.Interval{Lo: 0.5, Hi: 1.5}, rigid.Coordinate{Pos: 0.75}, nil, nil},
	} {
		back, err := c.law.Inverse(c.over)
		if !errors.Is(err, c.inverse) || (back == nil) != (err != nil) {
			t.Errorf("%s: Inverse: %v, want %v", c.why, err, c.inverse)
		}
		if strings.HasPrefix(c.why, "turns") && !strings.Contains(err.Error(), "the output turns back") {
			t.Errorf("%s: message %q", c.why, err)
		}
		in, err := c.law.Solve(c.out, c.over)
		if err != c.solve || err != nil && in != (rigid.Coordinate{}) {
			t.Errorf("%s: Solve: %+v, %v, want %v", c.why, in, err, c.solve)
		}
		if back != nil && finiteNumbers(c.out.Vel, c.out.Acc) && c.out.Vel == 0 {
			if got, err := back(c.out.Pos); err != c.solve || err == nil && got.Out != in.Pos {
				t.Errorf("%s: inverse: %+v, %v, want %v", c.why, got, err, c.solve)
			}
		}
	}
	for _, jumped := range []float64{0.75, 2.25} {
		in, err := jump.Solve(rigid.Coordinate{Pos: jumped}, rigid.Interval{Lo: 0.5, Hi: 1.5})
		if err != nil || in.Pos+math.Floor(in.Pos) != jumped {
			t.Errorf("beside the jump: %v, %v", in, err)
		}
	}
}

// At the end of a range First of a law grows without bound, and the inverse is
// regular: the follower of a four-bar drives its crank through the limit.
func TestInverseAtTheEndOfARange(t *testing.T) {
	law := fourBar(4, 5, 2, 5, 1)
	strokes, err := law.Strokes(rigid.Interval{Lo: 0, Hi: math.Pi})
	if err != nil || len(strokes) != 2 {
		t.Fatal(strokes, err)
	}
	// stretched, coupler and follower in one line: a triangle of 4, 5 and 7
	s, limit := strokes[1], math.Pi-math.Acos((16.0+49-25)/(2*4*7))
	back, err := law.Inverse(s)
	if err != nil {
		t.Fatal(err)
	}
	for d := 0.3; d > 2e-8; d /= 2 {
		c, err := back(limit - d)
		if err != nil {
			t.Fatal(d, err)
		}
		// the crank by the law of cosines, from the follower pin
		sin, cos := math.Sincos(limit - d)
		x, y := 4+5*cos, 5*sin
		h := math.Hypot(x, y)
		near(t, "place", c.Out, math.Atan2(y, x)+math.Acos((25+h*h-4)/(2*5*h)), 4e-15)
		if !(math.Abs(c.First) < 7*d) {
			t.Errorf("First %v at %v", c.First, d)
		}
	}
	c, err := back(limit)
	if err != nil || !(math.Abs(c.Out-s.Hi) <= 4e-16 && math.Abs(c.First) < 1e-6) {
		t.Errorf("at the limit: %+v, %v", c, err)
	}
	if _, err := back(limit + 1e-6); err != rigid.ErrUnreachable {
		t.Errorf("beyond the limit: %v", err)
	}
}

// A stroke may end where the law has no value, and begins at the next float64 then.
func TestSolveOpenEnds(t *testing.T) {
	open := rigid.Law(func(x float64) (rigid.Coefficients, error) {
		if !(0.2 < x && x < 1) {
			return rigid.Coefficients{}, rigid.ErrSingular
		}
		return sineLaw(x)
	})
	over := rigid.Interval{Lo: 0.2, Hi: 1}
	for _, want := range []float64{0.2, 0.2 + 2e-15, 0.6, 1 - 2e-15, 1} {
		in, err := open.Solve(rigid.Coordinate{Pos: math.Sin(want)}, over)
		if err != nil {
			t.Fatal(want, err)
		}
		near(t, "open end", in.Pos, want, 3e-16)
	}
}
