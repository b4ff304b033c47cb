package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// LeverDimensions are those of a SlottedLever, in m, and where it is mounted. The
// crank pivot is the origin of the mechanism's own axes, the lever pivot is at
// (−Centre, 0). More fields may come: write keyed literals.
type LeverDimensions struct {
	Crank  float64         `json:"crank"`  // crank pivot to crank pin
	Centre float64         `json:"centre"` // crank pivot to lever pivot
	Slot   float64         `json:"slot"`   // from the lever pivot to the slot, positive where the slot lies left of the pivot; usually 0
	Mount  rigid.Placement `json:"mount"`  // of the mechanism's own axes in the machine
}

// LeverState is the motion of a SlottedLever at one instant. Lever has its origin
// at its pivot and its x axis along the slot, Block its origin at the crank pin
// and the lever's axes, Crank its origin at its pivot and its x axis to the pin.
// Turn, Swing and Slide are in the mechanism's own axes, without Mount. More
// fields may come.
type LeverState struct {
	Crank, Block, Lever rigid.Motion
	Turn                rigid.Coordinate // of the crank
	Swing               rigid.Coordinate // of the lever: 0 where the slot points from the lever pivot to the crank pivot
	Slide               rigid.Coordinate // of the block: the pin is at (Slide.Pos, Slot) in the lever, Slide.Pos > 0
	Slot                float64          // LeverDimensions.Slot
	Knee                rigid.Side       // of the perpendicular from the crank pivot on the slot: see SolveSwing
	Margin              float64
}

// Pin returns the terms of the crank pin's acceleration as seen from the lever, in
// m/s² in the frame's axes: Base is zero, since the lever turns about a fixed
// pivot, Relative is the block's acceleration along the slot and Coriolis
// 2ω×Slide.Vel.
func (s *LeverState) Pin() rigid.AccelerationTerms {
	return s.Lever.AccelerationTerms(rigid.Point{
		Pos: r2.Vec{X: s.Slide.Pos, Y: s.Slot},
		Vel: r2.Vec{X: s.Slide.Vel},
		Acc: r2.Vec{X: s.Slide.Acc},
	})
}

// A SlottedLever is a crank whose pin carries a block that slides in the slot of a
// lever about a second fixed pivot: the slider-crank chain with the crank's
// neighbour fixed. With Crank < Centre − |Slot| the lever swings, as in a shaping
// machine; with Crank > Centre + |Slot| it turns with the crank (Whitworth's
// drive); between the two the crank itself can only rock, between the positions
// where the pin is nearest to the lever pivot. The zero SlottedLever gives
// ErrInput. Any number of goroutines may share one.
type SlottedLever struct {
	given LeverDimensions
	form  slotForm
}

// NewSlottedLever checks the dimensions and returns the lever. Errors are
// *rigid.DimensionError, joined if several: of Crank and Centre, which must be
// positive lengths; rigid.ErrUnreachable where the pin never comes as far from the
// lever pivot as |Slot|; rigid.ErrChangePoint where |Crank − Centre| = |Slot| within
// 1e-14 of the longer: there the pin meets the lever pivot, or the slot's nearest
// point to it, and the motion could go on in two ways. Near to that, without Slot
// within 1e-8 of the crank, the pin passes but Solve refuses rates there, at π.
func NewSlottedLever(d LeverDimensions) (*SlottedLever, error) {
	if err := checkSlot(d.Crank, d.Centre, d.Slot, "Slot", d.Mount); err != nil {
		return nil, err
	}
	return &SlottedLever{given: d, form: newSlotForm(d.Crank, d.Centre, d.Slot, d.Mount)}, nil
}

// Dimensions returns what NewSlottedLever was given.
func (l *SlottedLever) Dimensions() LeverDimensions { return l.given }

