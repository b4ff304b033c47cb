package slidercrank

import (
	"math"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// CylinderDimensions are those of an OscillatingCylinder, in m, and where it is
// mounted. The crank pivot is the origin of the mechanism's own axes, the fixed
// pin of the cylinder is at (−Centre, 0). More fields may come: write keyed
// literals.
type CylinderDimensions struct {
	Crank  float64         `json:"crank"`  // crank pivot to the pin of the rod; the lever arm that an actuator swings
	Centre float64         `json:"centre"` // crank pivot to the cylinder's fixed pin
	Offset float64         `json:"offset"` // from the cylinder's pin to the line of its bore, positive where the bore lies left; usually 0
	Mount  rigid.Placement `json:"mount"`  // of the mechanism's own axes in the machine
}

// CylinderState is the motion of an OscillatingCylinder at one instant. Cylinder
// has its origin at its fixed pin and its x axis along the bore, Rod its origin at
// the crank pin and the cylinder's axes, Crank its origin at its pivot and its x
// axis to the crank pin. Turn, Swing and Slide are in the mechanism's own axes,
// without Mount. More fields may come.
type CylinderState struct {
	Crank, Rod, Cylinder rigid.Motion
	Turn                 rigid.Coordinate // of the crank: 0 where the cylinder is longest
	Swing                rigid.Coordinate // of the cylinder: 0 where the bore points from its pin to the crank pivot
	Slide                rigid.Coordinate // length from the cylinder's pin to the rod's along the bore
	Knee                 rigid.Side       // of the line from the crank pivot to the cylinder's pin on which the rod's pin lies
	Margin               float64
}

// An OscillatingCylinder is a cylinder about a fixed pin whose rod is pinned to a
// crank: the slider-crank chain with the slider's guide on a fixed pin. It is the
// oscillating-cylinder engine, and the hydraulic or electric actuator between the
// frame and an arm. The zero OscillatingCylinder gives ErrInput. Any number of
// goroutines may share one.
type OscillatingCylinder struct {
	given CylinderDimensions
	form  slotForm
}

// NewOscillatingCylinder checks the dimensions and returns the mechanism. Errors
// are those of NewSlottedLever, with Offset for Slot.
func NewOscillatingCylinder(d CylinderDimensions) (*OscillatingCylinder, error) {
	if err := checkSlot(d.Crank, d.Centre, d.Offset, "Offset", d.Mount); err != nil {
		return nil, err
	}
	return &OscillatingCylinder{given: d, form: newSlotForm(d.Crank, d.Centre, d.Offset, d.Mount)}, nil
}

// Dimensions returns what NewOscillatingCylinder was given.
func (c *OscillatingCylinder) Dimensions() CylinderDimensions { return c.given }

// Solve writes into dst the motion of all links for a motion of the crank, turn in
// rad counter-clockwise from the direction away from the cylinder's pin: the length
// and rate of the cylinder follow from the arm. Margin is Slide.Pos over the crank,
// at most 1. Errors: ErrUnreachable outside Range; ErrSingular for rates where
// Margin is below rigid.LeastMargin; ErrNotFinite; ErrInput for a zero
// OscillatingCylinder. An error leaves dst as it was.
func (c *OscillatingCylinder) Solve(dst *CylinderState, turn rigid.Coordinate) error {
	var m slotMotion
	sh, ch := trig.Sincos(turn.Pos / 2)
	d2, s2 := c.form.squares(ch)
	if err := c.form.place(&m, turn, sh, ch, d2, s2); err != nil {
		return err
	}
	c.write(dst, &m)
	dst.Knee = rigid.Left
	if sh*ch > 0 { // sin φ: the line points to −x
		dst.Knee = rigid.Right
	}
	return nil
}

// SolveSlide writes into dst the motion of all links for a motion of the cylinder,
// slide its length and rates in m: an actuator drives the arm. Of the two places
// of the crank pin, knee picks one by the side of the line from the crank pivot to
// the cylinder's pin: Right is a Turn in (0, π), Left one in (−π, 0).
//
// Turn.Pos is in (−π, π]; Margin is |sin| of the angle at the rod's pin between the
// directions to the two pivots. A length that no more than its rounding, 8 × 2⁻⁵² of
// its square, keeps from a dead centre counts as that, with Margin 0: so it is within
// about 6e-8·√(Centre/Crank) rad of one, and everywhere where Crank is below 1e-15 of
// Centre, which changes the length by no more. Errors: ErrUnreachable for a length
// that is negative or that the arm cannot give; ErrSingular for rates where Margin is
// below rigid.LeastMargin; ErrNotFinite; ErrInput for a zero OscillatingCylinder or
// an unknown knee. An error leaves dst as it was.
func (c *OscillatingCylinder) SolveSlide(dst *CylinderState, slide rigid.Coordinate, knee rigid.Side) error {
	var m slotMotion
	if err := c.form.solveSlide(&m, slide, knee); err != nil {
		return err
	}
	c.write(dst, &m)
	dst.Knee = knee
	return nil
}

func (c *OscillatingCylinder) write(dst *CylinderState, m *slotMotion) {
	c.form.write(&dst.Crank, &dst.Rod, &dst.Cylinder, m)
	dst.Turn, dst.Swing, dst.Slide, dst.Margin = m.turn, m.swing, m.slide, m.margin
}

// solveSlide finds the motion for a motion along the line. The triangle of crank,
// centre line and D has
//
//	4rc cos²(φ/2) = D² − (r − c)²,  4rc sin²(φ/2) = (r + c)² − D²,  D² = σ² + e²
//
// and, derivatives by φ, for the speed v and the acceleration a along the line
//
//	ω = v/σ',  α = (a − σ''ω²)/σ'
func (k *slotForm) solveSlide(m *slotMotion, slide rigid.Coordinate, knee rigid.Side) error {
	if slide.Pos*0+slide.Vel*0+slide.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	if k.r == 0 || knee != rigid.Left && knee != rigid.Right {
		return rigid.ErrInput
	}
	s := slide.Pos
	slack := 2 * beyond * k.size * s
	ch, ok := root(s*s-k.least, 2*equal*(s*s+math.Abs(k.least)), slack)
	sh, within := root(k.most-s*s, 2*equal*k.most, slack)
	if !(s >= 0 && s <= 2*(k.r+k.c)) || !ok || !within { // far beyond, the squares may overflow
		return rigid.ErrUnreachable
	}
	if knee == rigid.Left {
		sh = -sh
	}
	n := math.Hypot(sh, ch) // √(4rc) within rounding: the crank must keep its length
	if n == 0 {             // a crank so short that the length does not tell where it is
		ch, n = 1, 1
	}
	sh, ch = sh/n, ch/n
	margin := 2 * math.Abs(sh*ch) * k.c / math.Hypot(s, k.e)
	turn := rigid.Coordinate{Pos: rigid.Wrap(2 * math.Atan2(sh, ch))}
	rates := slide.Vel != 0 || slide.Acc != 0
	if rates {
		if margin < rigid.LeastMargin {
			return rigid.ErrSingular
		}
		turn.Vel = 1
	}
	if err := k.place(m, turn, sh, ch, s*s+k.e*k.e, s*s); err != nil {
		return err
	}
	slide1, slide2 := m.slide.Vel, m.slide.Acc
	m.slide, m.margin = slide, margin
	if rates {
		w := slide.Vel / slide1
		m.turn.Vel, m.turn.Acc = w, (slide.Acc-slide2*w*w)/slide1
		k.swingBySlide(m, 2*sh*ch)
	}
	return m.finite(k.r)
}

// swingBySlide sets the rates of the swing from those of the crank and the slide,
// ψ = arg d − atan2(e, σ) seen as a function of both: it is regular where σ passes
// 0, as the derivatives by φ alone are not.
//
//	(arg d)' = (1 + (r² − c²)/D²)/2,  (arg d)'' = rc(r² − c²)sin φ/D⁴
func (k *slotForm) swingBySlide(m *slotMotion, sin float64) {
	w, v, s := m.turn.Vel, m.slide.Vel, m.slide.Pos
	i := 1 / (s*s + k.e*k.e)
	first, second := (1+k.difference*i)/2, -k.minus*k.difference*sin*i*i
	m.swing.Vel = first*w + k.e*v*i
	m.swing.Acc = first*m.turn.Acc + second*w*w + k.e*(m.slide.Acc-2*s*v*v*i)*i
}

// root returns the square root of a square, 0 where it is no more than the rounding
// floor, and whether it is not below zero by more than slack.
func root(square, floor, slack float64) (float64, bool) {
	if square > floor {
		return math.Sqrt(square), true
	}
	return 0, square >= -slack
}

// Coefficients returns the cylinder's length, Slide, and its derivatives by the
// crank's angle, turn in rad: a rigid.Law. Errors as Solve asked for rates.
func (c *OscillatingCylinder) Coefficients(turn float64) (rigid.Coefficients, error) {
	var m slotMotion
	sh, ch := trig.Sincos(turn / 2)
	d2, s2 := c.form.squares(ch)
	if err := c.form.place(&m, rigid.Coordinate{Pos: turn, Vel: 1}, sh, ch, d2, s2); err != nil {
		return rigid.Coefficients{}, err
	}
	return rigid.Coefficients{In: turn, Out: m.slide.Pos, First: m.slide.Vel, Second: m.slide.Acc}, nil
}

// Range returns the crank's angles that have a position: all of them, or the
// interval about 0 at whose ends the rod's pin is nearest to the cylinder's.
func (c *OscillatingCylinder) Range() []rigid.Interval { return c.form.turns() }

// Lengths returns the least and the greatest length between which the cylinder
// works, in m. An actuator has to have this stroke for the crank to make all of
// Range; with a shorter one it stays between the two Turns that SolveSlide gives
// for the ends of the stroke.
func (c *OscillatingCylinder) Lengths() rigid.Interval {
	k := &c.form
	lo, _ := root(k.least, 0, 0)
	hi, _ := root(k.most, 0, 0)
	return rigid.Interval{Lo: lo, Hi: hi}
}

// DeadCentres returns the crank's angles, in (−π, π] and rising, where the
// cylinder's length comes to rest, with the length as Out and First = 0: the crank
// is in line with its pivot and the cylinder's pin. The longest is at 0; a crank
// that turns fully has the shortest at π.
func (c *OscillatingCylinder) DeadCentres() []rigid.Coefficients {
	k := &c.form
	if k.r == 0 {
		return nil
	}
	lengths := c.Lengths()
	out := []rigid.Coefficients{{Out: lengths.Hi, Second: k.minus / lengths.Hi}}
	if k.least > 0 {
		out = append(out, rigid.Coefficients{In: math.Pi, Out: lengths.Lo, Second: -k.minus / lengths.Lo})
	}
	return out
}
