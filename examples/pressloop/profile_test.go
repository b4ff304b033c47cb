package main

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
)

// Durations of a rest-to-rest move with bounded jerk, as the double-S profile has them
// (L. Biagiotti, C. Melchiorri, Trajectory Planning for Automatic Machines and
// Robots, 2008; from memory).
func TestProfileTime(t *testing.T) {
	for _, tt := range []struct {
		why  string
		d    float64
		m    move
		want float64
	}{
		{"all limits reached: d/v + v/a + a/j", 1, move{Speed: 0.5, Acc: 2, Jerk: 20}, 1/0.5 + 0.5/2 + 2.0/20},
		{"exactly at the corner v = a²/j", 1, move{Speed: 0.2, Acc: 2, Jerk: 20}, 1/0.2 + 2*2.0/20},
		{"acceleration not reached: d/v + 2√(v/j)", 1, move{Speed: 0.5, Acc: 100, Jerk: 20}, 1/0.5 + 2*math.Sqrt(0.5/20)},
		{"speed not reached: a/j + √((a/j)² + 4d/a)", 0.1, move{Speed: 5, Acc: 2, Jerk: 20}, 0.1 + math.Sqrt(0.01+4*0.1/2)},
		{"neither reached: 4∛(d/2j)", 1e-3, move{Speed: 5, Acc: 20, Jerk: 20}, 4 * math.Cbrt(1e-3/40)},
		{"no way at all", 0, move{Speed: 5, Acc: 20, Jerk: 20}, 0},
	} {
		for _, sign := range []float64{1, -1} {
			m := tt.m
			m.To = 0.3 + sign*tt.d
			p := newProfile(0.3, []move{m})
			if math.Abs(p.end-tt.want) > 1e-12 {
				t.Errorf("%s: %g s, want %g", tt.why, p.end, tt.want)
			}
			checkProfile(t, tt.why, p, 0.3, m)
		}
	}
}

// checkProfile checks ends, limits by differences, and that each derivative is that
// of the one before.
func checkProfile(t *testing.T, why string, p *profile, from float64, m move) {
	t.Helper()
	const n = 2000
	var at, pos, vel, acc []float64
	for i := range n + 1 {
		s := p.end * float64(i) / n
		c, limit := p.at(s)
		at, pos, vel, acc = append(at, s), append(pos, c.Pos), append(vel, c.Vel), append(acc, c.Acc)
		if c.Acc != 0 && limit != m.Acc {
			t.Errorf("%s: acceleration limit %g", why, limit)
		}
	}
	if pos[0] != from || math.Abs(pos[n]-m.To) > 1e-15 || vel[0] != 0 || vel[n] != 0 || acc[0] != 0 || acc[n] != 0 {
		t.Errorf("%s: from %g to %g", why, pos[0], pos[n])
	}
	if p.end == 0 {
		return
	}
	h := p.end / n
	dpos, _ := differences(at, pos)
	dvel, _ := differences(at, vel)
	jerk, _ := differences(at, acc)
	for i := range dpos {
		// the mean of a derivative over a step lies within ½h × its own greatest rate
		if math.Abs(dpos[i]-vel[i]) > h*m.Acc+1e-11 || math.Abs(dvel[i]-acc[i]) > h*m.Jerk+1e-11 {
			t.Errorf("%s: at %g s the rates are not the derivatives", why, at[i])
		}
	}
	if v, a, j := greatestSize(vel), greatestSize(acc), greatestSize(jerk); v > m.Speed*(1+1e-12) || a > m.Acc*(1+1e-12) || j > m.Jerk*(1+1e-9) {
		t.Errorf("%s: speed %g, acceleration %g, jerk %g", why, v, a, j)
	}
}

// Between moves the ram rests; before and after the program too.
func TestDwell(t *testing.T) {
	c := sampleConfig(t)
	p := newProfile(c.Start, c.Moves)
	two := newProfile(c.Start, c.Moves[:2])
	if g, _ := p.at(two.end - c.Moves[1].Dwell/2); g != (rigid.Coordinate{Pos: c.Moves[1].To}) {
		t.Errorf("in the dwell %+v", g)
	}
	if g, _ := p.at(p.end + 5); g != (rigid.Coordinate{Pos: c.Start}) {
		t.Errorf("after the end %+v", g)
	}
}