// Solve writes into dst the motion of all links for a motion of the crank, turn in
// rad counter-clockwise from the direction away from the lever pivot. Swing.Pos is
// continuous over any number of turns: where the lever turns it grows by 2π with
// each. The rates are those of the constraint
//
//	r·exp(iφ) + c = (σ + ie)·exp(iψ)
//
// Margin is Slide.Pos over the crank, at most 1. Errors: ErrUnreachable outside
// Range; ErrSingular for rates where Margin is below rigid.LeastMargin;
// ErrNotFinite; ErrInput for a zero SlottedLever. An error leaves dst as it was.
func (l *SlottedLever) Solve(dst *LeverState, turn rigid.Coordinate) error {
	k := &l.form
	sh, ch := trig.Sincos(turn.Pos / 2)
	d2, s2 := k.squares(ch)
	w, al, w2 := turn.Vel, turn.Acc, turn.Vel*turn.Vel
	push := k.r * (math.Abs(al) + w2)
	if !(s2 > k.clear && push > 0) {
		return l.solveAny(dst, turn, sh, ch)
	}
	// As place and write do, but without a slotMotion between, which goes through memory.
	t, s := 1/(d2*s2), math.Sqrt(s2)
	i, j, half := s2*t, d2*t, ch*ch
	sin, cos := 2*sh*ch, (ch-sh)*(ch+sh)
	u := k.along(s, half, sin, i)
	swing1, swing2 := k.swing(s, half, sin, cos, i, j)
	slide1, slide2 := k.slide(s, half, sin, cos, j)
	omega, alpha, acc := swing1*w, swing1*al+swing2*w2, slide1*al+slide2*w2
	if (alpha+acc+push)*0 != 0 {
		return rigid.ErrNotFinite
	}
	dst.Slide.Pos, dst.Slide.Vel, dst.Slide.Acc = s, slide1*w, acc
	dst.Turn, dst.Slot, dst.Margin = turn, k.e, k.margin(s)
	dst.Swing.Vel, dst.Swing.Acc = omega, alpha

	crank := turned(k.mount.Axis, r2.Vec{X: cos, Y: sin})
	x, y := k.r*crank.X, k.r*crank.Y
	set(&dst.Crank, k.mount.Origin, r2.Vec{}, r2.Vec{}, crank, w, al)
	line, from := k.mount.Axis, 0.0
	if k.across < 0 {
		line, from = crank, turn.Pos
	}
	line = turned(line, u)
	set(&dst.Block, r2.Vec{X: k.mount.Origin.X + x, Y: k.mount.Origin.Y + y},
		r2.Vec{X: -(w * y), Y: w * x}, r2.Vec{X: -(al*y + w2*x), Y: al*x - w2*y}, line, omega, alpha)
	set(&dst.Lever, k.pivot, r2.Vec{}, r2.Vec{}, line, omega, alpha)
	dst.Knee = knee(crank, line)
	dst.Swing.Pos = from + trig.Angle(u.X, u.Y)
	return nil
}

// solveAny is Solve in every case: also for a crank at rest or at a limit.
func (l *SlottedLever) solveAny(dst *LeverState, turn rigid.Coordinate, sh, ch float64) error {
	var m slotMotion
	d2, s2 := l.form.squares(ch)
	if err := l.form.place(&m, turn, sh, ch, d2, s2); err != nil {
		return err
	}
	l.form.write(&dst.Crank, &dst.Block, &dst.Lever, &m)
	dst.Turn, dst.Swing, dst.Slide = turn, m.swing, m.slide
	dst.Slot, dst.Knee, dst.Margin = l.given.Slot, knee(m.crank, m.line), m.margin
	return nil
}

// Coefficients returns the lever's swing and its derivatives by the crank's angle,
// turn in rad: a rigid.Law. Errors as Solve asked for rates.
func (l *SlottedLever) Coefficients(turn float64) (rigid.Coefficients, error) {
	var m slotMotion
	sh, ch := trig.Sincos(turn / 2)
	d2, s2 := l.form.squares(ch)
	if err := l.form.place(&m, rigid.Coordinate{Pos: turn, Vel: 1}, sh, ch, d2, s2); err != nil {
		return rigid.Coefficients{}, err
	}
	return rigid.Coefficients{In: turn, Out: m.swing.Pos, First: m.swing.Vel, Second: m.swing.Acc}, nil
}

// Range returns the crank's angles that have a position: all of them, or the
// interval about 0 at whose ends the pin is nearest to the lever pivot.
func (l *SlottedLever) Range() []rigid.Interval { return l.form.turns() }

// DeadCentres returns the crank's angles, in (−π, π] and rising, where the lever's
// swing comes to rest, with the swing as Out and First = 0: the crank is at right
// angles to the slot there. A swinging lever has two, a turning one none, and one
// whose crank can only rock has one, besides the ends of Range.
func (l *SlottedLever) DeadCentres() []rigid.Coefficients { return l.form.deadCentres() }

// TimeRatio returns the crank's angle, turning positive, from the least to the
// greatest swing over that back: (π + 2β)/(π − 2β) with sin β = Crank/Centre where
// the slot passes through the lever pivot. ErrUnreachable where the lever does not
// swing between two extremes; ErrInput for a zero SlottedLever.
func (l *SlottedLever) TimeRatio() (float64, error) {
	if l.form.r == 0 {
		return 0, rigid.ErrInput
	}
	c := l.form.deadCentres()
	if len(c) != 2 {
		return 0, rigid.ErrUnreachable
	}
	there := c[1].In - c[0].In // the lesser swing comes first
	return there / (rigid.Revolution - there), nil
}
