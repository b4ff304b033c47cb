package rolling

import (
	"math"
	"math/big"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// PairDimensions are those of two gears or friction wheels that drive one another.
// Give both pitch radii, or both tooth numbers with the distance of the centres, or
// all that is known: what is redundant must agree to 1e-9. Where tooth numbers are
// given the ratio is theirs and exact. More fields may come: write keyed literals.
//
// The centre of A is the origin of the mechanism's own axes, the pitch point is at
// (RadiusA, 0) and the centre of B at (RadiusA + RadiusB, 0), or for an internal
// pair at (RadiusA − RadiusB, 0): of the two the larger one is the ring.
type PairDimensions struct {
	RadiusA  float64         `json:"radiusA"` // pitch radius in m, 0: from the teeth
	RadiusB  float64         `json:"radiusB"`
	TeethA   int             `json:"teethA"` // 0: no teeth
	TeethB   int             `json:"teethB"`
	Centres  float64         `json:"centres"` // distance of the centres in m, 0: from the radii
	Internal bool            `json:"internal"`
	Mount    rigid.Placement `json:"mount"`
}

// PairState is the motion of a pair at one instant. More fields may come: write
// keyed literals.
type PairState struct {
	A, B rigid.Motion // origins at the centres, x axes along the mechanism's at turn 0

	// PitchA and PitchB are the particles of A and of B at the pitch point: one
	// place, one velocity, two accelerations. The pitch point is the relative centre
	// of A and B, also at rest; the other two, of each in the frame, are the centres.
	PitchA, PitchB rigid.Point

	TurnA, TurnB rigid.Coordinate // from the mechanism's x axis, in rad, over any number of turns
}

// A Pair is two gears or friction wheels on fixed axes, or with PairState.On on axes
// carried by an arm. It never changes, so that any number of goroutines may share
// it. The zero Pair is no mechanism: its methods return ErrInput, or nothing where
// they return no error.
//
//	TurnB = −(TeethA/TeethB)·TurnA, + for an internal pair
type Pair struct {
	dim              PairDimensions
	radiusA, radiusB float64 // radiusB negative for an internal pair
	bOverA, aOverB   double  // ratio of the turns, signed

	mount, centreB, pitch rigid.Pose
}

// NewPair returns the pair with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: lengths must be positive,
// finite and from 1e-60 to 1e60 m, or 0 where they may be missing; teeth at least
// one (ErrNotPositive, ErrNotFinite, ErrInput); dimensions that contradict each
// other are refused with ErrInput, an internal pair of equal wheels, which would
// touch everywhere, with the Name RadiusB or TeethB and ErrSingular.
func NewPair(d PairDimensions) (*Pair, error) {
	var r report
	r.Mount(d.Mount)
	toothed := d.TeethA != 0 || d.TeethB != 0
	if toothed {
		r.teeth("TeethA", d.TeethA)
		r.teeth("TeethB", d.TeethB)
		if r.OK() && d.Internal && d.TeethA == d.TeethB {
			r.Add("TeethB", float64(d.TeethB), errFills)
		}
	}
	byTeeth := toothed && d.RadiusA == 0 && d.RadiusB == 0
	switch {
	case byTeeth && d.Centres == 0:
		r.Add("Centres", 0, errSize)
	case d.Centres != 0:
		r.Length("Centres", d.Centres)
	}
	p := &Pair{dim: d, radiusA: d.RadiusA, radiusB: d.RadiusB}
	if r.OK() && byTeeth {
		sum := math.Abs(float64(d.TeethA) + p.sign()*float64(d.TeethB))
		p.radiusA, p.radiusB = d.Centres*(float64(d.TeethA)/sum), d.Centres*(float64(d.TeethB)/sum)
	}
	if r.OK() || !byTeeth {
		r.Length("RadiusA", p.radiusA)
		r.Length("RadiusB", p.radiusB)
	}
	if r.OK() && d.Internal && same(p.radiusA, p.radiusB) {
		r.Add("RadiusB", d.RadiusB, errFills)
	}
	if r.OK() && toothed {
		r.agrees("RadiusB", p.radiusB, p.radiusA/float64(d.TeethA)*float64(d.TeethB))
	}
	if r.OK() && d.Centres != 0 {
		r.agrees("Centres", d.Centres, math.Abs(p.radiusA+p.sign()*p.radiusB))
	}
	if !r.OK() {
		return nil, r.Err()
	}
	p.bOverA, p.aOverB = ratios(d.TeethA, d.TeethB, p.radiusA, p.radiusB, !d.Internal)
	p.radiusB *= p.sign()
	p.mount = d.Mount.Pose()
	p.pitch = p.mount.Compose(rigid.NewPose(p.radiusA, 0, 0))
	p.centreB = p.mount.Compose(rigid.NewPose(p.radiusA+p.radiusB, 0, 0))
	return p, nil
}

// sign returns the side of the pitch point on which B's centre lies: 1, or −1.
func (p *Pair) sign() float64 {
	if p.dim.Internal {
		return -1
	}
	return 1
}

// ratios returns the ratio of the turns B over A, and A over B: exactly by teeth
// where there are any, else by radii.
func ratios(teethA, teethB int, radiusA, radiusB float64, contrary bool) (bOverA, aOverB double) {
	a, b := new(big.Rat).SetFloat64(radiusA), new(big.Rat).SetFloat64(radiusB)
	if teethA != 0 {
		a, b = new(big.Rat).SetInt64(int64(teethA)), new(big.Rat).SetInt64(int64(teethB))
	}
	if contrary {
		b.Neg(b)
	}
	return doubleOf(new(big.Rat).Quo(a, b)), doubleOf(new(big.Rat).Quo(b, a))
}

// Dimensions returns the dimensions as given to NewPair.
func (p *Pair) Dimensions() PairDimensions { return p.dim }

// Range returns the input's range, one whole turn: a pair turns without limit.
func (p *Pair) Range() []rigid.Interval { return wholeTurn(p.radiusA != 0) }

// Coefficients returns the kinematic coefficients of TurnB for TurnA, both in rad.
func (p *Pair) Coefficients(turnA float64) (rigid.Coefficients, error) {
	return linear(p.bOverA, turnA)
}

// Solve writes the motion for a given turn of A, in rad. Errors: ErrInput for a zero
// Pair, ErrNotFinite where a given number or a result is not finite. On error dst is
// as before. It does not allocate.
func (p *Pair) Solve(dst *PairState, turnA rigid.Coordinate) error {
	return p.place(dst, turnA, scaled(p.bOverA, turnA), double{hi: turnA.Pos}, p.bOverA.times(turnA.Pos))
}

// SolveB is Solve for a given turn of B, in rad. TurnA is not wrapped.
func (p *Pair) SolveB(dst *PairState, turnB rigid.Coordinate) error {
	return p.place(dst, scaled(p.aOverB, turnB), turnB, p.aOverB.times(turnB.Pos), double{hi: turnB.Pos})
}

// place writes the state for both turns; a and b are their places to 32 digits. The
// particles at the pitch point lie at RadiusA and −RadiusB from the centres.
func (p *Pair) place(dst *PairState, turnA, turnB rigid.Coordinate, a, b double) error {
	if p.radiusA == 0 {
		return rigid.ErrInput
	}
	along, across := p.mount.Axis, perp(p.mount.Axis)
	vel, acc := r2.Scale(p.radiusA*turnA.Vel, across), r2.Scale(p.radiusA*turnA.Acc, across)
	st := PairState{
		A:      spin(p.mount, turnA, a),
		B:      spin(p.centreB, turnB, b),
		PitchA: rigid.Point{Pos: p.pitch.Origin, Vel: vel, Acc: r2.Add(acc, r2.Scale(-p.radiusA*turnA.Vel*turnA.Vel, along))},
		PitchB: rigid.Point{Pos: p.pitch.Origin, Vel: vel, Acc: r2.Add(acc, r2.Scale(p.radiusB*turnB.Vel*turnB.Vel, along))},
		TurnA:  turnA, TurnB: turnB,
	}
	if !finite(turnA.Pos, turnB.Pos, turnA.Acc, turnB.Acc) || !finitePoint(st.PitchA) || !finitePoint(st.PitchB) {
		return rigid.ErrNotFinite
	}
	*dst = st
	return nil
}

// On moves a state onto an arm that carries both axes and moves as given. The bodies
// and points become motions in the machine; TurnA and TurnB stay as the arm sees
// them. ErrNotFinite as Solve; then the state is as before.
func (s *PairState) On(arm *rigid.Motion) error {
	return carry(arm, &s.A, &s.B, &s.PitchA, &s.PitchB)
}
