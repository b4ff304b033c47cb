package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A swayed linkage has a plate on two cranks that make a parallelogram, and a rod from
// the plate to a driven wheel: a group of four angles. As the plate does not turn, the
// rod's pin on it moves as on a crank of its own, and the same motion is that of a
// four-bar of wheel, rod and crank, which never lies flat.
type swayed struct {
	crank, base float64 // of the parallelogram
	tilt        float64 // of its base
	pin         r2.Vec  // in the plate, from the first crank's pin
	rod, wheel  float64
	far         r2.Vec  // the wheel's pivot
	skew        float64 // of the links' own axes
	carried     bool    // the cell stands on a link that turns about the first crank's pivot
}

func (w *swayed) linkages(t testing.TB) (cell, plain *Linkage) {
	put := func(angle float64) func(x, y float64) r2.Vec { // in a link's own axes
		return func(x, y float64) r2.Vec { return rigid.NewPose(0.1, -0.2, angle).Point(r2.Vec{X: x, Y: y}) }
	}
	base := rigid.NewPose(0, 0, w.tilt).Point(r2.Vec{X: w.base})
	var p, q plan
	l := p.links("crank", "plate", "rocker", "rod", "wheel")
	k := q.links("crank", "rod", "wheel")
	carrier, plainCarrier := Frame, Frame
	if w.carried {
		carrier, plainCarrier = p.Link("carrier"), q.Link("carrier")
		p.pin(Frame.At(0, 0), carrier.At(0, 0))
		q.pin(Frame.At(0, 0), plainCarrier.At(0, 0))
	}
	on := func(i int, at r2.Vec) Attachment {
		q := put(w.skew*float64(i))(at.X, at.Y)
		return l[i].At(q.X, q.Y)
	}
	o := r2.Vec{}
	p.pin(carrier.At(0, 0), on(0, o))
	p.pin(carrier.At(base.X, base.Y), on(2, o))
	p.pin(on(0, r2.Vec{X: w.crank}), on(1, o))
	p.pin(on(1, base), on(2, r2.Vec{X: w.crank}))
	p.pin(on(1, w.pin), on(3, o))
	p.pin(on(3, r2.Vec{X: w.rod}), on(4, r2.Vec{X: w.wheel}))
	p.pin(Frame.At(w.far.X, w.far.Y), on(4, o))
	p.turn(l[4], Frame)

	q.pin(plainCarrier.At(w.pin.X, w.pin.Y), k[0].At(0, 0))
	q.pin(k[0].At(w.crank, 0), k[1].At(0, 0))
	q.pin(k[1].At(w.rod, 0), k[2].At(w.wheel, 0))
	q.pin(Frame.At(w.far.X, w.far.Y), k[2].At(0, 0))
	q.turn(k[2], Frame)
	if w.carried {
		p.turn(carrier, Frame)
		q.turn(plainCarrier, Frame)
	}
	both := [2]*Linkage{}
	for i, d := range []Design{p.Design, q.Design} {
		var err error
		if both[i], err = New(d); err != nil {
			t.Fatal(err)
		}
	}
	return both[0], both[1]
}

// guess is where the links are at a place of the four-bar, in the axes that linkages
// gives them; the carrier at 0.
func (w *swayed) guess(plain *State) []rigid.Placement {
	crank, rod, wheel := plain.Motion(1).Pose.Angle(), plain.Motion(2).Pose.Angle(), plain.Motion(3).Pose.Angle()
	tip := rigid.NewPose(0, 0, crank).Point(r2.Vec{X: w.crank})
	base := rigid.NewPose(0, 0, w.tilt).Point(r2.Vec{X: w.base})
	out := []rigid.Placement{{}}
	for i, at := range []rigid.Placement{
		{Angle: crank}, {X: tip.X, Y: tip.Y}, {X: base.X, Y: base.Y, Angle: crank},
		{X: tip.X + w.pin.X, Y: tip.Y + w.pin.Y, Angle: rod}, {X: w.far.X, Y: w.far.Y, Angle: wheel},
	} {
		q := at.Pose().Compose(rigid.NewPose(0.1, -0.2, w.skew*float64(i)).Inverse())
		out = append(out, rigid.Placement{X: q.Origin.X, Y: q.Origin.Y, Angle: q.Angle()})
	}
	if w.carried {
		out = append(out, rigid.Placement{})
	}
	return out
}

