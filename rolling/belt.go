package rolling

import (
	"math"

	"example.com/twopoint/rigid"
)

// BeltDimensions are those of two pulleys or sprockets with a belt or chain about
// both that does not slip. Give both radii, of the belt's pitch line, or both tooth
// numbers with the pitch, or all, which must agree to 1e-9. Where tooth numbers are
// given the ratio is theirs and exact; a chain's ripple of speed by its links is left
// out. More fields may come: write keyed literals.
//
// The centre of A is the origin of the mechanism's own axes, that of B at
// (Centres, 0).
type BeltDimensions struct {
	RadiusA float64         `json:"radiusA"` // in m, 0: from the teeth
	RadiusB float64         `json:"radiusB"`
	TeethA  int             `json:"teethA"` // 0: no teeth
	TeethB  int             `json:"teethB"`
	Pitch   float64         `json:"pitch"`   // of belt or chain in m
	Centres float64         `json:"centres"` // distance of the centres in m
	Crossed bool            `json:"crossed"` // the pulleys turn contrary ways
	Mount   rigid.Placement `json:"mount"`
}

// BeltState is the motion of two pulleys and their belt at one instant. More fields
// may come: write keyed literals.
type BeltState struct {
	A, B rigid.Motion // origins at the centres, x axes along the mechanism's at turn 0

	TurnA, TurnB rigid.Coordinate // from the mechanism's x axis, in rad, over any number of turns
	Slide        rigid.Coordinate // of the belt along itself in m, counter-clockwise about A
}

// A Belt is an open or crossed belt or chain drive on fixed axes, or with
// BeltState.On on axes carried by an arm. It never changes, so that any number of
// goroutines may share it. The zero Belt is no mechanism: its methods return
// ErrInput, or NaN or nothing where they return no error.
//
//	Slide = RadiusA·TurnA,  TurnB = (RadiusA/RadiusB)·TurnA, − for a crossed belt
type Belt struct {
	dim              BeltDimensions
	radiusA, radiusB float64
	bOverA, aOverB   double // ratio of the turns, signed
	perTurn, slide   double // Slide over TurnA, TurnA over Slide

	mount, centreB rigid.Pose
}

// NewBelt returns the belt drive with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: lengths must be positive,
// finite and from 1e-60 to 1e60 m, or 0 where they may be missing; teeth at least
// one (ErrNotPositive, ErrNotFinite, ErrInput); dimensions that contradict each
// other are refused with ErrInput, and Centres with ErrUnreachable where the pulleys
// would touch.
func NewBelt(d BeltDimensions) (*Belt, error) {
	var r report
	r.Mount(d.Mount)
	r.Length("Centres", d.Centres)
	if d.TeethA != 0 || d.TeethB != 0 {
		r.teeth("TeethA", d.TeethA)
		r.teeth("TeethB", d.TeethB)
		r.Length("Pitch", d.Pitch)
	}
	p := &Belt{dim: d}
	p.radiusA, p.perTurn = pitchRadius(&r, "RadiusA", d.RadiusA, d.TeethA, d.Pitch)
	p.radiusB, _ = pitchRadius(&r, "RadiusB", d.RadiusB, d.TeethB, d.Pitch)
	if r.OK() && d.Centres <= p.radiusA+p.radiusB {
		r.Add("Centres", d.Centres, errTouch)
	}
	if !r.OK() {
		return nil, r.Err()
	}
	p.bOverA, p.aOverB = ratios(d.TeethA, d.TeethB, p.radiusA, p.radiusB, d.Crossed)
	p.slide = p.perTurn.inverse()
	p.mount = d.Mount.Pose()
	p.centreB = p.mount.Compose(rigid.NewPose(d.Centres, 0, 0))
	return p, nil
}

// Dimensions returns the dimensions as given to NewBelt.
func (p *Belt) Dimensions() BeltDimensions { return p.dim }

