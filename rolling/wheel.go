package rolling

import (
	"math"
	"math/big"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// WheelDimensions are those of a wheel on its track, in m. At turn 0 the wheel
// touches the track at the origin of the mechanism's own axes, the track runs
// along x there and the wheel's centre is at (0, Radius); a circular track has its
// centre at (0, −Ground). Mount puts these axes into the machine: its Angle is the
// slope of a straight track. More fields may come: write keyed literals.
type WheelDimensions struct {
	Radius float64 `json:"radius"` // rolling radius
	// Ground is the signed radius of the track: 0 for a straight line; positive,
	// the wheel runs on the outside of a circle; negative, inside one. With
	// |Ground| < Radius, negative, the wheel is a ring that hangs on a peg.
	Ground float64         `json:"ground"`
	Mount  rigid.Placement `json:"mount"`
}

// WheelState is the motion of a wheel at one instant. More fields may come: write
// keyed literals.
type WheelState struct {
	Wheel   rigid.Motion // origin at the centre, x axis along the mechanism's at turn 0
	Contact rigid.Point  // the wheel's particle that touches the track

	Turn   rigid.Coordinate // of the wheel from the mechanism's x axis, in rad, over any number of turns
	Arc    rigid.Coordinate // of the contact along the track, in m: the rolled length
	Travel rigid.Coordinate // of the centre along its own path, in m
}

// A Wheel rolls on a track. Rolling towards +x of the track it turns clockwise,
// so that its Turn falls. It never changes, so that any number of goroutines may
// share it. The zero Wheel is no mechanism: its methods return ErrInput, or
// nothing where they return no error.
//
// With r = Radius, R = Ground and ρ = rR/(R + r), which is r on a line,
//
//	Travel = −r·Turn,  Arc = −ρ·Turn
type Wheel struct {
	dim WheelDimensions

	perTravel double  // Turn over Travel: −1/r
	perArc    double  // Turn over Arc: −1/ρ
	arc       double  // Arc over Travel: R/(R + r) = ρ/r
	lay       double  // Travel over Arc
	half      double  // half the angle of the centre about the track's over Travel: 1/2(R + r), 0 on a line
	bend      float64 // curvature of the centre's path, 1/(R + r), positive where it falls away from +y
	rho       float64
	ground    float64 // 2R
	reach     float64 // 2(R + r), 0 on a line

	origin, axis r2.Vec // of Mount
	up           r2.Vec // from the origin to the centre at turn 0
}

// NewWheel returns the wheel with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: Radius must be
// positive, finite and from 1e-60 to 1e60 m (ErrNotPositive, ErrNotFinite,
// ErrInput), and so must |Ground|, unless it is 0. A wheel inside a circle of its
// own radius, Ground = −Radius to within 4 units of rounding, touches it
// everywhere and is refused with Name Ground and ErrSingular.
func NewWheel(d WheelDimensions) (*Wheel, error) {
	var r report
	r.Length("Radius", d.Radius)
	if d.Ground != 0 {
		r.Add("Ground", d.Ground, dims.Length(math.Abs(d.Ground)))
	}
	if r.OK() && same(d.Ground, -d.Radius) {
		r.Add("Ground", d.Ground, errFills)
	}
	r.Mount(d.Mount)
	if !r.OK() {
		return nil, r.Err()
	}
	return newWheel(d), nil
}

// newWheel makes the constants exactly and rounds them once.
func newWheel(d WheelDimensions) *Wheel {
	rat := func(x float64) *big.Rat { return new(big.Rat).SetFloat64(x) }
	quo := func(a, b *big.Rat) *big.Rat { return new(big.Rat).Quo(a, b) }
	mount := d.Mount.Pose()
	w := &Wheel{
		dim:    d,
		origin: mount.Origin,
		axis:   mount.Axis,
		up:     r2.Scale(d.Radius, perp(mount.Axis)),
	}
	radius, arc := rat(d.Radius), rat(1)
	if d.Ground != 0 {
		sum := new(big.Rat).Add(rat(d.Ground), radius)
		arc = quo(rat(d.Ground), sum)
		w.bend, _ = quo(rat(1), sum).Float64()
		w.half = doubleOf(quo(rat(0.5), sum))
		w.ground = 2 * d.Ground
		w.reach = doubleOf(sum).hi * 2
	}
	rho := new(big.Rat).Mul(radius, arc)
	w.rho, _ = rho.Float64()
	w.arc = doubleOf(arc)
	w.lay = doubleOf(quo(rat(1), arc))
	w.perTravel = doubleOf(quo(rat(-1), radius))
	w.perArc = doubleOf(quo(rat(-1), rho))
	return w
}

// Dimensions returns the dimensions as given to NewWheel.
func (w *Wheel) Dimensions() WheelDimensions { return w.dim }

// Range returns the input's range, one whole turn: a wheel turns without limit.
func (w *Wheel) Range() []rigid.Interval { return wholeTurn(w.dim.Radius != 0) }

// Coefficients returns the kinematic coefficients of Travel, in m, for the turn, in
// rad, of a wheel that rolls without slip: First is −Radius everywhere.
func (w *Wheel) Coefficients(turn float64) (rigid.Coefficients, error) {
	return linear(double{hi: -w.dim.Radius}, turn)
}