// same fails where the plate turns, but with a carrier, the cranks are not parallel, or the crank differs
// from that of the four-bar.
func (w *swayed) same(t *testing.T, s, plain *State) {
	t.Helper()
	crank, plate, rocker, want := s.Motion(1), s.Motion(2), s.Motion(3), plain.Motion(1)
	carrier := rigid.Motion{Pose: rigid.NewPose(0, 0, 0)}
	if w.carried {
		carrier = *s.Motion(6)
	}
	margin, speed := plain.Margin(), max(1, math.Abs(want.Omega), math.Abs(carrier.Omega))
	surge := max(speed*speed, math.Abs(want.Alpha), math.Abs(carrier.Alpha))
	turned := func(a, b *rigid.Motion, skew float64) bool {
		return math.Abs(rigid.Wrap(a.Pose.Angle()-b.Pose.Angle()-skew)) < 1e-14 &&
			math.Abs(a.Omega-b.Omega) <= 1e-15*speed/margin && math.Abs(a.Alpha-b.Alpha) <= 1e-15*surge/margin
	}
	if !turned(plate, &carrier, -w.skew) {
		t.Fatalf("the plate turns: %+v", *plate)
	}
	if !turned(crank, rocker, 2*w.skew) {
		t.Fatalf("cranks are not parallel: %+v, %+v", *crank, *rocker)
	}
	if !(math.Abs(rigid.Wrap(crank.Pose.Angle()-want.Pose.Angle())) < 1e-13/margin &&
		math.Abs(crank.Omega-want.Omega) < 1e-12*speed/margin/margin && math.Abs(crank.Alpha-want.Alpha) < 1e-12*surge/margin/margin/margin) {
		t.Fatalf("margin %v: crank %+v, want %+v", margin, *crank, *want)
	}
}

// swingThrough is a swayed linkage whose crank swings from −28° to 32°.
func swingThrough() *swayed {
	return &swayed{crank: 1, base: 2, pin: r2.Vec{X: 0.7, Y: 0.5}, rod: 1.2, wheel: 0.5,
		far: r2.Add(r2.Vec{X: 0.7, Y: 0.5}, r2.Scale(1.513, r2.Vec{X: math.Cos(0.87), Y: -math.Sin(0.87)}))}
}

// A parallelogram inside a group of higher class passes its flattened positions, both
// ways, for many turns of the wheel.
func TestParallelogramInGroup(t *testing.T) {
	w := swingThrough()
	cell, plain := w.linkages(t)
	if g := groups(cell); g != "wheel | crank+plate+rocker+rod 3" {
		t.Fatalf("groups %s", g)
	}
	easy, err := plain.Assemble([]rigid.Placement{{}, {X: 0.7, Y: 0.5, Angle: 0.5}, {X: 1.6, Y: 1, Angle: -1.2}, {X: w.far.X, Y: w.far.Y, Angle: 1.6}}, rigid.Coordinate{Pos: 1.6})
	if err != nil {
		t.Fatal(err)
	}
	s, err := cell.Assemble(w.guess(easy), rigid.Coordinate{Pos: 1.6})
	if err != nil {
		t.Fatal(err)
	}
	turns, flat := 200, 0
	if testing.Short() {
		turns = 20
	}
	for k := range 2 * turns * 24 {
		in := rigid.Coordinate{Pos: 1.6 + float64(min(k, 2*turns*24-k))*15*rigid.Degree, Vel: 3, Acc: -2}
		last := s.Motion(1).Pose.Axis.Y
		if err := errors.Join(easy.Move(in), s.Move(in)); err != nil {
			t.Fatalf("step %d: %v", k, err)
		}
		w.same(t, s, easy)
		if o := open(cell, s, []rigid.Coordinate{in}); k%97 == 0 && !(o.pos < 1e-14+3e-16*in.Pos && o.vel < 1e-14 && o.acc < 1e-13) {
			t.Fatalf("step %d: %+v", k, o)
		}
		if last*s.Motion(1).Pose.Axis.Y < 0 {
			flat++
		}
	}
	if flat < 4*turns-4 {
		t.Errorf("%d times flat in %d turns", flat, 2*turns)
	}
	if lo, hi, err := s.Limits(rigid.Interval{Lo: 1.6 - 7, Hi: 1.6 + 7}); lo.Kind != NoLimit || hi.Kind != NoLimit || err != nil {
		t.Errorf("limits %v, %v, %v", lo, hi, err)
	}
	in := rigid.Coordinate{Pos: 1.6}
	if n := testing.AllocsPerRun(100, func() { in.Pos += 0.1; err = s.Move(in) }); n != 0 || err != nil {
		t.Errorf("%v allocations, %v", n, err)
	}
}