// Range returns the input's range, one whole turn: pulleys turn without limit.
func (p *Belt) Range() []rigid.Interval { return wholeTurn(p.radiusA != 0) }

// Coefficients returns the kinematic coefficients of TurnB for TurnA, both in rad.
func (p *Belt) Coefficients(turnA float64) (rigid.Coefficients, error) {
	return linear(p.bOverA, turnA)
}

// Wrap returns the angles over which the belt lies on A and on B, in rad. With β the
// angle between a span and the line of centres,
//
//	sin β = (RadiusA − RadiusB)/Centres:  π + 2β,  π − 2β
//	sin β = (RadiusA + RadiusB)/Centres:  π + 2β on both, for a crossed belt
//
// Of a zero Belt both are NaN.
func (p *Belt) Wrap() (a, b float64) {
	if p.dim.Crossed {
		w := math.Pi + 2*math.Asin((p.radiusA+p.radiusB)/p.dim.Centres)
		return w, w
	}
	beta := math.Asin((p.radiusA - p.radiusB) / p.dim.Centres)
	return math.Pi + 2*beta, math.Pi - 2*beta
}

// Length returns the length of the belt's pitch line, in m: two spans and two arcs.
// Of a zero Belt it is NaN.
func (p *Belt) Length() float64 {
	a, b := p.Wrap()
	rise, c := p.radiusA-p.radiusB, p.dim.Centres
	if p.dim.Crossed {
		rise = p.radiusA + p.radiusB
	}
	return 2*math.Sqrt((c-rise)*(c+rise)) + p.radiusA*a + p.radiusB*b
}

// Solve writes the motion for a given turn of A, in rad. Errors: ErrInput for a zero
// Belt, ErrNotFinite where a given number or a result is not finite. On error dst is
// as before. It does not allocate.
func (p *Belt) Solve(dst *BeltState, turnA rigid.Coordinate) error {
	return p.place(dst, turnA, scaled(p.bOverA, turnA), scaled(p.perTurn, turnA),
		double{hi: turnA.Pos}, p.bOverA.times(turnA.Pos))
}

// SolveB is Solve for a given turn of B, in rad. TurnA is not wrapped.
func (p *Belt) SolveB(dst *BeltState, turnB rigid.Coordinate) error {
	turnA := scaled(p.aOverB, turnB)
	return p.place(dst, turnA, turnB, scaled(p.perTurn, turnA),
		p.aOverB.times(turnB.Pos), double{hi: turnB.Pos})
}

// SolveSlide is Solve for a given travel of the belt, in m. No turn is wrapped.
func (p *Belt) SolveSlide(dst *BeltState, slide rigid.Coordinate) error {
	turnA, a := scaled(p.slide, slide), p.slide.times(slide.Pos)
	return p.place(dst, turnA, scaled(p.bOverA, turnA), slide, a, p.bOverA.by(a))
}

func (p *Belt) place(dst *BeltState, turnA, turnB, slide rigid.Coordinate, a, b double) error {
	if p.radiusA == 0 {
		return rigid.ErrInput
	}
	if !finite(turnA.Pos, turnA.Vel, turnA.Acc, turnB.Pos, turnB.Vel, turnB.Acc, slide.Pos, slide.Vel, slide.Acc) {
		return rigid.ErrNotFinite
	}
	dst.A, dst.B = spin(p.mount, turnA, a), spin(p.centreB, turnB, b)
	dst.TurnA, dst.TurnB, dst.Slide = turnA, turnB, slide
	return nil
}

// On moves a state onto an arm that carries both axes and moves as given. TurnA,
// TurnB and Slide stay as the arm sees them. ErrNotFinite as Solve; then the state
// is as before.
func (s *BeltState) On(arm *rigid.Motion) error {
	a, b := arm.Compose(&s.A), arm.Compose(&s.B)
	if !finiteMotion(&a) || !finiteMotion(&b) {
		return rigid.ErrNotFinite
	}
	s.A, s.B = a, b
	return nil
}
