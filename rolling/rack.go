package rolling

import (
	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// RackDimensions are those of a rack and pinion. Give the pinion's pitch radius, or
// its teeth with the rack's pitch, or all three, which must agree to 1e-9. More
// fields may come: write keyed literals.
//
// The centre of the pinion is the origin of the mechanism's own axes, the rack's
// pitch line runs along x at y = −Radius: the pinion lies left of it. Mount's Angle
// is the direction in which the rack moves.
type RackDimensions struct {
	Radius float64         `json:"radius"` // pitch radius in m, 0: from the teeth
	Teeth  int             `json:"teeth"`  // of the pinion, 0: no teeth
	Pitch  float64         `json:"pitch"`  // of the teeth along the rack in m
	Mount  rigid.Placement `json:"mount"`
}

// RackState is the motion of a rack and pinion at one instant. More fields may come:
// write keyed literals.
type RackState struct {
	Pinion rigid.Motion // origin at the centre, x axis along the mechanism's at turn 0
	Rack   rigid.Motion // origin at the pitch point at slide 0, axes as the mechanism's

	// PitchPinion and PitchRack are the particles at the pitch point, the relative
	// centre of the two: one place, one velocity, two accelerations.
	PitchPinion, PitchRack rigid.Point

	Turn  rigid.Coordinate // of the pinion from the mechanism's x axis, in rad, over any number of turns
	Slide rigid.Coordinate // of the rack along x, in m
}

// A Rack is a rack driven by a pinion on a fixed axis, or with RackState.On on a
// carriage. It never changes, so that any number of goroutines may share it. The
// zero Rack is no mechanism: its methods return ErrInput, or nothing where they
// return no error.
//
//	Slide = Radius·Turn
type Rack struct {
	dim            RackDimensions
	radius         float64
	perTurn, slide double // Slide over Turn, Turn over Slide

	mount, pitch rigid.Pose
}

// NewRack returns the rack and pinion with the given dimensions. It returns a
// *rigid.DimensionError, or several joined by errors.Join: lengths must be positive,
// finite and from 1e-60 to 1e60 m, or 0 where they may be missing; teeth at least
// one (ErrNotPositive, ErrNotFinite, ErrInput); dimensions that contradict each
// other are refused with ErrInput.
func NewRack(d RackDimensions) (*Rack, error) {
	var r report
	r.Mount(d.Mount)
	p := &Rack{dim: d}
	if d.Teeth != 0 {
		r.teeth("Teeth", d.Teeth)
		r.Length("Pitch", d.Pitch)
	}
	p.radius, p.perTurn = pitchRadius(&r, "Radius", d.Radius, d.Teeth, d.Pitch)
	if !r.OK() {
		return nil, r.Err()
	}
	p.slide = p.perTurn.inverse()
	p.mount = d.Mount.Pose()
	p.pitch = p.mount.Compose(rigid.NewPose(0, -p.radius, 0))
	return p, nil
}

// oneOver2Pi is 1/2π to 32 digits.
var oneOver2Pi = double{0x1.45f306dc9c883p-3, -0x1.6b01ec5417056p-57}

// pitchRadius returns a radius as given or, where there are teeth, as teeth·pitch/2π,
// also to 32 digits. Of teeth or a pitch that are wrong, which its caller reports, once,
// there is none.
func pitchRadius(r *report, name string, radius float64, teeth int, pitch float64) (float64, double) {
	exact := double{hi: radius}
	if teeth != 0 {
		if teeth < 1 || dims.Length(pitch) != nil {
			return radius, exact
		}
		exact = product(float64(teeth), pitch).by(oneOver2Pi)
		if radius == 0 {
			radius = exact.float()
		}
	}
	r.Length(name, radius)
	if r.OK() {
		r.agrees(name, radius, exact.hi)
	}
	return radius, exact
}

// Dimensions returns the dimensions as given to NewRack.
func (p *Rack) Dimensions() RackDimensions { return p.dim }

// Range returns the input's range, one whole turn: of the rack's ends the Rack knows
// nothing.
func (p *Rack) Range() []rigid.Interval { return wholeTurn(p.radius != 0) }

// Coefficients returns the kinematic coefficients of Slide, in m, for Turn, in rad.
func (p *Rack) Coefficients(turn float64) (rigid.Coefficients, error) {
	return linear(p.perTurn, turn)
}

// Solve writes the motion for a given turn of the pinion, in rad. Errors: ErrInput
// for a zero Rack, ErrNotFinite where a given number or a result is not finite. On
// error dst is as before. It does not allocate.
func (p *Rack) Solve(dst *RackState, turn rigid.Coordinate) error {
	return p.place(dst, turn, scaled(p.perTurn, turn), double{hi: turn.Pos})
}

// SolveSlide is Solve for a given slide of the rack, in m. Turn is not wrapped.
func (p *Rack) SolveSlide(dst *RackState, slide rigid.Coordinate) error {
	return p.place(dst, scaled(p.slide, slide), slide, p.slide.times(slide.Pos))
}

func (p *Rack) place(dst *RackState, turn, slide rigid.Coordinate, angle double) error {
	if p.radius == 0 {
		return rigid.ErrInput
	}
	u := p.mount.Axis
	vel, acc := r2.Scale(slide.Vel, u), r2.Scale(slide.Acc, u)
	st := RackState{
		Pinion: spin(p.mount, turn, angle),
		Rack: rigid.Motion{
			Pose: rigid.Pose{Origin: r2.Add(p.pitch.Origin, r2.Scale(slide.Pos, u)), Axis: u},
			Vel:  vel, Acc: acc,
		},
		PitchPinion: rigid.Point{Pos: p.pitch.Origin, Vel: vel, Acc: r2.Add(acc, r2.Scale(p.radius*turn.Vel*turn.Vel, perp(u)))},
		PitchRack:   rigid.Point{Pos: p.pitch.Origin, Vel: vel, Acc: acc},
		Turn:        turn, Slide: slide,
	}
	if !finite(turn.Pos, turn.Vel, turn.Acc) || !finiteMotion(&st.Rack) || !finitePoint(st.PitchPinion) {
		return rigid.ErrNotFinite
	}
	*dst = st
	return nil
}

// On moves a state onto a carriage that carries the pinion's axis and the rack's
// guide and moves as given. Turn and Slide stay as the carriage sees them.
// ErrNotFinite as Solve; then the state is as before.
func (s *RackState) On(carriage *rigid.Motion) error {
	return carry(carriage, &s.Pinion, &s.Rack, &s.PitchPinion, &s.PitchRack)
}
