package fourbar_test

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// shaped are linkages of every kind, with numbers that the targets use as they like.
var shaped = [][9]float64{
	{0.3, 0.08, 0.28, 0.2, 0, 1, 0.1, 0.05, 2},
	{4, 5, 2, 5, 1, 0.9, 1, 0, -1},
	{2, 1, 2, 1, 2, 1, 0.5, 1, 1},
	{2, 1, 2, 1, 3, math.Pi, 1, 1, 1},
	{1, 1, 2, 2, 0, 0, 0, 0, 0},
	{1, 1, math.Sqrt2, math.Sqrt2, 0, math.Pi / 2, 0.3, -1, 1},
	{1e-60, 1e60, 1e60, 1e-60, 0, 1, 1, 1, 1},
	{1, 1e-20, 1, 1e-20, 1, 1, 1e150, 1, 1},
	{20, 60, 50, 55, 0, 1e9, -10, 0, 3},
	{4e-3, 1e-3, 4e-3, 3e-3, 0, 1, 1e307, 0, 1},
}

func seedShaped(f *testing.F) {
	for _, s := range shaped {
		f.Add(s[0], s[1], s[2], s[3], uint8(s[4]), s[5], s[6], s[7], s[8])
	}
}

// analysed returns the linkage of a fuzz target, and whether its lengths differ by a
// factor of at most ratio.
func analysed(frame, crank, coupler, follower float64, branch uint8, ratio float64) (l *fourbar.Linkage, even bool) {
	l, err := fourbar.New(fourbar.Dimensions{Frame: frame, Crank: crank, Coupler: coupler, Follower: follower, Branch: fourbar.Branch(branch)})
	if err != nil {
		return nil, false
	}
	return l, longest(l)/min(frame, crank, coupler, follower) <= ratio
}

func finiteVecs(v ...r2.Vec) bool {
	for _, v := range v {
		if !finite(v.X, v.Y) {
			return false
		}
	}
	return true
}

// varied lists the numbers of which Sensitivity gives the derivatives.
func varied(swing rigid.Coordinate, p rigid.Point) [9]float64 {
	return [...]float64{swing.Pos, swing.Vel, swing.Acc, p.Pos.X, p.Pos.Y, p.Vel.X, p.Vel.Y, p.Acc.X, p.Acc.Y}
}

// FuzzSensitivity: finite, or a sentinel and nothing written; for even lengths away
// from a limit what linkages with one length a little longer and shorter say.
func FuzzSensitivity(f *testing.F) {
	seedShaped(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, pos, x, y, vel float64) {
		l, even := analysed(frame, crank, coupler, follower, branch, 4)
		if l == nil {
			return
		}
		in, at := rigid.Coordinate{Pos: pos, Vel: vel, Acc: -vel}, r2.Vec{X: x, Y: y}
		var s fourbar.Sensitivity
		if err := l.Sensitivity(&s, in, at); err != nil {
			if one(t, err); s != (fourbar.Sensitivity{}) {
				t.Fatalf("%+v: changed with %v", s, err)
			}
			return
		}
		for _, by := range []fourbar.LengthSensitivity{s.Frame, s.Crank, s.Coupler, s.Follower} {
			n := varied(by.Swing, by.Point)
			if !finite(n[:]...) {
				t.Fatalf("%+v: not finite: %+v", l.Dimensions(), s)
			}
		}
		if even && branch <= uint8(fourbar.Crossed) && math.Abs(pos) < 100 && math.Abs(vel) < 3 && r2.Norm(at) < 4*longest(l) {
			compareSensitivity(t, l, in, at)
		}
	})
}

// compareSensitivity compares with central differences, at the size of 1 m.
func compareSensitivity(t *testing.T, l *fourbar.Linkage, in rigid.Coordinate, at r2.Vec) {
	t.Helper()
	d, size := l.Dimensions(), longest(l)
	d.Frame, d.Crank, d.Coupler, d.Follower = d.Frame/size, d.Crank/size, d.Coupler/size, d.Follower/size
	at = r2.Scale(1/size, at)
	l, err := fourbar.New(d)
	if err != nil {
		return // the scaled lengths round to ones that just do not close
	}
	var st fourbar.State
	if l.Solve(&st, in) != nil || st.Margin < 0.5 {
		return
	}
	var s fourbar.Sensitivity
	if err := l.Sensitivity(&s, in, at); err != nil {
		t.Fatalf("%+v at %+v: %v", d, in, err)
	}
	for name, by := range map[string]struct {
		length *float64
		got    fourbar.LengthSensitivity
	}{
		"frame": {&d.Frame, s.Frame}, "crank": {&d.Crank, s.Crank},
		"coupler": {&d.Coupler, s.Coupler}, "follower": {&d.Follower, s.Follower},
	} {
		was := *by.length
		output := func(more float64) [9]float64 {
			*by.length = was + more
			defer func() { *by.length = was }()
			var st fourbar.State
			if err := mustNew(t, d).Solve(&st, in); err != nil {
				t.Fatalf("%+v at %+v: %v", d, in, err)
			}
			return varied(st.Swing, st.Coupler.At(at))
		}
		const h = 1e-4
		lo, hi, got := output(-h), output(h), varied(by.got.Swing, by.got.Point)
		for i := range got {
			more := hi[i] - lo[i]
			if i == 0 { // at a change point a longer link may change how turns are counted
				more = rigid.Wrap(more)
			}
			want := more / (2 * h)
			if off := math.Abs(got[i] - want); !(off <= 1e-4*(1+in.Vel*in.Vel)*(1+math.Abs(want))) {
				t.Fatalf("%+v at %+v: %s, output %d: %v, want %v", d, in, name, i, got[i], want)
			}
		}
	}
}

