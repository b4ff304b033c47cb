package fourbar_test

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

func TestFreudenstein(t *testing.T) {
	// Three positions of the linkage 100, 40, 120, 80 by the half-angle solution of
	// its closure equation (R. L. Norton, Design of Machinery; from memory) give the
	// linkage back.
	const d, a, b, c = 100., 40., 120., 80.
	follower := func(turn float64) float64 {
		k1, k2, k3 := d/a, d/c, (a*a-b*b+c*c+d*d)/(2*a*c)
		p, q, r := math.Cos(turn)-k1-k2*math.Cos(turn)+k3, -2*math.Sin(turn), k1-(k2+1)*math.Cos(turn)+k3
		return 2 * math.Atan2(-q-math.Sqrt(q*q-4*p*r), 2*p)
	}
	var at [3]fourbar.Precision
	for i, turn := range []float64{0.7, 1.1, 1.8} {
		at[i] = fourbar.Precision{Turn: turn, Swing: follower(turn)}
	}
	g, err := fourbar.Freudenstein(d, at)
	if err != nil {
		t.Fatal(err)
	}
	x := g.Dimensions
	if off := math.Abs(x.Crank-a) + math.Abs(x.Coupler-b) + math.Abs(x.Follower-c); off > 1e-11 || x.Branch != fourbar.Open || g.TurnZero != 0 || g.SwingZero != 0 {
		t.Errorf("%+v", g)
	}
	// Marks that lie the other way: the same linkage with half a turn in between.
	for i := range at {
		at[i].Turn += math.Pi
	}
	if g, err = fourbar.Freudenstein(d, at); err != nil || g.TurnZero != math.Pi || math.Abs(g.Dimensions.Crank-a) > 1e-11 {
		t.Errorf("%+v, %v", g, err)
	}
}

func TestFreudensteinRefuses(t *testing.T) {
	p := func(x ...float64) (at [3]fourbar.Precision) {
		for i := range at {
			at[i] = fourbar.Precision{Turn: x[2*i], Swing: x[2*i+1]}
		}
		return at
	}
	for _, c := range []struct {
		why   string
		frame float64
		at    [3]fourbar.Precision
		want  error
	}{
		{"no frame", 0, p(0, 0, 1, 1, 2, 2), rigid.ErrNotPositive},
		{"NaN", 1, p(0, 0, math.NaN(), 1, 2, 2), rigid.ErrNotFinite},
		{"one position twice", 1, p(0.3, 0.5, 0.3, 0.5, 1, 2), rigid.ErrSingular},
		{"a circle's chords: log x over 60° of crank and follower from 0", 1,
			p(0.0701472, 0.1001286, 0.5235988, 0.6125587, 0.9770504, 0.9962), fourbar.ErrBranch},
	} {
		if _, err := fourbar.Freudenstein(c.frame, c.at); !matches(err, c.want) {
			t.Errorf("%s: %v, want %v", c.why, err, c.want)
		}
	}
	// The middle position asked for out of turn.
	at := p(0.7, 1.0283, 1.8, 1.5, 1.1, 1.2)
	if _, err := fourbar.Freudenstein(1, at); !errors.Is(err, fourbar.ErrOrder) && !errors.Is(err, rigid.ErrUnreachable) {
		t.Errorf("out of order: %v", err)
	}
}

func matches(err, want error) bool {
	for err != nil {
		if err == want {
			return true
		}
		u, ok := err.(interface{ Unwrap() error })
		if !ok {
			return false
		}
		err = u.Unwrap()
	}
	return false
}

// Every generator that comes without an error passes its positions.
func TestFreudensteinPasses(t *testing.T) {
	r := rand.New(rand.NewPCG(1955, 3))
	found := map[string]int{}
	for range 20000 {
		var at [3]fourbar.Precision
		for i := range at {
			at[i] = fourbar.Precision{Turn: 2 * float64(i) * r.Float64(), Swing: 3 * r.NormFloat64()}
		}
		g, err := fourbar.Freudenstein(1, at)
		found[fmt.Sprint(err)]++
		if err != nil {
			continue
		}
		l := mustNew(t, g.Dimensions)
		var first fourbar.State
		for i, p := range at {
			var st fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: p.Turn + g.TurnZero}); err != nil {
				t.Fatalf("%+v: %v", at, err)
			}
			if i == 0 {
				first = st
			}
			if off := (st.Swing.Pos - first.Swing.Pos) - (p.Swing - at[0].Swing); math.Abs(off) > 1e-5 {
				t.Fatalf("%+v: misses position %d by %v", at, i, off)
			}
		}
		// and every crank angle between them can be reached
		for i := range 33 {
			turn := at[0].Turn + (at[2].Turn-at[0].Turn)*float64(i)/32
			var st fourbar.State
			if err := l.Solve(&st, rigid.Coordinate{Pos: turn + g.TurnZero, Vel: 1}); err != nil {
				t.Fatalf("%+v: at %v: %v", at, turn, err)
			}
		}
	}
	for _, e := range []error{nil, fourbar.ErrBranch, fourbar.ErrOrder} {
		if found[fmt.Sprint(e)] == 0 {
			t.Errorf("never %v: %v", e, found)
		}
	}
}
