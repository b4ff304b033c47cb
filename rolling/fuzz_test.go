package rolling_test

import (
	"errors"
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/rolling"
)

// sentinel reports whether err is one of the values that solvers may return.
func sentinel(err error) bool {
	return err == rigid.ErrNotFinite || err == rigid.ErrInput || err == rigid.ErrSingular || err == rigid.ErrUnreachable
}

func allFinite(x ...float64) bool {
	for _, v := range x {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}

func finiteMotion(m *rigid.Motion) bool {
	o, u := m.Pose.Origin, m.Pose.Axis
	return allFinite(o.X, o.Y, u.X, u.Y, m.Vel.X, m.Vel.Y, m.Acc.X, m.Acc.Y, m.Omega, m.Alpha)
}

// refused checks a constructor's errors: each one a *DimensionError.
func refused(t *testing.T, err error) {
	t.Helper()
	if _, ok := errors.AsType[*rigid.DimensionError](err); !ok || err.Error() == "" {
		t.Fatalf("%T: %v", err, err)
	}
}

func FuzzWheel(f *testing.F) {
	f.Add(0.3, 0.0, 0.0, uint8(0), 1.0, 2.0, 3.0, 0.0, 0.0)
	f.Add(0.3, -0.3, 0.0, uint8(1), 1.0, 2.0, 3.0, 0.0, 0.0)
	f.Add(1e-60, -1e60, 1.0, uint8(2), 1e300, 2.0, 3.0, 0.0, 0.0)
	f.Add(1e60, -1.0000000000000013e60, 1e9, uint8(3), 1e7, 1e154, 3.0, 0.5, 0.5)
	f.Add(0.5, 2.0, 4.0, uint8(4), 1e22, 1.0, math.NaN(), 1.0, -1.0)
	f.Add(0.5, -0.2, 4.0, uint8(5), 3.0, 1.0, 0.0, -0.5, 1.0)
	modes := [...]string{"turn", "travel", "arc", "slip", "belt", "ratio"}
	f.Fuzz(func(t *testing.T, radius, ground, angle float64, mode uint8, pos, vel, acc, slip, slipVel float64) {
		w, err := rolling.NewWheel(rolling.WheelDimensions{Radius: radius, Ground: ground, Mount: rigid.Placement{X: angle, Angle: angle}})
		if err != nil {
			refused(t, err)
			return
		}
		a, b := rigid.Coordinate{Pos: pos, Vel: vel, Acc: acc}, rigid.Coordinate{Pos: slip, Vel: slipVel}
		before := rolling.WheelState{Turn: rigid.Coordinate{Pos: 42}}
		st := before
		if name := modes[int(mode)%len(modes)]; name == "ratio" {
			err = w.SolveRatio(&st, a, slip)
		} else {
			err = drive(w, &st, name, a, b)
		}
		if err != nil {
			if !sentinel(err) || st != before {
				t.Fatalf("%v, state %+v", err, st)
			}
			return
		}
		out := outputs(&st)
		if !allFinite(out[:]...) {
			t.Fatalf("%v", out)
		}
		if u := st.Wheel.Pose.Axis; !near(math.Hypot(u.X, u.Y), 1, 1e-14) {
			t.Fatalf("axis %v", u)
		}
		if _, err := w.Slip(st.Turn, st.Travel); err != nil && err != rigid.ErrNotFinite {
			t.Fatal(err)
		}
	})
}

func FuzzTrack(f *testing.F) {
	f.Add(1.0, 0.0, 0.5, 2.0, 0.5, -1.0, 1.5)
	f.Add(1e60, 0.0, 1e-60, 1e-60, 1e60, -1e60, 1e59)
	f.Add(3.0, 3000.0, -3000.0, 1.0, 0.0, 0.0, 4.0)
	f.Fuzz(func(t *testing.T, l1, from1, to1, l2, from2, to2, arc float64) {
		track, err := rolling.NewTrack(rolling.Bend{Length: l1, From: from1, To: to1}, rolling.Bend{Length: l2, From: from2, To: to2})
		if err != nil {
			refused(t, err)
			return
		}
		w := wheel(t, rolling.WheelDimensions{Radius: 0.3})
		var st rolling.WheelState
		if err := w.SolveTrack(&st, track, rigid.Coordinate{Pos: arc, Vel: 1}); err != nil {
			if !sentinel(err) || st != (rolling.WheelState{}) {
				t.Fatalf("%v, state %+v", err, st)
			}
			return
		}
		out := outputs(&st)
		if !allFinite(out[:]...) {
			t.Fatalf("%v", out)
		}
		if p, err := track(arc); err != nil || math.Hypot(p.Pos.X, p.Pos.Y) > math.Abs(arc)*(1+1e-12) {
			t.Fatalf("%+v %v is farther than the arc", p, err)
		}
	})
}

func FuzzPairs(f *testing.F) {
	f.Add(0.1, 0.2, 0, 0, 0.0, false, 0.0, 1.0, 2.0)
	f.Add(0.0, 0.0, 20, 50, 0.35, true, 0.01, 1e9, 2.0)
	f.Add(1e60, 1e-60, 0, 0, 2e60, true, 0.01, 1e300, 1e154)
	f.Add(0.1, 0.2, math.MaxInt32, math.MinInt32, 1.0, false, math.Inf(1), math.NaN(), 0.0)
	f.Fuzz(func(t *testing.T, radiusA, radiusB float64, teethA, teethB int, centres float64, other bool, pitch, pos, vel float64) {
		c := rigid.Coordinate{Pos: pos, Vel: vel}
		if p, err := rolling.NewPair(rolling.PairDimensions{RadiusA: radiusA, RadiusB: radiusB, TeethA: teethA, TeethB: teethB, Centres: centres, Internal: other}); err != nil {
			refused(t, err)
		} else {
			var st rolling.PairState
			for _, err := range []error{p.Solve(&st, c), p.SolveB(&st, c)} {
				if err != nil && !sentinel(err) {
					t.Fatal(err)
				}
			}
			if !finiteMotion(&st.A) || !finiteMotion(&st.B) || !allFinite(st.PitchA.Acc.X, st.PitchA.Acc.Y, st.PitchB.Acc.X, st.PitchB.Acc.Y, st.TurnA.Pos, st.TurnB.Pos) {
				t.Fatalf("%+v", st)
			}
		}
		if p, err := rolling.NewRack(rolling.RackDimensions{Radius: radiusA, Teeth: teethA, Pitch: pitch}); err != nil {
			refused(t, err)
		} else {
			var st rolling.RackState
			for _, err := range []error{p.Solve(&st, c), p.SolveSlide(&st, c)} {
				if err != nil && !sentinel(err) {
					t.Fatal(err)
				}
			}
			if !finiteMotion(&st.Pinion) || !finiteMotion(&st.Rack) || !allFinite(st.PitchPinion.Acc.X, st.PitchPinion.Acc.Y, st.Turn.Pos, st.Slide.Pos) {
				t.Fatalf("%+v", st)
			}
		}
		if p, err := rolling.NewBelt(rolling.BeltDimensions{RadiusA: radiusA, RadiusB: radiusB, TeethA: teethA, TeethB: teethB, Pitch: pitch, Centres: centres, Crossed: other}); err != nil {
			refused(t, err)
		} else {
			var st rolling.BeltState
			for _, err := range []error{p.Solve(&st, c), p.SolveB(&st, c), p.SolveSlide(&st, c)} {
				if err != nil && !sentinel(err) {
					t.Fatal(err)
				}
			}
			if a, b := p.Wrap(); !finiteMotion(&st.A) || !finiteMotion(&st.B) || !allFinite(st.TurnA.Pos, st.TurnB.Pos, st.Slide.Pos, p.Length(), a, b) {
				t.Fatalf("%+v, length %v", st, p.Length())
			}
		}
	})
}

// design reads a train from bytes: members, drives, then meshes of six bytes, some of
// whose references lead nowhere.
func design(b []byte) rolling.TrainDesign {
	next := func() int {
		if len(b) == 0 {
			return 0
		}
		x := int(b[0])
		b = b[1:]
		return x
	}
	var d rolling.TrainDesign
	n := next() % 12
	for i := range n {
		d.Member(string(rune('a' + i)))
	}
	member := func() rolling.Member { return rolling.Member(next()%(n+2)) - rolling.Member(next()/255) }
	for range next() % 4 {
		d.Drives = append(d.Drives, member())
	}
	for len(b) > 0 {
		d.Meshes = append(d.Meshes, rolling.Mesh{A: member(), B: member(), Arm: member(), TeethA: next() - 1, TeethB: next() + next()<<8, Internal: next()%2 == 0})
	}
	return d
}

func FuzzTrain(f *testing.F) {
	f.Add([]byte{4, 1, 4, 0, 1, 0, 2, 0, 4, 0, 25, 18, 0, 1, 2, 0, 3, 0, 4, 0, 19, 60, 0, 0}, 1.0, 2.0)
	f.Add([]byte{3, 2, 1, 0, 2, 0, 1, 0, 2, 0, 3, 0, 25, 18, 0, 1}, 1e9, -2.0)
	f.Add([]byte{3, 1, 1, 0, 1, 0, 2, 0, 0, 0, 21, 20, 0, 1, 2, 0, 3, 0, 0, 0, 21, 20, 0, 1, 3, 0, 1, 0, 0, 0, 21, 20, 0, 1}, 1.0, math.Inf(1))
	f.Fuzz(func(t *testing.T, text []byte, pos, vel float64) {
		if len(text) > 400 {
			return
		}
		d := design(text)
		tr, err := rolling.NewTrain(d)
		if err != nil {
			refused(t, err)
			return
		}
		dst := make([]rigid.Coordinate, len(d.Members))
		in := make([]rigid.Coordinate, len(d.Drives))
		for i := range in {
			in[i] = rigid.Coordinate{Pos: pos / float64(1+i), Vel: vel}
		}
		if err := tr.Solve(dst, in...); err != nil {
			if !sentinel(err) {
				t.Fatal(err)
			}
			return
		}
		size := 0.0
		for _, c := range dst {
			size = max(size, math.Abs(c.Pos))
		}
		for i, m := range d.Meshes {
			a, b := dst[m.A].Pos-dst[m.Arm].Pos, dst[m.B].Pos-dst[m.Arm].Pos
			za, zb := float64(m.TeethA), float64(m.TeethB)
			if m.Internal {
				zb = -zb
			}
			if gap := a*za + b*zb; !near(gap, 0, 8*eps*size*(za+math.Abs(zb))) {
				t.Fatalf("%+v: mesh %d is off by %v", d, i, gap)
			}
		}
	})
}