// FuzzCognates: three linkages trace one curve, each in step with the crank, but for
// those with a change point; what is too small or too great for a linkage New refuses.
func FuzzCognates(f *testing.F) {
	seedShaped(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, pos, x, y, _ float64) {
		l, even := analysed(frame, crank, coupler, follower, branch, 30)
		if l == nil {
			return
		}
		point := r2.Vec{X: x, Y: y}
		pair := l.Cognates(point)
		first, err1 := fourbar.New(pair[0].Dimensions)
		second, err2 := fourbar.New(pair[1].Dimensions)
		for _, err := range []error{err1, err2} {
			if _, ok := errors.AsType[*rigid.DimensionError](err); err != nil && !ok {
				t.Fatal(err)
			}
		}
		to1, to2 := r2.Norm(point)/coupler, r2.Norm(r2.Sub(point, r2.Vec{X: coupler}))/coupler
		var st, one, two fourbar.State
		in := rigid.Coordinate{Pos: pos, Vel: 1, Acc: -1}
		if !even || math.Abs(l.Grashof()) < 1e-6 || branch > uint8(fourbar.Crossed) || !(min(to1, to2) > 0.1 && max(to1, to2) < 10) || !(math.Abs(pos) < 100) ||
			l.Solve(&st, in) != nil || st.Margin < 0.1 {
			return
		}
		if _, ok := l.Range()[0].Angle(pos); !ok { // elsewhere the first may be on its other branch
			return
		}
		if err := errors.Join(err1, err2); err != nil {
			t.Fatalf("%+v, point %v: %v", l.Dimensions(), point, err)
		}
		if err := first.SolveCoupler(&one, in, rigid.Side(branch)); err != nil {
			t.Fatalf("%+v, point %v at %v: first cognate %+v: %v", l.Dimensions(), point, pos, pair[0], err)
		}
		if err := second.Solve(&two, in); err != nil {
			t.Fatalf("%+v, point %v at %v: second cognate %+v: %v", l.Dimensions(), point, pos, pair[1], err)
		}
		want, size := st.Coupler.At(point), max(longest(l), longest(first), longest(second))
		for i, got := range []rigid.Point{one.Coupler.At(pair[0].Coupler), two.Coupler.At(pair[1].Coupler)} {
			p, v, a := r2.Norm(r2.Sub(got.Pos, want.Pos)), r2.Norm(r2.Sub(got.Vel, want.Vel)), r2.Norm(r2.Sub(got.Acc, want.Acc))
			if scale := 1 + r2.Norm(want.Acc)/size; !(p <= 1e-11*size && v <= 1e-9*scale*size && a <= 1e-8*scale*size) {
				t.Fatalf("%+v, point %v at %v: cognate %d is off by %g, %g, %g of %g", l.Dimensions(), point, pos, i, p, v, a, size)
			}
		}
	})
}

// FuzzCurve: as many points as asked for, from end to end, each as far from the crank
// pin as the coupler has it, with a tangent of length 1 along its velocity.
func FuzzCurve(f *testing.F) {
	seedShaped(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, lo, x, y, width float64) {
		l, _ := analysed(frame, crank, coupler, follower, branch, 0)
		if l == nil {
			return
		}
		point, over, n := r2.Vec{X: x, Y: y}, rigid.Interval{Lo: lo, Hi: lo + width}, 2+int(branch)
		got := 0
		for p, err := range l.Curve(point, over, n) {
			if err != nil {
				one(t, err)
			}
			if got == 0 && (err == rigid.ErrInput || err == rigid.ErrNotFinite && !finite(p.Point.Pos.X, over.Lo, over.Hi, x, y, width)) {
				return // one error for all
			}
			if got == 0 && p.Turn != over.Lo && finite(x, y) && finite(over.Hi-over.Lo) {
				t.Fatalf("begins at %v, not %v: %v", p.Turn, over.Lo, err)
			}
			if got++; got == n && p.Turn != over.Hi {
				t.Fatalf("ends at %v, not %v", p.Turn, over.Hi)
			}
			if err == nil {
				onCurve(t, l, point, p)
			}
		}
		if got != n && !(got == 1 && !(width >= 0 && finite(x, y, over.Lo, over.Hi, over.Hi-over.Lo))) {
			t.Fatalf("%d points of %d over %v", got, n, over)
		}
	})
}