// flatAt is where the wheel of swingThrough stands with the crank at 0: by mpmath,
// from |pin − (0.7 + 1, 0.5)| = 1.2.
var flatAt = [2]float64{0.107160260674959829742, 2.99227881528405049176}

// At the flattened position itself the parallel motion has its rates; it is assembled
// there, and found among the modes.
func TestParallelogramInGroupFlat(t *testing.T) {
	w := swingThrough()
	cell, plain := w.linkages(t)
	in := rigid.Coordinate{Pos: flatAt[1], Vel: 2, Acc: 1}
	easy, err := plain.Assemble([]rigid.Placement{{}, {X: 0.7, Y: 0.5}, {X: 1.7, Y: 0.5, Angle: -1.2}, {X: w.far.X, Y: w.far.Y, Angle: 3}}, in)
	if err != nil {
		t.Fatal(err)
	}
	s, err := cell.Assemble(w.guess(easy), in)
	if err != nil {
		t.Fatal(err)
	}
	w.same(t, s, easy)
	even, err := cell.Assemble([]rigid.Placement{{}, {}, {X: 1}, {X: 2}, {X: 1.7, Y: 0.5, Angle: -1.2}, {X: w.far.X, Y: w.far.Y, Angle: 3}}, in)
	if err != nil {
		t.Fatal(err)
	}
	w.same(t, even, easy)
	if !(math.Abs(s.Motion(1).Pose.Angle()) < 1e-15 && s.Margin() > 0.5) {
		t.Errorf("crank at %v, margin %v", s.Motion(1).Pose.Angle(), s.Margin())
	}
	found := 0
	for m, err := range cell.Modes(in) {
		if err != nil {
			if !errors.Is(err, rigid.ErrSingular) {
				t.Error(err)
			}
			continue
		}
		if math.Abs(m.Motion(1).Pose.Angle()) < 1e-7 {
			found++
			w.same(t, m, easy)
			if err := m.Move(rigid.Coordinate{Pos: flatAt[1] + 0.4}); err != nil {
				t.Error(err)
			}
		}
	}
	if found != 1 {
		t.Errorf("%d modes with the crank at 0", found)
	}
}

// In its contrary motion the cell does not pass: two motions part, the State stays, and
// Limits tells where.
func TestContraryInGroup(t *testing.T) {
	cell, _ := swingThrough().linkages(t)
	found := 0
	for s, err := range cell.Modes(rigid.Coordinate{Pos: 1.6}) {
		if err != nil {
			t.Fatal(err)
		}
		lo, _, err := s.Limits(rigid.Interval{Lo: -3, Hi: 5})
		if err != nil {
			t.Fatal(err)
		}
		if lo.Kind != ChangePoint {
			continue
		}
		found++
		if off := lo.In - flatAt[0]; !(math.Abs(off) < 1e-10) {
			t.Errorf("parts %.2g from where the crank is at 0", off)
		}
		before := *s.Motion(2)
		if err := s.Move(rigid.Coordinate{Pos: flatAt[0] - 0.2, Vel: 1}); !errors.Is(err, rigid.ErrSingular) || *s.Motion(2) != before {
			t.Errorf("%v, moved to %+v from %+v", err, *s.Motion(2), before)
		}
		if stop, ok := s.Stop(); !ok || !(math.Abs(stop.Done-(1.6-flatAt[0])/(1.8-flatAt[0])) < 1e-3) {
			t.Errorf("%+v", stop)
		}
	}
	if found != 1 {
		t.Errorf("%d modes come to a change point", found)
	}
}