func onCurve(t *testing.T, l *fourbar.Linkage, point r2.Vec, p fourbar.CurvePoint) {
	t.Helper()
	if !finiteVecs(p.Point.Pos, p.Point.Vel, p.Point.Acc, p.Path.Tangent, p.Path.Normal) || !finite(p.Path.Speed, p.Path.SpeedRate, p.Path.Curvature) {
		t.Fatalf("%+v, point %v: not finite: %+v", l.Dimensions(), point, p)
	}
	if p.Cusp {
		if p.Path != (rigid.Path{}) || p.Point.Vel != (r2.Vec{}) {
			t.Fatalf("%+v: a cusp in motion: %+v", l.Dimensions(), p)
		}
		return
	}
	speed := math.Hypot(p.Point.Vel.X, p.Point.Vel.Y)
	if off := r2.Norm(r2.Sub(r2.Scale(1/speed, p.Point.Vel), p.Path.Tangent)); speed > 1e-300 && !(off < 1e-14) {
		t.Fatalf("%+v: tangent %v of velocity %v", l.Dimensions(), p.Path.Tangent, p.Point.Vel)
	}
	pin, arm := r2.Scale(l.Dimensions().Crank, unit(p.Turn)), math.Hypot(point.X, point.Y)
	if off := math.Abs(math.Hypot(p.Point.Pos.X-pin.X, p.Point.Pos.Y-pin.Y) - arm); !(off <= 1e-14*(longest(l)+arm)) {
		t.Fatalf("%+v: at %v the point is off its distance %g from the crank pin by %g", l.Dimensions(), p.Turn, arm, off)
	}
}

// FuzzCentres: finite or at infinity in a direction; of every three links they lie in
// one line; the coupler's is its pole.
func FuzzCentres(f *testing.F) {
	seedShaped(f)
	f.Fuzz(func(t *testing.T, frame, crank, coupler, follower float64, branch uint8, pos, _, _, _ float64) {
		l, even := analysed(frame, crank, coupler, follower, branch, 100)
		if l == nil {
			return
		}
		var st fourbar.State
		if l.Solve(&st, rigid.Coordinate{Pos: pos}) != nil {
			return
		}
		c, err := l.Centres(&st)
		if err != nil {
			if one(t, err); c != (fourbar.Centres{}) {
				t.Fatalf("%+v with %v", c, err)
			}
			return
		}
		for _, x := range []fourbar.Centre{c.FrameCrank, c.CrankCoupler, c.CouplerFollower, c.FrameFollower, c.FrameCoupler, c.CrankFollower} {
			if !finiteVecs(x.Point, x.Direction) || x.AtInfinity != (math.Abs(r2.Norm(x.Direction)-1) < 1e-14) || x.AtInfinity && x.Point != (r2.Vec{}) {
				t.Fatalf("%+v at %v: %+v", l.Dimensions(), pos, x)
			}
		}
		sin := math.Abs(r2.Cross(st.Crank.Pose.Axis, st.Follower.Pose.Axis))
		if even && st.Margin > 0.01 && min(sin, math.Abs(st.Coupler.Pose.Axis.Y)) > 0.01 {
			inLine(t, l, &st, &c)
		}
	})
}

// inLine checks the theorem of Aronhold and Kennedy, and the pole of the coupler.
func inLine(t *testing.T, l *fourbar.Linkage, st *fourbar.State, c *fourbar.Centres) {
	t.Helper()
	size := longest(l)
	for name, x := range map[string][3]fourbar.Centre{
		"frame, crank, coupler":    {c.FrameCrank, c.CrankCoupler, c.FrameCoupler},
		"frame, crank, follower":   {c.FrameCrank, c.FrameFollower, c.CrankFollower},
		"frame, coupler, follower": {c.FrameFollower, c.CouplerFollower, c.FrameCoupler},
		"crank, coupler, follower": {c.CrankCoupler, c.CouplerFollower, c.CrankFollower},
	} {
		if x[2].AtInfinity {
			t.Fatalf("%+v: %s: at infinity: %+v", l.Dimensions(), name, c)
		}
		a, b := r2.Scale(1/size, r2.Sub(x[1].Point, x[0].Point)), r2.Scale(1/size, r2.Sub(x[2].Point, x[0].Point))
		if off := math.Abs(r2.Cross(a, b)) / r2.Norm(a); !(off <= 1e-10) { // of the third from the line of two
			t.Fatalf("%+v: %s: off the line by %v of the longest link", l.Dimensions(), name, off)
		}
	}
	var moving fourbar.State
	if err := l.Solve(&moving, rigid.Coordinate{Pos: st.Turn.Pos, Vel: 1}); err != nil {
		t.Fatal(err)
	}
	pole, err := moving.Coupler.Pole()
	if off := r2.Norm(r2.Sub(pole, c.FrameCoupler.Point)) / size; err == nil && !(off <= 1e-6*(1+r2.Norm(pole)/size)) {
		t.Fatalf("%+v: centre %v, pole %v", l.Dimensions(), c.FrameCoupler.Point, pole)
	}
}
